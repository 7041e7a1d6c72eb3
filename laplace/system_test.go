package laplace

import (
	"errors"
	"math"
	"math/cmplx"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace/matrix"
)

func TestNewRefuses(t *testing.T) {
	nan := math.NaN()
	good := func() Realisation {
		return Realisation{Balance: matrix.Balance{N: 2, C: []float64{1, 1}, F: []float64{0, 1, 1, 0}, Leak: []float64{1, 0}},
			B: [][]float64{{1, 0}}, Output: [][]float64{{0, 1}}, D: [][]float64{{0}}}
	}
	for _, c := range []struct {
		want  string
		spoil func(r *Realisation)
	}{
		{"shapes", func(r *Realisation) { r.Balance.F = r.Balance.F[:3] }},
		{"capacity of store 1 is 0", func(r *Realisation) { r.Balance.C[1] = 0 }},
		{"capacity of store 0 is NaN", func(r *Realisation) { r.Balance.C[0] = nan }},
		{"exchange of store 1 with store 0 is +Inf", func(r *Realisation) { r.Balance.F[2] = math.Inf(1) }},
		{"leak of store 0 is NaN", func(r *Realisation) { r.Balance.Leak[0] = nan }},
		{"a row of B", func(r *Realisation) { r.B[0] = r.B[0][:1] }},
		{"a row of Output", func(r *Realisation) { r.Output[0] = nil }},
		{"D has not one row", func(r *Realisation) { r.D = [][]float64{} }},
		{"D has not one column", func(r *Realisation) { r.D[0] = nil }},
		{"not a finite number", func(r *Realisation) { r.Output[0][1] = nan }},
	} {
		r := good()
		c.spoil(&r)
		if _, err := New(r); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("error %v, want %q", err, c.want)
		}
	}
	if _, err := New(good()); err != nil {
		t.Error(err)
	}
	one := mat.NewDense(1, 1, []float64{1})
	if _, err := FromMatrices(mat.NewDense(2, 2, nil), one, one, nil); err == nil {
		t.Error("shapes that do not fit are taken")
	}
	if _, err := FromMatrices(one, one, one, mat.NewDense(1, 2, nil)); err == nil {
		t.Error("a d that does not fit is taken")
	}
	if _, err := FromMatrices(mat.NewDense(1, 1, []float64{nan}), one, one, nil); err == nil {
		t.Error("a matrix with a NaN is taken")
	}
}

// Ladder of n sections, R = C = 1, fed at one end and open at the other:
// p = −4 sin²((2k−1)π/(4n+2)).
func TestLadderPoles(t *testing.T) {
	const n = 40
	b := matrix.Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	b.Leak[0] = 1
	for i := range n {
		b.C[i] = 1
		if i > 0 {
			b.F[i*n+i-1], b.F[(i-1)*n+i] = 1, 1
		}
	}
	s, err := New(Realisation{Balance: b})
	if err != nil {
		t.Fatal(err)
	}
	if s.Order() != n || len(s.Poles()) != n {
		t.Fatalf("order %d, %d poles", s.Order(), len(s.Poles()))
	}
	for k, p := range s.Poles() {
		sin := math.Sin(float64(2*k+1) * math.Pi / (4*n + 2))
		near(t, "pole", real(p.P), -4*sin*sin, 1e-14)
	}
}

func TestShape(t *testing.T) {
	// two equal stores joined: both move together in the slow pole, against each other
	// in the fast one
	b := matrix.Balance{N: 2, C: []float64{1, 1}, F: []float64{0, 5, 5, 0}, Leak: []float64{1, 1}}
	s, err := New(Realisation{Balance: b, B: [][]float64{{1, 0}}, Output: [][]float64{{1, 0}, {0, 1}}})
	if err != nil {
		t.Fatal(err)
	}
	for pole, want := range []float64{1, -1} {
		a, ok1 := s.Shape(0, pole)
		b, ok2 := s.Shape(1, pole)
		if !ok1 || !ok2 || math.Abs(real(b/a)-want) > 1e-14 {
			t.Errorf("pole %d: %v and %v, want the ratio %g", pole, a, b, want)
		}
	}
	o := oscillator(t, 3, 0.1)
	low, _ := o.Shape(0, 0)
	high, ok := o.Shape(0, 1)
	if !ok || low != cmplx.Conj(high) || high == 0 {
		t.Errorf("a pair has the shapes %v and %v", low, high)
	}
	close := cascade(t, 1, 1+0x1p-30)
	for pole := range 2 {
		if v, ok := close.Shape(0, pole); !ok || cmplx.IsNaN(v) {
			t.Errorf("pole %d of a block: %v %v", pole, v, ok)
		}
	}
	if _, ok := cascade(t, 1, 1).Shape(0, 0); ok {
		t.Error("a repeated pole has a shape")
	}
}

// cascade is a chain of stores each passing to the next, with these rates.
func cascade(t testing.TB, rates ...float64) *System {
	t.Helper()
	n := len(rates)
	b := matrix.Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	in, out := make([]float64, n), make([]float64, n)
	in[0], out[n-1] = rates[0], 1
	for i, r := range rates {
		b.C[i] = 1
		if i == 0 {
			b.Leak[0] = r
		} else {
			b.F[i*n+i-1] = r
		}
	}
	s, err := New(Realisation{Balance: b, B: [][]float64{in}, Output: [][]float64{out}})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// A chain of m equal stores answers a step by 1 − e^−t Σ t^k/k!: a Jordan chain.
func TestJordanChain(t *testing.T) {
	for _, m := range []int{2, 5, 8} {
		rates := make([]float64, m)
		for i := range rates {
			rates[i] = 1
		}
		s := cascade(t, rates...)
		if p := s.Poles(); len(p) != 1 || p[0].Mult != m || p[0].P != -1 || p[0].Radius > 1e-15 {
			t.Errorf("poles %v", p)
		}
		r := respond(t, s, 50, Step(0, 1, 0))
		for _, at := range []float64{1e-3, 0.5, 3, 10, 40} {
			sum, term := 0.0, math.Exp(-at)
			for k := 1; k <= 400; k++ { // the tail e^−t Σ_{k≥m} t^k/k!
				if term *= at / float64(k); k >= m {
					sum += term
				}
			}
			if d := math.Abs(r.At(0, at) - sum); d > 4e-15 {
				t.Errorf("%d stores at %g s: %v, want %v", m, at, r.At(0, at), sum)
			}
		}
		h, err := s.Transfer(0, 0)
		if err != nil {
			t.Fatal(err)
		}
		if h.Behaviour != "critically damped" || math.Abs(real(h.Residues[0][m-1])-1) > 1e-13 {
			t.Errorf("%s, residues %v", h.Behaviour, h.Residues)
		}
	}
}

// A gap of 2^−40 is no repeated pole.
func TestCloseIsNotEqual(t *testing.T) {
	s := cascade(t, 1, 1+0x1p-40)
	if p := s.Poles(); len(p) != 2 || p[0].P != -1 || p[1].P != -(1+0x1p-40) {
		t.Errorf("poles %v", p)
	}
}

func TestBehaviours(t *testing.T) {
	leak := func(g float64) *System { return single(t, 1, g) }
	for _, c := range []struct {
		want string
		s    *System
	}{
		{"overdamped", leak(1)}, {"integrating", leak(0)}, {"unstable", leak(-1)},
		{"undamped", oscillator(t, 2, 0)}, {"underdamped", oscillator(t, 2, 0.5)},
		{"critically damped", oscillator(t, 2, 1)}, {"overdamped", oscillator(t, 2, 1.5)}, {"unstable", oscillator(t, 2, -0.5)},
	} {
		h, err := c.s.Transfer(0, 0)
		if err != nil {
			t.Fatal(err)
		}
		if h.Behaviour != c.want {
			t.Errorf("%s, want %s: %v", h.Behaviour, c.want, h.Poles)
		}
		m, err := h.Step()
		if err != nil {
			t.Fatal(err)
		}
		settles := c.want == "overdamped" || c.want == "underdamped" || c.want == "critically damped"
		if settles != (m.Final != nil) || settles != (m.Settling2 != nil) {
			t.Errorf("%s: %+v", c.want, m)
		}
	}
}

func TestGain(t *testing.T) {
	// a leak 1e-15 of the exchange: H(0) is 1/leak to the last digit
	b := matrix.Balance{N: 2, C: []float64{1, 1}, F: []float64{0, 1e6, 1e6, 0}, Leak: []float64{0, 1e-9}}
	s, err := New(Realisation{Balance: b, B: [][]float64{{1, 0}}, Output: [][]float64{{0, 1}, {1, -1}}})
	if err != nil {
		t.Fatal(err)
	}
	if g, ok := s.Gain(0, 0); !ok || math.Abs(g-1e9) > 2e-7 {
		t.Errorf("gain %v %v", g, ok)
	}
	if _, ok := single(t, 1, 0).Gain(0, 0); ok {
		t.Error("an integrator has a gain")
	}
	r := respond(t, s, 10, Step(0, 1, 0))
	if y, ok := r.Final(0); !ok || math.Abs(y-1e9) > 2e-7 {
		t.Errorf("final %v %v", y, ok)
	}
	if y, ok := respond(t, s, 10, Sine(0, 1, 1, 0)).Final(0); ok {
		t.Errorf("a sine ends at %g", y)
	}
	if y, ok := respond(t, single(t, 1, 0), 10, Step(0, 1, 0)).Final(0); ok {
		t.Errorf("an integrator ends at %g", y)
	}
}

// An island without leak has a pole at 0; what does not see it has a gain.
func TestGainPastAPoleAtZero(t *testing.T) {
	b := matrix.Balance{N: 2, C: []float64{2, 3}, F: []float64{0, 4, 4, 0}, Leak: []float64{0, 0}}
	s, err := New(Realisation{Balance: b, B: [][]float64{{1, 0}, {1, -1}}, Output: [][]float64{{1, -1}, {2, 3}}})
	if err != nil {
		t.Fatal(err)
	}
	// a flow of 1 into the first store: 3/5 of it goes on to the second, which takes a
	// difference of 3/5/4
	if g, ok := s.Gain(0, 0); !ok || math.Abs(g-0.15) > 1e-16 {
		t.Errorf("gain %v %v, want 0.15", g, ok)
	}
	if _, ok := s.Gain(0, 1); ok {
		t.Error("what is stored in all has a gain")
	}
	if g, ok := s.Gain(1, 1); !ok || math.Abs(g) > 1e-16 {
		t.Errorf("moving from one store to the other has the gain %v %v", g, ok)
	}
	// the same beside a damped swing and a plain matrix
	a := mat.NewDense(4, 4, []float64{-2, 2, 0, 0, 4. / 3, -4. / 3, 0, 0, 0, 0, -0.1, 2, 0, 0, -2, -0.1})
	p, err := FromMatrices(a, mat.NewDense(4, 1, []float64{0.5, 0, 0, 1}), mat.NewDense(2, 4, []float64{1, -1, 0, 1, 0, 0, 1, 0}), nil)
	if err != nil {
		t.Fatal(err)
	}
	if g, ok := p.Gain(0, 0); !ok || math.Abs(g-(0.15+0.1/4.01)) > 1e-15 {
		t.Errorf("gain %v %v, want %v", g, ok, 0.15+0.1/4.01)
	}
	if g, ok := p.Gain(0, 1); !ok || math.Abs(g-2/4.01) > 1e-15 {
		t.Errorf("gain %v %v, want %v", g, ok, 2/4.01)
	}
}

// One response serves several goroutines.
func TestConcurrentUse(t *testing.T) {
	s := cascade(t, 1, 1, 1, 2)
	r := respond(t, s, 20, wave(t)(Pulse(PulseTrain{High: 1, Width: 1, Period: 3})))
	want := r.At(0, 7.5)
	top := r.Max(0, 0, 20)
	done := make(chan bool)
	for range 4 {
		go func() {
			ok := true
			for i := range 50 {
				r.At(0, float64(i)/3)
				ok = ok && r.At(0, 7.5) == want && r.Max(0, 0, 20) == top
			}
			done <- ok
		}()
	}
	for range 4 {
		if !<-done {
			t.Error("answers differ between goroutines")
		}
	}
}

func TestOverflowIsSaid(t *testing.T) {
	_, err := single(t, 1, -2).Respond([]Waveform{Step(0, 1, 0)}, nil, 1e4)
	var o *Overflow
	if !errors.As(err, &o) || o.At != 300 {
		t.Errorf("error %v, want *Overflow at 300 s", err)
	}
	if _, err = single(t, 1, -2).Respond([]Waveform{Constant(0)}, nil, 1e4); err != nil {
		t.Errorf("nothing grows where nothing drives: %v", err)
	}
}

// A sine at the very frequency of an undamped pair, one a hair beside it, and the
// closed forms of both.
func TestResonance(t *testing.T) {
	s := oscillator(t, 1, 0)
	for _, w := range []float64{1, 1 + 1e-9, 1 - 0x1p-30, 1.01} {
		r := respond(t, s, 100, Sine(0, 1, w, 0))
		for _, at := range []float64{0.1, 3, 50, 99} {
			// y″ + y = sin wt from rest: (sin wt − w sin t)/(1 − w²); with w = 1 + d,
			// sin wt − sin t = 2 cos(t + dt/2) sin(dt/2)
			d := w - 1
			swing := at * math.Cos(at+d*at/2)
			if d != 0 {
				swing = 2 * math.Cos(at+d*at/2) * math.Sin(d*at/2) / d
			}
			want := (math.Sin(at) - swing) / (2 + d)
			if e := math.Abs(r.At(0, at) - want); e > 2e-15*(1+at) {
				t.Errorf("w = 1%+g at %g s: %v, want %v", d, at, r.At(0, at), want)
			}
		}
	}
}

// A decay at the rate of a pole, and of a chain of equal poles.
func TestDecayAtAPole(t *testing.T) {
	w := wave(t)(Decay([][2]float64{{1, 1}}))
	for m := 1; m <= 4; m++ {
		rates := make([]float64, m)
		for i := range rates {
			rates[i] = 1
		}
		r := respond(t, cascade(t, rates...), 40, w)
		for _, at := range []float64{0.01, 1, 7, 30} {
			want := math.Exp(-at) * math.Pow(at, float64(m)) / math.Gamma(float64(m+1))
			if d := math.Abs(r.At(0, at) - want); d > 2e-15 {
				t.Errorf("%d stores at %g s: %v, want %v", m, at, r.At(0, at), want)
			}
		}
	}
}

func TestBeforeAndBeyond(t *testing.T) {
	s := single(t, 1, 1)
	r, err := s.Respond([]Waveform{Step(0, 1, 0)}, []float64{7}, 2)
	if err != nil {
		t.Fatal(err)
	}
	if r.At(0, -1) != 7 || r.Left(0, 0) != 7 || r.At(0, 0) != 7 {
		t.Errorf("before 0: %g %g %g", r.At(0, -1), r.Left(0, 0), r.At(0, 0))
	}
	if r.At(0, 5) != r.At(0, 2) || r.Left(0, 5) != r.Left(0, 2) {
		t.Error("a time beyond until is not until")
	}
	if e := r.Max(0, 3, 4); e.Y != r.At(0, 2) {
		t.Errorf("beyond until the highest is %+v", e)
	}
	y := [][]float64{make([]float64, 4)}
	r.Table([]float64{-1, 0, 1, 9}, y)
	if y[0][0] != 7 || y[0][1] != 7 || y[0][3] != r.At(0, 2) {
		t.Errorf("table %v", y)
	}
}

func TestWarnings(t *testing.T) {
	// a pole and a zero that coincide within rounding, in a plain matrix, where only
	// bounds can tell
	a := mat.NewDense(2, 2, []float64{-1, 0, 0, -3})
	s, err := FromMatrices(a, mat.NewDense(2, 1, []float64{1, 1e-17}), mat.NewDense(1, 2, []float64{1, 1}), nil)
	if err != nil {
		t.Fatal(err)
	}
	h, err := s.Transfer(0, 0)
	if err != nil {
		t.Fatal(err)
	}
	if len(h.Poles) != 1 || len(h.Cancelled) != 1 || len(h.Warnings) != 1 || h.Warnings[0].Code != "cancelled" {
		t.Errorf("poles %v, cancelled %v, warnings %v", h.Poles, h.Cancelled, h.Warnings)
	}
}
