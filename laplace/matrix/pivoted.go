package matrix

import "math"

// pivoted is the factorisation P A Q = L U of a small dense matrix with
// complete pivoting.
//
// Source: Golub, Van Loan, Matrix Computations, 4th ed., Johns Hopkins 2013,
// section 3.4.8.
type pivoted struct {
	n, rank  int
	a        []float64 // L below the diagonal, U from it on
	scale    []float64 // factor of each row of the matrix as it was given
	row, col []int     // place → row, column
}

// rankTolerance is the size of a pivot, per row of the matrix, below which it
// is taken for a rounding error; the entries are at most 1.
const rankTolerance = 8 * eps

// factorPivoted factorises a, n×n row-major, whose row i has been multiplied
// by scale[i], and keeps it.
func factorPivoted(n int, a, scale []float64) *pivoted {
	p := &pivoted{n: n, a: a, scale: scale, row: make([]int, n), col: make([]int, n)}
	for i := range n {
		p.row[i], p.col[i] = i, i
	}
	for k := range n {
		r, c := p.largest(k)
		p.swap(k, r, c)
		pivot := a[k*n+k]
		if !(math.Abs(pivot) > rankTolerance*float64(n)) {
			return p
		}
		p.rank++
		for i := k + 1; i < n; i++ {
			f := a[i*n+k] / pivot
			a[i*n+k] = f
			for j := k + 1; j < n; j++ {
				a[i*n+j] -= f * a[k*n+j]
			}
		}
	}
	return p
}

func (p *pivoted) largest(k int) (r, c int) {
	r, c = k, k
	for i := k; i < p.n; i++ {
		for j := k; j < p.n; j++ {
			if math.Abs(p.a[i*p.n+j]) > math.Abs(p.a[r*p.n+c]) {
				r, c = i, j
			}
		}
	}
	return r, c
}

func (p *pivoted) swap(k, r, c int) {
	n := p.n
	for j := range n {
		p.a[k*n+j], p.a[r*n+j] = p.a[r*n+j], p.a[k*n+j]
	}
	for i := range n {
		p.a[i*n+k], p.a[i*n+c] = p.a[i*n+c], p.a[i*n+k]
	}
	p.row[k], p.row[r] = p.row[r], p.row[k]
	p.col[k], p.col[c] = p.col[c], p.col[k]
}

// solve replaces f by the solution of A x = f, A of full rank.
func (p *pivoted) solve(f []float64) {
	n := p.n
	y := make([]float64, n)
	for k := range n {
		y[k] = f[p.row[k]] * p.scale[p.row[k]]
		for j := range k {
			y[k] -= p.a[k*n+j] * y[j]
		}
	}
	p.upper(y, n)
	for k, c := range p.col {
		f[c] = y[k]
	}
}

// upper replaces the first m of y by the solution of the leading part of U.
func (p *pivoted) upper(y []float64, m int) {
	for k := m - 1; k >= 0; k-- {
		for j := k + 1; j < m; j++ {
			y[k] -= p.a[k*p.n+j] * y[j]
		}
		y[k] /= p.a[k*p.n+k]
	}
}

// solveTransposed replaces f by the solution of Aᵀ x = f.
func (p *pivoted) solveTransposed(f []float64) {
	n := p.n
	y := make([]float64, n)
	for k := range n {
		y[k] = f[p.col[k]]
		for j := range k {
			y[k] -= p.a[j*n+k] * y[j]
		}
		y[k] /= p.a[k*n+k]
	}
	for k := n - 1; k >= 0; k-- {
		for i := k + 1; i < n; i++ {
			y[k] -= p.a[i*n+k] * y[i]
		}
	}
	for k, r := range p.row {
		f[r] = y[k] * p.scale[r]
	}
}

// null returns a basis of the solutions of A x = 0.
func (p *pivoted) null() [][]float64 {
	var basis [][]float64
	for free := p.rank; free < p.n; free++ {
		y := make([]float64, p.rank)
		for k := range y {
			y[k] = -p.a[k*p.n+free]
		}
		p.upper(y, p.rank)
		x := make([]float64, p.n)
		for k, v := range y {
			x[p.col[k]] = v
		}
		x[p.col[free]] = 1
		basis = append(basis, x)
	}
	return basis
}
