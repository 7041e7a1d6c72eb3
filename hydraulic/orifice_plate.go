package hydraulic

import (
	"fmt"
	"math"
)

// A tapping says where the pressures of an orifice plate are taken.
type tapping uint8

const (
	flangeTaps tapping = iota
	cornerTaps
	bothBores // D and D/2
)

// tapWords are the words of the case for them, in that order.
var tapWords = []string{"flange", "corner", "D and D/2"}

// A plate is an orifice plate in a pipe as ISO 5167-2:2003 has it. Between two nodes lies
// what it loses for good, not what its taps read.
type plate struct {
	bore, pipe float64 // m
	density    float64 // kg/m³
	viscosity  float64 // Pa·s
	taps       tapping

	beta, lowest float64 // ratio of the bores; the lowest Reynolds number of the coefficient
	core         float64 // Pa of lost pressure
	c            reader5167
}

// prepare works out what does not depend on the flow.
func (l *plate) prepare() {
	l.beta = l.bore / l.pipe
	l.c = newReader5167(l.beta, l.pipe, l.taps)
	l.lowest = lowestReynolds(l.beta, l.pipe, l.taps)
	c, _ := l.c.at(l.lowest)
	k, _ := l.gain(c)
	area := math.Pi / 4 * l.bore * l.bore
	l.core = rooted(k, area, l.viscosity).core
}

// lowestReynolds is that in the pipe from which the coefficient holds (ISO 5167-2:2003,
// section 5.3.1, from memory).
func lowestReynolds(beta, pipe float64, taps tapping) float64 {
	const least = 5000
	switch {
	case taps == flangeTaps:
		return max(least, 170*beta*beta*pipe*1000)
	case beta > 0.56:
		return max(least, 16000*beta*beta)
	}
	return least
}

// A reader5167 is the equation of Reader-Harris and Gallagher (ISO 5167-2:2003, equation
// (4), constants from memory) for one plate:
//
//	C = 0.5961 + 0.0261β² − 0.216β⁸ + 0.000521(10⁶β/Re)^0.7 + (0.0188 + 0.0063A)β^3.5(10⁶/Re)^0.3
//	  + (0.043 + 0.080e^(−10L₁) − 0.123e^(−7L₁))(1 − 0.11A)β⁴/(1 − β⁴) − 0.031(M₂ − 0.8M₂^1.1)β^1.3
//	  + 0.011(0.75 − β)(2.8 − D/25.4 mm) where D < 71.12 mm,      A = (19000β/Re)^0.8
type reader5167 struct {
	fixed           float64 // what does not go by Re
	low, mid, midA  float64 // factors of (10⁶/Re)^0.7, (10⁶/Re)^0.3 and A·(10⁶/Re)^0.3
	tap, smallTimes float64 // factor of −0.11·A; 19000β
}

func newReader5167(beta, pipe float64, taps tapping) reader5167 {
	l1, l2 := 0.0, 0.0
	switch taps {
	case bothBores:
		l1, l2 = 1, 0.47
	case flangeTaps:
		l1 = 0.0254 / pipe
		l2 = l1
	}
	m2, b4 := 2*l2/(1-beta), math.Pow(beta, 4)
	tap := (0.043 + 0.080*math.Exp(-10*l1) - 0.123*math.Exp(-7*l1)) * b4 / (1 - b4)
	fixed := 0.5961 + 0.0261*beta*beta - 0.216*b4*b4 + tap - 0.031*(m2-0.8*math.Pow(m2, 1.1))*math.Pow(beta, 1.3)
	if pipe < 0.07112 {
		fixed += 0.011 * (0.75 - beta) * (2.8 - pipe/0.0254)
	}
	b35 := math.Pow(beta, 3.5)
	return reader5167{fixed, 0.000521 * math.Pow(beta, 0.7), 0.0188 * b35, 0.0063 * b35, tap, 19000 * beta}
}

// at returns C at a Reynolds number in the pipe, and dC/dRe.
func (c *reader5167) at(re float64) (value, slope float64) {
	million := 1e6 / re
	a := math.Pow(c.smallTimes/re, 0.8)
	p7, p3 := math.Pow(million, 0.7), math.Pow(million, 0.3)
	value = c.fixed + c.low*p7 + (c.mid+c.midA*a)*p3 - 0.11*c.tap*a
	slope = (-0.7*c.low*p7 - 0.3*c.mid*p3 - 1.1*c.midA*a*p3 + 0.8*0.11*c.tap*a) / re
	return value, slope
}

// gain is k of q = k·√(lost pressure) at a coefficient c, and dk/dc. Of the drop at the
// taps the share r is lost (ISO 5167-2:2003, section 5.4):
//
//	q = c·(π/4)·d²·√(2Δp/ρ)/√(1 − β⁴),   r = (s − cβ²)/(s + cβ²),   s = √(1 − β⁴(1 − c²))
func (l *plate) gain(c float64) (k, dk float64) {
	b2 := l.beta * l.beta
	s := math.Sqrt(1 - b2*b2*(1-c*c))
	ds := b2 * b2 * c / s
	r := (s - c*b2) / (s + c*b2)
	dr := 2 * b2 * (c*ds - s) / ((s + c*b2) * (s + c*b2))
	k0 := math.Pi / 4 * l.bore * l.bore * math.Sqrt(2/(l.density*r*(1-b2*b2)))
	return k0 * c, k0 * (1 - c*dr/(2*r))
}

// reynolds is that in the pipe at a flow, and its derivative, held at the lowest of the
// coefficient below it.
func (l *plate) reynolds(q float64) (re, dre float64) {
	dre = 4 * l.density / (math.Pi * l.pipe * l.viscosity)
	if re = dre * math.Abs(q); re <= l.lowest {
		return l.lowest, 0
	}
	return re, dre
}

// Flow implements network.Flow: it solves q = k(C(q))·√(lost pressure), in which C
// hardly moves, so that a few steps of Newton's method suffice.
func (l *plate) Flow(a, b float64) (q, da, db float64) {
	root := powerFlow{1, l.core, 2}
	s, ds := root.across(drop(a, b))
	c, _ := l.c.at(l.lowest)
	k, _ := l.gain(c)
	q = k * math.Abs(s)
	var pull float64
	for range 20 {
		re, dre := l.reynolds(q)
		c, dc := l.c.at(re)
		k, dk := l.gain(c)
		pull = dk * dc * dre * math.Abs(s)
		next := q - (q-k*math.Abs(s))/(1-pull)
		done := math.Abs(next-q) <= 1e-15*next
		if q = next; done {
			break
		}
	}
	re, _ := l.reynolds(q)
	c, _ = l.c.at(re)
	k, _ = l.gain(c)
	d := k * ds / (1 - pull)
	return math.Copysign(q, s), d, -d
}

// Caution says where the equation is used outside its range.
func (l *plate) Caution(a, b float64) (code, text string) {
	switch {
	case l.bore < 0.0125:
		return "orifice-range", fmt.Sprintf("the bore of %.4g mm is below 12.5 mm, where the coefficient of ISO 5167-2 begins", l.bore*1e3)
	case l.pipe < 0.05 || l.pipe > 1:
		return "orifice-range", fmt.Sprintf("the pipe of %.4g mm is not between 50 and 1000 mm, the range of the coefficient of ISO 5167-2", l.pipe*1e3)
	case l.beta < 0.1 || l.beta > 0.75:
		return "orifice-range", fmt.Sprintf("the ratio of bore and pipe is %.3g, not between 0.1 and 0.75, the range of the coefficient of ISO 5167-2", l.beta)
	}
	q, _, _ := l.Flow(a, b)
	if re := math.Abs(q) * 4 * l.density / (math.Pi * l.pipe * l.viscosity); re < l.lowest && math.Abs(a-b) > l.core {
		return "orifice-range", fmt.Sprintf("the Reynolds number in the pipe falls below %.0f, where the coefficient of ISO 5167-2 begins; it is held there", l.lowest)
	}
	return "", ""
}
