package laplace

import (
	"math"
	"sort"
)

// Table fills y[m][i] with output m at t[i], for the first len(y) outputs; t (s)
// ascends, and at a jump the value after it counts. A y[m] that is nil is left
// out. Every y[m] has the length of t.
//
// Uniform times take the product of two small tables of exponentials, which is
// ten times and more faster than one exponential for each mode and time and loses
// nothing: no recurrence runs along the times. Other times take one exponential
// for each mode that is still alive.
func (r *Response) Table(t []float64, y [][]float64) {
	for m := range y {
		if y[m] != nil && len(y[m]) != len(t) {
			panic("laplace: a table takes one value for each time")
		}
	}
	if len(y) > len(r.base) {
		panic("laplace: a table has more rows than there are outputs")
	}
	i := sort.SearchFloat64s(t, 0)
	for m := range y {
		for k := range y[m][:min(i, len(y[m]))] {
			y[m][k] = r.before[m]
		}
	}
	step, uniform := uniformStep(t)
	for i < len(t) {
		j := r.pieceAt(min(t[i], r.until), false)
		end := len(t)
		if j+1 < len(r.times) {
			end = i + sort.SearchFloat64s(t[i:], r.times[j+1])
		}
		if end == i {
			panic("laplace: the times of a table do not ascend")
		}
		p := r.piece(j)
		if uniform && end-i >= 32 && t[end-1] <= r.until {
			r.grid(p, t[i], step, i, end, y)
		} else {
			r.points(p, t[i:end], i, y)
		}
		i = end
	}
}

// uniformStep returns the common step of t, and whether every t[i] is t[0] plus i
// steps to within the rounding of the times.
func uniformStep(t []float64) (float64, bool) {
	n := len(t) - 1
	if n < 31 {
		return 0, false
	}
	h := (t[n] - t[0]) / float64(n)
	tol := 4 * epsilon * max(math.Abs(t[0]), math.Abs(t[n]))
	for i, v := range t {
		if d := t[0] + float64(i)*h - v; d > tol || d < -tol {
			return 0, false
		}
	}
	return h, h > 0
}
