package network

import (
	"math"

	"lagbook/laplace"
)

// MaxRate returns the largest derivative of output out in [t0, t1] (s), that of its
// polynomials, and when it is first taken. Of a jump nothing is said: it has no rate.
// AtLeft says that the rate at T is that just before T. A polynomial of a step follows
// the output far better than its derivative: the rate is known to some hundred times the
// tolerance of the march, as a share of the largest.
func (t *Trajectory) MaxRate(out int, t0, t1 float64) laplace.Extreme {
	return t.steepest(out, t0, t1, +1)
}

// MinRate returns the smallest derivative, as MaxRate does.
func (t *Trajectory) MinRate(out int, t0, t1 float64) laplace.Extreme {
	return t.steepest(out, t0, t1, -1)
}

func (t *Trajectory) steepest(out int, t0, t1, sign float64) laplace.Extreme {
	best := laplace.Extreme{T: t0, Y: math.Inf(-1)}
	t0, t1 = max(t0, t.times[0]), min(t1, t.Until())
	for j := t.stepAt(t0, false); j < len(t.times)-1 && (t.times[j] < t1 || t.times[j] <= t0); j++ {
		h := t.times[j+1] - t.times[j]
		if !(h > 0) || t.times[j+1] <= t0 {
			continue
		}
		c := &t.curves[out][j]
		a, b := t.share(j, t0), t.share(j, t1)
		for k, theta := range c.steep(a, b) {
			y := sign * c.slope(theta) / h
			if y > best.Y+1e-12*math.Abs(y) {
				best = laplace.Extreme{T: min(t.times[j]+theta*h, t.times[j+1]), Y: y, AtLeft: k == 1 && b == 1}
			}
		}
	}
	if math.IsInf(best.Y, 0) {
		best.Y = 0
		return best
	}
	best.Y *= sign
	return best
}

// steep returns where the slope may be extreme in [a, b]: at its ends, and where the second
// derivative is 0.
func (c *quartic) steep(a, b float64) []float64 {
	list := []float64{a, b}
	p, q, r := 12*c[4], 3*c[3], 2*c[2] // p θ² + 2 q θ + r, neither root by a difference
	root := q*q - p*r
	if root < 0 {
		return list
	}
	s := -(q + math.Copysign(math.Sqrt(root), q))
	for _, theta := range []float64{s / p, r / s} {
		if theta > a && theta < b {
			list = append(list, theta)
		}
	}
	return list
}

// Pieces returns the number of polynomials of an output.
func (t *Trajectory) Pieces() int { return len(t.times) - 1 }
