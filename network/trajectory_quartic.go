package network

import "math"

// A quartic is a polynomial of degree 4 by powers of θ, the share of a step gone by.
type quartic [5]float64

func (c *quartic) at(theta float64) float64 {
	return (((c[4]*theta+c[3])*theta+c[2])*theta+c[1])*theta + c[0]
}

// slope is the derivative by θ.
func (c *quartic) slope(theta float64) float64 {
	return ((4*c[4]*theta+3*c[3])*theta+2*c[2])*theta + c[1]
}

// bound is at least as large as any value.
func (c *quartic) bound() float64 {
	sum := 0.0
	for _, v := range c {
		sum += math.Abs(v)
	}
	return sum
}

// part returns the part between two shares, by the share of that.
func (c *quartic) part(a, b float64) quartic {
	r := *c
	if a != 0 { // Taylor's coefficients at a, by Horner's scheme again and again
		for k := range len(r) - 1 {
			for i := len(r) - 2; i >= k; i-- {
				r[i] += a * r[i+1]
			}
		}
	}
	power := 1.0
	for k := range r {
		r[k] *= power
		power *= b - a
	}
	return r
}

// times returns f times the polynomial.
func (c quartic) times(f float64) quartic {
	for k := range c {
		c[k] *= f
	}
	return c
}

// integral returns ∫ c dθ from a to b.
func (c *quartic) integral(a, b float64) float64 {
	sum := 0.0
	for k := len(c) - 1; k >= 0; k-- {
		// (b^(k+1) − a^(k+1)) = (b − a) Σ b^i a^(k−i): nothing cancels where a is near b
		s, p := 0.0, 1.0
		for range k + 1 {
			s = s*a + p
			p *= b
		}
		sum += c[k] / float64(k+1) * s
	}
	return (b - a) * sum
}

// nodes are the shares of a step at which what is no polynomial is looked at: the five
// points of Lobatto, both ends among them.
var nodes = [5]float64{0, 0.17267316464601142810, 0.5, 0.82732683535398857190, 1}

// nodeWeights integrate over the step: Lobatto's rule, exact to degree 7.
var nodeWeights = [5]float64{1. / 20, 49. / 180, 16. / 45, 49. / 180, 1. / 20}

// through returns the quartic that has the values y at the nodes. In s = 2θ − 1 the
// nodes are −1, −√(3/7), 0, √(3/7), 1.
func through(y *[5]float64) quartic {
	const q = 3. / 7
	r := math.Sqrt(q)
	m := y[2]
	even, odd := (y[4]+y[0])/2-m, (y[4]-y[0])/2 // at ±1
	evenIn, oddIn := (y[3]+y[1])/2-m, (y[3]-y[1])/2/r
	// even: a s² + b s⁴ = even at 1, a q + b q² = evenIn;  odd: c s + d s³: c + d = odd, c + d q = oddIn
	b := (evenIn/q - even) / (q - 1)
	a := even - b
	d := (odd - oddIn) / (1 - q)
	c := odd - d
	// s = 2θ − 1
	return quartic{y[0], 2*c - 4*a + 6*d - 8*b, 4*a - 12*d + 24*b, 8*d - 32*b, 16 * b}
}

// stationary appends to at the points of (0, 1) at which the slope changes its sign,
// ascending.
func (c *quartic) stationary(at []float64) []float64 {
	d := [4]float64{c[1], 2 * c[2], 3 * c[3], 4 * c[4]}
	// a polynomial lies between its coefficients in Bernstein's basis
	b1, b2, b3 := d[0]+d[1]/3, d[0]+(2*d[1]+d[2])/3, d[0]+d[1]+d[2]+d[3]
	if min(d[0], b1, b2, b3) > 0 || max(d[0], b1, b2, b3) < 0 {
		return at
	}
	a, da := 0.0, d[0]
	for _, b := range turnings(d) {
		db := c.slope(b)
		if da < 0 && db > 0 || da > 0 && db < 0 {
			at = append(at, halved(a, b, func(x float64) bool { return c.slope(x) < 0 == (da < 0) }))
		}
		if db != 0 {
			a, da = b, db
		}
	}
	return at
}

// turnings returns where in (0, 1) the cubic d turns, ascending, each outside counting as
// 1, and then 1: from each to the next d is monotone.
func turnings(d [4]float64) [3]float64 {
	in := func(x float64) float64 {
		if x > 0 && x < 1 {
			return x
		}
		return 1
	}
	a, b, c := 3*d[3], d[2], d[1] // a x² + 2 b x + c = 0, neither root by a difference
	root := b*b - a*c
	if !(root > 0) {
		return [3]float64{1, 1, 1}
	}
	q := -(b + math.Copysign(math.Sqrt(root), b))
	x, y := in(q/a), in(c/q)
	return [3]float64{min(x, y), max(x, y), 1}
}

// halved returns the point between a, where before holds, and b, on either side of a,
// where it does not, at which that changes, to the last digit: the first number at which
// it no longer holds.
func halved(a, b float64, before func(x float64) bool) float64 {
	for {
		m := a + (b-a)/2
		if m == a || m == b {
			return b
		}
		if before(m) {
			a = m
		} else {
			b = m
		}
	}
}
