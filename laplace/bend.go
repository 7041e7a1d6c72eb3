package laplace

import (
	"math"
	"math/cmplx"
)

// MaxDegree is the highest power of τ in a Segment.
const MaxDegree = 12

// straight reports that the segment has no powers above τ.
func (g *Segment) straight() bool { return allZero(g.Poly) }

// powerSum returns c[0] + c[1]·x + c[2]·x² + ….
func powerSum(c []float64, x float64) float64 {
	v := 0.0
	for k := len(c) - 1; k >= 0; k-- {
		v = v*x + c[k]
	}
	return v
}

// sizeOfPowers returns |c[0]| + |c[1]|·x + … for x ≥ 0.
func sizeOfPowers(c []float64, x float64) float64 {
	v := 0.0
	for k := len(c) - 1; k >= 0; k-- {
		v = v*x + math.Abs(c[k])
	}
	return v
}

// at returns c[k], 0 beyond the end.
func at(c []float64, k int) float64 {
	if k < len(c) {
		return c[k]
	}
	return 0
}

// powersFrom returns the coefficients of the segment's powers as seen from tau on, in a
// list of its own.
func (g *Segment) powersFrom(tau float64) (a, b float64, bent []float64) {
	c := g.powers()
	shift(c, tau)
	return c[0], c[1], c[2:]
}

// powers returns the coefficients of 1, τ, τ², ….
func (g *Segment) powers() []float64 {
	return append([]float64{g.A, g.B}, g.Poly...)
}

// shift turns the coefficients of Σ c[k] x^k into those of Σ c[k] (x+d)^k: Horner's
// scheme, once for each power.
func shift(c []float64, d float64) {
	if d == 0 {
		return
	}
	for i := range c {
		for k := len(c) - 2; k >= i; k-- {
			c[k] += d * c[k+1]
		}
	}
}

// steepest bounds the slope of the segment at τ.
func (g *Segment) steepest(tau float64) float64 {
	c := g.powers()[1:]
	for k := range c {
		c[k] *= float64(k + 1)
	}
	v := sizeOfPowers(c, tau)
	for _, e := range g.Exp {
		v += cmplx.Abs(e.Amplitude*e.Rate) * math.Exp(real(e.Rate)*tau)
	}
	return v
}

// falling returns k·(k−1)·…·(k−m+1), the factor that m derivatives bring to τ^k.
func falling(k, m int) float64 {
	v := 1.0
	for i := range m {
		v *= float64(k - i)
	}
	return v
}

// choose returns the number of ways to take m of k.
func choose(k, m int) float64 { return falling(k, m) / falling(m, m) }
