package sparse

import (
	"math"
	"slices"
)

// A discovery is a factorisation that finds the pivots and the pattern of the factors
// on its way, column by column (Gilbert, Peierls, Sparse partial pivoting in time
// proportional to arithmetic operations, SIAM J. Sci. Stat. Comput. 9, 1988).
type discovery struct {
	f     *LU
	m     *Matrix
	lRow  [][]int32 // below the diagonal of each column so far, rows as in A
	lVal  [][]float64
	uRow  [][]int32 // positions
	seen  []int32   // of rows: column at which it was reached last, plus one
	path  []visit   // scratch of the search
	reach []int32   // rows of the column at hand, in topological order from the end
	x     []float64 // by row, zero between columns
}

type visit struct {
	row  int32
	next int
}

// discover factors m from nothing but the order of its columns.
func (f *LU) discover(m *Matrix) error {
	n := f.n
	d := &discovery{f: f, m: m, lRow: make([][]int32, n), lVal: make([][]float64, n), uRow: make([][]int32, n),
		seen: make([]int32, n), reach: make([]int32, n), x: f.work}
	for i := range f.place {
		f.place[i] = -1
	}
	for k := range n {
		top := d.search(k)
		most := d.eliminate(k, top)
		if !d.choose(k, top, most) {
			clear(d.x)
			return &Singular{Column: int(f.order[k])}
		}
	}
	d.layOut()
	if !f.refactor(m) { // the same numbers in the same order: it cannot fail but for overflow
		return &Singular{Column: int(f.order[f.failed])}
	}
	return nil
}

// search finds the rows that column k will fill, from reach[top] on in an order in which
// each comes before those it acts on.
func (d *discovery) search(k int) (top int) {
	top = d.f.n
	j := d.f.order[k]
	for _, i := range d.m.Row[d.m.Start[j]:d.m.Start[j+1]] {
		if d.seen[i] == int32(k+1) {
			continue
		}
		d.seen[i] = int32(k + 1)
		d.path = append(d.path[:0], visit{i, 0})
		for len(d.path) > 0 {
			v := &d.path[len(d.path)-1]
			var below []int32
			if p := d.f.place[v.row]; p >= 0 {
				below = d.lRow[p]
			}
			for v.next < len(below) && d.seen[below[v.next]] == int32(k+1) {
				v.next++
			}
			if v.next < len(below) {
				next := below[v.next]
				d.seen[next] = int32(k + 1)
				d.path = append(d.path, visit{next, 0})
				continue
			}
			top--
			d.reach[top] = v.row
			d.path = d.path[:len(d.path)-1]
		}
	}
	return top
}

// eliminate leaves in x what column k becomes, and returns the largest of what it was.
func (d *discovery) eliminate(k, top int) (most float64) {
	j := d.f.order[k]
	for p := d.m.Start[j]; p < d.m.Start[j+1]; p++ {
		i := d.m.Row[p]
		d.x[i] = d.m.Val[p] * d.f.scale[i]
		most = max(most, math.Abs(d.x[i]))
	}
	for _, i := range d.reach[top:] {
		p := d.f.place[i]
		if p < 0 {
			continue
		}
		v := d.x[i]
		for t, r := range d.lRow[p] {
			d.x[r] -= d.lVal[p][t] * v
		}
	}
	return most
}

// choose takes the pivot of column k, on the diagonal if it can.
func (d *discovery) choose(k, top int, most float64) bool {
	best, size := int32(-1), 0.0
	for _, i := range d.reach[top:] {
		if v := math.Abs(d.x[i]); d.f.place[i] < 0 && (v > size || v == size && v > 0 && i < best) {
			best, size = i, v
		}
	}
	if best < 0 || !(size > vanished*most) || math.IsInf(size, 0) {
		return false
	}
	if j := d.f.order[k]; d.f.place[j] < 0 && math.Abs(d.x[j]) >= preferred*size {
		best = j
	}
	pivot := d.x[best]
	d.f.place[best], d.f.row[k] = int32(k), best
	for _, i := range d.reach[top:] {
		switch p := d.f.place[i]; {
		case p < 0:
			d.lRow[k] = append(d.lRow[k], i)
			d.lVal[k] = append(d.lVal[k], d.x[i]/pivot)
		case int(p) < k:
			d.uRow[k] = append(d.uRow[k], p)
		}
		d.x[i] = 0
	}
	return true
}

// layOut puts the patterns into the factors.
func (d *discovery) layOut() {
	f := d.f
	f.lStart, f.lRow = flatten(d.lRow, func(i int32) int32 { return f.place[i] })
	f.uStart, f.uRow = flatten(d.uRow, func(p int32) int32 { return p })
	f.lVal, f.wVal = make([]float64, len(f.lRow)), make([]float64, len(f.uRow))
	f.transpose()
	for k := f.n - 1; k >= 0; k-- {
		f.last[k] = int32(k)
		if k+1 < f.n && continues(f.lStart, f.lRow, k) {
			f.last[k] = f.last[k+1]
		}
	}
	for k := range f.n {
		f.first[k] = int32(k)
		if k > 0 && continues(f.wStart, f.wCol, k-1) {
			f.first[k] = f.first[k-1]
		}
	}
}

// transpose lists U by row.
func (f *LU) transpose() {
	f.wStart, f.wCol, f.uAt = make([]int32, f.n+1), make([]int32, len(f.uRow)), make([]int32, len(f.uRow))
	for _, i := range f.uRow {
		f.wStart[i+1]++
	}
	for i := range f.n {
		f.wStart[i+1] += f.wStart[i]
	}
	next := slices.Clone(f.wStart[:f.n])
	for k := range f.n {
		for t := f.uStart[k]; t < f.uStart[k+1]; t++ {
			at := next[f.uRow[t]]
			next[f.uRow[t]]++
			f.wCol[at], f.uAt[t] = int32(k), at
		}
	}
}

// continues tells whether list k is k + 1 followed by list k + 1.
func continues(start, flat []int32, k int) bool {
	one, two := flat[start[k]:start[k+1]], flat[start[k+1]:start[k+2]]
	return len(one) > 0 && int(one[0]) == k+1 && slices.Equal(one[1:], two)
}

func flatten(lists [][]int32, of func(int32) int32) (start, flat []int32) {
	total := 0
	for _, l := range lists {
		total += len(l)
	}
	start, flat = make([]int32, len(lists)+1), make([]int32, 0, total)
	for k, l := range lists {
		for _, i := range l {
			flat = append(flat, of(i))
		}
		slices.Sort(flat[start[k]:])
		start[k+1] = int32(len(flat))
	}
	return start, flat
}
