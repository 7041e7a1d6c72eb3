package matrix

import (
	"math"

	blaslib "gonum.org/v1/gonum/blas"
)

const (
	refineSmall = 16    // up to this size a second look is cheap:
	refineTight = 1e-13 // X and W are refined where a pole may be worse than this, relative,
	refineLight = 1e-12 // above it where worse than this; else D alone is
	refineSteps = 5
	refineFrom  = 0.25 // largest first correction that is trusted
	refineTo    = 1e-7 // a correction below this is squared away by the step it makes
)

// refine corrects D, X and W of M = hi + lo by Newton's method for all blocks at
// once, the residual in doubled precision. Where it does not settle it reports
// false and everything stays as it was, with the wider radius.
//
// Method: J. J. Dongarra, C. B. Moler, J. H. Wilkinson, SIAM J. Numer. Anal. 20
// (1983) 23, for invariant subspaces in place of single vectors.
func (g *eigenblocks) refine(a *scaledMatrix, w *BlockWork) bool {
	m := g.m
	rows, cols := &w.rows, &w.cols
	rows.set(m, a.hi, a.lo, false)
	r, e, res := w.free(m)
	w.low = resized(w.low, m)
	tol := refineLight
	if m <= refineSmall {
		tol = refineTight
	}
	if g.good(tol) {
		g.rayleigh(rows, w, e, res)
		return true
	}
	cols.set(m, a.hi, a.lo, true)
	w.kept.copyFrom(g)
	norm := norm2(a.hi)
	for step := 0; step < refineSteps; step++ {
		rows.residual(m, res, g.x, g.d, w.low, g.start, false)
		blas.Dgemm(blaslib.Trans, blaslib.NoTrans, m, m, m, 1, g.wt, m, res, m, 0, r, m)
		size := g.correction(e, r, -1)
		if !(size < refineFrom) {
			break
		}
		g.bound(r, e, norm)
		g.update(r)
		fine := g.good(4 * eps)
		addProduct(m, g.x, e, blaslib.NoTrans, res)
		cols.residual(m, res, g.wt, g.d, w.low, g.start, true)
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
	g.copyFrom(&w.kept)
	return false
}

func cloned(a []float64) []float64 { return append([]float64(nil), a...) }

// copyFrom makes g equal to o, in storage of its own.
func (g *eigenblocks) copyFrom(o *eigenblocks) {
	g.m, g.coupling = o.m, o.coupling
	g.x, g.wt, g.d = append(g.x[:0], o.x...), append(g.wt[:0], o.wt...), append(g.d[:0], o.d...)
	g.start, g.radius = append(g.start[:0], o.start...), append(g.radius[:0], o.radius...)
}

// good reports whether every pole's estimated error is below tol, relative.
func (g *eigenblocks) good(tol float64) bool {
	for a, r := range g.radius {
		at := g.start[a] * (g.m + 1)
		switch g.start[a+1] - g.start[a] {
		case 1:
			if !(r <= tol*math.Abs(g.d[at])) {
				return false
			}
		case 2:
			if !(r <= tol*least2(g.d[at], g.d[at+1], g.d[at+g.m], g.d[at+g.m+1])) {
				return false
			}
		default:
			p, d := g.block(a)
			for _, v := range eigenvalues(p, d) {
				if !(r <= tol*cabs(v)) {
					return false
				}
			}
		}
	}
	return true
}

// least2 is the smaller modulus of the eigenvalues of [a b; c d], within rounding of
// the larger one.
func least2(a, b, c, d float64) float64 {
	half, mean := (a-d)/2, (a+d)/2
	disc := half*half + b*c
	if disc < 0 {
		return math.Hypot(mean, math.Sqrt(-disc))
	}
	return math.Abs(a*d-b*c) / (math.Abs(mean) + math.Sqrt(disc))
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
	g.radius = g.conditions(g.radius)
	for a := range g.radius {
		var s, size float64
		for i := g.start[a]; i < g.start[a+1]; i++ {
			for k := g.start[a]; k < g.start[a+1]; k++ {
				size = max(size, math.Abs(g.d[i*m+k]))
				for j := 0; j < m; j++ {
					s += math.Abs(r[i*m+j] * e[j*m+k])
				}
			}
		}
		g.radius[a] = 2*s + eps*size + 4*float64(m)*eps*eps*norm*g.radius[a]
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
