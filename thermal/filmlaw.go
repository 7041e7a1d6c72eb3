package thermal

import (
	"math"

	"lagbook/network"
)

// A convection knows the heat that a fluid takes from a surface.
type convection interface {
	// convect returns the conductance in W/K and the coefficient in W/(m²·K) of a surface at a
	// against a fluid at b, in K, with the fluid at speed u, in m/s.
	convect(a, b, u float64) (conductance, coefficient jet)
	// doubt returns a code and a sentence where the formulas behind it do not reach, "" where they do.
	doubt(a, b, u float64) (code, text string)
}

// convecting is the law of a convection between two nodes, the surface first. Its drives
// are the scale, where it is scaled, and the speed, where the fluid is blown.
type convecting struct {
	of            convection
	scaled, blown bool
}

// split takes the levels, the scale and the speed from the local variables.
func (l *convecting) split(x []float64) (a, b, scale, u float64) {
	scale = 1
	if l.scaled {
		scale = x[2]
	}
	if l.blown {
		u = x[len(x)-1]
	}
	return x[0], x[1], scale, u
}

// Eval implements network.Law.
func (l *convecting) Eval(s *network.Stamp) {
	a, b, scale, u := l.split(s.X)
	g, _ := l.of.convect(a, b, u)
	q, da, db, du := g.flow(a - b)
	n := len(s.X)
	s.F[0], s.DF[0], s.DF[1] = -scale*q, -scale*da, -scale*db
	s.F[1], s.DF[n], s.DF[n+1] = scale*q, scale*da, scale*db
	if l.scaled {
		s.DF[2], s.DF[n+2] = -q, q
	}
	if l.blown {
		s.DF[n-1], s.DF[2*n-1] = -scale*du, scale*du
	}
}

// Read implements network.Readable: the coefficient.
func (l *convecting) Read(s *network.Stamp, _ int, grad []float64) float64 {
	a, b, _, u := l.split(s.X)
	_, h := l.of.convect(a, b, u)
	if grad != nil {
		da, db := h.slopes(a - b)
		grad[0] += da
		grad[1] += db
		if l.blown {
			grad[len(s.X)-1] += h.s
		}
	}
	return h.v
}

// Caution implements network.Cautious.
func (l *convecting) Caution(s *network.Stamp) (code, text string) {
	a, b, scale, u := l.split(s.X)
	if scale == 0 {
		return "", ""
	}
	return l.of.doubt(a, b, u)
}

// flow is the heat g·Δ with its slopes by the two levels and the speed. At no
// difference its slope is the conductance there.
func (g jet) flow(delta float64) (q, da, db, du float64) {
	by := g.v + g.d
	mean := delta * g.t / 2
	return g.v * delta, by + mean, mean - by, delta * g.s
}

// slopes are those of a coefficient by the two levels. Those of a power of the difference below 1
// have no bound at 0; there they are left out.
func (g jet) slopes(delta float64) (da, db float64) {
	by := 0.0
	if math.Abs(delta) > 1e-9 {
		by = g.d / delta
	}
	return by + g.t/2, g.t/2 - by
}
