package thermal

import (
	"fmt"
	"math"

	"lagbook/network/casefile"
)

// spreadingField is spreading = {…}: heat from a small source into a larger plate and
// through it. The first-named node is the source, the second the far side of the plate.
func spreadingField() casefile.Field {
	return casefile.Field{Name: "spreading", Type: casefile.Group, OneOf: [][]string{{"conductivity", "material"}},
		Help: "a source on a larger plate: t/(k·A) of the plate and the constriction on the way into it",
		Fields: []casefile.Field{
			required(casefile.Positive("source_area", area, "of the source, in the middle of the plate")),
			required(casefile.Positive("plate_area", area, "of the plate")),
			required(casefile.Positive("thickness", length, "t of the plate")),
			casefile.Positive("conductivity", conductivity, "k of the plate"),
			materialName("of the plate, an own material or one of the handbook, in place of conductivity"),
			required(casefile.Positive("coefficient", coefficient, "at the far side of the plate, everything beyond taken together: 1/(R·A)")),
			{Name: "rise", Type: casefile.Word, Words: []string{"highest", "mean"}, Structural: true, Help: "of the source: its highest, unless the mean is meant"},
		}}
}

// spread is the resistance in K/W of a source of area As on a plate of area Ap, thickness t and
// conductivity k with coefficient h at its far side, to that side: constriction and plate.
//
// S. Lee, S. Song, V. Au and K. P. Moran, ASME/JSME Thermal Engineering Conf. 4 (1995)
// 199, closed form for a round source in the middle of a round plate of the same areas,
// insulated around. Against the exact series there (Yovanovich, Muzychka and Culham,
// J. Thermophysics and Heat Transfer 13 (1999) 495) the constriction is within 10 % up to
// Bi = h·b/k of 0.1 and within 15 % at 1.
func spread(As, Ap, t, k, h float64, highest bool) float64 {
	a, b := math.Sqrt(As/math.Pi), math.Sqrt(Ap/math.Pi)
	e, tau, biot := a/b, t/b, h*b/k
	lambda := math.Pi + 1/(math.Sqrt(math.Pi)*e)
	tanh := math.Tanh(lambda * tau)
	phi := (tanh + lambda/biot) / (1 + lambda/biot*tanh)
	psi := math.Pow(1-e, 1.5) / 2 * phi
	if highest {
		psi = (1 - e) / math.Sqrt(math.Pi) * phi
	}
	return psi/(math.Sqrt(math.Pi)*k*a) + t/(k*Ap)
}

// spreadingLaw is that of a part spreading.
func spreadingLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	k, faults := steadyConductivity(e, c, "spreading.")
	as, ap := typed(e, "spreading.source_area"), typed(e, "spreading.plate_area")
	t, h := typed(e, "spreading.thickness"), typed(e, "spreading.coefficient")
	highest := e.Word("spreading.rise") != "mean"
	formula := "(1 − ε)·φ/(π·k·a) + t/(k·A)"
	if !highest {
		formula = "(1 − ε)^1.5·φ/(2·√π·k·a) + t/(k·A)"
	}
	return law{
		formula: formula,
		numbers: fmt.Sprintf("source %s on %s, t = %s, k = %s, h = %s", as.text, ap.text, t.text, k.text, h.text),
		source:  joinSources("Lee, Song, Au and Moran, ASME/JSME Thermal Engineering Conf. 4 (1995) 199", sources(k, t, h, as, ap)),
		value: func(v casefile.Values) float64 {
			return 1 / spread(as.at(v), ap.at(v), t.at(v), k.at(v), h.at(v), highest)
		},
	}, faults
}

// steadyConductivity is k of a part that takes one value of it, whatever its temperature.
func steadyConductivity(e *casefile.Element, c *casefile.Case, prefix string) (number, []casefile.Diagnostic) {
	if e.Has(prefix + "conductivity") {
		return typed(e, prefix+"conductivity"), nil
	}
	s, faults := substanceAt(e, c, prefix+"material")
	if faults != nil {
		return number{}, faults
	}
	return s.property(e, prefix+"material", "conductivity", conductivity)
}

func joinSources(a, b string) string {
	if b == "" {
		return a
	}
	return a + "; " + b
}

// checkSpreading finds sources larger than their plate.
func checkSpreading(c *casefile.Case, v casefile.Values) (faults []casefile.Diagnostic) {
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || !e.Has("spreading") {
			continue
		}
		if v.Num[e.Num("spreading.source_area")] > v.Num[e.Num("spreading.plate_area")] {
			faults = append(faults, e.Fault("spreading.source_area", "source_area is "+e.Text("spreading.source_area"),
				"at most the plate_area, "+e.Text("spreading.plate_area"), ""))
		}
	}
	return faults
}
