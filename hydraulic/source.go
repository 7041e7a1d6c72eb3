package hydraulic

import (
	"lagbook/network"
	"lagbook/network/casefile"
)

// sourceTable is [hydraulic.source.NAME]: a flow put into a node or taken out of it.
func sourceTable() casefile.Table {
	return casefile.Table{
		Name:  "source",
		Stage: 1,
		Help:  "a flow into a node or out of it, whatever the pressure",
		OneOf: [][]string{{"into", "out_of"}},
		Fields: []casefile.Field{
			nodeName("into", "the node it feeds"),
			nodeName("out_of", "the node it draws from"),
			{Name: "drive", Type: casefile.Wave, Dim: flow, Required: true, Help: "the flow"},
		},
		Build: buildSource,
	}
}

func buildSource(e *casefile.Element, _ *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	end, sign := "into", 1.0
	if e.Has("out_of") {
		end, sign = "out_of", -1
	}
	node, ok := e.Node(e.NameOf(end))
	if !ok {
		return nil, []casefile.Diagnostic{e.Fault(end, "a name that is not a node", "the name of a node", "")}
	}
	in, wave := b.Source(e.FullName(), node, sign, e.Ref), e.Wave("drive")
	return func(v casefile.Values, p *network.Params) error {
		p.Wave[in] = v.Wave[wave]
		return nil
	}, nil
}
