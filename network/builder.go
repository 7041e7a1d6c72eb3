package network

// Identifiers of what a Builder has been given, valid for the Network built from it.
type (
	NodeID       int32
	InputID      int32 // a held node or a source: something a waveform drives
	CapacityID   int32
	ResistanceID int32
	InertanceID  int32
	OneWayID     int32
	FeedbackID   int32
)

// A Ref is an opaque reference of whoever builds the network (a place in a file,
// say). network carries it and hands it back in a Fault; it never reads it.
type Ref int32

// NoRef marks a part that nobody needs to find again.
const NoRef Ref = -1

// noInput marks a node that is not held.
const noInput InputID = -1

// Parts of the graph as the Builder receives them.
type (
	node struct {
		name       string
		ref        Ref
		held       InputID // noInput if free
		capacities []CapacityID
		stores     bool // an element stores here
	}
	capacity struct {
		at  NodeID
		ref Ref
	}
	branch struct { // of a feedback: from is the node watched, to the node fed
		name     string
		from, to NodeID
		ref      Ref
	}
	input struct {
		name string
		node NodeID
		sign float64 // of a source
		held bool
		ref  Ref
	}
	graph struct {
		nodes       []node
		capacities  []capacity
		resistances []branch
		oneWays     []branch
		feedbacks   []branch
		inertances  []branch
		inputs      []input
		switches    []noted
		elements    []element
		dropping    []InertanceID
	}
)

// A Builder collects the graph of a network part by part. Every part may carry a
// Ref, which comes back in faults. Mistakes in the graph are found by Build, all
// at once; an identifier that the same Builder did not hand out is a programmer's
// error and panics.
type Builder struct {
	g         graph
	heldTwice []input
}

// NewBuilder returns an empty Builder.
func NewBuilder() *Builder { return &Builder{} }

// Node adds a node. Without Hold and without Capacity it is massless.
func (b *Builder) Node(name string, r Ref) NodeID {
	b.g.nodes = append(b.g.nodes, node{name: name, ref: r, held: noInput})
	return NodeID(len(b.g.nodes) - 1)
}

// Hold makes the level of n an input: its waveform is the level.
func (b *Builder) Hold(n NodeID, r Ref) InputID {
	b.need(n)
	in := input{name: b.g.nodes[n].name, node: n, held: true, ref: r}
	if first := b.g.nodes[n].held; first != noInput {
		b.heldTwice = append(b.heldTwice, in)
		return first
	}
	b.g.nodes[n].held = b.addInput(in)
	return b.g.nodes[n].held
}

// Capacity gives a node a capacity; several on one node add up. On a held node
// it counts only in what must be delivered to hold it (SupplyOf).
func (b *Builder) Capacity(at NodeID, r Ref) CapacityID {
	b.need(at)
	id := CapacityID(len(b.g.capacities))
	b.g.capacities = append(b.g.capacities, capacity{at, r})
	b.g.nodes[at].capacities = append(b.g.nodes[at].capacities, id)
	return id
}

// Resistance adds a branch whose flow from → to is G·(x_from − x_to). Parallel
// branches add.
func (b *Builder) Resistance(name string, from, to NodeID, r Ref) ResistanceID {
	b.need(from)
	b.need(to)
	b.g.resistances = append(b.g.resistances, branch{name, from, to, r})
	return ResistanceID(len(b.g.resistances) - 1)
}

// Inertance adds a branch with the flow i from → to as a state of its own,
// L·i' = x_from − x_to − LR·i: a column of liquid, a coil.
func (b *Builder) Inertance(name string, from, to NodeID, r Ref) InertanceID {
	b.need(from)
	b.need(to)
	b.g.inertances = append(b.g.inertances, branch{name, from, to, r})
	return InertanceID(len(b.g.inertances) - 1)
}

// OneWay adds W·(x_from − x_to) to the balance of to and nothing to that of from:
// a stream of capacity rate W that reaches to at the level of from. Into a held
// node it is legal and changes nothing.
func (b *Builder) OneWay(name string, from, to NodeID, r Ref) OneWayID {
	b.need(from)
	b.need(to)
	b.g.oneWays = append(b.g.oneWays, branch{name, from, to, r})
	return OneWayID(len(b.g.oneWays) - 1)
}

// Feedback adds K·(x_on − About) to the balance of into; into and on may be the
// same node. Into a held node it is legal and changes nothing.
func (b *Builder) Feedback(name string, into, on NodeID, r Ref) FeedbackID {
	b.need(into)
	b.need(on)
	b.g.feedbacks = append(b.g.feedbacks, branch{name, on, into, r})
	return FeedbackID(len(b.g.feedbacks) - 1)
}

// Source adds sign·u(t) to the balance of a node; sign is +1 into the node, −1
// out of it. Into a held node it is legal and changes nothing.
func (b *Builder) Source(name string, into NodeID, sign float64, r Ref) InputID {
	b.need(into)
	return b.addInput(input{name: name, node: into, sign: sign, ref: r})
}

func (b *Builder) addInput(in input) InputID {
	b.g.inputs = append(b.g.inputs, in)
	return InputID(len(b.g.inputs) - 1)
}

func (b *Builder) need(n NodeID) {
	if n < 0 || int(n) >= len(b.g.nodes) {
		panic("network: node of another builder")
	}
}

// Build checks the graph and plans the work that depends on it alone. Every
// structural fault is reported at once, in a *Faults. The Builder may be used on:
// the Network keeps a copy.
func (b *Builder) Build() (*Network, error) {
	g := b.g.clone()
	faults := g.check(b.heldTwice)
	if len(faults) > 0 {
		return nil, &Faults{List: faults}
	}
	return &Network{g: g, plan: newPlan(&g), remarks: g.remarks()}, nil
}

func (g *graph) clone() graph {
	c := graph{
		nodes:       append([]node(nil), g.nodes...),
		capacities:  append([]capacity(nil), g.capacities...),
		resistances: append([]branch(nil), g.resistances...),
		oneWays:     append([]branch(nil), g.oneWays...),
		feedbacks:   append([]branch(nil), g.feedbacks...),
		inertances:  append([]branch(nil), g.inertances...),
		inputs:      append([]input(nil), g.inputs...),
		switches:    append([]noted(nil), g.switches...),
		elements:    append([]element(nil), g.elements...),
		dropping:    append([]InertanceID(nil), g.dropping...),
	}
	for i := range c.nodes {
		c.nodes[i].capacities = append([]CapacityID(nil), c.nodes[i].capacities...)
	}
	return c
}
