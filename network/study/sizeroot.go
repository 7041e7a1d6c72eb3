package study

import "math"

// signChange narrows a bracket [a, b] in which a function changes its sign, until it is no
// wider than fine(a, b). fa and fb are the values at its ends, one negative, the other not.
// It returns the last bracket: the end where the function is negative, and the other.
//
// Method: inverse quadratic interpolation where it can be trusted, else bisection: T. R.
// Chandrupatla, A new hybrid quadratic/bisection algorithm for finding the zero of a nonlinear
// function without using derivatives, Advances in Engineering Software 28 (1997) 145–149.
// Where the function is infinite, or leaps, it bisects.
func signChange(f func(x float64) float64, a, fa, b, fb float64, fine func(a, b float64) float64) (negative, positive float64) {
	t := 0.5
	for range maxNarrowing {
		width, least := math.Abs(b-a), fine(a, b)
		if width <= least {
			break
		}
		t = math.Min(1-least/(2*width), math.Max(least/(2*width), t))
		x := a + t*(b-a)
		if x == a || x == b {
			break
		}
		fx := f(x)
		c, fc := a, fa
		if (fx >= 0) != (fa >= 0) {
			c, fc = b, fb
			b, fb = a, fa
		}
		a, fa = x, fx
		t = trusted(a, fa, b, fb, c, fc)
	}
	if fa < 0 {
		return a, b
	}
	return b, a
}

// maxNarrowing bounds the search whatever the function does.
const maxNarrowing = 200

// trusted is where, as a share of the way from a to b, to look next.
func trusted(a, fa, b, fb, c, fc float64) float64 {
	xi, phi := (a-b)/(c-b), (fa-fb)/(fc-fb)
	if !(phi*phi < xi && (1-phi)*(1-phi) < 1-xi) { // also where one of them is infinite
		return 0.5
	}
	t := fa/(fb-fa)*fc/(fb-fc) + (c-a)/(b-a)*fa/(fc-fa)*fb/(fc-fb)
	if math.IsNaN(t) {
		return 0.5
	}
	return t
}

// summit looks for the greatest value of f between a and c, with b between them where it is
// greater than at both, in so many steps, and stops as soon as a value is above enough. The
// golden section: J. Kiefer, Proc. Am. Math. Soc. 4 (1953) 502–506.
func summit(f func(x float64) float64, a, b, fb, c float64, steps int, enough float64) (x, fx float64) {
	const golden = 0.381966011250105
	x, fx = b, fb
	for range steps {
		next := x + golden*(c-x)
		if x-a > c-x {
			next = x - golden*(x-a)
		}
		if y := f(next); y > fx {
			if next > x {
				a = x
			} else {
				c = x
			}
			x, fx = next, y
		} else if next > x {
			c = next
		} else {
			a = next
		}
		if fx > enough {
			break
		}
	}
	return x, fx
}
