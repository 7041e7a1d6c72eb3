package network

import "slices"

// state returns the state that x is at t, with copies of modes and memories.
func (e *equations) state(t float64, x []float64) *State {
	e.fill(t, x)
	s := &State{T: t, Levels: make([]float64, len(e.g.nodes)), Flows: make([]float64, len(e.g.inertances)),
		Unknowns: make([][]float64, len(e.g.elements)), Mem: make([][]float64, len(e.g.elements)), Modes: slices.Clone(e.modes)}
	for i, at := range e.l.level {
		s.Levels[i] = e.z[at]
	}
	for b, at := range e.l.flow {
		s.Flows[b] = e.z[at]
	}
	for k, places := range e.l.unknown {
		s.Mem[k] = slices.Clone(e.mem[k])
		for _, at := range places {
			s.Unknowns[k] = append(s.Unknowns[k], e.z[at])
		}
	}
	return s
}

// vector returns the unknowns of a state in the present stretch: stored quantities follow
// from its levels and unknowns. Call enter first.
func (e *equations) vector(s *State) []float64 {
	x := make([]float64, e.l.size)
	for _, n := range e.l.nodes {
		x[e.l.level[n]] = s.Levels[n]
	}
	for b, at := range e.l.flow {
		x[at] = s.Flows[b]
	}
	for k, places := range e.l.unknown {
		for u, at := range places {
			x[at] = s.Unknowns[k][u]
		}
	}
	e.restore(s.T, x)
	return x
}

// restore sets the stored quantities to what levels and unknowns make of them.
func (e *equations) restore(t float64, x []float64) {
	e.fill(t, x)
	e.sum() // −Stored of its elements stands where a storing node has its level
	for i, at := range e.l.stored {
		if at != none {
			x[at] = e.g.capacityOf(e.now, NodeID(i))*x[e.l.level[i]] - e.acc[e.l.level[i]]
		}
	}
}
