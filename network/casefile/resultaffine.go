package casefile

import (
	"errors"
	"math"

	"lagbook/network/quantity"
)

// An affine is constant + Σ coef·operand, of one step of an expression.
type affine struct {
	coef     []float64
	constant float64
}

var errNotAffine = errors.New("casefile: not affine")

// Affine returns the expression as constant + Σ coef·operand, in SI and the order of
// Operands, with the given values of v, and false where it is not of that form as it is
// written: sums, differences, and products and quotients with what does not change.
func (e *ResultExpr) Affine(v Values) (coef []float64, constant float64, ok bool) {
	t, err := e.expr.Curves(func(slot int) quantity.Term {
		t := quantity.Term{Value: e.like[slot]}
		if slot < len(e.Operands) {
			a := &affine{coef: make([]float64, len(e.Operands))}
			a.coef[slot] = 1
			t.Curve = a
		} else {
			t.Value.SI, t.Value.Exact = v.Num[e.givens[slot-len(e.Operands)]], nil
		}
		return t
	}, func(s quantity.Step) (any, error) { return e.joined(&s) })
	if err != nil {
		return nil, 0, false
	}
	a, ok := t.Curve.(*affine)
	if !ok {
		return nil, 0, false
	}
	return a.coef, a.constant, e.agrees(a, v)
}

// joined takes one step.
func (e *ResultExpr) joined(s *quantity.Step) (any, error) {
	list := make([]*affine, len(s.Terms))
	for i := range s.Terms {
		if list[i], _ = s.Terms[i].Curve.(*affine); list[i] == nil {
			list[i] = &affine{coef: make([]float64, len(e.Operands)), constant: s.Terms[i].Value.SI}
		}
	}
	moves := func(i int) bool { return s.Terms[i].Curve != nil }
	switch s.Operation {
	case quantity.Negate:
		return list[0].plus(-1, nil, 0), nil
	case quantity.Add:
		return list[0].plus(1, list[1], 1), nil
	case quantity.Subtract:
		return list[0].plus(1, list[1], -1), nil
	case quantity.Multiply:
		if !moves(0) {
			return list[1].plus(list[0].constant, nil, 0), nil
		}
		if !moves(1) {
			return list[0].plus(list[1].constant, nil, 0), nil
		}
	case quantity.Divide:
		if !moves(1) {
			return list[0].plus(1/list[1].constant, nil, 0), nil
		}
	}
	return nil, errNotAffine
}

// plus returns k·a + m·b, b nil for nothing.
func (a *affine) plus(k float64, b *affine, m float64) *affine {
	r := &affine{coef: make([]float64, len(a.coef)), constant: k * a.constant}
	for i, c := range a.coef {
		r.coef[i] = k * c
	}
	if b != nil {
		r.constant += m * b.constant
		for i, c := range b.coef {
			r.coef[i] += m * c
		}
	}
	return r
}

// agrees compares the form with the expression at two points.
func (e *ResultExpr) agrees(a *affine, v Values) bool {
	x := make([]float64, len(a.coef))
	for _, at := range []float64{1, 300} {
		y, size := a.constant, math.Abs(a.constant)
		for i, c := range a.coef {
			x[i] = at + 0.37*float64(i)
			y += c * x[i]
			size += math.Abs(c * x[i])
		}
		if !(math.Abs(e.Eval(x, v)-y) <= 1e-12*size) {
			return false
		}
	}
	return true
}
