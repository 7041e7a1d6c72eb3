package network

import "lagbook/network/internal/stiff"

// A span is the part of the integrator's last step that counts: all of it, or up to an
// event. It gives the state and its rate at the nodes of the part.
type span struct {
	t0, t1 float64
	curve  []quartic             // by unknown
	x      [len(nodes)][]float64 // at the nodes
	rate   [len(nodes)][]float64 // dx/dt there
}

func newSpan(n int) *span {
	s := &span{curve: make([]quartic, n)}
	room := make([]float64, 2*len(nodes)*n)
	for k := range nodes {
		s.x[k], room = room[:n:n], room[n:]
		s.rate[k], room = room[:n:n], room[n:]
	}
	return s
}

// take reads the last step off the integrator.
func (s *span) take(g *stiff.Integrator) {
	s.t0, s.t1 = g.T0, g.T1
	for k := range s.curve {
		s.curve[k] = g.Polynomial(k)
	}
	s.sample()
	copy(s.x[0], g.X0)
	copy(s.x[len(nodes)-1], g.X1)
}

// cut ends the span at t.
func (s *span) cut(t float64) {
	theta := (t - s.t0) / (s.t1 - s.t0)
	for k := range s.curve {
		s.curve[k] = s.curve[k].part(0, theta)
	}
	s.t1 = t
	s.sample()
}

func (s *span) sample() {
	h := s.t1 - s.t0
	for j, theta := range nodes {
		x, rate := s.x[j], s.rate[j]
		for k := range s.curve {
			c := &s.curve[k]
			x[k], rate[k] = c.at(theta), c.slope(theta)/h
		}
	}
}

// at sets x and rate to what they are at t.
func (s *span) at(t float64, x, rate []float64) {
	h := s.t1 - s.t0
	theta := (t - s.t0) / h
	for k := range s.curve {
		c := &s.curve[k]
		x[k], rate[k] = c.at(theta), c.slope(theta)/h
	}
}

// node returns the instant of node j.
func (s *span) node(j int) float64 { return s.time(nodes[j]) }

// time returns the instant of a share of the span.
func (s *span) time(theta float64) float64 {
	if theta == 1 {
		return s.t1
	}
	return s.t0 + theta*(s.t1-s.t0)
}

// end returns the state at the end.
func (s *span) end() []float64 { return s.x[len(nodes)-1] }
