package laplace

import "math"

// chebyshevPoints is the number of nodes a window of many times is interpolated
// from. A response to which a contour converges is analytic in a sector about the
// time axis, so in a window of ratio 1.4 the coefficients fall by about 12 each.
const chebyshevPoints = 18

// chebyshevTimes returns the Chebyshev points of the first kind of [lo, hi],
// descending.
func chebyshevTimes(lo, hi float64) []float64 {
	t := make([]float64, chebyshevPoints)
	for i := range t {
		t[i] = (lo+hi)/2 + (hi-lo)/2*math.Cos(math.Pi*(float64(i)+0.5)/chebyshevPoints)
	}
	return t
}

// chebyshevSeries turns values at chebyshevTimes into coefficients; tail is the
// size of the last ones, a guess of what was cut off.
func chebyshevSeries(y []float64) (c []float64, tail float64) {
	c = make([]float64, len(y))
	n := float64(len(y))
	for k := range c {
		for i, v := range y {
			c[k] += 2 / n * v * math.Cos(math.Pi*float64(k)*(float64(i)+0.5)/n)
		}
	}
	c[0] /= 2
	for _, v := range c[len(c)-3:] {
		tail += math.Abs(v)
	}
	return c, tail
}

// clenshaw sums the series at x in [−1, 1].
func clenshaw(c []float64, x float64) float64 {
	var b1, b2 float64
	for k := len(c) - 1; k > 0; k-- {
		b1, b2 = c[k]+2*x*b1-b2, b1
	}
	return c[0] + x*b1 - b2
}
