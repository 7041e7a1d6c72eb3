package network

import "slices"

// A topology is what the massless nodes that nothing determines at once come to while
// some parts are shut.
type topology struct {
	joints []meeting
	kept   []meeting
}

// A meeting is a group of massless nodes that ties join to one another and to nothing
// else, with the inertances that lead out of it. One node stands for it: at a joint its
// row is the change of the sum of the flows; in a group that is kept its level stays.
type meeting struct {
	nodes []NodeID
	rep   NodeID
	row   int32
	ends  []jointEnd
	whole []NodeID // of what is kept: all nodes that nothing but one another determines
}

// A jointEnd is an inertance that brings flow into a meeting, times sign.
type jointEnd struct {
	b    InertanceID
	sign float64
}

// isOpen tells whether a tie acts now.
func (e *equations) isOpen(v *tie) bool {
	switch v.kind {
	case resistanceTie:
		return e.now.G[v.index] != 0
	case streamTie:
		return e.now.W[v.index] != 0
	case feedbackTie:
		return e.now.K[v.index] != 0
	}
	return !e.law[v.index].shut
}

// arrange finds the topology. Joints that no inertance ties to anything determined have
// one of them kept: what the others carry closes of itself.
func (e *equations) arrange() error {
	t := &e.tied
	reached := t.reach(e.g, e.isOpen)
	groups, of := t.clusters(reached, e.isOpen)
	e.top = topology{}
	if len(groups) == 0 {
		e.layJoints()
		return nil
	}
	flows := func(b InertanceID) bool { return !e.now.Shut[b] }
	parent := make([]int, len(groups)+1) // the last: all that is determined
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
	place := func(n NodeID) int {
		if of[n] == none {
			return len(groups)
		}
		return int(of[n])
	}
	all := make([]meeting, len(groups))
	for k, group := range groups {
		all[k] = e.meet(group, t.pipesOf(group, flows))
		for _, end := range all[k].ends {
			b := &e.g.inertances[end.b]
			p, q := root(place(b.from)), root(place(b.to))
			parent[min(p, q)] = max(p, q)
		}
	}
	keeps := make([]int, len(groups)+1) // place among the kept, plus one, by root
	for k := range all {
		switch r := root(k); {
		case r == root(len(groups)):
			e.top.joints = append(e.top.joints, all[k])
		case keeps[r] == 0:
			e.top.kept = append(e.top.kept, all[k])
			keeps[r] = len(e.top.kept)
		default:
			e.top.joints = append(e.top.joints, all[k])
		}
		if r := keeps[root(k)]; r > 0 {
			m := &e.top.kept[r-1]
			m.whole = append(m.whole, all[k].nodes...)
		}
	}
	if faults := e.misplaced(of); len(faults) > 0 {
		return &ParamFault{List: faults}
	}
	e.layJoints()
	return nil
}

// meet describes a group.
func (e *equations) meet(group []NodeID, pipes []InertanceID) meeting {
	m := meeting{nodes: group, rep: group[0]}
	found := false
	for _, n := range group {
		if len(e.tied.pipes[n]) > 0 && !found {
			m.rep, found = n, true
		}
	}
	m.row = e.l.level[m.rep]
	for _, b := range pipes {
		_, from := slices.BinarySearch(group, e.g.inertances[b].from)
		_, to := slices.BinarySearch(group, e.g.inertances[b].to)
		switch {
		case to && !from:
			m.ends = append(m.ends, jointEnd{b, 1})
		case from && !to:
			m.ends = append(m.ends, jointEnd{b, -1})
		}
	}
	return m
}

// misplaced finds streams and feedbacks that end where only inertances meet, or where
// nothing leads on: what flows in does not sum to zero of itself there.
func (e *equations) misplaced(of []int32) (faults []Fault) {
	for kind, list := range [2][]branch{e.g.oneWays, e.g.feedbacks} {
		for k, b := range list {
			gain := e.now.W
			if kind == 1 {
				gain = e.now.K
			}
			if of[b.to] == none || gain[k] == 0 {
				continue
			}
			id := []NodeID{b.to}
			faults = append(faults, Fault{Code: Undetermined, Nodes: id, Refs: append([]Ref{b.ref}, e.g.refsOf(id)...), Text: e.g.named(id) +
				": with what is shut only inertances or nothing lead on from here, and a stream or a feedback ends here, so that nothing determines the level; give a capacity"})
		}
	}
	return faults
}
