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
					{Name: "extra", Type: casefile.Number, Dim: dimless, HasMin: true, Help: "what is fixed to the body, as a share of it"},
				}},
			{Name: "held", Type: casefile.Wave, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true,
				Help: "its temperature is given, whatever flows"},
			level("start", "temperature at t = 0"),
		},
		Build:  buildNode,
		Derive: deriveNode,
	}
}

func buildNode(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	id, setters, faults := e.AddNode(c, b)
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

// lumpLaw is ρ·V·c·(1 + extra) or m·c·(1 + extra).
func lumpLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	s, faults := substanceAt(e, c, "lump.material")
	if faults != nil {
		return law{}, faults
	}
	heat, faults := s.property(e, "lump.material", "specific_heat", specificHeat)
	extra := typedOr(e, "lump.extra", 0, "")
	l := law{}
	body := number{}
	if e.Has("lump.mass") {
		body = typed(e, "lump.mass")
		l.formula, l.numbers = "m·c", body.text+" · "+heat.text
		l.value = func(v casefile.Values) float64 { return body.at(v) * heat.at(v) * (1 + extra.at(v)) }
		l.source = sources(heat, body)
	} else {
		rho, more := s.property(e, "lump.material", "density", density)
		faults = append(faults, more...)
		body = typed(e, "lump.volume")
		l.formula, l.numbers = "ρ·V·c", rho.text+" · "+body.text+" · "+heat.text
		l.value = func(v casefile.Values) float64 { return rho.at(v) * body.at(v) * heat.at(v) * (1 + extra.at(v)) }
		l.source = sources(rho, heat, body)
	}
	if e.Has("lump.extra") {
		l.formula += "·(1 + extra)"
		l.numbers += " · (1 + " + extra.text + ")"
	}
	return l, faults
}

func deriveNode(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	l, stores, faults := capacityLaw(e, c)
	if !stores || faults != nil {
		return nil
	}
	return []casefile.Derivation{l.derive("capacitance of "+e.Name, capacitance, v)}
}
