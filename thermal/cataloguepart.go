package thermal

import (
	"fmt"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// catalogueFields are the keys of a resistance that falls as the rise across it grows.
func catalogueFields() []casefile.Field {
	r := casefile.Positive("R", resistance, "R at that rise")
	return []casefile.Field{
		with(difference("at_rise", "rise across it at which value is meant: R = value·(rise/at_rise)^(−exponent)"), "exponent"),
		{Name: "exponent", Type: casefile.Number, Dim: dimless, HasMin: true, HasMax: true, Max: 3, With: []string{"value", "at_rise"},
			Help: "power at which the resistance falls as the rise grows: 0.25 in still air and oil, 0 for a constant"},
		{Name: "points", Type: casefile.Pairs, Dim: temperature, Kind: quantity.Difference, HasMin: true, Ascending: true, Second: &r,
			Help: "rise across it and R there, from a catalogue: straight between, constant outside"},
	}
}

// buildCatalogue builds a resistance by value, at_rise and exponent, or by points.
func buildCatalogue(e *casefile.Element, at ends) casefile.Setter {
	if e.Has("points") {
		points := pointsAt(e, "points")
		return buildPart(e, at, func() *charted { return &charted{name: e.Name} },
			func(v casefile.Values, f *charted) { onto(&f.at, points, v) })
	}
	r, rise, exponent := e.Num("value"), e.Num("at_rise"), e.Num("exponent")
	return buildPart(e, at, func() *falling { return &falling{} }, func(v casefile.Values, f *falling) {
		f.g, f.atRise, f.exponent = 1/v.Num[r], v.Num[rise], v.Num[exponent]
	})
}

func deriveCatalogue(e *casefile.Element, v casefile.Values) []casefile.Derivation {
	d := casefile.Derivation{Quantity: "resistance of " + e.Name, Dim: resistance}
	if e.Has("points") {
		n := e.Len("points")
		d.Formula, d.Numbers = "R(rise), straight between points", fmt.Sprintf("%d points; at the last, %s", n, e.Text(fmt.Sprintf("points[%d].first", n-1)))
		d.Source, d.SI = e.SourceOf("points"), v.Num[e.Num(fmt.Sprintf("points[%d].second", n-1))]
		return []casefile.Derivation{d}
	}
	r, rise, exponent := typed(e, "value"), typed(e, "at_rise"), typed(e, "exponent")
	d.Quantity += " at a rise of " + rise.text
	d.Formula, d.Numbers, d.Source, d.SI = "R·(rise/at_rise)^(−n)", r.text+" · (rise/"+rise.text+")^(−"+exponent.text+")", sources(r, rise, exponent), r.at(v)
	return []casefile.Derivation{d}
}

// checkCatalogue finds points between which less heat would flow at a greater rise.
func checkCatalogue(c *casefile.Case, v casefile.Values) (faults []casefile.Diagnostic) {
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || e.Table.Name != "resistance" || !e.Has("points") {
			continue
		}
		f := charted{name: e.Name}
		onto(&f.at, pointsAt(e, "points"), v)
		if i, bad := f.falls(); bad {
			d := e.Fault(fmt.Sprintf("points[%d].second", i), fmt.Sprintf("a rise of %s would drive less heat than one of %s", e.Text(fmt.Sprintf("points[%d].first", i)), e.Text(fmt.Sprintf("points[%d].first", i-1))), "", "")
			d.Hint = "rise divided by R must grow from point to point: R may fall with the rise, or grow less than it does"
			faults = append(faults, d)
		}
	}
	return faults
}
