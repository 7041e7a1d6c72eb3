package laplace

import (
	"fmt"
	"math"
	"math/cmplx"
)

// MaxRatioOrder is the largest order for which a Transfer states its polynomials:
// beyond it coefficients say little about the system.
const MaxRatioOrder = 8

// A Warning rides with an answer that needs a word beside it.
type Warning struct{ Code, Text string }

// A Transfer is H(s) from one input to one output, output per unit of input, with
// s in rad/s. Poles, Zeros and Cancelled are slowest first.
type Transfer struct {
	Zero           bool // identically zero: no path leads from the input to the output
	Gain           float64
	HasGain        bool   // H(0) exists: no pole at 0 is left
	Form           string // "strictly proper", "biproper" or "improper"
	RelativeDegree int    // −1 where improper
	Poles          []Pole // what is left after cancellation, both members of a pair
	Zeros          []Pole // likewise
	Cancelled      []Pole // poles of the whole system that this transfer does not show

	// Residues holds for each pole the coefficients of 1/(s−p), 1/(s−p)², …
	Residues [][]complex128

	// Numerator and Denominator are the coefficients in ascending powers of s, the
	// denominator monic; nil above MaxRatioOrder and where a coefficient leaves the
	// range of numbers.
	Numerator, Denominator []float64

	Behaviour string

	// Weights holds for each pole the share of a unit step's change from 0⁺ to ∞ that
	// it carries, of a pair each member its half; empty where that change is 0 or
	// has no end.
	Weights []float64

	Warnings []Warning

	system *System // of the stores between input and output; nil: none
	direct float64
	rate   float64 // what grows with s: H(s) = rate·s + direct + sum over the poles
}

// Eval returns H(s) from the modes; close poles are not subtracted from each other.
func (h *Transfer) Eval(s complex128) complex128 {
	if h.system == nil {
		return h.polynomial(s)
	}
	return h.polynomial(s) + h.system.modal.transfer(0, 0, s)
}

// Transfer works out H(s) from input in to output out. Stores off every path from
// the input to the output are left out first, by structure. How many of the rest
// cancel is decided exactly up to MaxExactOrder, beyond it and for a plain matrix by
// error bounds; a pole and a zero closer than some roundings cancel in any case. An
// error says that the zeros did not converge.
func (s *System) Transfer(in, out int) (*Transfer, error) {
	h := &Transfer{direct: s.d[out][in], rate: s.rateOf(in, out), Form: "strictly proper"}
	keep := s.plant.pattern().Path(s.b[in], s.c[out])
	if len(keep) == 0 {
		return s.static(h), nil
	}
	sub, err := s.between(keep, in, out)
	if err != nil {
		return nil, err
	}
	h.system = sub
	found, vanishes, err := sub.zeros()
	if err != nil {
		return nil, fmt.Errorf("laplace: the zeros: %w", err)
	}
	if vanishes {
		h.system = nil
		return s.static(h), nil
	}
	h.RelativeDegree = sub.plant.n - len(found)
	h.form()
	zeros, _ := gather(found)
	sub.settleOrigin(zeros)
	f := sub.facts(found)
	c := cancel(sub.poles, zeros, f)
	h.Poles, h.Zeros, h.Cancelled = c.poles, c.zeros, c.gone
	off, err := s.offPath(keep)
	if err != nil {
		return nil, err
	}
	h.Cancelled = gathered(append(h.Cancelled, off...))
	for i, k := range c.from {
		h.Residues = append(h.Residues, sub.residue(k, h.Poles[i].Mult))
	}
	h.gain(sub, f)
	h.polynomials(sub, len(c.gone) > 0)
	h.settleAtRest(sub)
	h.Behaviour = behaviour(h.Poles)
	h.weigh()
	h.warn(c.gone, f)
	return h, nil
}

// static completes a transfer that has no dynamics.
func (s *System) static(h *Transfer) *Transfer {
	h.Gain, h.HasGain = h.direct, true
	h.Cancelled = s.Poles()
	h.Zero = h.direct == 0
	if !h.Zero {
		h.Form = "biproper"
		h.Numerator, h.Denominator = []float64{h.direct}, []float64{1}
	}
	if h.rate != 0 {
		h.Zero, h.Form, h.RelativeDegree = false, "improper", -1
		h.Numerator, h.Denominator = []float64{h.direct, h.rate}, []float64{1}
		h.Zeros = []Pole{{P: complex(-h.direct/h.rate, 0), Mult: 1}}
	}
	return h
}

// form names the form.
func (h *Transfer) form() {
	switch {
	case h.RelativeDegree < 0:
		h.Form = "improper"
	case h.RelativeDegree == 0:
		h.Form = "biproper"
	}
}

// Polynomial returns what H(s) tends to for large s, ascending: what passes at once
// and, where H is improper, the share of the derivative; empty where it tends to 0.
func (h *Transfer) Polynomial() []float64 {
	if h.rate != 0 {
		return []float64{h.direct, h.rate}
	}
	if h.direct != 0 {
		return []float64{h.direct}
	}
	return nil
}

func (h *Transfer) polynomial(s complex128) complex128 {
	if h.rate == 0 {
		return complex(h.direct, 0)
	}
	return complex(h.direct, 0) + complex(h.rate, 0)*s
}

// between returns the system of the stores in keep with one input and one output.
func (s *System) between(keep []int, in, out int) (*System, error) {
	d := [][]float64{{s.d[out][in]}}
	var rate [][]float64
	if r := s.rateOf(in, out); r != 0 {
		rate = [][]float64{{r}}
	}
	if len(keep) < s.plant.n {
		p, b, c := s.along(keep, in, out)
		sub, err := newSystem(p, [][]float64{b}, [][]float64{c}, d)
		if err == nil {
			sub.rate, sub.rounded = rate, s.rounded
		}
		return sub, err
	}
	m := *s.modal
	m.in, m.out = s.modal.in[in:in+1], s.modal.out[out:out+1]
	return &System{plant: s.plant, b: s.b[in : in+1], c: s.c[out : out+1], d: d, rate: rate, rounded: s.rounded,
		modal: &m, poles: s.poles, seats: s.seats}, nil
}

// offPath returns the poles of the stores that are not in keep. Every strongly
// connected part lies on one side, so they are poles of the whole too.
func (s *System) offPath(keep []int) ([]Pole, error) {
	kept := make([]bool, s.plant.n)
	for _, k := range keep {
		kept[k] = true
	}
	var rest []int
	for k := range kept {
		if !kept[k] {
			rest = append(rest, k)
		}
	}
	if len(rest) == 0 {
		return nil, nil
	}
	o, err := newSystem(s.plant.restrict(rest), nil, nil, nil)
	if err != nil {
		return nil, err
	}
	return o.poles, nil
}

// gain fills Gain from the static balance.
func (h *Transfer) gain(sub *System, f facts) {
	for _, p := range h.Poles {
		if cmplx.Abs(p.P) <= p.Radius {
			return
		}
	}
	h.HasGain = true
	if f.zerosAt0 > f.polesAt0 {
		return // exactly 0
	}
	g, ok := sub.Gain(0, 0)
	if !ok { // a pole at 0 has cancelled
		g = h.settled()
	}
	if f.ok || math.Abs(g) > 16*epsilon*h.size() {
		h.Gain = g
	}
}

// settled returns H(0) from the residues.
func (h *Transfer) settled() float64 {
	g := h.direct
	for i := range h.Poles {
		g += real(h.part(i))
	}
	return g
}

// part returns what pole i contributes to H(0).
func (h *Transfer) part(i int) complex128 {
	var sum complex128
	x := -h.Poles[i].P
	power := x
	for _, r := range h.Residues[i] {
		sum += r / power
		power *= x
	}
	return sum
}

// size returns the sum of |parts| of H(0), against which a gain is rounding.
func (h *Transfer) size() float64 {
	sum := math.Abs(h.direct)
	for i := range h.Poles {
		sum += cmplx.Abs(h.part(i))
	}
	return sum
}

// weigh fills Weights.
func (h *Transfer) weigh() {
	change := h.Gain - h.direct
	if !h.HasGain || change == 0 {
		return
	}
	for i := range h.Poles {
		if real(h.Poles[i].P) >= 0 {
			h.Weights = nil
			return
		}
		w := real(h.part(i)) / change
		if !isNumber(w) {
			h.Weights = nil
			return
		}
		h.Weights = append(h.Weights, w)
	}
}

// warn says what was decided within error bounds only.
func (h *Transfer) warn(gone []Pole, f facts) {
	for _, p := range h.Poles {
		if p.Mult > 1 && imag(p.P) >= 0 && relative(p) > 4*epsilon {
			h.Warnings = append(h.Warnings, Warning{"multiple pole", fmt.Sprintf(
				"%d poles at %s rad/s are counted as one: they lie within %.1g of it, relative", p.Mult, show(p.P), relative(p))})
		}
	}
	count := 0
	for _, p := range gone {
		count += p.Mult
	}
	if f.ok && count == f.common {
		return
	}
	for _, p := range gone {
		if imag(p.P) >= 0 {
			h.Warnings = append(h.Warnings, Warning{"cancelled", fmt.Sprintf(
				"a pole at %s rad/s is left out: a zero lies within %.1g of it, relative", show(p.P), relative(p))})
		}
	}
}

func show(p complex128) string {
	if imag(p) == 0 {
		return fmt.Sprintf("%.4g", real(p))
	}
	return fmt.Sprintf("%.4g ± %.4gi", real(p), imag(p))
}

// relative returns a pole's radius relative to it, at least a rounding.
func relative(p Pole) float64 {
	if p.P == 0 {
		return p.Radius
	}
	return max(p.Radius/cmplx.Abs(p.P), epsilon/2)
}
