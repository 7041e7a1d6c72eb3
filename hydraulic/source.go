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
			casefile.NodeName("into", "the node it feeds"),
			casefile.NodeName("out_of", "the node it draws from"),
			{Name: "drive", Type: casefile.Wave, Dim: flow, Required: true, Help: "the flow"},
		},
		Build: buildSource,
	}
}

func buildSource(e *casefile.Element, _ *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	end, sign := e.SourceEnd()
	node, faults := e.NodeAt(end)
	if faults != nil {
		return nil, faults
	}
	return casefile.SetWave(b.Source(e.FullName(), node, sign, e.Ref), e.Wave("drive")), nil
}
