package network

import "gonum.org/v1/gonum/mat"

// findKick fills kick. With i = N j + M q and Nᵀ(L i' + LR i) = Nᵀ drop, the free flows
// follow Nᵀ L N j' = … − Nᵀ L M q': where a source jumps they jump too, and
//
//	j + kick q,   Nᵀ L N kick = Nᵀ L M,
//
// does not: it is the state. What a source that jumps at a joint does to the flows is
// done by inertances alone.
func (f *flows) findKick() error {
	inputs, N := len(f.n.g.inputs), len(f.plan.free)
	f.kick = make([][]float64, N)
	for c := range f.kick {
		f.kick[c] = make([]float64, inputs)
	}
	diagonal, whole := f.mass()
	var chol mat.Cholesky
	if whole != nil && !chol.Factorize(mat.NewSymDense(N, whole)) {
		return outOfRange()
	}
	right := mat.NewVecDense(max(N, 1), nil)
	for k := range inputs {
		if !f.push(k, right.RawVector().Data) {
			continue
		}
		if whole != nil {
			// The factorisation has judged the matrix; its condition is not an error.
			_ = chol.SolveVecTo(right, right)
		}
		for c := range f.kick {
			f.kick[c][k] = right.AtVec(c)
			if whole == nil {
				f.kick[c][k] /= diagonal[c]
			}
		}
	}
	return nil
}

// push writes Nᵀ L M of input k and tells whether any of it is not 0.
func (f *flows) push(k int, right []float64) bool {
	clear(right)
	some := false
	for b, row := range f.plan.n {
		v := f.plan.m[b][k] * f.p.L[b]
		if v == 0 {
			continue
		}
		for c, x := range row {
			right[c] += x * v
			some = some || x != 0
		}
	}
	return some
}
