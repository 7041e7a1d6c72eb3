package matrix

import (
	"math"

	"gonum.org/v1/gonum/blas/gonum"
)

var blas gonum.Implementation

const (
	groupTol    = 1e-3 // poles closer than this, relative, share a block
	groupGrowth = 4    // range of gaps that are closed at once where the coupling is too large
	maxCoupling = 1e3  // of the transformation that uncouples
)

// decoupling is T U = U D for a quasi upper triangular T of n states: U is unit
// upper triangular and D couples only atoms of one cluster.
type decoupling struct {
	n        int
	ut       []float64 // Uᵀ, row-major
	d        []float64
	cluster  []int // of each atom
	size     float64
	tooLarge [][2]int // pairs of atoms coupled by more than maxCoupling
}

// decouple groups the atoms of t by their eigenvalues and uncouples the groups.
// linked(i, j), i > j, tells whether t couples two atoms, directly or through others;
// those it does not couple need not share a block. level[k] is the size of a unit
// of atom k in common terms: entries of U are judged in them. While one is above
// 1e3, the groups it couples are joined, those with the nearest poles first.
//
// Method: C. A. Bavely, G. W. Stewart, SIAM J. Numer. Anal. 16 (1979) 359,
// without their reordering: a diagonal entry of T appears in D unchanged, so
// that poles known exactly stay exact and equal ones equal.
func decouple(n int, t []float64, start []int, poles [][]complex128, level []float64, linked func(i, j int) bool) *decoupling {
	u := &decoupling{n: n, cluster: group(poles, groupTol, linked)}
	for {
		u.solve(t, start, level)
		if len(u.tooLarge) == 0 {
			return u
		}
		least := math.Inf(1)
		for _, p := range u.tooLarge {
			least = math.Min(least, gap(poles[p[0]], poles[p[1]]))
		}
		for _, p := range u.tooLarge {
			if gap(poles[p[0]], poles[p[1]]) <= groupGrowth*least {
				join(u.cluster, p[0], p[1])
			}
		}
	}
}

// join gives the clusters of atoms i and j one number.
func join(cluster []int, i, j int) {
	from, to := max(cluster[i], cluster[j]), min(cluster[i], cluster[j])
	for k, c := range cluster {
		if c == from {
			cluster[k] = to
		}
	}
}

// gap is the least distance between poles, relative to the larger of the two; a
// pole and its conjugate count as one.
func gap(p, q []complex128) float64 {
	least := math.Inf(1)
	for _, a := range p {
		for _, b := range q {
			d := math.Hypot(real(a)-real(b), math.Abs(imag(a))-math.Abs(imag(b)))
			if d > 0 {
				d /= math.Max(cabs(a), cabs(b))
			}
			least = math.Min(least, d)
		}
	}
	return least
}

// group numbers the clusters of linked poles with relative gaps of at most tol, a
// pole and its conjugate counting as one.
func group(poles [][]complex128, tol float64, linked func(i, j int) bool) []int {
	id := make([]int, len(poles))
	for i := range id {
		id[i] = i
	}
	for i := range poles {
		for j := 0; j < i; j++ {
			if id[i] != id[j] && linked(i, j) && near(poles[i], poles[j], tol) {
				join(id, i, j)
			}
		}
	}
	return id
}

func near(p, q []complex128, tol float64) bool {
	for _, a := range p {
		for _, b := range q {
			re, im := math.Abs(real(a)-real(b)), math.Abs(math.Abs(imag(a))-math.Abs(imag(b)))
			reach := tol * (math.Max(math.Abs(real(a)), math.Abs(real(b))) + math.Max(math.Abs(imag(a)), math.Abs(imag(b))))
			if re > reach || im > reach {
				continue // the modulus is no larger than the reach takes it
			}
			if math.Hypot(re, im) <= tol*math.Max(cabs(a), cabs(b)) {
				return true
			}
		}
	}
	return false
}

func cabs(a complex128) float64 {
	if imag(a) == 0 {
		return math.Abs(real(a))
	}
	return math.Hypot(real(a), imag(a))
}

// solve fills U and D column by column, from the diagonal upwards.
func (u *decoupling) solve(t []float64, start []int, level []float64) {
	n := u.n
	u.ut, u.d, u.size, u.tooLarge = make([]float64, n*n), make([]float64, n*n), 0, nil
	var r []float64
	for b := 0; b+1 < len(start); b++ {
		j0, j1 := start[b], start[b+1]
		q := j1 - j0
		for j := j0; j < j1; j++ {
			u.ut[j*n+j] = 1
			copy(u.d[j*n+j0:j*n+j1], t[j*n+j0:j*n+j1])
		}
		for a := b - 1; a >= 0; a-- {
			i0, i1 := start[a], start[a+1]
			p := i1 - i0
			r = r[:0]
			some := false
			for i := i0; i < i1; i++ {
				for j := j0; j < j1; j++ {
					s := blas.Ddot(j1-i1, t[i*n+i1:], 1, u.ut[j*n+i1:], 1)
					s -= u.within(i, j, a, b, start)
					r = append(r, s)
					some = some || s != 0
				}
			}
			if !some {
				continue
			}
			if u.cluster[a] == u.cluster[b] {
				for i := i0; i < i1; i++ {
					copy(u.d[i*n+j0:i*n+j1], r[(i-i0)*q:])
				}
				continue
			}
			if size := u.column(t, i0, p, j0, q, r) * level[a] / level[b]; size <= maxCoupling {
				u.size = math.Max(u.size, size)
			} else { // NaN too
				u.tooLarge = append(u.tooLarge, [2]int{a, b})
			}
		}
	}
}

// within is the part of the right-hand side that the cluster of b brings: the
// sum of U[i,c]·D[c,j] over its atoms c between a and b.
func (u *decoupling) within(i, j, a, b int, start []int) (s float64) {
	for c := a + 1; c < b; c++ {
		if u.cluster[c] == u.cluster[b] {
			for k := start[c]; k < start[c+1]; k++ {
				s += u.ut[k*u.n+i] * u.d[k*u.n+j]
			}
		}
	}
	return s
}

// column solves for one atom of U and returns its largest entry.
func (u *decoupling) column(t []float64, i0, p, j0, q int, r []float64) (size float64) {
	n := u.n
	for k := range r {
		r[k] = -r[k]
	}
	if p <= 2 && q <= 2 {
		sylvesterAtom(p, t[i0*n+i0:], n, q, t[j0*n+j0:], n, r, q)
	} else {
		sylvester(p, submatrix(t, n, i0, p), q, submatrix(t, n, j0, q), r)
	}
	for i := 0; i < p; i++ {
		for j := 0; j < q; j++ {
			u.ut[(j0+j)*n+i0+i] = r[i*q+j]
			size = worst(size, r[i*q+j])
		}
	}
	return size
}

// submatrix copies the p×p diagonal block of t that begins at i0.
func submatrix(t []float64, n, i0, p int) []float64 {
	s := make([]float64, p*p)
	for i := 0; i < p; i++ {
		copy(s[i*p:i*p+p], t[(i0+i)*n+i0:])
	}
	return s
}

// members lists the atoms of each cluster, clusters in order of their first atom.
func (u *decoupling) members() [][]int {
	var list [][]int
	where := map[int]int{}
	for a, c := range u.cluster {
		k, ok := where[c]
		if !ok {
			k = len(list)
			where[c] = k
			list = append(list, nil)
		}
		list[k] = append(list[k], a)
	}
	return list
}
