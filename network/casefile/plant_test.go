package casefile_test

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A vocabulary with every form of field that parts with laws of their own need, invented
// for these tests: basins with a level, gates with an opening, pumps with a curve.
var (
	dimVolume = quantity.Dim{0, 3, 0, 0, 0}
	dimRate   = quantity.Dim{0, 0, -1, 0, 0}
	dimKvisc  = quantity.Dim{0, 2, -1, 0, 0}
	dimVisc   = quantity.Dim{1, -1, -1, 0, 0}
)

func plantVocabulary() []casefile.Vocabulary {
	share := casefile.Field{Type: casefile.Number, HasMin: true, HasMax: true, Max: 1}
	level := casefile.Field{Name: "temperature", Dim: dimTemperature, Kind: quantity.Level}
	against := func(f casefile.Field) casefile.Field { f.Against = &level; return f }
	number := func(name string, dim quantity.Dim) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: dim}
	}
	speed := func(f casefile.Field) casefile.Field { f.Dim, f.Unit, f.HasMin = dimRate, "rpm", true; return f }
	kv := positive("kv", dimFlow)
	kv.Unit, kv.Also = "m³/h", []quantity.Dim{{}}
	return []casefile.Vocabulary{{
		Domain: "air",
		Head:   []casefile.Field{number("altitude", dimLength), positive("pressure", dimPressure)},
		OneOf:  [][]string{{"altitude", "pressure", ""}},
	}, {
		Domain: "hydraulic",
		Measures: casefile.Measures{Level: dimPressure, Flow: dimFlow, LevelWord: "pressure", FlowWord: "flow",
			StoreKey: "compliance", StoreAlso: []string{"tank"}, Sample: "2 bar"},
		Head: []casefile.Field{positive("density", dimDensity),
			{Name: "viscosity", Type: casefile.Number, Dim: dimVisc, Also: []quantity.Dim{dimKvisc}, With: []string{"density"}}},
		Tables: []casefile.Table{
			{Name: "node", Build: buildBasin, Fields: []casefile.Field{
				positive("compliance", quantity.Dim{-1, 4, 2, 0, 0}),
				{Name: "held", Type: casefile.Wave, Dim: dimPressure, Kind: quantity.Level, Or: []casefile.Field{
					{Name: "level", Type: casefile.Wave, Dim: dimLength, Required: true}}},
				{Name: "start", Type: casefile.Number, Dim: dimPressure, Kind: quantity.Level, Or: []casefile.Field{
					{Name: "level", Type: casefile.Number, Dim: dimLength, Required: true}}},
				{Name: "tank", Type: casefile.Group, OneOf: [][]string{{"area", "points"}}, Fields: []casefile.Field{
					positive("area", dimArea),
					{Name: "points", Type: casefile.Pairs, Dim: dimLength, Ascending: true, Second: &casefile.Field{Dim: dimArea, HasMin: true, MinOpen: true}},
					{Name: "overflow", Type: casefile.Number, Dim: dimLength, Or: []casefile.Field{
						required(number("crest", dimLength)), required(positive("width", dimLength))}}}},
			}, Readings: []casefile.Reading{
				{Word: "level", Dim: dimLength, Kind: quantity.Level}, {Word: "stored", Dim: dimVolume}, {Word: "spill", Dim: dimFlow}}},
			{Name: "gate", Stage: 1, Build: buildGate, OneOf: [][]string{{"kv", "cv"}}, Fields: []casefile.Field{
				between(), kv, positive("cv", quantity.Dim{}),
				{Name: "characteristic", Type: casefile.Word, Words: []string{"linear", "equal percentage"},
					Against: &casefile.Field{Name: "stroke", HasMin: true, HasMax: true, Max: 1}, Second: &share},
				{Name: "opening", Type: casefile.Wave, HasMin: true, HasMax: true, Max: 1, Drives: "opening"}},
				Readings: []casefile.Reading{{Word: "velocity", Dim: quantity.Dim{0, 1, -1, 0, 0}}}},
			{Name: "pump", Stage: 1, Build: buildPump, Fields: []casefile.Field{
				casefile.From(), casefile.To(),
				{Name: "head", Type: casefile.Group, Required: true, Fields: []casefile.Field{
					{Name: "flow", Type: casefile.Numbers, Dim: dimFlow, Unit: "m³/h", HasMin: true, Ascending: true, Required: true},
					{Name: "head", Type: casefile.Numbers, Dim: dimLength, Required: true},
					against(positive("efficiency", quantity.Dim{}))}},
				speed(casefile.Field{Name: "speed", Type: casefile.Wave, Drives: "speed"}),
				speed(casefile.Field{Name: "rated_speed", Type: casefile.Number}),
				{Name: "non_return", Type: casefile.Flag},
				{Name: "damper", Type: casefile.Number, Dim: dimMassFlow, Unit: "N·s/m", HasMin: true},
				{Name: "span", Type: casefile.Numbers, Dim: dimPressure, Items: 2, Ascending: true},
				{Name: "slip", Type: casefile.Number, HasMin: true, HasMax: true, Max: 1, Or: []casefile.Field{
					required(positive("flow", dimFlow)), {Name: "at", Type: casefile.Number, Dim: dimPressure, Kind: quantity.Difference}}},
				{Name: "lumps", Type: casefile.Count, HasMin: true, Min: 1, HasMax: true, Max: 100, Or: []casefile.Field{
					positive("accuracy", quantity.Dim{}), {Name: "up_to", Type: casefile.Number, Dim: dimRate, Unit: "Hz", HasMin: true, MinOpen: true, Required: true}}},
				{Name: "on_off", Type: casefile.Group, Fields: []casefile.Field{
					casefile.NodeName("of", ""), {Name: "on_below", Type: casefile.Number, Dim: dimPressure, Kind: quantity.Level, Also: []quantity.Dim{dimLength}}}},
			}, Readings: []casefile.Reading{{Word: "speed", Dim: dimRate}}},
			{Name: "source", Stage: 1, Build: buildSource, OneOf: [][]string{{"into", "out_of"}}, Fields: []casefile.Field{
				casefile.NodeName("into", ""), casefile.NodeName("out_of", ""), {Name: "drive", Type: casefile.Wave, Dim: dimFlow, Required: true}}},
			{Name: "line", Stage: 1, Build: buildChain, Fields: []casefile.Field{between(), required(positive("resistance", quantity.Dim{1, -4, -1, 0, 0})),
				{Name: "scale", Type: casefile.Wave, HasMin: true}}},
		},
	}, {
		Tables: []casefile.Table{{Name: "material", Fields: []casefile.Field{against(positive("density", dimDensity)), against(positive("conductivity", dimConduct))}}},
	}}
}

// plantDensity is the name under which the first node keeps the density.
const plantDensity = "density of the plant"

// basinLaw stores area·level.
type basinLaw struct{ area float64 }

func (l *basinLaw) Eval(s *network.Stamp) {
	s.Stored, s.DStored = l.area*s.X[0]/9806.65, l.area/9806.65
}

func (l *basinLaw) Read(s *network.Stamp, k int, grad []float64) float64 {
	if grad != nil {
		grad[0] = 1 / 9806.65
	}
	return s.X[0] / 9806.65
}

func buildBasin(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	id, set, faults := e.AddNode(c, b)
	if head := c.Head("hydraulic"); c.Kept(plantDensity) == nil && head.Has("density") {
		c.Keep(plantDensity, head.Text("density"))
	}
	if e.Has("held") && !e.Plain("held") {
		in, wave := b.Hold(id, e.Ref), e.Wave("held.level")
		set = append(set, func(v casefile.Values, p *network.Params) error {
			p.Wave[in] = v.Wave[wave].Scaled(9806.65)
			return nil
		})
	}
	if e.Has("start") && !e.Plain("start") {
		slot := e.Num("start.level")
		set = append(set, func(v casefile.Values, p *network.Params) error {
			p.Start[id], p.HasStart[id] = 9806.65*v.Num[slot], true
			return nil
		})
	}
	if e.Has("compliance") {
		at, slot := b.Capacity(id, e.Ref), e.Num("compliance")
		set = append(set, func(v casefile.Values, p *network.Params) error { p.C[at] = v.Num[slot]; return nil })
	}
	if e.Has("tank") {
		x := b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{id}, Stores: true, Readings: []string{"level"}}, e.Ref)
		e.Shows("level", network.Output{Reading: &network.ReadingTerm{Element: x, Sign: 1}})
		slot := e.NumOr("tank.area", 1)
		set = append(set, func(v casefile.Values, p *network.Params) error {
			if p.Law[x] == nil {
				p.Law[x] = &basinLaw{}
			}
			p.Law[x].(*basinLaw).area = v.Num[slot]
			return nil
		})
	}
	return casefile.Together(set...), faults
}

// straight is a flow in proportion to the difference.
type straight struct{ g float64 }

func (l *straight) Flow(a, b float64) (q, da, db float64) { return l.g * (a - b), l.g, -l.g }

func buildGate(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.Ends()
	if faults != nil {
		return nil, faults
	}
	if oil, ok := c.Element("material", "oil"); ok {
		for i := range oil.Len("density.points") {
			oil.Num(fmt.Sprintf("density.points[%d].first", i))
			oil.DimOf(fmt.Sprintf("density.points[%d].second", i))
		}
	}
	x := b.Between(e.FullName(), from, to, e.Has("opening"), e.Ref)
	e.Shows("velocity", network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: x, Sign: -2}})
	if e.Has("opening") {
		e.Driven("opening", x, 0)
	}
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[x] == nil {
			p.Law[x] = &network.Through{Flow: &straight{1e-8}}
		}
		if e.Has("opening") {
			p.Drive[x][0] = v.Wave[e.Wave("opening")]
		}
		return nil
	}, nil
}

func buildPump(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.FromTo()
	if faults != nil {
		return nil, faults
	}
	if e.Len("head.flow") != e.Len("head.head") {
		return nil, []casefile.Diagnostic{e.Fault("head.head", "head has another number of items than flow", "as many", "")}
	}
	x := b.Between(e.FullName(), from, to, e.Has("speed"), e.Ref)
	e.Shows("flow", network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: x, Sign: -1}})
	e.Shows("flow at "+e.NameOf("to"), network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: x, Port: 1, Sign: 1}})
	if e.Has("speed") {
		e.Driven("speed", x, 0)
	}
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[x] == nil {
			p.Law[x] = &network.Through{Flow: &straight{1e-7}}
		}
		if e.Has("speed") {
			p.Drive[x][0] = v.Wave[e.Wave("speed")]
		}
		return nil
	}, nil
}

// buildChain builds two resistances in a row.
func buildChain(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.Ends()
	if faults != nil {
		return nil, faults
	}
	mid := b.Node(e.FullName()+".1", e.Ref)
	c.BindNode(e.FullName()+".1", mid)
	one, two := b.Resistance(e.FullName(), from, mid, e.Ref), b.Resistance(e.FullName()+"/1", mid, to, e.Ref)
	slot := e.Num("resistance")
	return func(v casefile.Values, p *network.Params) error {
		p.G[one], p.G[two] = 2/v.Num[slot], 2/v.Num[slot]
		return nil
	}, nil
}
