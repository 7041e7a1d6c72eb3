package network

import "math"

// A Figure is a flow that stands in the text of a fault, as a bare number at its bytes From
// to To: the network knows no units. Who knows those of the node writes it anew, with In.
// The zero Figure is none.
type Figure struct {
	From, To int
	Flow     float64
	Ref      Ref // of the node
}

// In returns the text with the figure written in another way, the text itself where there
// is no figure.
func (f Figure) In(text, as string) string {
	if f.To <= f.From || f.To > len(text) {
		return text
	}
	return text[:f.From] + as + text[f.To:]
}

// figured writes a text about a node with a flow in it.
func (g *graph) figured(n NodeID, before string, flow float64, after string) (string, Figure) {
	said := number(flow)
	text := before + said + after
	if math.IsNaN(flow) || math.IsInf(flow, 0) {
		return text, Figure{}
	}
	return text, Figure{len(before), len(before) + len(said), flow, g.nodes[n].ref}
}
