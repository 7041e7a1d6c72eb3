package matrix

import "math"

// A path is an island without loops or branches: a wall in lumps, a ladder.
// Eliminated from one end to the other, its factor Y = Xᵀ has two diagonals,
// with every entry relatively accurate, whatever the order of magnitudes along
// it; no bidiagonalisation is needed.

// isPath reports whether the stores of an island form a path.
func (s *islands) isPath(stores []int) bool {
	ends := 0
	for _, i := range stores {
		if s.degree[i] > 2 {
			return false
		}
		if s.degree[i] < 2 {
			ends++
		}
	}
	return ends > 0 // without an end it is a ring
}

// walk puts the stores in the order of the path, from the end listed first,
// and the resistance from each to the next into sum.
func (t *network) walk(s *islands, stores []int, g int) {
	up := pow2(-g)
	at := stores[0]
	for _, i := range stores {
		if s.degree[i] < 2 {
			at = i
			break
		}
	}
	before := -1
	for k := range t.n {
		t.store[k] = at
		ahead := -1
		for _, e := range s.touching(at) {
			if other := e.i + e.j - at; other != before {
				ahead, t.sum[k] = other, e.g*up
			}
		}
		before, at = at, ahead
	}
}

// factorPath sets the diagonals d and e of Y; where nothing leaks Y has one
// column more than rows, and len(e) is len(d).
func (t *network) factorPath(d, e []float64) error {
	leak := t.leak[0]
	for k := range t.rows {
		g := 0.0
		if k+1 < t.n {
			g = t.sum[k]
		}
		s := g + leak
		if !(s >= minPivot) {
			return ErrRange
		}
		t.pivot[k] = s
		d[k] = math.Sqrt(s / t.c[k])
		if k+1 < t.n {
			e[k] = -g / math.Sqrt(s*t.c[k+1])
			leak = t.leak[k+1] + g*(leak/s)
		}
	}
	return nil
}

// solvePath replaces v by y with X y = v, as network.solve does.
func solvePath(d, e, v []float64) {
	for k := range d {
		v[k] /= d[k]
		if k < len(e) {
			v[k+1] -= e[k] * v[k]
		}
	}
}
