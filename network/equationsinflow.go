package network

import "math"

// netInflow sets in to what held nodes, sources, streams, feedbacks and elements bring
// into each group at t, less what they take: content' = in. gross is the same with
// every contribution taken as positive.
func (e *equations) netInflow(t float64, x, in, gross []float64) {
	e.fill(t, x)
	e.sum()
	clear(gross)
	e.inflow(in, gross)
}

// inflow is netInflow where sum or jacobian has just been; gross may be nil.
func (e *equations) inflow(in, gross []float64) {
	clear(in)
	z, l := e.z, e.l
	add := func(n NodeID, v float64) {
		if k := e.group[n]; k != none {
			in[k] += v
			if gross != nil {
				gross[k] += math.Abs(v)
			}
		}
	}
	for _, k := range e.edge.wires {
		b := &e.g.resistances[k]
		q := e.now.G[k] * (z[l.level[b.from]] - z[l.level[b.to]])
		add(b.from, -q)
		add(b.to, q)
	}
	for _, k := range e.edge.pipes {
		if b := &e.g.inertances[k]; !e.now.Shut[k] {
			q := z[l.flow[k]]
			add(b.from, -q)
			add(b.to, q)
		}
	}
	for k, b := range e.g.oneWays {
		add(b.to, e.now.W[k]*(z[l.level[b.from]]-z[l.level[b.to]]))
	}
	for k, b := range e.g.feedbacks {
		add(b.to, e.now.K[k]*(z[l.level[b.from]]-e.now.About[k]))
	}
	for k, input := range e.g.inputs {
		if !input.held {
			add(input.node, input.sign*z[l.source[k]])
		}
	}
	for _, k := range e.edge.elements {
		s, ports := &e.law[k], e.g.elements[k].Ports
		switch {
		case s.shut:
		case s.through != none:
			w := &e.through[s.through]
			add(ports[0], -w.q)
			add(ports[1], w.q)
		default:
			for i, n := range ports {
				add(n, s.s.F[i])
			}
		}
	}
}

// An edge lists what leads out of islands: branches and elements with an end at a held node.
type edge struct {
	wires, pipes []int32
	elements     []int32
}

func (e *equations) findEdge() {
	for k, b := range e.g.resistances {
		if e.group[b.from] != e.group[b.to] {
			e.edge.wires = append(e.edge.wires, int32(k))
		}
	}
	for k, b := range e.g.inertances {
		if e.group[b.from] != e.group[b.to] {
			e.edge.pipes = append(e.edge.pipes, int32(k))
		}
	}
	for k := range e.law {
		ports := e.g.elements[k].Ports
		if s := &e.law[k]; !s.passive && len(ports) > 0 && (s.through == none || e.group[ports[0]] != e.group[ports[1]]) {
			e.edge.elements = append(e.edge.elements, int32(k))
		}
	}
}

// A bringing is a derivative of what comes into a group.
type bringing struct {
	group, col int32 // in z
	v          float64
}

// inflowSlopes appends the derivatives of inflow where jacobian has just been.
func (e *equations) inflowSlopes(list []bringing) []bringing {
	l := e.l
	add := func(n NodeID, col int32, v float64) {
		if k := e.group[n]; k != none && v != 0 {
			list = append(list, bringing{k, col, v})
		}
	}
	through := func(from, to NodeID, col int32, v float64) {
		add(from, col, -v)
		add(to, col, v)
	}
	for _, k := range e.edge.wires {
		b, g := &e.g.resistances[k], e.now.G[k]
		through(b.from, b.to, l.level[b.from], g)
		through(b.from, b.to, l.level[b.to], -g)
	}
	for _, k := range e.edge.pipes {
		if b := &e.g.inertances[k]; !e.now.Shut[k] {
			through(b.from, b.to, l.flow[k], 1)
		}
	}
	for k, b := range e.g.oneWays {
		add(b.to, l.level[b.from], e.now.W[k])
		add(b.to, l.level[b.to], -e.now.W[k])
	}
	for k, b := range e.g.feedbacks {
		add(b.to, l.level[b.from], e.now.K[k])
	}
	for k, in := range e.g.inputs {
		if !in.held {
			add(in.node, l.source[k], in.sign)
		}
	}
	for _, k := range e.edge.elements {
		s, ports := &e.law[k], e.g.elements[k].Ports
		switch {
		case s.shut:
		case s.through != none:
			w := &e.through[s.through]
			through(ports[0], ports[1], w.a, w.da)
			through(ports[0], ports[1], w.b, w.db)
			if w.scale != none {
				through(ports[0], ports[1], w.scale, w.dscale)
			}
		default:
			for i, n := range ports {
				for c, at := range s.at {
					add(n, at, s.s.DF[i*len(s.at)+c])
				}
			}
		}
	}
	return list
}
