package thermal

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// lossOf adds the element of a source whose heat depends on a temperature: per_kelvin of a drive
// that changes otherwise than in steps, doubles_every, or points.
func lossOf(e *casefile.Element, b *network.Builder, node, on network.NodeID, sign float64) casefile.Setter {
	carries := "drive"
	if !e.Has("drive") {
		carries = "scale"
	}
	shape := network.Shape{Name: e.FullName(), Ports: []network.NodeID{node}, Drives: []string{carries + " of " + e.FullName()}, Readings: []string{"flow"}}
	if on != node {
		shape.Ports = append(shape.Ports, on)
	}
	id := b.Element(shape, e.Ref)
	e.Shows("flow", network.Output{Reading: &network.ReadingTerm{Element: id, Sign: 1}})
	fresh, set := factorOf(e)
	always := laplace.Constant(1)
	wave := func(casefile.Values) laplace.Waveform { return always }
	for _, key := range []string{"drive", "scale"} {
		if e.Has(key) {
			slot := e.Wave(key)
			wave = func(v casefile.Values) laplace.Waveform { return v.Wave[slot] }
		}
	}
	beside := 0.0
	if e.Has("drive") {
		beside = 1
	}
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[id] == nil {
			p.Law[id] = lawOf(losing{sign, beside, fresh()})
		}
		switch l := p.Law[id].(type) {
		case *losing:
			set(l.of, v)
		case *leaking:
			set(l.of, v)
		}
		p.Drive[id][0] = wave(v)
		return nil
	}
}

// lawOf is the law of a source with such a factor.
func lawOf(l losing) network.Law {
	if _, ok := l.of.(*doubling); ok {
		return &leaking{l}
	}
	return &l
}

// factorOf returns what makes the factor of a source, and what writes its numbers.
func factorOf(e *casefile.Element) (fresh func() factor, set func(f factor, v casefile.Values)) {
	switch {
	case e.Has("points"):
		points := pointsAt(e, "points")
		return func() factor { return &tabled{name: e.Name} }, func(f factor, v casefile.Values) { onto(&f.(*tabled).loss, points, v) }
	case e.Has("doubles_every"):
		every, at := e.Num("doubles_every"), e.Num("at")
		return func() factor { return &doubling{name: e.Name} }, func(f factor, v casefile.Values) {
			d := f.(*doubling)
			d.every, d.at = v.Num[every], v.Num[at]
		}
	}
	alpha, at := e.Num("per_kelvin"), e.Num("at")
	return func() factor { return &proportional{} }, func(f factor, v casefile.Values) {
		p := f.(*proportional)
		p.alpha, p.at = v.Num[alpha], v.Num[at]
	}
}

// deriveLoss shows a drive that doubles, or points; on is the node they go by.
func deriveLoss(e *casefile.Element, on string, v casefile.Values) []casefile.Derivation {
	switch {
	case e.Has("doubles_every"):
		every, at := typed(e, "doubles_every"), typed(e, "at")
		return []casefile.Derivation{{
			Quantity: "doubling of " + e.Name, Formula: "drive·2^((" + on + " − at)/doubles_every)", Numbers: "doubles every " + every.text + " from " + at.text + " on",
			Source: sources(every, at), SI: every.at(v), Dim: temperature, Kind: quantity.Difference,
		}}
	case e.Has("points"):
		n := e.Len("points")
		return []casefile.Derivation{{
			Quantity: "heat of " + e.Name + " at the last of its points", Formula: "heat(" + on + "), straight between points",
			Numbers: fmt.Sprintf("%d points, from %s to %s", n, e.Text("points[0].first"), e.Text(fmt.Sprintf("points[%d].first", n-1))),
			Source:  e.SourceOf("points"), SI: v.Num[e.Num(fmt.Sprintf("points[%d].second", n-1))], Dim: power,
		}}
	}
	return nil
}
