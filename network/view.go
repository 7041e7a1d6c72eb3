package network

import "slices"

// A Network is a checked graph with the plan of its reduction. It never changes
// and may be used by several goroutines at once.
type Network struct {
	g       graph
	plan    *plan
	remarks []Fault
}

// A NodeView is what is known of a node from the graph alone.
type NodeView struct {
	ID         NodeID
	Name       string
	Ref        Ref
	Held       bool
	Input      InputID      // of a held node, else −1
	Massless   bool         // neither held nor with a capacity or an element that stores
	Capacities []CapacityID // what adds up to its capacity
	Neighbours []NodeID     // that a branch or an element joins it to, ascending
	Island     int          // free nodes that influence one another, directly or not, share an island; −1 for a held node
}

// BranchKind tells the kinds of branches apart.
type BranchKind uint8

const (
	ResistanceBranch BranchKind = iota
	OneWayBranch
	FeedbackBranch
	InertanceBranch
)

func (k BranchKind) String() string {
	return [...]string{"resistance", "one way", "feedback", "inertance"}[k]
}

// A BranchView is a branch of the graph. Of a feedback, From is the node watched
// and To the node fed. Index is its ResistanceID, OneWayID, FeedbackID
// or InertanceID.
type BranchView struct {
	Kind     BranchKind
	Index    int
	Name     string
	From, To NodeID
	Ref      Ref
}

// An InputView is a held node or a source.
type InputView struct {
	ID   InputID
	Name string // of the held node or the source
	Node NodeID
	Held bool
	Sign float64 // of a source
	Ref  Ref
}

// NodeCount returns the number of nodes; NodeIDs run from 0 to it.
func (n *Network) NodeCount() int { return len(n.g.nodes) }

// InputCount returns the number of inputs; InputIDs run from 0 to it.
func (n *Network) InputCount() int { return len(n.g.inputs) }

// StoreCount returns the number of free nodes with a capacity: the order.
func (n *Network) StoreCount() int { return n.plan.stores }

// Name returns the name of a node.
func (n *Network) Name(id NodeID) string { return n.g.nodes[id].name }

// Nodes returns the names of all nodes, by NodeID.
func (n *Network) Nodes() []string {
	names := make([]string, len(n.g.nodes))
	for i := range names {
		names[i] = n.g.nodes[i].name
	}
	return names
}

// Node returns what is known of one node.
func (n *Network) Node(id NodeID) NodeView {
	v := &n.g.nodes[id]
	return NodeView{
		ID: id, Name: v.name, Ref: v.ref,
		Held: v.held != noInput, Input: v.held,
		Massless:   n.g.isMassless(id),
		Capacities: append([]CapacityID(nil), v.capacities...),
		Neighbours: n.neighbours(id),
		Island:     n.plan.island[id],
	}
}

func (n *Network) neighbours(id NodeID) []NodeID {
	touches := make([]bool, len(n.g.nodes))
	for _, list := range n.g.branches() {
		for _, b := range list {
			switch id {
			case b.from:
				touches[b.to] = true
			case b.to:
				touches[b.from] = true
			}
		}
	}
	for i := range n.g.elements {
		if e := &n.g.elements[i]; !e.Passive && slices.Contains(e.Ports, id) {
			for _, port := range e.Ports {
				touches[port] = true
			}
		}
	}
	for i := range n.g.elements {
		ports := n.g.elements[i].Ports
		if slices.Contains(ports, id) {
			for _, other := range ports {
				touches[other] = true
			}
		}
	}
	touches[id] = false
	var ids []NodeID
	for i, t := range touches {
		if t {
			ids = append(ids, NodeID(i))
		}
	}
	return ids
}

// Branches returns resistances, one-way branches, feedbacks and inertances, in that
// order and each in the order of their identifiers.
func (n *Network) Branches() []BranchView {
	var all []BranchView
	for kind, list := range n.g.branches() {
		for i, b := range list {
			all = append(all, BranchView{BranchKind(kind), i, b.name, b.from, b.to, b.ref})
		}
	}
	return all
}

// Inputs returns the held nodes and the sources, by InputID.
func (n *Network) Inputs() []InputView {
	all := make([]InputView, len(n.g.inputs))
	for i, in := range n.g.inputs {
		all[i] = InputView{InputID(i), in.name, in.node, in.held, in.sign, in.ref}
	}
	return all
}

// Remarks returns what is legal and worth a word: held nodes that store, parts
// that feed into a held node.
func (n *Network) Remarks() []Fault { return n.remarks }

// Massless returns the nodes that Reduce eliminates, in the order of elimination.
func (n *Network) Massless() []NodeID {
	return append([]NodeID(nil), n.plan.order[:n.plan.massless]...)
}

// CapacityOf returns the capacity of a node, the sum of its parts.
func (n *Network) CapacityOf(p *Params, id NodeID) float64 {
	return n.g.capacityOf(p, id)
}
