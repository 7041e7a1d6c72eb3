package hydraulic

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// shapeWords are the shapes of a tank, with the keys that each needs beside it.
var shapeWords = []string{"vertical cylinder", "horizontal cylinder", "sphere", "cone"}

var shapeKeys = map[string][]string{
	"vertical cylinder": {"diameter"}, "horizontal cylinder": {"diameter", "length"}, "sphere": {"diameter"}, "cone": {"diameter", "height"},
}

// tankField is the key tank of a node: an open tank whose floor is the node.
func tankField() casefile.Field {
	height := func(name, help string) casefile.Field {
		return casefile.Field{Name: name, Type: casefile.Number, Dim: length, Help: help}
	}
	overflow := height("overflow", "elevation of a crest: what is above it runs off; or { crest, width } of a rectangular weir")
	overflow.Or = []casefile.Field{height("crest", "elevation of the crest"), casefile.Positive("width", length, "width of a rectangular weir")}
	overflow.Or[0].Required, overflow.Or[1].Required = true, true
	return casefile.Field{
		Name: "tank", Type: casefile.Group, Help: "an open tank, whose node lies at its floor",
		OneOf: [][]string{{"area", "shape", "points"}},
		Fields: []casefile.Field{
			casefile.Positive("area", area, "area of the surface, the same at every level"),
			{Name: "shape", Type: casefile.Word, Words: shapeWords, Structural: true, Help: "its shape, with the dimensions that belong to it"},
			casefile.Positive("diameter", length, "of a cylinder or sphere; of a cone at its top"),
			casefile.Positive("length", length, "of a horizontal cylinder"),
			casefile.Positive("height", length, "of a cone, or of an upright cylinder"),
			{Name: "bottom", Type: casefile.Number, Dim: length, HasMin: true, Help: "diameter of a cone at its bottom; 0, a tip, unless stated"},
			{Name: "points", Type: casefile.Pairs, Dim: length, HasMin: true, Ascending: true, Second: &casefile.Field{Name: "points", Dim: area, Also: []quantity.Dim{volume}, HasMin: true},
				Help: "heights above the floor, from 0 up, and the area or the volume below there; straight between"},
			height("floor", "elevation of the floor, and so of the node"),
			height("top", "elevation of the top of its walls"),
			overflow,
		},
	}
}

// tankSlots are what a tank of the case states.
type tankSlots struct {
	e       *casefile.Element
	floor   number
	top     number
	crest   number
	width   number
	own     number // the height that goes with a shape
	across  number // its diameter
	long    number
	bottom  number
	points  [][2]casefile.Slot
	plain   bool // upright walls, no edges and nothing that is not linear about it: a capacity
	volumes bool // points of volume
}

// newTankSlots finds what a tank states; floor is the elevation of its floor.
func newTankSlots(e *casefile.Element, floor number) *tankSlots {
	t := &tankSlots{e: e, floor: floor, top: optional(e, "tank.top"), crest: optional(e, "tank.overflow.crest"), width: optional(e, "tank.overflow.width"),
		own: optional(e, "tank.height"), across: optional(e, "tank.diameter"), long: optional(e, "tank.length"), bottom: optional(e, "tank.bottom"), points: pointSlots(e, "tank.points")}
	if e.Plain("tank.overflow") {
		t.crest = optional(e, "tank.overflow")
	}
	t.volumes = t.points != nil && e.DimOf("tank.points[0].second") == volume
	return t
}

// pointSlots are the slots of the points at a path.
func pointSlots(e *casefile.Element, path string) [][2]casefile.Slot {
	var list [][2]casefile.Slot
	for i := range e.Len(path) {
		at := fmt.Sprintf("%s[%d]", path, i)
		list = append(list, [2]casefile.Slot{e.Num(at + ".first"), e.Num(at + ".second")})
	}
	return list
}

// buildTank adds the tank of a node.
func (n *place) buildTank() {
	e := n.e
	if !e.Has("tank") {
		return
	}
	t := newTankSlots(e, n.height)
	n.tank = t
	if n.faults = append(n.faults, t.check()...); len(n.faults) > 0 {
		return
	}
	upright := e.Has("tank.area") || e.Word("tank.shape") == "vertical cylinder"
	t.plain = upright && !t.crest.has && !t.top.has && !t.own.has && linearCase(n.c)
	if t.plain {
		at := n.capacity()
		n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
			p.C[at] = t.area(v) / l.weight()
			return nil
		})
		return
	}
	n.tankElement(t)
}

// tankElement adds a tank that is not a capacity of the network.
func (n *place) tankElement(t *tankSlots) {
	n.stores = true
	id := n.b.Element(network.Shape{Name: "tank of " + n.e.FullName(), Ports: []network.NodeID{n.id}, Stores: true, Joins: t.edged(),
		Unknowns: []network.Unknown{{Name: "flow over the edge of " + n.e.FullName(), Algebraic: true, Scale: spillScale}},
		Readings: []string{tankStored: "stored", tankSpill: "spill"}}, n.e.Ref)
	n.shows("stored", id, tankStored)
	if t.edged() {
		n.shows("spill", id, tankSpill)
	}
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		law, ok := p.Law[id].(*tankLaw)
		if !ok {
			law = &tankLaw{vessel: t.vessel()}
			p.Law[id] = law
		}
		t.measure(law.vessel, v)
		law.zero, law.weight = n.rise(v, l)+air(l), l.weight()
		return t.edges(law, v)
	})
}

// edged reports whether the tank has something to run over.
func (t *tankSlots) edged() bool { return t.closed() || t.crest.has || t.top.has }

// closed reports whether its shape ends somewhere.
func (t *tankSlots) closed() bool {
	return t.own.has || t.points != nil || t.e.Word("tank.shape") != "" && t.e.Word("tank.shape") != "vertical cylinder"
}

// linearCase reports whether all that a case has is of linear parts, so that a plain tank
// in it can be one too.
func linearCase(c *casefile.Case) bool {
	for _, e := range c.Elements {
		if e.Domain() != "hydraulic" {
			continue
		}
		switch e.Table.Name {
		case "check", "outfall", "relief", "pump":
			return false
		case "restriction":
			if !e.Has("resistance") {
				return false
			}
		}
	}
	return true
}

// check reports what a tank lacks, or states and does not need.
func (t *tankSlots) check() (faults []casefile.Diagnostic) {
	e, shape := t.e, t.e.Word("tank.shape")
	for _, key := range shapeKeys[shape] {
		if !e.Has("tank." + key) {
			d := e.Fault("tank.shape", fmt.Sprintf("a %s without its %s", shape, key), "", "")
			d.Code, d.Hint = "missing-key", fmt.Sprintf("add %s = \"1 m\" beside it", key)
			faults = append(faults, d)
		}
	}
	for _, key := range []string{"diameter", "length", "height", "bottom"} {
		if e.Has("tank."+key) && !belongs(shape, key) {
			what := "an area or points"
			if shape != "" {
				what = "a " + shape
			}
			faults = append(faults, e.Fault("tank."+key, "a "+key+" beside "+what+", which has none", "", ""))
		}
	}
	return append(faults, t.checkPoints()...)
}

// belongs reports whether a shape has a dimension of that name.
func belongs(shape, key string) bool {
	for _, k := range shapeKeys[shape] {
		if k == key {
			return true
		}
	}
	return shape == "vertical cylinder" && key == "height" || shape == "cone" && key == "bottom"
}

func (t *tankSlots) checkPoints() []casefile.Diagnostic {
	const least = 2
	if n := len(t.points); n > 0 && n < least {
		return []casefile.Diagnostic{t.e.Fault("tank.points", "a tank by one height", "two heights or more, the first at the floor, 0 m", "")}
	}
	for i := range t.points {
		if at := fmt.Sprintf("tank.points[%d].second", i); (t.e.DimOf(at) == volume) != t.volumes {
			return []casefile.Diagnostic{t.e.Fault(at, "areas and volumes in one list", "all of one kind", "")}
		}
	}
	return nil
}

// area is the area of a tank with upright walls, m².
func (t *tankSlots) area(v casefile.Values) float64 {
	if t.e.Has("tank.area") {
		return v.Num[t.e.Num("tank.area")]
	}
	return circle(t.across.of(v))
}
