package laplace

import (
	"fmt"
	"math"
	"slices"
)

// MaxBreaks is the largest number of breaks a response, or a period of a repeated
// wave, may have.
const MaxBreaks = 2_000_000

// A TooMany error says that waves have more breaks than memory should be spent on.
type TooMany struct {
	Found, Limit int // Found: as far as it was counted
}

func (e *TooMany) Error() string {
	return fmt.Sprintf("the waves have at least %d breaks, more than %d", e.Found, e.Limit)
}

// Repeated returns the wave that goes through w's first period (s) again and again
// from t = 0 on. What w does after its first period is left out.
func (w Waveform) Repeated(period float64) (Waveform, error) {
	if !(period > 0) || math.IsInf(period, 0) {
		return Waveform{}, fmt.Errorf("the period is %g s, must be positive", period)
	}
	r := Waveform{Before: w.Before, Period: period}
	if len(w.Segments) == 0 {
		r.Segments = []Segment{{A: w.Before}}
		return r, nil
	}
	starts, err := w.starts(period, MaxBreaks)
	if err != nil {
		return Waveform{}, err
	}
	for _, at := range starts {
		if at < period {
			n, k := w.locate(at, false)
			g := w.Segments[k].from(at - w.start(n, k))
			g.At = at
			r.Segments = append(r.Segments, g)
		}
	}
	return r, nil
}

// from returns the segment as it is after tau.
func (g *Segment) from(tau float64) Segment {
	s := Segment{A: g.A + g.B*tau, B: g.B}
	if len(g.Poly) > 0 {
		s.A, s.B, s.Poly = g.powersFrom(tau)
	}
	for _, e := range g.Exp {
		if tau != 0 {
			e.Amplitude *= cexp(e.Rate, tau)
		}
		s.Exp = append(s.Exp, e)
	}
	return s
}

// starts returns the instants in [0, until] at which a segment begins, ascending
// and each once. The error is *TooMany.
func (w *Waveform) starts(until float64, limit int) ([]float64, error) {
	var list []float64
	for n := 0; ; n++ {
		k := 0
		if n > 0 {
			k = w.Repeat
		}
		for ; k < len(w.Segments); k++ {
			at := w.start(n, k)
			if at > until {
				return list, nil
			}
			if len(list) > 0 && at <= list[len(list)-1] {
				continue
			}
			if len(list) >= limit {
				return nil, &TooMany{Found: len(list) + 1, Limit: limit}
			}
			list = append(list, at)
		}
		if !(w.Period > 0) || stuck(w, n) {
			return list, nil
		}
	}
}

// sameInstant is the share of a span of time within which two instants count as one.
const sameInstant = 32 * epsilon

// distinct sorts instants and keeps the first of those that lie within near of each
// other.
func distinct(t []float64, near float64) []float64 {
	slices.Sort(t)
	n := min(len(t), 1)
	for _, next := range t[n:] {
		if next > t[n-1]+near {
			t[n] = next
			n++
		}
	}
	return t[:n]
}

// stuck reports that the next repetition is lost in the rounding of time.
func stuck(w *Waveform, n int) bool {
	return w.start(n+1, w.Repeat) <= w.start(n, w.Repeat)
}

// Breaks returns the instants in [t0, t1] at which the wave jumps, bends or goes over
// to or from another curve, at most max of them, ascending. The error is *TooMany.
func (w Waveform) Breaks(t0, t1 float64, max int) ([]float64, error) {
	return w.pick(t0, t1, max, func(before, after *Segment, length, _ float64) bool {
		if len(before.Exp) == 0 && len(after.Exp) == 0 && before.straight() && after.straight() {
			return before.B != after.B || before.value(length) != after.A
		}
		return true
	})
}

// JumpTimes returns the instants in [t0, t1] at which the wave jumps, at most max
// of them, ascending. The error is *TooMany.
func (w Waveform) JumpTimes(t0, t1 float64, max int) ([]float64, error) {
	return w.pick(t0, t1, max, func(before, after *Segment, length, at float64) bool {
		l, r := before.value(length), after.value(0)
		// what the values are added up from is rounded, and so is the instant
		size := math.Abs(l) + math.Abs(r) + sizeOfPowers(before.powers(), length)
		late := 4 * epsilon * at * (before.steepest(length) + after.steepest(0))
		return math.Abs(l-r) > 1e-14*size+late
	})
}

// pick returns the starts at which is holds between the segments on both sides.
func (w *Waveform) pick(t0, t1 float64, limit int, is func(before, after *Segment, length, at float64) bool) ([]float64, error) {
	all, err := w.starts(t1, MaxBreaks)
	if err != nil {
		return nil, err
	}
	var list []float64
	held := Segment{A: w.Before}
	for _, at := range all {
		before, length := &held, 0.0
		if at > 0 {
			n, k := w.locate(at, true)
			before, length = &w.Segments[k], at-w.start(n, k)
		}
		n, k := w.locate(at, false)
		after := w.Segments[k].from(at - w.start(n, k))
		if at < t0 || !is(before, &after, length, at) {
			continue
		}
		if len(list) >= limit {
			return nil, &TooMany{Found: len(list) + 1, Limit: limit}
		}
		list = append(list, at)
	}
	return list, nil
}
