package matrix

import (
	"errors"
	"math"
	"math/big"
	"slices"
	"testing"
)

// exactLevels solves the static balance in rational arithmetic; nil where it
// is singular.
func exactLevels(b *Balance, f []float64, transposed bool) []*big.Rat {
	n := b.N
	a := make([][]*big.Rat, n)
	for i := range a {
		a[i] = make([]*big.Rat, n+1)
		for j := range a[i] {
			a[i][j] = new(big.Rat)
		}
		a[i][n].SetFloat64(f[i])
	}
	for i := range n {
		d := new(big.Rat).SetFloat64(b.Leak[i])
		for j := range n {
			if j == i {
				continue
			}
			x := new(big.Rat).SetFloat64(b.F[i*n+j])
			d.Add(d, x)
			if transposed {
				a[j][i].Neg(x)
			} else {
				a[i][j].Neg(x)
			}
		}
		a[i][i].Set(d)
	}
	for k := range n {
		p := k
		for p < n && a[p][k].Sign() == 0 {
			p++
		}
		if p == n {
			return nil
		}
		a[k], a[p] = a[p], a[k]
		for i := range n {
			if i == k || a[i][k].Sign() == 0 {
				continue
			}
			m := new(big.Rat).Quo(a[i][k], a[k][k])
			for j := k; j <= n; j++ {
				a[i][j].Sub(a[i][j], new(big.Rat).Mul(m, a[k][j]))
			}
		}
	}
	x := make([]*big.Rat, n)
	for i := range x {
		x[i] = new(big.Rat).Quo(a[i][n], a[i][i])
	}
	return x
}

// levelError returns the worst relative error of levels.
func levelError(got []float64, want []*big.Rat) float64 {
	worst := 0.0
	for i, w := range want {
		d := new(big.Rat).SetFloat64(got[i])
		if d == nil {
			return math.Inf(1)
		}
		if d.Sub(d, w); w.Sign() == 0 {
			if d.Sign() != 0 {
				return math.Inf(1)
			}
			continue
		}
		r, _ := d.Quo(d, w).Float64()
		worst = max(worst, math.Abs(r))
	}
	return worst
}

// streams makes the exchange of a balance one-sided in places.
func streams(b *Balance, r *splitmix) {
	for i := range b.F {
		if r.uniform() < 0.4 {
			b.F[i] *= math.Exp(8 * (r.uniform() - 0.5))
		}
		if r.uniform() < 0.2 {
			b.F[i] = 0
		}
	}
}

// TestEliminateExact: levels of balances without anything negative, symmetric
// or not, of any spread, against rational arithmetic: every level relatively.
func TestEliminateExact(t *testing.T) {
	networks(t, []int{1, 2, 3, 7}, 1, func(name string, b *Balance, r *splitmix) {
		for _, oneSided := range []bool{false, true} {
			if oneSided {
				streams(b, r)
			}
			f := make([]float64, b.N)
			for i := range f {
				f[i] = r.lognormal(4)
			}
			e, err := b.Eliminate()
			want := exactLevels(b, f, false)
			if want == nil {
				var s *Singular
				if !errors.As(err, &s) {
					t.Fatalf("%s: singular, got %v", name, err)
				}
				continue
			}
			if err != nil {
				t.Fatalf("%s: %v", name, err)
			}
			if worst := levelError(e.Solve(f), want); worst > 4e-15 {
				t.Errorf("%s: relative error %.2g", name, worst)
			}
			if worst := levelError(e.SolveTransposed(f), exactLevels(b, f, true)); worst > 4e-15 {
				t.Errorf("%s: transposed: relative error %.2g", name, worst)
			}
		}
	})
}

// TestEliminateFeeding: some leaks and exchanges negative. What cancels is in
// the data, so that the error is measured against what a change of each value
// by ε can do: solved with perturbed values in rational arithmetic.
func TestEliminateFeeding(t *testing.T) {
	networks(t, []int{2, 4}, 2, func(name string, b *Balance, r *splitmix) {
		for range 1 + b.N/3 {
			b.Leak[r.index(b.N)] -= 0.5 * r.lognormal(2)
			if i, j := r.index(b.N), r.index(b.N); i != j {
				b.F[i*b.N+j] -= r.lognormal(2)
			}
		}
		f := make([]float64, b.N)
		for i := range f {
			f[i] = r.lognormal(1)
		}
		want := exactLevels(b, f, false)
		if want == nil {
			return
		}
		scale := make([]float64, b.N)
		for i := range scale {
			w, _ := want[i].Float64()
			scale[i] = 4 * math.Abs(w)
		}
		for range 6 { // the spread of solutions of balances one rounding away
			c := *b
			c.F, c.Leak = slices.Clone(b.F), slices.Clone(b.Leak)
			for i := range c.F {
				c.F[i] *= 1 + eps*float64(r.index(3)-1)
			}
			for i := range c.Leak {
				c.Leak[i] *= 1 + eps*float64(r.index(3)-1)
			}
			x := exactLevels(&c, f, false)
			for i := range scale {
				d, _ := new(big.Rat).Sub(x[i], want[i]).Float64()
				scale[i] = max(scale[i], math.Abs(d)/eps)
			}
		}
		e, err := b.Eliminate()
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		for i, x := range e.Solve(f) {
			d, _ := new(big.Rat).Sub(new(big.Rat).SetFloat64(x), want[i]).Float64()
			if math.Abs(d) > 200*eps*scale[i] {
				t.Errorf("%s: level %d is off by %.2g, %.2g times the effect of a rounding", name, i, d, math.Abs(d)/(eps*scale[i]))
			}
		}
		// the weight of f in an output is that of the output in f
		weights := make([]float64, b.N)
		left, right, room := 0.0, 0.0, 0.0
		for i := range weights {
			weights[i] = r.lognormal(1)
		}
		back := e.SolveTransposed(weights)
		for i, x := range e.Solve(f) {
			left += weights[i] * x
			right += back[i] * f[i]
			room += weights[i]*scale[i] + math.Abs(back[i]*f[i])
		}
		if math.Abs(left-right) > 200*eps*room {
			t.Errorf("%s: transposed gives %.15g, want %.15g", name, right, left)
		}
	})
}

// TestEliminateSingular: which stores are named.
func TestEliminateSingular(t *testing.T) {
	cases := []struct {
		name string
		make func() *Balance
		want []int
	}{
		{"one store", func() *Balance { b := newBalance(1); return b }, []int{0}},
		{"an island beside a tied store", func() *Balance {
			b := newBalance(4)
			b.join(1, 3, 2)
			b.join(0, 2, 2)
			b.Leak[0] = 1
			return b
		}, []int{1, 3}},
		{"a loop of streams, and what it feeds", func() *Balance {
			b := newBalance(5)
			b.F[0*5+1], b.F[1*5+0] = 2, 3 // 0 and 1 follow each other
			b.F[2*5+1] = 1                // 2 follows 1, though it leaks
			b.Leak[2], b.Leak[3] = 1, 1
			b.F[4*5+3] = 1
			return b
		}, []int{0, 1, 2}},
		{"a store that feeds itself as much as it leaks through a neighbour", func() *Balance {
			b := newBalance(3)
			b.join(0, 1, 2)
			b.Leak[1] = 2 // from 0 to the reference: 1
			b.Leak[0] = -1
			b.Leak[2] = 1
			return b
		}, []int{0, 1}},
	}
	for _, c := range cases {
		b := c.make()
		for i := range b.C {
			b.C[i] = 1
		}
		_, err := b.Eliminate()
		var s *Singular
		if !errors.As(err, &s) || !slices.Equal(s.Stores, c.want) {
			t.Errorf("%s: %v %v, want stores %v", c.name, err, s, c.want)
		}
	}
}

// TestEliminateHiddenPivot: both stores have a sum of zero, yet the balance is
// regular: 0 = 2 x₁ + f₀ and 0 = 3 x₀ + f₁.
func TestEliminateHiddenPivot(t *testing.T) {
	b := newBalance(2)
	b.C[0], b.C[1] = 1, 1
	b.F[0*2+1], b.Leak[0] = 2, -2
	b.F[1*2+0], b.Leak[1] = 3, -3
	e, err := b.Eliminate()
	if err != nil {
		t.Fatal(err)
	}
	if x := e.Solve([]float64{4, 6}); x[0] != -2 || x[1] != -2 {
		t.Errorf("levels %v, want -2 -2", x)
	}
	if x := e.SolveTransposed([]float64{6, 4}); x[0] != -2 || x[1] != -2 {
		t.Errorf("transposed %v, want -2 -2", x)
	}
}

// TestEliminateStar: a star seen from its three points is the triangle with
// g_ij = g_i g_j / Σg (Kennelly 1899).
func TestEliminateStar(t *testing.T) {
	g := []float64{3, 1e-9, 2e7}
	star, triangle := newBalance(4), newBalance(3)
	for i, x := range g {
		star.join(i, 3, x)
		for j := range i {
			triangle.join(i, j, x*g[j]/(g[0]+g[1]+g[2]))
		}
	}
	for i := range star.C {
		star.C[i] = 1
	}
	copy(triangle.C, star.C)
	star.Leak[1], triangle.Leak[1] = 5e-4, 5e-4
	a, err := star.Eliminate()
	if err != nil {
		t.Fatal(err)
	}
	d, err := triangle.Eliminate()
	if err != nil {
		t.Fatal(err)
	}
	x, y := a.Solve([]float64{1, 2, 3, 0}), d.Solve([]float64{1, 2, 3})
	for i := range y {
		if math.Abs(x[i]/y[i]-1) > 2e-15 {
			t.Errorf("level %d: star %.17g, triangle %.17g", i, x[i], y[i])
		}
	}
}
