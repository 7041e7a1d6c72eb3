package laplace

import (
	"math"
	"math/cmplx"
	"sort"
)

// An Exponential is the part Re(Amplitude·exp(Rate·τ)) of a segment.
type Exponential struct {
	Amplitude complex128
	Rate      complex128 // 1/s; a decaying sine has a complex rate
}

// A Segment holds u(t) = A + B·τ + Poly[0]·τ² + Poly[1]·τ³ + … + Σ Re(Amplitude·exp(Rate·τ)),
// τ = t − At, from its instant At (s) until the next segment begins. Powers go up to
// τ^MaxDegree.
type Segment struct {
	At, A, B float64
	Poly     []float64
	Exp      []Exponential
}

// A Waveform is an input against time: the constant Before for t < 0 and, from
// t = 0 on, a list of segments in order of time of which the first begins at 0.
// Where Period > 0, the segments from index Repeat on fill exactly one period,
// which begins at Segments[Repeat].At and is repeated for ever. A value at a
// jump is the one after it. A Waveform without segments is Before for ever.
type Waveform struct {
	Before   float64
	Segments []Segment
	Repeat   int
	Period   float64
}

// value returns the segment's value τ after its start.
func (g *Segment) value(tau float64) float64 {
	v := g.A + g.B*tau
	if len(g.Poly) > 0 {
		v += tau * tau * powerSum(g.Poly, tau)
	}
	for _, e := range g.Exp {
		v += real(e.Amplitude * cexp(e.Rate, tau))
	}
	return v
}

// start returns the instant at which segment k begins in repetition n. Every
// break of a periodic wave comes from this one expression, so that a time taken
// from Breaks finds its own segment again, whatever the rounding.
func (w *Waveform) start(n, k int) float64 {
	if n == 0 {
		return w.Segments[k].At
	}
	first := w.Segments[w.Repeat].At
	return first + float64(n)*w.Period + (w.Segments[k].At - first)
}

// locate returns the segment in force at t ≥ 0 and its repetition: the last one
// that begins at or before t, or strictly before t where left is asked for.
func (w *Waveform) locate(t float64, left bool) (n, k int) {
	begun := func(n, k int) bool {
		s := w.start(n, k)
		return s < t || s == t && !left
	}
	lo := 0
	if w.Period > 0 && begun(0, w.Repeat) {
		n = w.repetition(t, begun)
		lo = w.Repeat
	}
	k = lo + sort.Search(len(w.Segments)-lo, func(i int) bool { return !begun(n, lo+i) }) - 1
	return n, max(k, lo)
}

// repetition returns the last repetition that has begun.
func (w *Waveform) repetition(t float64, begun func(n, k int) bool) int {
	q := math.Floor((t - w.Segments[w.Repeat].At) / w.Period)
	n := int(min(max(q, 0), 1<<52))
	for n > 0 && !begun(n, w.Repeat) {
		n--
	}
	for begun(n+1, w.Repeat) && n < 1<<52 {
		n++
	}
	return n
}

// At returns the value at t, after a jump where there is one.
func (w Waveform) At(t float64) float64 {
	if t < 0 || len(w.Segments) == 0 {
		return w.Before
	}
	n, k := w.locate(t, false)
	return w.Segments[k].value(t - w.start(n, k))
}

// Left returns the value just before t.
func (w Waveform) Left(t float64) float64 {
	if t <= 0 || len(w.Segments) == 0 {
		return w.Before
	}
	n, k := w.locate(t, true)
	return w.Segments[k].value(t - w.start(n, k))
}

// constant reports whether the segment does not move.
func (g *Segment) constant() bool {
	for _, e := range g.Exp {
		if e.Amplitude != 0 {
			return false
		}
	}
	return g.straight() && g.B == 0
}

// Constant reports whether the wave holds one value for ever, before t = 0 too.
func (w Waveform) Constant() bool {
	for i := range w.Segments {
		if g := &w.Segments[i]; !g.constant() || g.A != w.Before {
			return false
		}
	}
	return true
}

// Final returns the limit of the wave for t → ∞, and false where there is none:
// a ramp, a sine or a repetition that still moves.
func (w Waveform) Final() (float64, bool) {
	if len(w.Segments) == 0 {
		return w.Before, true
	}
	last := &w.Segments[len(w.Segments)-1]
	if w.Period > 0 {
		for i := w.Repeat; i < len(w.Segments); i++ {
			if g := &w.Segments[i]; !g.constant() || g.A != last.A {
				return 0, false
			}
		}
		return last.A, true
	}
	if last.B != 0 || !last.straight() {
		return 0, false
	}
	for _, e := range last.Exp {
		if e.Amplitude != 0 && real(e.Rate) >= 0 {
			return 0, false
		}
	}
	return last.A, true
}

// Scaled returns k times the wave.
func (w Waveform) Scaled(k float64) Waveform {
	w.Before *= k
	w.Segments = append([]Segment(nil), w.Segments...)
	for i := range w.Segments {
		g := &w.Segments[i]
		g.A *= k
		g.B *= k
		g.Poly = append([]float64(nil), g.Poly...)
		for j := range g.Poly {
			g.Poly[j] *= k
		}
		g.Exp = append([]Exponential(nil), g.Exp...)
		for j := range g.Exp {
			a := g.Exp[j].Amplitude
			g.Exp[j].Amplitude = complex(k*real(a), k*imag(a))
		}
	}
	return w
}

// Plus returns the wave raised by c.
func (w Waveform) Plus(c float64) Waveform {
	w.Before += c
	w.Segments = append([]Segment(nil), w.Segments...)
	for i := range w.Segments {
		w.Segments[i].A += c
	}
	return w
}

// WithBefore returns the wave with the value v for t < 0.
func (w Waveform) WithBefore(v float64) Waveform {
	w.Before = v
	return w
}

// check panics where the fields contradict what Waveform says of them.
func (w *Waveform) check() {
	for k := range w.Segments {
		at := w.Segments[k].At
		if k == 0 && at != 0 || k > 0 && !(at >= w.Segments[k-1].At) || math.IsInf(at, 0) {
			panic("laplace: the segments of a waveform are not in order of time from 0")
		}
		if len(w.Segments[k].Poly) >= MaxDegree {
			panic("laplace: a segment of a waveform has powers of time above MaxDegree")
		}
	}
	if w.Period > 0 && !(w.Repeat >= 0 && w.Repeat < len(w.Segments)) {
		panic("laplace: a waveform repeats from a segment it does not have")
	}
}

// size returns a bound of |u| over [0, until].
func (w *Waveform) size(until float64) float64 {
	most := math.Abs(w.Before)
	for k := range w.Segments {
		g, end := &w.Segments[k], until
		if g.At > until {
			break
		}
		if k+1 < len(w.Segments) {
			end = min(end, w.Segments[k+1].At)
		} else if w.Period > 0 {
			end = min(end, w.Segments[w.Repeat].At+w.Period)
		}
		length := max(end-g.At, 0)
		v := max(math.Abs(g.A), math.Abs(g.A+g.B*length))
		if len(g.Poly) > 0 {
			v += length * length * sizeOfPowers(g.Poly, length)
		}
		for _, e := range g.Exp {
			v += cmplx.Abs(e.Amplitude) * max(1, math.Exp(real(e.Rate)*length))
		}
		most = max(most, v)
	}
	return most
}
