package laplace

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// A refinedLU solves a x = b by LU with row exchanges and one step of refinement, the
// residual in twice the precision.
type refinedLU struct {
	n  int
	a  []float64 // row-major
	lu mat.LU
}

// newRefinedLU factorises a, which is kept; nil where a pivot is 0.
func newRefinedLU(n int, a []float64) *refinedLU {
	f := &refinedLU{n: n, a: a}
	if n == 0 {
		return f
	}
	f.lu.Factorize(mat.NewDense(n, n, append([]float64(nil), a...)))
	if c := f.lu.Cond(); math.IsInf(c, 0) || math.IsNaN(c) {
		return nil
	}
	return f
}

// condition returns an estimate of the condition of a.
func (f *refinedLU) condition() float64 {
	if f.n == 0 {
		return 1
	}
	return f.lu.Cond()
}

// solve returns x.
func (f *refinedLU) solve(b []float64) []float64 {
	x, r := make([]float64, f.n), append([]float64(nil), b...)
	if f.n == 0 {
		return x
	}
	for range 2 {
		step := mat.NewVecDense(f.n, nil)
		// the error would say that a is ill-conditioned: what is lost to that is refined
		_ = f.lu.SolveVecTo(step, false, mat.NewVecDense(f.n, r))
		for i := range x {
			x[i] += step.AtVec(i)
		}
		for i := range r {
			r[i] = residual(f.a[i*f.n:(i+1)*f.n], x, b[i])
		}
	}
	return x
}

// solveNegative returns x of 0 = a x + b.
func (f *refinedLU) solveNegative(b []float64) []float64 {
	minus := make([]float64, len(b))
	for i, v := range b {
		minus[i] = -v
	}
	return f.solve(minus)
}

// residual returns b − a·x with products and sums in twice the precision.
func residual(a, x []float64, b float64) float64 {
	hi, lo := b, 0.0
	for j, v := range a {
		p := -v * x[j]
		lo += math.FMA(-v, x[j], -p)
		s := hi + p
		t := s - hi
		lo += (hi - (s - t)) + (p - t)
		hi = s
	}
	return hi + lo
}
