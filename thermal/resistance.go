package thermal

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// resistanceTable is [thermal.resistance.NAME]: what lies between two nodes and
// stores nothing.
func resistanceTable() casefile.Table {
	made := func(own ...casefile.Field) []casefile.Field {
		return append([]casefile.Field{
			againstTemperature(casefile.Positive("conductivity", conductivity, "k")),
			materialName("an own material or one of the handbook, in place of conductivity"),
		}, own...)
	}
	ofWhat := [][]string{{"conductivity", "material"}}
	return casefile.Table{
		Name:  "resistance",
		Stage: 1,
		Help:  "a resistance between two nodes",
		OneOf: [][]string{{"value", "conductance", "layer", "shell", "contact", "film", "fins", "spreading", "radiation", "points"}},
		Fields: append([]casefile.Field{
			casefile.Between(),
			casefile.Positive("value", resistance, "R"),
			casefile.Positive("conductance", conductance, "1/R"),
			{Name: "layer", Type: casefile.Group, OneOf: ofWhat, Help: "a flat layer: t/(k·A)",
				Fields: made(required(casefile.Positive("thickness", length, "t")), required(casefile.Positive("area", area, "A")))},
			{Name: "shell", Type: casefile.Group, OneOf: ofWhat, Help: "a tube wall: ln(ro/ri)/(2π·k·L)",
				Fields: made(required(casefile.Positive("inner_radius", length, "ri")), required(casefile.Positive("outer_radius", length, "ro")),
					required(casefile.Positive("length", length, "L")))},
			contactField(), filmField(), finsField(), spreadingField(),
			radiationField(),
			scaleField(),
		}, catalogueFields()...),
		Readings: append(filmReadings(), // of radiation too
			casefile.Reading{Word: "resistance", Dim: resistance, Help: "of a part whose resistance is not one number: that of the moment"}),
		Build:  buildResistance,
		Derive: deriveResistance,
	}
}

func buildResistance(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	if convects(e) {
		return buildConvection(e, c, b)
	}
	from, to, faults := e.Ends()
	if faults != nil {
		return nil, faults
	}
	at := ends{b, from, to}
	switch {
	case e.Has("radiation"):
		return buildRadiation(e, c, at)
	case e.Has("points") || e.Has("at_rise"):
		return buildCatalogue(e, at), nil
	}
	l, faults := conductanceLaw(e, c)
	if faults != nil {
		return nil, faults
	}
	points := varyingConductivity(e, c)
	switch {
	case points != nil:
		return buildPart(e, at, func() *conducting { return &conducting{} }, func(v casefile.Values, f *conducting) {
			onto(&f.k, points, v)
			f.g = l.value(v) / f.k.usual()
		}), nil
	case e.Has("scale") && casefile.NotInSteps(e, c, "scale", "") != nil:
		return buildPart(e, at, func() *ohmic { return &ohmic{} }, func(v casefile.Values, f *ohmic) { f.g = l.value(v) }), nil
	}
	scale, faults := casefile.ScalingOf(e, c, b)
	if faults != nil {
		return nil, faults
	}
	id := b.Resistance(e.FullName(), from, to, e.Ref)
	return func(v casefile.Values, p *network.Params) error {
		p.G[id] = l.value(v) * scale.Factor(v, p)
		return nil
	}, nil
}

// conductanceLaw computes the conductance in W/K; formula and numbers are those
// of the resistance, as the trade writes them.
func conductanceLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	switch {
	case e.Has("value"):
		r := typed(e, "value")
		return law{formula: "R", numbers: r.text, source: r.source, value: func(v casefile.Values) float64 { return 1 / r.at(v) }}, nil
	case e.Has("conductance"):
		g := typed(e, "conductance")
		return law{formula: "1/G", numbers: "1/(" + g.text + ")", source: g.source, value: g.at}, nil
	case e.Has("layer"):
		return layerLaw(e, c)
	case e.Has("shell"):
		return shellLaw(e, c)
	case e.Has("contact"):
		return jointLaw(e, c)
	case e.Has("spreading"):
		return spreadingLaw(e, c)
	}
	return surfaceLaw(e, "film"), nil
}

func layerLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	k, faults := conductivityOf(e, c, "layer.")
	t, a := typed(e, "layer.thickness"), typed(e, "layer.area")
	return law{
		formula: "t/(k·A)",
		numbers: t.text + "/(" + k.text + " · " + a.text + ")",
		source:  sources(k, t, a),
		value:   func(v casefile.Values) float64 { return k.at(v) * a.at(v) / t.at(v) },
	}, faults
}

func shellLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	k, faults := conductivityOf(e, c, "shell.")
	ri, ro, l := typed(e, "shell.inner_radius"), typed(e, "shell.outer_radius"), typed(e, "shell.length")
	return law{
		formula: "ln(ro/ri)/(2π·k·L)",
		numbers: "ln(" + ro.text + "/" + ri.text + ")/(2π · " + k.text + " · " + l.text + ")",
		source:  sources(k, ri, ro, l),
		value: func(v casefile.Values) float64 {
			inner, outer := ri.at(v), ro.at(v)
			// of the wall and the inner radius, so that a thin shell keeps its digits
			return 2 * math.Pi * k.at(v) * l.at(v) / math.Log1p((outer-inner)/inner)
		},
	}, faults
}

// surfaceLaw is 1/(h·A) of a contact and 1/(h·A·η) of a film.
func surfaceLaw(e *casefile.Element, kind string) law {
	h, a := typed(e, kind+".coefficient"), typed(e, kind+".area")
	if kind == "film" && e.Has("film.efficiency") {
		eta := typed(e, "film.efficiency")
		return law{
			formula: "1/(h·A·η)",
			numbers: "1/(" + h.text + " · " + a.text + " · " + eta.text + ")",
			source:  sources(h, a, eta),
			value:   func(v casefile.Values) float64 { return h.at(v) * a.at(v) * eta.at(v) },
		}
	}
	return law{
		formula: "1/(h·A)",
		numbers: "1/(" + h.text + " · " + a.text + ")",
		source:  sources(h, a),
		value:   func(v casefile.Values) float64 { return h.at(v) * a.at(v) },
	}
}

// conductivityOf is k as stated, or that of the material named; it may be points.
func conductivityOf(e *casefile.Element, c *casefile.Case, prefix string) (number, []casefile.Diagnostic) {
	if e.Has(prefix + "conductivity") {
		return typed(e, prefix+"conductivity"), nil
	}
	s, faults := substanceAt(e, c, prefix+"material")
	if faults != nil {
		return number{}, faults
	}
	return s.against(e, prefix+"material", "conductivity", conductivity)
}

// varyingConductivity is that of a layer or shell where it is stated against temperature, else nil.
func varyingConductivity(e *casefile.Element, c *casefile.Case) []onCurve {
	for _, kind := range []string{"layer", "shell"} {
		if e.Has(kind) {
			k, _ := conductivityOf(e, c, kind+".")
			return k.points
		}
	}
	return nil
}

func deriveResistance(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	switch {
	case convects(e):
		return deriveConvection(e, c, v)
	case e.Has("radiation"):
		return deriveRadiation(e, c, v)
	case e.Has("points") || e.Has("at_rise"):
		return deriveCatalogue(e, v)
	}
	l, faults := conductanceLaw(e, c)
	if faults != nil {
		return nil
	}
	d := l.derive("resistance of "+e.Name, resistance, v)
	if varyingConductivity(e, c) != nil {
		d.Quantity += " at 20 °C"
	}
	d.SI = 1 / d.SI
	return []casefile.Derivation{d}
}

// checkShells finds shells whose outer radius does not enclose the inner one.
func checkShells(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	var faults []casefile.Diagnostic
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || e.Table.Name != "resistance" || !e.Has("shell") {
			continue
		}
		if inner := v.Num[e.Num("shell.inner_radius")]; !(v.Num[e.Num("shell.outer_radius")] > inner) {
			faults = append(faults, e.Fault("shell.outer_radius",
				"outer_radius is "+e.Text("shell.outer_radius"), fmt.Sprintf("more than the inner_radius, %s", e.Text("shell.inner_radius")), ""))
		}
	}
	return faults
}
