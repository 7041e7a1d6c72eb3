package hydraulic

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// lineTable is [hydraulic.line.NAME]: what liquid flows through between two nodes. It is
// stated by numbers, p_a − p_b = R·q + L·dq/dt, with R/scale in the place of R where it
// has a scale, and a scale of 0 shuts it; or as a pipe.
func lineTable() casefile.Table {
	return casefile.Table{
		Name:  "line",
		Stage: 1,
		Help:  "a line between two nodes: a resistance, a column of liquid, or both in series; or a pipe by its geometry",
		OneOf: [][]string{{"resistance", "pipe", ""}, {"inertance", "pipe", ""}, {"scale", "pipe", ""}},
		Fields: []casefile.Field{
			casefile.Between(),
			casefile.Positive("resistance", resistance, "R, pressure lost for each m³/s"),
			casefile.Positive("inertance", inertance, "L, of a column of liquid: ρ·length/area"),
			pipeField(),
			{Name: "start", Type: casefile.Number, Dim: flow, Help: "flow at t = 0, from the first-named end"},
			casefile.ScaleField("multiplies what it conducts, in steps: R becomes R/scale; 0 shuts it, a valve or a pump that trips, and stops a column at once"),
		},
		Readings: []casefile.Reading{
			{Word: "velocity", Dim: velocity, Kind: quantity.Plain, Help: "of a pipe: the mean one at its first end, of the bore that the file states"},
		},
		Build:  buildLine,
		Derive: deriveLine,
	}
}

func buildLine(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.Ends()
	if faults != nil {
		return nil, faults
	}
	if e.Has("pipe") {
		return buildPipe(e, c, b, from, to)
	}
	if e.Has("start") && !e.Has("inertance") {
		d := e.Fault("start", "start needs inertance beside it: without it the flow follows from the pressures", "", "")
		d.Code, d.Hint = "missing-key", `add inertance = "1 Pa·s²/m³", or state a pipe`
		return nil, []casefile.Diagnostic{d}
	}
	scale, faults := casefile.ScalingOf(e, c, b)
	switch {
	case faults != nil:
		return nil, faults
	case e.Has("inertance"):
		return buildColumn(e, b, scale, from, to), nil
	case !e.Has("resistance"):
		d := e.Fault("", "neither resistance, inertance nor pipe is stated", "", "")
		d.Code, d.Hint = "missing-key", `add resistance = "1 Pa·s/m³", inertance = "1 Pa·s²/m³", both, or pipe = { … }`
		return nil, []casefile.Diagnostic{d}
	}
	id, slot := b.Resistance(e.FullName(), from, to, e.Ref), e.Num("resistance")
	return func(v casefile.Values, p *network.Params) error {
		p.G[id] = scale.Factor(v, p) / v.Num[slot]
		return nil
	}, nil
}

// buildColumn builds a line with inertance, whose flow is a state of its own.
func buildColumn(e *casefile.Element, b *network.Builder, scale casefile.Scaling, from, to network.NodeID) casefile.Setter {
	id, inert := b.Inertance(e.FullName(), from, to, e.Ref), e.Num("inertance")
	setters := []casefile.Setter{func(v casefile.Values, p *network.Params) error {
		p.L[id] = v.Num[inert]
		return nil
	}, scaledColumn(e, scale, id)}
	if e.Has("start") {
		slot := e.Num("start")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.StartFlow[id], p.HasStartFlow[id] = v.Num[slot], true
			return nil
		})
	}
	return casefile.Together(setters...)
}

// scaledColumn sets the resistance of a line with inertance, and shuts it.
func scaledColumn(e *casefile.Element, scale casefile.Scaling, id network.InertanceID) casefile.Setter {
	resists := e.Has("resistance")
	var slot casefile.Slot
	if resists {
		slot = e.Num("resistance")
	}
	return func(v casefile.Values, p *network.Params) error {
		factor := scale.Factor(v, p)
		p.Shut[id] = factor == 0
		switch {
		case !resists:
			return openOrShut(e, scale.Values(v))
		case factor == 0:
			p.LR[id] = v.Num[slot]
		default:
			p.LR[id] = v.Num[slot] / factor
		}
		return nil
	}
}

// openOrShut refuses to throttle a line that has nothing to throttle with.
func openOrShut(e *casefile.Element, scales []float64) error {
	for _, s := range scales {
		if s != 0 && s != 1 {
			return e.Fault("scale", fmt.Sprintf("a scale of %g on a line with inertance and no resistance", s),
				"1 for open and 0 for shut: a scale divides the resistance, and here there is none", "")
		}
	}
	return nil
}

func deriveLine(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	if e.Has("pipe") {
		return derivePipe(e, c, v)
	}
	var list []casefile.Derivation
	if e.Has("resistance") {
		list = append(list, stated(e, "resistance", "R", resistance, v))
	}
	if e.Has("inertance") {
		list = append(list, stated(e, "inertance", "L", inertance, v))
	}
	return list
}
