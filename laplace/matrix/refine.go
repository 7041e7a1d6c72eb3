package matrix

import (
	"math"

	blaslib "gonum.org/v1/gonum/blas"
)

// sparseRows holds the rows of a matrix hi + lo without its zeros.
type sparseRows struct {
	ptr, col []int
	hi, lo   []float64
}

func newSparseRows(m int, hi, lo []float64, transposed bool) *sparseRows {
	s := &sparseRows{ptr: make([]int, 1, m+1)}
	for i := 0; i < m; i++ {
		for j := 0; j < m; j++ {
			k := i*m + j
			if transposed {
				k = j*m + i
			}
			if hi[k] != 0 {
				s.col = append(s.col, j)
				s.hi, s.lo = append(s.hi, hi[k]), append(s.lo, lo[k])
			}
		}
		s.ptr = append(s.ptr, len(s.col))
	}
	return s
}

// residual sets r = M X − X D, every entry a compensated sum rounded once. D is
// block diagonal over start; transposed takes Dᵀ.
//
// Method: dot products of T. Ogita, S. M. Rump, S. Oishi, SIAM J. Sci. Comput. 26
// (2005) 1955.
func (s *sparseRows) residual(m int, r, x, d []float64, start []int, transposed bool) {
	low := make([]float64, m)
	for i := 0; i < m; i++ {
		high := r[i*m : i*m+m]
		clear(high)
		clear(low)
		for e := s.ptr[i]; e < s.ptr[i+1]; e++ {
			row := x[s.col[e]*m : s.col[e]*m+m]
			accumulate(high, low, row, s.hi[e], s.lo[e])
		}
		row := x[i*m : i*m+m]
		for a := 0; a+1 < len(start); a++ {
			for k := start[a]; k < start[a+1]; k++ {
				for l := start[a]; l < start[a+1]; l++ {
					v := d[l*m+k]
					if transposed {
						v = d[k*m+l]
					}
					p, f := twoProd(row[l], -v)
					h, g := twoSum(high[k], p)
					high[k] = h
					low[k] += f + g
				}
			}
		}
		for k := range high {
			high[k] += low[k]
		}
	}
}

// accumulate adds (hi+lo)·x to high + low.
func accumulate(high, low, x []float64, hi, lo float64) {
	for k, v := range x {
		p := hi * v
		f := math.FMA(hi, v, -p) + lo*v
		h := high[k] + p
		t := h - high[k]
		low[k] += ((high[k] - (h - t)) + (p - t)) + f
		high[k] = h
	}
}

const (
	refineAlways = 16    // up to this size X and W are refined in any case, above it
	refineLight  = 1e-12 // where a pole may be worse than this, relative; else D alone is
	refineSteps  = 5
	refineFrom   = 0.25 // largest first correction that is trusted
	refineTo     = 1e-7 // a correction below this is squared away by the step it makes
)

// refine corrects D, X and W of M = hi + lo by Newton's method for all blocks at
// once, the residual in doubled precision. Where it does not settle it reports
// false and everything stays as it was, with the wider radius.
//
// Method: J. J. Dongarra, C. B. Moler, J. H. Wilkinson, SIAM J. Numer. Anal. 20
// (1983) 23, for invariant subspaces in place of single vectors.
func (g *eigenblocks) refine(a *scaledMatrix) bool {
	m := g.m
	rows := newSparseRows(m, a.hi, a.lo, false)
	if m > refineAlways && g.good(refineLight) {
		g.rayleigh(rows)
		return true
	}
	cols := newSparseRows(m, a.hi, a.lo, true)
	kept := *g
	kept.x, kept.wt, kept.d = cloned(g.x), cloned(g.wt), cloned(g.d)
	r, e, res := make([]float64, m*m), make([]float64, m*m), make([]float64, m*m)
	norm := norm2(a.hi)
	for step := 0; step < refineSteps; step++ {
		rows.residual(m, res, g.x, g.d, g.start, false)
		blas.Dgemm(blaslib.Trans, blaslib.NoTrans, m, m, m, 1, g.wt, m, res, m, 0, r, m)
		size := g.correction(e, r, -1)
		if !(size < refineFrom) {
			break
		}
		g.bound(r, e, norm)
		g.update(r)
		fine := g.good(4 * eps)
		addProduct(m, g.x, e, blaslib.NoTrans, res)
		cols.residual(m, res, g.wt, g.d, g.start, true)
		blas.Dgemm(blaslib.Trans, blaslib.NoTrans, m, m, m, 1, res, m, g.x, m, 0, r, m)
		if left := g.correction(e, r, 1); !(left < refineFrom) {
			break
		}
		addProduct(m, g.wt, e, blaslib.Trans, res)
		g.normalise()
		g.triangular()
		if size < refineTo && (fine || step == refineSteps-1) {
			return true
		}
	}
	*g = kept
	return false
}

func cloned(a []float64) []float64 { return append([]float64(nil), a...) }

// good reports whether every pole's estimated error is below tol, relative.
func (g *eigenblocks) good(tol float64) bool {
	for a := range g.radius {
		p, d := g.block(a)
		for _, v := range eigenvalues(p, d) {
			if !(g.radius[a] <= tol*cabs(v)) {
				return false
			}
		}
	}
	return true
}

// correction solves D_a E − E D_b = sign·R_ab for every two atoms and returns the
// largest entry; the diagonal blocks of E are 0.
func (g *eigenblocks) correction(e, r []float64, sign float64) (size float64) {
	m := g.m
	clear(e)
	atoms := len(g.start) - 1
	var tmp []float64
	for a := 0; a < atoms; a++ {
		i0, i1 := g.start[a], g.start[a+1]
		for b := 0; b < atoms; b++ {
			j0, j1 := g.start[b], g.start[b+1]
			if a == b {
				continue
			}
			p, q := i1-i0, j1-j0
			if p == 1 && q == 1 {
				v := sign * r[i0*m+j0] / (g.d[i0*m+i0] - g.d[j0*m+j0])
				e[i0*m+j0] = v
				size = worst(size, v)
				continue
			}
			tmp = tmp[:0]
			for i := i0; i < i1; i++ {
				for j := j0; j < j1; j++ {
					tmp = append(tmp, sign*r[i*m+j])
				}
			}
			if p <= 2 && q <= 2 {
				sylvesterAtom(p, g.d[i0*m+i0:], m, q, g.d[j0*m+j0:], m, tmp, q)
			} else {
				sylvester(p, submatrix(g.d, m, i0, p), q, submatrix(g.d, m, j0, q), tmp)
			}
			for i := i0; i < i1; i++ {
				for j := j0; j < j1; j++ {
					v := tmp[(i-i0)*q+j-j0]
					e[i*m+j] = v
					size = worst(size, v)
				}
			}
		}
	}
	return size
}

// worst is the larger modulus; NaN stays.
func worst(a, v float64) float64 {
	if v = math.Abs(v); v > a || math.IsNaN(v) {
		return v
	}
	return a
}

// bound sets the radius left after the correction: what the first order leaves
// out, Σ R_ab E_ba, and the rounding of the products that form R.
func (g *eigenblocks) bound(r, e []float64, norm float64) {
	m := g.m
	for a := range g.radius {
		var s, size float64
		for i := g.start[a]; i < g.start[a+1]; i++ {
			for k := g.start[a]; k < g.start[a+1]; k++ {
				size = math.Max(size, math.Abs(g.d[i*m+k]))
				for j := 0; j < m; j++ {
					s += math.Abs(r[i*m+j] * e[j*m+k])
				}
			}
		}
		g.radius[a] = 2*s + eps*size + 4*float64(m)*eps*eps*norm*g.condition(a)
	}
}

// update adds the diagonal blocks of R to D.
func (g *eigenblocks) update(r []float64) {
	m := g.m
	for a := range g.radius {
		for i := g.start[a]; i < g.start[a+1]; i++ {
			for k := g.start[a]; k < g.start[a+1]; k++ {
				g.d[i*m+k] += r[i*m+k]
			}
		}
	}
}

// addProduct adds x·e, or x·eᵀ, to x.
func addProduct(m int, x, e []float64, t blaslib.Transpose, tmp []float64) {
	copy(tmp, x)
	blas.Dgemm(blaslib.NoTrans, t, m, m, m, 1, tmp, m, e, m, 1, x, m)
}

// normalise makes W_aᵀ X_a = I for every atom.
func (g *eigenblocks) normalise() {
	m := g.m
	for a := range g.radius {
		k0, k1 := g.start[a], g.start[a+1]
		p := k1 - k0
		s := make([]float64, p*p) // sᵀ = W_aᵀ X_a
		for i := 0; i < m; i++ {
			for k := 0; k < p; k++ {
				for l := 0; l < p; l++ {
					s[l*p+k] += g.wt[i*m+k0+k] * g.x[i*m+k0+l]
				}
			}
		}
		inv := inverse(p, s)
		row := make([]float64, p)
		for i := 0; i < m; i++ {
			copy(row, g.wt[i*m+k0:])
			for k := 0; k < p; k++ {
				var v float64
				for l := 0; l < p; l++ {
					v += row[l] * inv[l*p+k]
				}
				g.wt[i*m+k0+k] = v
			}
		}
	}
}

// inverse of a small well-conditioned matrix, by Gauss–Jordan without pivoting.
func inverse(p int, s []float64) []float64 {
	x := make([]float64, p*p)
	for i := 0; i < p; i++ {
		x[i*p+i] = 1
	}
	for k := 0; k < p; k++ {
		f := 1 / s[k*p+k]
		for j := 0; j < p; j++ {
			s[k*p+j] *= f
			x[k*p+j] *= f
		}
		for i := 0; i < p; i++ {
			if h := s[i*p+k]; i != k && h != 0 {
				for j := 0; j < p; j++ {
					s[i*p+j] -= h * s[k*p+j]
					x[i*p+j] -= h * x[k*p+j]
				}
			}
		}
	}
	return x
}

// triangular brings blocks of three and more back to quasi triangular form.
func (g *eigenblocks) triangular() {
	m := g.m
	for a := range g.radius {
		p, d := g.block(a)
		if p < 3 {
			continue
		}
		t, u, err := schur(p, d)
		if err != nil {
			continue
		}
		k0 := g.start[a]
		for i := 0; i < p; i++ {
			copy(g.d[(k0+i)*m+k0:(k0+i)*m+k0+p], t[i*p:i*p+p])
		}
		rotate(m, k0, p, g.x, u)
		rotate(m, k0, p, g.wt, u)
	}
}

// rotate multiplies the columns k0 to k0+p−1 of x by u.
func rotate(m, k0, p int, x, u []float64) {
	row := make([]float64, p)
	for i := 0; i < m; i++ {
		copy(row, x[i*m+k0:i*m+k0+p])
		for k := 0; k < p; k++ {
			var v float64
			for l := 0; l < p; l++ {
				v += row[l] * u[l*p+k]
			}
			x[i*m+k0+k] = v
		}
	}
}
