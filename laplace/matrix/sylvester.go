package matrix

import "math"

// sylvester solves A X − X B = R for small quasi upper triangular A (p×p) and B
// (q×q); R (p×q) is overwritten by X. Where A and B share an eigenvalue the
// result is large or not finite, never a panic.
//
// Method: R. H. Bartels, G. W. Stewart, Commun. ACM 15 (1972) 820, on the 1×1 and
// 2×2 diagonal blocks.
func sylvester(p int, a []float64, q int, b []float64, r []float64) {
	if p == 1 && q == 1 {
		r[0] /= a[0] - b[0]
		return
	}
	rows, cols := atomsOf(p, a), atomsOf(q, b)
	for l := 0; l+1 < len(cols); l++ {
		j0, j1 := cols[l], cols[l+1]
		for k := len(rows) - 2; k >= 0; k-- {
			i0, i1 := rows[k], rows[k+1]
			for i := i0; i < i1; i++ {
				for j := j0; j < j1; j++ {
					s := r[i*q+j]
					for m := i1; m < p; m++ {
						s -= a[i*p+m] * r[m*q+j]
					}
					for m := 0; m < j0; m++ {
						s += r[i*q+m] * b[m*q+j]
					}
					r[i*q+j] = s
				}
			}
			sylvesterAtom(i1-i0, a[i0*p+i0:], p, j1-j0, b[j0*q+j0:], q, r[i0*q+j0:], q)
		}
	}
}

// sylvesterAtom solves the same for blocks of one or two rows and columns, as at
// most four linear equations with pivoting.
func sylvesterAtom(p int, a []float64, lda, q int, b []float64, ldb int, r []float64, ldr int) {
	if p == 1 && q == 1 {
		r[0] /= a[0] - b[0]
		return
	}
	var m [4][5]float64
	n := p * q
	for i := 0; i < p; i++ {
		for j := 0; j < q; j++ {
			row := &m[i*q+j]
			for k := 0; k < p; k++ {
				row[k*q+j] += a[i*lda+k]
			}
			for k := 0; k < q; k++ {
				row[i*q+k] -= b[k*ldb+j]
			}
			row[4] = r[i*ldr+j]
		}
	}
	for k := 0; k < n; k++ {
		best := k
		for i := k + 1; i < n; i++ {
			if math.Abs(m[i][k]) > math.Abs(m[best][k]) {
				best = i
			}
		}
		m[k], m[best] = m[best], m[k]
		for i := k + 1; i < n; i++ {
			f := m[i][k] / m[k][k]
			for j := k + 1; j < n; j++ {
				m[i][j] -= f * m[k][j]
			}
			m[i][4] -= f * m[k][4]
		}
	}
	for k := n - 1; k >= 0; k-- {
		s := m[k][4]
		for j := k + 1; j < n; j++ {
			s -= m[k][j] * m[j][4]
		}
		m[k][4] = s / m[k][k]
	}
	for i := 0; i < p; i++ {
		for j := 0; j < q; j++ {
			r[i*ldr+j] = m[i*q+j][4]
		}
	}
}
