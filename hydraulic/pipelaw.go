package hydraulic

import (
	"lagbook/hydraulic/fluid"
	"lagbook/network"
)

// bubbly is the law of a volume of a pipe whose liquid holds bubbles of free gas: it
// takes up volume·(v(p) + stretch·p), with v of fluid.Mixture at the absolute pressure.
type bubbly struct {
	volume  float64 // m³
	stretch float64 // 1/Pa, of the wall
	mixture fluid.Mixture
	offset  float64 // Pa; level of the network and this is the absolute pressure
}

// Eval implements network.Law.
func (l *bubbly) Eval(s *network.Stamp) {
	p := s.X[0] + l.offset
	taken, slope := l.mixture.Taken(p)
	s.Stored = l.volume * (taken + l.stretch*(p-l.mixture.Atmosphere))
	s.DStored = l.volume * (slope + l.stretch)
}

// A pipeWatch looks out for vapour at an inner node of a pipe, and says at which.
type pipeWatch struct {
	nodeWatch
	at string
}

// Next implements network.Switching.
func (l *pipeWatch) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	mode, what, last = l.nodeWatch.Next(s, k)
	return mode, what + l.at, last
}
