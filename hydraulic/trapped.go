package hydraulic

import (
	"fmt"

	"lagbook/hydraulic/fluid"
	"lagbook/network"
	"lagbook/network/casefile"
)

// trappedField is the key trapped of a node: liquid shut in by walls.
func trappedField() casefile.Field {
	wall := casefile.Positive("wall", compliance, "volume that its walls give for each pascal; or the tube that they are, { bore, thickness, modulus }")
	wall.Or = []casefile.Field{
		casefile.Positive("bore", length, "of a tube"),
		casefile.Positive("thickness", length, "of its wall"),
		casefile.Positive("modulus", pressure, "of elasticity of its wall"),
	}
	for i := range wall.Or {
		wall.Or[i].Required = true
	}
	of := casefile.Positive("volume", volume, "of the liquid")
	of.Required = true
	return casefile.Field{Name: "trapped", Type: casefile.Group, Fields: []casefile.Field{of, wall}, Help: "liquid shut in, which its bulk modulus makes springy: V/K"}
}

// buildTrapped adds the trapped liquid of a node: a capacity, or an element where free
// gas makes its bulk modulus go by the pressure.
func (n *place) buildTrapped() {
	e := n.e
	if !e.Has("trapped") {
		return
	}
	if faults := n.liquid.needs(e, "trapped", ofBulk); faults != nil {
		n.faults = append(n.faults, faults...)
		return
	}
	at := n.capacity()
	if !n.liquid.gas.has {
		n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
			p.C[at] = v.Num[e.Num("trapped.volume")]/l.bulk + wallOf(e, v)
			return nil
		})
		return
	}
	id := n.b.Element(network.Shape{Name: "liquid trapped at " + e.FullName(), Ports: []network.NodeID{n.id}, Stores: true}, e.Ref)
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		law, ok := p.Law[id].(*trappedLaw)
		if !ok {
			law = &trappedLaw{}
			p.Law[id] = law
		}
		// The capacity takes the liquid and the walls, the law what the bubbles add.
		law.volume, law.absolute, law.mixture = v.Num[e.Num("trapped.volume")], l.offset-n.rise(v, l), l.mixture()
		p.C[at] = law.volume/l.bulk + wallOf(e, v)
		return nil
	})
}

// wallOf is the compliance of the walls: of a tube V·D/(E·e), a thin one free to stretch
// round its bore (Wylie and Streeter, Fluid Transients in Systems, 1993, section 1-4).
func wallOf(e *casefile.Element, v casefile.Values) float64 {
	switch {
	case e.Has("trapped.wall.bore"):
		return v.Num[e.Num("trapped.volume")] * v.Num[e.Num("trapped.wall.bore")] / (v.Num[e.Num("trapped.wall.modulus")] * v.Num[e.Num("trapped.wall.thickness")])
	case e.Has("trapped.wall"):
		return v.Num[e.Num("trapped.wall")]
	}
	return 0
}

// A trappedLaw is what free bubbles in trapped liquid take up.
type trappedLaw struct {
	volume   float64 // of the liquid, m³
	absolute float64 // the network's level and this is the absolute pressure
	mixture  fluid.Mixture
}

// Eval implements network.Law.
func (l *trappedLaw) Eval(s *network.Stamp) {
	p := s.X[0] + l.absolute
	v, dv := l.mixture.Taken(p)
	v, dv = v-(p-l.mixture.Atmosphere)/l.mixture.Bulk, dv-1/l.mixture.Bulk
	s.Stored, s.DStored = l.volume*v, l.volume*dv
}

func deriveTrapped(e *casefile.Element, s *liquidSlots, l *liquid, v casefile.Values) []casefile.Derivation {
	if !e.Has("trapped") || l.bulk == 0 {
		return nil
	}
	d := casefile.Derivation{Quantity: "compliance of the liquid trapped at " + e.Name, Formula: "V/K", Source: s.source(ofBulk), Dim: compliance,
		Numbers: e.Text("trapped.volume") + fmt.Sprintf("/(%.6g GPa)", l.bulk/1e9), SI: v.Num[e.Num("trapped.volume")]/l.bulk + wallOf(e, v)}
	switch {
	case e.Has("trapped.wall.bore"):
		d.Formula, d.Numbers = "V·(1/K + D/(E·e))", fmt.Sprintf("%s·(1/(%.6g GPa) + %s/(%s · %s))", e.Text("trapped.volume"), l.bulk/1e9, e.Text("trapped.wall.bore"), e.Text("trapped.wall.modulus"), e.Text("trapped.wall.thickness"))
	case e.Has("trapped.wall"):
		d.Formula, d.Numbers = "V/K + wall", d.Numbers+" + "+e.Text("trapped.wall")
	}
	return []casefile.Derivation{d}
}
