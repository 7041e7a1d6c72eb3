package laplace

import (
	"math"
	"sort"
)

// Rate is the wave of the derivative of w for t > 0: jumps of w, in which the
// derivative is an impulse, leave no trace in it. Before t = 0 it is 0.
func (w Waveform) Rate() Waveform {
	r := Waveform{Repeat: w.Repeat, Period: w.Period, Segments: make([]Segment, len(w.Segments))}
	for i, g := range w.Segments {
		r.Segments[i] = Segment{At: g.At, A: g.B}
		for k, c := range g.Poly {
			if c *= float64(k + 2); k == 0 {
				r.Segments[i].B = c
			} else {
				r.Segments[i].Poly = append(r.Segments[i].Poly, c)
			}
		}
		for _, e := range g.Exp {
			r.Segments[i].Exp = append(r.Segments[i].Exp, Exponential{e.Amplitude * e.Rate, e.Rate})
		}
	}
	return r
}

// An Impulse is a share of an output that lasts no time and has the weight Weight,
// output × s: what an improper output makes of an input that jumps at T.
type Impulse struct {
	T, Weight float64
	Input     int
}

// improper lists the inputs whose derivative reaches some output.
func (s *System) improper() (inputs []int) {
	for i := range s.b {
		for m := range s.rate {
			if s.rate[m][i] != 0 {
				inputs = append(inputs, i)
				break
			}
		}
	}
	return inputs
}

// rateOf is the share of the derivative of an input in an output.
func (s *System) rateOf(in, out int) float64 {
	if s.rate == nil {
		return 0
	}
	return s.rate[out][in]
}

// withRates returns the system that has the derivatives of its improper inputs as
// inputs of their own, which reach the outputs at once, and the waves for it.
func (s *System) withRates(u []Waveform) (*System, []Waveform) {
	inputs := s.improper()
	waves := append([]Waveform(nil), u...)
	x := &System{plant: s.plant, b: append([][]float64(nil), s.b...), c: s.c, poles: s.poles, seats: s.seats, carry: s.carry}
	m := *s.modal
	m.in = append([]vector(nil), m.in...)
	for _, i := range inputs {
		waves = append(waves, u[i].Rate())
		x.b = append(x.b, make([]float64, s.plant.n))
		m.in = append(m.in, m.vector())
	}
	x.modal = &m
	for out, row := range s.d {
		d := append([]float64(nil), row...)
		for _, i := range inputs {
			d = append(d, s.rate[out][i])
		}
		x.d = append(x.d, d)
	}
	return x, waves
}

// Impulses returns the impulses in output out over a period, 0 ≤ T < Period, ascending
// in time: At, Max, Mean and everything else of a Cycle leaves them out.
func (c *Cycle) Impulses(out int) ([]Impulse, error) {
	if c.rates == nil || c.Period == 0 {
		return nil, nil
	}
	var list []Impulse
	for k, i := range c.r.input {
		if i >= len(c.rates.b) || c.rates.rateOf(i, out) == 0 {
			continue
		}
		w, rate := c.r.wave[k], c.rates.rateOf(i, out)
		// the ends of a period that is continuous may differ by rounding
		if jump := w.At(0) - w.Left(c.Period); math.Abs(jump) > 1e-12*w.size(c.Period) {
			list = append(list, Impulse{0, rate * jump, i})
		}
		var err error
		if list, err = w.impulses(list, rate, i, math.Nextafter(c.Period, 0)); err != nil {
			return nil, err
		}
	}
	sort.SliceStable(list, func(a, b int) bool { return list[a].T < list[b].T })
	return list, nil
}

// Impulses returns the impulses in output out over [0, until], ascending in time:
// At, Max and everything else of a Response leaves them out. There are some only
// where an output is improper, a pressure that follows the derivative of a flow,
// say, and that input jumps. The error is *TooMany.
func (r *Response) Impulses(out int) ([]Impulse, error) {
	var list []Impulse
	for i := range r.jumping {
		rate := r.rates.rateOf(i, out)
		if rate == 0 {
			continue
		}
		w := &r.jumping[i]
		if first := w.At(0); first != 0 {
			list = append(list, Impulse{0, rate * first, i})
		}
		var err error
		if list, err = w.impulses(list, rate, i, r.until); err != nil {
			return nil, err
		}
	}
	sort.SliceStable(list, func(a, b int) bool { return list[a].T < list[b].T })
	return list, nil
}

// impulses appends those that a share rate of the derivative makes of the jumps of w in
// (0, until].
func (w *Waveform) impulses(list []Impulse, rate float64, input int, until float64) ([]Impulse, error) {
	times, err := w.JumpTimes(0, until, MaxBreaks)
	for _, t := range times {
		if t > 0 {
			list = append(list, Impulse{t, rate * (w.At(t) - w.Left(t)), input})
		}
	}
	return list, err
}
