package thermal

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// Words of arrangement.
const (
	countercurrent = "counterflow"
	cocurrent      = "parallel flow"
	across         = "crossflow"
	firstMixed     = "crossflow, first mixed"
	secondMixed    = "crossflow, second mixed"
	shells         = "shell and tube"
)

// exchangerKeys name the stretch of each of the two streams.
var exchangerKeys = [2]string{"first_between", "second_between"}

// exchangerTable is [thermal.exchanger.NAME]: two streams that pass each other. What leaves each
// is its entry, less its share of what is exchanged, ε·C_min·(T_in − T_in) of the two entries: exact
// in steady flow, and linear. Heat stored in it is left out.
func exchangerTable() casefile.Table {
	neighbours := func(name, of string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Names, Refers: "node", Structural: true, HasMin: true, Min: 2, HasMax: true, Max: 2,
			Help: "the two neighbouring nodes of the " + of + " stream's path between which it lies, where that path has more than two"}
	}
	return casefile.Table{
		Name:  "exchanger",
		Stage: 2,
		Help:  "a heat exchanger between two streams, by effectiveness and number of transfer units",
		Fields: []casefile.Field{
			{Name: "streams", Type: casefile.Names, Refers: "stream", Structural: true, Required: true, HasMin: true, Min: 2, HasMax: true, Max: 2,
				Help: "the two streams"},
			neighbours(exchangerKeys[0], "first"), neighbours(exchangerKeys[1], "second"),
			required(casefile.Positive("conductance", conductance, "UA between the two streams")),
			{Name: "arrangement", Type: casefile.Word, Required: true, Structural: true,
				Words: []string{countercurrent, cocurrent, across, firstMixed, secondMixed, shells}, Help: "how the streams run; crossflow alone has both unmixed"},
			{Name: "shell_passes", Type: casefile.Count, Structural: true, HasMin: true, Min: 1, HasMax: true, Max: 20,
				Help: "shells in series, each with two, four, … passes of tubes; 1 unless stated"},
		},
		Readings: []casefile.Reading{{Word: "heat", Dim: power, Help: "heat from the first stream to the second; of streams without scale"}},
		Build:    buildExchanger,
		Derive:   deriveExchanger,
	}
}

func isExchanger(e *casefile.Element) bool {
	return e.Domain() == "thermal" && e.Table.Name == "exchanger"
}

// A side is one of the two streams at an exchanger.
type side struct {
	stream  *casefile.Element
	stretch int
	in, out network.NodeID
	rate    law
	scale   casefile.Scaling
}

func buildExchanger(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	if e.Has("shell_passes") && e.Word("arrangement") != shells {
		return nil, []casefile.Diagnostic{e.Fault("shell_passes", "shell_passes of "+e.Word("arrangement"), "arrangement = \""+shells+"\" beside it", "")}
	}
	first, faults := sideOf(e, c, b, 0)
	second, more := sideOf(e, c, b, 1)
	if faults = append(faults, more...); faults != nil {
		return nil, faults
	}
	if first.in == second.in || first.out == second.out || first.in == second.out || first.out == second.in {
		return nil, []casefile.Diagnostic{e.Fault("streams", "the two streams share a node here", "an entry and an exit of its own for each", "")}
	}
	sides := [2]*side{&first, &second}
	var keeps, takes [2]network.OneWayID // from its own entry, and from that of the other
	for i, s := range sides {
		keeps[i] = b.OneWay(stretchName(s.stream, s.stretch), s.in, s.out, s.stream.Ref)
		takes[i] = b.OneWay(fmt.Sprintf("%s/%d", e.FullName(), i+1), sides[1-i].in, s.out, e.Ref)
	}
	ua := typed(e, "conductance")
	set := func(v casefile.Values, p *network.Params) float64 {
		var w [2]float64
		for i, s := range sides {
			w[i] = s.rate.value(v) * s.scale.Factor(v, p)
		}
		q := exchanged(arranged(e, w[0], w[1]), ua.at(v), w[0], w[1])
		for i := range sides {
			p.W[keeps[i]] = math.Max(w[i]-q, 0) // of a stream that takes on the other's entry, rounding
			p.W[takes[i]] = q
		}
		return q
	}
	if first.stream.Has("scale") || second.stream.Has("scale") {
		return func(v casefile.Values, p *network.Params) error {
			set(v, p)
			return nil
		}, nil
	}
	id := b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{first.in, second.in}, Readings: []string{"heat"}, Passive: true}, e.Ref)
	for _, word := range []string{"heat", "flow"} {
		e.Shows(word, network.Output{Reading: &network.ReadingTerm{Element: id, Sign: 1}})
	}
	return func(v casefile.Values, p *network.Params) error {
		l, ok := p.Law[id].(*exchange)
		if !ok {
			l = &exchange{}
			p.Law[id] = l
		}
		l.q = set(v, p)
		return nil
	}, nil
}

// An exchange reads the heat that an exchanger passes on; the flows themselves are branches.
type exchange struct{ q float64 } // W/K

// Eval implements network.Law.
func (x *exchange) Eval(*network.Stamp) {}

// Read implements network.Readable.
func (x *exchange) Read(s *network.Stamp, _ int, grad []float64) float64 {
	if grad != nil {
		grad[0] += x.q
		grad[1] -= x.q
	}
	return x.q * (s.X[0] - s.X[1])
}

// arranged is the effectiveness of an exchanger whose streams have these capacity rates.
func arranged(e *casefile.Element, first, second float64) arrangement {
	switch e.Word("arrangement") {
	case countercurrent:
		return counterflow
	case cocurrent:
		return parallelFlow
	case firstMixed:
		return crossflow(mixesFirst, first, second)
	case secondMixed:
		return crossflow(mixesSecond, first, second)
	case shells:
		n := 1
		if e.Has("shell_passes") {
			n = e.Count("shell_passes")
		}
		return shellAndTube(n)
	}
	return crossflow(mixesNone, first, second)
}

// sideOf finds one of the two streams, and its stretch.
func sideOf(e *casefile.Element, c *casefile.Case, b *network.Builder, i int) (s side, faults []casefile.Diagnostic) {
	name := e.Names("streams")[i]
	stream, ok := c.Element("thermal.stream", name)
	if !ok {
		return s, []casefile.Diagnostic{e.Fault(fmt.Sprintf("streams[%d]", i), fmt.Sprintf("%q is not a stream", name), "the names of two streams", "")}
	}
	k, faults := stretchOf(e, exchangerKeys[i], stream)
	if faults != nil {
		return s, faults
	}
	if faults = taken(e, c, stream, k); faults != nil {
		return s, faults
	}
	nodes, faults := pathNodes(stream, c)
	if faults != nil {
		return s, faults
	}
	rate, faults := rateLaw(stream, c)
	if faults != nil {
		return s, faults
	}
	scale, faults := casefile.ScalingOf(stream, c, b)
	return side{stream, k, nodes[k], nodes[k+1], rate, scale}, faults
}

func deriveExchanger(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	var w [2]float64
	var text [2]string
	for i, name := range e.Names("streams") {
		stream, ok := c.Element("thermal.stream", name)
		if !ok {
			return nil
		}
		rate, faults := rateLaw(stream, c)
		if faults != nil {
			return nil
		}
		w[i], text[i] = rate.value(v), rate.numbers
	}
	ua := typed(e, "conductance")
	least, most := math.Min(w[0], w[1]), math.Max(w[0], w[1])
	i := 0
	if w[1] < w[0] {
		i = 1
	}
	return []casefile.Derivation{
		{Quantity: "transfer units of " + e.Name, Formula: "UA/C_min", Numbers: "(" + ua.text + ")/(" + text[i] + ")", Source: ua.source, SI: ua.at(v) / least, Dim: dimless},
		{Quantity: "effectiveness of " + e.Name, Formula: "ε(UA/C_min, C_min/C_max), " + e.Word("arrangement"), Numbers: "C_min/C_max = (" + text[i] + ")/(" + text[1-i] + ")",
			Source: "effectiveness and number of transfer units: Kays and London, Compact Heat Exchangers", SI: arranged(e, w[0], w[1])(ua.at(v)/least, least/most), Dim: dimless},
	}
}
