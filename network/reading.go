package network

// affine returns a reading of a passive element as a weighted sum of levels and a
// constant: v = constant + Σ coef·x. Passive elements read what is affine in the levels
// of their ports.
func (n *Network) affine(p *Params, t *ReadingTerm) (terms []Term, constant float64) {
	shape := &n.g.elements[t.Element].Shape
	s := Stamp{X: make([]float64, len(shape.Ports)), Mem: make([]float64, shape.Memory)}
	grad := make([]float64, len(s.X))
	constant = t.Sign * p.Law[t.Element].(Readable).Read(&s, t.Index, grad)
	for k, node := range shape.Ports {
		if grad[k] != 0 {
			terms = append(terms, Term{node, t.Sign * grad[k]})
		}
	}
	return terms, constant
}

// ReadingOf returns the output that shows reading k of an element.
func (n *Network) ReadingOf(id ElementID, k int) Output {
	e := &n.g.elements[id]
	return Output{Name: e.Readings[k] + " of " + e.Name, Reading: &ReadingTerm{Element: id, Index: k, Sign: 1}}
}

// PortFlowOf returns the output that shows what leaves the network at a port of an
// element and runs into it: along the part where the port is its first-named end.
func (n *Network) PortFlowOf(id ElementID, port int) Output {
	return Output{Name: n.g.elements[id].Name, Flow: &FlowTerm{Kind: PortFlow, Element: id, Port: port, Sign: -1}}
}
