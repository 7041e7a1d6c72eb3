package network

import "slices"

// joints lists the groups of massless nodes that neither a held node nor a store
// determines through resistances, streams or feedbacks, joined to one another by
// resistances: places where inertances meet. Each group and the list are ascending.
func (g *graph) joints() [][]NodeID {
	if len(g.inertances) == 0 {
		return nil
	}
	reached := g.determined()
	parts := *g
	parts.inertances = nil
	return parts.groups(func(n NodeID) bool { return !reached[n] })
}

// determined marks the nodes whose levels held nodes and stores determine without
// inertances.
func (g *graph) determined() []bool {
	reached := make([]bool, len(g.nodes))
	for i := range g.nodes {
		reached[i] = !g.isMassless(NodeID(i))
	}
	for _, f := range g.feedbacks {
		if f.from == f.to {
			reached[f.to] = true
		}
	}
	g.spreadFromOutside(reached)
	g.spread(reached)
	return reached
}

// spreadByFlow extends a set of determined nodes through inertances and what is
// joined to them by resistances or elements.
func (g *graph) spreadByFlow(reached []bool) {
	for grown := true; grown; {
		grown = false
		for _, list := range [2][]branch{g.resistances, g.inertances} {
			for _, b := range list {
				if reached[b.from] != reached[b.to] {
					reached[b.from], reached[b.to] = true, true
					grown = true
				}
			}
		}
		for i := range g.elements {
			e := &g.elements[i]
			if !e.Joins || !slices.ContainsFunc(e.Ports, func(n NodeID) bool { return reached[n] }) {
				continue
			}
			for _, n := range e.Ports {
				grown = grown || !reached[n]
				reached[n] = true
			}
		}
	}
}

// mixed finds joints at which a stream or a feedback ends too: what flows in does
// not then sum to zero of itself.
func (g *graph) mixed(skip []bool) []Fault {
	var faults []Fault
	for _, nodes := range g.joints() {
		member := make(map[NodeID]bool, len(nodes))
		for _, n := range nodes {
			member[n] = !skip[n]
		}
		var refs []Ref
		for _, list := range [2][]branch{g.oneWays, g.feedbacks} {
			for _, b := range list {
				if member[b.from] || member[b.to] {
					refs = append(refs, b.ref)
				}
			}
		}
		if len(refs) > 0 {
			faults = append(faults, Fault{Code: Undetermined, Nodes: nodes, Refs: append(refs, g.refsOf(nodes)...), Text: g.named(nodes) +
				": inertances meet here without a capacity or a resistance to the rest, and a stream or a feedback ends here, so that nothing determines the level; give a capacity"})
		}
	}
	return faults
}
