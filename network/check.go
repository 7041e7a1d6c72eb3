package network

import "strconv"

// check returns every structural fault of the graph, in the order of nodes and
// branches.
func (g *graph) check(heldTwice []input) []Fault {
	if len(g.nodes) == 0 {
		return []Fault{{Code: Empty, Text: "no node is defined"}}
	}
	var faults []Fault
	for _, in := range heldTwice {
		faults = append(faults, Fault{Code: HeldTwice, Nodes: []NodeID{in.node}, Refs: []Ref{in.ref, g.nodes[in.node].ref},
			Text: g.named([]NodeID{in.node}) + ": is held twice"})
	}
	faults = append(faults, g.selfLoops()...)
	alone := g.unconnected()
	for id, yes := range alone {
		if yes {
			n := NodeID(id)
			faults = append(faults, Fault{Code: Unconnected, Nodes: []NodeID{n}, Refs: []Ref{g.nodes[n].ref},
				Text: g.named([]NodeID{n}) + ": nothing connects to it"})
		}
	}
	faults = append(faults, g.mixed(alone)...)
	for _, group := range g.undetermined(alone) {
		faults = append(faults, Fault{Code: Undetermined, Nodes: group, Refs: g.refsOf(group), Text: g.named(group) +
			": " + plural(group, "has", "have") + " no capacity and no path from a held node or a store, so that nothing determines the level"})
	}
	return faults
}

func plural(ids []NodeID, one, many string) string {
	if len(ids) == 1 {
		return one
	}
	return many
}

// branches lists resistances, one-way branches, feedbacks and inertances, in the
// order of BranchKind.
func (g *graph) branches() [4][]branch {
	return [4][]branch{g.resistances, g.oneWays, g.feedbacks, g.inertances}
}

// selfLoops finds resistances, streams and inertances with both ends at one node. A feedback
// of a node on itself is legal.
func (g *graph) selfLoops() []Fault {
	var faults []Fault
	for kind, list := range g.branches() {
		if BranchKind(kind) == FeedbackBranch {
			continue
		}
		for _, b := range list {
			if b.from == b.to {
				faults = append(faults, Fault{Code: SelfLoop, Nodes: []NodeID{b.from}, Refs: []Ref{b.ref},
					Text: BranchKind(kind).String() + " " + strconv.Quote(b.name) + ": begins and ends at " + g.named([]NodeID{b.from})})
			}
		}
	}
	for i := range g.elements {
		if e := &g.elements[i]; e.Joins && len(e.Ports) == 2 && e.Ports[0] == e.Ports[1] {
			faults = append(faults, Fault{Code: SelfLoop, Nodes: e.Ports[:1], Refs: []Ref{e.ref}, Text: strconv.Quote(e.Name) + ": begins and ends at " + g.named(e.Ports[:1])})
		}
	}
	return faults
}

// unconnected marks nodes that no branch or element joins to another and, if they store or
// are held, into which no source leads either: a lone store with a source is an
// adiabatic body, a lone held node has no meaning.
func (g *graph) unconnected() []bool {
	alone := make([]bool, len(g.nodes))
	for i := range alone {
		alone[i] = true
	}
	for _, list := range g.branches() {
		for _, b := range list {
			alone[b.from], alone[b.to] = false, false
		}
	}
	for i := range g.elements {
		if e := &g.elements[i]; !e.Passive {
			for _, n := range e.Ports {
				alone[n] = alone[n] && len(e.Ports) == 1 && g.isHeld(n)
			}
		}
	}
	for _, in := range g.inputs {
		if !in.held && g.nodes[in.node].held == noInput {
			alone[in.node] = false
		}
	}
	return alone
}

// undetermined groups the massless nodes that no path of influence reaches from
// a held node or a store. A resistance and an element that joins its ports carry
// influence both ways, a one-way branch to its end; a feedback of a node on itself and an
// element that joins a single port to something outside may fix the node's level; that
// their numbers do is checked when these are known.
func (g *graph) undetermined(skip []bool) [][]NodeID {
	reached := make([]bool, len(g.nodes))
	for i := range g.nodes {
		reached[i] = !g.isMassless(NodeID(i)) || skip[i]
	}
	for _, f := range g.feedbacks {
		if f.from == f.to {
			reached[f.to] = true
		}
	}
	g.spreadFromOutside(reached)
	g.spread(reached)
	if len(g.inertances) > 0 {
		g.spreadByFlow(reached)
	}
	return g.groups(func(n NodeID) bool { return !reached[n] })
}

// spread extends a set of determined nodes along the branches until it grows no more.
func (g *graph) spread(reached []bool) {
	for grown := true; grown; {
		grown = false
		mark := func(from, to NodeID) {
			if reached[from] && !reached[to] {
				reached[to], grown = true, true
			}
		}
		for _, b := range g.resistances {
			mark(b.from, b.to)
			mark(b.to, b.from)
		}
		for _, b := range g.oneWays {
			mark(b.from, b.to)
		}
		for i := range g.elements {
			if e := &g.elements[i]; e.Joins {
				for k := range e.Ports {
					mark(e.Ports[k], e.Ports[(k+1)%len(e.Ports)])
				}
			}
		}
	}
}

// spreadFromOutside marks the nodes that an element joins to something that is no node.
func (g *graph) spreadFromOutside(reached []bool) {
	for i := range g.elements {
		if e := &g.elements[i]; e.Joins && len(e.Ports) == 1 {
			reached[e.Ports[0]] = true
		}
	}
}

// groups returns the connected groups of the nodes that belong, joined by
// branches or elements of any kind, each group and the list of them in ascending order.
func (g *graph) groups(belongs func(NodeID) bool) [][]NodeID {
	parent := make([]int, len(g.nodes))
	for i := range parent {
		parent[i] = i
	}
	root := func(i int) int {
		for parent[i] != i {
			parent[i] = parent[parent[i]]
			i = parent[i]
		}
		return i
	}
	join := func(a, b NodeID) {
		if belongs(a) && belongs(b) {
			p, q := root(int(a)), root(int(b))
			parent[max(p, q)] = min(p, q)
		}
	}
	for _, list := range g.branches() {
		for _, b := range list {
			join(b.from, b.to)
		}
	}
	for i := range g.elements {
		if e := &g.elements[i]; !e.Passive {
			g.joinPorts(e.Ports, belongs, join)
		}
	}
	index := make([]int, len(g.nodes)) // group of a root, plus one
	var groups [][]NodeID
	for i := range g.nodes {
		if !belongs(NodeID(i)) {
			continue
		}
		r := root(i)
		if index[r] == 0 {
			groups = append(groups, nil)
			index[r] = len(groups)
		}
		groups[index[r]-1] = append(groups[index[r]-1], NodeID(i))
	}
	return groups
}

// joinPorts joins those ports of an element that belong.
func (g *graph) joinPorts(ports []NodeID, belongs func(NodeID) bool, join func(a, b NodeID)) {
	first := -1
	for k, n := range ports {
		if !belongs(n) {
			continue
		}
		if first >= 0 {
			join(ports[first], n)
		} else {
			first = k
		}
	}
}

func (g *graph) isHeld(n NodeID) bool { return g.nodes[n].held != noInput }

func (g *graph) isMassless(n NodeID) bool {
	return g.nodes[n].held == noInput && len(g.nodes[n].capacities) == 0 && !g.nodes[n].stores
}

// remarks lists what is legal and has no effect.
func (g *graph) remarks() []Fault {
	var list []Fault
	for i := range g.nodes {
		n := NodeID(i)
		if g.isHeld(n) && len(g.nodes[i].capacities) > 0 {
			list = append(list, Fault{Code: HeldCapacity, Nodes: []NodeID{n}, Refs: []Ref{g.capacities[g.nodes[i].capacities[0]].ref, g.nodes[i].ref},
				Text: g.named([]NodeID{n}) + ": is held, so that its capacity counts only in what its driver delivers"})
		}
	}
	for _, in := range g.inputs {
		if !in.held && g.isHeld(in.node) {
			list = append(list, Fault{Code: NoEffect, Nodes: []NodeID{in.node}, Refs: []Ref{in.ref},
				Text: "source " + strconv.Quote(in.name) + ": leads into the held " + g.named([]NodeID{in.node}) + " and changes nothing"})
		}
	}
	for _, f := range g.feedbacks {
		if g.isHeld(f.to) {
			list = append(list, Fault{Code: NoEffect, Nodes: []NodeID{f.to}, Refs: []Ref{f.ref},
				Text: "feedback " + strconv.Quote(f.name) + ": leads into the held " + g.named([]NodeID{f.to}) + " and changes nothing"})
		}
	}
	return list
}
