package matrix

import "math"

// sparseRows holds the rows of a matrix hi + lo without its zeros.
type sparseRows struct {
	ptr, col []int
	hi, lo   []float64
}

// set takes M, or Mᵀ.
func (s *sparseRows) set(m int, hi, lo []float64, transposed bool) {
	s.ptr = append(s.ptr[:0], 0)
	s.col, s.hi, s.lo = s.col[:0], s.hi[:0], s.lo[:0]
	for i := 0; i < m; i++ {
		first, step := i*m, 1
		if transposed {
			first, step = i, m
		}
		for j, k := 0, first; j < m; j, k = j+1, k+step {
			if hi[k] != 0 {
				s.col = append(s.col, j)
				s.hi, s.lo = append(s.hi, hi[k]), append(s.lo, lo[k])
			}
		}
		s.ptr = append(s.ptr, len(s.col))
	}
}

// residual sets r = M X − X D, every entry a compensated sum rounded once. D is
// block diagonal over start; transposed takes Dᵀ. low is working space.
//
// Method: products and sums with their errors, after T. Ogita, S. M. Rump, S. Oishi,
// SIAM J. Sci. Comput. 26 (2005) 1955.
func (s *sparseRows) residual(m int, r, x, d, low []float64, start []int, transposed bool) {
	for i := 0; i < m; i++ {
		high := r[i*m : i*m+m]
		clear(high)
		clear(low)
		e, f := s.ptr[i], s.ptr[i+1]
		sumTwice(m, x, s.col[e:f], s.hi[e:f], s.lo[e:f], high, low)
		row := x[i*m : i*m+m]
		for a := 0; a+1 < len(start); a++ {
			for k := start[a]; k < start[a+1]; k++ {
				h, g := high[k], low[k]
				for l := start[a]; l < start[a+1]; l++ {
					v := d[l*m+k]
					if transposed {
						v = d[k*m+l]
					}
					p, f := twoProd(row[l], -v)
					t, c := twoSum(h, p)
					h = t
					g += f + c
				}
				high[k] = h + g
			}
		}
	}
}

// sumTwiceGo adds Σ_e (hi[e] + lo[e])·x[col[e], j] to high[j] + low[j], from ≤ j < m, x
// of rows of m entries.
func sumTwiceGo(from, m int, x []float64, col []int, hi, lo, high, low []float64) {
	high, low = high[from:m], low[from:m]
	for e, c := range col {
		a, b := hi[e], lo[e]
		row := x[c*m+from : c*m+m]
		row = row[:len(high)]
		for k, v := range row {
			p := float64(a * v)
			f := math.FMA(a, v, -p) + float64(b*v)
			h := high[k] + p
			t := h - high[k]
			low[k] += ((high[k] - (h - t)) + (p - t)) + f
			high[k] = h
		}
	}
}
