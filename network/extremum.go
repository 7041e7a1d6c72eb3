package network

import (
	"math"

	"lagbook/laplace"
)

// Max returns the largest value of output out in [t0, t1] (s), of those equal within a
// quarter of Rounding the first. It is no sample: the extremes of each step's polynomial
// are found by the roots of its slope.
func (t *Trajectory) Max(out int, t0, t1 float64) laplace.Extreme {
	return t.extreme(out, t0, t1, +1)
}

// Min returns the smallest value of output out in [t0, t1] (s), as Max does.
func (t *Trajectory) Min(out int, t0, t1 float64) laplace.Extreme {
	return t.extreme(out, t0, t1, -1)
}

func (t *Trajectory) extreme(out int, t0, t1, sign float64) laplace.Extreme {
	best := laplace.Extreme{Y: math.Inf(-1)}
	same, before := t.Rounding(out)/4, 0.0
	t.parts(out, t0, t1, +1, func(p *part) bool {
		if best.AtLeft && best.T == p.a && math.Abs(p.ya-before) <= same {
			best.AtLeft = false // the next step goes on where this ended
		}
		for k, y := range [2]float64{sign * p.ya, sign * p.yb} {
			if y > best.Y+same {
				best = laplace.Extreme{T: p.a, Y: y}
				if k == 1 {
					best.T, best.AtLeft = p.b, !p.last
				}
			}
		}
		before = p.yb
		return true
	})
	if math.IsInf(best.Y, 0) { // [t0, t1] lies outside the run
		return laplace.Extreme{T: t0, Y: t.At(out, t0)}
	}
	best.Y *= sign
	return best
}
