package hydraulic

import "lagbook/network"

// A headPump is the law of a centrifugal pump. Its unknowns are its flow q, from
// 0 = x_from − x_to + ρ·g·H(q, s), and where it may trip its speed s as a share of the
// rated one: s = speed/rated until then, and after it
//
//	J·ω²·s' = −ρ·g·H·q/(η·s), ω the rated speed in rad/s.
//
// Local variables: levels of from, to and of a third node watched, q, s, the drives speed
// and powered, as far as they are there.
type headPump struct {
	pumpModes
	curve   pumpCurve
	ports   int
	weight  float64 // ρ·g, Pa/m
	rated   float64 // turns a second
	inertia float64 // J·ω², J; of a pump that may trip
	inlet   float64 // Pa; level at the inlet and this is the absolute pressure
	vapour  float64 // Pa, absolute; 0: not known
	carried bool    // a column of liquid carries the flow on when the pump stops
}

// speed is s in a mode and the place of the variable it follows from, with the factor
// to it; a pump switched off has none.
func (l *headPump) speed(s *network.Stamp, mode int) (share float64, place int, by float64) {
	switch {
	case mode&pumpOff != 0:
		return 0, 0, 0
	case l.trips:
		return max(s.X[l.ports+1], 0), l.ports + 1, 1
	}
	place = l.ports + 1
	return max(s.X[place], 0) / l.rated, place, 1 / l.rated
}

// Eval implements network.Law.
func (l *headPump) Eval(s *network.Stamp) {
	n, iq := len(s.X), l.ports
	q, row := s.X[iq], s.DF[iq*n:]
	share, place, by := l.speed(s, s.Mode)
	if s.Mode&pumpShut != 0 {
		s.F[iq], row[iq] = q, 1
	} else {
		h, dq, ds := l.curve.at(q, share)
		s.F[0], s.DF[iq] = -q, -1
		s.F[1], s.DF[n+iq] = q, 1
		s.F[iq] = s.X[0] - s.X[1] + l.weight*h
		row[0], row[1], row[iq] = 1, -1, l.weight*dq
		row[place] += l.weight * ds * by
	}
	if l.trips {
		l.turn(s, q, share)
	}
}

// turn is the row of the speed.
func (l *headPump) turn(s *network.Stamp, q, share float64) {
	n, is := len(s.X), l.ports+1
	row := s.DF[is*n:]
	if s.Mode&pumpTripped == 0 {
		s.F[is] = s.X[is+1]/l.rated - s.X[is]
		row[is], row[is+1] = -1, 1/l.rated
		return
	}
	if share < still {
		return // as good as at rest
	}
	if s.Mode&pumpShut != 0 {
		q = 0
	}
	p, dp := l.curve.power(q / share)
	c := l.weight / l.inertia
	s.F[is] = -c * share * share * p
	row[is] = -c * (2*share*p - q*dp)
	if s.Mode&pumpShut == 0 {
		row[l.ports] = -c * share * dp
	}
}

// Algebraic implements network.Mixed: the speed is a state of its own after a trip.
func (l *headPump) Algebraic(mode, unknown int) bool { return unknown == 0 || mode&pumpTripped == 0 }

// Guards implements network.Switching.
func (l *headPump) Guards(s *network.Stamp, g []float64) int {
	forward := s.X[l.ports]
	if s.Mode&pumpShut != 0 {
		forward = l.push(s, s.Mode)
	}
	powered := 1.0
	if l.trips {
		powered = s.X[l.ports+3]
	}
	return l.guards(s, forward, powered, g)
}

// push is the pressure with which the pump would open its non-return in a mode.
func (l *headPump) push(s *network.Stamp, mode int) float64 {
	share, _, _ := l.speed(s, mode)
	h, _, _ := l.curve.at(0, share)
	return s.X[0] - s.X[1] + l.weight*h
}

// pushes tells whether in a mode liquid goes forward through the non-return: because a
// column of it is under way, or because the pump pushes it open.
func (l *headPump) pushes(s *network.Stamp) func(mode int) bool {
	return func(mode int) bool {
		return l.carried && s.Mode&pumpShut == 0 && s.X[l.ports] > 0 || l.push(s, mode) > 0
	}
}

// Next implements network.Switching.
func (l *headPump) Next(s *network.Stamp, k int) (int, string, bool) {
	mode, what := l.next(s.Mode, k, l.pushes(s))
	return mode, what, false
}

// Shut implements network.Switching.
func (l *headPump) Shut(mode int) bool { return mode&pumpShut != 0 }

// Begin implements network.Beginning.
func (l *headPump) Begin(s *network.Stamp, _ bool) { s.Mode = l.start(s, l.pushes(s)) }

// Readings of a pump, in the order of its Shape.
const (
	readHead = iota
	readPower
	readSpeed
	readShaft
	readNPSH
)

// Read implements network.Readable.
func (l *headPump) Read(s *network.Stamp, k int, grad []float64) float64 {
	q, rise := s.X[l.ports], s.X[1]-s.X[0]
	add := func(place int, v float64) {
		if grad != nil {
			grad[place] += v
		}
	}
	switch k {
	case readHead:
		add(1, 1/l.weight)
		add(0, -1/l.weight)
		return rise / l.weight
	case readPower:
		add(l.ports, rise)
		add(1, q)
		add(0, -q)
		return q * rise
	case readSpeed:
		share, place, by := l.speed(s, s.Mode)
		add(place, l.rated*by)
		return share * l.rated
	case readShaft:
		return l.shaft(s, q, add)
	}
	add(0, 1/l.weight)
	return (s.X[0] + l.inlet - l.vapour) / l.weight
}

// shaft is the power that the pump takes at its shaft.
func (l *headPump) shaft(s *network.Stamp, q float64, add func(place int, v float64)) float64 {
	share, place, by := l.speed(s, s.Mode)
	if share < still {
		return 0
	}
	p, dp := l.curve.power(q / share)
	add(l.ports, l.weight*share*share*dp)
	add(place, l.weight*(3*share*share*p-share*q*dp)*by)
	return l.weight * share * share * share * p
}

// Caution implements network.Cautious.
func (l *headPump) Caution(s *network.Stamp) (code, text string) {
	q := s.X[l.ports]
	share, _, _ := l.speed(s, s.Mode)
	last := l.curve.flow[len(l.curve.flow)-1]
	switch {
	case s.Mode&pumpShut != 0:
		return "", ""
	case l.vapour > 0 && s.X[0]+l.inlet <= l.vapour:
		return "cavitation", "the pressure at its inlet is at or below the vapour pressure: it cavitates, and its head curve no longer holds"
	case q < -1e-6*last:
		return "backflow", "liquid flows back through it, of which a head curve tells nothing: taken is its first slope going on"
	case share > still && q > 1.001*share*last:
		return "beyond-curve", "it delivers more than the last point of its head curve: taken is the last slope going on"
	}
	return "", ""
}
