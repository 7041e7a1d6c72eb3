package matrix

import "math"

// householder brings Y to two diagonals, Y = U B Vᵀ, by reflections from both
// sides.
//
// The rows of Y are graded: row k has the size of the k-th pivot. Reflections
// from the right keep the error of each row relative to that row. Those from
// the left do so as long as they subtract from a row nothing much larger than
// itself; choosing as pivot the row with the largest entry of the column sees
// to that, and growth measures whether it did.
//
// Source of reflections on row-graded matrices: Cox, Higham, Stability of
// Householder QR factorization for weighted least squares problems, in:
// Numerical Analysis 1997, Longman 1998, 57-73. That grading and pivoting are
// enough in a two-sided reduction is not a theorem, hence the guard.
type householder struct {
	row    []float64 // norm each row began with
	col    []float64 // the column to reflect
	x, v   []float64 // reflection of rows: this one, the one before
	t      []float64
	u, w   []float64 // reflection of columns, and what v subtracts
	sum    []float64
	growth float64
}

func (h *householder) size(rows, n int) {
	h.row, h.col = resized(h.row, rows), resized(h.col, rows)
	h.x, h.v, h.t = resized(h.x, rows), resized(h.v, rows), resized(h.t, rows)
	h.u, h.w, h.sum = resized(h.u, n+padding), resized(h.w, n+padding), resized(h.sum, n+padding)
	for _, s := range [][]float64{h.u, h.w, h.sum} {
		clear(s[n:])
	}
}

// reduce overwrites the rows × n matrix a with rubble and sets d and e. n is
// rows, or rows+1 and then e is as long as d. The vectors right become Vᵀ
// right, those of left Uᵀ left. It stops early, with growth beyond limit,
// where a row has grown by more.
//
// At the top of step k the block [k:, k:] lacks the update −(v wᵀ + t uᵀ) of
// the step before. One pass over the block forms its product with u, a second
// updates it and forms the product with the next v: two readings of the block
// per step instead of four.
func (h *householder) reduce(t *network, d, e []float64, right, left [][]float64, limit float64) {
	rows, n, ld := t.rows, t.n, t.stride
	h.size(rows, n)
	h.norms(t)
	h.growth = 1
	for i := range rows { // nothing pending; the first column is that of a triangle
		h.v[i], h.t[i] = 0, 0
	}
	clear(h.u)
	clear(h.w)
	for k := range rows {
		h.column(t, k)
		p := k
		for i := k + 1; i < rows; i++ {
			if math.Abs(h.col[i]) > math.Abs(h.col[p]) {
				p = i
			}
		}
		h.swap(t, k, p, left)
		beta := 0.0
		d[k], beta = reflection(h.col[k:rows], h.x[k:rows])
		for _, y := range left {
			reflect(y[k:rows], h.x[k:rows], beta)
		}
		if k+1 == n {
			return
		}
		// From here on columns are those from k+1.
		cols := n - k - 1
		wide := (cols + padding - 1) &^ (padding - 1)
		block := t.a[k*ld+k+1:]
		updateRows(block, ld, rows-k, wide, h.v[k:], h.w[k+1:], h.t[k:], h.u[k+1:], h.x[k:], h.sum[k+1:])
		h.v, h.x = h.x, h.v
		top := block[:cols]
		w := h.w[k+1 : k+1+cols]
		size := 0.0
		for j := range w {
			w[j] = beta * h.sum[k+1+j]
			size += w[j] * w[j]
			top[j] -= w[j]
		}
		h.watch(k, rows, math.Sqrt(size))
		if h.growth > limit {
			return
		}
		var gamma float64
		e[k], gamma = reflection(top, h.u[k+1:k+1+cols])
		for _, z := range right {
			reflect(z[k+1:n], h.u[k+1:n], gamma)
		}
		if k+1 == rows {
			return
		}
		dotRows(t.a[(k+1)*ld+k+1:], ld, rows-k-1, wide, h.u[k+1:], h.t[k+1:])
		wu := 0.0
		for j := range w {
			wu += w[j] * h.u[k+1+j]
		}
		for i := k + 1; i < rows; i++ {
			h.t[i] = gamma * (h.t[i] - h.v[i]*wu)
		}
	}
}

// norms keeps the norm of each row of Y.
func (h *householder) norms(t *network) {
	for i := range t.rows {
		s := 0.0
		for _, y := range t.a[i*t.stride+i : i*t.stride+t.n] {
			s += y * y
		}
		h.row[i] = math.Sqrt(s)
	}
}

// column forms column k of the updated block.
func (h *householder) column(t *network, k int) {
	w, u := h.w[k], h.u[k]
	for i := k; i < t.rows; i++ {
		h.col[i] = t.a[i*t.stride+k] - (h.v[i]*w + h.t[i]*u)
	}
}

// swap exchanges rows k and p of all that has rows.
func (h *householder) swap(t *network, k, p int, left [][]float64) {
	if k == p {
		return
	}
	x, y := t.a[k*t.stride+k:k*t.stride+t.n], t.a[p*t.stride+k:p*t.stride+t.n]
	for j := range x {
		x[j], y[j] = y[j], x[j]
	}
	for _, s := range [...][]float64{h.row, h.col, h.v, h.t} {
		s[k], s[p] = s[p], s[k]
	}
	for _, s := range left {
		s[k], s[p] = s[p], s[k]
	}
}

// watch records the growth of the step that subtracted v_i w from each row.
func (h *householder) watch(k, rows int, w float64) {
	for i := k; i < rows; i++ {
		if g := math.Abs(h.v[i]) * w; g > h.growth*h.row[i] {
			h.growth = g / h.row[i]
		}
	}
}

// reflection finds v (v[0] = 1) and β such that (1 − β v vᵀ) x = (α, 0, …).
func reflection(x, v []float64) (alpha, beta float64) {
	v = v[:len(x)]
	v[0] = 1
	rest := 0.0
	for _, y := range x[1:] {
		rest += y * y
	}
	if rest == 0 {
		clear(v[1:])
		return x[0], 0
	}
	norm := math.Sqrt(x[0]*x[0] + rest)
	alpha = -math.Copysign(norm, x[0])
	head := x[0] - alpha // no cancellation: the signs differ
	inverse := 1 / head
	for i := 1; i < len(x); i++ {
		v[i] = x[i] * inverse
	}
	return alpha, -head / alpha
}

// reflect replaces x by (1 − β v vᵀ) x.
func reflect(x, v []float64, beta float64) {
	if beta == 0 {
		return
	}
	v = v[:len(x)]
	s := 0.0
	for i := range x {
		s += v[i] * x[i]
	}
	s *= beta
	for i := range x {
		x[i] -= s * v[i]
	}
}
