package network

import "lagbook/laplace/matrix"

// flows finds the flows of the inertances at rest. With a resistance in series it is
// that of the resistance. Without one, the flows share what each joined node has to
// pass on as they would have come to it from rest, in proportion to 1/L: a flow that
// circulates among inertances without resistance is left out, nothing determines it.
func (r *rest) flows(p *Params, u []float64, s *restState) error {
	pos := r.net.plan.pos
	lossless := make([]bool, len(r.nodes))
	for k, b := range r.n.g.inertances {
		if b.shut() {
			continue
		}
		if p.LR[k] != 0 {
			from, to := pos[r.of[b.from]], pos[r.of[b.to]]
			s.flow[k] = s.pt.difference(int(from), int(to)) / p.LR[k]
			continue
		}
		lossless[r.of[b.from]] = true
	}
	net := r.arriving(p, u, s)
	for k, members := range r.nodes {
		if lossless[k] {
			if err := r.share(p, members, net, s); err != nil {
				return err
			}
		}
	}
	return nil
}

// arriving returns what resistances, streams, feedbacks, sources and inertances with
// resistance bring to each node at rest.
func (r *rest) arriving(p *Params, u []float64, s *restState) []float64 {
	g, pos := &r.n.g, r.net.plan.pos
	net := make([]float64, len(g.nodes))
	between := func(b branch) float64 {
		return s.pt.difference(int(pos[r.of[b.from]]), int(pos[r.of[b.to]]))
	}
	for k, b := range g.resistances {
		q := p.G[k] * between(b)
		net[b.from] -= q
		net[b.to] += q
	}
	for k, b := range g.inertances {
		net[b.from] -= s.flow[k]
		net[b.to] += s.flow[k]
	}
	for k, b := range g.oneWays {
		net[b.to] += p.W[k] * between(b)
	}
	for k, b := range g.feedbacks {
		net[b.to] += p.K[k] * (r.level(s, b.from) - p.About[k])
	}
	for k, in := range g.inputs {
		if !in.held {
			net[in.node] += in.sign * u[k]
		}
	}
	return net
}

// share spreads what arrives over the inertances among members, to the held ones or
// else to the last.
func (r *rest) share(p *Params, members []NodeID, net []float64, s *restState) error {
	g := &r.n.g
	place := make(map[NodeID]int, len(members))
	count, held := 0, false
	for _, m := range members {
		place[m] = -1
		if held = held || g.isHeld(m); !g.isHeld(m) {
			place[m] = count
			count++
		}
	}
	if !held {
		count--
		place[members[len(members)-1]] = -1
	}
	b := matrix.Balance{N: count, C: make([]float64, count), F: make([]float64, count*count), Leak: make([]float64, count)}
	f := make([]float64, count)
	for m, i := range place {
		if i >= 0 {
			b.C[i], f[i] = 1, net[m]
		}
	}
	among := r.among(p, members[0])
	for _, k := range among {
		i, j, v := place[g.inertances[k].from], place[g.inertances[k].to], 1/p.L[k]
		switch {
		case i >= 0 && j >= 0:
			b.F[i*count+j] += v
			b.F[j*count+i] += v
		case i >= 0:
			b.Leak[i] += v
		case j >= 0:
			b.Leak[j] += v
		}
	}
	e, err := b.Eliminate()
	if err != nil {
		return outOfRange()
	}
	x := append(e.Solve(f), 0) // the last: what is left out
	at := func(n NodeID) float64 {
		if place[n] < 0 {
			return 0
		}
		return x[place[n]]
	}
	for _, k := range among {
		s.flow[k] = (at(g.inertances[k].from) - at(g.inertances[k].to)) / p.L[k]
	}
	return nil
}

// among lists the inertances without resistance joined to a node.
func (r *rest) among(p *Params, member NodeID) (list []int) {
	for k, b := range r.n.g.inertances {
		if p.LR[k] == 0 && !b.shut() && r.of[b.from] == r.of[member] {
			list = append(list, k)
		}
	}
	return list
}

// circulating lists the inertances without resistance that lie on a loop of such, or
// on a way of such from one held node to another: a flow round it goes on for ever.
func (r *rest) circulating(p *Params) (list []InertanceID) {
	for k, b := range r.n.g.inertances {
		if p.LR[k] == 0 && !b.shut() && r.loops(p, k, b) {
			list = append(list, InertanceID(k))
		}
	}
	return list
}

// loops tells whether the ends of inertance k are joined without it, held nodes
// counting as one.
func (r *rest) loops(p *Params, k int, b branch) bool {
	g := &r.n.g
	reached := make([]bool, len(g.nodes))
	mark := func(n NodeID) (grown bool) {
		for i := range reached {
			if (NodeID(i) == n || g.isHeld(n) && g.isHeld(NodeID(i))) && !reached[i] {
				reached[i], grown = true, true
			}
		}
		return grown
	}
	for grown := mark(b.from); grown; {
		grown = false
		for j, v := range g.inertances {
			if j != k && p.LR[j] == 0 && reached[v.from] != reached[v.to] {
				grown = mark(v.from) || mark(v.to) || grown
			}
		}
	}
	return reached[b.to]
}

// SteadyFlows returns the flow of every inertance at the point SteadyState describes,
// by InertanceID. What circulates among inertances without resistance, which
// nothing determines, is left out.
func (n *Network) SteadyFlows(p *Params, u []float64) ([]float64, error) {
	if n.g.nonlinear() {
		return nil, n.notLinear("the steady state of a linear network")
	}
	if len(u) != len(n.g.inputs) {
		panic("network: one value for each input")
	}
	_, flows, err := n.steadyFlows(p, u)
	return flows, err
}

func (n *Network) steadyFlows(p *Params, u []float64) (levels, flows []float64, err error) {
	if err := n.Check(p); err != nil {
		return nil, nil, err
	}
	if n, err = n.inForce(p); err != nil {
		return nil, nil, err
	}
	r := n.newRest(p)
	s, err := r.solve(p, u)
	if err != nil {
		return nil, nil, err
	}
	if len(s.faults) > 0 {
		list := make([]SteadyFault, len(s.faults))
		for i, f := range s.faults {
			list[i] = f.SteadyFault
		}
		return nil, nil, &NoSteady{List: list}
	}
	levels = make([]float64, len(n.g.nodes))
	for i := range levels {
		levels[i] = r.level(s, NodeID(i))
	}
	return levels, s.flow, nil
}
