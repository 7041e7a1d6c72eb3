package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// reliefTable is [hydraulic.relief.NAME]: a relief valve, by the pressures before it at
// which it begins to open and is fully open. Both are meant with the pressure of the air
// behind it: what stands behind it adds to both, as in a valve whose spring lies on that
// side.
func reliefTable() casefile.Table {
	kv, cv := kvFields()
	level := func(name, help string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: pressure, Kind: quantity.Level, Required: true, Help: help}
	}
	return casefile.Table{
		Name:  "relief",
		Stage: 1,
		Help:  "a relief valve: shut up to set, straight from there to fully open, an orifice above",
		OneOf: [][]string{{"flow", "kv", "cv"}},
		Fields: []casefile.Field{
			casefile.From(), casefile.To(),
			level("set", "pressure at which it begins to open, with the air behind it"),
			level("full_open", "pressure at which it is fully open, with the air behind it"),
			kv, cv,
			casefile.Positive("flow", flow, "what it passes at full_open"),
		},
		Build: buildRelief,
	}
}

func buildRelief(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.FromTo()
	if faults != nil {
		return nil, faults
	}
	s := liquidOf(c)
	pass, faults := reliefPass(e, &s)
	if faults != nil {
		return nil, faults
	}
	id := b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{from, to}, Joins: true}, e.Ref)
	set, full := e.Num("set"), e.Num("full_open")
	return func(v casefile.Values, p *network.Params) error {
		l, err := s.liquid(v)
		if err != nil {
			return err
		}
		law, ok := p.Law[id].(*reliefLaw)
		if !ok {
			law = &reliefLaw{}
			p.Law[id] = law
		}
		law.set, law.full = v.Num[set]-air(&l), v.Num[full]-air(&l)
		shown := func(d float64) string {
			return quantity.Print{}.Format(d+air(&l), pressure, c.Pressures.Kind())
		}
		switch {
		case law.set < 0:
			return e.Fault("set", fmt.Sprintf("it opens at %s, below the pressure of the air", shown(law.set)), "a pressure above it", "")
		case law.full <= law.set:
			return e.Fault("full_open", fmt.Sprintf("it is fully open at %s and begins to open at %s", shown(law.full), shown(law.set)), "full_open above set", "")
		}
		law.orifice = pass(v, &l, law.full)
		return nil
	}, nil
}

// reliefPass is what a relief valve passes fully open, where its drop there is full.
func reliefPass(e *casefile.Element, s *liquidSlots) (func(v casefile.Values, l *liquid, full float64) powerFlow, []casefile.Diagnostic) {
	if e.Has("flow") {
		slot := e.Num("flow")
		return func(v casefile.Values, _ *liquid, full float64) powerFlow {
			return powerFlow{v.Num[slot] / math.Sqrt(full), leastCore, 2}
		}, nil
	}
	pass, faults := openPass(e, s)
	return func(v casefile.Values, l *liquid, _ float64) powerFlow { return pass(v, l) }, faults
}
