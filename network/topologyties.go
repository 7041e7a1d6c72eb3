package network

import "slices"

// Ties are the parts through which one node's level determines another's at once:
// resistances both ways, streams to their end, elements that join their ports. A part
// with one end, a feedback of a node on itself or an element that joins a single port
// to something outside, determines that node.
type ties struct {
	list  []tie
	touch [][]int32 // by NodeID
	pipes [][]int32 // inertances, by NodeID

	sources [][]int32     // by NodeID
	pushes  [][]jointPort // elements that bring a flow without tying the node to anything, by NodeID
}

type tie struct {
	ends     []NodeID
	directed bool // from the first to the second alone
	kind     tieKind
	index    int
}

type tieKind uint8

const (
	resistanceTie tieKind = iota
	streamTie
	feedbackTie
	elementTie
)

func newTies(g *graph) ties {
	t := ties{touch: make([][]int32, len(g.nodes)), pipes: make([][]int32, len(g.nodes))}
	add := func(v tie) {
		for _, n := range v.ends {
			t.touch[n] = append(t.touch[n], int32(len(t.list)))
		}
		t.list = append(t.list, v)
	}
	for k, b := range g.resistances {
		add(tie{[]NodeID{b.from, b.to}, false, resistanceTie, k})
	}
	for k, b := range g.oneWays {
		add(tie{[]NodeID{b.from, b.to}, true, streamTie, k})
	}
	for k, b := range g.feedbacks {
		if b.from == b.to {
			add(tie{[]NodeID{b.to}, false, feedbackTie, k})
		}
	}
	t.sources, t.pushes = make([][]int32, len(g.nodes)), make([][]jointPort, len(g.nodes))
	for k, in := range g.inputs {
		if !in.held {
			t.sources[in.node] = append(t.sources[in.node], int32(k))
		}
	}
	for k := range g.elements {
		e := &g.elements[k]
		if e.Joins {
			add(tie{e.Ports, false, elementTie, k})
			continue
		}
		for port, n := range e.Ports {
			if !e.Passive {
				t.pushes[n] = append(t.pushes[n], jointPort{element: k, port: port})
			}
		}
	}
	for k, b := range g.inertances {
		t.pipes[b.from] = append(t.pipes[b.from], int32(k))
		t.pipes[b.to] = append(t.pipes[b.to], int32(k))
	}
	return t
}

// reach marks the nodes that held nodes and stores determine while the ties given are open.
func (t *ties) reach(g *graph, open func(*tie) bool) []bool {
	reached := make([]bool, len(g.nodes))
	var queue []NodeID
	mark := func(n NodeID) {
		if !reached[n] {
			reached[n] = true
			queue = append(queue, n)
		}
	}
	for i := range g.nodes {
		if !g.isMassless(NodeID(i)) {
			mark(NodeID(i))
		}
	}
	for k := range t.list {
		if v := &t.list[k]; len(v.ends) == 1 && open(v) {
			mark(v.ends[0])
		}
	}
	for len(queue) > 0 {
		n := queue[len(queue)-1]
		queue = queue[:len(queue)-1]
		for _, k := range t.touch[n] {
			v := &t.list[k]
			if !open(v) || v.directed && v.ends[0] != n {
				continue
			}
			for _, end := range v.ends {
				mark(end)
			}
		}
	}
	return reached
}

// clusters groups the nodes that are not reached and hang together by the ties given,
// each group and the list ascending.
func (t *ties) clusters(reached []bool, open func(*tie) bool) (groups [][]NodeID, of []int32) {
	of = make([]int32, len(reached))
	for i := range of {
		of[i] = none
	}
	for i := range reached {
		if reached[i] || of[i] != none {
			continue
		}
		id := int32(len(groups))
		of[i] = id
		group := []NodeID{NodeID(i)}
		for next := 0; next < len(group); next++ {
			for _, k := range t.touch[group[next]] {
				if v := &t.list[k]; open(v) {
					for _, end := range v.ends {
						if !reached[end] && of[end] == none {
							of[end] = id
							group = append(group, end)
						}
					}
				}
			}
		}
		slices.Sort(group)
		groups = append(groups, group)
	}
	return groups, of
}

// A gathering is what may meet at a joint.
type gathering struct {
	pipes  []InertanceID
	pushes []jointPort
}

// joining lists, for every node that may come to stand for a joint, what may meet there,
// whatever is shut.
func (t *ties) joining(g *graph, p *Params) []gathering {
	if len(g.inertances) == 0 {
		return nil
	}
	reached := t.reach(g, func(v *tie) bool { return v.permanent(g, p) })
	groups, _ := t.clusters(reached, func(*tie) bool { return true })
	list := make([]gathering, len(g.nodes))
	for _, group := range groups {
		all := gathering{pipes: t.pipesOf(group, func(InertanceID) bool { return true })}
		for _, n := range group {
			all.pushes = append(all.pushes, t.pushes[n]...)
		}
		for _, n := range group {
			if len(t.pipes[n]) > 0 {
				list[n] = all
			}
		}
	}
	return list
}

// pipesOf lists the open inertances that touch a group, ascending.
func (t *ties) pipesOf(group []NodeID, open func(InertanceID) bool) []InertanceID {
	var list []InertanceID
	for _, n := range group {
		for _, b := range t.pipes[n] {
			if open(InertanceID(b)) {
				list = append(list, InertanceID(b))
			}
		}
	}
	slices.Sort(list)
	return slices.Compact(list)
}

// permanent tells whether a tie can never be shut.
func (v *tie) permanent(g *graph, p *Params) bool {
	switch v.kind {
	case elementTie:
		_, switching := p.Law[v.index].(Switching)
		return g.elements[v.index].Gate == 0 && !switching
	case streamTie:
		return len(g.switches) == 0 && p.W[v.index] != 0
	case feedbackTie:
		return len(g.switches) == 0 && p.K[v.index] != 0
	}
	return len(g.switches) == 0
}
