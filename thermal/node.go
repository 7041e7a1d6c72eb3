package thermal

import (
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// nodeTable is [thermal.node.NAME]: a place with one temperature. With neither
// capacitance nor held it is massless.
func nodeTable() casefile.Table {
	return casefile.Table{
		Name:  "node",
		Help:  "a place with one temperature: it stores heat, or is held, or is massless",
		OneOf: [][]string{{"capacitance", "lump", ""}},
		Fields: []casefile.Field{
			casefile.Positive("capacitance", capacitance, "heat stored for each kelvin"),
			{Name: "lump", Type: casefile.Group, OneOf: [][]string{{"volume", "mass"}},
				Help: "capacitance of a body of one temperature: ρ·V·c or m·c, and a share of it extra",
				Fields: []casefile.Field{
					required(materialName("an own material or one of the handbook")),
					casefile.Positive("volume", volume, "V"),
					casefile.Positive("mass", mass, "m"),
					{Name: "extra", Type: casefile.Number, Dim: dimless, HasMin: true, Help: "what is fixed to the body, as a share of it; it does not melt"},
					meltsField(),
				}},
			{Name: "held", Type: casefile.Wave, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true,
				Help: "its temperature is given, whatever flows"},
			level("start", "temperature at t = 0"),
		},
		Readings: lumpReadings(),
		Build:    buildNode,
		Derive:   deriveNode,
	}
}

func buildNode(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	id, setters, faults := e.AddNode(c, b)
	if l, varies, more := varyingLump(e, c); varies || more != nil {
		if faults = append(faults, more...); faults != nil {
			return nil, faults
		}
		return casefile.Together(append(setters, l.build(e, b, id))...), nil
	}
	store, stores, more := capacityLaw(e, c)
	if stores && more == nil {
		at := b.Capacity(id, e.Ref)
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.C[at] = store.value(v)
			return nil
		})
	}
	return casefile.Together(setters...), append(faults, more...)
}

// capacityLaw returns the law of the node's capacitance; stores is false where it has none.
func capacityLaw(e *casefile.Element, c *casefile.Case) (l law, stores bool, faults []casefile.Diagnostic) {
	switch {
	case e.Has("capacitance"):
		return asTyped("C", typed(e, "capacitance")), true, nil
	case e.Has("lump"):
		l, faults = lumpLaw(e, c)
		return l, true, faults
	}
	return l, false, nil
}

// lumpLaw is ρ·V·c·(1 + extra) or m·c·(1 + extra); where c is stated against temperature, it
// is that at the usual one.
func lumpLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	m, heat, faults := lumpOf(e, c)
	if faults != nil {
		return law{}, faults
	}
	extra := typedOr(e, "lump.extra", 0, "")
	l := law{
		formula: m.formula + "·c", numbers: m.numbers + " · " + heat.text, source: m.source,
		value: func(v casefile.Values) float64 { return m.value(v) * heat.at(v) * (1 + extra.at(v)) },
	}
	if e.Has("lump.extra") {
		l.formula += "·(1 + extra)"
		l.numbers += " · (1 + " + extra.text + ")"
	}
	return l, nil
}

// lumpOf is the mass of a lump in kg, ρ·V or m, and its specific heat. The source is that of both.
func lumpOf(e *casefile.Element, c *casefile.Case) (m law, heat number, faults []casefile.Diagnostic) {
	s, faults := substanceAt(e, c, "lump.material")
	if faults != nil {
		return law{}, number{}, faults
	}
	heat, faults = s.against(e, "lump.material", "specific_heat", specificHeat)
	if e.Has("lump.mass") {
		m = asTyped("m", typed(e, "lump.mass"))
		m.source = sources(heat, typed(e, "lump.mass"))
		return m, heat, faults
	}
	rho, more := s.property(e, "lump.material", "density", density)
	size := typed(e, "lump.volume")
	return law{formula: "ρ·V", numbers: rho.text + " · " + size.text, source: sources(rho, heat, size),
		value: func(v casefile.Values) float64 { return rho.at(v) * size.at(v) }}, heat, append(faults, more...)
}

func deriveNode(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	l, stores, faults := capacityLaw(e, c)
	if !stores || faults != nil {
		return nil
	}
	d := l.derive("capacitance of "+e.Name, capacitance, v)
	if e.Has("lump") {
		if _, heat, _ := lumpOf(e, c); heat.points != nil {
			d.Quantity += " at 20 °C"
		}
	}
	return append(deriveMelting(e, c, v), d)
}
