package network

// Outputs are outputs of the nonlinear network as outputs of Net, and what the answers
// of Net are to be added to: their values at the state, and what a column whose drop is not in
// balance comes to. Where an output reads what only adds up, Net grows by it; ask for Net
// and Params after.
func (l *Linear) Outputs(outs []Output) (deviations []Output, base []float64) {
	if l.read(outs) {
		if err := l.build(); err != nil {
			panic("network: a tally makes no fault")
		}
	}
	deviations, base = make([]Output, len(outs)), l.Values(outs)
	for k := range outs {
		deviations[k] = l.output(&outs[k])
		base[k] += l.lostOf(&outs[k])
	}
	return deviations, base
}

// lostOf is what the columns that an output shows come to beyond their flow at the state.
func (l *Linear) lostOf(o *Output) (sum float64) {
	for k := range o.Parts {
		sum += o.Parts[k].Coef * l.lostOf(&o.Parts[k].Output)
	}
	if f := o.Flow; f != nil && f.Kind == InertanceFlow {
		sum += f.Sign * l.lost[f.Inertance]
	}
	return sum
}

// Values are the values of outputs at the state.
func (l *Linear) Values(outs []Output) []float64 {
	at := make([]float64, len(outs))
	for k := range outs {
		at[k] = l.equations.value(&outs[k], l.at.T, l.x, nil)
	}
	return at
}

// output turns one output into that of a deviation.
func (l *Linear) output(o *Output) Output {
	d := Output{Name: o.Name}
	switch {
	case o.Parts != nil:
		for k := range o.Parts {
			d.Parts = append(d.Parts, Part{o.Parts[k].Coef, l.output(&o.Parts[k].Output)})
		}
	case o.Reading != nil:
		d.Terms = l.reading(o.Reading)
	case o.Flow == nil:
		d.Terms = o.Terms
	case o.Flow.Kind == PortFlow:
		d.Terms = l.portFlow(o.Flow)
	case o.Flow.Kind == FeedbackFlow:
		d.Terms = []Term{{l.of.g.feedbacks[o.Flow.Feedback].from, o.Flow.Sign * l.from.K[o.Flow.Feedback]}}
	case o.Flow.Kind == ResistanceFlow && l.resistance[o.Flow.Resistance] < 0:
		// shut: nothing flows
	default:
		f := *o.Flow
		if f.Kind == ResistanceFlow {
			f.Resistance = l.resistance[f.Resistance]
		}
		d.Flow = &f
	}
	return d
}

// reading is the gradient of a reading in the nodes that stand for what it reads.
func (l *Linear) reading(t *ReadingTerm) (terms []Term) {
	s := l.stamps[t.Element]
	grad := make([]float64, len(s.X))
	l.from.Law[t.Element].(Readable).Read(s, t.Index, grad)
	return l.terms(t.Element, grad, t.Sign)
}

// portFlow is the gradient of what an element brings into a port.
func (l *Linear) portFlow(f *FlowTerm) []Term {
	s := l.stamps[f.Element]
	return l.terms(f.Element, s.DF[f.Port*len(s.X):(f.Port+1)*len(s.X)], f.Sign)
}

func (l *Linear) terms(id ElementID, grad []float64, sign float64) (terms []Term) {
	grad = l.withoutSolved(int(id), grad)
	for k, node := range l.locals(int(id)) {
		if grad[k] != 0 {
			terms = append(terms, Term{node, sign * grad[k]})
		}
	}
	return terms
}

// absent stands for an unknown that is left out.
const absent NodeID = -1

// findTallies leaves out the unknowns that only add up, an energy used: nothing depends
// on them at the state, and each would be a pole at 0 that is none of the network's.
func (l *Linear) findTallies() {
	l.tally = make([][]bool, len(l.stamps))
	for i, s := range l.stamps {
		e := &l.of.g.elements[i]
		l.tally[i] = make([]bool, len(e.Unknowns))
		for k := range e.Unknowns {
			l.tally[i][k] = !l.equations.algebraic(i, k) && s.DStoredBy[k] == 0 && s.ignores(len(e.Ports)+k)
		}
	}
}

// ignores tells whether no row depends on a local variable.
func (s *Stamp) ignores(local int) bool {
	for r := range s.F {
		if s.DF[r*len(s.X)+local] != 0 {
			return false
		}
	}
	return true
}

// read takes in the tallies that outputs read, and tells whether there were any.
func (l *Linear) read(outs []Output) (grown bool) {
	for k := range outs {
		for _, p := range outs[k].Parts {
			grown = l.read([]Output{p.Output}) || grown
		}
		t := outs[k].Reading
		if t == nil {
			continue
		}
		s := l.stamps[t.Element]
		grad := make([]float64, len(s.X))
		l.from.Law[t.Element].(Readable).Read(s, t.Index, grad)
		for u, out := range l.tally[t.Element] {
			if out && grad[len(l.of.g.elements[t.Element].Ports)+u] != 0 {
				l.tally[t.Element][u], grown = false, true
			}
		}
	}
	return grown
}
