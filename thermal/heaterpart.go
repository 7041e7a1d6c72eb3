package thermal

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// heaterTable is [thermal.heater.NAME]: heat into a node under control of a temperature.
func heaterTable() casefile.Table {
	return casefile.Table{
		Name:  "heater",
		Stage: 1,
		Help:  "a heater switched by a temperature, or controlled by it",
		OneOf: [][]string{{"on_off", "pi"}},
		Fields: []casefile.Field{
			required(casefile.NodeName("into", "the node it heats")),
			required(casefile.NodeName("watch", "the node whose temperature it goes by")),
			{Name: "on_off", Type: casefile.Group, Help: "a thermostat: the first output while off, the second while on",
				Fields: []casefile.Field{
					required(level("on_below", "temperature below which it goes on")),
					required(level("off_above", "temperature above which it goes off")),
					{Name: "start", Type: casefile.Word, Words: []string{"on", "off"}, Structural: true,
						Help: "how it starts between the two; on unless stated"},
				}},
			{Name: "target", Type: casefile.Wave, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true, Drives: "target",
				Help: "temperature to be reached and kept"},
			{Name: "pi", Type: casefile.Group, With: []string{"target"}, Help: "proportional and integral control: gain·(e + ∫e dt/integral_time), e = target − watched",
				Fields: []casefile.Field{
					required(casefile.Positive("gain", conductance, "heat for each kelvin that is missing")),
					required(casefile.Positive("integral_time", duration, "time in which the integral adds what the gain gives")),
				}},
			{Name: "output", Type: casefile.Numbers, Dim: power, Required: true, Items: 2, Ascending: true, Help: "least and greatest heat it gives"},
		},
		Readings: []casefile.Reading{
			{Word: "heat", Dim: power, Help: "heat it gives at the moment"},
			{Word: "energy", Dim: energy, Help: "heat it has given since t = 0"},
			{Word: "duty", Dim: dimless, Help: "output as a share of the way from the least to the greatest"},
		},
		Build:  buildHeater,
		Derive: deriveHeater,
	}
}

func buildHeater(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	into, faults := e.NodeAt("into")
	watch, more := e.NodeAt("watch")
	faults = append(faults, more...)
	if e.Has("target") && !e.Has("pi") {
		d := e.Fault("target", "target of a thermostat", "pi beside it", "")
		d.Code, d.Hint = "missing-key", "a thermostat goes by on_below and off_above"
		faults = append(faults, d)
	}
	if faults != nil {
		return nil, faults
	}
	shape := network.Shape{Name: e.FullName(), Ports: []network.NodeID{into}, Readings: []string{"heat", "energy", "duty"}}
	if watch != into {
		shape.Ports = append(shape.Ports, watch)
	}
	size := sizeOf(e)
	given := network.Unknown{Name: "energy", Scale: size * 3600}
	low, high := e.Num("output[0]"), e.Num("output[1]")
	warned := intoHeld(e, c, "into")
	if e.Has("on_off") {
		shape.Unknowns = []network.Unknown{given}
		id := addHeater(e, b, shape)
		below, above, starts := e.Num("on_off.on_below"), e.Num("on_off.off_above"), startsAs(e)
		return func(v casefile.Values, p *network.Params) error {
			h, ok := p.Law[id].(*thermostat)
			if !ok {
				h = &thermostat{}
				p.Law[id] = h
			}
			h.low, h.high = v.Num[low], v.Num[high]
			h.onBelow, h.offAbove, h.starts = v.Num[below], v.Num[above], starts
			return nil
		}, warned
	}
	shape.Unknowns = []network.Unknown{{Name: "integral", Scale: size}, given}
	shape.Drives = []string{"target of " + e.FullName()}
	id := addHeater(e, b, shape)
	e.Driven("target", id, 0)
	target, gain, time := e.Wave("target"), e.Num("pi.gain"), e.Num("pi.integral_time")
	return func(v casefile.Values, p *network.Params) error {
		h, ok := p.Law[id].(*controller)
		if !ok {
			h = &controller{}
			p.Law[id] = h
		}
		h.low, h.high = v.Num[low], v.Num[high]
		h.gain, h.integral = v.Num[gain], v.Num[time]
		p.Drive[id][0] = v.Wave[target]
		return nil
	}, warned
}

// sizeOf is of what size the output is, in W: for the judgement of errors alone.
func sizeOf(e *casefile.Element) float64 {
	size := 0.0
	for i := range 2 {
		if w, err := quantity.Parse(e.Text(fmt.Sprintf("output[%d]", i))); err == nil {
			size = max(size, math.Abs(w.SI))
		}
	}
	if size == 0 {
		return 100 // an expression: of the size of a small heater
	}
	return size
}

// addHeater adds the element and registers what can be shown of it.
func addHeater(e *casefile.Element, b *network.Builder, shape network.Shape) network.ElementID {
	id := b.Element(shape, e.Ref)
	for k, word := range shape.Readings {
		e.Shows(word, network.Output{Reading: &network.ReadingTerm{Element: id, Index: k, Sign: 1}})
	}
	e.Shows("flow", network.Output{Reading: &network.ReadingTerm{Element: id, Index: readHeat, Sign: 1}})
	return id
}

// startsAs is the mode in which a thermostat starts between its two temperatures.
func startsAs(e *casefile.Element) int {
	if e.Word("on_off.start") == "off" {
		return off
	}
	return on
}

func deriveHeater(e *casefile.Element, _ *casefile.Case, v casefile.Values) []casefile.Derivation {
	if e.Has("on_off") {
		below, above := typed(e, "on_off.on_below"), typed(e, "on_off.off_above")
		return []casefile.Derivation{{
			Quantity: "gap of " + e.Name, Formula: "off_above − on_below", Numbers: above.text + " − " + below.text,
			Source: sources(below, above), SI: above.at(v) - below.at(v), Dim: temperature, Kind: quantity.Difference,
		}}
	}
	gain, most := typed(e, "pi.gain"), typed(e, "output[1]")
	least := typed(e, "output[0]")
	return []casefile.Derivation{{
		Quantity: "proportional band of " + e.Name, Formula: "(high − low)/gain", Numbers: "(" + most.text + " − " + least.text + ")/(" + gain.text + ")",
		Source: sources(gain, most, least), SI: (most.at(v) - least.at(v)) / gain.at(v), Dim: temperature, Kind: quantity.Difference,
	}}
}

// checkHeaters finds thermostats that would go off where they go on.
func checkHeaters(c *casefile.Case, v casefile.Values) (faults []casefile.Diagnostic) {
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || e.Table.Name != "heater" || !e.Has("on_off.on_below") || !e.Has("on_off.off_above") {
			continue
		}
		if below, above := v.Num[e.Num("on_off.on_below")], v.Num[e.Num("on_off.off_above")]; !(below < above) {
			d := e.Fault("on_off.off_above", fmt.Sprintf("off_above is %s", e.Text("on_off.off_above")), "more than on_below, "+e.Text("on_off.on_below"), "")
			d.Hint = "a thermostat needs a gap between going on and going off, or it switches without end"
			faults = append(faults, d)
		}
	}
	return faults
}
