package thermal

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// passageTable is [thermal.passage.NAME]: a stretch of a stream along a surface
// of one temperature, on which it warms. In steady flow the stream leaves at
// T_up + ε(T_plate − T_up) with ε = 1 − exp(−UA/w), exactly; so the node
// downstream receives w(1−ε)(T_up − T_down) + wε(T_plate − T_down), and the
// plate wε(T_up − T_plate). The two sums close whatever the temperatures.
// Heat stored in the fluid on its way is left out.
func passageTable() casefile.Table {
	return casefile.Table{
		Name:  "passage",
		Stage: 2,
		Help:  "where a stream passes along a surface and warms or cools: w·(1 − exp(−UA/w)) between its entry and the surface",
		OneOf: [][]string{{"conductance", "film"}},
		Fields: []casefile.Field{
			{Name: "stream", Type: casefile.Name, Refers: "stream", Structural: true, Required: true, Help: "the stream that passes"},
			required(casefile.NodeName("along", "the node of the surface")),
			{Name: "between", Type: casefile.Names, Refers: "node", Structural: true, HasMin: true, Min: 2, HasMax: true, Max: 2,
				Help: "the two neighbouring nodes of the stream's path between which it passes, where the path has more than two"},
			casefile.Positive("conductance", conductance, "UA, from the surface to the stream"),
			with(casefile.Positive("film", coefficient, "coefficient h of the film between surface and stream"), "area"),
			with(casefile.Positive("area", area, "A of the surface"), "film"),
		},
		Build:  buildPassage,
		Derive: derivePassage,
	}
}

// A passing is a passage as its stream builds it.
type passing struct {
	stretch            int // index into the stream's stretches
	toPlate, fromPlate network.OneWayID
	ua                 law
}

// passagesOf builds the passages of a stream. The stream does it, for the two
// share their parameters; buildPassage reports what is wrong with one, and such
// a passage is left out here.
func passagesOf(e *casefile.Element, c *casefile.Case, b *network.Builder, path []network.NodeID) []passing {
	var list []passing
	for _, p := range c.Elements {
		if !isPassageOf(p, e.Name) {
			continue
		}
		if !p.Has("conductance") && !(p.Has("film") && p.Has("area")) {
			continue
		}
		k, faults := stretchOf(p, "between", e)
		if faults == nil && builtElsewhere(c, e, k) {
			continue
		}
		plate, ok := p.Node(p.NameOf("along"))
		if faults != nil || !ok || plate == path[k] || plate == path[k+1] {
			continue
		}
		list = append(list, passing{
			stretch:   k,
			toPlate:   b.OneWay(p.FullName(), path[k], plate, p.Ref),
			fromPlate: b.OneWay(p.FullName()+"/2", plate, path[k+1], p.Ref),
			ua:        contactLaw(p),
		})
	}
	return list
}

// onStretch returns the passages, plugs and exchangers on a stretch of a stream, in file order.
func onStretch(c *casefile.Case, stream *casefile.Element, k int) (list []*casefile.Element) {
	for _, p := range c.Elements {
		switch {
		case isPassageOf(p, stream.Name), isPlugOf(p, stream.Name):
			if j, faults := stretchOf(p, "between", stream); faults == nil && j == k {
				list = append(list, p)
			}
		case isExchanger(p):
			for i, name := range p.Names("streams") {
				if name != stream.Name {
					continue
				}
				if j, faults := stretchOf(p, exchangerKeys[i], stream); faults == nil && j == k {
					list = append(list, p)
				}
			}
		}
	}
	return list
}

func isPassageOf(p *casefile.Element, stream string) bool {
	return p.Domain() == "thermal" && p.Table.Name == "passage" && p.NameOf("stream") == stream
}

// set shares the stream's capacity rate between what passes unchanged and what
// takes the temperature of the plate.
func (q *passing) set(v casefile.Values, p *network.Params, w float64, plain []network.OneWayID) {
	ntu := q.ua.value(v) / w // of a stream at rest infinite: it takes nothing along
	p.W[plain[q.stretch]] = w * math.Exp(-ntu)
	taken := -w * math.Expm1(-ntu)
	p.W[q.toPlate] = taken
	p.W[q.fromPlate] = taken
}

func buildPassage(e *casefile.Element, c *casefile.Case, _ *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	stream, ok := c.Element("thermal.stream", e.NameOf("stream"))
	if !ok {
		return nil, []casefile.Diagnostic{e.Fault("stream", "a name that is not a stream", "the name of a stream", "")}
	}
	k, faults := stretchOf(e, "between", stream)
	if faults != nil {
		return nil, faults
	}
	path := stream.Names("path")
	if along := e.NameOf("along"); along == path[k] || along == path[k+1] {
		return nil, []casefile.Diagnostic{e.Fault("along", fmt.Sprintf("%q is in the stream's own path", along), "the node of the surface it passes", "")}
	}
	return nil, taken(e, c, stream, k)
}

// taken reports that another part lies on a part's stretch already: the first of several is
// right, each later one is told.
func taken(e *casefile.Element, c *casefile.Case, stream *casefile.Element, k int) []casefile.Diagnostic {
	other := onStretch(c, stream, k)[0]
	if other == e {
		return nil
	}
	path := stream.Names("path")
	d := e.Fault(streamKey(e), fmt.Sprintf("%s %q lies on the same stretch of stream %q, %q to %q", other.Table.Name, other.Name, stream.Name, path[k], path[k+1]), "", "")
	d.Hint = "put a node between the two in the stream's path: a stream passes one surface after the other"
	return []casefile.Diagnostic{d}
}

// streamKey is the key by which a part names the streams it is about.
func streamKey(e *casefile.Element) string {
	if isExchanger(e) {
		return "streams"
	}
	return "stream"
}

// stretchOf finds which stretch of a stream's path a part lies on: the only one, or that between
// the two neighbours that a key of the part names.
func stretchOf(e *casefile.Element, key string, stream *casefile.Element) (int, []casefile.Diagnostic) {
	path := stream.Names("path")
	if len(path) < 2 {
		return 0, []casefile.Diagnostic{e.Fault("", "stream "+fmt.Sprintf("%q", stream.Name)+" has no path", "a stream of two nodes or more", "")}
	}
	if !e.Has(key) {
		if len(path) == 2 {
			return 0, nil
		}
		d := e.Fault("", fmt.Sprintf("stream %q passes %d nodes: %s is missing", stream.Name, len(path), key), "", "")
		d.Hint = "name the two neighbours of its path between which this " + e.Table.Name + " lies: " + key + " = [" + quotedNames(path[:2]) + "]"
		return 0, []casefile.Diagnostic{d}
	}
	want := e.Names(key)
	for _, w := range [2][2]string{{want[0], want[1]}, {want[1], want[0]}} { // in the direction of flow first
		for i := range path[1:] {
			if path[i] == w[0] && path[i+1] == w[1] {
				return i, nil
			}
		}
	}
	return 0, []casefile.Diagnostic{e.Fault(key, quotedNames(want)+" are not neighbours in the path of stream "+fmt.Sprintf("%q", stream.Name),
		"two that follow each other in "+quotedNames(path), "")}
}

// contactLaw is UA, stated or as film and area.
func contactLaw(e *casefile.Element) law {
	if e.Has("conductance") {
		return asTyped("UA", typed(e, "conductance"))
	}
	h, a := typed(e, "film"), typed(e, "area")
	return law{"h·A", h.text + " · " + a.text, sources(h, a), func(v casefile.Values) float64 { return h.at(v) * a.at(v) }}
}

func derivePassage(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	stream, ok := c.Element("thermal.stream", e.NameOf("stream"))
	if !ok {
		return nil
	}
	rate, faults := rateLaw(stream, c)
	if faults != nil {
		return nil
	}
	ua, w := contactLaw(e), rate.value(v)
	return []casefile.Derivation{
		ua.derive("conductance of "+e.Name, conductance, v),
		{Quantity: "effectiveness of " + e.Name, Formula: "1 − exp(−UA/w)",
			Numbers: "1 − exp(−(" + ua.numbers + ")/(" + rate.numbers + "))", Source: ua.source, SI: -math.Expm1(-ua.value(v) / w), Dim: dimless},
	}
}
