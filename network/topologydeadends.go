package network

import "slices"

// deadEnds lists the inertances that are shut, and those that lead to nothing else: taken
// off one by one from where a meeting has a single one left that nothing is brought to.
func (n *Network) deadEnds(p *Params) (list []InertanceID) {
	g, t := &n.g, newTies(&n.g)
	open := func(v *tie) bool {
		switch v.kind {
		case resistanceTie:
			return p.G[v.index] != 0
		case streamTie:
			return p.W[v.index] != 0
		case feedbackTie:
			return p.K[v.index] != 0
		}
		return true
	}
	groups, of := t.clusters(t.reach(g, open), open)
	left := make([]int, len(groups)) // inertances that lead on from each meeting
	gone := slices.Clone(p.Shut)
	ends := func(b int) (from, to int32) { return of[g.inertances[b].from], of[g.inertances[b].to] }
	count := func(b, by int) {
		if from, to := ends(b); from != to {
			for _, k := range [2]int32{from, to} {
				if k != none {
					left[k] += by
				}
			}
		}
	}
	for b, shut := range p.Shut {
		if !shut {
			count(b, 1)
		}
	}
	for again := true; again; {
		again = false
		for b := range gone {
			from, to := ends(b)
			if !gone[b] && from != to && (from != none && left[from] == 1 && !t.fed(groups[from]) || to != none && left[to] == 1 && !t.fed(groups[to])) {
				gone[b], again = true, true
				count(b, -1)
			}
		}
	}
	for b, is := range gone {
		if is {
			list = append(list, InertanceID(b))
		}
	}
	return list
}

// fed tells whether a source or an element brings a flow into one of the nodes.
func (t *ties) fed(nodes []NodeID) bool {
	return slices.ContainsFunc(nodes, func(n NodeID) bool { return len(t.sources[n]) > 0 || len(t.pushes[n]) > 0 })
}
