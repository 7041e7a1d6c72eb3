package thermal

import (
	"fmt"
	"math"

	"lagbook/network/casefile"
	"lagbook/thermal/material"
)

// maxFins bounds the count of an array.
const maxFins = 10000

// finsField is fins = {…}: an array of fins in air, base and fins in one. The
// first-named node is the base.
func finsField() casefile.Field {
	return casefile.Field{Name: "fins", Type: casefile.Group, OneOf: [][]string{{"thickness", "diameter"}, {"material", "conductivity"}},
		Help: "an array of fins in air and the base between them: upright channels of air between plates, or pins. Its radiation is a part of its own",
		Fields: []casefile.Field{
			{Name: "count", Type: casefile.Count, Structural: true, Required: true, HasMin: true, Min: 2, HasMax: true, Max: maxFins, Help: "how many plates or pins"},
			sizeField("thickness", "t of plates"),
			sizeField("diameter", "D of pins"),
			required(sizeField("height", "how far they stand off the base")),
			required(sizeField("length", "of the base along the flow of air, upright where nothing blows")),
			required(sizeField("width", "of the base across the flow, from outer side to outer side")),
			materialName("of the fins, an own material or one of the handbook"),
			casefile.Positive("conductivity", conductivity, "k of the fins, in place of material"),
			speedField("of air blown through, between the fins; without it the air rises by itself"),
		}}
}

// A finPlan is an array of fins as a case states it.
type finPlan struct {
	pins, blown                                   bool
	count                                         float64
	thickness, diameter, height, length, width, k number
	pressure                                      func(v casefile.Values) float64
	speed                                         casefile.WaveSlot
}

func planFins(e *casefile.Element, c *casefile.Case) (*finPlan, []casefile.Diagnostic) {
	p := &finPlan{pins: e.Has("fins.diameter"), blown: e.Has("fins.speed"), count: float64(e.Count("fins.count")), pressure: airPressure(c)}
	p.thickness, p.diameter = typedOr(e, "fins.thickness", 0, ""), typedOr(e, "fins.diameter", 0, "")
	p.height, p.length, p.width = typed(e, "fins.height"), typed(e, "fins.length"), typed(e, "fins.width")
	if p.blown {
		p.speed = e.Wave("fins.speed")
	}
	k, faults := steadyConductivity(e, c, "fins.")
	p.k = k
	return p, faults
}

func (p *finPlan) fresh() convection { return &finArray{pins: p.pins, blown: p.blown, count: p.count} }

func (p *finPlan) set(v casefile.Values, to convection) {
	f := to.(*finArray)
	f.medium.pressure = p.pressure(v)
	f.thickness, f.diameter, f.height = p.thickness.at(v), p.diameter.at(v), p.height.at(v)
	f.length, f.width, f.conductivity = p.length.at(v), p.width.at(v), p.k.at(v)
}

func (p *finPlan) blower() (speed casefile.WaveSlot, blown, shuts bool) {
	return p.speed, p.blown, p.blown && !p.pins
}

// source names what the array goes by.
func (p *finPlan) source() string {
	of := "Bar-Cohen and Rohsenow, J. Heat Transfer 106 (1984) 116"
	switch {
	case p.pins && p.blown:
		of = "each pin by itself, Churchill and Bernstein, J. Heat Transfer 99 (1977) 300"
	case p.pins:
		of = "each pin by itself, Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1049"
	case p.blown:
		of = "Teertstra, Yovanovich and Culham, J. Electronics Manufacturing 10 (2000) 253"
	}
	return of + "; efficiency: Incropera, table 3.5; air: " + material.AirSource
}

// derive shows coefficient, efficiency and resistance of the array.
func (p *finPlan) derive(e *casefile.Element, v casefile.Values, _ string, a, b float64) []casefile.Derivation {
	f := p.fresh().(*finArray)
	p.set(v, f)
	u := 0.0
	if p.blown {
		u = v.Wave[p.speed].Before
	}
	s := stateOf(&f.medium, a, b, u, false)
	n, name := f.number(&s)
	g, h := f.convect(a, b, u)
	formula, size := "Nu·k/s", f.spacing()
	if p.pins {
		formula, size = "Nu·k/D", f.diameter
	}
	text := fmt.Sprintf("%s · %s/%s; %s = %s, %s", short(h.v*size/s.k.v), si(s.k.v, conductivity), si(size, length), name, short(n.v), airAt(s.T.v, f.medium.pressure))
	if p.blown {
		text += ", " + si(u, speedDim)
	}
	where := fmt.Sprintf(" of %s at %s against %s", e.Name, celsius(a), celsius(b))
	list := []casefile.Derivation{{Quantity: "coefficient" + where, Formula: formula, Numbers: text, Source: p.source(), SI: h.v, Dim: coefficient}}
	if !p.pins && !p.blown {
		list = append(list, casefile.Derivation{Quantity: "spacing that carries most" + where, Formula: "2.714·L/Ra^(1/4)",
			Numbers: "2.714 · " + p.length.text + "/" + short(s.rayleigh(f.length).v) + "^(1/4)", Source: "Bar-Cohen and Rohsenow (1984)",
			SI: optimum(f.length, s.rayleigh(f.length).v), Dim: length})
	}
	thick, stand, factor := f.thickness, f.height+f.thickness/2, 2.0
	if p.pins {
		thick, stand, factor = f.diameter, f.height+f.diameter/4, 4
	}
	square := jet{v: factor * h.v / (f.conductivity * thick) * stand * stand}
	list = append(list, casefile.Derivation{Quantity: "efficiency of the fins of " + e.Name, Formula: "tanh(m·L)/(m·L)",
		Numbers: fmt.Sprintf("tanh(%[1]s)/%[1]s; k of the fins %[2]s", short(math.Sqrt(square.v)), p.k.text), Source: p.k.source, SI: finEfficiency(square).v, Dim: dimless})
	if g.v > 0 {
		list = append(list, casefile.Derivation{Quantity: "resistance" + where, Formula: "1/(h·(η·A_fins + A_base))", Numbers: "1/(" + si(g.v, conductance) + ")", SI: 1 / g.v, Dim: resistance})
	}
	return list
}

// checkConvection finds arrays whose fins leave no room for the air, and sources larger than the
// plate they spread into.
func checkConvection(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	return append(checkFins(c, v), checkSpreading(c, v)...)
}

func checkFins(c *casefile.Case, v casefile.Values) (faults []casefile.Diagnostic) {
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || !e.Has("fins") {
			continue
		}
		p, broken := planFins(e, c)
		if broken != nil {
			continue
		}
		f := p.fresh().(*finArray)
		p.set(v, f)
		switch {
		case !p.pins && !(f.spacing() > 0):
			faults = append(faults, e.Fault("fins.width", fmt.Sprintf("%d plates of %s fill a base %s wide", int(p.count), p.thickness.text, p.width.text), "room for the air between them", ""))
		case p.pins && !(f.pitch() > f.diameter):
			faults = append(faults, e.Fault("fins.count", fmt.Sprintf("%d pins of %s fill a base of %s by %s", int(p.count), p.diameter.text, p.length.text, p.width.text), "room for the air between them", ""))
		}
	}
	return faults
}
