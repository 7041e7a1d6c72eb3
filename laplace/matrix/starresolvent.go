package matrix

import "math/cmplx"

// starResolvent eliminates the stores of a balance in which nothing is negative, store
// by store, with complex leaks: sC + Leak lies in the right half plane, the rows
// are diagonally dominant with |sum| ≥ Σ|exchange|, and elimination keeps them so.
// Hence the sum that is divided by is never much smaller than its terms, and the
// diagonal, in which a small leak would be lost, is not needed.
//
// The method is that of Eliminate (Grassmann, Taksar, Heyman 1985) carried to
// complex leaks; that Schur complements stay dominant: Horn, Johnson, Topics in
// Matrix Analysis, sec. 2.5 (from memory).
type starResolvent struct {
	b     *Balance
	order []int   // place → store, fewest neighbours first
	later [][]int // of each place, the later places it exchanges with in its turn
	g     []complex128
	leak  []complex128
	sum   []complex128
	z     []complex128
}

func newStarResolvent(b *Balance) *starResolvent {
	n := b.N
	w := &starResolvent{b: b, g: make([]complex128, n*n), leak: make([]complex128, n), sum: make([]complex128, n), z: make([]complex128, n)}
	w.order, w.later = fewestFirst(n, func(i, j int) bool { return b.F[i*n+j] != 0 || b.F[j*n+i] != 0 })
	return w
}

// fewestFirst orders stores so that each, in its turn, touches few that are left
// (minimum degree), and lists whom it then touches, by place.
func fewestFirst(n int, touch func(i, j int) bool) (order []int, later [][]int) {
	near := make([]map[int]bool, n)
	for i := range n {
		near[i] = make(map[int]bool)
		for j := range n {
			if i != j && touch(i, j) {
				near[i][j] = true
			}
		}
	}
	place, gone := make([]int, n), make([]bool, n)
	var lists [][]int // by place, of stores
	for k := range n {
		best := -1
		for i := range n {
			if !gone[i] && (best < 0 || len(near[i]) < len(near[best])) {
				best = i
			}
		}
		gone[best], place[best] = true, k
		order = append(order, best)
		var list []int
		for j := range n {
			if near[best][j] {
				list = append(list, j)
				delete(near[j], best)
			}
		}
		for _, i := range list {
			for _, j := range list {
				if i != j {
					near[i][j] = true
				}
			}
		}
		lists = append(lists, list)
	}
	for _, list := range lists {
		for k, i := range list {
			list[k] = place[i]
		}
		later = append(later, list)
	}
	return order, later
}

func (w *starResolvent) load(s complex128) {
	n := w.b.N
	for k, i := range w.order {
		w.leak[k] = complex(w.b.Leak[i], 0) + realTimes(w.b.C[i], s)
		for _, j := range w.later[k] {
			w.g[k*n+j] = complex(w.b.F[i*n+w.order[j]], 0)
			w.g[j*n+k] = complex(w.b.F[w.order[j]*n+i], 0)
		}
	}
}

func (w *starResolvent) factor(s complex128) bool {
	w.load(s)
	n := w.b.N
	for k := range n {
		sum := w.leak[k]
		for _, j := range w.later[k] {
			sum += w.g[k*n+j]
		}
		if sum == 0 || cmplx.IsInf(sum) || cmplx.IsNaN(sum) {
			return false
		}
		w.sum[k] = sum
		for _, i := range w.later[k] {
			if w.g[i*n+k] == 0 {
				continue
			}
			share := w.g[i*n+k] / sum
			for _, j := range w.later[k] {
				if j != i { // what returns to the store itself changes nothing
					w.g[i*n+j] += share * w.g[k*n+j]
				}
			}
			w.leak[i] += share * w.leak[k]
			w.g[i*n+k] = share
		}
	}
	return true
}

func (w *starResolvent) levels(f []float64, x []complex128) {
	n := w.b.N
	for k, i := range w.order {
		w.z[k] = complex(f[i], 0)
	}
	for k := range n {
		if w.z[k] != 0 {
			for _, i := range w.later[k] {
				w.z[i] += w.g[i*n+k] * w.z[k]
			}
		}
	}
	for k := n - 1; k >= 0; k-- {
		for _, j := range w.later[k] {
			w.z[k] += w.g[k*n+j] * w.z[j]
		}
		w.z[k] /= w.sum[k]
	}
	w.hand(x)
}

func (w *starResolvent) weights(c []float64, y []complex128) {
	n := w.b.N
	for k, i := range w.order {
		w.z[k] = complex(c[i], 0)
	}
	for k := range n {
		w.z[k] /= w.sum[k]
		if w.z[k] != 0 {
			for _, j := range w.later[k] {
				w.z[j] += w.g[k*n+j] * w.z[k]
			}
		}
	}
	for k := n - 1; k >= 0; k-- {
		for _, i := range w.later[k] {
			w.z[k] += w.g[i*n+k] * w.z[i]
		}
	}
	w.hand(y)
}

// hand returns the places to their stores.
func (w *starResolvent) hand(x []complex128) {
	for k, i := range w.order {
		x[i] = w.z[k]
	}
}

// noise counts each exchange with the difference it acts on: a common level, however
// large, moves nothing.
func (w *starResolvent) noise(s complex128, i int, x []complex128) float64 {
	b := w.b
	sum := (b.Leak[i] + b.C[i]*cmplx.Abs(s)) * cmplx.Abs(x[i])
	for j, f := range b.F[i*b.N : (i+1)*b.N] {
		if f != 0 && j != i {
			sum += f * cmplx.Abs(x[i]-x[j])
		}
	}
	return sum
}
