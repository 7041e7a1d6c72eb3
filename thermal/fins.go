package thermal

import (
	"fmt"
	"math"
)

// A finArray is an array of fins on a base: plates, with channels of air between them,
// or round pins. Its numbers are in SI.
type finArray struct {
	pins, blown         bool
	medium              medium
	count               float64
	thickness, diameter float64 // of plates, of pins
	height              float64 // how far they stand off the base
	length, width       float64 // of the base: along the flow, and across
	conductivity        float64 // of the fins
}

// spacing is what is left free between two plates.
func (f *finArray) spacing() float64 {
	return (f.width - f.count*f.thickness) / (f.count - 1)
}

// optimum is the spacing that carries most heat, 2.714·L/Ra_L^(1/4) of plates at one
// temperature: Bar-Cohen and Rohsenow, J. Heat Transfer 106 (1984) 116 (Cengel
// eq. 9-32).
func optimum(length, ra float64) float64 { return 2.714 * length / math.Pow(ra, 0.25) }

// channel is the Nusselt number, by the spacing and the difference from the inlet,
// of upright parallel plates at one temperature: (576/El² + 2.873/El^(1/2))^(−1/2),
// El = Ra_s·s/L (Bar-Cohen and Rohsenow 1984; the experiments are those of Elenbaas, Physica
// 9 (1942) 1). Written so that nothing divides by El.
func channel(el jet) jet {
	return el.times(1. / 24).mul(el.pow(1.5).times(2.873 / 576).add(1).pow(-0.5))
}

// blownChannel is the same of air blown through, by the spacing: ((Re*·Pr/2)^(−3) +
// (0.664 √Re* Pr^(1/3) √(1 + 3.65/√Re*))^(−3))^(−1/3), Re* = u·s/ν·s/L, 0.1 < Re* < 100
// (Teertstra, Yovanovich and Culham, J. Electronics Manufacturing 10 (2000) 253). It holds
// the warming of the air on its way.
func blownChannel(re, pr jet) jet {
	full := re.mul(pr).times(0.5)
	// the ratio of the two, without a division by Re*
	ratio := re.pow(0.75).over(re.pow(0.5).add(3.65).pow(0.5)).mul(pr.pow(2. / 3)).times(0.5 / 0.664)
	return full.mul(ratio.pow(3).add(1).pow(-1. / 3))
}

// finEfficiency is tanh(x)/x of the square of x = m·L_c, for a straight fin or a pin of
// constant section with an adiabatic tip at the corrected length (Incropera, table 3.5).
func finEfficiency(square jet) jet {
	y := square.v
	if y < 1e-3 { // the series, to the last digit
		return square.through(1-y/3+2*y*y/15-17*y*y*y/315+62*y*y*y*y/2835, -1./3+4*y/15-17*y*y/105+248*y*y*y/2835)
	}
	const useless = 1e12 // of a fin of next to no conductivity: it stays so
	if y > useless {
		return jet{v: 1 / math.Sqrt(useless)}
	}
	x := math.Sqrt(y)
	eta := math.Tanh(x) / x
	sech := 1 / math.Cosh(math.Min(x, 300))
	return square.through(eta, (sech*sech-eta)/(2*y))
}

// convect implements convection.
func (f *finArray) convect(a, b, u float64) (conductance, coefficient jet) {
	s := stateOf(&f.medium, a, b, u, false)
	if f.pins {
		return f.pinned(&s)
	}
	return f.plated(&s)
}

// plated is an array of plates. The sides between them and the base in the channels go by the
// channel; the two outer sides of the array by a single plate.
func (f *finArray) plated(s *filmState) (conductance, coefficient jet) {
	gap := f.spacing()
	n, _ := f.number(s)
	var inner, outer jet
	if f.blown {
		inner = blownChannel(n, s.pr).mul(s.k).times(1 / gap)
		outer = flatPlate(s.reynolds(f.length), s.pr).mul(s.k).times(1 / f.length)
	} else {
		inner = channel(n).mul(s.k).times(1 / gap)
		outer = verticalPlate(s.rayleigh(f.length), s.pr).mul(s.k).times(1 / f.length)
	}
	stand := f.height + f.thickness/2 // corrected for the heat through the tip
	eta := finEfficiency(inner.times(2 / (f.conductivity * f.thickness) * stand * stand))
	side := stand * f.length
	conductance = eta.mul(inner.times(2 * (f.count - 1) * side).plus(outer.times(2 * side)))
	return conductance.plus(inner.times((f.count - 1) * gap * f.length)), inner
}

// pinned is an array of pins, each taken as a cylinder of its own, across the flow.
func (f *finArray) pinned(s *filmState) (conductance, coefficient jet) {
	n, _ := f.number(s)
	nu := horizontalCylinder(n, s.pr)
	if f.blown {
		nu = acrossCylinder(n, s.pr)
	}
	h := nu.mul(s.k).times(1 / f.diameter)
	stand := f.height + f.diameter/4
	eta := finEfficiency(h.times(4 / (f.conductivity * f.diameter) * stand * stand))
	conductance = eta.mul(h).times(f.count * math.Pi * f.diameter * stand)
	return conductance.plus(h.times(f.bare())), h
}

// bare is the area of the base between pins.
func (f *finArray) bare() float64 {
	return f.length*f.width - f.count*math.Pi/4*f.diameter*f.diameter
}

// number is what the correlation of the array goes by, and its name.
func (f *finArray) number(s *filmState) (n jet, name string) {
	switch {
	case f.pins && f.blown:
		return s.reynolds(f.diameter), "Re"
	case f.pins:
		return s.rayleigh(f.diameter), "Ra"
	case f.blown:
		return s.reynolds(f.spacing()).times(f.spacing() / f.length), "Re*"
	}
	return s.rayleigh(f.spacing()).times(f.spacing() / f.length), "El"
}

// pitch is the distance from pin to pin on a square grid.
func (f *finArray) pitch() float64 { return math.Sqrt(f.length * f.width / f.count) }

// doubt implements convection.
func (f *finArray) doubt(a, b, u float64) (code, text string) {
	s := stateOf(&f.medium, a, b, u, false)
	if low, high := f.medium.known(); s.T.v < low || s.T.v > high {
		return "properties", fmt.Sprintf("properties at %s, outside %s to %s where they are known", celsius(s.T.v), celsius(low), celsius(high))
	}
	n, name := f.number(&s)
	switch {
	case f.pins && !f.blown && math.Abs(s.delta) >= least && f.pitch()-f.diameter < f.layer(&s, n):
		return "crowded-pins", fmt.Sprintf("the pins stand %s apart, within each other's boundary layers (%s): they carry less than single ones", si(f.pitch()-f.diameter, length), si(f.layer(&s, n), length))
	case name == "Re*" && u > 0 && (n.v < 0.1 || n.v > 100):
		return "correlation", fmt.Sprintf("Re* is %s, outside 0.1 to 100, the range of Teertstra, Yovanovich and Culham (2000)", short(n.v))
	case name == "El" && math.Abs(s.delta) >= least && (n.v < 0.1 || n.v > 1e5):
		return "correlation", fmt.Sprintf("El is %s, outside 0.1 to 1e5 that Elenbaas (1942) measured", short(n.v))
	}
	return "", ""
}

// layer is twice the thickness of the film around a pin, D/Nu: common practice, no source.
func (f *finArray) layer(s *filmState, ra jet) float64 {
	return 2 * f.diameter / horizontalCylinder(ra, s.pr).v
}
