package matrix

import "math"

// rotate finds the singular values of Y by one-sided Jacobi rotations of its
// rows, and carries the ports along: when all rows are orthogonal, row k is
// σ_k p_k. It keeps the relative accuracy of every row, grown or not, at about
// ten times the cost.
//
// Source: Demmel, Veselić, Jacobi's method is more accurate than QR, SIAM J.
// Matrix Anal. Appl. 13 (1992) 1204-1245; the order of pivots: de Rijk, SIAM J.
// Sci. Stat. Comput. 10 (1989) 359-371.
func (w *RCWork) rotate(d []float64) error {
	t := &w.net
	j := &w.jac
	j.begin(t, w.side[pivotSide])
	for range maxJacobi {
		if j.round() {
			j.finish(d, w.side[storeSide])
			return nil
		}
	}
	return ErrNoConvergence
}

// maxJacobi bounds the rounds; eight are many.
const maxJacobi = 60

// jacobi holds the rows that are being made orthogonal.
type jacobi struct {
	rows   [][]float64
	left   [][]float64
	square []float64
	tol    float64
}

func (j *jacobi) begin(t *network, left [][]float64) {
	j.left = left
	j.square = resized(j.square, t.rows)
	j.rows = j.rows[:0]
	wide := (t.n + padding - 1) &^ (padding - 1) // zeros beyond n
	for k := range t.rows {
		j.rows = append(j.rows, t.a[k*t.stride:k*t.stride+wide])
	}
	j.tol = eps * math.Sqrt(float64(t.n))
}

// round meets every pair of rows once and reports whether all were orthogonal.
func (j *jacobi) round() (done bool) {
	done = true
	for i, r := range j.rows {
		j.square[i] = dot(r, r)
	}
	for i := range j.rows {
		j.largestTo(i)
		for k := i + 1; k < len(j.rows); k++ {
			if j.turn(i, k) {
				done = false
			}
		}
	}
	return done
}

// largestTo brings the longest of the rows from i on to place i.
func (j *jacobi) largestTo(i int) {
	p := i
	for k := i + 1; k < len(j.rows); k++ {
		if j.square[k] > j.square[p] {
			p = k
		}
	}
	if p == i {
		return
	}
	j.rows[i], j.rows[p] = j.rows[p], j.rows[i]
	j.square[i], j.square[p] = j.square[p], j.square[i]
	for _, y := range j.left {
		y[i], y[p] = y[p], y[i]
	}
}

// turn makes rows i and k orthogonal; false where they were.
func (j *jacobi) turn(i, k int) bool {
	x, y := j.rows[i], j.rows[k]
	g := dot(x, y)
	a, b := j.square[i], j.square[k]
	if math.Abs(g) <= j.tol*math.Sqrt(a)*math.Sqrt(b) {
		return false
	}
	zeta := (b - a) / (2 * g)
	var tan float64
	if math.Abs(zeta) > 1e150 {
		tan = 0.5 / zeta
	} else {
		tan = math.Copysign(1/(math.Abs(zeta)+math.Sqrt(1+zeta*zeta)), zeta)
	}
	cos := 1 / math.Sqrt(1+tan*tan)
	sin := cos * tan
	// cos is 1 − sin·half: written so, a small turn makes a small error, and of
	// the thousands of turns a row goes through most are small.
	half := sin / (1 + cos)
	turnRows(sin, half, x, y)
	for _, v := range j.left {
		p, q := v[i], v[k]
		v[i], v[k] = p-sin*(q+half*p), q+sin*(p-half*q)
	}
	j.square[i] = a - tan*g
	j.square[k] = b + tan*g
	if j.square[k] < 0.5*b { // a difference that lost its digits
		j.square[k] = dot(y, y)
	}
	return true
}

// finish sets the singular values and the values of the right vectors.
func (j *jacobi) finish(d []float64, right [][]float64) {
	for i, r := range j.rows {
		d[i] = math.Sqrt(dot(r, r))
	}
	value := j.square
	for _, v := range right {
		for i, r := range j.rows {
			value[i] = dot(r, v) / d[i]
		}
		copy(v, value)
	}
}

// dot is the scalar product of the row x, a multiple of four long, and y.
func dot(x, y []float64) float64 {
	var out [1]float64
	dotRows(x, len(x), 1, len(x), y, out[:])
	return out[0]
}
