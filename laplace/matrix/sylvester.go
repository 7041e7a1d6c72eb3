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

// sylvesterAtom solves the same for blocks of one or two rows and columns. With B
// shifted to trace 0, its square is −δ, so that (A² + δ) X = A R + R B: one system
// of two equations, A being shifted likewise.
func sylvesterAtom(p int, a []float64, lda, q int, b []float64, ldb int, r []float64, ldr int) {
	switch {
	case p == 1 && q == 1:
		r[0] /= a[0] - b[0]
	case p == 1: // x (a − B) = r
		d := a[0]
		r[0], r[1] = solve2(d-b[0], -b[ldb], -b[1], d-b[ldb+1], r[0], r[1])
	case q == 1: // (A − b) x = r
		d := b[0]
		r[0], r[ldr] = solve2(a[0]-d, a[1], a[lda], a[lda+1]-d, r[0], r[ldr])
	default:
		mean, half := (b[0]+b[ldb+1])/2, (b[0]-b[ldb+1])/2
		b01, b10 := b[1], b[ldb]
		a00, a01, a10, a11 := a[0]-mean, a[1], a[lda], a[lda+1]-mean
		delta := -half*half - b01*b10
		r00, r01, r10, r11 := r[0], r[1], r[ldr], r[ldr+1]
		cross, trace := a01*a10, a00+a11
		p00, p01, p10, p11 := a00*a00+cross+delta, a01*trace, a10*trace, a11*a11+cross+delta
		r[0], r[ldr] = solve2(p00, p01, p10, p11,
			a00*r00+a01*r10+(r00*half+r01*b10),
			a10*r00+a11*r10+(r10*half+r11*b10))
		r[1], r[ldr+1] = solve2(p00, p01, p10, p11,
			a00*r01+a01*r11+(r00*b01-r01*half),
			a10*r01+a11*r11+(r10*b01-r11*half))
	}
}

// solve2 solves [a b; c d] x = f by elimination with row exchange.
func solve2(a, b, c, d, f, g float64) (x, y float64) {
	if math.Abs(c) > math.Abs(a) {
		a, b, c, d, f, g = c, d, a, b, g, f
	}
	m := c / a
	y = (g - m*f) / (d - m*b)
	return (f - b*y) / a, y
}
