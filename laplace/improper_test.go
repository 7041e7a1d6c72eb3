package laplace

import (
	"math"
	"testing"

	"lagbook/laplace/matrix"
)

// A tank of capacity 2 behind a resistance of 1, held at u: what its driver delivers
// is the flow u − x through the resistance and 3 u' of a capacity of its own.
func heldTank(t *testing.T) *System {
	t.Helper()
	s, err := New(Realisation{
		Balance: matrix.Balance{N: 1, C: []float64{2}, F: []float64{0}, Leak: []float64{1}},
		B:       [][]float64{{1}}, Output: [][]float64{{-1}, {1}}, D: [][]float64{{1}, {0}}, Rate: [][]float64{{3}, {0}},
	})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// H = 1 − 1/(2s + 1) + 3s = s(6s + 5)/(2s + 1).
func TestImproperTransfer(t *testing.T) {
	h, err := heldTank(t).Transfer(0, 0)
	if err != nil {
		t.Fatal(err)
	}
	if h.Form != "improper" || h.RelativeDegree != -1 || !h.HasGain || h.Gain != 0 {
		t.Errorf("form %q, degree %d, gain %v", h.Form, h.RelativeDegree, h.Gain)
	}
	if len(h.Zeros) != 2 || h.Zeros[0].P != 0 || math.Abs(real(h.Zeros[1].P)+5.0/6) > 1e-15 {
		t.Errorf("zeros %v, want 0 and −5/6", h.Zeros)
	}
	s := complex(0.3, 2)
	if want := s * (6*s + 5) / (2*s + 1); abs1(h.Eval(s)-want) > 1e-14 {
		t.Errorf("H(%v) = %v, want %v", s, h.Eval(s), want)
	}
	if m, err := h.Step(); err != nil || m.Overshoot != nil || m.Final == nil || *m.Final != 0 {
		t.Errorf("measures %+v (%v)", m, err)
	}
	f, err := h.Frequency()
	if err != nil {
		t.Fatal(err)
	}
	if _, ok := f.FallsBelow(1); ok || !math.IsInf(f.Peak().Gain, 1) {
		t.Error("an improper gain grows without end")
	}
}

// A ramp from 1 s on and a jump at 4 s: the rate counts while the ramp lasts, the
// jump is an impulse that is told and left out.
func TestImproperResponse(t *testing.T) {
	w, err := Points([][2]float64{{0, 0}, {1, 0}, {3, 4}, {4, 4}, {4, 1}})
	if err != nil {
		t.Fatal(err)
	}
	r, err := heldTank(t).Respond([]Waveform{w.WithBefore(0)}, nil, 10)
	if err != nil {
		t.Fatal(err)
	}
	for _, at := range []float64{0.5, 2, 3.5, 6} {
		rate := 0.0
		if at == 2 {
			rate = 2
		}
		if got, want := r.At(0, at), w.At(at)-r.At(1, at)+3*rate; math.Abs(got-want) > 1e-14 {
			t.Errorf("at %v s: %v, want %v", at, got, want)
		}
	}
	list, err := r.Impulses(0)
	if err != nil || len(list) != 1 || list[0] != (Impulse{T: 4, Weight: -9}) {
		t.Errorf("impulses %v (%v), want −9 at 4 s", list, err)
	}
	if list, _ := r.Impulses(1); len(list) != 0 {
		t.Errorf("impulses %v in a proper output", list)
	}
}

// The derivative of a sine is a cosine, of a stair nothing.
func TestRate(t *testing.T) {
	s := Sine(2, 3, 0.5, 0.1).Rate()
	if got, want := s.At(1), 1.5*math.Cos(0.6); math.Abs(got-want) > 1e-15 || s.Before != 0 {
		t.Errorf("%v, want %v", got, want)
	}
	if r := Step(1, 5, 2).Rate(); !r.Constant() {
		t.Errorf("%+v", r)
	}
}
