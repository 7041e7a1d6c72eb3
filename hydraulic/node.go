package hydraulic

import (
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// nodeTable is [hydraulic.node.NAME]: a place with one pressure. With neither
// compliance nor held it is a junction.
func nodeTable() casefile.Table {
	return casefile.Table{
		Name: "node",
		Help: "a place with one pressure: it takes up volume, or is held, or is a junction",
		Fields: []casefile.Field{
			casefile.Positive("compliance", compliance, "C, volume taken up for each pascal: A/(ρ·g) of an open tank, V/K of liquid, V/(n·p) of gas"),
			{Name: "held", Type: casefile.Wave, Dim: pressure, Kind: quantity.Level, Help: "its pressure is given, whatever flows"},
			{Name: "start", Type: casefile.Number, Dim: pressure, Kind: quantity.Level, Help: "pressure at t = 0"},
		},
		Build:  buildNode,
		Derive: deriveNode,
	}
}

func buildNode(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	id, setters, faults := e.AddNode(c, b)
	if e.Has("compliance") {
		at, slot := b.Capacity(id, e.Ref), e.Num("compliance")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.C[at] = v.Num[slot]
			return nil
		})
	}
	return casefile.Together(setters...), faults
}

func deriveNode(e *casefile.Element, _ *casefile.Case, v casefile.Values) []casefile.Derivation {
	if !e.Has("compliance") {
		return nil
	}
	return []casefile.Derivation{stated(e, "compliance", "C", compliance, v)}
}
