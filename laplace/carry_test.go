package laplace

import (
	"math"
	"testing"

	"lagbook/laplace/matrix"
)

// A store of 2 that empties with 1/s beside one of 3 that empties with 2/s and takes in
// 6; while shut, the second does not exist, and what it held is lost. What is carried
// over counts from 10 and 20.
func losing(v []float64) (Kind, error) {
	open := v[0] != 0
	r := Realisation{Balance: matrix.Balance{N: 1, C: []float64{2}, F: []float64{0}, Leak: []float64{2}},
		B: [][]float64{{0}}, Output: [][]float64{{1}, {0}}}
	over := Carry{In: [][]float64{{2}, {0}}, Out: [][]float64{{1}, {0}}, Onto: [][]float64{{1, 0}, {0, 0}}, Ref: []float64{0, -20}}
	if open {
		r = Realisation{Balance: matrix.Balance{N: 2, C: []float64{2, 3}, F: make([]float64, 4), Leak: []float64{2, 6}},
			B: [][]float64{{0, 6}}, Output: [][]float64{{1, 0}, {0, 1}}}
		over = Carry{In: [][]float64{{2, 0}, {0, 3}}, Out: [][]float64{{1, 0}, {0, 1}}}
	}
	s, err := NewCarryingOver(r, over)
	base := []float64{10, 20}
	if !open {
		base[1] = 0
	}
	return Kind{s, base}, err
}

// By hand: the second store is gone at 1 s and begins again from 0, which is 20 below
// what its deviations count from; the first does not feel it.
func TestCarryLoses(t *testing.T) {
	shut, err := Stairs([][2]float64{{0, 1}, {1, 0}, {2, 1}})
	if err != nil {
		t.Fatal(err)
	}
	s := &Schedule{Waves: []Waveform{shut}, Pick: losing}
	r, err := s.Respond([]Waveform{Step(0, 1, 0)}, 4)
	if err != nil {
		t.Fatal(err)
	}
	for _, x := range []struct{ at, want float64 }{
		{0.5, 20 - math.Expm1(-1)}, {1, 0}, {1.7, 0}, {2, 0}, {3, 21 - 21*math.Exp(-2)},
	} {
		if got := r.At(1, x.at); math.Abs(got-x.want) > 1e-13 {
			t.Errorf("second at %v: %v, want %v", x.at, got, x.want)
		}
		if got := r.At(0, x.at); got != 10 {
			t.Errorf("first at %v: %v", x.at, got)
		}
	}
	if got, want := r.Left(1, 1), 20-math.Expm1(-2); math.Abs(got-want) > 1e-13 {
		t.Errorf("just before: %v, want %v", got, want)
	}
}

// Open and shut by turns of 1 s: the second store begins each period from 0 whatever
// was before, so that the cycle is there after the first, and nothing of a start is left.
func TestCarryCycle(t *testing.T) {
	for _, open := range []float64{1, 0} {
		turn, err := Pulse(PulseTrain{Low: 1 - open, High: open, Width: 1, Period: 2})
		if err != nil {
			t.Fatal(err)
		}
		s := &Schedule{Waves: []Waveform{turn}, Pick: losing}
		c, err := s.Cycle([]Waveform{Constant(1)})
		if err != nil {
			t.Fatal(err)
		}
		for _, tau := range []float64{0, 0.25, 0.75} {
			want, at := 21-21*math.Exp(-2*tau), tau+1-open
			if got := c.At(1, at); math.Abs(got-want) > 1e-13 {
				t.Errorf("at %v: %v, want %v", at, got, want)
			}
			if got := c.At(1, at+1); math.Abs(got) > 1e-13 {
				t.Errorf("while shut %v", got)
			}
		}
		r, err := s.Respond([]Waveform{Step(0, 1, 0)}, 2)
		if err != nil {
			t.Fatal(err)
		}
		a, err := c.Approach(r)
		if err != nil {
			t.Fatal(err)
		}
		if n, ok, err := a.Cycles(1, 0.02); n > 1 || !ok || err != nil {
			t.Errorf("%v periods, %v, %v", n, ok, err)
		}
	}
}

// A driver of a held store that jumps up and down delivers an impulse at each jump: 3
// times the jump, and none where the wave goes on.
func TestCycleImpulses(t *testing.T) {
	w, err := Pulse(PulseTrain{Low: 1, High: 5, Width: 2, Period: 6, At: 1})
	if err != nil {
		t.Fatal(err)
	}
	c, err := heldTank(t).Cycle([]Waveform{w}, nil)
	if err != nil {
		t.Fatal(err)
	}
	list, err := c.Impulses(0)
	if err != nil || len(list) != 2 || list[0].T != 1 || list[0].Weight != 12 || list[1].T != 3 || list[1].Weight != -12 {
		t.Errorf("%+v, %v", list, err)
	}
	if list, err = c.Impulses(1); err != nil || len(list) != 0 {
		t.Errorf("of the level %+v, %v", list, err)
	}
	c, err = heldTank(t).Cycle([]Waveform{Sine(1, 2, 0.7, 0.3)}, nil)
	if err != nil {
		t.Fatal(err)
	}
	if list, err = c.Impulses(0); err != nil || len(list) != 0 {
		t.Errorf("of a sine %+v, %v", list, err)
	}
}
