package matrix

import (
	"math"
	"math/cmplx"
	"testing"
)

// Two flows whose inertances move together, each with its resistance: by Cramer's rule.
func TestResolventWithMass(t *testing.T) {
	s := &Stores{
		Balance: Balance{N: 2, C: []float64{2, 3}, F: make([]float64, 4), Leak: []float64{0.5, 0.7}},
		K:       []float64{0, 0.4, -0.4, 0},
		Mass:    []float64{2, 1, 1, 3},
	}
	w, err := s.Resolvent()
	if err != nil {
		t.Fatal(err)
	}
	for _, omega := range []float64{1e-9, 0.1, 1, 30, 1e9} {
		p := complex(0, omega)
		a, b, c, d := 2*p+0.5, p-0.4, p+0.4, 3*p+0.7
		det := a*d - b*c
		for _, q := range []struct {
			in, out []float64
			want    complex128
		}{
			{[]float64{1, 0}, []float64{1, 0}, d / det},
			{[]float64{1, 0}, []float64{0, 1}, -c / det},
			{[]float64{0, 1}, []float64{1, 0}, -b / det},
		} {
			h, slack := w.Transfer(p, q.in, q.out, 0)
			if off := cmplx.Abs(h-q.want) / cmplx.Abs(q.want); off > 1e-14 || slack < 0 || math.IsInf(slack, 0) {
				t.Errorf("ω = %g: %v, want %v, off by %.1e", omega, h, q.want, off)
			}
		}
	}
}

// A leak of 1e-18 beside exchanges of 1: the star keeps it, and so does refinement
// where a negative exchange forbids the star.
func TestResolventKeepsSmallLeaks(t *testing.T) {
	for _, feedback := range []float64{0, -1e-9} {
		b := &Balance{N: 3, C: []float64{1, 1, 1}, F: []float64{0, 1, feedback, 1, 0, 1, 0, 1, 0}, Leak: []float64{0, 0, 1e-12}}
		w, err := (&Stores{Balance: *b}).Resolvent()
		if err != nil {
			t.Fatal(err)
		}
		h, slack := w.Transfer(complex(0, 1e-16), []float64{1, 0, 0}, []float64{0, 0, 1}, 0)
		// at rest what flows in leaves by the leak: x₃ = 1/leak, but for the small feedback
		if d := math.Abs(real(h)*1e-12 - 1); d > 4*slack*1e-12+1e-7 || feedback == 0 && d > 1e-7 {
			t.Errorf("feedback %g: %v, slack %g", feedback, h, slack)
		}
	}
}

// At a pole on the axis there is no answer, and shapes that do not fit are refused.
func TestResolventWithoutAnswer(t *testing.T) {
	w, err := DenseResolvent(2, []float64{0, 1, -4, 0})
	if err != nil {
		t.Fatal(err)
	}
	if h, slack := w.Transfer(complex(0, 2), []float64{0, 1}, []float64{1, 0}, 0); !cmplx.IsInf(h) || !math.IsInf(slack, 1) {
		t.Errorf("%v, %v", h, slack)
	}
	if _, err := DenseResolvent(2, []float64{1}); err != ErrShape {
		t.Errorf("%v", err)
	}
	if _, err := DenseResolvent(1, []float64{math.NaN()}); err != ErrValue {
		t.Errorf("%v", err)
	}
	if _, err := (&Stores{Balance: Balance{N: 1, C: []float64{0}, F: []float64{0}, Leak: []float64{1}}}).Resolvent(); err != ErrValue {
		t.Errorf("%v", err)
	}
}
