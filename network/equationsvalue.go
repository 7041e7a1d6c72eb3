package network

import "math"

// value returns an output at t. rate is dx/dt, needed only for what must be delivered
// into a held node that stores; nil there counts as rest.
func (e *equations) value(o *Output, t float64, x, rate []float64) float64 {
	return o.Constant + e.variable(o, t, x, rate)
}

// variable is an output less its constant.
func (e *equations) variable(o *Output, t float64, x, rate []float64) float64 {
	switch {
	case o.Parts != nil:
		sum := 0.0
		for k := range o.Parts {
			sum += o.Parts[k].Coef * e.value(&o.Parts[k].Output, t, x, rate)
		}
		return sum
	case o.Reading != nil:
		s := &e.law[o.Reading.Element]
		e.fill(t, x)
		e.gather(s)
		return o.Reading.Sign * s.law.(Readable).Read(&s.s, o.Reading.Index, nil)
	case o.Flow != nil:
		return o.Flow.Sign * e.flowValue(o.Flow, t, x, rate)
	case len(o.Terms) == 1:
		return o.Terms[0].Coef * e.shown(o.Terms[0].Node, t, x)
	}
	sum := 0.0
	for _, term := range o.Terms {
		sum += term.Coef * e.shown(term.Node, t, x)
	}
	return sum
}

// shown is the level of a node less its datum.
func (e *equations) shown(n NodeID, t float64, x []float64) float64 {
	return e.levelAt(n, t, x) - e.p.Datum[n]
}

func (e *equations) levelAt(n NodeID, t float64, x []float64) float64 {
	at := e.l.level[n]
	if int(at) < len(x) {
		return x[at]
	}
	e.tell(t)
	return e.z[at]
}

func (e *equations) flowValue(f *FlowTerm, t float64, x, rate []float64) float64 {
	switch f.Kind {
	case ResistanceFlow:
		b := &e.g.resistances[f.Resistance]
		return e.now.G[f.Resistance] * (e.levelAt(b.from, t, x) - e.levelAt(b.to, t, x))
	case FeedbackFlow:
		return e.now.K[f.Feedback] * (e.levelAt(e.g.feedbacks[f.Feedback].from, t, x) - e.now.About[f.Feedback])
	case InertanceFlow:
		return x[e.l.flow[f.Inertance]]
	case SourceFlow:
		e.tell(t)
		return e.z[e.l.source[f.Input]]
	case PortFlow:
		return e.portFlow(&e.law[f.Element], f.Port, t, x)
	}
	return e.supplied(f.Node, t, x, rate)
}

func (e *equations) portFlow(s *stamped, port int, t float64, x []float64) float64 {
	if s.shut {
		return 0
	}
	e.fill(t, x)
	e.eval(s)
	return s.s.F[port]
}

// supplied is what the driver of a held node delivers into it: what branches and elements
// take out, less what sources bring, and what its own stores take in.
func (e *equations) supplied(n NodeID, t float64, x, rate []float64) float64 {
	e.fill(t, x)
	e.sum()
	e.slopes(t)
	at := e.l.level[n]
	v := e.g.capacityOf(e.now, n)*e.dz[at] - e.acc[at]
	for k := range e.law {
		s := &e.law[k]
		if !s.held || e.g.elements[k].Ports[0] != n {
			continue
		}
		e.eval(s)
		v += s.s.DStored * e.dz[at]
		for u, place := range e.l.unknown[k] {
			if rate != nil {
				v += s.s.DStoredBy[u] * rate[place]
			}
		}
	}
	return v
}

// scale sets s to the size that each unknown has at x, by which errors are judged: > 0.
// A level is judged by itself, and by a thousandth of the largest it hangs together with
// where it is smaller; so are flows.
func (e *equations) scale(x, s []float64) {
	level, flow := make([]float64, e.parts), make([]float64, e.parts)
	copy(e.z, x)
	for i, at := range e.l.level {
		level[e.part[i]] = max(level[e.part[i]], math.Abs(e.z[at]))
	}
	for b, at := range e.l.flow {
		w := &e.g.inertances[b]
		k := e.part[w.from]
		flow[k] = max(flow[k], math.Abs(x[at]))
	}
	for k := range level {
		if level[k] == 0 {
			level[k] = 1
		}
	}
	for _, n := range e.l.nodes {
		at := e.l.level[n]
		s[at] = max(math.Abs(x[at]), smallShare*level[e.part[n]])
	}
	for b, at := range e.l.flow {
		s[at] = max(math.Abs(x[at]), smallShare*flow[e.part[e.g.inertances[b].from]], smallShare*e.pushed(b, level))
	}
	e.scaleStored(x, s)
	for k, places := range e.l.unknown {
		for u, at := range places {
			s[at] = max(e.g.elements[k].Unknowns[u].Scale, math.Abs(x[at]))
		}
	}
}

// smallShare is how much smaller than the largest of its kind a value may be and still be
// judged by itself.
const smallShare = 1e-3

// pushed is the flow that a level of the size of those around drives through an inertance:
// through its resistance, and no more than it takes up in the stretch.
func (e *equations) pushed(b int, level []float64) float64 {
	v := level[e.part[e.g.inertances[b].from]]
	q := v * (e.t1 - e.t0) / e.p.L[b]
	if r := e.now.LR[b]; r > 0 {
		q = min(q, v/r)
	}
	return q
}

// scaleStored judges a stored quantity by the change that its level's size makes.
func (e *equations) scaleStored(x, s []float64) {
	e.sum()
	for i, at := range e.l.stored {
		if at == none {
			continue
		}
		slope := e.g.capacityOf(e.now, NodeID(i))
		for k := range e.law {
			if l := &e.law[k]; l.storing == e.l.level[i] {
				slope += math.Abs(l.s.DStored)
			}
		}
		if s[at] = max(slope*s[e.l.level[i]], 1e-6*math.Abs(x[at])); s[at] == 0 {
			s[at] = 1
		}
	}
}

// balances is the number of groups of nodes whose balances are kept apart: islands.
func (e *equations) balances() int { return e.islands }

// content sets c to what each group stores at x, and size to the sum of absolute values
// that it was made of.
func (e *equations) content(x, c, size []float64) {
	clear(c)
	clear(size)
	for _, n := range e.l.nodes {
		v := 0.0
		if at := e.l.stored[n]; at != none {
			v = x[at]
		} else if len(e.g.nodes[n].capacities) > 0 {
			v = e.g.capacityOf(e.now, n) * x[e.l.level[n]]
		}
		c[e.group[n]] += v
		size[e.group[n]] += math.Abs(v)
	}
}
