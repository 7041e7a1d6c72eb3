package laplace

import (
	"fmt"
	"math"
	"math/cmplx"
)

// A NotDecaying error says that a pole does not lie left of the imaginary axis, so
// that what it holds at the start grows or swings for ever.
type NotDecaying struct{ Pole complex128 } // rad/s

func (e *NotDecaying) Error() string {
	word := "grows"
	if real(e.Pole) <= 0 || imag(e.Pole) != 0 && math.Abs(real(e.Pole)) < 1e-9*math.Abs(imag(e.Pole)) {
		word = "is not damped"
	}
	return fmt.Sprintf("laplace: there is no steady cycle: the pole at %.6g %+.6gi rad/s %s", real(e.Pole), imag(e.Pole), word)
}

// A Resonant error says that an undamped pole lies at a harmonic of the cycle, so
// that the inputs drive it further with every period.
type Resonant struct {
	Pole     complex128 // rad/s
	Period   float64    // s; of the cycle
	Harmonic int        // swings of the pole in a period
}

func (e *Resonant) Error() string {
	return fmt.Sprintf("laplace: there is no steady cycle: the pole at ±%.6gi rad/s is not damped and swings %d times in the period of %.6g s: resonance",
		math.Abs(imag(e.Pole)), e.Harmonic, e.Period)
}

// A Drifting error says that a pole at 0 takes in something on balance, so that
// an output moves on in every period.
type Drifting struct {
	Output    int
	PerPeriod float64 // by how much, the output's unit
	Period    float64 // s; 0 where nothing repeats: PerPeriod is then per second
}

func (e *Drifting) Error() string {
	if e.Period == 0 {
		return fmt.Sprintf("laplace: there is no steady cycle: output %d moves on by %.6g in every second", e.Output, e.PerPeriod)
	}
	return fmt.Sprintf("laplace: there is no steady cycle: output %d moves on by %.6g in every period", e.Output, e.PerPeriod)
}

// harmonicTol is how near to a whole number the swings of an undamped pole in a
// period must come to count as resonance.
const harmonicTol = 1e-9

// checkDecay refuses poles between an active input and an output that do not decay,
// but for simple ones at 0, which fixedPoint judges.
func (r *Response) checkDecay(period float64) error {
	for i, p := range r.s.poles {
		if real(p.P) < -p.Radius || !r.inSight(p) {
			continue
		}
		switch w := math.Abs(imag(p.P)); {
		case r.s.integrates(i):
		case real(p.P) > p.Radius || w == 0:
			return &NotDecaying{Pole: p.P}
		default:
			turns := w * period / (2 * math.Pi)
			if n := math.Round(turns); n > 0 && math.Abs(turns-n) <= harmonicTol*n {
				return &Resonant{Pole: p.P, Period: period, Harmonic: int(n)}
			}
			return &NotDecaying{Pole: p.P}
		}
	}
	return nil
}

// inSight reports whether a pole lies between an active input and an output.
func (r *Response) inSight(p Pole) bool {
	for out := range r.base {
		if r.sees(out, p) {
			return true
		}
	}
	return false
}

// sees reports whether a pole lies between an active input and output out.
func (r *Response) sees(out int, p Pole) bool {
	for _, in := range r.input {
		if r.s.takesPart(in, out, func(q Pole) bool { return q == p }) {
			return true
		}
	}
	return false
}

// integrates reports that pole i cannot be told from 0 and that every member of it
// is a mode of its own, so that each integrates what it takes in.
func (s *System) integrates(i int) bool {
	if cmplx.Abs(s.poles[i].P) > s.poles[i].Radius {
		return false
	}
	for _, at := range s.seats[i] {
		if at.kind != realSeat {
			return false
		}
	}
	return true
}

// fixedPoint returns the state at t = 0 of the steady cycle, given the response r
// from rest over one period of it.
func (r *Response) fixedPoint(u []Waveform, c *Cycle) (vector, error) {
	m, z := r.s.modal, r.end()
	if err := r.checkDrift(c.Period, &z); err != nil {
		return z, err
	}
	for k, p := range m.real {
		_, f1 := phi1(p, r.until)
		z.real[k] /= -p * f1
	}
	for k, p := range m.pair {
		_, f1 := cphi1(p, r.until)
		z.pair[k] /= -p * f1
	}
	for i := range m.block {
		if err := m.block[i].fix(r.until, z.block); err != nil {
			return z, err
		}
	}
	return z, r.s.keepIntegrals(u, c, &z)
}

// end returns the state at the end of the response.
func (r *Response) end() vector {
	p := r.piece(len(r.times) - 1)
	z := p.m.vector()
	p.state(p.length, &z)
	return z
}

// checkDrift refuses a mode at 0 that takes in something in a period and is seen.
func (r *Response) checkDrift(period float64, w *vector) error {
	worst := Drifting{Period: period}
	for i := range r.s.poles {
		if !r.s.integrates(i) {
			continue
		}
		for _, at := range r.s.seats[i] {
			k, gross := at.index, 0.0
			for j, in := range r.input {
				gross += math.Abs(r.s.modal.in[in].real[k]) * r.wave[j].size(r.until) * r.until
			}
			if math.Abs(w.real[k]) <= balanceTol*gross {
				continue
			}
			for out := range r.base {
				if d := r.s.modal.out[out].real[k] * w.real[k]; math.Abs(d) > math.Abs(worst.PerPeriod) && r.sees(out, r.s.poles[i]) {
					worst.Output, worst.PerPeriod = out, d
				}
			}
		}
	}
	if worst.PerPeriod == 0 {
		return nil
	}
	if period == 0 {
		worst.PerPeriod /= r.until
	}
	return &worst
}

// balanceTol is the share of all that flows in and out of a mode below which the
// difference counts as rounding.
const balanceTol = 1e-12

// fix replaces the block's part w of x by (I − e^{PT})⁻¹w, I − e^{PT} = −PT·φ₁(PT).
func (q *block) fix(period float64, x []float64) error {
	w := newBlockWork(q.n)
	w.at(q.n, q.t, period)
	part := x[q.first : q.first+q.n]
	for _, a := range [][]float64{q.t, w.p1} {
		f := newRefinedLU(q.n, a)
		if f == nil {
			return &NotDecaying{Pole: complex(q.t[0], 0)}
		}
		copy(part, f.solve(part))
	}
	for i := range part {
		part[i] /= -period
	}
	return nil
}

// keepIntegrals sets the modes at 0 to what the response from rest to u itself leaves them.
func (s *System) keepIntegrals(u []Waveform, c *Cycle, z *vector) error {
	var kept []int
	for i := range s.poles {
		if s.integrates(i) {
			for _, at := range s.seats[i] {
				kept = append(kept, at.index)
			}
		}
	}
	if kept == nil {
		return nil
	}
	turns := math.Ceil(c.from() / max(c.Period, math.SmallestNonzeroFloat64))
	at := turns * c.Period
	if c.Period == 0 {
		at = c.from()
	}
	r, err := s.respondFrom(nil, u, nil, at)
	if err != nil {
		return err
	}
	now := r.end()
	for _, k := range kept {
		z.real[k] = now.real[k] + r.stillToCome(k)
	}
	return nil
}

// from returns the instant from which on every input does what it does for ever.
func (c *Cycle) from() float64 {
	t := 0.0
	for i := range c.waves {
		t = max(t, c.waves[i].from)
	}
	return t
}

// stillToCome returns what mode k at 0 still takes in, after the end, of what dies away.
func (r *Response) stillToCome(k int) float64 {
	sum := 0.0
	for j, in := range r.input {
		w := r.wave[j]
		if w.Period > 0 || len(w.Segments) == 0 {
			continue
		}
		g := w.Segments[len(w.Segments)-1]
		for _, e := range g.Exp {
			if real(e.Rate) < 0 {
				sum -= r.s.modal.in[in].real[k] * real(e.Amplitude*cexp(e.Rate, r.until-g.At)/e.Rate)
			}
		}
	}
	return sum
}
