package thermal

import (
	"fmt"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/thermal/material"
)

// exampleDifference, in K, is what a surface is taken to be above the fluid where a case
// states no start by which to show the coefficient.
const exampleDifference = 25.0

// deriveConvection shows the coefficient at one pair of temperatures.
func deriveConvection(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	plan, faults := planConvection(e, c)
	if faults != nil {
		return nil
	}
	ends := e.Names("between")
	a, b := filmLevels(c, v, ends[0], ends[1])
	return plan.derive(e, v, ends[0], a, b)
}

// filmLevels are the temperatures at which two nodes start, where both are known and
// differ; else one of them stands exampleDifference from the other, or from 20 °C.
func filmLevels(c *casefile.Case, v casefile.Values, surface, fluid string) (a, b float64) {
	a, knownA := startLevel(c, v, surface)
	b, knownB := startLevel(c, v, fluid)
	switch {
	case knownA && knownB && a != b:
		return a, b
	case knownB:
		return b + exampleDifference, b
	case knownA:
		return a, a - exampleDifference
	}
	return usual + exampleDifference, usual
}

// derive shows the coefficient of a film.
func (p *filmPlan) derive(e *casefile.Element, v casefile.Values, surface string, a, b float64) []casefile.Derivation {
	f := p.fresh().(*film)
	p.set(v, f)
	if p.of == nil {
		return []casefile.Derivation{asTyped("h", p.stated).derive("coefficient of "+e.Name, coefficient, v)}
	}
	u := 0.0
	if p.blown {
		u = v.Wave[p.speed].Before
	}
	s, n, size := f.state(a, b, u)
	_, h := f.convect(a, b, u)
	text := fmt.Sprintf("%s · %s/%s; %s = %s, %s", short(h.v*size/s.k.v), si(s.k.v, conductivity), si(size, length), p.of.number, short(n.v), p.fluidAt(&s, f))
	if p.blown {
		text += ", " + si(u, speedDim)
	}
	if p.of.word == "horizontal plate" {
		way := "down"
		if p.up {
			way = "up"
		}
		text += ", the face of " + surface + " " + way
	}
	return []casefile.Derivation{{
		Quantity: fmt.Sprintf("coefficient of %s at %s against %s", e.Name, celsius(a), celsius(b)),
		Formula:  "Nu·k/" + p.of.by, Numbers: text, Source: p.source(), SI: h.v, Dim: coefficient,
	}}
}

// source is that of the correlation, and of the properties.
func (p *filmPlan) source() string {
	if p.points != nil {
		return p.of.source + "; " + p.fluid + ": " + p.points[0].Source
	}
	return p.of.source + "; air: " + material.AirSource
}

// fluidAt names the fluid at the state its properties are taken.
func (p *filmPlan) fluidAt(s *filmState, f *film) string {
	if p.points != nil {
		return p.fluid + " at " + celsius(s.T.v)
	}
	return airAt(s.T.v, f.medium.pressure)
}

func airAt(T, pressure float64) string {
	return "air at " + celsius(T) + " and " + si(pressure, pressureDim)
}

func si(v float64, dim quantity.Dim) string {
	return quantity.Print{Digits: 3}.Format(v, dim, quantity.Plain)
}
