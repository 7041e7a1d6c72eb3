package hydraulic

import (
	"lagbook/network"
	"lagbook/network/casefile"
)

// lineTable is [hydraulic.line.NAME]: what liquid flows through between two nodes,
// p_a − p_b = R·q + L·dq/dt.
func lineTable() casefile.Table {
	start := casefile.Field{Name: "start", Type: casefile.Number, Dim: flow, With: []string{"inertance"},
		Help: "flow at t = 0, from the first-named end"}
	return casefile.Table{
		Name:  "line",
		Stage: 1,
		Help:  "a line between two nodes: a resistance, a column of liquid, or both in series",
		Fields: []casefile.Field{
			between(),
			positive("resistance", resistance, "R, pressure lost for each m³/s"),
			positive("inertance", inertance, "L, of a column of liquid: ρ·length/area"),
			start,
		},
		Build:  buildLine,
		Derive: deriveLine,
	}
}

func buildLine(e *casefile.Element, _ *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	names := e.Names("between") // two, and different: casefile sees to it
	from, okFrom := e.Node(names[0])
	to, okTo := e.Node(names[1])
	if !okFrom || !okTo {
		return nil, []casefile.Diagnostic{e.Fault("between", "a name that is not a node", "the names of two nodes", "")}
	}
	switch {
	case e.Has("inertance"):
		return buildColumn(e, b, from, to), nil
	case !e.Has("resistance"):
		d := e.Fault("", "neither resistance nor inertance is stated", "", "")
		d.Code, d.Hint = "missing-key", `add resistance = "1 Pa·s/m³", inertance = "1 Pa·s²/m³", or both`
		return nil, []casefile.Diagnostic{d}
	}
	id, slot := b.Resistance(e.FullName(), from, to, e.Ref), e.Num("resistance")
	return func(v casefile.Values, p *network.Params) error {
		p.G[id] = 1 / v.Num[slot]
		return nil
	}, nil
}

// buildColumn builds a line with inertance, whose flow is a state of its own.
func buildColumn(e *casefile.Element, b *network.Builder, from, to network.NodeID) casefile.Setter {
	id, inert := b.Inertance(e.FullName(), from, to, e.Ref), e.Num("inertance")
	setters := []casefile.Setter{func(v casefile.Values, p *network.Params) error {
		p.L[id] = v.Num[inert]
		return nil
	}}
	if e.Has("resistance") {
		slot := e.Num("resistance")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.LR[id] = v.Num[slot]
			return nil
		})
	}
	if e.Has("start") {
		slot := e.Num("start")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.StartFlow[id], p.HasStartFlow[id] = v.Num[slot], true
			return nil
		})
	}
	return together(setters)
}

func deriveLine(e *casefile.Element, _ *casefile.Case, v casefile.Values) []casefile.Derivation {
	var list []casefile.Derivation
	if e.Has("resistance") {
		list = append(list, stated(e, "resistance", "R", resistance, v))
	}
	if e.Has("inertance") {
		list = append(list, stated(e, "inertance", "L", inertance, v))
	}
	return list
}
