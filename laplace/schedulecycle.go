package laplace

import (
	"fmt"
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/mat"
)

// A NotContracting error says that a system that switches does not forget its
// start: of a deviation, Multiplier times as much is left after a period (a Floquet
// multiplier), in modulus 1 or more.
type NotContracting struct {
	Multiplier complex128
	Period     float64 // s
}

func (e *NotContracting) Error() string {
	return fmt.Sprintf("laplace: there is no steady cycle: of a deviation %.6g times as much is left after each period of %.6g s",
		cmplx.Abs(e.Multiplier), e.Period)
}

// Cycle returns the periodic steady state under inputs and switching that repeat or
// settle, as System.Cycle does. Indices of errors count the waves of the schedule
// after the inputs.
//
// Method: over a period the stores go from x to x + E x + v, affine, where x + E x is
// the product of the phases; E is summed without the 1, phase by phase from
// e^{ph} − 1, so that slow systems keep their digits. The cycle starts at −E⁻¹v. Errors
// are those of System.Cycle but *Resonant, *NotDecaying and *Drifting, in the place of
// which *NotContracting stands, for the whole system whatever the outputs see.
func (s *Schedule) Cycle(u []Waveform) (*Cycle, error) {
	c := &Cycle{schedule: s}
	all := append(append([]Waveform(nil), u...), s.Waves...)
	var beats []beat
	for i := range all {
		all[i].check()
		w, err := all[i].inTheLongRun(i)
		if err != nil {
			return nil, err
		}
		if w.sameAs(&all[i]) {
			w.from = 0
		}
		c.waves, beats = append(c.waves, w), append(beats, w.beats(i)...)
	}
	var err error
	if c.Period, err = common(beats); err != nil {
		return nil, err
	}
	if c.Period == 0 {
		return s.rest(u)
	}
	v, err := together(c.waves, c.Period)
	if err != nil {
		return nil, err
	}
	c.turns = append([]Waveform(nil), v[len(u):]...)
	p, err := s.phases(c.turns, c.Period)
	if err != nil {
		return nil, err
	}
	p.last = -1
	first, err := p.respondFrom(nil, v[:len(u)], c.Period)
	if err != nil {
		return nil, err
	}
	c.change = p.change(c.Period)
	if c.levels, err = c.balance(first.endLevels()); err != nil {
		return nil, err
	}
	c.r, err = p.respondFrom(c.levels, v[:len(u)], c.Period)
	return c, err
}

// sameAs reports that the wave does from t = 0 on what it does for ever.
func (s *steadyWave) sameAs(w *Waveform) bool {
	for _, g := range s.shortOf(w).Segments {
		if !g.constant() || g.A != 0 {
			return false
		}
	}
	return true
}

// rest is the cycle where nothing repeats: the state of rest in the last phase.
func (s *Schedule) rest(u []Waveform) (*Cycle, error) {
	k, err := s.kind(s.Waves, func(w *Waveform) float64 { v, _ := w.Final(); return v })
	if err != nil {
		return nil, &SwitchError{0, err}
	}
	return s.kinds[k].System.Cycle(u, s.kinds[k].Base)
}

// endLevels returns what is carried over at the end of a response.
func (r *Response) endLevels() []float64 {
	z := r.end()
	return r.piece(len(r.times) - 1).of.System.held(&z)
}

// change returns E: by how much what is carried over differs after a period from x,
// as E x, when no input acts; row-major.
func (p *phases) change(period float64) *mat.Dense {
	n := len(p.kinds[0].System.carry.out)
	e := mat.NewDense(n, n, nil)
	for j := range n {
		x, sum := make([]float64, n), make([]float64, n)
		x[j] = 1
		by := func(change []float64) {
			for i, d := range change {
				x[i] += d
				sum[i] += d
			}
		}
		for k := range p.at {
			s := p.kinds[p.kind[k]].System
			by(s.carry.entered(x))
			by(s.changed(x, p.end(k, period)-p.at[k]))
		}
		e.SetCol(j, sum)
	}
	return e
}

// changed returns by how much what is carried over changes within h when no input acts.
func (s *System) changed(x []float64, h float64) []float64 {
	z := s.hold(x)
	for k, p := range s.modal.real {
		z.real[k] *= math.Expm1(p * h)
	}
	for k, p := range s.modal.pair {
		_, f1 := cphi1(p, h)
		z.pair[k] *= p * f1
	}
	for i := range s.modal.block {
		q := &s.modal.block[i]
		part := z.block[q.first : q.first+q.n]
		w := newBlockWork(q.n)
		w.at(q.n, q.t, h)
		for _, a := range [][]float64{q.t, w.p1} {
			y := make([]float64, q.n)
			for i := range y {
				for j, v := range part {
					y[i] += a[i*q.n+j] * v
				}
			}
			copy(part, y)
		}
		for i := range part {
			part[i] *= h
		}
	}
	return s.carry.seen(&z)
}

// balance returns the levels x with E x + v = 0, given that every multiplier,
// 1 + an eigenvalue of E, is less than 1 in modulus.
func (c *Cycle) balance(v []float64) ([]float64, error) {
	n := len(v)
	if n == 0 {
		return []float64{}, nil
	}
	var eig mat.Eigen
	if !eig.Factorize(c.change, mat.EigenNone) {
		return nil, fmt.Errorf("laplace: the multipliers of the cycle were not found")
	}
	for _, e := range eig.Values(nil) {
		if left := 2*real(e) + real(e)*real(e) + imag(e)*imag(e); left >= -multiplierTol { // |1+e|² − 1
			return nil, &NotContracting{Multiplier: 1 + e, Period: c.Period}
		}
	}
	f := newRefinedLU(n, c.change.RawMatrix().Data)
	if f == nil {
		return nil, &NotContracting{Multiplier: 1, Period: c.Period}
	}
	return f.solveNegative(v), nil
}

// multiplierTol is how near to 1 the square of a multiplier cannot be told from it:
// some roundings of E, whose entries are of the order of 1.
const multiplierTol = 1e-14
