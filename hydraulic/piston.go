package hydraulic

import (
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// pistonField is the key piston of a node: a piston or a diaphragm against a spring, with
// the air behind it.
func pistonField() casefile.Field {
	required := func(f casefile.Field) casefile.Field { f.Required = true; return f }
	dim := func(kg, m, s int8) quantity.Dim { return quantity.Dim{kg, m, s, 0, 0} }
	return casefile.Field{
		Name: "piston", Type: casefile.Group, Help: "a piston against a spring: an inertance m/A², a resistance c/A² and a compliance A²/k",
		Fields: []casefile.Field{
			required(casefile.Positive("area", area, "A, on which the liquid presses")),
			casefile.Positive("mass", dim(1, 0, 0), "m, of what moves"),
			required(casefile.Positive("spring", dim(1, 0, -2), "k, stiffness of the spring")),
			casefile.Positive("damper", dim(1, 0, -1), "c, force for each m/s"),
			{Name: "preload", Type: casefile.Number, Dim: dim(1, 1, -2), Help: "force of the spring where the travel is 0; 0 unless stated. Stops are not modelled: below it the travel reads below 0"},
		},
	}
}

// buildPiston adds the piston of a node. Behind its mass and damper lies a node of its
// own, whose level is the pressure that the spring bears.
func (n *place) buildPiston() {
	e := n.e
	if !e.Has("piston") {
		return
	}
	spring := n.id
	if n.moves() {
		spring = n.behind()
	} else {
		n.stores = true
	}
	at := n.b.Capacity(spring, e.Ref)
	n.then(func(v casefile.Values, p *network.Params) error {
		a := v.Num[e.Num("piston.area")]
		p.C[at] = a * a / v.Num[e.Num("piston.spring")]
		return nil
	})
	id := n.b.Element(network.Shape{Name: "piston of " + e.FullName(), Ports: []network.NodeID{spring}, Readings: []string{"travel"}, Passive: true}, e.Ref)
	n.shows("travel", id, 0)
	preload := optional(e, "piston.preload")
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		law, ok := p.Law[id].(*travelLaw)
		if !ok {
			law = &travelLaw{}
			p.Law[id] = law
		}
		a, k := v.Num[e.Num("piston.area")], v.Num[e.Num("piston.spring")]
		law.slope, law.free = a/k, n.rise(v, l)+air(l)
		if preload.has {
			law.free += preload.of(v) / a
		}
		return nil
	})
}

// moves tells whether a mass or a damper lies between the node and a spring.
func (n *place) moves() bool { return n.e.Has("piston.mass") || n.e.Has("piston.damper") }

// behind adds the node behind the mass and the damper of a piston, and the branch to it.
func (n *place) behind() network.NodeID {
	e := n.e
	name := e.FullName() + ".spring"
	inner := n.b.Node(name, e.Ref)
	n.c.BindNode(name, inner)
	if n.height.has {
		n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
			p.Datum[inner] = n.rise(v, l)
			return nil
		})
	}
	if e.Has("start") {
		n.startsItself(inner)
	} else {
		n.startsWithAll(inner)
	}
	damping := func(v casefile.Values) float64 {
		if !e.Has("piston.damper") {
			return 0
		}
		a := v.Num[e.Num("piston.area")]
		return v.Num[e.Num("piston.damper")] / (a * a)
	}
	name = "piston of " + e.FullName()
	if !e.Has("piston.mass") {
		r := n.b.Resistance(name, n.id, inner, e.Ref)
		n.then(func(v casefile.Values, p *network.Params) error {
			p.G[r] = 1 / damping(v)
			return nil
		})
		return inner
	}
	m := n.b.Inertance(name, n.id, inner, e.Ref)
	n.then(func(v casefile.Values, p *network.Params) error {
		a := v.Num[e.Num("piston.area")]
		p.L[m], p.LR[m] = v.Num[e.Num("piston.mass")]/(a*a), damping(v)
		if e.Has("start") {
			p.StartFlow[m], p.HasStartFlow[m] = 0, true
		}
		return nil
	})
	return inner
}

// A travelLaw reads how far a piston stands: (A·p − preload)/k, p above the air.
type travelLaw struct {
	slope float64 // A/k, m/Pa
	free  float64 // the network's level at which the travel is 0, Pa
}

// Eval implements network.Law.
func (l *travelLaw) Eval(*network.Stamp) {}

// Read implements network.Readable.
func (l *travelLaw) Read(s *network.Stamp, _ int, grad []float64) float64 {
	if grad != nil {
		grad[0] += l.slope
	}
	return l.slope * (s.X[0] - l.free)
}

func derivePiston(e *casefile.Element, v casefile.Values) []casefile.Derivation {
	if !e.Has("piston") {
		return nil
	}
	a := v.Num[e.Num("piston.area")]
	list := []casefile.Derivation{{Quantity: "compliance of the piston of " + e.Name, Formula: "A²/k", Numbers: "(" + e.Text("piston.area") + ")²/(" + e.Text("piston.spring") + ")",
		Source: e.SourceOf("piston"), SI: a * a / v.Num[e.Num("piston.spring")], Dim: compliance}}
	for _, x := range []struct {
		key, quantity, formula string
		dim                    quantity.Dim
	}{{"mass", "inertance", "m/A²", inertance}, {"damper", "resistance", "c/A²", resistance}} {
		if path := "piston." + x.key; e.Has(path) {
			list = append(list, casefile.Derivation{Quantity: x.quantity + " of the piston of " + e.Name, Formula: x.formula, Numbers: e.Text(path) + "/(" + e.Text("piston.area") + ")²",
				Source: e.SourceOf(path), SI: v.Num[e.Num(path)] / (a * a), Dim: x.dim})
		}
	}
	return list
}
