package hydraulic

import (
	"lagbook/network"
	"lagbook/network/casefile"
)

// outfallTable is [hydraulic.outfall.NAME]: a free outlet over a lip.
func outfallTable() casefile.Table {
	return casefile.Table{
		Name:  "outfall",
		Stage: 1,
		Help:  "a free outlet: the pressure at its lip is that of the air while it runs, and nothing comes back",
		Fields: []casefile.Field{
			casefile.From(), casefile.To(),
			{Name: "elevation", Type: casefile.Number, Dim: length, Help: "of the lip; that of the node it takes from unless stated"},
		},
		Build: buildOutfall,
	}
}

func buildOutfall(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.FromTo()
	s := liquidOf(c)
	if faults = append(faults, s.needs(e, "", ofDensity)...); faults != nil {
		return nil, faults
	}
	id := b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{from, to}, Joins: true,
		Unknowns: []network.Unknown{{Name: "flow of " + e.FullName(), Algebraic: true, Scale: spillScale}}}, e.Ref)
	lip, node := optional(e, "elevation"), elevationOf(c, e.NameOf("from"))
	return func(v casefile.Values, p *network.Params) error {
		l, err := s.liquid(v)
		if err != nil {
			return err
		}
		law, ok := p.Law[id].(*outfallLaw)
		if !ok {
			law = &outfallLaw{}
			p.Law[id] = law
		}
		z := node(v)
		if lip.has {
			z = lip.of(v)
		}
		law.lip, law.weight = air(&l)+l.weight()*z, l.weight()
		return nil
	}, nil
}
