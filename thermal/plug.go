package thermal

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// plugTable is [thermal.plug.NAME]: a stretch of a stream that holds fluid, as equal stirred
// volumes in series. What enters leaves after the travel time τ = C/w, spread as by N stirred tanks:
// with a standard deviation of τ/√N (O. Levenspiel: Chemical Reaction Engineering, 3rd ed., chapter 14).
func plugTable() casefile.Table {
	return casefile.Table{
		Name:  "plug",
		Stage: 2,
		Help:  "fluid on its way along a stretch of a stream: equal stirred volumes in series, so that what enters leaves later, and spread",
		OneOf: [][]string{{"capacitance", "volume"}},
		Fields: []casefile.Field{
			{Name: "stream", Type: casefile.Name, Refers: "stream", Structural: true, Required: true, Help: "the stream"},
			{Name: "between", Type: casefile.Names, Refers: "node", Structural: true, HasMin: true, Min: 2, HasMax: true, Max: 2,
				Help: "the two neighbouring nodes of the stream's path between which the fluid is, where the path has more than two"},
			casefile.Positive("capacitance", capacitance, "of all the fluid"),
			casefile.Positive("volume", volume, "of all the fluid, which the stream states"),
			{Name: "lumps", Type: casefile.Count, Structural: true, Required: true, HasMin: true, Min: 1, HasMax: true, Max: maxLumps,
				Help: "number of stirred volumes: a step that enters leaves spread over the travel time divided by its root"},
			level("start", "temperature of all the fluid at t = 0"),
		},
		Build:  buildPlug,
		Derive: derivePlug,
	}
}

func isPlugOf(p *casefile.Element, stream string) bool {
	return p.Domain() == "thermal" && p.Table.Name == "plug" && p.NameOf("stream") == stream
}

func buildPlug(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	stream, ok := c.Element("thermal.stream", e.NameOf("stream"))
	if !ok {
		return nil, []casefile.Diagnostic{e.Fault("stream", "a name that is not a stream", "the name of a stream", "")}
	}
	k, faults := stretchOf(e, "between", stream)
	if faults == nil {
		faults = taken(e, c, stream, k)
	}
	if faults != nil {
		return nil, faults
	}
	path, faults := pathNodes(stream, c)
	store, more := plugLaw(e, c, stream)
	rate, wrong := rateLaw(stream, c)
	scale, moves := casefile.ScalingOf(stream, c, b)
	if faults = append(append(append(faults, more...), wrong...), moves...); faults != nil {
		return nil, faults
	}
	n := e.Count("lumps")
	inner, faults := innerNodes(e, c, b, n)
	if faults != nil {
		return nil, faults
	}
	nodes := append(append([]network.NodeID{path[k]}, inner...), path[k+1])
	capacities, ways := make([]network.CapacityID, n), make([]network.OneWayID, n+1)
	for i, node := range inner {
		capacities[i] = b.Capacity(node, e.Ref)
	}
	for i := range ways {
		name := fmt.Sprintf("%s/%d", e.FullName(), i)
		if i == 0 {
			name = stretchName(stream, k)
		}
		ways[i] = b.OneWay(name, nodes[i], nodes[i+1], e.Ref)
	}
	setters := []casefile.Setter{func(v casefile.Values, p *network.Params) error {
		w := rate.value(v) * scale.Factor(v, p)
		for _, id := range ways {
			p.W[id] = w
		}
		each := store.value(v) / float64(n)
		for _, id := range capacities {
			p.C[id] = each
		}
		return nil
	}}
	if e.Has("start") {
		for _, node := range inner {
			setters = append(setters, casefile.SetStart(node, e.Num("start")))
		}
	}
	return casefile.Together(setters...), nil
}

// plugLaw is the capacitance of the fluid of a plug, stated or V·ρ·c of the stream's.
func plugLaw(e *casefile.Element, c *casefile.Case, stream *casefile.Element) (law, []casefile.Diagnostic) {
	if e.Has("capacitance") {
		return asTyped("C", typed(e, "capacitance")), nil
	}
	if !stream.Has("fluid") {
		d := e.Fault("volume", fmt.Sprintf("stream %q states a capacity rate and no fluid", stream.Name), "", "")
		d.Hint = "state the capacitance of what is in the stretch, or the fluid and its flow at the stream"
		return law{}, []casefile.Diagnostic{d}
	}
	s, faults := substanceAt(stream, c, "fluid")
	if faults != nil {
		return law{}, faults
	}
	size := typed(e, "volume")
	if s.own == nil {
		at, book := typedOr(stream, "flow_at", usual, "20 °C"), s.book
		return law{"V·ρ·c", size.text + " of " + book.Key + " at " + at.text, sources(number{source: book.Name + ": " + book.Points[0].Source}, size),
			func(v casefile.Values) float64 {
				p, _ := book.At(at.at(v))
				return size.at(v) * p.Density * p.SpecificHeat
			}}, nil
	}
	rho, faults := s.property(stream, "fluid", "density", density)
	heat, more := s.property(stream, "fluid", "specific_heat", specificHeat)
	return law{"V·ρ·c", size.text + " · " + rho.text + " · " + heat.text, sources(rho, heat, size),
		func(v casefile.Values) float64 { return size.at(v) * rho.at(v) * heat.at(v) }}, append(faults, more...)
}

func derivePlug(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	stream, ok := c.Element("thermal.stream", e.NameOf("stream"))
	if !ok {
		return nil
	}
	store, faults := plugLaw(e, c, stream)
	rate, more := rateLaw(stream, c)
	if faults != nil || more != nil {
		return nil
	}
	travel := store.value(v) / rate.value(v)
	n := e.Count("lumps")
	return []casefile.Derivation{
		store.derive("capacitance of "+e.Name, capacitance, v),
		{Quantity: "travel time of " + e.Name, Formula: "C/w", Numbers: "(" + store.numbers + ")/(" + rate.numbers + ")", Source: store.source, SI: travel, Dim: duration},
		{Quantity: "spread of a step in " + e.Name, Formula: "τ/√N", Numbers: fmt.Sprintf("C/w/√%d, a standard deviation", n), SI: travel / math.Sqrt(float64(n)), Dim: duration},
	}
}
