package laplace

import (
	"fmt"
	"math"
	"strconv"
)

// An Unsettled error says that an input neither repeats nor settles, so that
// there is no cycle.
type Unsettled struct {
	Input int
	Why   string // "it rises for ever"
}

func (e *Unsettled) Error() string {
	return fmt.Sprintf("laplace: input %d has no cycle: %s", e.Input, e.Why)
}

// steadyWave is what an input does in the long run, continued back to t = 0 and
// before: a pattern repeated every period, or a constant with undamped sines.
type steadyWave struct {
	pattern []Segment // from phase 0 on; nil where rest says it all
	period  float64   // of the pattern
	phase   float64   // s; a time in [0, period) at which the pattern begins
	rest    Segment   // a constant and undamped sines, from t = 0
	from    float64   // s; from here on the wave itself is that, but for what decays
}

// Repeats reports whether the wave goes on changing for ever in a pattern: it has a
// Period and does not stand still in it, or it ends in undamped sines.
func (w Waveform) Repeats() bool {
	if _, ok := w.Final(); ok {
		return false
	}
	s, err := w.inTheLongRun(0)
	return err == nil && (s.pattern != nil || len(s.rest.Exp) > 0)
}

// inTheLongRun finds the steady wave of input i.
func (w *Waveform) inTheLongRun(i int) (steadyWave, error) {
	if v, ok := w.Final(); ok {
		s := steadyWave{rest: Segment{A: v}}
		if n := len(w.Segments); n > 0 {
			s.from = w.Segments[n-1].At
			if w.Period > 0 {
				s.from = w.Segments[w.Repeat].At
			}
		}
		return s, nil
	}
	if w.Period > 0 {
		first := w.Segments[w.Repeat].At
		s := steadyWave{pattern: w.Segments[w.Repeat:], period: w.Period, phase: math.Mod(first, w.Period), from: first}
		return s, nil
	}
	last := w.Segments[len(w.Segments)-1]
	s := steadyWave{rest: Segment{A: last.A}, from: last.At}
	switch {
	case !last.straight():
		return s, &Unsettled{i, "it goes on as a polynomial of time for ever"}
	case last.B != 0:
		return s, &Unsettled{i, "it goes on straight for ever"}
	}
	for _, e := range last.Exp {
		switch {
		case e.Amplitude == 0 || real(e.Rate) < 0:
		case real(e.Rate) > 0:
			return s, &Unsettled{i, "it grows for ever"}
		case imag(e.Rate) == 0:
			s.rest.A += real(e.Amplitude)
		default:
			if last.At != 0 {
				e.Amplitude *= cexp(e.Rate, -last.At)
			}
			s.rest.Exp = append(s.rest.Exp, e)
		}
	}
	return s, nil
}

// beats returns the periods of the wave.
func (s *steadyWave) beats(input int) []beat {
	if s.pattern != nil {
		return []beat{{input, s.period, true}}
	}
	var list []beat
	for _, e := range s.rest.Exp {
		list = append(list, beat{input, periodOf(math.Abs(imag(e.Rate))), false})
	}
	return list
}

// periodOf returns 2π/ω, as the decimal of 15 digits that has just this ω where
// there is one: 86400 s, not 86400.00000000001 s.
func periodOf(omega float64) float64 {
	t := 2 * math.Pi / omega
	if short, err := strconv.ParseFloat(strconv.FormatFloat(t, 'g', 15, 64), 64); err == nil && math.Abs(2*math.Pi/short-omega) <= epsilon*omega {
		return short
	}
	return t
}

// starts appends the instants in [0, until) at which a segment begins.
func (s *steadyWave) starts(list []float64, until float64) []float64 {
	list = append(list, 0)
	if s.pattern == nil {
		return list
	}
	for n := -1; ; n++ {
		for k := range s.pattern {
			t := s.start(n, k)
			if t >= until {
				return list
			}
			if t > 0 {
				list = append(list, t)
			}
		}
	}
}

// breaks bounds the number of starts in [0, until).
func (s *steadyWave) breaks(until float64) float64 {
	if s.pattern == nil {
		return 1
	}
	return (until/s.period + 2) * float64(len(s.pattern))
}

func (s *steadyWave) start(n, k int) float64 {
	return s.phase + float64(n)*s.period + (s.pattern[k].At - s.pattern[0].At)
}

// over returns the wave on [0, until) as segments that begin at the times given,
// which hold every start within near.
func (s *steadyWave) over(times []float64, near float64) Waveform {
	w := Waveform{}
	if s.pattern == nil {
		w.Segments = []Segment{s.rest}
		return w
	}
	n, k, last := -1, 0, -2
	for _, t := range times {
		for m, j := n, k; s.start(m, j) <= t+near; {
			n, k = m, j
			if j++; j == len(s.pattern) {
				m, j = m+1, 0
			}
		}
		if now := n*len(s.pattern) + k; now != last || t == 0 {
			last = now
			g := s.pattern[k]
			if off := t - s.start(n, k); off > near {
				g = g.from(off)
			}
			g.At = t
			w.Segments = append(w.Segments, g)
		}
	}
	return w
}

// together returns the steady waves on one period, with breaks that differ by
// rounding only made one, so that two loads that switch together do.
func together(list []steadyWave, period float64) ([]Waveform, error) {
	total := 0.0
	for i := range list {
		total += list[i].breaks(period)
	}
	if total > MaxBreaks {
		return nil, &TooMany{Found: int(min(total, 1e15)), Limit: MaxBreaks}
	}
	near := sameInstant * period
	var times []float64
	for i := range list {
		times = list[i].starts(times, period-near)
	}
	times = distinct(times, near)
	waves := make([]Waveform, len(list))
	for i := range list {
		waves[i] = list[i].over(times, near)
	}
	return waves, nil
}
