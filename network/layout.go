package network

import "lagbook/network/internal/sparse"

// A layout says where each unknown stands: levels of free nodes in the order of NodeID,
// flows of inertances, stored quantities of nodes with a storing element, unknowns of
// elements. Beyond them, in the vector z of all that laws see, come what waveforms say:
// the levels of held nodes, the flows of sources, the values of drives. Balances are summed up at the same places: that of a
// node with a storing element where its stored quantity stands, of any other free node
// where its level does, of a held node (what flows into it) where its level stands in z.
type layout struct {
	size    int
	level   []int32   // by NodeID, in z
	balance []int32   // by NodeID
	stored  []int32   // by NodeID; −1: no storing element, or held
	flow    []int32   // by InertanceID
	unknown [][]int32 // by ElementID
	source  []int32   // by InputID, in z; −1: a held node
	drive   [][]int32 // by ElementID, in z
	width   int       // of z
	nodes   []NodeID  // of each level, by place
}

func newLayout(g *graph) *layout {
	l := &layout{level: make([]int32, len(g.nodes)), balance: make([]int32, len(g.nodes)), stored: make([]int32, len(g.nodes)),
		flow: make([]int32, len(g.inertances)), unknown: make([][]int32, len(g.elements)), drive: make([][]int32, len(g.elements))}
	next := int32(0)
	take := func() int32 { next++; return next - 1 }
	for i := range g.nodes {
		if l.stored[i] = none; !g.isHeld(NodeID(i)) {
			l.level[i] = take()
			l.balance[i] = l.level[i]
			l.nodes = append(l.nodes, NodeID(i))
		}
	}
	for b := range g.inertances {
		l.flow[b] = take()
	}
	for i := range g.nodes {
		if g.nodes[i].stores && !g.isHeld(NodeID(i)) {
			l.stored[i] = take()
			l.balance[i] = l.stored[i]
		}
	}
	for k, e := range g.elements {
		for range e.Unknowns {
			l.unknown[k] = append(l.unknown[k], take())
		}
	}
	l.size = int(next)
	for i := range g.nodes {
		if g.isHeld(NodeID(i)) {
			l.level[i] = take()
			l.balance[i] = l.level[i]
		}
	}
	for _, in := range g.inputs {
		if in.held {
			l.source = append(l.source, none)
		} else {
			l.source = append(l.source, take())
		}
	}
	for k, e := range g.elements {
		for range e.Drives {
			l.drive[k] = append(l.drive[k], take())
		}
	}
	l.width = int(next)
	return l
}

// locals lists where in z the local variables of an element stand, and where its rows do.
func (l *layout) locals(g *graph, k int) (at, rows []int32) {
	for _, n := range g.elements[k].Ports {
		at, rows = append(at, l.level[n]), append(rows, l.balance[n])
	}
	at, rows = append(at, l.unknown[k]...), append(rows, l.unknown[k]...)
	return append(at, l.drive[k]...), rows
}

// pattern is that of the Jacobian in every mode; joining lists the inertances and elements
// whose rows the row of a node may have to sum up, by NodeID.
func (l *layout) pattern(g *graph, joining []gathering) *sparse.Matrix {
	var at []sparse.Entry
	put := func(row, col int32) {
		if int(row) < l.size && int(col) < l.size {
			at = append(at, sparse.Entry{Row: int(row), Col: int(col)})
		}
	}
	for _, b := range g.resistances {
		for _, row := range [2]int32{l.balance[b.from], l.balance[b.to]} {
			put(row, l.level[b.from])
			put(row, l.level[b.to])
		}
	}
	for _, list := range [2][]branch{g.oneWays, g.feedbacks} {
		for _, b := range list {
			put(l.balance[b.to], l.level[b.from])
			put(l.balance[b.to], l.level[b.to])
		}
	}
	for k, b := range g.inertances {
		for _, n := range [2]NodeID{b.from, b.to} {
			put(l.balance[n], l.flow[k])
			put(l.flow[k], l.level[n])
		}
	}
	for i, s := range l.stored {
		if s != none {
			put(l.level[i], s)
		}
	}
	for k := range g.elements {
		cols, rows := l.locals(g, k)
		for _, r := range rows {
			for _, c := range cols {
				put(r, c)
			}
		}
		if g.elements[k].Stores {
			for _, u := range l.unknown[k] {
				put(l.level[g.elements[k].Ports[0]], u)
			}
		}
	}
	for i, list := range joining {
		for _, p := range list.pushes {
			cols, _ := l.locals(g, p.element)
			for _, c := range cols {
				put(l.level[i], c)
			}
		}
		for _, k := range list.pipes {
			for _, n := range [2]NodeID{g.inertances[k].from, g.inertances[k].to} {
				put(l.level[i], l.level[n])
			}
			put(l.level[i], l.flow[k])
		}
	}
	return sparse.New(l.size, at)
}
