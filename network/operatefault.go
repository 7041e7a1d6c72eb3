package network

import (
	"math"
	"slices"
	"strconv"
)

// open looks at the islands that no held node reaches and that therefore have no steady
// level of their own, but for those in which the law of an element may yet determine one.
// stays marks the nodes that keep theirs: those that are fixed, and islands behind elements
// that shut themselves, into which nothing flows, as a store behind a check valve. Where
// something flows in, cut lists the elements that may have to open. For others there are
// faults.
func (r *resting) open(fixed []bool) (stays []bool, cut []ElementID, faults []SteadyFault) {
	e := r.e
	stays = fixed
	for _, nodes := range e.unreached(nil) {
		stores := func(n NodeID) bool { return !e.g.isMassless(n) }
		if fixed != nil && fixed[nodes[0]] || !slices.ContainsFunc(nodes, stores) || r.decides(nodes) {
			continue
		}
		fault := r.openFault(nodes)
		shut := e.selfShut(nodes)
		switch {
		case len(shut) == 0:
			faults = append(faults, fault)
		case fault.Net != 0:
			faults, cut = append(faults, fault), append(cut, shut...)
		default:
			stays = e.staying(stays, nodes)
		}
	}
	return stays, cut, faults
}

// staying returns a copy of stays in which nodes are marked.
func (e *equations) staying(stays []bool, nodes []NodeID) []bool {
	if stays = slices.Clone(stays); stays == nil {
		stays = make([]bool, len(e.g.nodes))
	}
	for _, n := range nodes {
		stays[n] = true
	}
	return stays
}

// keep lets the island of an unknown that turned out to be open stay as it is, where an
// element that shut itself cuts it off and nothing flows in; nil where that is not so.
func (r *resting) keep(column int, stays []bool) []bool {
	e := r.e
	n, ok := e.nodeAt(column)
	// what has a say at other levels only, as the crest of an overflow, has none here
	slack := func(k int) bool { return e.law[k].s.DF[0] == 0 }
	for _, nodes := range e.unreached(slack) {
		if !ok || !slices.Contains(nodes, n) || stays != nil && stays[n] {
			continue
		}
		if len(e.selfShut(nodes)) > 0 && r.openFault(nodes).Net == 0 {
			return e.staying(stays, nodes)
		}
	}
	return nil
}

// selfShut lists the elements at some nodes that their mode shuts.
func (e *equations) selfShut(nodes []NodeID) (list []ElementID) {
	for k := range e.law {
		if s := &e.law[k]; s.switching != nil && s.switching.Shut(e.modes[k]) && e.touches(k, nodes) {
			list = append(list, ElementID(k))
		}
	}
	return list
}

// touches tells whether an element has a port among nodes, which ascend.
func (e *equations) touches(k int, nodes []NodeID) bool {
	return slices.ContainsFunc(e.g.elements[k].Ports, func(n NodeID) bool {
		_, in := slices.BinarySearch(nodes, n)
		return in
	})
}

// unreached groups the nodes that nothing held acts on, directly or through others, as the
// network stands.
// slack tells of an element on one node that it does not act now; nil: all do.
func (e *equations) unreached(slack func(element int) bool) [][]NodeID {
	reached := make([]bool, len(e.g.nodes))
	var queue []NodeID
	mark := func(n NodeID) {
		if !reached[n] {
			reached[n] = true
			queue = append(queue, n)
		}
	}
	for i := range e.g.nodes {
		if e.g.isHeld(NodeID(i)) {
			mark(NodeID(i))
		}
	}
	for k := range e.tied.list {
		if v := &e.tied.list[k]; len(v.ends) == 1 && e.isOpen(v) && !(v.kind == elementTie && slack != nil && slack(v.index)) {
			mark(v.ends[0])
		}
	}
	for len(queue) > 0 {
		n := queue[len(queue)-1]
		queue = queue[:len(queue)-1]
		for _, k := range e.tied.touch[n] {
			if v := &e.tied.list[k]; e.isOpen(v) && !(v.directed && v.ends[0] != n) {
				for _, end := range v.ends {
					mark(end)
				}
			}
		}
		for _, b := range e.tied.pipes[n] {
			if w := &e.g.inertances[b]; !e.now.Shut[b] {
				mark(w.from)
				mark(w.to)
			}
		}
	}
	return e.together(reached)
}

// together groups what is not reached by all that is open between.
func (e *equations) together(reached []bool) [][]NodeID {
	groups, of := e.tied.clusters(reached, e.isOpen)
	join := func(a, b NodeID) {
		p, q := min(of[a], of[b]), max(of[a], of[b])
		if p == none || p == q {
			return
		}
		for _, n := range groups[q] {
			of[n] = p
		}
		groups[p], groups[q] = append(groups[p], groups[q]...), nil
	}
	for b, w := range e.g.inertances {
		if !e.now.Shut[b] {
			join(w.from, w.to)
		}
	}
	for k := range e.law {
		if !e.law[k].shut && !e.g.elements[k].Passive {
			e.g.joinPorts(e.g.elements[k].Ports, func(n NodeID) bool { return of[n] != none }, join)
		}
	}
	groups = slices.DeleteFunc(groups, func(g []NodeID) bool { return len(g) == 0 })
	for _, g := range groups {
		slices.Sort(g)
	}
	return groups
}

// decides tells whether an element touches the nodes that may determine their level by more
// than differences among them.
func (r *resting) decides(nodes []NodeID) bool {
	e := r.e
	outside := func(n NodeID) bool {
		_, in := slices.BinarySearch(nodes, n)
		return !in
	}
	for k := range e.law {
		el := &e.g.elements[k]
		if e.law[k].shut || el.Passive || el.Stores || !e.touches(k, nodes) {
			continue
		}
		if !el.Joins || len(el.Ports) == 1 || slices.ContainsFunc(el.Ports, outside) {
			return true
		}
	}
	return false
}

// openFault says, as for a linear network, why a group has no one steady state. Elements
// bring what they did when the balances were summed up last.
func (r *resting) openFault(nodes []NodeID) SteadyFault {
	e := r.e
	net, size := 0.0, 0.0
	var names []string
	add := func(v float64, name string) {
		if net, size = net+v, size+math.Abs(v); v != 0 && !slices.Contains(names, strconv.Quote(name)) {
			names = append(names, strconv.Quote(name))
		}
	}
	for _, n := range nodes {
		for _, k := range e.tied.sources[n] {
			add(e.g.inputs[k].sign*e.z[e.l.source[k]], e.g.inputs[k].name)
		}
		for _, p := range e.tied.pushes[n] {
			if s := &e.law[p.element]; !s.shut {
				add(s.s.F[p.port], e.g.elements[p.element].Name)
			}
		}
	}
	f := SteadyFault{Nodes: nodes, Refs: e.g.refsOf(nodes), Reason: LevelOpen, Text: e.g.named(nodes) + ": " +
		plural(nodes, "has", "have") + " no path to a held node, so that any level is steady; a start must be given"}
	if math.Abs(net) > 1e-12*size {
		f.Reason, f.Net = Integrating, net
		f.Text, f.Figure = e.g.figured(nodes[0], e.g.named(nodes)+": "+plural(nodes, "has", "have")+" no path to a held node and "+
			plural(nodes, "takes", "take")+" in ", net, " from "+listed(few(names))+" before t = 0"+e.shutNamed(nodes)+
			", so that the level never settles; a start must be given")
	}
	return f
}

// undetermined is the fault of an unknown that the steady balances leave open.
func (r *resting) undetermined(column int) SteadyFault {
	e := r.e
	if n, ok := e.nodeAt(column); ok {
		for _, nodes := range e.unreached(nil) {
			if _, in := slices.BinarySearch(nodes, n); in {
				return r.openFault(nodes)
			}
		}
		ids := []NodeID{n}
		return SteadyFault{Nodes: ids, Refs: append(e.refsAt(n), e.g.refsOf(ids)...), Reason: LevelOpen, Text: e.g.named(ids) +
			": nothing determines a steady level" + e.partsNamed(n) + "; a start must be given"}
	}
	name, refs := e.unknownAt(column)
	return SteadyFault{Refs: refs, Reason: LevelOpen, Text: name + ": nothing determines its steady value; a start must be given"}
}

// unbalanced says where the balances stay open, at the state nearest to a solution.
func (r *resting) unbalanced(x []float64) (faults []SteadyFault) {
	e, s := r.e, r.e.solver()
	if err := e.pressed(x); err != nil {
		if p, ok := err.(*ParamFault); ok {
			for _, f := range p.List {
				faults = append(faults, SteadyFault{Nodes: f.Nodes, Refs: f.Refs, Reason: Enclosed, Text: f.Text, Figure: f.Figure})
			}
			return faults
		}
	}
	s.t = r.t
	e.jacobian(r.t, x, s.f, nil, s.jac)
	s.pinRows()
	s.weigh()
	worst, most := 0, -1.0
	for row, v := range s.f {
		if w := s.weight[row]; w > 0 {
			if rel := math.Abs(v) / (w * max(s.size[s.acts[row]], math.SmallestNonzeroFloat64)); rel > most {
				worst, most = row, rel
			}
		}
	}
	if n, ok := e.nodeAt(worst); ok {
		return []SteadyFault{r.excess(n, s.f[worst])}
	}
	name, refs := e.unknownAt(worst)
	return []SteadyFault{{Refs: refs, Reason: Unsolved, Text: name + ": no steady state was found; it is furthest from one; a start must be given"}}
}

// refsAt lists the references of the parts at a node.
func (e *equations) refsAt(n NodeID) (refs []Ref) {
	e.partsAt(n, func(_ string, ref Ref, _ bool) { refs = append(refs, ref) })
	return refs
}

// partsNamed writes " (joined to it: "a" and "b")", and nothing where there are no parts.
func (e *equations) partsNamed(n NodeID) string {
	var names []string
	e.partsAt(n, func(name string, _ Ref, shut bool) {
		if name = strconv.Quote(name); shut {
			name += ", shut"
		}
		if !slices.Contains(names, name) { // a part may be made of several
			names = append(names, name)
		}
	})
	return withNames(" (joined to it: ", names)
}

// shutNamed names what is shut around nodes.
func (e *equations) shutNamed(nodes []NodeID) string {
	var names []string
	for _, n := range nodes {
		e.partsAt(n, func(name string, _ Ref, shut bool) {
			if name = strconv.Quote(name); shut && !slices.Contains(names, name) {
				names = append(names, name)
			}
		})
	}
	return withNames(" (shut: ", names)
}

func withNames(before string, names []string) string {
	if len(names) == 0 {
		return ""
	}
	return before + listed(few(names)) + ")"
}

// few cuts a long list of names short.
func few(names []string) []string {
	if len(names) <= maxNamed {
		return names
	}
	return append(names[:maxNamed:maxNamed], strconv.Itoa(len(names)-maxNamed)+" more")
}

// partsAt visits the branches, elements and sources at a node.
func (e *equations) partsAt(n NodeID, visit func(name string, ref Ref, shut bool)) {
	for kind, list := range e.g.branches() {
		for k, b := range list {
			if b.from == n || b.to == n {
				shut := BranchKind(kind) == InertanceBranch && e.now.Shut[k] || BranchKind(kind) == ResistanceBranch && e.now.G[k] == 0
				visit(b.name, b.ref, shut)
			}
		}
	}
	for k := range e.law {
		if slices.Contains(e.g.elements[k].Ports, n) && !e.g.elements[k].Passive {
			visit(e.g.elements[k].Name, e.g.elements[k].ref, e.law[k].shut)
		}
	}
	for _, in := range e.g.inputs {
		if !in.held && in.node == n {
			visit(in.name, in.ref, false)
		}
	}
}
