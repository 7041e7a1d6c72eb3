package hydraulic

import (
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// checkTable is [hydraulic.check.NAME]: a check valve.
func checkTable() casefile.Table {
	kv, cv := kvFields()
	fitting := casefile.Field{Name: "fitting", Type: casefile.Group, Help: "a loss on the velocity in a bore while it is open", Fields: []casefile.Field{
		needed(casefile.Positive("bore", length, "in which the velocity is meant")), needed(casefile.Positive("loss", dimensionless, "of the open valve"))}}
	return casefile.Table{
		Name:  "check",
		Stage: 1,
		Help:  "a check valve: it lets through from its first node to its second, and shuts against the other way",
		OneOf: [][]string{{"kv", "cv", "fitting", "resistance"}},
		Fields: []casefile.Field{
			casefile.From(), casefile.To(), kv, cv, fitting,
			casefile.Positive("resistance", resistance, "R of the open valve, pressure lost for each m³/s"),
			{Name: "cracking", Type: casefile.Number, Dim: pressure, Kind: quantity.Difference, HasMin: true, Help: "drop at which it opens; 0 unless stated"},
		},
		Build: buildCheck,
	}
}

func buildCheck(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.FromTo()
	if faults != nil {
		return nil, faults
	}
	s := liquidOf(c)
	pass, faults := openPass(e, &s)
	if faults != nil {
		return nil, faults
	}
	id, cracking := b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{from, to}, Joins: true}, e.Ref), optional(e, "cracking")
	return func(v casefile.Values, p *network.Params) error {
		l, err := s.liquid(v)
		if err != nil {
			return err
		}
		law, ok := p.Law[id].(*checkLaw)
		if !ok {
			law = &checkLaw{}
			p.Law[id] = law
		}
		if law.pass = pass(v, &l); cracking.has {
			law.cracking = cracking.of(v)
		}
		return nil
	}, nil
}

// openPass is what a check valve or a relief valve passes while it is open.
func openPass(e *casefile.Element, s *liquidSlots) (func(v casefile.Values, l *liquid) powerFlow, []casefile.Diagnostic) {
	switch {
	case e.Has("resistance"):
		slot := e.Num("resistance")
		return func(v casefile.Values, _ *liquid) powerFlow { return straight(v.Num[slot]) }, nil
	case e.Has("fitting"):
		bore, loss := e.Num("fitting.bore"), e.Num("fitting.loss")
		return func(v casefile.Values, l *liquid) powerFlow {
			return rooted(lossGain(v.Num[bore], v.Num[loss], l.density), circle(v.Num[bore]), l.viscosity)
		}, s.needs(e, "fitting", ofDensity)
	}
	key := "kv"
	if !e.Has(key) {
		key = "cv"
	}
	gain := valveGain(e, "")
	return func(v casefile.Values, l *liquid) powerFlow {
		a := gain(v)
		return rooted(a/math.Sqrt(l.density), a, l.viscosity)
	}, s.needs(e, key, ofDensity)
}
