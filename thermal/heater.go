package thermal

import "lagbook/network"

// A heating is what the laws of a heater share. The local variables are the level of the node
// heated, that of the node watched where it is another, and the unknowns.
type heating struct {
	low, high float64 // W
}

// A seat says where among the local variables a heater finds what it reads: the node watched,
// the last of the ports, and behind the ports its unknowns, the energy last.
type seat struct{ watch, integral, energy int }

// seatOf is the seat of a law with so many unknowns.
func seatOf(s *network.Stamp, unknowns int) seat {
	ports := len(s.F) - unknowns
	return seat{ports - 1, ports, len(s.F) - 1}
}

// A heat is what a heater gives, with its derivatives: by the level watched, by the integral and
// by the target.
type heat struct{ u, byLevel, byIntegral, byTarget float64 }

// into writes the heat into the balance of the node and the rate of the energy.
func (q heat) into(s *network.Stamp, at seat) {
	n := len(s.X)
	for _, row := range [2]int{0, at.energy} {
		s.F[row] = q.u
		q.slopes(s.DF[row*n:(row+1)*n], at, 1)
	}
}

// slopes adds the derivatives times k; what a heater without integral or target lacks is 0.
func (q heat) slopes(d []float64, at seat, k float64) {
	d[at.watch] += k * q.byLevel
	d[at.integral] += k * q.byIntegral
	if len(d) > at.energy+1 {
		d[at.energy+1] += k * q.byTarget
	}
}

// Readings of a heater.
const (
	readHeat = iota
	readEnergy
	readDuty
)

// read returns the heat, the energy or the duty.
func (h *heating) read(s *network.Stamp, at seat, k int, q heat, grad []float64) float64 {
	v, slope := q.u, 1.0
	switch k {
	case readEnergy:
		if grad != nil {
			grad[at.energy]++
		}
		return s.X[at.energy]
	case readDuty:
		slope = 1 / (h.high - h.low)
		v = (q.u - h.low) * slope
	}
	if grad != nil {
		q.slopes(grad, at, slope)
	}
	return v
}

// A thermostat is a heater that is on or off. It has one unknown, the energy.
type thermostat struct {
	heating
	onBelow, offAbove float64 // K
	starts            int     // off or on: between the two
}

// Modes of a thermostat.
const (
	off = iota
	on
)

func (h *thermostat) heat(mode int) heat {
	if mode == on {
		return heat{u: h.high}
	}
	return heat{u: h.low}
}

// Eval implements network.Law.
func (h *thermostat) Eval(s *network.Stamp) { h.heat(s.Mode).into(s, seatOf(s, 1)) }

// Guards implements network.Switching.
func (h *thermostat) Guards(s *network.Stamp, g []float64) int {
	T := s.X[seatOf(s, 1).watch]
	if g[0] = T - h.onBelow; s.Mode == on {
		g[0] = h.offAbove - T
	}
	return 1
}

// Next implements network.Switching.
func (h *thermostat) Next(s *network.Stamp, _ int) (mode int, what string, last bool) {
	if s.Mode == on {
		return off, "off", false
	}
	return on, "on", false
}

// Shut implements network.Switching.
func (h *thermostat) Shut(int) bool { return false }

// Begin implements network.Beginning.
func (h *thermostat) Begin(s *network.Stamp, _ bool) {
	at := seatOf(s, 1)
	T := s.X[at.watch]
	switch {
	case T >= h.offAbove:
		s.Mode = off
	case T <= h.onBelow:
		s.Mode = on
	default:
		s.Mode = h.starts
	}
	s.X[at.energy] = 0
}

// Read implements network.Readable.
func (h *thermostat) Read(s *network.Stamp, k int, grad []float64) float64 {
	return h.read(s, seatOf(s, 1), k, h.heat(s.Mode), grad)
}
