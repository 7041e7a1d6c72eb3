package laplace

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

func TestSuperposition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network", "plain")
		end := s.span()
		u := drawWaves(t, s, end)
		whole := mustRespond(t, s, u, end)
		parts := make([]*Response, len(u))
		for i := range u {
			one := make([]Waveform, len(u))
			one[i] = u[i]
			parts[i] = mustRespond(t, s, one, end)
		}
		for k := range 20 {
			at := end * float64(k) / 19
			for m := range s.c {
				sum, tol := 0.0, 4*whole.Rounding(m)
				for _, p := range parts {
					sum += p.At(m, at)
					tol += 4 * p.Rounding(m)
				}
				if d := math.Abs(whole.At(m, at) - sum); !(d <= tol) {
					t.Fatalf("output %d at %g s: %g and %g differ by %g, tolerance %g", m, at, whole.At(m, at), sum, d, tol)
				}
			}
		}
	})
}

// Inputs times 2^k give outputs times 2^k, and time times 4^k the same outputs, bit
// for bit: no constant with a unit hides in the arithmetic. The vectors of a system
// that is no network of resistances and capacitances have a scale that is no power
// of two, so that there time brings a rounding.
func TestPowersOfTwo(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network")
		end, rc := s.span(), s.plant.isRC()
		u := drawWaves(t, s, end)
		k := rapid.IntRange(-12, 12).Draw(t, "k")
		r := mustRespond(t, s, u, end)
		louder := make([]Waveform, len(u))
		for i := range u {
			louder[i] = u[i].Scaled(math.Ldexp(1, k))
		}
		loud := mustRespond(t, s, louder, end)

		slow, slower := s.inTime(t, 2*k), make([]Waveform, len(u))
		for i := range u {
			slower[i] = inTime(u[i], 2*k)
		}
		late := mustRespond(t, slow, slower, math.Ldexp(end, 2*k))
		for q := range 10 {
			at := end * float64(q) / 9
			for m := range s.c {
				y := r.At(m, at)
				if v := loud.At(m, at); v != math.Ldexp(y, k) {
					t.Fatalf("output %d at %g s is %v, and %v for inputs times 2^%d", m, at, y, v, k)
				}
				if v := late.At(m, math.Ldexp(at, 2*k)); v != y && (rc || !(math.Abs(v-y) <= 8*r.Rounding(m))) {
					t.Fatalf("output %d at %g s is %v, and %v in time times 2^%d", m, at, y, v, 2*k)
				}
			}
		}
		for m := range s.c {
			a, b, c := r.Max(m, 0, end), loud.Max(m, 0, end), late.Max(m, 0, math.Ldexp(end, 2*k))
			if b.T != a.T || b.Y != math.Ldexp(a.Y, k) || rc && (c.T != math.Ldexp(a.T, 2*k) || c.Y != a.Y) {
				t.Fatalf("highest %+v, louder %+v, slower %+v", a, b, c)
			}
		}
	})
}

// inTime is the same system with every time constant times 2^k.
func (s *System) inTime(t *rapid.T, k int) *System {
	b := *s.plant.balance()
	b.C = append([]float64(nil), b.C...)
	for i := range b.C {
		b.C[i] = math.Ldexp(b.C[i], k)
	}
	r, err := New(Realisation{Balance: b, B: s.b, Output: s.c, D: s.d})
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func inTime(w Waveform, k int) Waveform {
	w.Period = math.Ldexp(w.Period, k)
	w.Segments = append([]Segment(nil), w.Segments...)
	for i := range w.Segments {
		g := &w.Segments[i]
		g.At, g.B = math.Ldexp(g.At, k), math.Ldexp(g.B, -k)
		g.Poly = append([]float64(nil), g.Poly...)
		for j := range g.Poly {
			g.Poly[j] = math.Ldexp(g.Poly[j], -k*(j+2))
		}
		g.Exp = append([]Exponential(nil), g.Exp...)
		for j := range g.Exp {
			r := g.Exp[j].Rate
			g.Exp[j].Rate = complex(math.Ldexp(real(r), -k), math.Ldexp(imag(r), -k))
		}
	}
	return w
}

// H(s) from the modes is H(s) from the equations, solved at s.
func TestTransferFromModesAndFromEquations(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network", "plain")
		h, err := s.Transfer(0, 0)
		if err != nil {
			t.Fatal(err)
		}
		size := 1 / s.span()
		at := complex(size*rapid.Float64Range(0.1, 50).Draw(t, "re"), size*rapid.Float64Range(-50, 50).Draw(t, "im"))
		want := s.equations(at)
		scale := cmplx.Abs(want) + h.weights() + math.Abs(s.d[0][0])
		scale += s.size() // what may cancel in the equations
		if d := cmplx.Abs(h.Eval(at) - want); d > 1e-11*scale {
			t.Fatalf("H(%v) is %v from the modes and %v from the equations", at, h.Eval(at), want)
		}
		if h.Numerator != nil {
			ratio := horner(h.Numerator, at) / horner(h.Denominator, at)
			if d := cmplx.Abs(ratio - want); d > 1e-9*scale {
				t.Fatalf("H(%v) is %v from the polynomials and %v from the equations", at, ratio, want)
			}
		}
	})
}

// size is a bound of what an input can put into an output.
func (s *System) size() float64 {
	b, c := 0.0, 0.0
	for i := range s.b[0] {
		b, c = max(b, math.Abs(s.b[0][i])), max(c, math.Abs(s.c[0][i]))
	}
	return b * c * s.span()
}

func horner(c []float64, s complex128) complex128 {
	var v complex128
	for k := len(c) - 1; k >= 0; k-- {
		v = v*s + complex(c[k], 0)
	}
	return v
}

// equations solves (sI − A)x = b for input 0 and output 0.
func (s *System) equations(at complex128) complex128 {
	q := block{n: s.plant.n, t: s.plant.dense}
	if s.plant.balance() != nil {
		q.t = s.plant.balance().Dense()
	}
	x := make([]complex128, q.n)
	for i, v := range s.b[0] {
		x[i] = complex(v, 0)
		if s.plant.balance() != nil {
			x[i] /= complex(s.plant.balance().C[i], 0)
		}
	}
	q.resolve(at, x)
	y := complex(s.d[0][0], 0)
	for i, c := range s.c[0] {
		y += complex(c, 0) * x[i]
	}
	return y
}

func TestStepSettlesAtGain(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network")
		h, err := s.Transfer(0, 0)
		if err != nil {
			t.Fatal(err)
		}
		if len(h.Poles) == 0 || !h.HasGain {
			return
		}
		end := h.horizon()
		r, err := h.unitStep(end)
		if err != nil {
			t.Fatal(err)
		}
		if d := math.Abs(r.At(0, end) - h.Gain); !(d <= 1e-12*h.weights()) {
			t.Fatalf("a step ends at %g, H(0) is %g", r.At(0, end), h.Gain)
		}
		sum := 0.0
		for _, w := range h.Weights {
			sum += w
		}
		if len(h.Weights) > 0 && math.Abs(sum-1) > 1e-11*h.weights()/math.Abs(h.Gain-h.direct) {
			t.Fatalf("weights %v add to %g", h.Weights, sum)
		}
	})
}

func TestPulseIsADifferenceOfSteps(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network", "plain")
		end := s.span()
		on, width := end*rapid.Float64Range(0, 0.5).Draw(t, "on"), end*rapid.Float64Range(0.01, 0.4).Draw(t, "width")
		pulse, err := Pulse(PulseTrain{High: 1, Width: width, At: on, Count: 1})
		if err != nil {
			t.Fatal(err)
		}
		u := make([]Waveform, len(s.b))
		u[0] = pulse
		r := mustRespond(t, s, u, end)
		u[0] = Step(0, 1, 0)
		step := mustRespond(t, s, u, end)
		for m := range s.c {
			for k := range 20 {
				at := end * float64(k) / 19
				want := step.At(m, at-on)
				if at >= on+width {
					want -= step.At(m, at-(on+width))
				}
				if d := math.Abs(r.At(m, at) - want); !(d <= 16*(r.Rounding(m)+step.Rounding(m))) {
					t.Fatalf("output %d at %g s: %g and %g", m, at, r.At(m, at), want)
				}
			}
		}
	})
}

// A march through time, which knows no pole, agrees: classical Runge–Kutta on the
// plain equations, restarted at every break.
func TestMarchAgrees(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network", "plain")
		end := s.span() / 2
		u := drawWaves(t, s, end)
		r := mustRespond(t, s, u, end)
		x := make([]float64, s.plant.n)
		times := append(r.Breaks(), end)
		for i := 1; i < len(times); i++ {
			s.march(u, x, times[i-1], times[i], 400)
			for m, c := range s.c {
				y := dot(c, x)
				for k := range u {
					y += s.d[m][k] * u[k].Left(times[i])
				}
				size := r.Rounding(m)*0x1p50 + math.Abs(y)
				if d := math.Abs(r.Left(m, times[i]) - y); !(d <= 1e-7*size) {
					t.Fatalf("output %d at %g s: %g, a march gives %g", m, times[i], r.Left(m, times[i]), y)
				}
			}
		}
	})
}

// march takes x from t0 to t1 in n steps.
func (s *System) march(u []Waveform, x []float64, t0, t1 float64, n int) {
	a := s.plant.dense
	if s.plant.balance() != nil {
		a = s.plant.balance().Dense()
	}
	slope := func(t float64, x []float64, last bool) []float64 {
		v := make([]float64, len(x))
		for i := range v {
			for k := range u {
				b := s.b[k][i]
				if s.plant.balance() != nil {
					b /= s.plant.balance().C[i]
				}
				if last {
					v[i] += b * u[k].Left(t1)
				} else {
					v[i] += b * u[k].At(t)
				}
			}
			v[i] += dot(a[i*len(x):(i+1)*len(x)], x)
		}
		return v
	}
	h := (t1 - t0) / float64(n)
	plus := func(k float64, v []float64) []float64 {
		w := append([]float64(nil), x...)
		for i := range w {
			w[i] += k * v[i]
		}
		return w
	}
	for i := range n {
		t := t0 + float64(i)*h
		k1 := slope(t, x, false)
		k2 := slope(t+h/2, plus(h/2, k1), false)
		k3 := slope(t+h/2, plus(h/2, k2), false)
		k4 := slope(t+h, plus(h, k3), i == n-1)
		for j := range x {
			x[j] += h / 6 * (k1[j] + 2*k2[j] + 2*k3[j] + k4[j])
		}
	}
}

func TestSearchesAgreeWithSamples(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc", "network", "plain")
		end := s.span()
		r := mustRespond(t, s, drawWaves(t, s, end), end)
		const n = 2000
		low, high := r.Min(0, 0, end), r.Max(0, 0, end)
		tol := 16*r.Rounding(0) + 1e-300
		level := low.Y + rapid.Float64Range(-0.1, 1.1).Draw(t, "share")*(high.Y-low.Y)
		first, ok := r.First(0, level, 0, end)
		out, leaves := r.LastOutside(0, 0, math.Abs(level), 0, end)
		for k := range n {
			at := end * float64(k) / (n - 1)
			y := r.At(0, at)
			if y > high.Y+tol || y < low.Y-tol {
				t.Fatalf("%g at %g s lies outside [%g, %g]", y, at, low.Y, high.Y)
			}
			if side := r.At(0, 0) - level; (!ok || at < first.Lo) && side*(y-level) < 0 && math.Abs(y-level) > tol {
				t.Fatalf("%g at %g s lies beyond %g before %+v", y, at, level, first)
			}
			if math.Abs(y) > math.Abs(level)+tol && (!leaves || at > out.T*(1+1e-12)) {
				t.Fatalf("%g at %g s lies outside ±%g after %+v %v", y, at, level, out, leaves)
			}
		}
	})
}

// Nothing that can be stated gives a panic or a NaN.
func FuzzResponse(f *testing.F) {
	f.Fuzz(rapid.MakeFuzz(checkFinite))
}

func TestResponsesAreFinite(t *testing.T) { rapid.Check(t, checkFinite) }

func checkFinite(t *rapid.T) {
	s := drawSystem(t, "rc", "network", "plain")
	end := s.span() * math.Ldexp(1, rapid.IntRange(-40, 5).Draw(t, "span"))
	r, err := s.Respond(drawWaves(t, s, s.span()), nil, end)
	if err != nil {
		return
	}
	times := make([]float64, 100)
	for i := range times {
		times[i] = end * float64(i) / 99
	}
	y := make([][]float64, len(s.c))
	for m := range y {
		y[m] = make([]float64, len(times))
	}
	r.Table(times, y)
	for m := range y {
		for i, v := range y[m] {
			if !isNumber(v) {
				t.Fatalf("output %d at %g s is %g", m, times[i], v)
			}
		}
		for _, e := range []Extreme{r.Max(m, 0, end), r.Min(m, 0, end)} {
			if !isNumber(e.Y) || !isNumber(e.T) {
				t.Fatalf("output %d: %+v", m, e)
			}
		}
		if x, ok := r.First(m, y[m][50], 0, end); ok && !(x.Lo <= x.T && x.T <= x.Hi) {
			t.Fatalf("output %d: %+v", m, x)
		}
		for k := range s.b {
			if _, err := s.Step(k, m); err != nil {
				t.Fatal(err)
			}
		}
	}
}
