package hydraulic

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// gasField is the key gas of a node: an accumulator, a hydropneumatic tank, an expansion
// vessel.
func gasField() casefile.Field {
	charge := casefile.Field{Name: "precharge", Type: casefile.Number, Dim: pressure, Kind: quantity.Level, Required: true, Help: "pressure of the gas when the vessel holds no liquid"}
	degrees := func(name, with, help string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: temperature, Kind: quantity.Level, With: []string{with}, Help: help}
	}
	volumeOf := casefile.Positive("volume", volume, "volume of the vessel, all of it gas at the precharge")
	volumeOf.Required = true
	return casefile.Field{
		Name: "gas", Type: casefile.Group, Help: "gas over the liquid, or behind a bladder: at rest at its temperature up to t = 0",
		OneOf: [][]string{{"exponent", "thermal_time_constant"}},
		Fields: []casefile.Field{
			volumeOf, charge,
			degrees("precharge_at", "at", "temperature at which it was charged"),
			degrees("at", "precharge_at", "temperature at which it works"),
			{Name: "exponent", Type: casefile.Number, HasMin: true, Min: 1, HasMax: true, Max: 3, Help: "n of p·V^n from t = 0 on: 1 slow, 1.4 quick for nitrogen and air"},
			casefile.Positive("thermal_time_constant", duration, "τ of the exchange of heat with the wall, at constant pressure"),
			casefile.Positive("least_liquid", volume, "volume of liquid that must be left; said where less is"),
		},
	}
}

// gasSlots are what a gas of the case states.
type gasSlots struct {
	e        *casefile.Element
	pressed  func(p float64) string
	from, at number // temperatures
}

// buildGas adds the gas of a node.
func (n *place) buildGas() {
	e := n.e
	if !e.Has("gas") {
		return
	}
	g := &gasSlots{e, n.pressed, optional(e, "gas.precharge_at"), optional(e, "gas.at")}
	n.gas, n.stores = g, true
	s := network.Shape{Name: "gas of " + e.FullName(), Ports: []network.NodeID{n.id}, Stores: true, Memory: 1, Readings: []string{gasVolume: "gas volume", gasStored: "stored"}}
	if e.Has("gas.thermal_time_constant") {
		const size = 0.1 // of the logarithm that measures the heat
		s.Unknowns = []network.Unknown{{Name: "heat in the gas of " + e.FullName(), Scale: size}}
	}
	id := n.b.Element(s, e.Ref)
	n.shows("gas volume", id, gasVolume)
	if n.tank == nil {
		n.shows("stored", id, gasStored)
	}
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		law, ok := p.Law[id].(*gasLaw)
		if !ok {
			law = &gasLaw{exponent: heatExponent}
			p.Law[id] = law
		}
		law.absolute = l.offset - n.rise(v, l)
		return g.set(law, v, l)
	})
}

// set writes the numbers of the case into the law.
func (g *gasSlots) set(law *gasLaw, v casefile.Values, l *liquid) error {
	e := g.e
	law.volume = v.Num[e.Num("gas.volume")]
	charge := l.absolute(v.Num[e.Num("gas.precharge")])
	if charge <= 0 {
		return e.Fault("gas.precharge", "a precharge of vacuum", "some gas in it", "")
	}
	if g.at.has {
		charge *= g.at.of(v) / g.from.of(v)
	}
	law.charge = charge * law.volume
	if e.Has("gas.exponent") {
		law.exponent = v.Num[e.Num("gas.exponent")]
	} else {
		law.constant = v.Num[e.Num("gas.thermal_time_constant")]
	}
	if law.least = 0; e.Has("gas.least_liquid") {
		if law.least = v.Num[e.Num("gas.least_liquid")]; law.least >= law.volume {
			return e.Fault("gas.least_liquid", fmt.Sprintf("the least liquid, %.4g L, is not below the volume of the vessel, %.4g L", law.least*1e3, law.volume*1e3), "less", "")
		}
	}
	return nil
}

// fits refuses a start at which no liquid is in the vessel.
func (g *gasSlots) fits(at float64, v casefile.Values, l *liquid) error {
	var law gasLaw
	if err := g.set(&law, v, l); err != nil {
		return err
	}
	if charge := law.charge / law.volume; l.absolute(at) < charge {
		what := "the precharge"
		if g.at.has {
			what = "what the precharge comes to at the temperature of work"
		}
		return g.e.Fault("start", fmt.Sprintf("it starts at %s, below %s, %s: the vessel holds no liquid then", g.pressed(at), what, g.pressed(charge-l.offset)), "a start above it", "")
	}
	return nil
}

// deriveGas shows the gas at its start, where the node states one.
func deriveGas(e *casefile.Element, l *liquid, v casefile.Values) []casefile.Derivation {
	if !e.Has("gas") || !e.Plain("start") {
		return nil
	}
	g := &gasSlots{e: e, from: optional(e, "gas.precharge_at"), at: optional(e, "gas.at")}
	law := gasLaw{exponent: heatExponent}
	if g.set(&law, v, l) != nil {
		return nil
	}
	p := l.absolute(v.Num[e.Num("start")])
	formula, numbers := "V₀·p₀/p, absolute", fmt.Sprintf("%.6g L · %.6g bar/%.6g bar", law.volume*1e3, law.charge/law.volume/1e5, p/1e5)
	if g.at.has {
		formula = "V₀·p₀·T/T₀/p, absolute"
	}
	gas := law.charge / p
	return []casefile.Derivation{
		{Quantity: "gas volume of " + e.Name + " at t = 0", Formula: formula, Numbers: numbers, Source: e.SourceOf("gas"), SI: gas, Dim: volume},
		{Quantity: "compliance of the gas of " + e.Name + ", quick", Formula: "V/(n·p)", Numbers: fmt.Sprintf("%.6g L/(%.4g · %.6g bar)", gas*1e3, law.exponent, p/1e5), Source: e.SourceOf("gas"), SI: gas / (law.exponent * p), Dim: compliance},
	}
}
