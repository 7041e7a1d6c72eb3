package casefile

import (
	"errors"
	"fmt"
	"math"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// A curve is a profile, or what an expression makes of some: a waveform in closed form
// where it stays one, else a function of such waveforms, which is sampled once, when the
// expression is complete, so that errors of sampling do not pile up.
type curve struct {
	wave   laplace.Waveform
	at     func(x []float64) float64 // nil: wave is all; else of the values of the leaves
	leaves []*curve                  // in closed form
	steps  int                       // operations in at
	bound  float64                   // by how much wave may be off
	done   bool                      // wave holds what at was sampled to
}

const (
	// sampleTolerance is the error that sampling may bring, as a share of the largest value.
	sampleTolerance = 1e-7

	// mostSteps bounds the operations of an expression that is sampled, through all the
	// profiles that it is made of.
	mostSteps = 400

	// mostPower is the highest power that is worked out in closed form.
	mostPower = laplace.MaxDegree
)

// mostWork is how many pieces of waveforms the expressions of a case may go through, and
// mostSamples how many operations the sampling of one may take.
const (
	mostWork    = 2_000_000
	mostSamples = 5_000_000
)

// join takes one step of an expression.
func (s *scene) join(st quantity.Step) (any, error) {
	closed := true
	bound, work := 0.0, 0
	for _, t := range st.Terms {
		if c, ok := t.Curve.(*curve); ok {
			closed = closed && c.at == nil
			bound = max(bound, c.bound)
			work += len(c.wave.Segments)
		}
	}
	if s.work != nil {
		if *s.work += work; *s.work > mostWork {
			return nil, &noWave{"the expressions of the case go through too many pieces of waveforms: take fewer points, or fewer steps"}
		}
	}
	if closed && !swarms(st) {
		w, err := closedStep(st)
		var open *laplace.NotClosed
		switch {
		case err == nil:
			made := &curve{wave: w}
			if s.work != nil {
				*s.work += len(w.Segments) // periods may come to a long one
			}
			if bound > 0 {
				made.bound = spread(&st)
			}
			return made, nil
		case !errors.As(err, &open):
			return nil, spoken(st.Operation, err)
		}
	}
	return composed(st)
}

// spoken puts an error of package laplace in the words of a case.
func spoken(op quantity.Operation, err error) error {
	var value *laplace.NoValue
	var period *laplace.NotCommensurate
	var jump *laplace.HiddenJump
	var many *laplace.TooMany
	switch {
	case errors.As(err, &value):
		return noValueAt(op, value.At)
	case errors.As(err, &period):
		return &noWave{fmt.Sprintf("profiles that repeat every %s and every %s have no common period", quantity.Duration(period.Periods[0]), quantity.Duration(period.Periods[1]))}
	case errors.As(err, &jump):
		return &noWave{fmt.Sprintf("it jumps or turns sharply near %s, where no profile does", quantity.Duration(jump.At))}
	case errors.As(err, &many):
		return &noWave{fmt.Sprintf("it comes to more than %d pieces", many.Limit)}
	}
	return &noWave{err.Error()}
}

// noValueAt says why an operation has no value at an instant.
func noValueAt(op quantity.Operation, t float64) error {
	when := " at " + quantity.Duration(t)
	if t < 0 {
		when = " before 0 s"
	}
	switch op {
	case quantity.Divide:
		return &quantity.NoValue{Found: "a division by zero" + when, Want: "a divisor that never is zero"}
	case quantity.Sqrt:
		return &quantity.NoValue{Found: "the square root of a negative number" + when, Want: "0 or more"}
	case quantity.Ln:
		return &quantity.NoValue{Found: "the logarithm of a number that is not positive" + when, Want: "more than 0"}
	}
	return &quantity.NoValue{Found: "a result that is not a finite number" + when, Want: "one below 1.8e308 in SI"}
}

// closedStep takes a step between waveforms in closed form. The error is a
// *laplace.NotClosed where the outcome has none.
func closedStep(st quantity.Step) (laplace.Waveform, error) {
	a := st.Terms[0]
	var b quantity.Term
	if len(st.Terms) > 1 {
		b = st.Terms[1]
	}
	minus := func(t quantity.Term) laplace.Waveform { return waveOf(t).Scaled(-1) }
	switch st.Operation {
	case quantity.Add:
		return laplace.Sum(waveOf(a), waveOf(b))
	case quantity.Subtract:
		return laplace.Sum(waveOf(a), minus(b))
	case quantity.Multiply:
		return laplace.Product(waveOf(a), waveOf(b))
	case quantity.Divide:
		return laplace.Quotient(waveOf(a), waveOf(b))
	case quantity.Negate:
		return minus(a), nil
	case quantity.Power:
		if n := b.Value.SI; b.Curve == nil && n == math.Trunc(n) && math.Abs(n) <= mostPower {
			return laplace.Power(waveOf(a), int(n))
		}
	}
	if w, ok, err := stepwiseStep(st); ok {
		return w, err
	}
	return clippedStep(st)
}

// swarms reports a product or a power of sums of exponentials that would have a great many.
func swarms(st quantity.Step) bool {
	const most = 64
	n := make([]int, 2)
	for i := range min(2, len(st.Terms)) {
		if c, ok := st.Terms[i].Curve.(*curve); ok {
			for k := range c.wave.Segments {
				n[i] = max(n[i], len(c.wave.Segments[k].Exp))
			}
		}
	}
	switch st.Operation {
	case quantity.Multiply:
		return n[0]*n[1] > most
	case quantity.Power:
		return n[0] > 1 && float64(n[0])*math.Abs(st.Terms[1].Value.SI) > most/2
	}
	return false
}

// waveOf is the waveform of an operand.
func waveOf(t quantity.Term) laplace.Waveform {
	if c, ok := t.Curve.(*curve); ok {
		return c.wave
	}
	return laplace.Constant(t.Value.SI)
}

// composed makes a step a function of the waveforms below it.
func composed(st quantity.Step) (any, error) {
	made := &curve{steps: 1}
	type operand struct {
		at         func(x []float64) float64
		begin, end int
	}
	operands := make([]operand, len(st.Terms))
	for i, t := range st.Terms {
		o := operand{begin: len(made.leaves)}
		switch c, ok := t.Curve.(*curve); {
		case !ok:
			x := t.Value.SI
			o.at = func([]float64) float64 { return x }
		case c.at == nil:
			o.at = func(x []float64) float64 { return x[0] }
			made.leaves = append(made.leaves, c)
		default:
			o.at = c.at
			made.leaves = append(made.leaves, c.leaves...)
			made.steps += c.steps
		}
		o.end = len(made.leaves)
		operands[i] = o
	}
	if made.steps > mostSteps || len(made.leaves) > mostSteps {
		return nil, &noWave{fmt.Sprintf("it has no closed form and takes more than %d steps through the profiles it is made of", mostSteps)}
	}
	made.at = func(x []float64) float64 {
		y := make([]float64, len(operands))
		for i := range operands {
			o := &operands[i]
			y[i] = o.at(x[o.begin:o.end])
		}
		return st.Function(y)
	}
	if t, bad := made.undefined(); bad {
		return nil, noValueAt(st.Operation, t)
	}
	return made, nil
}

// plus returns the curve raised by a number.
func (c *curve) plus(by float64) *curve {
	if c.at == nil {
		return &curve{wave: c.wave.Plus(by), bound: c.bound}
	}
	at := c.at
	return &curve{at: func(x []float64) float64 { return at(x) + by }, leaves: c.leaves, steps: c.steps}
}

// wavePart returns the waveform of a curve up to until and by how much it may be off.
func (c *curve) wavePart(until float64) (laplace.Waveform, float64, error) {
	if c.at == nil || c.done {
		return c.wave, c.bound, nil
	}
	list := make([]laplace.Waveform, len(c.leaves))
	for i, l := range c.leaves {
		list[i] = l.wave
	}
	if !(until > 0) {
		until = 1 // nothing is asked of later times
	}
	taken := 0
	counted := func(x []float64) float64 {
		if taken += c.steps; taken > mostSamples {
			return math.NaN()
		}
		return c.at(x)
	}
	w, bound, err := laplace.Apply(counted, until, sampleTolerance, list...)
	var value *laplace.NoValue
	switch {
	case taken > mostSamples:
		return w, 0, &noWave{"it has no closed form, and too much to sample: take fewer points, or fewer steps"}
	case errors.As(err, &value):
		return w, 0, &noWave{"it has no value at about " + quantity.Duration(value.At) + ": a division by zero, the root of a negative number, or the like"}
	case err != nil:
		return w, 0, spoken("", err)
	}
	return w, bound + c.leafSpread(), nil
}
