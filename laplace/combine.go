package laplace

import (
	"fmt"
	"math"
)

// A NotClosed error says that a combination of waves is no law that a Segment holds, from
// an instant on. Apply samples it.
type NotClosed struct {
	At  float64 // s
	Why string  // "a ramp times an exponential"
}

func (e *NotClosed) Error() string {
	return fmt.Sprintf("from %g s on the wave has no closed form: %s", e.At, e.Why)
}

// A NoValue error says that a combination of waves is not a finite number at an instant.
type NoValue struct {
	At    float64 // s; negative: before 0
	Value float64 // what was found: infinite or NaN
}

func (e *NoValue) Error() string {
	when := fmt.Sprintf("at %g s", e.At)
	if e.At < 0 {
		when = "before 0 s"
	}
	if math.IsNaN(e.Value) {
		return "the wave has no value " + when
	}
	return "the wave is infinite " + when
}

// Sum returns a + b in closed form: powers of time are added up, exponentials kept. Where
// one repeats, both do, with the common period, or settle.
//
// The breaks of the result are those of both. Errors are *NotCommensurate for periods
// without a whole-number ratio, *NotClosed for one wave that repeats and another that
// neither repeats nor settles (Unrolled makes one of them end), *TooMany, and *NoValue
// where a number leaves the range.
func Sum(a, b Waveform) (Waveform, error) { return combined(a, b, addLaws) }

// Product returns a·b in closed form, as Sum does: powers of time up to MaxDegree, constants
// times exponentials and exponentials times exponentials stay closed; a *NotClosed error says
// where another one begins.
func Product(a, b Waveform) (Waveform, error) { return combined(a, b, multiplyLaws) }

// Power returns w^n in closed form, as Product does; n may be negative where w is piecewise
// constant.
func Power(w Waveform, n int) (Waveform, error) {
	w.check()
	return mapped(w, func(x Segment) (Segment, string) { return raiseLaw(x, n) })
}

// Quotient returns a/b in closed form, as Product does, where b is piecewise constant.
func Quotient(a, b Waveform) (Waveform, error) {
	return combined(a, b, func(x, y Segment) (Segment, string) {
		if !y.constant() {
			return Segment{}, "a divisor that moves"
		}
		return x.over(y.A), ""
	})
}

// Unrolled returns the wave that is w up to until (s) and does not repeat: from there on the
// segment then in force goes on. The error is *TooMany.
func (w Waveform) Unrolled(until float64) (Waveform, error) {
	w.check()
	if !(w.Period > 0) {
		return w, nil
	}
	starts, err := w.starts(until, MaxBreaks)
	if err != nil {
		return Waveform{}, err
	}
	u := Waveform{Before: w.Before}
	for _, t := range starts {
		g := w.law(t, 0)
		g.At = t
		u.Segments = append(u.Segments, g)
	}
	return u, nil
}

// combined applies op to the laws of both waves between the breaks of either.
func combined(a, b Waveform, op func(x, y Segment) (Segment, string)) (Waveform, error) {
	pair := []*Waveform{&a, &b}
	j, err := joinBreaks(pair)
	if err != nil {
		return Waveform{}, err
	}
	w := Waveform{Repeat: j.repeat, Period: j.period}
	before, err := checked(op(Segment{A: a.Before}, Segment{A: b.Before}))(-1)
	if err != nil {
		return Waveform{}, err
	}
	w.Before = before.A
	for _, t := range j.times {
		g, err := checked(op(a.law(t, j.near), b.law(t, j.near)))(t)
		if err != nil {
			return Waveform{}, err
		}
		w.Segments = append(w.Segments, g)
	}
	return w, nil
}

// mapped applies op to the laws of one wave.
func mapped(w Waveform, op func(x Segment) (Segment, string)) (Waveform, error) {
	before, err := checked(op(Segment{A: w.Before}))(-1)
	if err != nil {
		return Waveform{}, err
	}
	m := Waveform{Before: before.A, Repeat: w.Repeat, Period: w.Period}
	for _, x := range w.Segments {
		g, err := checked(op(x))(x.At)
		if err != nil {
			return Waveform{}, err
		}
		m.Segments = append(m.Segments, g)
	}
	return m, nil
}

// checked returns what was made as the segment that begins at t, or says why it is none.
func checked(g Segment, why string) func(t float64) (Segment, error) {
	return func(t float64) (Segment, error) {
		if why != "" {
			return g, &NotClosed{At: max(t, 0), Why: why}
		}
		for _, v := range g.numbers() {
			if !isNumber(v) {
				return g, &NoValue{At: t, Value: v}
			}
		}
		g.At = t
		return g, nil
	}
}

// numbers lists what a segment is made of.
func (g *Segment) numbers() []float64 {
	list := g.powers()
	for _, e := range g.Exp {
		list = append(list, real(e.Amplitude), imag(e.Amplitude), real(e.Rate), imag(e.Rate))
	}
	return list
}
