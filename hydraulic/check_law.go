package hydraulic

import "lagbook/network"

// Modes of a part that lets through one way only. An operating point is looked for with
// all of them open; those through which liquid would run back are then shut.
const (
	wayOpen = iota
	wayShut
)

// A checkLaw is a check valve: q = f(Δ − cracking) while it is open.
type checkLaw struct {
	pass     powerFlow
	cracking float64 // Pa
}

// seeping is the share of its law that an open check valve lets back below the drop at
// which it opens: enough for the levels beside it to be determined until it shuts, and too
// little for a small volume behind it to follow the pressure back.
const seeping = 1e-6

// Eval implements network.Law. While it is open its law goes on below the drop at which
// it shuts, so that the instant can be found.
func (l *checkLaw) Eval(s *network.Stamp) {
	if s.Mode == wayShut {
		return
	}
	q, dq := l.pass.across(drop(s.X[0], s.X[1]) - l.cracking)
	if q < 0 {
		q, dq = seeping*q, seeping*dq
	}
	oneWay(s, q, dq)
}

// oneWay puts a flow that goes by the drop into a stamp of two ports.
func oneWay(s *network.Stamp, q, dq float64) {
	s.F[0], s.F[1] = -q, q
	s.DF[0], s.DF[1] = -dq, dq
	n := len(s.X)
	s.DF[n], s.DF[n+1] = dq, -dq
}

// Begin implements network.Beginning.
func (l *checkLaw) Begin(s *network.Stamp, steady bool) { beginWay(s, steady, l.cracking) }

// beginWay opens or shuts what opens at a drop, where no steady state has done so.
func beginWay(s *network.Stamp, steady bool, opens float64) {
	if steady {
		return
	}
	if s.Mode = wayShut; drop(s.X[0], s.X[1]) > opens {
		s.Mode = wayOpen
	}
}

// Guards implements network.Switching.
func (l *checkLaw) Guards(s *network.Stamp, g []float64) int { return guardWay(s, g, l.cracking) }

// guardWay watches the drop at which something opens. Open, it must fall a rounding of
// the pressures below it to shut.
func guardWay(s *network.Stamp, g []float64, opens float64) int {
	if g[0] = drop(s.X[0], s.X[1]) - opens; s.Mode == wayShut {
		g[0] = -g[0]
	} else {
		g[0] += settled(s.X[0], s.X[1])
	}
	return 1
}

// Next implements network.Switching.
func (l *checkLaw) Next(s *network.Stamp, _ int) (mode int, what string, last bool) {
	return nextWay(s)
}

func nextWay(s *network.Stamp) (mode int, what string, last bool) {
	if s.Mode == wayShut {
		return wayOpen, "opens", false
	}
	return wayShut, "shuts", false
}

// Shut implements network.Switching.
func (l *checkLaw) Shut(mode int) bool { return mode == wayShut }
