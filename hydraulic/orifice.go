package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network/casefile"
)

// orificeField is the key orifice of a restriction: a hole by its coefficient, or a plate
// in a pipe by the standard.
func orificeField() casefile.Field {
	pipe := casefile.Positive("pipe_bore", length, "bore of the pipe in which it sits: the coefficient of ISO 5167-2 holds, and what is lost for good is the drop")
	return casefile.Field{Name: "orifice", Type: casefile.Group, Help: "a hole: q = C·A·√(2Δp/ρ)", OneOf: [][]string{{"coefficient", "pipe_bore"}},
		Fields: []casefile.Field{
			needed(casefile.Positive("bore", length, "of the hole")),
			{Name: "coefficient", Type: casefile.Number, HasMin: true, MinOpen: true, HasMax: true, Max: 1, Help: "C, of discharge; 0.6 to 0.65 where the edge is sharp"},
			pipe,
			{Name: "taps", Type: casefile.Word, Words: tapWords, With: []string{"pipe_bore"}, Help: "where its pressures are taken; flange unless stated"},
		}}
}

// buildOrifice adds a hole by its coefficient.
func (r *passage) buildOrifice() (casefile.Setter, []casefile.Diagnostic) {
	e := r.e
	if faults := r.liquid.needs(e, "orifice", ofDensity); faults != nil {
		return nil, faults
	}
	bore, c := e.Num("orifice.bore"), e.Num("orifice.coefficient")
	return r.between(func(v casefile.Values, l *liquid, to *powerFlow) error {
		a := circle(v.Num[bore])
		*to = rooted(v.Num[c]*a*math.Sqrt(2/l.density), a, l.viscosity)
		return nil
	}), nil
}

// circle is the area of a bore.
func circle(d float64) float64 { return math.Pi / 4 * d * d }

// buildPlate adds a plate in a pipe.
func (r *passage) buildPlate() (casefile.Setter, []casefile.Diagnostic) {
	e := r.e
	if faults := r.liquid.needs(e, "orifice", ofDensity, ofViscosity); faults != nil {
		return nil, faults
	}
	return through(r, func(v casefile.Values, l *liquid, to *plate) error { return setPlate(e, v, l, to) }), nil
}

func setPlate(e *casefile.Element, v casefile.Values, l *liquid, to *plate) error {
	*to = plate{bore: v.Num[e.Num("orifice.bore")], pipe: v.Num[e.Num("orifice.pipe_bore")], density: l.density, viscosity: l.viscosity}
	for i, word := range tapWords {
		if e.Word("orifice.taps") == word {
			to.taps = tapping(i)
		}
	}
	if to.bore >= to.pipe {
		return e.Fault("orifice.bore", fmt.Sprintf("the bore of %s is not smaller than that of the pipe, %s", millimetres(to.bore), millimetres(to.pipe)), "a smaller bore", "")
	}
	to.prepare()
	return nil
}

// derivePlate shows the coefficient where it settles.
func derivePlate(e *casefile.Element, l *liquid, v casefile.Values) []casefile.Derivation {
	var p plate
	if l.density == 0 || l.viscosity == 0 || setPlate(e, v, l, &p) != nil {
		return nil
	}
	const bar, standard = 1e5, "ISO 5167-2:2003, equation (4)"
	q, _, _ := p.Flow(bar, 0)
	re, _ := p.reynolds(q)
	c, _ := p.c.at(re)
	k, _ := p.gain(c)
	return []casefile.Derivation{
		{Quantity: "coefficient of " + e.Name + " at 1 bar lost", Formula: "C(β, Re)", Numbers: fmt.Sprintf("β = %.6g, Re = %.6g", p.beta, re), Source: standard, SI: c},
		flowAtOneBar(e, "C·A·√(2Δp/(ρ·(1 − β⁴)·r)), r the share lost for good", fmt.Sprintf("C = %.6g", c), k),
	}
}
