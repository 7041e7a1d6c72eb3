package network

// outputWeights turns an output into weights on the stores, the flows of inertances
// and the inputs.
func (n *Network) outputWeights(e *exchange, p *Params, o *Output, f *flows) weights {
	w := n.ownWeights(e, p, o)
	if f != nil {
		f.settle(&w)
	}
	return w
}

// ownWeights are those before flows and joints take the place of what they settle.
func (n *Network) ownWeights(e *exchange, p *Params, o *Output) weights {
	var w weights
	switch {
	case o.Parts != nil:
		w = n.noWeights()
		for k := range o.Parts {
			v := n.ownWeights(e, p, &o.Parts[k].Output)
			w.include(o.Parts[k].Coef, &v)
		}
	case o.Reading != nil:
		terms, constant := n.affine(p, o.Reading)
		w = e.weightsOf(n.plan, &n.g, p, &Output{Terms: terms})
		w.constant = constant
	case o.Flow == nil:
		w = e.weightsOf(n.plan, &n.g, p, o)
		for _, t := range o.Terms {
			w.constant -= t.Coef * p.Datum[t.Node]
		}
	case o.Flow.Kind == ResistanceFlow:
		w = e.weightsOf(n.plan, &n.g, p, o)
	case o.Flow.Kind == PortFlow:
		w = n.noWeights() // of a passive element
	case o.Flow.Kind == FeedbackFlow:
		K := o.Flow.Sign * p.K[o.Flow.Feedback]
		w = e.weightsOf(n.plan, &n.g, p, &Output{Terms: []Term{{n.g.feedbacks[o.Flow.Feedback].from, K}}})
		w.constant = -K * p.About[o.Flow.Feedback]
	case o.Flow.Kind == InertanceFlow:
		w = n.noWeights()
		w.carry(n, o.Flow.Inertance, o.Flow.Sign)
	case o.Flow.Kind == SourceFlow:
		w = n.noWeights()
		w.direct = make([]float64, len(n.g.inputs))
		w.direct[o.Flow.Input] = o.Flow.Sign
	default:
		w = n.supply(e, p, o.Flow)
	}
	w.constant += o.Constant
	return w
}

func (n *Network) noWeights() weights {
	return weights{at: make([]float64, len(n.plan.order)), flow: make([]float64, n.plan.massless)}
}

// carry adds k times the flow of an inertance.
func (w *weights) carry(n *Network, b InertanceID, k float64) {
	if w.inert == nil {
		w.inert = make([]float64, len(n.g.inertances))
	}
	w.inert[b] += k
}

// plus adds k times the weights v of levels and flows into massless nodes.
func (w *weights) plus(k float64, v *weights) {
	for i, x := range v.at {
		w.at[i] += k * x
	}
	for i, x := range v.flow {
		w.flow[i] += k * x
	}
	w.sum += k * v.sum
}

// include adds k times all of the weights v. What is added up so may cancel.
func (w *weights) include(k float64, v *weights) {
	w.plus(k, v)
	w.inert, w.direct, w.rate = summed(w.inert, k, v.inert), summed(w.direct, k, v.direct), summed(w.rate, k, v.rate)
	w.constant += k * v.constant
	w.rounded = true
}

// summed returns a + k·b, each nil where it is nothing.
func summed(a []float64, k float64, b []float64) []float64 {
	if b != nil && a == nil {
		a = make([]float64, len(b))
	}
	for i, x := range b {
		a[i] += k * x
	}
	return a
}

// supply returns the weights of what the driver of a held node delivers into it:
// what branches take out of it, each from its own difference, less what sources,
// streams and feedbacks bring, and C·u' of its own capacity.
func (n *Network) supply(e *exchange, p *Params, t *FlowTerm) weights {
	g, w, at := &n.g, n.noWeights(), t.Node
	w.rounded = true
	add := func(sign float64, o Output) {
		v := e.weightsOf(n.plan, g, p, &o)
		w.plus(sign*t.Sign, &v)
	}
	for k, b := range g.resistances {
		if b.from == at || b.to == at {
			add(outOf(b, at), Output{Flow: &FlowTerm{Resistance: ResistanceID(k), Sign: 1}})
		}
	}
	for k, b := range g.inertances {
		if b.from == at || b.to == at {
			w.carry(n, InertanceID(k), t.Sign*outOf(b, at))
		}
	}
	for k, b := range g.oneWays {
		if b.to == at && p.W[k] != 0 {
			add(-1, Output{Terms: []Term{{b.from, p.W[k]}, {at, -p.W[k]}}})
		}
	}
	for k, b := range g.feedbacks {
		if b.to == at && p.K[k] != 0 {
			add(-1, Output{Terms: []Term{{b.from, p.K[k]}}})
			w.constant += t.Sign * p.K[k] * p.About[k]
		}
	}
	n.supplyInputs(p, t, &w)
	return w
}

// outOf is 1 where a branch leads out of a node, −1 where it leads in.
func outOf(b branch, at NodeID) float64 {
	if b.from == at {
		return 1
	}
	return -1
}

// supplyInputs adds what sources bring and the capacity takes in.
func (n *Network) supplyInputs(p *Params, t *FlowTerm, w *weights) {
	g := &n.g
	for k, in := range g.inputs {
		if !in.held && in.node == t.Node {
			if w.direct == nil {
				w.direct = make([]float64, len(g.inputs))
			}
			w.direct[k] -= t.Sign * in.sign
		}
	}
	if c := g.capacityOf(p, t.Node); c != 0 {
		w.rate = make([]float64, len(g.inputs))
		w.rate[g.nodes[t.Node].held] = t.Sign * c
	}
}
