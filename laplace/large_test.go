package laplace

import (
	"errors"
	"fmt"
	"math"
	"testing"
)

// The states kept in strides and those kept at every break are the same.
func TestStridesAgree(t *testing.T) {
	s := tableSystem(t, 10)
	w := wave(t)(Pulse(PulseTrain{High: 1, Width: 0.3, Period: 0.9}))
	every, some := respond(t, s, 100, w), respond(t, s, 100, w)
	some.carry(7)
	if n := len(some.kept); n != (len(some.times)+6)/7 {
		t.Fatalf("%d states kept of %d", n, len(some.times))
	}
	for _, at := range []float64{0, 0.2, 3.1, 77, 20, 99.9, 100} {
		if a, b := every.At(2, at), some.At(2, at); a != b {
			t.Errorf("at %g s: %v and %v", at, a, b)
		}
	}
	if a, b := every.Max(0, 0, 100), some.Max(0, 0, 100); a != b {
		t.Errorf("highest %+v and %+v", a, b)
	}
	if a, _ := every.LastOutside(0, 0, 1, 0, 100); true {
		if b, _ := some.LastOutside(0, 0, 1, 0, 100); a != b {
			t.Errorf("last outside %+v and %+v", a, b)
		}
	}
}

// A hundred thousand breaks are carried, searched and tabulated, and after so
// many the state is still that of the periodic steady answer.
func TestManyBreaks(t *testing.T) {
	s := single(t, 1, 1)
	w := wave(t)(Pulse(PulseTrain{High: 1, Width: 0.5, Period: 1}))
	const end = 50_000
	r := respond(t, s, end, w)
	if n := len(r.Breaks()); n != 2*end+1 {
		t.Errorf("%d breaks", n)
	}
	high := -math.Expm1(-0.5) / -math.Expm1(-1) // (1 − e^−½)/(1 − e^−1)
	e := r.Max(0, end-10.25, end)
	if math.Abs(e.Y-high) > 1e-13 || math.Abs(e.T-math.Floor(e.T)-0.5) > 1e-9 {
		t.Errorf("highest %+v, want %v at a half second", e, high)
	}
	if whole := r.Max(0, 0, end); math.Abs(whole.Y-high) > 1e-13 {
		t.Errorf("highest of all %+v, want %v", whole, high)
	}
	if x, ok := r.LastOutside(0, 0, 0.99*high, 0, end); !ok || x.T < end-1 {
		t.Errorf("%+v %v", x, ok)
	}
}

func TestTooManyBreaks(t *testing.T) {
	w := wave(t)(Pulse(PulseTrain{High: 1, Width: 0.5, Period: 1}))
	_, err := single(t, 1, 1).Respond([]Waveform{w}, nil, 1e7)
	var many *TooMany
	if !errors.As(err, &many) || many.Limit != MaxBreaks {
		t.Errorf("error %v, want *TooMany", err)
	}
}

func BenchmarkRespond(b *testing.B) {
	for _, n := range []int{10, 200} {
		b.Run(fmt.Sprintf("n=%d/breaks=10000", n), func(b *testing.B) {
			s := tableSystem(b, n)
			w := wave(b)(Pulse(PulseTrain{High: 1, Width: 0.5, Period: 1}))
			for b.Loop() {
				respond(b, s, 5000, w)
			}
		})
	}
}

func BenchmarkStep(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		b.Run(fmt.Sprintf("n=%d", n), func(b *testing.B) {
			s := tableSystem(b, n)
			h, err := s.Transfer(0, 2)
			if err != nil {
				b.Fatal(err)
			}
			for b.Loop() {
				if _, err := h.Step(); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
