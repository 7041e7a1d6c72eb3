package matrix

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/lapack"
	lapackgonum "gonum.org/v1/gonum/lapack/gonum"
)

// ErrNoConvergence reports an eigenvalue iteration that gave up.
var ErrNoConvergence = errors.New("matrix: the eigenvalues did not converge")

// schur returns T and orthogonal Q with a = Q T Qᵀ, T quasi upper triangular in
// canonical form. a is overwritten by T. Every entry must be finite.
func schur(n int, a []float64) (t, q []float64, err error) {
	var impl lapackgonum.Implementation
	q = make([]float64, n*n)
	if n == 1 {
		q[0] = 1
		return a, q, nil
	}
	tau := make([]float64, n-1)
	work := make([]float64, max(1, 11*n, n*32))
	impl.Dgehrd(n, 0, n-1, a, n, tau, work, len(work))
	copy(q, a)
	impl.Dorghr(n, 0, n-1, q, n, tau, work, len(work))
	for i := 2; i < n; i++ {
		clear(a[i*n : i*n+i-1])
	}
	wr, wi := make([]float64, n), make([]float64, n)
	if impl.Dhseqr(lapack.EigenvaluesAndSchur, lapack.SchurOrig, n, 0, n-1, a, n, wr, wi, q, n, work, len(work)) != 0 {
		return nil, nil, ErrNoConvergence
	}
	return a, q, nil
}

// atomsOf returns where the 1×1 and 2×2 diagonal blocks of a quasi triangular
// matrix begin, closed by n.
func atomsOf(n int, t []float64) []int {
	start := make([]int, 0, n+1)
	for i := 0; i < n; i++ {
		start = append(start, i)
		if i+1 < n && t[(i+1)*n+i] != 0 {
			i++
		}
	}
	return append(start, n)
}

// eigen2 returns the eigenvalues of [a b; c d]: two reals, the larger in modulus
// first, or a pair re ± i·im with im > 0.
func eigen2(a, b, c, d float64) (p, q complex128) {
	half := toDD(a).sub(toDD(d)).scale(0.5)
	disc := half.mul(half).add(toDD(b).mul(toDD(c)))
	mean := toDD(a).add(toDD(d)).scale(0.5)
	if disc.hi < 0 {
		im := disc.neg().sqrt().float()
		return complex(mean.float(), im), complex(mean.float(), -im)
	}
	r := disc.sqrt()
	if mean.hi < 0 {
		r = r.neg()
	}
	big := mean.add(r)
	if big.zero() {
		return 0, 0
	}
	det := toDD(a).mul(toDD(d)).sub(toDD(b).mul(toDD(c)))
	return complex(big.float(), 0), complex(det.div(big).float(), 0)
}

// eigenvalues of a quasi triangular block.
func eigenvalues(n int, t []float64) []complex128 {
	v := make([]complex128, 0, n)
	start := atomsOf(n, t)
	for k := 0; k+1 < len(start); k++ {
		i := start[k]
		if start[k+1]-i == 1 {
			v = append(v, complex(t[i*n+i], 0))
			continue
		}
		p, q := eigen2(t[i*n+i], t[i*n+i+1], t[(i+1)*n+i], t[(i+1)*n+i+1])
		v = append(v, p, q)
	}
	return v
}

// norm2 is the Frobenius norm, safe against overflow.
func norm2(a []float64) float64 {
	var s, m float64
	for _, v := range a {
		m = math.Max(m, math.Abs(v))
	}
	if m == 0 {
		return 0
	}
	for _, v := range a {
		s += (v / m) * (v / m)
	}
	return m * math.Sqrt(s)
}
