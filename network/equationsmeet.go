package network

import (
	"math"

	"lagbook/network/internal/sparse"
)

// meetFlows closes the balances of joints: with the impulses λ of their levels the flows
// become q + Σ ±λ/L, which is the least change in the measure Σ L Δq².
func (e *equations) meetFlows(t float64, x []float64, stated []bool) error {
	if len(e.top.joints) == 0 {
		return nil
	}
	lambda, misses := e.missing(t, x)
	if !misses {
		return nil
	}
	if err := e.impulses(lambda, stated); err != nil {
		return err
	}
	e.push(x, lambda, stated)
	return nil
}

// missing returns what flows into each joint and nowhere out, and whether that is more
// than rounding anywhere.
func (e *equations) missing(t float64, x []float64) (lambda []float64, misses bool) {
	e.fill(t, x)
	e.sum()
	lambda = make([]float64, len(e.top.joints))
	for k := range e.top.joints {
		net, size := e.arriving(&e.top.joints[k])
		lambda[k] = net
		misses = misses || math.Abs(net) > 1e-15*size
	}
	return lambda, misses
}

// placesOfJoints tells which joint a node belongs to, counted from 1.
func (e *equations) placesOfJoints() map[NodeID]int {
	of := make(map[NodeID]int, len(e.top.joints))
	for k := range e.top.joints {
		for _, n := range e.top.joints[k].nodes {
			of[n] = k + 1
		}
	}
	return of
}

// mobility is 1/L of an inertance whose flow an impulse may change, 0 of others.
func (e *equations) mobility(b InertanceID, stated []bool) float64 {
	if e.now.Shut[b] || stated != nil && stated[b] {
		return 0
	}
	return 1 / e.p.L[b]
}

// impulses turns the inflows lambda of the joints into the impulses that bring them out.
func (e *equations) impulses(lambda []float64, stated []bool) error {
	N, of := len(lambda), e.placesOfJoints()
	free := func(b InertanceID) float64 { return e.mobility(b, stated) }
	var at []sparse.Entry
	var v []float64
	add := func(i, j int, g float64) {
		if i > 0 && j > 0 {
			at, v = append(at, sparse.Entry{Row: i - 1, Col: j - 1}), append(v, g)
		}
	}
	for b, w := range e.g.inertances {
		if i, j, g := of[w.from], of[w.to], free(InertanceID(b)); i != j && g != 0 {
			add(i, i, g)
			add(j, j, g)
			add(i, j, -g)
			add(j, i, -g)
		}
	}
	a := sparse.New(N, at)
	for k, s := range at {
		a.Val[a.Slot(s.Row, s.Col)] += v[k]
	}
	for k := range N { // a joint whose flows are all stated: they must fit
		if slot := a.Slot(k, k); a.Val[slot] == 0 {
			a.Val[slot] = 1
			if stated != nil {
				lambda[k] = 0
			}
		}
	}
	lu := sparse.Analyse(a)
	if lu.Factor(a) != nil {
		return outOfRange()
	}
	lu.Solve(lambda)
	return nil
}

// push changes the flows by the impulses of the joints.
func (e *equations) push(x, lambda []float64, stated []bool) {
	of := e.placesOfJoints()
	impulse := func(k int) float64 {
		if k == 0 {
			return 0
		}
		return lambda[k-1]
	}
	for b, w := range e.g.inertances {
		i, j, g := of[w.from], of[w.to], e.mobility(InertanceID(b), stated)
		if q := &x[e.l.flow[b]]; i != j && g != 0 {
			size := math.Abs(*q) + (math.Abs(impulse(i))+math.Abs(impulse(j)))*g
			if *q += (impulse(i) - impulse(j)) * g; math.Abs(*q) < 1e-14*size {
				*q = 0 // it has no way on: what is left is rounding
			}
		}
	}
}
