package network

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// A course has the values of its waveform around the instant that it was picked for, of
// periodic ones in every repetition, and the derivatives that differences give.
func TestCourseFollowsWave(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := &drawing{t: t}
		w := laplace.Waveform{Before: d.number("before")}
		at := 0.0
		for range rapid.IntRange(1, 4).Draw(t, "segments") {
			g := d.wave().Segments[0]
			for k := range rapid.IntRange(0, 4).Draw(t, "bent") {
				g.Poly = append(g.Poly, d.number("power")*math.Pow(10, -float64(k+1)))
			}
			g.At = at
			w.Segments = append(w.Segments, g)
			at += d.number("length")
		}
		if rapid.Bool().Draw(t, "repeats") {
			w.Repeat = rapid.IntRange(0, len(w.Segments)-1).Draw(t, "from")
			w.Period = at - w.Segments[w.Repeat].At
		}
		breaks, err := w.Breaks(0, 20, 1000)
		if err != nil {
			t.Fatal(err)
		}
		breaks = append([]float64{0}, append(breaks, 20)...)
		for k := range breaks[1:] {
			t0, t1 := breaks[k], breaks[k+1]
			if t1-t0 < 1e-3 {
				continue
			}
			c := courseOf(&w, (t0+t1)/2)
			h := (t1 - t0) / 16
			size := c.most(t0, t1)
			for _, s := range []float64{t0 + 2*h, t0 + 7*h, t1 - 2*h} {
				if v := w.At(s); differs(c.at(s), v, 1e-12, 1+size) || math.Abs(v) > size*(1+1e-12) {
					t.Fatalf("at %v: %v, want %v (at most %v)", s, c.at(s), v, size)
				}
			}
			const small = 1e-5
			s := t0 + 5*h
			if got, want := c.rate(s), (c.at(s+small)-c.at(s-small))/(2*small); differs(got, want, 1e-6, 1+size) {
				t.Fatalf("rate %v, differences give %v", got, want)
			}
			if got, want := c.bend(s), (c.rate(s+small)-c.rate(s-small))/(2*small); differs(got, want, 1e-6, 1+size) {
				t.Fatalf("bend %v, differences give %v", got, want)
			}
		}
	})
}
