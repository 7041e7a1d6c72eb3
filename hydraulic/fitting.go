package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network/casefile"
)

// fittingField is the key fitting of a restriction: a loss coefficient on the velocity
// in a bore.
func fittingField() casefile.Field {
	return casefile.Field{Name: "fitting", Type: casefile.Group, Help: "a loss on the velocity in a bore: Δp = loss·ρ·v²/2", OneOf: [][]string{{"loss", "loss_in"}},
		Fields: []casefile.Field{
			needed(casefile.Positive("bore", length, "in which the velocity is meant")),
			casefile.Positive("loss", dimensionless, "either way"),
			{Name: "loss_in", Type: casefile.Number, HasMin: true, MinOpen: true, With: []string{"loss_out"}, Help: "from the first-named node to the second"},
			{Name: "loss_out", Type: casefile.Number, HasMin: true, MinOpen: true, With: []string{"loss_in"}, Help: "from the second to the first"},
		}}
}

// lossGain is k of q = k·√Δ of a loss in a bore.
func lossGain(bore, loss, density float64) float64 {
	return circle(bore) * math.Sqrt(2/(density*loss))
}

// buildFitting adds one.
func (r *passage) buildFitting() (casefile.Setter, []casefile.Diagnostic) {
	e := r.e
	if faults := r.liquid.needs(e, "fitting", ofDensity); faults != nil {
		return nil, faults
	}
	bore := e.Num("fitting.bore")
	if e.Has("fitting.loss") {
		loss := e.Num("fitting.loss")
		return r.between(func(v casefile.Values, l *liquid, to *powerFlow) error {
			d := v.Num[bore]
			*to = rooted(lossGain(d, v.Num[loss], l.density), circle(d), l.viscosity)
			return nil
		}), nil
	}
	in, out := e.Num("fitting.loss_in"), e.Num("fitting.loss_out")
	return through(r, func(v casefile.Values, l *liquid, to *twoWay) error {
		d := v.Num[bore]
		forth, back := lossGain(d, v.Num[in], l.density), lossGain(d, v.Num[out], l.density)
		slope := min(forth/math.Sqrt(leastCore), back/math.Sqrt(leastCore), creeping(circle(d), l.viscosity))
		*to = twoWay{withSlope(forth, slope), withSlope(back, slope)}
		return nil
	}), nil
}

// deriveFitting shows what a fitting passes, each way where the ways differ.
func deriveFitting(e *casefile.Element, l *liquid, v casefile.Values) (list []casefile.Derivation) {
	for _, way := range []struct{ key, said string }{{"loss", ""}, {"loss_in", ", forth"}, {"loss_out", ", back"}} {
		path := "fitting." + way.key
		if !e.Has(path) {
			continue
		}
		d := flowAtOneBar(e, "A·√(2Δp/(ρ·loss))", fmt.Sprintf("π/4·(%s)² · √(2 bar/(%.6g kg/m³ · %s))", e.Text("fitting.bore"), l.density, e.Text(path)),
			lossGain(v.Num[e.Num("fitting.bore")], v.Num[e.Num(path)], l.density))
		d.Quantity += way.said
		list = append(list, d)
	}
	return list
}
