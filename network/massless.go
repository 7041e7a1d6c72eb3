package network

import (
	"math"
	"strconv"
)

// An exchange holds the numbers of a plan's rows: how much of x_j − x_i flows into
// i (val, by slot) and of 0 − x_i (leak, by free position). Eliminated rows stay
// as they were at their elimination, with pivot = Σ val above the diagonal + leak,
// so that  x_m = (Σ val·x_j + f_m)/pivot.
type exchange struct {
	val   []float64
	leak  []float64
	pivot []float64
	share []float64 // scratch: a row over its pivot
}

func newExchange(pl *plan) *exchange {
	s := slab(make([]float64, len(pl.col)+2*pl.free+len(pl.order)))
	return &exchange{val: s.take(len(pl.col)), leak: s.take(pl.free), pivot: s.take(pl.free), share: s.take(len(pl.order))}
}

// assemble adds up the branches. Both ends of a resistance take part in the same
// order, so that F stays symmetric bit for bit where all branches are resistances.
// A feedback K·x_on is the exchange K·(x_on − x_into) and the leak −K·(0 − x_into).
func (e *exchange) assemble(pl *plan, g *graph, p *Params) {
	add := func(slot int32, v float64) {
		if slot != none {
			e.val[slot] += v
		}
	}
	for k, v := range p.G {
		add(pl.resistance[k][0], v)
		add(pl.resistance[k][1], v)
	}
	for k, v := range p.W {
		add(pl.oneWay[k], v)
	}
	for k, v := range p.K {
		add(pl.feedback[k], v)
		if i := pl.pos[g.feedbacks[k].to]; int(i) < pl.free {
			e.leak[i] -= v
		}
	}
}

// eliminate carries the elimination through position m: the flow that m passed on
// is spread over the nodes it exchanged with. Without feedback every number is a
// sum of products of positive numbers. It returns the pivot and the sum of the
// sizes of what it was made of.
//
// F_ij += F_im·F_mj/pivot is rounded as F_im·(F_mj/pivot) where i comes before j and
// as (F_im/pivot)·F_mj where it comes after, so that a symmetric F stays so bit for bit.
func (e *exchange) eliminate(pl *plan, m int) (pivot, size float64) {
	pivot, size = e.sum(pl, m)
	e.pivot[m] = pivot
	if pivot == 0 {
		return pivot, size
	}
	first, end := pl.upper[m], pl.start[m+1]
	cols, row, share := pl.col[first:end], e.val[first:end], e.share[:end-first]
	for q, v := range row {
		share[q] = v / pivot
	}
	for k := pl.inStart[m]; k < pl.inStart[m+1]; k++ {
		i, s := pl.inRow[k], pl.inSlot[k]
		a := e.val[s]
		if a == 0 {
			continue
		}
		t := a / pivot
		e.leak[i] += t * e.leak[m]
		into, at := e.val[s+1:pl.start[i+1]], pl.col[s+1:pl.start[i+1]]
		r, q := 0, 0
		for ; q < len(cols) && cols[q] < i; q++ {
			for at[r] < cols[q] {
				r++
			}
			into[r] += t * row[q]
		}
		if q < len(cols) && cols[q] == i {
			q++ // what m passes back to i has not left it
		}
		for ; q < len(cols); q++ {
			for at[r] < cols[q] {
				r++
			}
			into[r] += a * share[q]
		}
	}
	return pivot, size
}

// sum adds the row of m above the diagonal and its leak. Where a leak is in it,
// terms of both signs meet, and the sum is compensated (Neumaier 1974) so that the
// gain of a feedback cancels exactly against its own exchange.
func (e *exchange) sum(pl *plan, m int) (sum, size float64) {
	row := e.val[pl.upper[m]:pl.start[m+1]]
	if e.leak[m] == 0 {
		for _, v := range row {
			sum += v
			size += math.Abs(v)
		}
		return sum, size
	}
	sum, size = e.leak[m], math.Abs(e.leak[m])
	lost := 0.0
	for _, v := range row {
		t := sum + v
		if math.Abs(sum) >= math.Abs(v) {
			lost += (sum - t) + v
		} else {
			lost += (v - t) + sum
		}
		sum = t
		size += math.Abs(v)
	}
	return sum + lost, size
}

// forward carries flows f into the free nodes through the elimination of the
// first count positions: what flows into a massless node goes on to those it
// exchanges with, in proportion.
func (e *exchange) forward(pl *plan, f []float64, count int) {
	for m := range count {
		if f[m] == 0 || e.pivot[m] == 0 {
			continue
		}
		t := f[m] / e.pivot[m]
		for k := pl.inStart[m]; k < pl.inStart[m+1]; k++ {
			f[pl.inRow[k]] += e.val[pl.inSlot[k]] * t
		}
	}
}

// reduced returns the exchanges of a network with its numbers checked and its massless nodes
// eliminated: rows of stores hold their exchange with stores and held nodes.
func (n *Network) reduced(p *Params) (*exchange, error) {
	if err := n.Check(p); err != nil {
		return nil, err
	}
	return n.eliminated(p)
}

// eliminated is reduced for numbers already checked.
func (n *Network) eliminated(p *Params) (*exchange, error) {
	pl := n.plan
	e := newExchange(pl)
	e.assemble(pl, &n.g, p)
	var faults []Fault
	failed := -1 // the group of massless nodes last found at fault: one message a group
	for m := range pl.massless {
		if pl.joint(m) {
			continue
		}
		pivot, size := e.eliminate(pl, m)
		if f := n.checkPivot(p, m, pivot, size); f != nil && pl.group[m] != failed {
			failed = pl.group[m]
			faults = append(faults, *f)
		}
	}
	if len(faults) > 0 {
		return nil, &ParamFault{List: faults}
	}
	for _, v := range e.val {
		if math.IsInf(v, 0) || math.IsNaN(v) {
			return nil, &ParamFault{List: []Fault{{Code: OutOfRange, Text: "conductances are too far apart for double precision"}}}
		}
	}
	return e, nil
}

// pivotTol is the rounding of a pivot relative to what it was made of, per term.
const pivotTol = 4 * 0x1p-53

// checkPivot judges the pivot of a massless node. With a small capacity c there,
// the node alone would have the pole −pivot/c: zero or a positive pole says that
// the massless node is not the limit of one that stores a little. While no feedback
// is negative, positive pivots say that whole groups of them are such limits, for
// any capacities (M-matrices); negative feedbacks from one massless node to another
// could still swing where three or more of them form a loop, which is not looked for.
func (n *Network) checkPivot(p *Params, m int, pivot, size float64) *Fault {
	pl := n.plan
	terms := float64(pl.start[m+1] - pl.upper[m] + 1)
	if pivot > pivotTol*terms*size {
		return nil
	}
	ids, refs, names := n.feedbacksInto(p, pl.group[m])
	if len(ids) == 0 {
		id := []NodeID{pl.order[m]}
		return &Fault{Code: Undetermined, Nodes: id, Refs: n.g.refsOf(id), Text: n.g.named(id) +
			": has no capacity, and " + atRest(p) + " nothing determines its level"}
	}
	refs = append(refs, n.g.refsOf(ids)...)
	if math.Abs(pivot) <= pivotTol*terms*size {
		return &Fault{Code: SingularMassless, Nodes: ids, Refs: refs, Text: n.g.named(ids) + ": has no capacity, and feedback " + names +
			" cancels exactly what determines its level"}
	}
	return &Fault{Code: FlippedMassless, Nodes: ids, Refs: refs, Text: n.g.named(ids) + ": has no capacity, and feedback " + names +
		" outweighs what determines its level, so that with any capacity, however small, it would run away; give it its capacity"}
}

// feedbacksInto lists what feedbacks with a gain lead into a group of massless nodes.
func (n *Network) feedbacksInto(p *Params, group int) (ids []NodeID, refs []Ref, names string) {
	seen := make([]bool, len(n.g.nodes))
	for k, f := range n.g.feedbacks {
		at := n.plan.pos[f.to]
		if p.K[k] == 0 || int(at) >= n.plan.massless || n.plan.group[at] != group {
			continue
		}
		if names != "" {
			names += ", "
		}
		names += strconv.Quote(f.name)
		refs = append(refs, f.ref)
		if !seen[f.to] {
			seen[f.to] = true
			ids = append(ids, f.to)
		}
	}
	return ids, refs, names
}
