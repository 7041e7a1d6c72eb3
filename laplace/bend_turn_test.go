package laplace

import (
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// Where what switches makes no difference a schedule answers bent inputs as its one system
// does, and its cycle is what a long response comes to.
func TestBentSchedule(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := anyTurning(t)
		door, err := Pulse(PulseTrain{High: 3, Width: rapid.Float64Range(0.2, 2).Draw(t, "open"), Period: 3, At: 0.5})
		if err != nil {
			t.Fatal(err)
		}
		load, err := bent(rapid.IntRange(2, MaxDegree).Draw(t, "degree")).Repeated(1.5)
		if err != nil {
			t.Fatal(err)
		}
		idle := w.schedule(door)
		same := idle.Pick
		idle.Pick = func([]float64) (Kind, error) { return same([]float64{1}) }
		a, err := idle.Respond([]Waveform{load}, 12)
		if err != nil {
			t.Fatal(err)
		}
		one, err := w.schedule(Constant(1)).Respond([]Waveform{load}, 12)
		if err != nil {
			t.Fatal(err)
		}
		s := w.schedule(door)
		c, err := s.Cycle([]Waveform{load})
		if err != nil {
			t.Fatal(err)
		}
		const cycles = 300
		r, err := s.Respond([]Waveform{load}, (cycles+1)*c.Period)
		if err != nil {
			t.Fatal(err)
		}
		for i := range w.n {
			size := math.Max(math.Abs(c.Max(i).Y), math.Abs(c.Min(i).Y))
			for k := range 30 {
				at := 0.1 * float64(k)
				nearly(t, "idle switching", a.At(i, 4*at), one.At(i, 4*at), 1e-12*(1+size))
				nearly(t, "in the long run", r.At(i, cycles*c.Period+at), c.At(i, at), 2e-11*(1+size)) // 900 s is known to 1e-13 s
			}
		}
	})
}

// A held tank's driver delivers u − x + 3 u′: so it does where u is bent.
func TestBentImproper(t *testing.T) {
	w := bent(MaxDegree)
	r, err := heldTank(t).Respond([]Waveform{w}, nil, 2)
	if err != nil {
		t.Fatal(err)
	}
	rate := w.Rate()
	times := make([]float64, 97)
	y := [][]float64{make([]float64, len(times)), make([]float64, len(times))}
	for i := range times {
		times[i] = float64(i) / 48.5
	}
	r.Table(times, y)
	for i, at := range times {
		if want := w.At(at) - y[1][i] + 3*rate.At(at); math.Abs(y[0][i]-want) > 1e-12*rate.size(2) {
			t.Errorf("at %g s: %v, want %v", at, y[0][i], want)
		}
	}
	jumps, err := r.Impulses(0)
	if err != nil || len(jumps) != 2 || math.Abs(jumps[1].Weight-3*(w.At(1.3)-w.Left(1.3))) > 1e-14*rate.size(2) {
		t.Errorf("impulses %v, %v", jumps, err)
	}
	turning, err := w.Repeated(2)
	if err != nil {
		t.Fatal(err)
	}
	c := cycleOf(t, heldTank(t), turning)
	list, err := c.Impulses(0)
	if err != nil || len(list) != 2 {
		t.Fatalf("impulses %v, %v", list, err)
	}
	// over a period nothing is delivered on balance, impulses included
	if sum := 2*c.Mean(0) + list[0].Weight + list[1].Weight; math.Abs(sum) > 1e-13*rate.size(2) {
		t.Errorf("%v is delivered in a period, want 0", sum)
	}
}

// A wave is its steady wave and what it is short of it, also where it leads in.
func TestBentSteadyWave(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := bent(rapid.IntRange(2, MaxDegree).Draw(t, "degree"))
		w.Segments = append(w.Segments, Segment{At: 2.1, B: 1, Poly: []float64{-0.5, 0.25}})
		w.Repeat = rapid.IntRange(0, 2).Draw(t, "repeat")
		w.Period = 3 - w.Segments[w.Repeat].At
		s, err := w.inTheLongRun(0)
		if err != nil {
			t.Fatal(err)
		}
		short := s.shortOf(&w)
		for k := range 50 {
			at := 0.0731 * float64(k)
			g := s.at(at)
			if got := g.value(0) + short.At(at); math.Abs(got-w.At(at)) > 1e-11*w.size(4) {
				t.Fatalf("at %g s: %v, want %v", at, got, w.At(at))
			}
		}
	})
}

// A cycle is reached when it is: the last sample outside the band lies in the period before.
func TestBentApproach(t *testing.T) {
	s := parallelLags(t, 0.4, 9)
	w, err := bent(3).Repeated(2)
	if err != nil {
		t.Fatal(err)
	}
	c := cycleOf(t, s, w)
	r, err := s.Respond([]Waveform{w}, nil, 200)
	if err != nil {
		t.Fatal(err)
	}
	a, err := c.Approach(r)
	if err != nil {
		t.Fatal(err)
	}
	n, ok, err := a.Cycles(0, 0.05)
	if err != nil || !ok {
		t.Fatal(ok, err)
	}
	band, last := 0.05*c.Swing(0), 0.0
	for k := range 20000 {
		if at := 0.01 * float64(k); math.Abs(r.At(0, at)-c.At(0, at)) > band {
			last = at
		}
	}
	if want := math.Ceil(last / 2); n != want {
		t.Errorf("%v cycles, by samples %v", n, want)
	}
}

func TestBentRefusals(t *testing.T) {
	s := parallelLags(t, 1)
	square := Waveform{Segments: []Segment{{Poly: []float64{1}}}}
	var unsettled *Unsettled
	if _, err := s.Cycle([]Waveform{square}, nil); !errors.As(err, &unsettled) || !strings.Contains(err.Error(), "as a polynomial of time for ever") {
		t.Errorf("error %v", err)
	}
	if _, ok := square.Final(); ok || square.Constant() || square.Repeats() || NotStairs([]Waveform{square}) != 0 {
		t.Error("a square of time is taken for a constant")
	}
	if flat := (Waveform{Segments: []Segment{{Poly: []float64{0, 0}}}}); !flat.Constant() || NotStairs([]Waveform{flat}) >= 0 {
		t.Error("powers of weight 0 are taken for a bend")
	}
	defer func() {
		if recover() == nil {
			t.Error("a power above the highest is taken")
		}
	}()
	_, _ = s.Respond([]Waveform{{Segments: []Segment{{Poly: make([]float64, MaxDegree)}}}}, nil, 1)
}
