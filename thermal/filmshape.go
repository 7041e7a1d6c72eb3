package thermal

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network/quantity"
)

// A correlation is one kind of film: what it needs to know of the surface and how the
// Nusselt number follows from the Rayleigh or the Reynolds number.
type correlation struct {
	way, word  string   // natural = "vertical plate"
	needs, may []string // keys beside it
	bulk       bool     // properties at the temperature of the fluid, not at the mean
	number     string   // "Ra", "Re"
	low, high  float64  // of the number, as published; 0: no lower end
	source     string
	by         string // the length in the number, as derivations write it
	length     func(f *film) float64
	nusselt    func(f *film, delta float64, pr, n jet) jet
}

// A film is a correlation with its numbers, in SI.
type film struct {
	*correlation
	medium                      medium
	height, side, diameter, gap float64
	area, efficiency            float64
	up                          bool // the surface faces up
	coefficient                 float64
}

var correlations = []correlation{
	{way: "natural", word: "vertical plate", needs: []string{"height"}, may: []string{"fluid"}, number: "Ra", low: 0.1, high: 1e12,
		source: "Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1323", by: "H", length: (*film).upright,
		nusselt: func(_ *film, _ float64, pr, ra jet) jet { return verticalPlate(ra, pr) }},
	{way: "natural", word: "horizontal plate", may: []string{"face", "length", "diameter", "fluid"}, number: "Ra", low: 1e4, high: 1e11,
		source: "McAdams, Heat Transmission (1954); Lloyd and Moran, J. Heat Transfer 96 (1974) 443", by: "(A/P)", length: (*film).areaByPerimeter,
		nusselt: func(f *film, delta float64, _, ra jet) jet {
			if delta > 0 == f.up {
				return plateUp(ra)
			}
			return plateDown(ra)
		}},
	{way: "natural", word: "vertical cylinder", needs: []string{"height", "diameter"}, may: []string{"fluid"}, number: "Ra", low: 0.1, high: 1e12,
		source: "Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1323; 0.97 H/D: VDI-Wärmeatlas (2013), F2 (from memory)", by: "H", length: (*film).upright,
		nusselt: func(f *film, _ float64, pr, ra jet) jet { return verticalCylinder(ra, pr, f.height, f.diameter) }},
	{way: "natural", word: "horizontal cylinder", needs: []string{"diameter"}, may: []string{"fluid"}, number: "Ra", high: 1e12,
		source: "Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1049", by: "D", length: (*film).across,
		nusselt: func(_ *film, _ float64, pr, ra jet) jet { return horizontalCylinder(ra, pr) }},
	{way: "natural", word: "enclosure", needs: []string{"gap"}, may: []string{"height"}, number: "Ra", high: 2e7,
		source: "ElSherbiny, Raithby and Hollands, J. Heat Transfer 104 (1982) 96 (from memory)", by: "gap", length: (*film).apart,
		nusselt: func(f *film, _ float64, _, ra jet) jet { return uprightGap(ra, f.height/f.gap) }},
	{way: "natural", word: "enclosure", needs: []string{"gap"}, may: []string{"face"}, number: "Ra", high: 1e8,
		source: "Hollands, Raithby and Konicek, Int. J. Heat Mass Transfer 18 (1975) 879", by: "gap", length: (*film).apart,
		nusselt: func(f *film, delta float64, _, ra jet) jet {
			if delta > 0 == f.up {
				return layerBelow(ra)
			}
			return jet{v: 1}
		}},
	{way: "forced", word: "plate", needs: []string{"length", "speed"}, may: []string{"fluid"}, number: "Re", high: 1e8,
		source: "Pohlhausen (1921) and the mixed plate, Incropera eqs. 7.30 and 7.38", by: "L", length: (*film).along,
		nusselt: func(_ *film, _ float64, pr, re jet) jet { return flatPlate(re, pr) }},
	{way: "forced", word: "cylinder", needs: []string{"diameter", "speed"}, may: []string{"fluid"}, number: "Re", high: 1e7,
		source: "Churchill and Bernstein, J. Heat Transfer 99 (1977) 300", by: "D", length: (*film).across,
		nusselt: func(_ *film, _ float64, pr, re jet) jet { return acrossCylinder(re, pr) }},
	{way: "forced", word: "tube", needs: []string{"diameter", "speed"}, may: []string{"length", "fluid"}, bulk: true, number: "Re", high: 5e6,
		source: tubeSource, by: "D", length: (*film).across, nusselt: (*film).tube},
	{way: "forced", word: "duct", needs: []string{"diameter", "speed"}, may: []string{"length", "fluid"}, bulk: true, number: "Re", high: 5e6,
		source: tubeSource, by: "D", length: (*film).across, nusselt: (*film).tube},
}

const tubeSource = "laminar Edwards, Denny and Mills (1979); turbulent Gnielinski, Int. Chem. Eng. 16 (1976) 359; between: Gnielinski (2013)"

// words lists the correlations of a way, each once.
func words(way string) []string {
	var list []string
	for i := range correlations {
		if c := &correlations[i]; c.way == way && (len(list) == 0 || list[len(list)-1] != c.word) {
			list = append(list, c.word)
		}
	}
	return list
}

func (f *film) upright() float64 { return f.height }
func (f *film) across() float64  { return f.diameter }
func (f *film) apart() float64   { return f.gap }
func (f *film) along() float64   { return f.side }

// areaByPerimeter is that of a disc, or of a rectangle of which one side is known.
func (f *film) areaByPerimeter() float64 {
	if f.diameter > 0 {
		return f.diameter / 4
	}
	return f.area / (2 * (f.side + f.area/f.side))
}

func (f *film) tube(_ float64, pr, re jet) jet {
	if f.side == 0 {
		return inTube(re, pr, 0)
	}
	return inTube(re, pr, f.diameter/f.side)
}

// state is that of the film, with the number its correlation goes by.
func (f *film) state(a, b, u float64) (s filmState, n jet, length float64) {
	s = stateOf(&f.medium, a, b, u, f.bulk)
	length = f.correlation.length(f)
	if f.way == "natural" {
		return s, s.rayleigh(length), length
	}
	return s, s.reynolds(length), length
}

// convect implements convection.
func (f *film) convect(a, b, u float64) (conductance, coefficient jet) {
	if f.correlation == nil { // stated
		h := jet{v: f.coefficient}
		return h.times(f.area * f.efficiency), h
	}
	s, n, length := f.state(a, b, u)
	h := f.nusselt(f, s.delta, s.pr, n).mul(s.k).times(1 / length)
	return h.times(f.area * f.efficiency), h
}

// leastExpansion, in 1/K: water has it at 7 °C.
const leastExpansion = 5e-5

// least is from which difference of temperature on a correlation is asked whether it reaches
// down so far: below it there is next to no heat.
const least = 1.0

// doubt implements convection.
func (f *film) doubt(a, b, u float64) (code, text string) {
	if f.correlation == nil {
		return "", ""
	}
	s, n, _ := f.state(a, b, u)
	if low, high := f.medium.known(); s.T.v < low || s.T.v > high {
		return "properties", fmt.Sprintf("properties at %s, outside %s to %s where they are known", celsius(s.T.v), celsius(low), celsius(high))
	}
	if f.way == "natural" && s.beta.v < leastExpansion {
		return "expansion", "the fluid at " + celsius(s.T.v) + " hardly expands: near the densest point of water this film is not right"
	}
	if n.v > f.high {
		return "correlation", fmt.Sprintf("%s is %s, above %s, the end of %s", f.number, short(n.v), short(f.high), f.source)
	}
	if n.v < f.low && math.Abs(s.delta) >= least {
		return "correlation", fmt.Sprintf("%s is %s, below %s, the beginning of %s", f.number, short(n.v), short(f.low), f.source)
	}
	if ratio := f.height / f.gap; f.gap > 0 && f.height > 0 && (ratio < 5 || ratio > 110) {
		return "correlation", fmt.Sprintf("height/gap is %s, outside 5 to 110, the range of %s", short(ratio), f.source)
	}
	if f.word == "duct" && n.v < laminarEnds && u > 0 {
		return "laminar-duct", "laminar flow: in a duct that is not round the coefficient differs from that of a tube, 3 (square) to 7.5 (flat) in place of 3.66"
	}
	return "", ""
}

func celsius(T float64) string {
	return quantity.Print{Digits: 4}.Format(T, temperature, quantity.Level)
}

func short(v float64) string { return strings.TrimSpace(quantity.Number(v, 3)) }
