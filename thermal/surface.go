package thermal

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
)

// surfaceTable is [thermal.surface.NAME]: a face of a node in the open or in a room.
func surfaceTable() casefile.Table {
	share := func(name, help string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: dimless, HasMin: true, HasMax: true, Max: 1, Help: help}
	}
	emissivity := share("emissivity", "ε of the surface; without it, nothing is radiated")
	emissivity.MinOpen = true
	film := casefile.Field{Name: "film", Type: casefile.Number, Dim: coefficient, HasMin: true, MinOpen: true, With: []string{"air"},
		Help:  "convection to the air: a coefficient, or natural or forced convection by correlation, over the area of the surface",
		Or:    append([]casefile.Field{casefile.Positive("coefficient", coefficient, "h")}, shapeFields()...),
		OneOf: [][]string{{"coefficient", "natural", "forced"}}}
	return casefile.Table{
		Name:  "surface",
		Stage: 1,
		Help:  "a face: convection to the air, radiation to the sky or to walls around, and the sun it absorbs",
		Fields: []casefile.Field{
			required(casefile.NodeName("node", "whose face it is")),
			required(areaField()),
			film,
			casefile.NodeName("air", "the node of the air"),
			emissivity,
			casefile.NodeName("sky", "the node to which it radiates, large against it: the sky, walls; the air unless stated"),
			{Name: "absorbs", Type: casefile.Wave, Dim: irradiance, HasMin: true, With: []string{"absorptance"}, Help: "the sun on the surface, in watts per area"},
			with(share("absorptance", "share of the sun that it absorbs"), "absorbs"),
		},
		Readings: filmReadings(),
		Build:    buildSurface,
		Derive:   deriveSurface,
	}
}

// planFace reads the film of a surface, nil where it has none.
func planFace(e *casefile.Element, c *casefile.Case) (*filmPlan, []casefile.Diagnostic) {
	switch {
	case !e.Has("film"):
		return nil, nil
	case e.Plain("film"):
		return &filmPlan{pressure: airPressure(c), area: typed(e, "area"), efficiency: number{fixed: true, value: 1}, stated: typed(e, "film")}, nil
	}
	return planFilm(e, c, "film.", "area")
}

func buildSurface(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	plan, faults := planFace(e, c)
	faults = append(faults, faceFaults(e)...)
	nodes := map[string]network.NodeID{}
	for _, key := range []string{"node", "air", "sky"} {
		if e.Has(key) {
			id, more := e.NodeAt(key)
			nodes[key], faults = id, append(faults, more...)
		}
	}
	if faults != nil {
		return nil, faults
	}
	var setters []casefile.Setter
	switch {
	case e.Has("emissivity") || plan != nil && plan.of != nil:
		setters = append(setters, buildFace(e, b, plan, nodes))
	case plan != nil:
		id := b.Resistance(e.FullName(), nodes["node"], nodes["air"], e.Ref)
		e.Shows("flow", network.Output{Flow: &network.FlowTerm{Resistance: id, Sign: 1}})
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.G[id] = plan.stated.at(v) * plan.area.at(v)
			return nil
		})
	}
	if e.Has("absorbs") {
		in := b.Source(e.FullName(), nodes["node"], 1, e.Ref)
		sun, share, area := e.Wave("absorbs"), e.Num("absorptance"), e.Num("area")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.Wave[in] = v.Wave[sun].Scaled(v.Num[share] * v.Num[area])
			return nil
		})
	}
	return casefile.Together(setters...), nil
}

// buildFace builds film and radiation as one element.
func buildFace(e *casefile.Element, b *network.Builder, plan *filmPlan, nodes map[string]network.NodeID) casefile.Setter {
	shape := network.Shape{Name: e.FullName(), Ports: []network.NodeID{nodes["node"]}, Joins: true}
	port := func(key string) int {
		for i, id := range shape.Ports[1:] {
			if id == nodes[key] {
				return i + 1
			}
		}
		shape.Ports = append(shape.Ports, nodes[key])
		return len(shape.Ports) - 1
	}
	air, sky := 0, 0
	if plan != nil {
		air = port("air")
		shape.Readings = []string{"coefficient"}
	}
	if e.Has("emissivity") {
		key := "air"
		if e.Has("sky") {
			key = "sky"
		}
		sky = port(key)
	}
	blown := plan != nil && plan.blown
	if blown {
		shape.Drives = []string{"speed of " + e.FullName()}
	}
	id := b.Element(shape, e.Ref)
	e.Shows("flow", network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: id, Sign: -1}})
	flowAt := func(key string, at int) {
		if at > 0 && e.Has(key) {
			e.Shows("flow at "+e.NameOf(key), network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: id, Port: at, Sign: 1}})
		}
	}
	flowAt("air", air)
	flowAt("sky", sky)
	if plan != nil {
		e.Shows("coefficient", network.Output{Reading: &network.ReadingTerm{Element: id, Sign: 1}})
	}
	if blown {
		e.Driven("speed", id, 0)
	}
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[id] == nil {
			l := &facing{air: air, sky: sky, blown: blown}
			if plan != nil {
				l.of = plan.fresh().(*film)
			}
			p.Law[id] = l
		}
		l := p.Law[id].(*facing)
		if plan != nil {
			plan.set(v, l.of)
		}
		if sky > 0 {
			l.radiant.area = v.Num[e.Num("area")]
			l.radiant.k = stefanBoltzmann * v.Num[e.Num("emissivity")] * l.radiant.area
		}
		if blown {
			p.Drive[id][0] = v.Wave[plan.speed]
		}
		return nil
	}
}

// faceFaults finds a surface that does nothing, and ends that are missing or its own.
func faceFaults(e *casefile.Element) (faults []casefile.Diagnostic) {
	fault := func(path, text, hint string) {
		d := e.Fault(path, text, "", "")
		d.Code, d.Hint = "missing-key", hint
		faults = append(faults, d)
	}
	if !e.Has("film") && !e.Has("emissivity") && !e.Has("absorbs") {
		fault("node", "a surface without film, emissivity and absorbs does nothing", `add film = "8 W/(m²·K)" and air, or emissivity = 0.9 and sky`)
	}
	if e.Has("emissivity") && !e.Has("sky") && !e.Has("air") {
		fault("emissivity", "emissivity without a node to radiate to", `add sky = "the name of a node"`)
	}
	for _, key := range []string{"air", "sky"} {
		if e.Has(key) && e.NameOf(key) == e.NameOf("node") {
			faults = append(faults, e.Fault(key, fmt.Sprintf("%q is the node of the surface itself", e.NameOf(key)), "another node", ""))
		}
	}
	if e.Has("sky") && !e.Has("emissivity") {
		fault("sky", "sky without emissivity", "add emissivity = 0.9")
	}
	return faults
}

func deriveSurface(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	plan, faults := planFace(e, c)
	if faults != nil {
		return nil
	}
	var list []casefile.Derivation
	if plan != nil {
		a, b := filmLevels(c, v, e.NameOf("node"), e.NameOf("air"))
		list = plan.derive(e, v, e.NameOf("node"), a, b)
	}
	if e.Has("emissivity") {
		sky := e.NameOf("sky")
		if sky == "" {
			sky = e.NameOf("air")
		}
		a, b := filmLevels(c, v, e.NameOf("node"), sky)
		eps := typed(e, "emissivity")
		r := radiant{k: stefanBoltzmann * eps.at(v), area: 1}
		h, _, _ := r.Coefficient(a, b)
		list = append(list, casefile.Derivation{Quantity: fmt.Sprintf("radiation of %s at %s against %s, as a coefficient", e.Name, celsius(a), celsius(b)),
			Formula: "ε·σ·(T₁² + T₂²)·(T₁ + T₂)", Numbers: fmt.Sprintf("%s · σ · ((%.4g K)² + (%.4g K)²) · (%.4[2]g K + %.4[3]g K)", eps.text, a, b), Source: eps.source, SI: h, Dim: coefficient})
	}
	if e.Has("absorbs") {
		alpha, a := typed(e, "absorptance"), typed(e, "area")
		list = append(list, casefile.Derivation{Quantity: "sun absorbed by " + e.Name + ", for each W/m²", Formula: "α·A", Numbers: alpha.text + " · " + a.text,
			Source: sources(alpha, a), SI: alpha.at(v) * a.at(v), Dim: area})
	}
	return list
}
