package hydraulic

import (
	"fmt"
	"math"
	"slices"

	"lagbook/network"
	"lagbook/network/casefile"
)

// A headCurve holds the inputs of a head curve.
type headCurve struct {
	flow, head, efficiency []casefile.Slot
	asPressure             bool
}

// curve reads the key head.
func (p *pump) curve() (h headCurve, faults []casefile.Diagnostic) {
	e := p.e
	list := func(path string) []casefile.Slot {
		var slots []casefile.Slot
		for i := range e.Len(path) {
			slots = append(slots, e.Num(fmt.Sprintf("%s[%d]", path, i)))
		}
		return slots
	}
	h = headCurve{flow: list("head.flow"), head: list("head.head"), efficiency: list("head.efficiency")}
	if len(h.head) > 0 {
		h.asPressure = e.DimOf("head.head[0]") == pressure
	}
	for i := range h.head {
		if (e.DimOf(fmt.Sprintf("head.head[%d]", i)) == pressure) != h.asPressure {
			faults = append(faults, e.Fault("head.head", "heads and pressures in one list", "one of the two", ""))
			break
		}
	}
	if len(h.flow) < 2 {
		faults = append(faults, e.Fault("head.flow", "one point of a head curve", "two or more", ""))
	}
	if len(h.head) != len(h.flow) {
		faults = append(faults, e.Fault("head.head", fmt.Sprintf("%d heads for %d flows", len(h.head), len(h.flow)), "one for each flow", ""))
	}
	if n := len(h.efficiency); n > 1 && n != len(h.flow) {
		faults = append(faults, e.Fault("head.efficiency", fmt.Sprintf("%d efficiencies for %d flows", n, len(h.flow)), "one for each flow, or one for all", ""))
	}
	if e.Has("trip") && h.efficiency == nil {
		d := e.Fault("trip", "a trip without an efficiency, by which the pump takes its power", "efficiency in head", "")
		d.Code = "missing-key"
		faults = append(faults, d)
	}
	if p.driven && !p.rated.has {
		d := e.Fault("speed", "speed needs rated_speed beside it: that of the head curve", "", "")
		d.Code, d.Hint = "missing-key", `add rated_speed = "1450 rpm"`
		faults = append(faults, d)
	}
	return h, faults
}

// set writes the curve.
func (h *headCurve) set(e *casefile.Element, v casefile.Values, weight float64, c *pumpCurve) error {
	scale := 1.0
	if h.asPressure {
		scale = 1 / weight
	}
	for k := range h.flow {
		c.set(k, v.Num[h.flow[k]], v.Num[h.head[k]]*scale)
		if k > 0 && !(c.slope[k-1] < 0) {
			return e.Fault("head.head", "a head that does not fall from point to point", "heads that fall as the flow grows: else one head has two flows", "")
		}
	}
	for k := range h.efficiency {
		c.efficiency[k] = v.Num[h.efficiency[k]]
		if c.efficiency[k] == 0 && (k > 0 || c.flow[0] != 0 || len(h.efficiency) == 1) {
			return e.Fault("head.efficiency", "an efficiency of 0", "more than 0, but for the point without flow", "")
		}
	}
	return nil
}

// buildHead adds a centrifugal pump.
func (p *pump) buildHead(c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	curve, faults := p.curve()
	if faults != nil {
		return nil, faults
	}
	written := asWritten(c)
	last := written.Num[curve.flow[len(curve.flow)-1]]
	unknowns := []network.Unknown{{Name: "flow", Algebraic: true, Scale: last, Start: last / 2}}
	if p.trip.has {
		unknowns = append(unknowns, network.Unknown{Name: "speed", Algebraic: true, Scale: 1, Start: 1})
	}
	p.add(b, true, unknowns...)
	inertia := optional(p.e, "trip.inertia")
	n, carried := len(curve.flow), p.carried(c)
	return func(v casefile.Values, to *network.Params) error {
		l, err := p.liquid.liquid(v)
		if err != nil {
			return err
		}
		law, ok := to.Law[p.id].(*headPump)
		if !ok {
			law = &headPump{ports: len(p.ports), curve: pumpCurve{flow: make([]float64, n), head: make([]float64, n), slope: make([]float64, n-1),
				efficiency: make([]float64, len(curve.efficiency))}, carried: carried}
			to.Law[p.id] = law
		}
		if law.pumpModes, err = p.levels(&l, v, to); err != nil {
			return err
		}
		law.weight, law.vapour, law.inlet = l.weight(), p.vapourOf(&l), l.offset-to.Datum[p.from]
		law.rated = 1
		if p.rated.has {
			law.rated = p.rated.of(v)
		}
		if inertia.has {
			omega := 2 * math.Pi * law.rated
			law.inertia = inertia.of(v) * omega * omega
		}
		p.drive(v, to, law.rated)
		return curve.set(p.e, v, law.weight, &law.curve)
	}, nil
}

// carried reports whether a column of liquid begins at an end of the pump that takes up
// nothing.
func (p *pump) carried(c *casefile.Case) bool {
	for _, end := range endsOf(p.e) {
		if node, ok := c.Element("hydraulic.node", end); !ok || gives(node) {
			continue
		}
		for _, e := range c.Elements {
			if e.Domain() == p.e.Domain() && (e.Has("pipe") || e.Has("inertance")) && slices.Contains(endsOf(e), end) {
				return true
			}
		}
	}
	return false
}

// vapourOf is the vapour pressure, 0 where it is not known.
func (p *pump) vapourOf(l *liquid) float64 {
	if !p.vapour {
		return 0
	}
	return l.vapour
}

// buildDisplacement adds a pump of a displacement.
func (p *pump) buildDisplacement(b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	e := p.e
	if !p.driven && !p.rated.has {
		d := e.Fault("displacement", "a displacement without a speed", "speed or rated_speed beside it", "")
		d.Code, d.Hint = "missing-key", `add speed = "1450 rpm"`
		return nil, []casefile.Diagnostic{d}
	}
	displaced, slip := e.Num("displacement"), number{}
	if e.Plain("slip") {
		slip = optional(e, "slip")
	}
	leak, over := optional(e, "slip.flow"), optional(e, "slip.at")
	p.add(b, leak.has)
	return func(v casefile.Values, to *network.Params) error {
		l, err := p.liquid.liquid(v)
		if err != nil {
			return err
		}
		law, ok := to.Law[p.id].(*displacementPump)
		if !ok {
			law = &displacementPump{ports: len(p.ports)}
			to.Law[p.id] = law
		}
		if law.pumpModes, err = p.levels(&l, v, to); err != nil {
			return err
		}
		law.volume, law.leak = v.Num[displaced], 0
		if slip.has {
			law.volume *= 1 - slip.of(v)
		}
		if leak.has {
			law.leak = leak.of(v) / over.of(v)
		}
		law.weight, law.vapour, law.inlet = l.weight(), p.vapourOf(&l), l.offset-to.Datum[p.from]
		law.rise = to.Datum[p.from] - to.Datum[p.to]
		rated := 0.0
		if p.rated.has {
			rated = p.rated.of(v)
		}
		p.drive(v, to, rated)
		return nil
	}, nil
}

// derivePump shows what a pump of a displacement delivers.
func derivePump(e *casefile.Element, _ *casefile.Case, v casefile.Values) []casefile.Derivation {
	if !e.Has("displacement") || !e.Has("rated_speed") {
		return nil
	}
	return []casefile.Derivation{{Quantity: "flow of " + e.Name + " without slip", Formula: "V·n", Numbers: e.Text("displacement") + " · " + e.Text("rated_speed"),
		Source: e.SourceOf("displacement"), SI: v.Num[e.Num("displacement")] * v.Num[e.Num("rated_speed")], Dim: flow}}
}
