package hydraulic

import "lagbook/network"

// A reliefLaw is a relief valve by its drop Δ: shut up to set, from there straight to
// what its opening passes at full, and beyond that the opening.
type reliefLaw struct {
	orifice   powerFlow
	set, full float64 // Pa, drops
}

// Eval implements network.Law.
func (l *reliefLaw) Eval(s *network.Stamp) {
	if s.Mode == wayShut {
		return
	}
	d := drop(s.X[0], s.X[1])
	if d >= l.full {
		q, dq := l.orifice.across(d)
		oneWay(s, q, dq)
		return
	}
	most, _ := l.orifice.across(l.full)
	slope := most / (l.full - l.set)
	oneWay(s, slope*(d-l.set), slope)
}

// Begin implements network.Beginning.
func (l *reliefLaw) Begin(s *network.Stamp, steady bool) { beginWay(s, steady, l.set) }

// Guards implements network.Switching.
func (l *reliefLaw) Guards(s *network.Stamp, g []float64) int { return guardWay(s, g, l.set) }

// Next implements network.Switching.
func (l *reliefLaw) Next(s *network.Stamp, _ int) (mode int, what string, last bool) {
	return nextWay(s)
}

// Shut implements network.Switching.
func (l *reliefLaw) Shut(mode int) bool { return mode == wayShut }
