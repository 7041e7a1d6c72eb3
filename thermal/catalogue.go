package thermal

import (
	"fmt"
	"math"
)

// falling is a catalogue resistance that falls as the rise across it grows, as the trade
// writes it: R = R₀·(rise/at_rise)^(−n). An exponent of 0.25 is that of natural convection, of
// oil in a transformer (a rise as loss^0.8: n = 1/0.8 − 1), 0 a constant. The flow is
//
//	q = (T_a − T_b)/R₀ · ((ΔT² + δ²)/(at_rise² + δ²))^(n/2)
//
// with δ a thousandth of at_rise: where the trade's formula would have no conductance at no
// rise, it keeps 0.001ⁿ of the stated one. At a tenth of at_rise the difference is n·5e-5.
type falling struct {
	g        float64 // 1/R₀, W/K
	atRise   float64 // K
	exponent float64 // ≥ 0
}

// blended is δ as a share of at_rise.
const blended = 1e-3

// Flow implements network.Flow.
func (f *falling) Flow(a, b float64) (q, da, db float64) {
	x := (a - b) / f.atRise
	inside := math.Min(math.Max(x, -farthest), farthest)
	square := inside*inside + blended*blended
	g := f.g * math.Pow(square/(1+blended*blended), f.exponent/2)
	da = g * (1 + f.exponent*inside*inside/square)
	return (g*inside + da*(x-inside)) * f.atRise, da, -da // along the tangent where a search for a steady state goes farther
}

// farthest is the rise beyond which falling goes on straight, as a multiple of at_rise.
const farthest = 1e6

// charted is a catalogue resistance by points [rise, R]: R straight between them, and constant
// before the first and after the last. The flow is ΔT/R(|ΔT|).
type charted struct {
	name string
	at   curve // rise in K, resistance in K/W
}

// Flow implements network.Flow.
func (c *charted) Flow(a, b float64) (q, da, db float64) {
	d := a - b
	r, slope := c.at.value(math.Abs(d))
	da = (r - math.Abs(d)*slope) / (r * r)
	return d / r, da, -da
}

// Caution tells of a rise beyond the last point.
func (c *charted) Caution(a, b float64) (code, text string) {
	last := c.at.last()
	if d := math.Abs(a - b); d > last*(1+1e-9) { // more than the rounding of levels near the point
		return "beyond-points of " + c.name, fmt.Sprintf("the rise across resistance %q passes %.4g K, the last of its points: its resistance there is used beyond", c.name, last)
	}
	return "", ""
}

// falls returns the first pair of points between which the flow would fall as the rise
// grows, and whether there is one: rise/R must grow from point to point.
func (c *charted) falls() (at int, bad bool) {
	for i := 1; i < len(c.at.x); i++ {
		if c.at.x[i]/c.at.y[i] <= c.at.x[i-1]/c.at.y[i-1] {
			return i, true
		}
	}
	return 0, false
}
