package hydraulic

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// pumpTable is [hydraulic.pump.NAME]: a centrifugal pump by its head curve, or a pump that
// moves a volume with each turn.
func pumpTable() casefile.Table {
	turns := func(name, help string) casefile.Field {
		f := casefile.Positive(name, frequency, help)
		f.Unit = "rpm"
		return f
	}
	return casefile.Table{
		Name:  "pump",
		Stage: 1,
		Help:  "a pump from one node to another: centrifugal by its head curve, or of a displacement",
		OneOf: [][]string{{"head", "displacement"}, {"trip", "on_off", ""}},
		Fields: []casefile.Field{
			casefile.From(), casefile.To(), curveField(),
			casefile.Positive("displacement", volume, "volume that one turn moves"),
			{Name: "slip", Type: casefile.Number, HasMin: true, HasMax: true, Max: 0.99, With: []string{"displacement"}, Help: "share of the displacement that slips back",
				Or: []casefile.Field{needed(casefile.Positive("flow", flow, "that slips back at the pressure difference `at`, and in proportion to it")),
					needed(casefile.Positive("at", pressure, "pressure difference at which that flow slips back"))}},
			{Name: "speed", Type: casefile.Wave, Dim: frequency, HasMin: true, Unit: "rpm", Drives: "speed", Help: "turns in a time; the rated speed unless stated"},
			turns("rated_speed", "speed of the head curve"),
			{Name: "trip", Type: casefile.Group, With: []string{"head", "rated_speed"}, Help: "its drive fails, and it runs down by its own inertia", Fields: []casefile.Field{
				{Name: "at", Type: casefile.Number, Dim: duration, Required: true, HasMin: true, Help: "when"},
				needed(casefile.Positive("inertia", turning, "J of pump, coupling and motor")),
			}},
			{Name: "non_return", Type: casefile.Flag, Structural: true, Help: "nothing flows back through it"},
			switchField(),
		},
		Readings: []casefile.Reading{
			{Word: "head", Dim: length, Help: "what it lifts: the difference of elevation + p/(ρ·g)"},
			{Word: "power", Dim: power, Help: "what the liquid gains, ρ·g·Q·H"},
			{Word: "speed", Dim: frequency, Help: "turns in a time"},
			{Word: "shaft power", Dim: power, Help: "what its shaft takes, where an efficiency is stated"},
			{Word: "npsh", Dim: length, Help: "head at its inlet above the vapour pressure, less that of the velocity"},
		},
		Build:  buildPump,
		Derive: derivePump,
	}
}

// curveField is the key head.
func curveField() casefile.Field {
	return casefile.Field{Name: "head", Type: casefile.Group, Help: "head against flow at the rated speed, straight between the points", Fields: []casefile.Field{
		{Name: "flow", Type: casefile.Numbers, Dim: flow, HasMin: true, Ascending: true, Required: true, Help: "of the points, going up"},
		{Name: "head", Type: casefile.Numbers, Dim: length, Also: []quantity.Dim{pressure}, Required: true, Help: "of the points, falling: a head, or a pressure ρ·g·H"},
		{Name: "efficiency", Type: casefile.Numbers, HasMin: true, HasMax: true, Max: 1, Help: "of the points, or one for all"},
	}}
}

// switchField is the key on_off.
func switchField() casefile.Field {
	level := func(name, help string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: pressure, Kind: quantity.Level, Also: []quantity.Dim{length}, Required: true, Help: help}
	}
	return casefile.Field{Name: "on_off", Type: casefile.Group, Help: "switched by the pressure or the level at a node", Fields: []casefile.Field{
		needed(casefile.NodeName("of", "the node watched")),
		level("on_below", "it starts below this pressure, or level above the node"),
		level("off_above", "it stops above this"),
		{Name: "start", Type: casefile.Word, Words: []string{"on", "off"}, Structural: true, Help: "at t = 0; on below off_above unless stated"},
	}}
}

// A pump is one while it is built, and what its setter needs.
type pump struct {
	e        *casefile.Element
	liquid   liquidSlots
	from, to network.NodeID
	id       network.ElementID
	ports    []network.NodeID
	rated    number
	speed    casefile.WaveSlot
	driven   bool // by a waveform
	modes    pumpModes
	watched  network.NodeID
	on, off  number
	byLevel  [2]bool // on_below, off_above: a level above the node
	trip     number
	vapour   bool
}

func buildPump(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.FromTo()
	if faults != nil {
		return nil, faults
	}
	p := &pump{e: e, liquid: liquidOf(c), from: from, to: to, ports: []network.NodeID{from, to}, rated: optional(e, "rated_speed")}
	faults = p.liquid.needs(e, "", ofDensity)
	p.vapour = p.liquid.states(ofVapour)
	if p.driven = e.Has("speed"); p.driven {
		p.speed = e.Wave("speed")
	}
	p.modes.nonReturn = e.Flag("non_return")
	if e.Has("on_off") {
		faults = append(faults, p.switches()...)
	}
	if p.trip = optional(e, "trip.at"); p.trip.has {
		p.modes.trips = true
	}
	var set casefile.Setter
	if e.Has("head") {
		head, more := p.buildHead(c, b)
		set, faults = head, append(faults, more...)
	} else {
		displaced, more := p.buildDisplacement(b)
		set, faults = displaced, append(faults, more...)
	}
	if faults != nil {
		return nil, faults
	}
	p.shows()
	return set, nil
}

// switches reads on_off. A node watched that is no end of the pump is a port of its own.
func (p *pump) switches() []casefile.Diagnostic {
	id, faults := p.e.NodeAt("on_off.of")
	if faults != nil {
		return faults
	}
	p.watched = id
	switch id {
	case p.from:
	case p.to:
		p.modes.watch = 1
	default:
		p.modes.watch = 2
		p.ports = append(p.ports, id)
	}
	p.modes.switched, p.modes.begin = true, asLevel
	switch p.e.Word("on_off.start") {
	case "on":
		p.modes.begin = 0
	case "off":
		p.modes.begin = pumpOff
	}
	p.on, p.off = optional(p.e, "on_off.on_below"), optional(p.e, "on_off.off_above")
	p.byLevel = [2]bool{p.e.DimOf("on_off.on_below") == length, p.e.DimOf("on_off.off_above") == length}
	return nil
}

// add adds the element of a pump with some unknowns.
func (p *pump) add(b *network.Builder, joins bool, unknowns ...network.Unknown) {
	name := p.e.FullName()
	s := network.Shape{Name: name, Ports: p.ports, Unknowns: unknowns, Drives: []string{"speed of " + name}, Joins: joins,
		Readings: []string{readHead: "head", readPower: "power", readSpeed: "speed", readShaft: "shaft power", readNPSH: "npsh"}}
	if p.modes.trips {
		s.Drives = append(s.Drives, "power of "+name)
	}
	p.id = b.Element(s, p.e.Ref)
	p.e.Driven("speed", p.id, 0)
}

// shows registers what can be read off a pump.
func (p *pump) shows() {
	read := func(word string, k int) {
		p.e.Shows(word, network.Output{Reading: &network.ReadingTerm{Element: p.id, Index: k, Sign: 1}})
	}
	read("head", readHead)
	read("power", readPower)
	if p.rated.has || p.driven {
		read("speed", readSpeed)
	}
	if p.e.Has("head.efficiency") {
		read("shaft power", readShaft)
	}
	if p.vapour {
		read("npsh", readNPSH)
	}
	for _, word := range []string{"flow", "flow at " + p.e.NameOf("from"), "flow at " + p.e.NameOf("to")} {
		p.e.Shows(word, network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: p.id, Sign: -1}})
	}
}

// drive hands over speed and trip; waves that stand there already take no memory anew.
func (p *pump) drive(v casefile.Values, to *network.Params, rated float64) {
	drives := to.Drive[p.id]
	switch {
	case p.driven:
		drives[0] = v.Wave[p.speed]
	case drives[0].Before != rated:
		drives[0] = laplace.Constant(rated)
	}
	if !p.trip.has {
		return
	}
	if at, w := p.trip.of(v), drives[1].Segments; len(w) == 0 || w[len(w)-1].At != at || w[len(w)-1].A != 0 || drives[1].Before != 1 {
		drives[1] = laplace.Step(1, 0, at)
	}
}

// levels sets the levels between which a pump switches, as the network has them.
func (p *pump) levels(l *liquid, v casefile.Values, to *network.Params) (pumpModes, error) {
	m := p.modes
	if !m.switched {
		return m, nil
	}
	level := func(n number, high bool) float64 {
		x := n.of(v)
		if high { // of an open surface above the node
			x = l.weight()*x + l.air - l.offset
		}
		return x + to.Datum[p.watched]
	}
	m.on, m.off = level(p.on, p.byLevel[0]), level(p.off, p.byLevel[1])
	if m.on >= m.off {
		return m, p.e.Fault("on_off", fmt.Sprintf("it starts below %s and stops above %s", p.e.Text("on_off.on_below"), p.e.Text("on_off.off_above")), "off_above the higher of the two", "")
	}
	return m, nil
}
