package network

// A rest is a network with nothing moving, as a network without inertances: one
// with a resistance in series is that resistance, one without makes its two ends
// one node.
type rest struct {
	n     *Network // with inertances
	net   *Network // without
	p     *Params
	of    []NodeID   // by node of n: the node of net
	nodes [][]NodeID // by node of net: the nodes of n
}

// newRest joins and replaces. Which inertances have no resistance is a matter of the
// numbers.
func (n *Network) newRest(p *Params) *rest {
	r := &rest{n: n, of: make([]NodeID, len(n.g.nodes))}
	r.join(p)
	g := graph{nodes: make([]node, len(r.nodes)), inputs: append([]input(nil), n.g.inputs...)}
	for k, members := range r.nodes {
		g.nodes[k] = r.joined(members)
	}
	for k := range g.inputs {
		g.inputs[k].node = r.of[g.inputs[k].node]
	}
	r.p = &Params{C: p.C, Wave: p.Wave, AllStart: p.AllStart, HasAllStart: p.HasAllStart,
		Start: make([]float64, len(g.nodes)), HasStart: make([]bool, len(g.nodes)), Datum: make([]float64, len(g.nodes))}
	for k, members := range r.nodes {
		r.p.Datum[k] = p.Datum[members[0]]
	}
	for i, has := range p.HasStart {
		if has {
			r.p.Start[r.of[i]], r.p.HasStart[r.of[i]] = p.Start[i], true
		}
	}
	for k, c := range n.g.capacities {
		g.capacities = append(g.capacities, capacity{r.of[c.at], c.ref})
		g.nodes[r.of[c.at]].capacities = append(g.nodes[r.of[c.at]].capacities, CapacityID(k))
	}
	r.branches(&g, p)
	r.net = &Network{g: g, plan: newPlan(&g)}
	return r
}

// join fills of and nodes: the first of joined nodes in the order of NodeID leads.
func (r *rest) join(p *Params) {
	for i := range r.of {
		r.of[i] = NodeID(i)
	}
	root := func(i NodeID) NodeID {
		for r.of[i] != i {
			i = r.of[i]
		}
		return i
	}
	for k, b := range r.n.g.inertances {
		if p.LR[k] == 0 {
			a, b := root(b.from), root(b.to)
			r.of[max(a, b)] = min(a, b)
		}
	}
	place := make([]NodeID, len(r.of))
	for i := range r.of {
		k := root(NodeID(i))
		if k == NodeID(i) {
			place[i] = NodeID(len(r.nodes))
			r.nodes = append(r.nodes, nil)
		}
		r.nodes[place[k]] = append(r.nodes[place[k]], NodeID(i))
	}
	joined := make([]NodeID, len(r.of)) // root still reads of
	for i := range joined {
		joined[i] = place[root(NodeID(i))]
	}
	r.of = joined
}

// joined is one node in the place of several: held if one of them is, and under the
// name of a store if there is one.
func (r *rest) joined(members []NodeID) node {
	g := &r.n.g
	v := node{name: g.nodes[members[0]].name, ref: g.nodes[members[0]].ref, held: noInput}
	for _, m := range members {
		if g.isHeld(m) {
			v.name, v.ref, v.held = g.nodes[m].name, g.nodes[m].ref, g.nodes[m].held
			return v
		}
	}
	for _, m := range members {
		if !g.isMassless(m) {
			v.name, v.ref = g.nodes[m].name, g.nodes[m].ref
			return v
		}
	}
	return v
}

// branches copies what does not begin and end at one joined node.
func (r *rest) branches(g *graph, p *Params) {
	move := func(b branch) (branch, bool) {
		b.from, b.to = r.of[b.from], r.of[b.to]
		return b, b.from != b.to
	}
	for k, b := range r.n.g.resistances {
		if b, ok := move(b); ok {
			g.resistances, r.p.G = append(g.resistances, b), append(r.p.G, p.G[k])
		}
	}
	for k, b := range r.n.g.inertances {
		if b, ok := move(b); ok {
			g.resistances, r.p.G = append(g.resistances, b), append(r.p.G, 1/p.LR[k])
		}
	}
	for k, b := range r.n.g.oneWays {
		if b, ok := move(b); ok {
			g.oneWays, r.p.W = append(g.oneWays, b), append(r.p.W, p.W[k])
		}
	}
	for k, b := range r.n.g.feedbacks {
		b, _ := move(b)
		g.feedbacks, r.p.K, r.p.About = append(g.feedbacks, b), append(r.p.K, p.K[k]), append(r.p.About, p.About[k])
	}
}

// A restState is the state of a network with nothing moving.
type restState struct {
	pt     *point    // of net
	flow   []float64 // by InertanceID
	open   []bool    // by node of n: nothing determines the state around it
	faults []restFault
}

// A restFault belongs to some nodes of n.
type restFault struct {
	SteadyFault
	at []NodeID
}

// solve finds the state for the inputs u, and what has none.
func (r *rest) solve(p *Params, u []float64) (*restState, error) {
	e, err := r.net.eliminated(r.p)
	if err != nil {
		return nil, err
	}
	s := &restState{pt: r.net.newPoint(r.p, e, u), flow: make([]float64, len(r.n.g.inertances)), open: make([]bool, len(r.n.g.nodes))}
	st := r.net.newStatic(r.p, e)
	st.solve(s.pt)
	for k := range st.island {
		if st.island[k].open >= 0 {
			f := st.fault(s.pt, k)
			f.Nodes = r.members(f.Nodes)
			f.Refs = r.n.g.refsOf(f.Nodes)
			s.fail(restFault{f, r.members(r.net.island(k))})
		}
	}
	r.conflicts(u, s)
	if err := r.flows(p, u, s); err != nil {
		return nil, err
	}
	return s, nil
}

func (s *restState) fail(f restFault) {
	for _, n := range f.at {
		s.open[n] = true
	}
	s.faults = append(s.faults, f)
}

func (r *rest) members(ids []NodeID) (list []NodeID) {
	for _, id := range ids {
		list = append(list, r.nodes[id]...)
	}
	return list
}

// island lists the nodes of island k.
func (n *Network) island(k int) (ids []NodeID) {
	for i, at := range n.plan.island {
		if at == k {
			ids = append(ids, NodeID(i))
		}
	}
	return ids
}

// level returns the level of a node of n.
func (r *rest) level(s *restState, id NodeID) float64 {
	return s.pt.level(int(r.net.plan.pos[r.of[id]]))
}

// conflicts finds held nodes at different levels with inertances without resistance
// between them.
func (r *rest) conflicts(u []float64, s *restState) {
	g := &r.n.g
	for _, members := range r.nodes {
		var held []NodeID
		differ := false
		for _, m := range members {
			if g.isHeld(m) {
				held = append(held, m)
				differ = differ || u[g.nodes[m].held] != u[g.nodes[held[0]].held]
			}
		}
		if differ {
			s.fail(restFault{SteadyFault{Nodes: held, Refs: g.refsOf(held), Reason: Integrating, Text: g.named(held) +
				": are held at different levels and joined by inertances without resistance, so that the flow grows for ever; a start must be given"}, members})
		}
	}
}
