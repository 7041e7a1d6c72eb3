package laplace

import (
	"errors"
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

func TestWaveformValues(t *testing.T) {
	must := wave(t)
	nan := math.NaN()
	for _, c := range []struct {
		name        string
		w           Waveform
		t           []float64
		left, right []float64
		final       float64 // NaN: none
	}{
		{"constant", Constant(3), []float64{-1, 0, 5}, []float64{3, 3, 3}, []float64{3, 3, 3}, 3},
		{"no segments", Waveform{Before: 2}, []float64{-1, 0, 5}, []float64{2, 2, 2}, []float64{2, 2, 2}, 2},
		{"step", Step(1, 4, 2), []float64{0, 2, 3}, []float64{1, 1, 4}, []float64{1, 4, 4}, 4},
		{"step at 0", Step(1, 4, 0), []float64{-1, 0, 3}, []float64{1, 1, 4}, []float64{1, 4, 4}, 4},
		{"step in the past", Step(1, 4, -2), []float64{-3, 0, 3}, []float64{4, 4, 4}, []float64{4, 4, 4}, 4},
		{"points", must(Points([][2]float64{{1, 0}, {3, 4}, {3, 10}, {4, 8}})),
			[]float64{0, 1, 2, 3, 3.5, 9}, []float64{0, 0, 2, 4, 9, 8}, []float64{0, 0, 2, 10, 9, 8}, 8},
		{"points from the past", must(Points([][2]float64{{-2, 0}, {2, 4}})), []float64{-9, 0, 1}, []float64{2, 2, 3}, []float64{2, 2, 3}, 4},
		{"points all past", must(Points([][2]float64{{-2, 0}, {-1, 4}})), []float64{-9, 0, 1}, []float64{4, 4, 4}, []float64{4, 4, 4}, 4},
		{"jump at 0", must(Points([][2]float64{{0, 1}, {0, 5}})), []float64{-1, 0, 1}, []float64{1, 1, 5}, []float64{1, 5, 5}, 5},
		{"stairs", must(Stairs([][2]float64{{-1, 7}, {2, 3}, {2, 4}, {5, 1}})),
			[]float64{0, 2, 3, 5}, []float64{7, 7, 4, 4}, []float64{7, 4, 4, 1}, 1},
		{"one pulse", must(Pulse(PulseTrain{Low: 1, High: 2, Width: 3, At: 1, Count: 1})),
			[]float64{0, 1, 4, 9}, []float64{1, 1, 2, 1}, []float64{1, 2, 1, 1}, 1},
		{"pulses end to end", must(Pulse(PulseTrain{High: 2, Width: 3, Period: 3, Count: 2})),
			[]float64{0, 3, 6}, []float64{0, 2, 2}, []float64{2, 2, 0}, 0},
		{"train", must(Pulse(PulseTrain{High: 2, Width: 1, Period: 4, At: 1})),
			[]float64{0, 1, 2, 4001, 4002}, []float64{0, 0, 2, 0, 2}, []float64{0, 2, 0, 2, 0}, nan},
		{"train from the past", must(Pulse(PulseTrain{High: 2, Width: 1, Period: 4, At: -4.5})),
			[]float64{0, 0.5, 3.5, 4.5}, []float64{0, 2, 0, 2}, []float64{2, 0, 2, 0}, nan},
		{"always on", must(Pulse(PulseTrain{Low: 1, High: 2, Width: 4, Period: 4, At: 1})),
			[]float64{0, 1, 5, 9}, []float64{1, 1, 2, 2}, []float64{1, 2, 2, 2}, 2},
		{"sine", Sine(1, 2, math.Pi, math.Pi/2), []float64{-1, 0, 1, 2}, []float64{3, 3, -1, 3}, []float64{3, 3, -1, 3}, nan},
		{"decay", must(Decay([][2]float64{{4, 1 / math.Ln2}})), []float64{-1, 0, 1, 2}, []float64{4, 4, 2, 1}, []float64{4, 4, 2, 1}, 0},
		{"repeated", must(must(Points([][2]float64{{0, 0}, {4, 4}})).Repeated(4)),
			[]float64{0, 4, 5, 8}, []float64{0, 4, 1, 4}, []float64{0, 0, 1, 0}, nan},
		{"repeated train", must(must(Pulse(PulseTrain{High: 1, Width: 1, Period: 2})).Repeated(5)),
			[]float64{0, 4, 5, 6, 9, 10}, []float64{0, 0, 1, 1, 0, 1}, []float64{1, 1, 1, 0, 1, 1}, nan},
		{"scaled and raised", Step(1, 4, 2).Scaled(-2).Plus(1).WithBefore(9), []float64{-1, 0, 2}, []float64{9, 9, -1}, []float64{9, -1, -7}, -7},
	} {
		t.Run(c.name, func(t *testing.T) {
			c.w.check()
			for i, at := range c.t {
				if l, r := c.w.Left(at), c.w.At(at); math.Abs(l-c.left[i]) > 1e-14 || math.Abs(r-c.right[i]) > 1e-14 {
					t.Errorf("at %g: %g and %g, want %g and %g", at, l, r, c.left[i], c.right[i])
				}
			}
			v, ok := c.w.Final()
			if ok != !math.IsNaN(c.final) || ok && v != c.final {
				t.Errorf("final %g %v, want %g", v, ok, c.final)
			}
		})
	}
}

func TestWaveformRefusals(t *testing.T) {
	inf := math.Inf(1)
	for _, c := range []struct {
		want string
		make func() (Waveform, error)
	}{
		{"no point", func() (Waveform, error) { return Points(nil) }},
		{"point 2 at 1 s lies before point 1 at 2 s", func() (Waveform, error) { return Points([][2]float64{{2, 0}, {1, 0}}) }},
		{"points 1 to 3 share the time 1 s", func() (Waveform, error) { return Stairs([][2]float64{{1, 0}, {1, 1}, {1, 2}}) }},
		{"point 1 is not a finite number", func() (Waveform, error) { return Points([][2]float64{{0, inf}}) }},
		{"the slope after 0 s", func() (Waveform, error) { return Points([][2]float64{{0, -1e300}, {1e-300, 1e300}}) }},
		{"width is 0 s", func() (Waveform, error) { return Pulse(PulseTrain{High: 1}) }},
		{"period is 0 s", func() (Waveform, error) { return Pulse(PulseTrain{High: 1, Width: 1}) }},
		{"exceeds the period", func() (Waveform, error) { return Pulse(PulseTrain{Width: 2, Period: 1}) }},
		{"count is -1", func() (Waveform, error) { return Pulse(PulseTrain{Width: 1, Period: 2, Count: -1}) }},
		{"without a count", func() (Waveform, error) { return Pulse(PulseTrain{Width: 1, Period: 2, Count: 2e6}) }},
		{"periods before 0 s", func() (Waveform, error) { return Pulse(PulseTrain{Width: 1, Period: 2, At: -1e9}) }},
		{"no term", func() (Waveform, error) { return Decay(nil) }},
		{"time constant of term 1 is -1 s", func() (Waveform, error) { return Decay([][2]float64{{1, -1}}) }},
		{"period is 0 s", func() (Waveform, error) { return Constant(1).Repeated(0) }},
	} {
		if _, err := c.make(); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("error %v, want %q", err, c.want)
		}
	}
}

func TestBreaksAndJumps(t *testing.T) {
	must := wave(t)
	w := must(Points([][2]float64{{0, 0}, {1, 1}, {2, 2}, {3, 0}, {3, 1}, {5, 1}}))
	got, err := w.Breaks(0, 10, 100)
	if err != nil {
		t.Fatal(err)
	}
	if d := cmp.Diff([]float64{0, 2, 3}, got); d != "" { // at 1 and 5 nothing changes
		t.Error(d)
	}
	if got, _ = w.JumpTimes(0, 10, 100); !cmp.Equal(got, []float64{3}) {
		t.Error(got)
	}
	train := must(Pulse(PulseTrain{High: 1, Width: 0.1, Period: 0.3}))
	if got, _ = train.JumpTimes(0.25, 0.75, 100); !cmp.Equal(got, []float64{0.3, 0.4, 0.6, 0.7}, near15) {
		t.Error(got)
	}
	var many *TooMany
	if _, err = train.Breaks(0, 1e9, 100); !errors.As(err, &many) || many.Limit == 0 {
		t.Errorf("error %v, want *TooMany", err)
	}
}

var near15 = cmp.Comparer(func(a, b float64) bool { return math.Abs(a-b) <= 1e-15*math.Abs(a+b) })

// Whatever the rounding of a period, a break finds its own segment again.
func TestBreaksFindTheirSegment(t *testing.T) {
	w := wave(t)(Pulse(PulseTrain{High: 1, Width: 0.1, Period: 0.7, At: 0.3}))
	list, err := w.JumpTimes(0, 5000, 1e6)
	if err != nil {
		t.Fatal(err)
	}
	for i, at := range list {
		if on := float64(1 - i%2); w.At(at) != on || w.Left(at) != 1-on {
			t.Fatalf("jump %d at %v: from %g to %g", i, at, w.Left(at), w.At(at))
		}
	}
}
