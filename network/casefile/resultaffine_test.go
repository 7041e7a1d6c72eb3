package casefile_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// An expression is taken for constant + Σ coef·operand exactly where it is written so, and
// then is that at every point.
func TestAffine(t *testing.T) {
	for _, c := range []struct {
		text string
		ok   bool
	}{
		{"core - `inlet`", true},
		{"core - 20 °C", true},
		{"core + 2 * (`cold plate` - `inlet`) - rise / 3", true},
		{"-(core - `inlet`) * share", true},
		{"(core - `inlet`) * 2 * share / (1 + share)", true},
		{"`flow of foot` + load", true},
		{"`flow of foot` * rise - `flow of film` * (double / load) * 1 K", true},
		{"(core - `inlet`) * (core - `cold plate`)", false},
		{"abs(core - `inlet`)", false},
		{"max(core, `inlet`)", false},
		{"rise / (core - `inlet`)", false},
		{"(core - `inlet`)^2", false},
		{"sqrt(1 + (core - `inlet`) / rise)", false},
	} {
		cs := askedCase(t, "\n[result.x]\nexpression = \"= "+c.text+"\"\n")
		ask, _ := cs.ResultNamed("x")
		v := values(t, cs)
		coef, constant, ok := ask.Expr.Affine(v)
		if ok != c.ok {
			t.Errorf("%s: affine %v, want %v", c.text, ok, c.ok)
			continue
		}
		if !ok {
			continue
		}
		rapid.Check(t, func(rt *rapid.T) {
			x := make([]float64, len(coef))
			y, size := constant, math.Abs(constant)
			for i := range x {
				x[i] = rapid.Float64Range(200, 400).Draw(rt, "x")
				y += coef[i] * x[i]
				size += math.Abs(coef[i] * x[i])
			}
			if got := ask.Expr.Eval(x, v); math.Abs(got-y) > 1e-12*size {
				rt.Fatalf("%s at %v: %v, want %v", c.text, x, y, got)
			}
		})
	}
}
