package thermal

import "math"

// A jet is a number of a correlation with its derivatives, so that the Jacobian of a
// film is that of the formula, properties included:
//
//	v  value
//	d  Δ·∂v/∂Δ   by the difference of temperature, as a logarithmic slope
//	t  ∂v/∂T     by the mean of the two temperatures, per K
//	s  ∂v/∂u     by the speed of the fluid, per m/s
//
// The logarithmic slope is what stays finite where the difference goes through zero:
// of Ra^(1/6) it is a sixth of the value, 0 at 0.
type jet struct{ v, d, t, s float64 }

func (a jet) plus(b jet) jet      { return jet{a.v + b.v, a.d + b.d, a.t + b.t, a.s + b.s} }
func (a jet) minus(b jet) jet     { return jet{a.v - b.v, a.d - b.d, a.t - b.t, a.s - b.s} }
func (a jet) add(c float64) jet   { a.v += c; return a }
func (a jet) times(c float64) jet { return jet{c * a.v, c * a.d, c * a.t, c * a.s} }

func (a jet) mul(b jet) jet {
	return jet{a.v * b.v, a.d*b.v + a.v*b.d, a.t*b.v + a.v*b.t, a.s*b.v + a.v*b.s}
}

// over needs b.v ≠ 0.
func (a jet) over(b jet) jet {
	q := a.v / b.v
	return jet{q, (a.d - q*b.d) / b.v, (a.t - q*b.t) / b.v, (a.s - q*b.s) / b.v}
}

// through is f(a), of which value and slope at a are given.
func (a jet) through(value, slope float64) jet {
	return jet{value, slope * a.d, slope * a.t, slope * a.s}
}

// pow is a^n of a number ≥ 0, n > 0 where it can be 0. At 0 the slopes are left out: a
// correlation takes them times something that vanishes there.
func (a jet) pow(n float64) jet {
	if a.v == 0 {
		return jet{}
	}
	v := math.Pow(a.v, n)
	return a.through(v, n*v/a.v)
}

func (a jet) squared() jet { return a.mul(a) }

// log needs a.v > 0.
func (a jet) log() jet { return a.through(math.Log(a.v), 1/a.v) }

// joined is (a^n + b^n)^(1/n) of two numbers ≥ 0 that are not both 0: nearly the larger
// of the two, and smooth (Churchill and Usagi, AIChE Journal 18, 1972).
func joined(a, b jet, n float64) jet {
	if a.v < b.v {
		a, b = b, a
	}
	return a.mul(b.over(a).pow(n).add(1).pow(1 / n))
}

// larger is the larger of two numbers, with a kink where they meet.
func larger(a, b jet) jet {
	if a.v >= b.v {
		return a
	}
	return b
}

// ramped leads from a to b while x goes from one bound to the other, straight.
func ramped(x, a, b jet, from, to float64) jet {
	if x.v <= from {
		return a
	}
	if x.v >= to {
		return b
	}
	w := x.add(-from).times(1 / (to - from))
	return a.plus(b.minus(a).mul(w))
}

// eased does the same smoothly: the share of b is 3w² − 2w³ of the share w in the
// logarithm of x.
func eased(x, a, b jet, from, to float64) jet {
	if x.v <= from {
		return a
	}
	if x.v >= to {
		return b
	}
	w := x.times(1 / from).log().times(1 / math.Log(to/from))
	w = w.through(w.v*w.v*(3-2*w.v), 6*w.v*(1-w.v))
	return a.plus(b.minus(a).mul(w))
}
