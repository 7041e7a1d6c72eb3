package sparse

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"pgregory.net/rapid"
)

// scaledResidual is ‖b − A x‖ / (‖A‖ ‖x‖ ε) in the greatest norms, of the rows brought to
// one size.
func scaledResidual(m *Matrix, x, b []float64) float64 {
	row, r := make([]float64, m.N), append([]float64(nil), b...)
	most := make([]float64, m.N)
	for j := range m.N {
		for p := m.Start[j]; p < m.Start[j+1]; p++ {
			i := m.Row[p]
			r[i] = math.FMA(-m.Val[p], x[j], r[i])
			row[i] += math.Abs(m.Val[p])
			most[i] = max(most[i], math.Abs(x[j]))
		}
	}
	size := 0.0
	for _, v := range x {
		size = max(size, math.Abs(v))
	}
	worst := 0.0
	for i := range r {
		if row[i] > 0 {
			worst = max(worst, math.Abs(r[i])/(row[i]*size*0x1p-52))
		}
	}
	return worst
}

// Every solve has a small residual, the first and those that put other numbers into the
// same pattern. 30 is the threshold of LAPACK's own tests.
func TestSolve(t *testing.T) {
	for _, f := range families() {
		for _, n := range []int{0, 1, 2, 3, 5, 10, 50, 500} {
			r := rand.New(rand.NewPCG(uint64(n), 7))
			m := f.make(n, r)
			lu := Analyse(m)
			for round := range 3 {
				b := make([]float64, m.N)
				for i := range b {
					b[i] = r.NormFloat64()
				}
				if err := lu.Factor(m); err != nil {
					if f.name == "random" || f.name == "flows and levels" {
						break // drawn singular
					}
					t.Fatalf("%s %d: %v", f.name, n, err)
				}
				x := append([]float64(nil), b...)
				lu.Solve(x)
				if w := scaledResidual(m, x, b); !(w < 30) {
					t.Errorf("%s, n = %d, round %d: scaled residual %.3g", f.name, n, round, w)
				}
				for p := range m.Val {
					m.Val[p] *= 1 + 0.3*r.Float64()/float64(n+1)
				}
			}
		}
	}
}

// What is found with the pivots kept is what a new analysis finds: residuals may grow by
// what a small pivot lets through.
func TestRefactorAgreesWithNew(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 30).Draw(t, "n")
		r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 1))
		all := families()
		m := all[rapid.IntRange(0, len(all)-1).Draw(t, "family")].make(n, r)
		lu := Analyse(m)
		if lu.Factor(m) != nil {
			return // drawn singular
		}
		for p := range m.Val {
			m.Val[p] *= spread(r, 6)
		}
		b, x, y := make([]float64, m.N), make([]float64, m.N), make([]float64, m.N)
		for i := range b {
			b[i] = r.NormFloat64()
		}
		copy(x, b)
		copy(y, b)
		errKept, fresh := lu.Factor(m), Analyse(m)
		errNew := fresh.Factor(m)
		if errKept != nil || errNew != nil {
			return // the numbers may have become singular
		}
		lu.Solve(x)
		fresh.Solve(y)
		if u, v := scaledResidual(m, x, b), scaledResidual(m, y, b); u > 30*(1+v)/accepted {
			t.Fatalf("scaled residual %.3g with the pattern kept, %.3g anew", u, v)
		}
	})
}

// Scaling the system by a power of two scales the answer, bit for bit.
func TestPowersOfTwo(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 3))
	m := grid(8, 9, func() float64 { return spread(r, 3) }).matrix()
	x, y := make([]float64, m.N), make([]float64, m.N)
	for i := range x {
		x[i] = r.NormFloat64()
		y[i] = math.Ldexp(x[i], 40)
	}
	lu := Analyse(m)
	if err := lu.Factor(m); err != nil {
		t.Fatal(err)
	}
	lu.Solve(x)
	for p := range m.Val {
		m.Val[p] = math.Ldexp(m.Val[p], -7)
	}
	if err := lu.Factor(m); err != nil {
		t.Fatal(err)
	}
	lu.Solve(y)
	for i := range x {
		if y[i] != math.Ldexp(x[i], 47) {
			t.Fatalf("unknown %d: %v and %v", i, x[i], y[i])
		}
	}
}

// A grid that nothing ties to ground has no inverse, and neither has a matrix with an
// empty column, which is named.
func TestSingular(t *testing.T) {
	floating := &triples{n: 12}
	for i := range 11 {
		floating.wire(i, i+1, float64(i+1)/7)
		floating.wire(i, (i*5+3)%12, 0.3)
	}
	var s *Singular
	m := floating.matrix()
	if err := Analyse(m).Factor(m); !errors.As(err, &s) {
		t.Errorf("floating: %v", err)
	}
	empty := grid(3, 3, func() float64 { return 1 })
	for k, e := range empty.at {
		if e.Col == 4 {
			empty.vals[k] = 0
		}
	}
	m = empty.matrix()
	lu := Analyse(m)
	if err := lu.Factor(m); !errors.As(err, &s) || s.Column != 4 {
		t.Errorf("empty column 4: %v", err)
	}
	m = grid(3, 3, func() float64 { return 1 }).matrix()
	lu = Analyse(m)
	if err := lu.Factor(m); err != nil {
		t.Fatal(err)
	}
	clear(m.Val)
	if err := lu.Factor(m); !errors.As(err, &s) {
		t.Errorf("all zero: %v", err)
	}
	for p := range m.Val {
		m.Val[p] = math.NaN()
	}
	if err := lu.Factor(m); err == nil {
		t.Error("not a number: no error")
	}
}

// The order keeps the fill of a grid near that of nested dissection, n·log2(n)·31/4
// (George, Nested dissection of a regular finite element mesh, SIAM J. Numer. Anal. 10, 1973),
// and a tree fills nothing.
func TestOrderKeepsFill(t *testing.T) {
	m := grid(32, 32, func() float64 { return 1 }).matrix()
	lu := Analyse(m)
	if err := lu.Factor(m); err != nil {
		t.Fatal(err)
	}
	if bound := 31.0 / 4 * 1024 * 10 / 3; float64(len(lu.lVal)) > bound {
		t.Errorf("grid: %d entries below the diagonal, want at most %.0f", len(lu.lVal), bound)
	}
	m = families()[1].make(500, rand.New(rand.NewPCG(1, 1)))
	lu = Analyse(m)
	if err := lu.Factor(m); err != nil {
		t.Fatal(err)
	}
	if entries := (len(m.Row) - m.N) / 2; len(lu.lVal) != entries {
		t.Errorf("tree: %d entries below the diagonal, want %d", len(lu.lVal), entries)
	}
}

func BenchmarkLU(b *testing.B) {
	r := rand.New(rand.NewPCG(1, 2))
	m := grid(40, 25, func() float64 { return spread(r, 1) }).matrix()
	lu := Analyse(m)
	if err := lu.Factor(m); err != nil {
		b.Fatal(err)
	}
	x := make([]float64, m.N)
	b.Run("analyse/grid=40x25", func(b *testing.B) {
		for b.Loop() {
			if err := Analyse(m).Factor(m); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("factor/grid=40x25", func(b *testing.B) {
		for b.Loop() {
			if err := lu.Factor(m); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("solve/grid=40x25", func(b *testing.B) {
		for b.Loop() {
			for i := range x {
				x[i] = 1
			}
			lu.Solve(x)
		}
	})
	b.ReportMetric(float64(len(lu.lVal)), "below")
}
