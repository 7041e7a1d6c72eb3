package network

// A Term is a node's level times a coefficient.
type Term struct {
	Node NodeID
	Coef float64
}

// FlowKind tells what a FlowTerm is the flow of.
type FlowKind uint8

const (
	ResistanceFlow FlowKind = iota
	InertanceFlow           // a state of its own
	SupplyFlow              // what the driver of a held node delivers into it
	SourceFlow              // what a source delivers: its own waveform
	PortFlow                // what an element brings into one of its ports
	FeedbackFlow            // what a feedback brings into its node, K·(x_on − About)
)

// A FlowTerm is a flow times Sign: G·(x_from − x_to) of a resistance, the flow of
// an inertance from its first-named end to its second, or what must be delivered
// into a held node to hold it: the sum of what branches take out of it, less what
// sources bring, plus C·x' where it has a capacity C; or what a source delivers,
// whichever way it leads. Only the field that belongs
// to Kind is read.
type FlowTerm struct {
	Kind       FlowKind
	Resistance ResistanceID
	Inertance  InertanceID
	Node       NodeID  // held
	Input      InputID // a source
	Element    ElementID
	Port       int // place in Shape.Ports
	Feedback   FeedbackID
	Sign       float64
}

// A ReadingTerm is what can be read off an element.
type ReadingTerm struct {
	Element ElementID
	Index   int // place in Shape.Readings
	Sign    float64
}

// An Output is a flow where Flow is not nil, a reading where Reading is not nil, the sum
// of Parts where those are not nil, else a weighted sum of levels as they are shown, each
// less its node's datum; and Constant is added to any of these. Where the coefficients of
// levels sum to zero exactly it is a difference: its weights are then formed from
// differences of levels along the branches.
type Output struct {
	Name  string
	Terms []Term
	Flow  *FlowTerm

	Reading *ReadingTerm

	Parts    []Part
	Constant float64
}

// A Part is an output times a coefficient.
type Part struct {
	Coef   float64
	Output Output
}

// Level returns the output that shows the level of a node.
func (n *Network) Level(id NodeID) Output {
	return Output{Name: n.Name(id), Terms: []Term{{id, 1}}}
}

// Difference returns the output x_a − x_b.
func (n *Network) Difference(a, b NodeID) Output {
	return Output{Name: n.Name(a) + " - " + n.Name(b), Terms: []Term{{a, 1}, {b, -1}}}
}

// FlowOf returns the output that shows the flow of a resistance.
func (n *Network) FlowOf(id ResistanceID) Output {
	return Output{Name: n.g.resistances[id].name, Flow: &FlowTerm{Resistance: id, Sign: 1}}
}

// InertanceFlowOf returns the output that shows the flow of an inertance.
func (n *Network) InertanceFlowOf(id InertanceID) Output {
	return Output{Name: n.g.inertances[id].name, Flow: &FlowTerm{Kind: InertanceFlow, Inertance: id, Sign: 1}}
}

// SupplyOf returns the output that shows what the driver of a held node delivers
// into it.
func (n *Network) SupplyOf(id NodeID) Output {
	return Output{Name: "supply of " + n.Name(id), Flow: &FlowTerm{Kind: SupplyFlow, Node: id, Sign: 1}}
}

// SourceFlowOf returns the output that shows what a source delivers.
func (n *Network) SourceFlowOf(id InputID) Output {
	return Output{Name: n.g.inputs[id].name, Flow: &FlowTerm{Kind: SourceFlow, Input: id, Sign: 1}}
}

// checkOutputs panics where an output names what the network does not have.
func (g *graph) checkOutputs(outs []Output) {
	for _, o := range outs {
		if o.Flow != nil {
			g.checkFlow(o.Flow)
		}
		if t := o.Reading; t != nil && (t.Element < 0 || int(t.Element) >= len(g.elements) || t.Index < 0 || t.Index >= len(g.elements[t.Element].Readings)) {
			panic("network: output names a reading of another network")
		}
		for _, p := range o.Parts {
			g.checkOutputs([]Output{p.Output})
		}
		for _, t := range o.Terms {
			if t.Node < 0 || int(t.Node) >= len(g.nodes) {
				panic("network: output names a node of another network")
			}
		}
	}
}

func (g *graph) checkFlow(f *FlowTerm) {
	switch {
	case f.Kind == ResistanceFlow && (f.Resistance < 0 || int(f.Resistance) >= len(g.resistances)):
		panic("network: output names a resistance of another network")
	case f.Kind == InertanceFlow && (f.Inertance < 0 || int(f.Inertance) >= len(g.inertances)):
		panic("network: output names an inertance of another network")
	case f.Kind == SupplyFlow && (f.Node < 0 || int(f.Node) >= len(g.nodes) || !g.isHeld(f.Node)):
		panic("network: output names the supply of a node that is not held")
	case f.Kind == FeedbackFlow && (f.Feedback < 0 || int(f.Feedback) >= len(g.feedbacks)):
		panic("network: output names a feedback of another network")
	case f.Kind == PortFlow && (f.Element < 0 || int(f.Element) >= len(g.elements) || f.Port < 0 || f.Port >= len(g.elements[f.Element].Ports)):
		panic("network: output names a port of another network")
	case f.Kind == SourceFlow && (f.Input < 0 || int(f.Input) >= len(g.inputs) || g.inputs[f.Input].held):
		panic("network: output names what is not a source of the network")
	}
}
