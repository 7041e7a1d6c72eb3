package thermal

import (
	"fmt"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// radiationField is the group radiation of a resistance.
func radiationField() casefile.Field {
	share := func(name, help string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: dimless, HasMin: true, MinOpen: true, HasMax: true, Max: 1, Help: help}
	}
	return casefile.Field{Name: "radiation", Type: casefile.Group,
		OneOf: [][]string{{"emissivity", "material", "emissivities"}, {"area", "areas"}},
		Help:  "thermal radiation to large surroundings, σ·ε·F·A·(T⁴ − T⁴), or between two grey surfaces",
		Fields: []casefile.Field{
			with(share("emissivity", "ε of the first-named end, towards surroundings that are black or large"), "area"),
			with(materialName("an own material that states its emissivity, or one of the handbook, in place of emissivity"), "area"),
			casefile.Positive("area", area, "A of the surface"),
			with(pairOf(share("emissivities", "ε of the two surfaces, in the order of between")), "areas"),
			with(pairOf(casefile.Positive("areas", area, "A of the two surfaces, in the order of between")), "emissivities"),
			share("view_factor", "F from the first surface to the second, or to its surroundings; 1 unless stated"),
		}}
}

// pairOf makes a list of two of a number.
func pairOf(f casefile.Field) casefile.Field {
	f.Type, f.Items = casefile.Numbers, 2
	return f
}

// radiationLaw computes the area that radiates, ε·F·A in m², and the area of the first surface.
func radiationLaw(e *casefile.Element, c *casefile.Case) (black, face law, faults []casefile.Diagnostic) {
	view := typedOr(e, "radiation.view_factor", 1, "1")
	if e.Has("radiation.emissivities") {
		return greyLaw(e, view)
	}
	eps, faults := emissivityOf(e, c, "radiation.")
	a := typed(e, "radiation.area")
	return law{
		formula: "ε·F·A",
		numbers: eps.text + " · " + view.text + " · " + a.text,
		source:  sources(eps, view, a),
		value:   func(v casefile.Values) float64 { return eps.at(v) * view.at(v) * a.at(v) },
	}, asTyped("A", a), faults
}

// greyLaw is the network of two surface resistances and the space between, after A. K. Oppenheim,
// Trans. ASME 78, 725 (1956), as F. P. Incropera, D. P. DeWitt, T. L. Bergman and A. S. Lavine:
// Fundamentals of Heat and Mass Transfer, 6th ed., eq. 13.18, print it (both places from memory):
// 1/((1 − ε₁)/(ε₁A₁) + 1/(A₁F₁₂) + (1 − ε₂)/(ε₂A₂)).
func greyLaw(e *casefile.Element, view number) (black, face law, faults []casefile.Diagnostic) {
	e1, e2 := typed(e, "radiation.emissivities[0]"), typed(e, "radiation.emissivities[1]")
	a1, a2 := typed(e, "radiation.areas[0]"), typed(e, "radiation.areas[1]")
	return law{
		formula: "1/((1 − ε₁)/(ε₁·A₁) + 1/(A₁·F) + (1 − ε₂)/(ε₂·A₂))",
		numbers: fmt.Sprintf("1/((1 − %[1]s)/(%[1]s · %[2]s) + 1/(%[2]s · %[5]s) + (1 − %[3]s)/(%[3]s · %[4]s))", e1.text, a1.text, e2.text, a2.text, view.text),
		source:  sources(e1, a1, e2, a2, view),
		value: func(v casefile.Values) float64 {
			x, y, p, q := e1.at(v), e2.at(v), a1.at(v), a2.at(v)
			return 1 / ((1-x)/(x*p) + 1/(p*view.at(v)) + (1-y)/(y*q))
		},
	}, asTyped("A₁", a1), nil
}

// buildRadiation builds a resistance by radiation.
func buildRadiation(e *casefile.Element, c *casefile.Case, at ends) (casefile.Setter, []casefile.Diagnostic) {
	black, face, faults := radiationLaw(e, c)
	if faults != nil {
		return nil, faults
	}
	return buildPart(e, at, func() *radiant { return &radiant{} }, func(v casefile.Values, r *radiant) {
		r.k, r.area = stefanBoltzmann*black.value(v), face.value(v)
	}), nil
}

// deriveRadiation shows the area that radiates, and the coefficient at the levels where the two ends start.
func deriveRadiation(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	black, face, faults := radiationLaw(e, c)
	if faults != nil {
		return nil
	}
	list := []casefile.Derivation{black.derive("radiating area of "+e.Name, area, v)}
	ends := e.Names("between")
	a, okA := startLevel(c, v, ends[0])
	b, okB := startLevel(c, v, ends[1])
	if !okA || !okB {
		return list
	}
	h, _, _ := (&radiant{stefanBoltzmann * black.value(v), face.value(v)}).Coefficient(a, b)
	in := func(T float64) string { return quantity.Print{Digits: 5}.Format(T, temperature, quantity.Level) }
	return append(list, casefile.Derivation{
		Quantity: fmt.Sprintf("coefficient of %s at %s and %s", e.Name, in(a), in(b)),
		Formula:  "σ·(radiating area/A)·(T₁ + T₂)·(T₁² + T₂²)", Numbers: "T₁ = " + in(a) + ", T₂ = " + in(b), Source: "σ: CODATA 2018", SI: h, Dim: coefficient,
	})
}

// checkRadiation finds a first surface that would see more of the second than there is:
// A₁·F₁₂ = A₂·F₂₁, and no view factor is above 1.
func checkRadiation(c *casefile.Case, v casefile.Values) (faults []casefile.Diagnostic) {
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || e.Table.Name != "resistance" || !e.Has("radiation.areas") || e.Len("radiation.areas") != 2 {
			continue
		}
		view := typedOr(e, "radiation.view_factor", 1, "1")
		seen, there := v.Num[e.Num("radiation.areas[0]")]*view.at(v), v.Num[e.Num("radiation.areas[1]")]
		if seen > there*(1+1e-9) { // decimals of one and the same number
			d := e.Fault("radiation.areas", fmt.Sprintf("the first surface of %s would see with F = %s more than the second has, %s", e.Text("radiation.areas[0]"), view.text, e.Text("radiation.areas[1]")),
				"A₁·F at most A₂", "")
			d.Hint = "state the view factor from the first surface to the second, at most A₂/A₁, or name the smaller surface first"
			faults = append(faults, d)
		}
	}
	return faults
}
