package matrix

import (
	"errors"
	"math"
)

// ErrNoConvergence reports an iteration for eigenvalues or singular values that gave up.
var ErrNoConvergence = errors.New("matrix: the eigenvalues did not converge")

// schurWork holds a matrix while it is brought to real Schur form, and what
// that needs; the zero value is ready, and a second use allocates nothing where the
// matrix is no larger.
type schurWork struct {
	n, ld   int
	h, qt   []float64 // n+2 rows of ld entries, zeros beyond column n
	vectors []float64 // n rows: Householder vectors
	tau     []float64
	chain   []float64 // reflectors of one sweep

	x, y, sum, scratch, zero, padded, four []float64
}

// schur sets h and qt to T and Qᵀ with a = Q T Qᵀ, Q orthogonal, T quasi upper
// triangular in canonical form. Every entry must be finite.
func (s *schurWork) schur(n int, a []float64) error {
	s.size(n)
	for i := 0; i < n; i++ {
		copy(s.h[i*s.ld:i*s.ld+n], a[i*n:i*n+n])
	}
	s.hessenberg()
	return s.francis()
}

// size makes room for n states, all zero.
func (s *schurWork) size(n int) {
	s.n, s.ld = n, schurStride(n)
	ld := s.ld
	s.h, s.qt = resized(s.h, (n+2)*ld), resized(s.qt, (n+2)*ld)
	clear(s.h)
	s.vectors, s.tau = resized(s.vectors, n*ld), resized(s.tau, n)
	for _, v := range []*[]float64{&s.x, &s.y, &s.sum, &s.scratch, &s.zero} {
		*v = resized(*v, ld)
		clear(*v)
	}
	longest := max(chaseLength+2, chaseWhole) + 3
	s.padded = resized(s.padded, longest*reflectorSize)
	s.four = resized(s.four, 4*(longest+2))
	if s.chain == nil || cap(s.chain) < n*reflectorSize {
		s.chain = make([]float64, 0, n*reflectorSize)
	}
}

// schurStride is stride, but never a multiple of 64: rows a page apart share a few
// lines of the cache.
func schurStride(n int) int {
	ld := stride(n)
	if ld%64 == 0 {
		ld += 8
	}
	return ld
}

// schur returns T and orthogonal Q with a = Q T Qᵀ for a small matrix.
func schur(n int, a []float64) (t, q []float64, err error) {
	var s schurWork
	if err := s.schur(n, a); err != nil {
		return nil, nil, err
	}
	t, q = make([]float64, n*n), make([]float64, n*n)
	for i := 0; i < n; i++ {
		copy(t[i*n:i*n+n], s.h[i*s.ld:])
		for j := 0; j < n; j++ {
			q[i*n+j] = s.qt[j*s.ld+i]
		}
	}
	return t, q, nil
}

// atomsOf returns where the 1×1 and 2×2 diagonal blocks of a quasi triangular
// matrix begin, closed by n.
func atomsOf(n int, t []float64) []int {
	return appendAtoms(make([]int, 0, n+1), n, n, t)
}

// appendAtoms is atomsOf for rows of stride ld.
func appendAtoms(start []int, n, ld int, t []float64) []int {
	for i := 0; i < n; i++ {
		start = append(start, i)
		if i+1 < n && t[(i+1)*ld+i] != 0 {
			i++
		}
	}
	return append(start, n)
}

// eigen2 returns the eigenvalues of [a b; c d]: two reals, the larger in modulus
// first, or a pair re ± i·im with im > 0.
func eigen2(a, b, c, d float64) (p, q complex128) {
	mean, disc := pairTerms(toDD(a), toDD(b), toDD(c), toDD(d))
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
	var s float64
	for _, v := range a {
		s += v * v
	}
	if s > smallSquare && s < 1/smallSquare {
		return math.Sqrt(s)
	}
	var m float64
	for _, v := range a {
		m = math.Max(m, math.Abs(v))
	}
	if m == 0 {
		return 0
	}
	s = 0
	for _, v := range a {
		s += (v / m) * (v / m)
	}
	return m * math.Sqrt(s)
}
