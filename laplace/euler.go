package laplace

import "math"

// eulerSum is a Fourier series on a line of its own for each time, aliasing
// 10^{−2m/3}, alternating, summed by Euler's transformation: Abate and Whitt, "A
// unified framework for numerically inverting Laplace transforms", INFORMS J.
// Computing 18 (2006) 408-421, section 5. 2m+1 values of F a time.
type eulerSum struct{ w []float64 } // (−1)ᵏ·ξ_k·10^{m/3}

// eulerOrders are the two sums compared with each other: at 17 the terms are 5e5
// times the answer, which costs as many digits as are gained.
var eulerOrders = [...]int{14, 17}

// eulerRounding is what rounding leaves of the larger sum, as a part of the range.
const eulerRounding = 1e-10

func newEulerSum(m int) *eulerSum {
	ξ := make([]float64, 2*m+1)
	for k := range ξ {
		ξ[k] = 1
	}
	ξ[0] = 0.5
	small, binomial := math.Pow(2, -float64(m)), 1.0
	ξ[2*m] = small
	for k := 1; k < m; k++ {
		binomial *= float64(m-k+1) / float64(k)
		ξ[2*m-k] = ξ[2*m-k+1] + small*binomial
	}
	grow := math.Pow(10, float64(m)/3)
	for k := range ξ {
		ξ[k] *= grow
		if k%2 == 1 {
			ξ[k] = -ξ[k]
		}
	}
	return &eulerSum{ξ}
}

func (e *eulerSum) at(g transform, abscissa, t float64) float64 {
	β := float64(len(e.w)/2) * math.Ln10 / 3
	y := 0.0
	for k, w := range e.w {
		y += w * real(g(complex(abscissa+β/t, math.Pi*float64(k)/t)))
	}
	return y / t * math.Exp(abscissa*t)
}
