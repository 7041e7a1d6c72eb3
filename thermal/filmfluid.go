package thermal

import (
	"math"

	"lagbook/thermal/material"
)

// A medium is the fluid of a film: dry air at a pressure, or a fluid of the handbook.
type medium struct {
	points   []material.Point // of the handbook; nil: air
	pressure float64          // Pa, absolute, of air
}

// at returns the properties and their slopes, per K.
func (m *medium) at(T float64) (at, slope material.Point) {
	if m.points == nil {
		return material.AirAt(T, m.pressure)
	}
	return alongPoints(m.points, T)
}

// known is between which temperatures the properties are known, in K.
func (m *medium) known() (low, high float64) {
	if m.points == nil {
		return material.AirLow, material.AirHigh
	}
	return m.points[0].Temperature, m.points[len(m.points)-1].Temperature
}

// alongPoints is straight between the points, the viscosity in its logarithm since that of an
// oil falls by its half in 15 K; beyond the ends it is what it is there.
func alongPoints(points []material.Point, T float64) (at, slope material.Point) {
	last := len(points) - 1
	if last == 0 || !(T > points[0].Temperature) {
		return points[0], slope
	}
	if T >= points[last].Temperature {
		return points[last], slope
	}
	i := 1
	for points[i].Temperature < T {
		i++
	}
	a, b := points[i-1], points[i]
	step := b.Temperature - a.Temperature
	w := (T - a.Temperature) / step
	straight := func(x, y float64) (v, rate float64) { return x + w*(y-x), (y - x) / step }
	at.Temperature = T
	at.Density, slope.Density = straight(a.Density, b.Density)
	at.SpecificHeat, slope.SpecificHeat = straight(a.SpecificHeat, b.SpecificHeat)
	at.Conductivity, slope.Conductivity = straight(a.Conductivity, b.Conductivity)
	l, rate := straight(math.Log(a.Viscosity), math.Log(b.Viscosity))
	at.Viscosity = math.Exp(l)
	slope.Viscosity = at.Viscosity * rate
	return at, slope
}

// expansion is −(dρ/dT)/ρ at a temperature in K with its slope: 1/T of air, and of a liquid
// what its densities say, at each point that of the parabola through it and its neighbours,
// straight between. Where water contracts it is 0.
func (m *medium) expansion(T float64) (beta, slope float64) {
	if m.points == nil {
		at, by := m.at(T)
		beta = 1 / at.Temperature
		if by.Density == 0 {
			return beta, 0 // beyond what is evaluated
		}
		return beta, -beta * beta
	}
	last := len(m.points) - 1
	if !(T > m.points[0].Temperature) {
		return m.expansionAt(0), 0
	}
	if T >= m.points[last].Temperature {
		return m.expansionAt(last), 0
	}
	i := 1
	for m.points[i].Temperature < T {
		i++
	}
	a, b := m.expansionAt(i-1), m.expansionAt(i)
	step := m.points[i].Temperature - m.points[i-1].Temperature
	slope = (b - a) / step
	return a + slope*(T-m.points[i-1].Temperature), slope
}

// expansionAt is that at a point.
func (m *medium) expansionAt(i int) float64 {
	p, last := m.points, len(m.points)-1
	if last == 0 {
		return 0
	}
	chord := func(i int) (slope, step float64) {
		step = p[i+1].Temperature - p[i].Temperature
		return (p[i+1].Density - p[i].Density) / step, step
	}
	var slope float64
	switch {
	case last == 1:
		slope, _ = chord(0)
	case i == 0:
		a, h := chord(0)
		b, k := chord(1)
		slope = a - (b-a)*h/(h+k)
	case i == last:
		a, h := chord(last - 2)
		b, k := chord(last - 1)
		slope = b + (b-a)*k/(h+k)
	default:
		a, h := chord(i - 1)
		b, k := chord(i)
		slope = (a*k + b*h) / (h + k)
	}
	return math.Max(-slope/p[i].Density, 0)
}

// A filmState is what a correlation sees of surface and fluid.
type filmState struct {
	delta float64 // K, of the surface against the fluid, with its sign
	size  jet     // K, of the difference
	T     jet     // K, at which the properties are taken
	speed jet     // m/s
	k     jet     // W/(m·K)
	nu    jet     // m²/s, kinematic viscosity
	pr    jet     // Prandtl number
	beta  jet     // 1/K, thermal expansion
}

// mostDifference is up to which difference, in K, a correlation follows it: beyond, the
// coefficient stays what it is there.
const mostDifference = 1e4

// stateOf is the state of a film between a surface at a and a fluid at b, in K; u is the
// speed. Properties are those at the mean of the two, at the fluid's own temperature
// where bulk.
func stateOf(m *medium, a, b, u float64, bulk bool) filmState {
	s := filmState{delta: a - b, speed: jet{v: math.Max(u, 0), s: 1}}
	if size := math.Abs(s.delta); size < mostDifference {
		s.size = jet{v: size, d: size}
	} else {
		s.size = jet{v: mostDifference}
	}
	s.T = jet{v: a/2 + b/2, t: 1}
	if bulk {
		s.T = jet{v: b, d: -s.delta / 2, t: 1}
	}
	at, slope := m.at(s.T.v)
	rho := s.T.through(at.Density, slope.Density)
	mu := s.T.through(at.Viscosity, slope.Viscosity)
	heat := s.T.through(at.SpecificHeat, slope.SpecificHeat)
	s.k = s.T.through(at.Conductivity, slope.Conductivity)
	s.nu = mu.over(rho)
	s.pr = mu.mul(heat).over(s.k)
	s.beta = s.T.through(m.expansion(s.T.v))
	return s
}

// standardGravity, m/s².
const standardGravity = 9.80665

// rayleigh is g·β·|Δ|·L³/(ν·α), with α = ν/Pr.
func (s *filmState) rayleigh(length float64) jet {
	return s.beta.mul(s.size).mul(s.pr).over(s.nu.squared()).times(standardGravity * length * length * length)
}

// reynolds is u·L/ν.
func (s *filmState) reynolds(length float64) jet {
	return s.speed.over(s.nu).times(length)
}
