package fluid

import (
	"fmt"
	"math"
)

// A walther is the law of Walther by which the kinematic viscosity of a mineral oil
// falls with temperature, log log(ν + 0.7) = A − B·log T, ν in mm²/s, T in K
// (ASTM D341; its further terms count below 2 mm²/s, where they are left out).
type walther struct{ a, b float64 }

// through returns the law through two points: ν in mm²/s at T in K.
func through(t1, nu1, t2, nu2 float64) walther {
	y1, y2 := math.Log10(math.Log10(nu1+0.7)), math.Log10(math.Log10(nu2+0.7))
	b := (y1 - y2) / math.Log10(t2/t1)
	return walther{a: y1 + b*math.Log10(t1), b: b}
}

// at returns the kinematic viscosity in m²/s.
func (w walther) at(T float64) float64 {
	return 1e-6 * (math.Pow(10, math.Pow(10, w.a-w.b*math.Log10(T))) - 0.7)
}

// A sloping is a property that falls with temperature along a straight line.
type sloping struct{ value, at, slope float64 }

func (s sloping) of(T float64) float64 { return s.value - s.slope*(T-s.at) }

// A mineral is an oil by what a data sheet states of it.
type mineral struct {
	law     walther
	density sloping // kg/m³
	bulk    sloping // Pa
}

func (m mineral) at(T float64) Properties {
	density := m.density.of(T)
	return Properties{Density: density, Viscosity: density * m.law.at(T), BulkModulus: m.bulk.of(T)}
}

// grades are the viscosity grades of ISO 3448: kinematic viscosity at 40 °C, which
// defines them, at 100 °C for a viscosity index of about 100, and density at 15 °C as
// data sheets have them.
var grades = []struct {
	vg, nu100, density float64 // mm²/s, mm²/s, kg/m³
}{
	{10, 2.6, 850},
	{15, 3.4, 857},
	{22, 4.3, 864},
	{32, 5.4, 868},
	{46, 6.8, 872},
	{68, 8.7, 877},
	{100, 11.1, 882},
	{150, 14.5, 887},
}

// expansion of mineral oil, 1/K, and the bulk modulus of oil free of air with its fall
// over temperature: common practice.
const (
	expansion = 7.0e-4
	oilBulk   = 1.6e9 // Pa at 20 °C
	oilSoften = 6e6   // Pa/K
)

func oils() []Fluid {
	list := make([]Fluid, 0, len(grades))
	for _, g := range grades {
		m := mineral{
			law:     through(freezing+40, g.vg, freezing+100, g.nu100),
			density: sloping{g.density, freezing + 15, g.density * expansion},
			bulk:    sloping{oilBulk, freezing + 20, oilSoften},
		}
		list = append(list, Fluid{
			Key: fmt.Sprintf("oil VG %g", g.vg), Name: fmt.Sprintf("mineral hydraulic oil ISO VG %g", g.vg), Category: "hydraulic oil",
			Low: freezing - 10, High: freezing + 100,
			Sources: Sources{
				Density: Source{Common, fmt.Sprintf("%g kg/m³ at 15 °C, expansion 7·10⁻⁴/K: typical mineral oil", g.density)},
				Viscosity: Source{Common, fmt.Sprintf("Walther's law (ASTM D341) through %g mm²/s at 40 °C (ISO 3448, middle of the grade, ±10 %%) and %g mm²/s at 100 °C (viscosity index about 100)",
					g.vg, g.nu100)},
				BulkModulus: Source{Common, "1.6 GPa at 20 °C falling by 6 MPa/K: typical mineral oil free of air"},
			},
			Note: "typical of the grade; a data sheet is better. Air comes out of oil long before it boils: state vapour_pressure where that counts",
			at:   m.at,
		})
	}
	return list
}
