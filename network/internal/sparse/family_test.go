package sparse

import (
	"math"
	"math/rand/v2"
)

// A family makes matrices of one kind and any size.
type family struct {
	name string
	make func(n int, r *rand.Rand) *Matrix
}

// triples collects entries with values.
type triples struct {
	n    int
	at   []Entry
	vals []float64
}

func (t *triples) add(i, j int, v float64) {
	t.at = append(t.at, Entry{i, j})
	t.vals = append(t.vals, v)
}

// wire adds a conductance between two nodes, −1 being ground.
func (t *triples) wire(i, j int, g float64) {
	if i >= 0 {
		t.add(i, i, g)
	}
	if j >= 0 {
		t.add(j, j, g)
	}
	if i >= 0 && j >= 0 {
		t.add(i, j, -g)
		t.add(j, i, -g)
	}
}

func (t *triples) matrix() *Matrix {
	m := New(t.n, t.at)
	for k, e := range t.at {
		m.Val[m.Slot(e.Row, e.Col)] += t.vals[k]
	}
	return m
}

func spread(r *rand.Rand, decades float64) float64 { return math.Pow(10, decades*(r.Float64()-0.5)) }

func grid(nx, ny int, g func() float64) *triples {
	t := &triples{n: nx * ny}
	for i := range t.n {
		t.wire(i, -1, 0.01*g())
		if i%nx+1 < nx {
			t.wire(i, i+1, g())
		}
		if i+nx < t.n {
			t.wire(i, i+nx, g())
		}
	}
	return t
}

func families() []family {
	tree := func(n int, r *rand.Rand, decades float64) *triples {
		t := &triples{n: n}
		for i := range n {
			t.wire(i, r.IntN(i+1)-1, spread(r, decades))
		}
		return t
	}
	return []family{
		{"diagonal", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n}
			for i := range n {
				t.add(i, i, spread(r, 20))
			}
			return t.matrix()
		}},
		{"tree", func(n int, r *rand.Rand) *Matrix { return tree(n, r, 2).matrix() }},
		{"ring", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n}
			for i := range n {
				if j := (i + 1) % n; j != i {
					t.wire(i, j, spread(r, 2))
				}
			}
			if n > 0 {
				t.wire(0, -1, 1)
			}
			return t.matrix()
		}},
		{"grid", func(n int, r *rand.Rand) *Matrix {
			nx := max(1, int(math.Sqrt(float64(n))))
			return grid(nx, n/nx, func() float64 { return spread(r, 1) }).matrix()
		}},
		{"star", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n}
			for i := range n {
				t.wire(i, -1, 0.1)
				if i > 0 {
					t.wire(0, i, spread(r, 3))
				}
			}
			return t.matrix()
		}},
		{"nearly floating", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n} // only a leak of 1e-12 leads to ground
			for i := range n {
				if i == 0 {
					t.wire(0, -1, 1e-12)
				} else {
					t.wire(i, r.IntN(i), spread(r, 1))
				}
			}
			return t.matrix()
		}},
		{"stiff", func(n int, r *rand.Rand) *Matrix { return tree(n, r, 12).matrix() }},
		{"badly scaled", func(n int, r *rand.Rand) *Matrix {
			t := tree(n, r, 1)
			rows := make([]float64, n)
			for i := range rows {
				rows[i] = spread(r, 60)
			}
			for k, e := range t.at {
				t.vals[k] *= rows[e.Row]
			}
			return t.matrix()
		}},
		{"two islands", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n}
			for i := range n {
				j := i - 2
				t.wire(i, max(j, -1), spread(r, 2))
			}
			return t.matrix()
		}},
		{"flows and levels", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n} // even: levels without a diagonal; odd: flows, some without resistance
			for i := range n {
				switch {
				case i%2 == 1:
					t.add(i, i, -spread(r, 4)*float64(r.IntN(2)))
					t.add(i, i-1, 1)
					t.add(i-1, i, -1)
					if i+1 < n {
						t.add(i, i+1, -1)
						t.add(i+1, i, 1)
					}
				case i+1 == n:
					t.add(i, i, 1)
				case r.IntN(3) == 0:
					t.add(i, i, 1e-6)
				}
			}
			return t.matrix()
		}},
		{"random", func(n int, r *rand.Rand) *Matrix {
			t := &triples{n: n}
			perm := r.Perm(n)
			for i := range n {
				t.add(i, perm[i], 1+r.Float64())
				for range 2 {
					t.add(i, r.IntN(n), r.NormFloat64())
				}
			}
			return t.matrix()
		}},
	}
}
