package laplace

import (
	"fmt"
	"math"
	"math/cmplx"
)

// epsilon is the spacing of doubles at 1.
const epsilon = 0x1p-52

// isNumber reports that x is neither infinite nor NaN.
func isNumber(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }

// finite refuses the first of the numbers that is not one.
func finite(what string, v ...float64) error {
	for _, x := range v {
		if !isNumber(x) {
			return fmt.Errorf("%s is not a finite number", what)
		}
	}
	return nil
}

// allZero reports that every number of v is 0.
func allZero(v []float64) bool {
	for _, x := range v {
		if x != 0 {
			return false
		}
	}
	return true
}

// dot returns Σ x y.
func dot(x, y []float64) float64 {
	var s float64
	for i, v := range x {
		s += v * y[i]
	}
	return s
}

// cexp returns exp(rate·tau).
func cexp(rate complex128, tau float64) complex128 {
	return cmplx.Exp(complex(real(rate)*tau, imag(rate)*tau))
}

// abs1 returns |Re z| + |Im z|, from |z| to √2 times that, without a root.
func abs1(z complex128) float64 { return math.Abs(real(z)) + math.Abs(imag(z)) }
