package stiff

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// linear is x′ = A x with a full matrix.
func linear(a [][]float64) *dense {
	d := newDense(ones(len(a))...)
	d.rates = func(_ float64, x, f []float64) {
		for i, row := range a {
			f[i] = 0
			for k, v := range row {
				f[i] += v * x[k]
			}
		}
	}
	d.jac = func(_ float64, _ []float64, j [][]float64) {
		for i, row := range a {
			copy(j[i], row)
		}
	}
	return d
}

// What the columns of A sum to zero for is kept, whatever the steps, but for the rounding
// of the solves: a step h long in a network of rates A amplifies it by |A|h.
func TestLinearInvariantIsKept(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 5).Draw(t, "n")
		a, fastest := make([][]float64, n), 1.0
		for i := range a {
			a[i] = make([]float64, n)
		}
		for i := range n {
			for k := range i {
				g := math.Exp(rapid.Float64Range(-7, 7).Draw(t, "g"))
				a[i][k] += g
				a[k][i] += g
				a[i][i] -= g
				a[k][k] -= g
				fastest = max(fastest, g)
			}
		}
		d := linear(a)
		g := New(d, Control{RelTol: 1e-4, Scale: ones(n)}, n)
		x, sum := make([]float64, n), 0.0
		for i := range x {
			x[i] = rapid.Float64Range(-100, 100).Draw(t, "x")
			sum += x[i]
		}
		g.Start(d.mass, 0, x, 1e3, 0)
		for g.T1 < 1e3 {
			if err := g.Step(1e3, math.Inf(1)); err != nil {
				t.Fatal(err)
			}
			now := 0.0
			for _, v := range g.X1 {
				now += v
			}
			if math.Abs(now-sum) > 2e4*0x1p-52*fastest*1e3 { // values to 100, coefficients of the method to 165
				t.Fatalf("sum %v at %v, was %v", now, g.T1, sum)
			}
		}
	})
}

// Time scaled by a power of two gives the same steps, digit for digit.
func TestTimeScales(t *testing.T) {
	run := func(k float64) (x float64, steps int) {
		d := newDense(1)
		d.rates = func(t float64, x, f []float64) { f[0] = k * (math.Sin(k*t) - x[0]*x[0]*x[0]) }
		d.jac = func(_ float64, x []float64, j [][]float64) { j[0][0] = -3 * k * x[0] * x[0] }
		d.drift = func(t float64, _, ft []float64) { ft[0] = k * k * math.Cos(k*t) }
		g := New(d, Control{RelTol: 1e-7, Scale: ones(1)}, 1)
		g.Start(d.mass, 0, []float64{0.5}, 8/k, 1/(1024*k))
		for g.T1 < 8/k {
			if err := g.Step(8/k, math.Inf(1)); err != nil {
				t.Fatal(err)
			}
		}
		return g.X1[0], g.Taken
	}
	x, n := run(1)
	for _, k := range []float64{0x1p-20, 4, 0x1p30} {
		if y, m := run(k); y != x || m != n {
			t.Errorf("time × %g: %v in %d steps, want %v in %d", 1/k, y, m, x, n)
		}
	}
}

// A fast part that has died out does not hold the steps short.
func TestStiffPartsDoNotHoldTheSteps(t *testing.T) {
	d := linear([][]float64{{-1e9, 1e9}, {0, -1}})
	g := New(d, Control{RelTol: 1e-7, Scale: ones(2)}, 2)
	g.Start(d.mass, 0, []float64{0, 1}, 10, 0)
	for g.T1 < 10 {
		if err := g.Step(10, math.Inf(1)); err != nil {
			t.Fatal(err)
		}
	}
	if math.Abs(g.X1[1]-math.Exp(-10)) > 1e-8 || math.Abs(g.X1[0]-g.X1[1]) > 1e-8 {
		t.Errorf("ends at %v, want %v twice", g.X1, math.Exp(-10))
	}
	if g.Taken > 120 {
		t.Errorf("%d steps", g.Taken)
	}
}

// What cannot go on says where, and leaves the last good state.
func TestStuck(t *testing.T) {
	blowUp := newDense(1) // x′ = x², x = 1/(1 − t)
	blowUp.rates = func(_ float64, x, f []float64) { f[0] = x[0] * x[0] }
	blowUp.jac = func(_ float64, x []float64, j [][]float64) { j[0][0] = 2 * x[0] }

	none := newDense(1) // no number beyond t = 1
	none.rates = func(t float64, x, f []float64) {
		if f[0] = -x[0]; t > 1 {
			f[0] = math.NaN()
		}
	}
	none.jac = func(_ float64, _ []float64, j [][]float64) { j[0][0] = -1 }

	open := newDense(1, 0) // nothing determines the second unknown
	open.rates = func(_ float64, x, f []float64) { f[0], f[1] = -x[0], 0 }
	open.jac = func(_ float64, _ []float64, j [][]float64) { j[0][0], j[1][1] = -1, 0 }

	for _, c := range []struct {
		name string
		d    *dense
		at   float64
	}{{"blow-up", blowUp, 1}, {"NaN", none, 1}, {"singular", open, 0}} {
		n := len(c.d.mass)
		g := New(c.d, Control{RelTol: 1e-7, Scale: ones(n)}, n)
		x := ones(n)
		g.Start(c.d.mass, 0, x, 2, 0)
		var err error
		for k := 0; err == nil && g.T1 < 2; k++ {
			if k > 20000 {
				t.Fatalf("%s: goes on for ever", c.name)
			}
			err = g.Step(2, math.Inf(1))
		}
		var s *Stuck
		if !errors.As(err, &s) || math.Abs(s.T-c.at) > 1e-6 {
			t.Errorf("%s: %v, want a halt at %v", c.name, err, c.at)
		}
		for _, v := range g.X1 {
			if v-v != 0 {
				t.Errorf("%s: left with %v", c.name, g.X1)
			}
		}
	}
}

// The tolerance is kept on the relaxation oscillator of van der Pol, whose solution
// turns fast and slow: two tolerances agree as they promise.
func TestVanDerPol(t *testing.T) {
	run := func(tol float64) (float64, int) {
		const mu = 1e3
		d := newDense(1, 1)
		d.rates = func(_ float64, x, f []float64) { f[0], f[1] = x[1], mu*((1-x[0]*x[0])*x[1])-x[0] }
		d.jac = func(_ float64, x []float64, j [][]float64) {
			j[0][0], j[0][1] = 0, 1
			j[1][0], j[1][1] = -2*mu*x[0]*x[1]-1, mu*(1-x[0]*x[0])
		}
		g := New(d, Control{RelTol: tol, Scale: []float64{1, 1}}, 2)
		g.Start(d.mass, 0, []float64{2, 0}, 2000, 0)
		for g.T1 < 2000 {
			if err := g.Step(2000, math.Inf(1)); err != nil {
				t.Fatal(err)
			}
		}
		return g.X1[0], g.Taken
	}
	want, _ := run(1e-11)
	x, steps := run(1e-7)
	t.Logf("%d steps, error %.1e", steps, x-want)
	// x(2000) = 1.706167732170469 (Hairer & Wanner, test set of the book's codes, from memory)
	if math.Abs(want-1.706167732170469) > 1e-7 || math.Abs(x-want) > 1e-4 || steps > 800 {
		t.Errorf("%v in %d steps, and %v at a tight tolerance", x, steps, want)
	}
}
