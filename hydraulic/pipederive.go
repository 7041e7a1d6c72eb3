package hydraulic

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// derivePipe shows what a pipe comes to as a whole.
func derivePipe(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	p := pipeOf(e, c)
	s, err := p.at(e, v)
	if err != nil {
		return nil
	}
	show := func(si float64, dim quantity.Dim) string { return quantity.Print{}.Format(si, dim, quantity.Plain) }
	bore, from := strings.TrimSpace(e.Text("pipe.bore")), e.SourceOf("pipe")
	if p.size != nil {
		bore, from = show(s.bore, length), p.size.source()
	}
	column := e.Text("pipe.length")
	list := []casefile.Derivation{
		{Quantity: "inertance of " + e.Name, Formula: "ρ·l/(π/4·d²)", Numbers: fmt.Sprintf("%s · %s/(π/4 · (%s)²)", show(s.density, density), column, bore),
			Source: from, SI: s.inertance(), Dim: inertance},
		{Quantity: "laminar resistance of " + e.Name, Formula: "128·µ·l/(π·d⁴)", Numbers: fmt.Sprintf("128 · %s · %s/(π · (%s)⁴)", show(s.viscosity, viscosity), column, bore),
			Source: joined(p.liquid.source(ofViscosity), "turbulent by Churchill's equation, Chem. Eng. 84 (1977) no. 24, p. 91, with f of Colebrook and White"),
			SI:     128 * s.viscosity * s.length / (math.Pi * math.Pow(s.bore, 4)), Dim: resistance},
	}
	if s.speed > 0 && !p.rigid {
		list = append(list, p.deriveSpeed(e, &s), casefile.Derivation{Quantity: "compliance of " + e.Name, Formula: "A·l/(ρ·a²)",
			Numbers: fmt.Sprintf("%s · %s/(%s · (%s)²)", show(s.area, area), column, show(s.density, density), show(s.speed, velocity)),
			SI:      s.area * s.length / (s.density * s.speed * s.speed), Dim: compliance})
	}
	return list
}

// deriveSpeed shows the speed of waves, of a liquid with free gas that at the atmosphere.
func (p *pipe) deriveSpeed(e *casefile.Element, s *pipeState) casefile.Derivation {
	d := casefile.Derivation{Quantity: "wave speed of " + e.Name, SI: s.speed, Dim: velocity}
	show := quantity.Print{}
	if p.speed.has {
		d.Formula, d.Numbers, d.Source = "a", e.Text("pipe.wave_speed"), e.SourceOf("pipe.wave_speed")
		return d
	}
	d.Formula, d.Source = "√((K/ρ)/(1 + c₁·K·d/(E·e)))", joined(p.liquid.source(ofBulk), "Wylie and Streeter, Fluid Transients in Systems, 1993, section 1-4")
	d.Numbers = fmt.Sprintf("√((%s/%s)/(1 + %.4g · %.4g))", show.Format(1/s.compress, pressure, quantity.Plain), show.Format(s.density, density, quantity.Plain),
		s.giving, ratioOf(s.stretch, s.giving*s.compress))
	if s.wall == 0 {
		d.Formula, d.Numbers = "√(K/ρ), the wall taken as rigid", fmt.Sprintf("√(%s/%s)", show.Format(1/s.compress, pressure, quantity.Plain), show.Format(s.density, density, quantity.Plain))
	}
	if p.bubbles() {
		d.Formula += ", at the pressure of the atmosphere"
	}
	return d
}

// ratioOf is a/b, 0 where b is.
func ratioOf(a, b float64) float64 {
	if b == 0 {
		return 0
	}
	return a / b
}

// joined puts two sources one after the other.
func joined(a, b string) string {
	if a == "" {
		return b
	}
	return a + "; " + b
}
