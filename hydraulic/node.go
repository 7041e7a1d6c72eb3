package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// nodeTable is [hydraulic.node.NAME]: a place with one pressure, the real one at its
// elevation. What it has to store in adds up; with nothing of that and not held it is a
// junction.
func nodeTable() casefile.Table {
	return casefile.Table{
		Name: "node",
		Help: "a place with one pressure: it takes up volume, or is held, or is a junction",
		Fields: []casefile.Field{
			{Name: "elevation", Type: casefile.Number, Dim: length, Help: "height above the datum of the case; a tank's node lies at its floor"},
			casefile.Positive("compliance", compliance, "C, volume taken up for each pascal: A/(ρ·g) of an open tank, V/K of liquid, V/(n·p) of gas"),
			{Name: "held", Type: casefile.Wave, Dim: pressure, Kind: quantity.Level, Help: "its pressure is given, whatever flows",
				Or: []casefile.Field{{Name: "level", Type: casefile.Wave, Dim: length, Required: true, Help: "height of an open surface above the node"}}},
			{Name: "start", Type: casefile.Number, Dim: pressure, Kind: quantity.Level, Help: "pressure at t = 0",
				Or: []casefile.Field{{Name: "level", Type: casefile.Number, Dim: length, Required: true, Help: "height of the surface above the node, of a tank above its floor, at t = 0"}}},
			tankField(), gasField(), trappedField(), pistonField(),
		},
		Readings: []casefile.Reading{
			{Word: "level", Dim: length, Help: "height of the liquid: of a tank above its floor, else of an open surface at that pressure above the node"},
			{Word: "stored", Dim: volume, Help: "volume of liquid in its tank, or beside its gas"},
			{Word: "spill", Dim: flow, Help: "what runs over the edge of its tank"},
			{Word: "gas volume", Dim: volume, Help: "volume of its gas"},
			{Word: "travel", Dim: length, Help: "how far its piston stands from where its spring is not loaded"},
		},
		Build:  buildNode,
		Derive: deriveNode,
	}
}

// A place is a node while it is built.
type place struct {
	e      *casefile.Element
	c      *casefile.Case
	b      *network.Builder
	id     network.NodeID
	liquid liquidSlots
	height number // of the node above the datum of the case
	set    []casefile.Setter
	faults []casefile.Diagnostic
	stores bool
	tank   *tankSlots
	gas    *gasSlots
}

// heightOf is where a node says how high it lies: at the floor of its tank, or at its
// elevation.
func heightOf(node *casefile.Element) number {
	if n := optional(node, "tank.floor"); n.has {
		return n
	}
	return optional(node, "elevation")
}

// elevationOf returns the elevation of the node that a part names, in m, 0 where it has
// none, for the setter of that part.
func elevationOf(c *casefile.Case, node string) func(v casefile.Values) float64 {
	e, _ := c.Element("hydraulic.node", node)
	height := heightOf(e)
	return func(v casefile.Values) float64 {
		if !height.has {
			return 0
		}
		return height.of(v)
	}
}

func buildNode(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	n := &place{e: e, c: c, b: b, id: b.Node(e.FullName(), e.Ref), liquid: liquidOf(c), height: heightOf(e)}
	c.BindNode(e.FullName(), n.id)
	n.needsWeight()
	if n.faults != nil {
		return nil, n.faults
	}
	if e.Has("compliance") {
		at, slot := n.capacity(), e.Num("compliance")
		n.then(func(v casefile.Values, p *network.Params) error {
			p.C[at] = v.Num[slot]
			return nil
		})
	}
	n.datum()
	n.buildTank()
	n.buildGas()
	n.buildTrapped()
	n.hold()
	n.start()
	n.buildPiston()
	n.watch()
	return casefile.Together(n.set...), n.faults
}

// then adds a setter.
func (n *place) then(set casefile.Setter) { n.set = append(n.set, set) }

// with adds a setter that needs the liquid.
func (n *place) with(set func(v casefile.Values, l *liquid, p *network.Params) error) {
	liquid := n.liquid
	n.then(func(v casefile.Values, p *network.Params) error {
		l, err := liquid.liquid(v)
		if err != nil {
			return err
		}
		return set(v, &l, p)
	})
}

// capacity adds one.
func (n *place) capacity() network.CapacityID {
	n.stores = true
	return n.b.Capacity(n.id, n.e.Ref)
}

// shows registers a reading of an element under a word.
func (n *place) shows(word string, id network.ElementID, index int) {
	n.e.Shows(word, network.Output{Reading: &network.ReadingTerm{Element: id, Index: index, Sign: 1}})
}

// needsWeight reports what needs the density of a liquid that the case does not state.
func (n *place) needsWeight() {
	for _, key := range []string{"elevation", "held.level", "start.level", "tank"} {
		if n.e.Has(key) {
			n.faults = n.liquid.needs(n.e, key, ofDensity)
			return
		}
	}
}

// rise is the elevation of the node as a pressure, ρ·g·z, in Pa.
func (n *place) rise(v casefile.Values, l *liquid) float64 {
	if !n.height.has {
		return 0
	}
	return l.weight() * n.height.of(v)
}

// air is the atmosphere as the case states pressures.
func air(l *liquid) float64 { return l.air - l.offset }

// datum tells the network the height of the node.
func (n *place) datum() {
	if !n.height.has {
		return
	}
	e, own, floor := n.e, optional(n.e, "elevation"), optional(n.e, "tank.floor")
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		const apart = 1e-9 // m; what expressions may round
		if own.has && floor.has && math.Abs(own.of(v)-floor.of(v)) > apart {
			return e.Fault("elevation", fmt.Sprintf("the elevation is %s and the floor of its tank %s", metres(own.of(v)), metres(floor.of(v))), "one of them, or the same height: a tank's node lies at its floor", "")
		}
		p.Datum[n.id] = n.rise(v, l)
		return nil
	})
}

// metres puts a height into words.
func metres(h float64) string {
	return quantity.Print{}.Format(h, length, quantity.Plain)
}

// pressed puts a pressure as the case states it into words.
func (n *place) pressed(p float64) string {
	return quantity.Print{}.Format(p, pressure, n.c.Pressures.Kind())
}

// hold holds the node, at the network's level: the pressure and ρ·g·z.
func (n *place) hold() {
	e := n.e
	if !e.Has("held") {
		return
	}
	for _, key := range []string{"tank", "gas"} {
		if e.Has(key) {
			n.faults = append(n.faults, e.Fault(key, "a "+key+" on a held node, whose pressure is given", "one of them: a surface that does not move is held = { level = … }", ""))
		}
	}
	in := n.b.Hold(n.id, e.Ref)
	if !e.Plain("held") {
		wave := e.Wave("held.level")
		n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
			p.Wave[in] = v.Wave[wave].Scaled(l.weight()).Plus(air(l) + n.rise(v, l))
			return nil
		})
		return
	}
	wave := e.Wave("held")
	if !n.height.has {
		n.then(casefile.SetWave(in, wave))
		return
	}
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		p.Wave[in] = v.Wave[wave].Plus(n.rise(v, l))
		return nil
	})
}

// start gives the node its level at t = 0: its own, or that of [run] where its height
// makes the network's level another.
func (n *place) start() {
	e := n.e
	switch {
	case e.Has("start") && e.Has("held"):
		n.faults = append(n.faults, e.Fault("start", "start of a held node: it starts where it is held", "", ""))
	case e.Has("start") && n.moves() && !n.stores: // its piston alone stores
	case e.Has("start"):
		n.startsItself(n.id)
	case n.stores && !e.Has("held"):
		n.startsWithAll(n.id)
	}
}

// startsItself gives a node at this height the start that is stated.
func (n *place) startsItself(id network.NodeID) {
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		at := n.startsAt(v, l)
		p.Start[id], p.HasStart[id] = at+n.rise(v, l), true
		return n.fits(at, v, l)
	})
}

// startsWithAll gives a node at this height the pressure that [run] start says: its level
// in the network is another.
func (n *place) startsWithAll(id network.NodeID) {
	if !n.height.has {
		return
	}
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		if q := &n.c.Questions; q.Start == casefile.StartLevel && q.StartDomain == n.e.Domain() {
			p.Start[id], p.HasStart[id] = v.Num[q.StartAt]+n.rise(v, l), true
		}
		return nil
	})
}

// startsAt is the pressure that the node states for t = 0.
func (n *place) startsAt(v casefile.Values, l *liquid) float64 {
	if n.e.Plain("start") {
		return v.Num[n.e.Num("start")]
	}
	return air(l) + l.weight()*v.Num[n.e.Num("start.level")]
}

// fits refuses a start that what stands at the node cannot have.
func (n *place) fits(at float64, v casefile.Values, l *liquid) error {
	if n.tank != nil {
		if err := n.tank.fits((at-air(l))/l.weight(), v); err != nil {
			return err
		}
	}
	if n.gas != nil {
		return n.gas.fits(at, v, l)
	}
	return nil
}

func deriveNode(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	var list []casefile.Derivation
	if e.Has("compliance") {
		list = append(list, stated(e, "compliance", "C", compliance, v))
	}
	s := liquidOf(c)
	l, err := s.liquid(v)
	if err != nil {
		return list
	}
	list = append(list, deriveTank(e, &s, &l, v)...)
	list = append(list, deriveGas(e, &l, v)...)
	list = append(list, deriveTrapped(e, &s, &l, v)...)
	return append(list, derivePiston(e, v)...)
}
