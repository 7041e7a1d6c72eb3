package sparse

import (
	"fmt"
	"math"
)

// Singular is the error of a matrix that has no inverse within rounding.
type Singular struct {
	Column int // the unknown that the equations leave open
}

func (s *Singular) Error() string {
	return fmt.Sprintf("sparse: the matrix is singular: nothing determines unknown %d", s.Column)
}

// Pivots. On the diagonal a pivot is taken for the first time where it is at least
// preferred of the largest in its column; with the order of pivots kept it is accepted
// down to accepted, a tenth of that, so that numbers that drift do not make the pattern be
// found again and again. Below vanished of what its column held it is rounding.
const (
	preferred = 0.1
	accepted  = 0.01
	vanished  = 64 * 0x1p-52
)

// An LU is the factorisation P R A Q = L U of matrices of one pattern: R scales rows by
// powers of two, L has ones on its diagonal.
type LU struct {
	n     int
	order []int32 // Q: column eliminated at each position
	row   []int32 // P: row that is the pivot at each position
	place []int32 // position at which each row is the pivot

	lStart, lRow []int32 // below the diagonal by column, rows as positions, ascending
	lVal         []float64
	uStart, uRow []int32 // above the diagonal by column, rows as positions, ascending
	uAt          []int32 // of each of these: where its value stands by row
	wStart, wCol []int32 // above the diagonal by row, columns ascending
	wVal         []float64
	inverse      []float64 // of the pivots
	last         []int32   // of each position: the last of the columns next to each other that share a pattern of L
	first        []int32   // of each position: the first of the rows next to each other that share a pattern of U

	scale  []float64
	work   []float64 // by position, all zero between calls
	rhs    []float64
	found  bool // the pattern of the factors
	failed int  // position at which the last factorisation stopped
}

// Analyse finds the order of elimination. The pattern of the factors, which depends on
// which pivots can be taken, is found by the first Factor.
func Analyse(m *Matrix) *LU {
	return &LU{n: m.N, order: order(m), row: make([]int32, m.N), place: make([]int32, m.N), inverse: make([]float64, m.N),
		last: make([]int32, m.N), first: make([]int32, m.N), scale: make([]float64, m.N), work: make([]float64, m.N), rhs: make([]float64, m.N)}
}

// Factor puts in the numbers of m, a matrix of the pattern that was analysed. It
// returns *Singular where there is no inverse; the LU must not be used then.
func (f *LU) Factor(m *Matrix) error {
	f.equilibrate(m)
	if f.found && f.refactor(m) {
		return nil
	}
	f.found = false
	if err := f.discover(m); err != nil {
		return err
	}
	f.found = true
	return nil
}

// equilibrate scales each row so that its largest entry lies between 1/2 and 1.
func (f *LU) equilibrate(m *Matrix) {
	s := f.scale
	clear(s)
	for p, i := range m.Row {
		if v := math.Abs(m.Val[p]); v > s[i] {
			s[i] = v
		}
	}
	for i, v := range s {
		s[i] = power(v)
	}
}

// power returns the power of two that brings v > 0 into [1/2, 1), and 1 for what is no
// ordinary number.
func power(v float64) float64 {
	exponent := int(math.Float64bits(v) >> 52)
	if exponent == 0 || exponent >= 2045 {
		if v == 0 || math.IsInf(v, 0) || math.IsNaN(v) {
			return 1
		}
		_, e := math.Frexp(v)
		return math.Ldexp(1, max(min(-e, 1022), -1022))
	}
	return math.Float64frombits(uint64(2045-exponent) << 52)
}

// refactor puts numbers into factors whose pattern and pivots are kept. It reports false
// where a pivot has become too small for that.
func (f *LU) refactor(m *Matrix) bool {
	x := f.work
	for k := range f.n {
		j := f.order[k]
		most := 0.0
		for p := m.Start[j]; p < m.Start[j+1]; p++ {
			i := m.Row[p]
			v := m.Val[p] * f.scale[i]
			x[f.place[i]] = v
			most = max(most, math.Abs(v))
		}
		f.update(k, x)
		if !f.store(k, x, most) {
			clear(x)
			f.failed = k
			return false
		}
	}
	return true
}

// update takes L·U of the columns before from column k, which stands in x.
func (f *LU) update(k int, x []float64) {
	u := f.uRow[f.uStart[k]:f.uStart[k+1]]
	for a := 0; a < len(u); {
		j := int(u[a])
		width := min(int(f.last[j]), k-1) - j + 1
		switch {
		case width >= 4:
			f.update4(j, x)
			a += 4
		case width >= 2:
			f.update2(j, x)
			a += 2
		default:
			v := x[j]
			lo, hi := f.lStart[j], f.lStart[j+1]
			rows, l := f.lRow[lo:hi], f.lVal[lo:hi]
			l = l[:len(rows)]
			for t, i := range rows {
				x[i] -= l[t] * v
			}
			a++
		}
	}
}

// update2 takes off two columns of one pattern: the first holds the second's pivot row
// before the rows they share.
func (f *LU) update2(j int, x []float64) {
	lo, hi := f.lStart[j+1], f.lStart[j+2]
	rows := f.lRow[lo:hi]
	n := len(rows)
	l0, l1 := f.lVal[f.lStart[j+1]-int32(n):][:n], f.lVal[lo:][:n]
	v0 := x[j]
	v1 := x[j+1] - f.lVal[f.lStart[j]]*v0
	x[j+1] = v1
	for t, i := range rows {
		x[i] -= l0[t]*v0 + l1[t]*v1
	}
}

// update4 takes off four.
func (f *LU) update4(j int, x []float64) {
	s := f.lStart[j : j+5]
	rows := f.lRow[s[3]:s[4]]
	n := len(rows)
	a, b, c, d := f.lVal[s[0]:s[1]], f.lVal[s[1]:s[2]], f.lVal[s[2]:s[3]], f.lVal[s[3]:s[4]]
	v0 := x[j]
	v1 := x[j+1] - a[0]*v0
	v2 := x[j+2] - a[1]*v0 - b[0]*v1
	v3 := x[j+3] - a[2]*v0 - b[1]*v1 - c[0]*v2
	x[j+1], x[j+2], x[j+3] = v1, v2, v3
	a, b, c, d = a[3:][:n], b[2:][:n], c[1:][:n], d[:n]
	for t, i := range rows {
		x[i] -= a[t]*v0 + b[t]*v1 + c[t]*v2 + d[t]*v3
	}
}

// store moves column k from x into the factors and leaves x zero.
func (f *LU) store(k int, x []float64, most float64) bool {
	lo, hi := f.uStart[k], f.uStart[k+1]
	at := f.uAt[lo:hi]
	for t, i := range f.uRow[lo:hi] {
		f.wVal[at[t]] = x[i]
		x[i] = 0
	}
	pivot := x[k]
	x[k] = 0
	inverse, largest := 1/pivot, 0.0
	f.inverse[k] = inverse
	lo, hi = f.lStart[k], f.lStart[k+1]
	val := f.lVal[lo:hi]
	for t, i := range f.lRow[lo:hi] {
		v := x[i] * inverse
		val[t] = v
		x[i] = 0
		if v = math.Abs(v); v > largest {
			largest = v
		}
	}
	return largest <= 1/accepted && math.Abs(pivot) > vanished*most // false for NaN, too
}

// Solve replaces b by A⁻¹b.
func (f *LU) Solve(b []float64) {
	x := f.rhs
	for k, i := range f.row {
		x[k] = b[i] * f.scale[i]
	}
	f.lower(x)
	f.upper(x)
	for k, j := range f.order {
		b[j] = x[k]
	}
}

// lower solves L y = x in place.
func (f *LU) lower(x []float64) {
	for j := 0; j < f.n; {
		switch width := int(f.last[j]) - j + 1; {
		case width >= 4:
			f.update4(j, x)
			j += 4
		case width >= 2:
			f.update2(j, x)
			j += 2
		default:
			v := x[j]
			lo, hi := f.lStart[j], f.lStart[j+1]
			rows, l := f.lRow[lo:hi], f.lVal[lo:hi]
			l = l[:len(rows)]
			for t, i := range rows {
				x[i] -= l[t] * v
			}
			j++
		}
	}
}

// upper solves U y = x in place, from the last row up.
func (f *LU) upper(x []float64) {
	for k := f.n - 1; k >= 0; {
		switch width := k - int(f.first[k]) + 1; {
		case width >= 4:
			f.rows4(k-3, x)
			k -= 4
		case width >= 2:
			f.rows2(k-1, x)
			k -= 2
		default:
			lo, hi := f.wStart[k], f.wStart[k+1]
			cols, u := f.wCol[lo:hi], f.wVal[lo:hi]
			u = u[:len(cols)]
			v := x[k]
			for t, c := range cols {
				v -= u[t] * x[c]
			}
			x[k] = v * f.inverse[k]
			k--
		}
	}
}

// rows2 finds two unknowns whose rows share their columns but for the second itself.
func (f *LU) rows2(k int, x []float64) {
	s := f.wStart[k : k+3]
	cols := f.wCol[s[1]:s[2]]
	n := len(cols)
	a, b := f.wVal[s[0]:s[1]], f.wVal[s[1]:s[2]]
	link := a[0]
	a, b = a[1:][:n], b[:n]
	v0, v1 := x[k], x[k+1]
	for t, c := range cols {
		y := x[c]
		v0 -= a[t] * y
		v1 -= b[t] * y
	}
	v1 *= f.inverse[k+1]
	x[k], x[k+1] = (v0-link*v1)*f.inverse[k], v1
}

// rows4 finds four.
func (f *LU) rows4(k int, x []float64) {
	s := f.wStart[k : k+5]
	cols := f.wCol[s[3]:s[4]]
	n := len(cols)
	wa, wb, wc, wd := f.wVal[s[0]:s[1]], f.wVal[s[1]:s[2]], f.wVal[s[2]:s[3]], f.wVal[s[3]:s[4]]
	a, b, c, d := wa[3:][:n], wb[2:][:n], wc[1:][:n], wd[:n]
	v0, v1, v2, v3 := x[k], x[k+1], x[k+2], x[k+3]
	for t, col := range cols {
		y := x[col]
		v0 -= a[t] * y
		v1 -= b[t] * y
		v2 -= c[t] * y
		v3 -= d[t] * y
	}
	v3 *= f.inverse[k+3]
	v2 = (v2 - wc[0]*v3) * f.inverse[k+2]
	v1 = (v1 - wb[0]*v2 - wb[1]*v3) * f.inverse[k+1]
	v0 = (v0 - wa[0]*v1 - wa[1]*v2 - wa[2]*v3) * f.inverse[k]
	x[k], x[k+1], x[k+2], x[k+3] = v0, v1, v2, v3
}
