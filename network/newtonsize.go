package network

import "math"

// pseudo finds on which unknown pseudo-time acts in each row: a balance on its level, all
// others on their own, an algebraic unknown on none.
func (s *newton) pseudo() {
	e := s.e
	for row := range s.soft {
		s.acts[row], s.soft[row] = int32(row), e.slot(int32(row), int32(row))
	}
	for row := range s.partOf {
		s.partOf[row] = none
	}
	for _, n := range e.l.nodes {
		s.partOf[e.l.balance[n]] = e.part[n]
	}
	for i, at := range e.l.stored {
		if at != none {
			level := e.l.level[i]
			s.acts[at], s.soft[at] = level, e.slot(at, level)
			s.soft[level] = none
		}
	}
	for k := range e.g.elements {
		for u, at := range e.l.unknown[k] {
			if e.g.elements[k].Unknowns[u].Algebraic {
				s.soft[at] = none
			}
		}
	}
}

// slightest is the share of the levels around it whose push is the least size a flow is
// judged by: steps are then followed down to the rounding of the levels.
const slightest = 1e-4

// measure sets the sizes of the unknowns at x, in which steps are judged. Levels and flows
// of one part of the network, all that hangs together, share theirs: the span of its
// levels, held nodes included, and its largest flow, never less than where the search
// began: on the way to where all is level the span itself vanishes. Where x gives none,
// the step at hand does.
func (s *newton) measure(x []float64) {
	e := s.e
	e.fill(s.t, x)
	level, flow := s.spans(e.z), s.flows(e.z)
	for k, v := range level {
		s.span[k] = max(s.span[k], v)
	}
	for _, n := range e.l.nodes {
		s.size[e.l.level[n]] = s.span[e.part[n]]
	}
	for b, at := range e.l.flow {
		s.size[at] = max(s.size[at], flow[e.part[e.g.inertances[b].from]])
	}
	for k, places := range e.l.unknown {
		for u, at := range places {
			s.size[at] = max(e.g.elements[k].Unknowns[u].Scale, math.Abs(x[at]))
		}
	}
}

// widen renews the sizes when a step is at hand.
func (s *newton) widen(x []float64) {
	s.measure(x)
	e := s.e
	s.bound()
	var level, flow []float64
	for _, n := range e.l.nodes {
		if at := e.l.level[n]; s.size[at] == 0 {
			if level == nil {
				level = s.largest(e.l.nodes, s.dx)
			}
			s.size[at] = level[e.part[n]]
		}
	}
	for b, at := range e.l.flow {
		if s.size[at] == 0 {
			if flow == nil {
				flow = s.flows(s.dx)
			}
			s.size[at] = flow[e.part[e.g.inertances[b].from]]
		}
	}
}

// bound keeps the sizes of flows above what the rounding of the levels, unknowns and sources
// of their part makes of them, which branches pass on to one another.
func (s *newton) bound() {
	e := s.e
	if len(e.l.flow) == 0 {
		return
	}
	clear(s.push)
	bring := func(j int32) {
		for p := s.jac.Start[j]; p < s.jac.Start[j+1]; p++ {
			if k := s.partOf[s.jac.Row[p]]; k != none {
				s.push[k] = max(s.push[k], math.Abs(s.jac.Val[p])*s.size[j])
			}
		}
	}
	for _, n := range e.l.nodes {
		bring(e.l.level[n])
	}
	for _, places := range e.l.unknown {
		for _, at := range places {
			bring(at)
		}
	}
	for k, at := range e.l.source {
		if at != none {
			part := e.part[e.g.inputs[k].node]
			s.push[part] = max(s.push[part], math.Abs(e.z[at]))
		}
	}
	for b := range e.l.flow {
		k := e.part[e.g.inertances[b].from]
		s.push[k] = max(s.push[k], s.driven(b, s.span[k]))
	}
	for b, at := range e.l.flow {
		s.size[at] = max(s.size[at], slightest*s.push[e.part[e.g.inertances[b].from]])
	}
}

// driven is about the flow that a difference drives through an inertance at rest, 0 where
// nothing resists. Where the drop rises faster than at the flow at hand, it is taken to go
// with the square.
func (s *newton) driven(b int, span float64) float64 {
	e := s.e
	slope := math.Abs(s.jac.Val[e.dropAt[b]])
	if slope == 0 {
		return 0
	}
	q := span / slope
	if d := e.p.Drop[b]; d != nil {
		h, _ := d.Drop(q)
		if h = math.Abs(h); h > span {
			q *= math.Sqrt(span / h)
		}
	}
	return q
}

// spans returns the span of the levels of each part, and where that is 0 their size.
func (s *newton) spans(z []float64) []float64 {
	e := s.e
	lo, hi := make([]float64, e.parts), make([]float64, e.parts)
	for k := range lo {
		lo[k], hi[k] = math.Inf(1), math.Inf(-1)
	}
	for i, at := range e.l.level {
		k, v := e.part[i], z[at]
		lo[k], hi[k] = min(lo[k], v), max(hi[k], v)
	}
	for k := range hi {
		if span := hi[k] - lo[k]; span > 1e-9*max(math.Abs(hi[k]), math.Abs(lo[k])) {
			hi[k] = span
		} else {
			hi[k] = max(math.Abs(hi[k]), math.Abs(lo[k]))
		}
	}
	return hi
}

func (s *newton) largest(nodes []NodeID, v []float64) []float64 {
	most := make([]float64, s.e.parts)
	for _, n := range nodes {
		k := s.e.part[n]
		most[k] = max(most[k], math.Abs(v[s.e.l.level[n]]))
	}
	return most
}

// flows returns the largest flow of an inertance in each part.
func (s *newton) flows(v []float64) []float64 {
	most := make([]float64, s.e.parts)
	for b, at := range s.e.l.flow {
		k := s.e.part[s.e.g.inertances[b].from]
		most[k] = max(most[k], math.Abs(v[at]))
	}
	return most
}
