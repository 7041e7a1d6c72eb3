package matrix

import "math"

// padding is the number of zeros kept beyond the end of each row, so that the
// kernels can work in whole groups of four.
const padding = 4

// network is one island on its way from exchanges to the factor Y = Xᵀ with
//
//	C^-½ G C^-½ = X Xᵀ,   G x = what leaves the stores at levels x.
//
// Rows and columns are in the order of elimination.
type network struct {
	n        int
	rows     int // of Y: n, or n−1 where nothing leaks
	stride   int
	a        []float64 // upper triangle: exchanges, then Y
	c, inv   []float64 // capacity and its C^-½
	leak     []float64
	sum      []float64 // of what leaves a store, updated by subtraction: only to choose
	pivot    []float64
	store    []int // place → store of the Balance
	place    []int // store → place, of this island
	grounded bool
}

func (t *network) size(n int) {
	t.stride = (n + 2*padding - 1) &^ (padding - 1)
	t.a = resized(t.a, n*t.stride+padding)
	t.c, t.inv, t.leak = resized(t.c, n), resized(t.inv, n), resized(t.leak, n)
	t.sum, t.pivot = resized(t.sum, n), resized(t.pivot, n)
	t.store, t.place = resized(t.store, n), resized(t.place, n)
}

// begin takes the stores of an island.
func (t *network) begin(b *Balance, stores []int) {
	t.n, t.grounded = len(stores), false
	for k, i := range stores {
		t.store[k] = i
		t.place[i] = k
		t.grounded = t.grounded || b.Leak[i] > 0
	}
	t.rows = t.n
	if !t.grounded {
		t.rows--
	}
}

// load takes the capacities and leaks of the stores in their order, divided by
// 2^c and 2^g.
func (t *network) load(b *Balance, c, g int) {
	down, up := pow2(-c), pow2(-g)
	for k, i := range t.store[:t.n] {
		t.c[k] = b.C[i] * down
		t.leak[k] = b.Leak[i] * up
	}
}

// fill lays the resistances of the island into the upper triangle.
func (t *network) fill(edges []edge, root []int, g int) {
	up := pow2(-g)
	t.stride = (t.n + 2*padding - 1) &^ (padding - 1)
	clear(t.a[:t.n*t.stride+padding])
	copy(t.sum[:t.n], t.leak)
	mine := root[t.store[0]]
	for _, e := range edges {
		if root[e.i] != mine {
			continue
		}
		i, j := t.place[e.i], t.place[e.j]
		v := e.g * up
		t.a[i*t.stride+j] = v // places keep the order of the stores
		t.sum[i] += v
		t.sum[j] += v
	}
}

// eliminate turns the exchanges into Y. Store by store, the one with the
// largest sum/C first, a star is replaced by the mesh that exchanges the same:
// additions, products and quotients of positive numbers only, so that every
// entry keeps its relative accuracy. The pivot is the sum of what is left and
// not a difference; where nothing leaks, the last is the sum of nothing.
//
// Source: Grassmann, Taksar, Heyman, Oper. Res. 33 (1985) 1107-1116; the
// relative accuracy: O'Cinneide, Numer. Math. 65 (1993) 109-120; rank-revealing
// with this pivot: Demmel et al., Linear Algebra Appl. 299 (1999) 21-80.
func (t *network) eliminate() error {
	for k := range t.rows {
		s := t.choose(k)
		if !(s >= minPivot) {
			return ErrRange
		}
		t.pivot[k] = s
		row := t.a[k*t.stride:]
		leak := t.leak[k] / s
		for j := k + 1; j < t.n; j++ {
			g := row[j]
			if g == 0 {
				continue
			}
			t.leak[j] += g * leak
			f := g / s
			t.sum[j] -= f * g
			if end := t.n - j - 1; end > 0 {
				w := (end + padding - 1) &^ (padding - 1)
				addRow(f, row[j+1:j+1+w], t.a[j*t.stride+j+1:j*t.stride+j+1+w])
			}
		}
	}
	t.factor()
	return nil
}

// minPivot is less than any sum within maxSpread.
const minPivot = 0x1p-400

// choose brings the store with the largest sum/C to place k and returns its
// sum, formed anew. Where the running sum had lost its digits, it looks again.
func (t *network) choose(k int) float64 {
	for range t.n {
		p := t.largest(k)
		t.swap(k, p)
		row := t.a[k*t.stride+k+1 : k*t.stride+t.n]
		s := 0.0
		for _, g := range row {
			s += g
		}
		s += t.leak[k]
		if s >= 0.5*t.sum[k] {
			return s
		}
		t.sum[k] = s
	}
	return t.sum[k]
}

// largest returns the place from k on with the largest sum/C.
func (t *network) largest(k int) int {
	p, most := k, -1.0
	for i := k; i < t.n; i++ {
		if q := t.sum[i] / t.c[i]; q > most {
			p, most = i, q
		}
	}
	return p
}

// swap exchanges the places k < p, in the rows already finished too.
func (t *network) swap(k, p int) {
	if k == p {
		return
	}
	ld := t.stride
	for i := range k {
		t.a[i*ld+k], t.a[i*ld+p] = t.a[i*ld+p], t.a[i*ld+k]
	}
	for j := k + 1; j < p; j++ {
		t.a[k*ld+j], t.a[j*ld+p] = t.a[j*ld+p], t.a[k*ld+j]
	}
	for j := p + 1; j < t.n; j++ {
		t.a[k*ld+j], t.a[p*ld+j] = t.a[p*ld+j], t.a[k*ld+j]
	}
	t.c[k], t.c[p] = t.c[p], t.c[k]
	t.leak[k], t.leak[p] = t.leak[p], t.leak[k]
	t.sum[k], t.sum[p] = t.sum[p], t.sum[k]
	t.store[k], t.store[p] = t.store[p], t.store[k]
}

// factor scales the eliminated rows to those of Y = D^-½ [D, −G] C^-½.
func (t *network) factor() {
	for k := range t.n {
		t.inv[k] = 1 / math.Sqrt(t.c[k])
	}
	for k := range t.rows {
		root := math.Sqrt(t.pivot[k])
		row := t.a[k*t.stride : k*t.stride+t.n]
		row[k] = root * t.inv[k]
		f := -1 / root
		for j := k + 1; j < len(row); j++ {
			if row[j] != 0 {
				row[j] *= f * t.inv[j]
			}
		}
	}
}

// solve replaces v by y with X y = v, by forward substitution: rows of Y are
// columns of X. Off the diagonal they are negative, so that a v ≥ 0 meets no
// subtraction.
func (t *network) solve(v []float64) {
	for k := range t.rows {
		row := t.a[k*t.stride:]
		y := v[k] / row[k]
		v[k] = y
		if w := (t.n - k - 1 + padding - 1) &^ (padding - 1); y != 0 && w > 0 {
			addRow(-y, row[k+1:k+1+w], v[k+1:k+1+w])
		}
	}
}

// pow2 returns 2^e.
func pow2(e int) float64 { return math.Ldexp(1, e) }

const maxFinite = math.MaxFloat64
