package casefile

import (
	"math"

	"lagbook/network/quantity"
)

// mostInstants is at how many instants of each waveform a function of waveforms is looked
// at before it is sampled.
const mostInstants = 500

// instants are times at which the leaves of a curve begin something, and between; the
// first lies before t = 0.
func (c *curve) instants() []float64 {
	list := []float64{-1, 0}
	for _, l := range c.leaves {
		s := l.wave.Segments
		step := 1 + len(s)/mostInstants
		for i := 0; i < len(s); i += step {
			list = append(list, s[i].At)
			if i+1 < len(s) {
				list = append(list, s[i].At+(s[i+1].At-s[i].At)/2)
			}
		}
	}
	return list
}

// values writes what the leaves are at t into x.
func (c *curve) values(x []float64, t float64) []float64 {
	for i, l := range c.leaves {
		x[i] = l.wave.At(t)
	}
	return x
}

// undefined looks for an instant at which the curve has no value.
func (c *curve) undefined() (t float64, found bool) {
	x := make([]float64, len(c.leaves))
	for _, t := range c.instants() {
		if y := c.at(c.values(x, t)); math.IsNaN(y) || math.IsInf(y, 0) {
			return t, true
		}
	}
	return 0, false
}

// leafSpread is how far the errors of leaves that were sampled themselves reach, as seen
// at the instants, the errors of all leaves added up.
func (c *curve) leafSpread() float64 {
	sum := 0.0
	x := make([]float64, len(c.leaves))
	for i, l := range c.leaves {
		if !(l.bound > 0) {
			continue
		}
		most := 0.0
		for _, t := range c.instants() {
			c.values(x, t)
			y := c.at(x)
			for _, by := range []float64{-l.bound, l.bound} {
				v := x[i]
				x[i] = v + by
				if d := math.Abs(c.at(x) - y); !math.IsNaN(d) && !math.IsInf(d, 0) {
					most = max(most, d)
				}
				x[i] = v
			}
		}
		sum += most
	}
	return sum
}

// spread is how far the errors of operands reach through one step in closed form.
func spread(st *quantity.Step) float64 {
	made := &curve{}
	operands := make([]int, len(st.Terms)) // place among the leaves, −1 a number
	for i, t := range st.Terms {
		operands[i] = -1
		if c, ok := t.Curve.(*curve); ok {
			operands[i] = len(made.leaves)
			made.leaves = append(made.leaves, c)
		}
	}
	made.at = func(x []float64) float64 {
		y := make([]float64, len(operands))
		for i, leaf := range operands {
			if y[i] = st.Terms[i].Value.SI; leaf >= 0 {
				y[i] = x[leaf]
			}
		}
		return st.Function(y)
	}
	return made.leafSpread()
}
