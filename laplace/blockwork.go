package laplace

import "lagbook/laplace/matrix"

// blockWork holds the φ-functions of one block at one time.
type blockWork struct {
	e, p1, p2, work []float64
}

func newBlockWork(n int) *blockWork {
	v := make([]float64, 3*n*n+matrix.PhiWork(n))
	return &blockWork{v[:n*n], v[n*n : 2*n*n], v[2*n*n : 3*n*n], v[3*n*n:]}
}

// at fills e, p1, p2 with e^{τT}, φ₁(τT), φ₂(τT).
func (w *blockWork) at(n int, t []float64, tau float64) {
	matrix.PhiInto(n, t, tau, w.e, w.p1, w.p2, w.work)
}
