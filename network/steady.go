package network

import (
	"math"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace/matrix"
)

// SteadyState returns the level of every node, by NodeID, with every input
// constant at u (by InputID) for ever: the point at which nothing changes. Where a
// feedback makes the network unstable that point exists and is never reached from
// elsewhere; Start says so for the values before t = 0. It returns *NoSteady where
// there is no such point or not one only, *ParamFault as Reduce does.
//
// Method: the elimination of massless nodes carried on through the stores, without
// subtraction where there is no feedback; levels as differences from that of a held
// node of the same island, so that a network at rest stays at rest exactly.
func (n *Network) SteadyState(p *Params, u []float64) ([]float64, error) {
	if n.g.nonlinear() {
		return nil, n.notLinear("the steady state of a linear network")
	}
	if len(u) != len(n.g.inputs) {
		panic("network: one value for each input")
	}
	if n.plan.flows != nil {
		levels, _, err := n.steadyFlows(p, u)
		return levels, err
	}
	e, err := n.reduced(p)
	if err != nil {
		return nil, err
	}
	pt := n.newPoint(p, e, u)
	st := n.newStatic(p, e)
	st.solve(pt)
	var faults []SteadyFault
	for k := range st.island {
		if st.island[k].open >= 0 {
			faults = append(faults, st.fault(pt, k))
		}
	}
	if len(faults) > 0 {
		return nil, &NoSteady{List: faults}
	}
	return pt.levels(), nil
}

// A static is the elimination carried on through the stores: the network with
// nothing moving.
type static struct {
	n      *Network
	rows   *exchange // stores not yet eliminated
	e      *exchange // stores eliminated
	island []islandStatic
}

// An islandStatic says how the steady state of an island is found.
type islandStatic struct {
	open     int         // position of a store at which the level is open; −1
	exact    bool        // it is open because a feedback balances the losses
	attained bool        // every pole of the island lies left of 0
	dense    *denseSolve // where the elimination met a sign that a feedback had turned
}

// newStatic eliminates the stores. Without feedback every pivot is a sum of
// positive numbers, and exactly zero (a sum of nothing) where a group of stores has
// nothing to flow to. While no exchange is negative, positive pivots everywhere say
// that every pole lies left of 0, and a negative one that some pole does not
// (M-matrices: Berman, Plemmons 1979, chapter 6); a negative exchange leaves the
// question to the poles.
func (n *Network) newStatic(p *Params, rows *exchange) *static {
	pl := n.plan
	st := &static{n: n, rows: rows, e: rows.clone(), island: make([]islandStatic, pl.islands)}
	turned := make([]bool, pl.islands)
	for k := range st.island {
		st.island[k] = islandStatic{open: -1, attained: true}
	}
	for m := pl.massless; m < pl.free; m++ {
		k := pl.island[pl.order[m]]
		negative := st.e.negative(pl, m)
		pivot, size := st.e.eliminate(pl, m)
		terms := float64(pl.start[m+1] - pl.upper[m] + 1)
		switch is := &st.island[k]; {
		case negative:
			turned[k] = true
		case math.Abs(pivot) <= pivotTol*terms*size: // 0 ≤ 0 where nothing was summed
			is.open, is.exact, is.attained = m, size > 0, false
		case pivot < 0:
			turned[k] = true
		}
	}
	for k := range turned {
		if turned[k] {
			st.island[k] = n.newDense(p, rows, k)
		}
	}
	return st
}

func (e *exchange) clone() *exchange {
	return &exchange{
		val:   append([]float64(nil), e.val...),
		leak:  append([]float64(nil), e.leak...),
		pivot: append([]float64(nil), e.pivot...),
		share: make([]float64, len(e.share)),
	}
}

// negative tells whether a row has a negative exchange, which only a negative
// feedback on another node brings in.
func (e *exchange) negative(pl *plan, m int) bool {
	for s := pl.upper[m]; s < pl.start[m+1]; s++ {
		if e.val[s] < 0 {
			return true
		}
	}
	return false
}

// solve fills in the levels of every island that has a steady state.
func (st *static) solve(pt *point) {
	pl := st.n.plan
	f := append([]float64(nil), pt.flow...)
	st.e.forward(pl, f, pl.free)
	st.e.back(pl, pt, f, pl.free)
	for k := range st.island {
		if d := st.island[k].dense; d != nil && st.island[k].open < 0 {
			d.solve(st.rows, pl, pt)
		}
	}
	st.rows.follow(pl, pt)
}

// A denseSolve solves an island by elimination with pivoting, for the signs that
// feedbacks turn.
type denseSolve struct {
	stores []int // positions
	lu     mat.LU
}

// newDense prepares the dense route and asks the poles whether the island is stable.
func (n *Network) newDense(p *Params, rows *exchange, k int) islandStatic {
	pl := n.plan
	d := &denseSolve{}
	for m := pl.massless; m < pl.free; m++ {
		if pl.island[pl.order[m]] == k {
			d.stores = append(d.stores, m)
		}
	}
	N := len(d.stores)
	s := slab(make([]float64, N*(N+2)))
	b := rows.balance(pl, &n.g, p, d.stores, &s)
	a := b.Dense() // A = (F − Σ)/C, so that A x = −f/C
	for i := range d.stores {
		for j := range N {
			a[i*N+j] *= b.C[i]
		}
	}
	d.lu.Factorize(mat.NewDense(N, N, a))
	is := islandStatic{open: -1, attained: stable(&b), dense: d}
	if cond := d.lu.Cond(); !(cond < 0x1p52) {
		is.open, is.exact = d.stores[N-1], true
	}
	return is
}

// stable tells whether every pole lies left of 0. Where the poles cannot be found
// it does not claim it.
func stable(b *matrix.Balance) bool {
	form, err := b.BlockForm()
	if err != nil {
		return false
	}
	for _, pole := range form.Poles {
		if pole.Re >= 0 {
			return false
		}
	}
	return true
}

// solve finds the levels of the island, refined twice with residuals formed from
// differences (Skeel 1980: one step makes pivoted elimination backward stable row
// by row; the second confirms it).
func (d *denseSolve) solve(rows *exchange, pl *plan, pt *point) {
	f := append([]float64(nil), pt.flow...)
	rows.forward(pl, f, pl.massless)
	for _, m := range d.stores {
		pt.dev[m] = 0
	}
	r := mat.NewVecDense(len(d.stores), nil)
	x := mat.NewVecDense(len(d.stores), nil)
	for range 3 {
		for i, m := range d.stores {
			r.SetVec(i, rows.inflow(pl, pt, f, m))
		}
		// The condition was judged when the island was prepared.
		_ = d.lu.SolveVecTo(x, false, r)
		for i, m := range d.stores {
			pt.dev[m] -= x.AtVec(i)
		}
	}
}

// fault says why island k has no one steady state.
func (st *static) fault(pt *point, k int) SteadyFault {
	n, pl, is := st.n, st.n.plan, st.island[k]
	if is.exact {
		var ids []NodeID
		for m := pl.massless; m < pl.free; m++ {
			if pl.island[pl.order[m]] == k {
				ids = append(ids, pl.order[m])
			}
		}
		return SteadyFault{Nodes: ids, Refs: n.g.refsOf(ids), Reason: FeedbackExact,
			Text: n.g.named(ids) + ": feedback balances the losses exactly, so that no level is steady or every one is"}
	}
	ids := n.g.influencing(pl.order[is.open])
	f, size := append([]float64(nil), pt.flow...), make([]float64, pl.free)
	for i, v := range pt.flow {
		size[i] = math.Abs(v)
	}
	st.e.forward(pl, f, is.open)
	st.e.forward(pl, size, is.open)
	fault := SteadyFault{Nodes: ids, Refs: n.g.refsOf(ids), Reason: LevelOpen, Text: n.g.named(ids) + ": " +
		plural(ids, "has", "have") + " no path to a held node, so that any level is steady; a start must be given"}
	if net := f[is.open]; math.Abs(net) > 1e-12*size[is.open] {
		fault.Reason, fault.Net = Integrating, net
		fault.Text, fault.Figure = n.g.figured(ids[0], n.g.named(ids)+": "+plural(ids, "has", "have")+" no path to a held node and "+
			plural(ids, "takes", "take")+" in ", net, " before t = 0, so that the level never settles; a start must be given")
	}
	return fault
}

// influencing returns the free nodes that influence n, n among them, ascending.
func (g *graph) influencing(n NodeID) []NodeID {
	reached := make([]bool, len(g.nodes))
	reached[n] = true
	for grown := true; grown; {
		grown = false
		mark := func(to, from NodeID) {
			if reached[to] && !reached[from] && !g.isHeld(from) {
				reached[from], grown = true, true
			}
		}
		for kind, list := range g.branches() {
			for _, b := range list {
				mark(b.to, b.from)
				if BranchKind(kind) == ResistanceBranch || BranchKind(kind) == InertanceBranch {
					mark(b.from, b.to)
				}
			}
		}
	}
	var ids []NodeID
	for i, yes := range reached {
		if yes {
			ids = append(ids, NodeID(i))
		}
	}
	return ids
}
