package laplace_test

import (
	"math"
	"testing"

	"lagbook/laplace"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// The rate of a store that is heated and cools: largest at the step, τ = RC = 200 s.
func TestRateOfStep(t *testing.T) {
	r := responseOf(t, 1/200.0, laplace.Step(0, 1, 10), 1000)
	if e := r.MaxRate(0, 0, 1000); e.T != 10 || math.Abs(e.Y-1/200.0) > 1e-15 || e.AtLeft {
		t.Errorf("largest rate %+v, want 1/200 at 10 s", e)
	}
	if e := r.MinRate(0, 10, 1000); math.Abs(e.Y-math.Exp(-990/200.0)/200) > 1e-15 || e.T != 1000 {
		t.Errorf("smallest rate %+v", e)
	}
	if e := r.MaxRate(0, 20, 1000); e.T != 20 || math.Abs(e.Y-math.Exp(-10/200.0)/200) > 1e-15 {
		t.Errorf("rate from 20 s on %+v", e)
	}
	if got, want := r.Integral(0, 10, 410), 400-200*(1-math.Exp(-2)); math.Abs(got-want) > 1e-11 {
		t.Errorf("integral %v, want %v", got, want)
	}
}

// The steady answer to a sine: rate ω·amplitude, integral over whole periods 0.
func TestRateOfSine(t *testing.T) {
	const w, p = 0.3, 0.05
	r := responseOf(t, p, laplace.Sine(0, 1, w, 0), 2000)
	want := w * p / math.Hypot(w, p)
	t0 := 1000.0
	if e := r.MaxRate(0, t0, t0+2*math.Pi/w); math.Abs(e.Y-want) > 1e-12 {
		t.Errorf("largest rate %+v, want %v", e, want)
	}
	if got := r.Integral(0, t0, t0+4*math.Pi/w); math.Abs(got) > 1e-11 {
		t.Errorf("integral over two periods %v", got)
	}
}

// No difference quotient exceeds the extreme rates, and integrals add up and agree with
// Simpson's rule.
func TestRateBoundsQuotients(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := rapid.Float64Range(0.01, 2).Draw(t, "p")
		var pts [][2]float64
		at := 0.0
		for range rapid.IntRange(2, 5).Draw(t, "points") {
			pts = append(pts, [2]float64{at, rapid.Float64Range(-3, 3).Draw(t, "u")})
			at += rapid.Float64Range(0.5, 20).Draw(t, "dt")
		}
		u, err := laplace.Points(pts)
		if err != nil {
			t.Fatal(err)
		}
		r := responseOf(t, p, u, 80)
		hi, lo := r.MaxRate(0, 0, 80), r.MinRate(0, 0, 80)
		const n = 4000
		h := 80.0 / n
		sum := 0.0
		for k := range n {
			a, m, b := r.At(0, h*float64(k)), r.At(0, h*(float64(k)+0.5)), r.At(0, h*float64(k+1))
			if q := (b - a) / h; q > hi.Y+1e-9 || q < lo.Y-1e-9 {
				t.Fatalf("quotient %v outside [%v, %v]", q, lo.Y, hi.Y)
			}
			sum += h * (a + 4*m + b) / 6
		}
		c := rapid.Float64Range(0, 80).Draw(t, "c")
		whole := r.Integral(0, 0, 80)
		if parts := r.Integral(0, 0, c) - r.Integral(0, 80, c); math.Abs(parts-whole) > 1e-11*80 {
			t.Fatalf("parts %v, whole %v", parts, whole)
		}
		if math.Abs(sum-whole) > 1e-4 {
			t.Fatalf("Simpson %v, closed form %v", sum, whole)
		}
	})
}

// responseOf is y' = p(u − y) from rest.
func responseOf(t interface{ Fatal(...any) }, p float64, u laplace.Waveform, until float64) *laplace.Response {
	one := func(v float64) *mat.Dense { return mat.NewDense(1, 1, []float64{v}) }
	s, err := laplace.FromMatrices(one(-p), one(p), one(1), nil)
	if err != nil {
		t.Fatal(err)
	}
	r, err := s.Respond([]laplace.Waveform{u}, nil, until)
	if err != nil {
		t.Fatal(err)
	}
	return r
}
