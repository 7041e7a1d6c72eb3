package network

// Outputs are outputs of the nonlinear network as outputs of Net, and their values
// at the state, to which the answers of Net are to be added.
func (l *Linear) Outputs(outs []Output) (deviations []Output, at []float64) {
	deviations, at = make([]Output, len(outs)), make([]float64, len(outs))
	for k := range outs {
		deviations[k] = l.output(&outs[k])
		at[k] = l.equations.value(&outs[k], l.at.T, l.x, nil)
		if f := outs[k].Flow; f != nil && f.Kind == InertanceFlow {
			at[k] += f.Sign * l.lost[f.Inertance]
		}
	}
	return deviations, at
}

// output turns one output into that of a deviation.
func (l *Linear) output(o *Output) Output {
	d := Output{Name: o.Name}
	switch {
	case o.Reading != nil:
		d.Terms = l.reading(o.Reading)
	case o.Flow == nil:
		d.Terms = o.Terms
	case o.Flow.Kind == PortFlow:
		d.Terms = l.portFlow(o.Flow)
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
	for k, node := range l.locals(int(id)) {
		if grad[k] != 0 {
			terms = append(terms, Term{node, sign * grad[k]})
		}
	}
	return terms
}
