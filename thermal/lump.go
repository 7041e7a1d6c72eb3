package thermal

import (
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// leastRange is the narrowest range in K over which a lump melts: rounding of a temperature must be
// small beside it.
const leastRange = 1e-3

// meltsField is the group melts of a lump.
func meltsField() casefile.Field {
	return casefile.Field{Name: "melts", Type: casefile.Group,
		Help: "it melts and freezes: latent heat, taken up evenly over a range of temperature around the melting point",
		Fields: []casefile.Field{
			required(level("at", "melting point, the middle of the range")),
			{Name: "over", Type: casefile.Number, Dim: temperature, Kind: quantity.Difference, HasMin: true, Min: leastRange, Required: true,
				Help: "width of the range; a narrow one is nearer to a pure substance"},
			required(casefile.Positive("latent", latentHeat, "latent heat of the mass")),
		}}
}

// lumpReadings are what can be shown of a lump that melts, or whose specific heat varies.
func lumpReadings() []casefile.Reading {
	return []casefile.Reading{
		{Word: "stored", Dim: energy, Help: "heat stored in a lump above 0 °C, solid"},
		{Word: "liquid fraction", Dim: dimless, Help: "share of the lump that is molten"},
	}
}

// A varying is a lump whose capacitance is not one number.
type varying struct {
	mass   law // kg
	heat   number
	extra  number
	melts  bool
	latent number
	at     number
	over   number
}

// varyingLump reads such a lump; is tells whether the node has one.
func varyingLump(e *casefile.Element, c *casefile.Case) (l *varying, is bool, faults []casefile.Diagnostic) {
	if !e.Has("lump") {
		return nil, false, nil
	}
	mass, heat, faults := lumpOf(e, c)
	l = &varying{mass: mass, heat: heat, extra: typedOr(e, "lump.extra", 0, ""), melts: e.Has("lump.melts")}
	if l.melts {
		l.latent, l.at, l.over = typed(e, "lump.melts.latent"), typed(e, "lump.melts.at"), typed(e, "lump.melts.over")
	}
	is = l.melts || heat.points != nil
	if is && e.Has("held") {
		key := "lump.material"
		if l.melts {
			key = "lump.melts"
		}
		d := e.Fault(key, "the node is held: whatever it stores changes nothing", "", "")
		d.Hint = "leave the lump out, or let the node go"
		return nil, true, append(faults, d)
	}
	return l, is, faults
}

// build adds the element that stores, and returns its setter.
func (l *varying) build(e *casefile.Element, b *network.Builder, node network.NodeID) casefile.Setter {
	shape := network.Shape{Name: e.FullName(), Ports: []network.NodeID{node}, Stores: true, Readings: []string{"stored"}}
	if l.melts {
		shape.Readings = append(shape.Readings, "liquid fraction")
	}
	id := b.Element(shape, e.Ref)
	for k, word := range shape.Readings {
		e.Shows(word, network.Output{Reading: &network.ReadingTerm{Element: id, Index: k, Sign: 1}})
	}
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[id] == nil {
			p.Law[id] = l.fresh()
		}
		switch law := p.Law[id].(type) {
		case *melting:
			l.set(&law.storing, v)
			law.latent, law.at, law.over = l.mass.value(v)*l.latent.at(v), l.at.at(v), l.over.at(v)
		case *storing:
			l.set(law, v)
		}
		return nil
	}
}

func (l *varying) fresh() network.Law {
	if l.melts {
		return &melting{}
	}
	return &storing{}
}

// set writes the numbers of the sensible heat.
func (l *varying) set(s *storing, v casefile.Values) {
	m := l.mass.value(v) * (1 + l.extra.at(v))
	if l.heat.points == nil {
		s.capacity = m * l.heat.at(v)
		return
	}
	s.mass = m
	onto(&s.heat, l.heat.points, v)
}

// deriveMelting shows the latent heat of a lump that melts.
func deriveMelting(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	if !e.Has("lump.melts") {
		return nil
	}
	m, _, faults := lumpOf(e, c)
	if faults != nil {
		return nil
	}
	latent := typed(e, "lump.melts.latent")
	return []casefile.Derivation{{
		Quantity: "latent heat of " + e.Name, Formula: m.formula + "·L", Numbers: m.numbers + " · " + latent.text,
		Source: sources(number{source: m.source}, latent), SI: m.value(v) * latent.at(v), Dim: energy,
	}}
}
