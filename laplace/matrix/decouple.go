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
	rootLimit   = 1e10 // of the same where only the poles are asked for
	aboutZero   = 0x1p-20
)

// decoupling is T U = U D for a quasi upper triangular T of n states: U is unit
// upper triangular and D couples only atoms of one cluster.
type decoupling struct {
	n, ld    int
	ut       []float64 // Uᵀ, n rows of ld entries, like T and D
	d        []float64
	cluster  []int // of each atom
	size     float64
	tooLarge [][2]int // pairs of atoms coupled by more than limit

	limit   float64 // of size
	members []int   // of each cluster, their number
	sums, r []float64
}

// stride is the room for a row of n entries whose tail is read in fours.
func stride(n int) int { return (n+3)&^3 + 4 }

// decouple groups the atoms of t, n rows of stride ld ≥ n+3 with zeros beyond, by their eigenvalues and uncouples the groups.
// poles lists the eigenvalues, those of an atom at its rows; linked(i, j), i > j, tells whether t couples two atoms, directly or through others;
// those it does not couple need not share a block; nil: all do. level[k] is the size of a unit
// of atom k in common terms: entries of U are judged in them. While one is above
// 1e3, the groups it couples are joined, those with the nearest poles first: nearest
// relative to themselves, poles about 0 relative to 1e-6 of the largest, since a
// repeated pole at 0 is computed as several about it.
//
// Method: C. A. Bavely, G. W. Stewart, SIAM J. Numer. Anal. 16 (1979) 359,
// without their reordering: a diagonal entry of T appears in D unchanged, so
// that poles known exactly stay exact and equal ones equal.
func (u *decoupling) decouple(n, ld int, t []float64, start []int, poles []complex128, level []float64, linked func(i, j int) bool) {
	u.n, u.ld = n, ld
	u.group(start, poles, linked)
	floor := 0.0
	for _, p := range poles {
		floor = max(floor, aboutZero*cabs(p))
	}
	for {
		u.solve(t, start, level)
		if len(u.tooLarge) == 0 {
			return
		}
		least := math.Inf(1)
		for _, p := range u.tooLarge {
			least = min(least, gap(polesOf(start, poles, p[0]), polesOf(start, poles, p[1]), floor))
		}
		for _, p := range u.tooLarge {
			if gap(polesOf(start, poles, p[0]), polesOf(start, poles, p[1]), floor) <= groupGrowth*least {
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

// gap is the least distance between poles, relative to the larger of the two or to
// floor; a pole and its conjugate count as one.
func gap(p, q []complex128, floor float64) float64 {
	least := math.Inf(1)
	for _, a := range p {
		for _, b := range q {
			d := math.Hypot(real(a)-real(b), math.Abs(imag(a))-math.Abs(imag(b)))
			if d > 0 {
				d /= max(floor, cabs(a), cabs(b))
			}
			least = min(least, d)
		}
	}
	return least
}

// polesOf lists the poles of atom a.
func polesOf(start []int, poles []complex128, a int) []complex128 {
	return poles[start[a]:start[a+1]]
}

// group numbers the clusters of linked poles with relative gaps of at most
// groupTol, a pole and its conjugate counting as one.
func (u *decoupling) group(start []int, poles []complex128, linked func(i, j int) bool) {
	atoms := len(start) - 1
	u.cluster = resized(u.cluster, atoms)
	for i := range u.cluster {
		u.cluster[i] = i
	}
	for i := 0; i < atoms; i++ {
		p := polesOf(start, poles, i)
		for j := 0; j < i; j++ {
			if u.cluster[i] != u.cluster[j] && near(p, polesOf(start, poles, j), groupTol) && (linked == nil || linked(i, j)) {
				join(u.cluster, i, j)
			}
		}
	}
}

// near reports a pole of p and one of q with a relative gap of at most tol; those
// below the real axis are left out, their conjugates stand for them.
func near(p, q []complex128, tol float64) bool {
	for _, a := range p {
		if imag(a) < 0 {
			continue
		}
		for _, b := range q {
			if imag(b) < 0 {
				continue
			}
			re, im := math.Abs(real(a)-real(b)), math.Abs(math.Abs(imag(a))-math.Abs(imag(b)))
			reach := tol * (max(math.Abs(real(a)), math.Abs(real(b))) + max(math.Abs(imag(a)), math.Abs(imag(b))))
			if re > reach || im > reach {
				continue // the modulus is no larger than the reach takes it
			}
			if math.Hypot(re, im) <= tol*max(cabs(a), cabs(b)) {
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

// groupRows is the number of rows that take their sums over what is solved already
// at once.
const groupRows = 8

// solve fills U and D column by column, from the diagonal upwards.
func (u *decoupling) solve(t []float64, start []int, level []float64) {
	n, ld := u.n, u.ld
	u.ut, u.d = resized(u.ut, n*ld), resized(u.d, n*ld)
	clear(u.ut)
	clear(u.d)
	u.size, u.tooLarge = 0, u.tooLarge[:0]
	u.countClusters()
	for b := 0; b+1 < len(start); b++ {
		j0, j1 := start[b], start[b+1]
		for j := j0; j < j1; j++ {
			u.ut[j*ld+j] = 1
			copy(u.d[j*ld+j0:j*ld+j1], t[j*ld+j0:j*ld+j1])
		}
		for a := b - 1; a >= 0; { // atoms first to a are a group
			first := a
			for first > 0 && start[a+1]-start[first-1] <= groupRows {
				first--
			}
			u.gather(t, start[first], start[a+1], j0, j1)
			for end := start[a+1]; a >= first; a-- {
				u.atom(t, start, a, b, start[first], end, level)
			}
		}
	}
}

func (u *decoupling) countClusters() {
	u.members = resized(u.members, len(u.cluster))
	clear(u.members)
	for _, c := range u.cluster {
		u.members[c]++
	}
}

// gather sets sums to Σ T[i,k] U[k,j] over the rows from end to j, for rows from
// first to end.
func (u *decoupling) gather(t []float64, first, end, j0, j1 int) {
	ld, rows := u.ld, end-first
	u.sums = resized(u.sums, (j1-j0)*rows)
	for j := j0; j < j1; j++ { // U is 0 beyond its column: the rest of the last four does not count
		dotRows(t[first*ld+end:], ld, rows, (j1-end+3)&^3, u.ut[j*ld+end:], u.sums[(j-j0)*rows:])
	}
}

// atom solves for atom a of the columns of atom b, a being one of a group of rows
// first to end whose sums are gathered.
func (u *decoupling) atom(t []float64, start []int, a, b, first, end int, level []float64) {
	ld := u.ld
	i0, i1, j0, j1 := start[a], start[a+1], start[b], start[b+1]
	p, q := i1-i0, j1-j0
	u.r = resized(u.r, p*q)
	r := u.r
	some := false
	for j := j0; j < j1; j++ {
		row, sums := u.ut[j*ld:j*ld+ld], u.sums[(j-j0)*(end-first):]
		for i := i0; i < i1; i++ {
			s := sums[i-first]
			for k := i1; k < end; k++ {
				s += t[i*ld+k] * row[k]
			}
			if u.members[u.cluster[b]] > 1 {
				s -= u.within(i, j, a, b, start)
			}
			r[(i-i0)*q+j-j0] = -s
			some = some || s != 0
		}
	}
	if !some {
		return
	}
	if u.cluster[a] == u.cluster[b] {
		for i := i0; i < i1; i++ {
			for j := j0; j < j1; j++ {
				u.d[i*ld+j] = -r[(i-i0)*q+j-j0]
			}
		}
		return
	}
	if size := u.column(t, i0, p, j0, q, r) * level[a] / level[b]; size <= u.limit {
		u.size = max(u.size, size)
	} else { // NaN too
		u.tooLarge = append(u.tooLarge, [2]int{a, b})
	}
}

// within is the part of the right-hand side that the cluster of b brings: the
// sum of U[i,c]·D[c,j] over its atoms c between a and b.
func (u *decoupling) within(i, j, a, b int, start []int) (s float64) {
	for c := a + 1; c < b; c++ {
		if u.cluster[c] == u.cluster[b] {
			for k := start[c]; k < start[c+1]; k++ {
				s += u.ut[k*u.ld+i] * u.d[k*u.ld+j]
			}
		}
	}
	return s
}

// column solves for one atom of U and returns its largest entry.
func (u *decoupling) column(t []float64, i0, p, j0, q int, r []float64) (size float64) {
	ld := u.ld
	if p <= 2 && q <= 2 {
		sylvesterAtom(p, t[i0*ld+i0:], ld, q, t[j0*ld+j0:], ld, r, q)
	} else {
		sylvester(p, submatrix(t, ld, i0, p), q, submatrix(t, ld, j0, q), r)
	}
	for i := 0; i < p; i++ {
		for j := 0; j < q; j++ {
			u.ut[(j0+j)*ld+i0+i] = r[i*q+j]
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

// clusters lists the atoms of each cluster, clusters in order of their first atom.
func (u *decoupling) clusters() [][]int {
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
