package network

import (
	"errors"
	"fmt"
	"slices"

	"lagbook/laplace"
	"lagbook/laplace/matrix"
)

// A Reduction is a Network with its numbers put in and its massless nodes
// eliminated, as a linear system of its stores.
type Reduction struct {
	// System has the inputs of the Network in the order of InputID and the
	// outputs Reduce was given. Where HasImbalance one input more follows: the
	// imbalance of the start state, to be applied as a unit step.
	System       *laplace.System
	Realisation  laplace.Realisation // what System was made from; not to be changed
	States       []NodeID            // the node of each store
	Flows        []InertanceID       // the inertances whose flows are the states after those of the stores
	HasImbalance bool

	net     *Network // what is in force of whole
	whole   *Network
	outs    []Output
	e       *exchange
	flows   *flows    // nil where there are no inertances
	weights []weights // of each output
	start   *StartState
}

// Reduce puts numbers into the network and reduces it to a system of its stores:
// C x' = exchange + B u, y = Output x + D u. The equations are those of the
// package comment with massless nodes eliminated exactly. Numbers that the network
// does not admit come back as a *ParamFault, all at once.
//
// A flow G·(x_from − x_to), and any output whose coefficients sum to zero, gets
// weights formed from differences along the branches. A start state that is not
// steady adds its imbalance as a last input; where there is no start state Reduce
// still answers, and Start and Respond say why.
//
// Cost: the elimination of the massless nodes, dense rows for the stores, and what
// laplace.New does. Nothing of the graph is looked at again, but where something is
// shut beside inertances, so that it may be called for many sets of numbers. The
// Params are only read.
func (n *Network) Reduce(p *Params, outs []Output) (*Reduction, error) {
	if n.g.nonlinear() {
		return nil, n.notLinear("transfer functions")
	}
	n.g.checkOutputs(outs)
	whole := n
	n, err := n.inForce(p)
	if err != nil {
		return nil, err
	}
	e, err := n.reduced(p)
	if err != nil {
		return nil, err
	}
	pl := n.plan
	r := &Reduction{net: n, whole: whole, outs: outs, e: e, States: pl.order[pl.massless:pl.free:pl.free], weights: make([]weights, len(outs))}
	if r.flows, err = n.newFlows(e, p); err != nil {
		return nil, err
	}
	for k := range outs {
		r.weights[k] = n.outputWeights(e, p, &outs[k], r.flows)
	}
	if n.givesStart(p) {
		// An error here is no obstacle to the poles; Respond meets it again.
		if st, err := n.startOf(p, e, r.flows); err == nil && st.moves() {
			r.start, r.HasImbalance = st, true
		}
	}
	if r.flows == nil {
		r.realise(p)
	} else {
		r.Flows = append(r.Flows, pl.flows.free...)
		r.realiseFlows(p)
	}
	if r.System, err = newSystem(r.Realisation); err != nil {
		return nil, err
	}
	return r, nil
}

func newSystem(r laplace.Realisation) (*laplace.System, error) {
	sys, err := laplace.New(r)
	if errors.Is(err, matrix.ErrRange) {
		return nil, outOfRange()
	}
	if err != nil {
		return nil, fmt.Errorf("network: reduction to %d stores: %w", r.Balance.N, err)
	}
	return sys, nil
}

func outOfRange() error {
	return &ParamFault{List: []Fault{{Code: OutOfRange, Text: "capacities or conductances are too far apart for double precision"}}}
}

// givesStart tells whether any level or flow at t = 0 is stated.
func (n *Network) givesStart(p *Params) bool {
	if p.HasAllStart {
		return true
	}
	return slices.Contains(p.HasStart, true) || slices.Contains(p.HasStartFlow, true)
}

func (r *Reduction) realise(p *Params) {
	g, pl := &r.net.g, r.net.plan
	inputs := len(g.inputs)
	if r.HasImbalance {
		inputs++
	}
	s := slab(make([]float64, pl.stores*(2+pl.stores+inputs+len(r.weights))+inputs*len(r.weights)))
	r.Realisation = laplace.Realisation{
		Balance: r.e.balance(pl, g, p, pl.allStores(), &s),
		B:       make([][]float64, inputs),
		Output:  make([][]float64, len(r.weights)),
	}
	for k := range r.Realisation.B {
		r.Realisation.B[k] = s.take(pl.stores)
	}
	r.fillInputs()
	for m := range r.weights {
		r.Realisation.Output[m] = s.take(pl.stores)
		copy(r.Realisation.Output[m], r.weights[m].at[pl.massless:pl.free])
	}
	r.fillDirect(&s)
	r.fillRate()
	for _, w := range r.weights {
		r.Realisation.Rounded = r.Realisation.Rounded || w.rounded
	}
}

// fillInputs writes the flow into each store per unit of each input.
func (r *Reduction) fillInputs() {
	g, pl, B := &r.net.g, r.net.plan, r.Realisation.B
	flow := make([]float64, pl.free)
	for k, in := range g.inputs {
		at := int(pl.pos[in.node])
		switch {
		case in.held:
			// Read from the rows of the stores below.
		case at >= pl.free:
			// A source into a held node changes nothing.
		case at >= pl.massless:
			B[k][at-pl.massless] = in.sign
		default:
			clear(flow)
			flow[at] = in.sign
			r.e.forward(pl, flow, pl.massless)
			copy(B[k], flow[pl.massless:])
		}
	}
	for i := pl.massless; i < pl.free; i++ {
		for s := pl.upper[i]; s < pl.start[i+1]; s++ {
			if j := int(pl.col[s]); j >= pl.free {
				B[g.nodes[pl.order[j]].held][i-pl.massless] = r.e.val[s]
			}
		}
	}
	if r.HasImbalance {
		copy(B[len(g.inputs)], r.start.Imbalance)
	}
}

// fillDirect writes the share of each input that reaches each output at once.
func (r *Reduction) fillDirect(s *slab) {
	g, pl := &r.net.g, r.net.plan
	inputs := len(r.Realisation.B)
	D := make([][]float64, len(r.weights))
	some := false
	for m, w := range r.weights {
		D[m] = s.take(inputs)
		for k, in := range g.inputs {
			at := int(pl.pos[in.node])
			switch {
			case in.held:
				D[m][k] = w.at[at]
			case at < pl.massless:
				D[m][k] = in.sign * w.flow[at]
			}
			if w.direct != nil {
				D[m][k] += w.direct[k]
			}
			some = some || D[m][k] != 0
		}
	}
	if some {
		r.Realisation.D = D
	}
}

// fillRate writes the share of the derivative of each input in each output.
func (r *Reduction) fillRate() {
	for m, w := range r.weights {
		if w.rate == nil {
			continue
		}
		if r.Realisation.Rate == nil {
			r.Realisation.Rate = make([][]float64, len(r.weights))
			for o := range r.weights {
				r.Realisation.Rate[o] = make([]float64, len(r.Realisation.B))
			}
		}
		copy(r.Realisation.Rate[m], w.rate)
	}
}

// balance copies the rows of some stores, which exchange with no others, into
// dense form.
func (e *exchange) balance(pl *plan, g *graph, p *Params, stores []int, s *slab) matrix.Balance {
	N := len(stores)
	b := matrix.Balance{N: N, C: s.take(N), F: s.take(N * N), Leak: s.take(N)}
	index := make([]int, pl.free)
	for i, at := range stores {
		index[at] = i
	}
	for i, at := range stores {
		b.C[i], b.Leak[i] = g.capacityOf(p, pl.order[at]), e.outward(pl, at)
		for k := pl.start[at]; k < pl.start[at+1]; k++ {
			if j := int(pl.col[k]); j >= pl.massless && j < pl.free {
				b.F[i*N+index[j]] = e.val[k]
			}
		}
	}
	return b
}

// allStores returns the positions of the stores.
func (pl *plan) allStores() []int {
	at := make([]int, pl.stores)
	for i := range at {
		at[i] = pl.massless + i
	}
	return at
}

// outward returns what a store exchanges with held nodes, which as far as its own
// level goes is exchange with a reference, and what feedbacks leave of it.
func (e *exchange) outward(pl *plan, at int) float64 {
	sum := e.leak[at]
	for k := pl.start[at+1] - 1; k >= pl.start[at] && int(pl.col[k]) >= pl.free; k-- {
		sum += e.val[k]
	}
	return sum
}

func (g *graph) capacityOf(p *Params, id NodeID) float64 {
	sum := 0.0
	for _, c := range g.nodes[id].capacities {
		sum += p.C[c]
	}
	return sum
}

// A slab hands out parts of one allocation.
type slab []float64

func (s *slab) take(n int) []float64 {
	part := (*s)[:n:n]
	*s = (*s)[n:]
	return part
}
