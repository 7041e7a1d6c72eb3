package network

// Since returns the part of the trajectory from an instant on (s), which becomes t = 0: what
// is asked before it counts as the value before the run.
func (t *Trajectory) Since(from float64) *Trajectory {
	s := *t
	s.times, s.breaks = make([]float64, len(t.times)), make([]float64, len(t.breaks))
	for i, at := range t.times {
		s.times[i] = at - from
	}
	for i, at := range t.breaks {
		s.breaks[i] = at - from
	}
	return &s
}
