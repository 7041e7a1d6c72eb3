package laplace

import (
	"math"
	"math/cmplx"
	"sort"
)

// shortOf returns w less its steady wave: what is still to die away, or what w did
// otherwise before its last regime.
func (s *steadyWave) shortOf(w *Waveform) Waveform {
	var d Waveform
	for _, t := range s.changes(w) {
		n, k := w.locate(t, false)
		g := w.Segments[k].from(t - w.start(n, k)).less(s.at(t))
		g.At = t
		d.Segments = append(d.Segments, g)
	}
	last := Segment{At: s.from}
	if s.pattern == nil && len(w.Segments) > 0 {
		for _, e := range w.Segments[len(w.Segments)-1].Exp {
			if real(e.Rate) < 0 {
				last.Exp = append(last.Exp, e)
			}
		}
	}
	d.Segments = append(d.Segments, last)
	return d
}

// changes returns the instants in [0, from) at which w or its steady wave begins
// another segment.
func (s *steadyWave) changes(w *Waveform) []float64 {
	if s.from == 0 {
		return nil
	}
	list := s.starts(nil, s.from)
	for k := range w.Segments {
		if at := w.Segments[k].At; at < s.from {
			list = append(list, at)
		}
	}
	near := sameInstant * s.from
	list = distinct(list, near)
	for len(list) > 1 && list[len(list)-1] >= s.from-near {
		list = list[:len(list)-1]
	}
	return list
}

// at returns the steady wave as a segment that begins at t.
func (s *steadyWave) at(t float64) Segment {
	if s.pattern == nil {
		return s.rest.from(t)
	}
	near := sameInstant * max(t, s.period)
	tau := math.Mod(t-s.phase, s.period)
	if tau < 0 {
		tau += s.period
	}
	if tau >= s.period-near {
		tau = 0
	}
	k := sort.Search(len(s.pattern), func(i int) bool { return s.pattern[i].At-s.pattern[0].At > tau+near }) - 1
	return s.pattern[k].from(max(tau-(s.pattern[k].At-s.pattern[0].At), 0))
}

// less returns g − h; what differs by rounding only is 0.
func (g Segment) less(h Segment) Segment {
	d := Segment{A: apart(g.A, h.A), B: apart(g.B, h.B)}
	for k := range max(len(g.Poly), len(h.Poly)) {
		d.Poly = append(d.Poly, apart(at(g.Poly, k), at(h.Poly, k)))
	}
	rest := append([]Exponential(nil), g.Exp...)
	for _, e := range h.Exp {
		same := -1
		for i := range rest {
			if rest[i].Rate == e.Rate {
				same = i
			}
		}
		if same < 0 {
			d.Exp = append(d.Exp, Exponential{-e.Amplitude, e.Rate})
			continue
		}
		if a := rest[same].Amplitude - e.Amplitude; cmplx.Abs(a) > 1e-13*cmplx.Abs(e.Amplitude) {
			d.Exp = append(d.Exp, Exponential{a, e.Rate})
		}
		rest = append(rest[:same], rest[same+1:]...)
	}
	d.Exp = append(d.Exp, rest...)
	return d
}

// apart returns a − b, 0 where they differ by some roundings only.
func apart(a, b float64) float64 {
	if d := a - b; math.Abs(d) > 1e-14*(math.Abs(a)+math.Abs(b)) {
		return d
	}
	return 0
}
