package thermal

import "sort"

// A curve is a property against temperature, or a resistance against a rise: straight
// between its points, constant before the first and after the last. x ascends strictly.
type curve struct {
	x, y []float64
	sum  []float64 // ∫ y dx from x[0] to x[i]
}

// set takes over points, whose number stays the same from one call to the next.
func (c *curve) set(n int, at func(i int) (x, y float64)) {
	if len(c.x) != n {
		c.x, c.y, c.sum = make([]float64, n), make([]float64, n), make([]float64, n)
	}
	for i := range n {
		c.x[i], c.y[i] = at(i)
		if i > 0 {
			c.sum[i] = c.sum[i-1] + (c.x[i]-c.x[i-1])*(c.y[i]+c.y[i-1])/2
		}
	}
}

// last is the x of the last point.
func (c *curve) last() float64 { return c.x[len(c.x)-1] }

// usual is y at the temperature at which laws take a property that does not vary.
func (c *curve) usual() float64 {
	y, _ := c.value(usual)
	return y
}

// segment returns i where x lies between points i−1 and i; 0 before the first and the number
// of points after the last.
func (c *curve) segment(x float64) int {
	if x < c.x[0] {
		return 0
	}
	return sort.Search(len(c.x), func(i int) bool { return c.x[i] > x })
}

// value returns y and its slope at x.
func (c *curve) value(x float64) (y, slope float64) {
	switch i := c.segment(x); i {
	case 0:
		return c.y[0], 0
	case len(c.x):
		return c.y[i-1], 0
	default:
		slope = (c.y[i] - c.y[i-1]) / (c.x[i] - c.x[i-1])
		return c.y[i-1] + slope*(x-c.x[i-1]), slope
	}
}

// integral is ∫ y dx from x[0] to x.
func (c *curve) integral(x float64) float64 {
	switch i := c.segment(x); i {
	case 0:
		return c.y[0] * (x - c.x[0])
	case len(c.x):
		return c.sum[i-1] + c.y[i-1]*(x-c.x[i-1])
	default:
		y, _ := c.value(x)
		return c.sum[i-1] + (x-c.x[i-1])*(c.y[i-1]+y)/2
	}
}

// between is ∫ y dx from b to a; of points on one straight piece it keeps the digits of a − b.
func (c *curve) between(a, b float64) float64 {
	if c.segment(a) == c.segment(b) {
		p, _ := c.value(a)
		q, _ := c.value(b)
		return (a - b) * (p + q) / 2
	}
	return c.integral(a) - c.integral(b)
}

// conducting is a layer or a shell whose conductivity depends on temperature: by Kirchhoff's
// transformation the steady flow through it is exactly g·∫ k dT, with g the area over the
// thickness of a layer and 2πL/ln(ro/ri) of a shell (H. S. Carslaw and J. C. Jaeger: Conduction
// of Heat in Solids, 2nd ed., section 1.6).
type conducting struct {
	g float64 // m
	k curve   // K, W/(m·K)
}

// Flow implements network.Flow.
func (c *conducting) Flow(a, b float64) (q, da, db float64) {
	ka, _ := c.k.value(a)
	kb, _ := c.k.value(b)
	return c.g * c.k.between(a, b), c.g * ka, -c.g * kb
}
