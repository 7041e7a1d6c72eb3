package fluid

import (
	"math"
	"sort"
)

// A curve is a property by points, ascending in T.
type curve []struct{ T, v float64 }

// straight is the value on the line between the two points beside T.
func (c curve) straight(T float64) float64 {
	i := sort.Search(len(c)-2, func(i int) bool { return T <= c[i+1].T })
	a, b := c[i], c[i+1]
	return a.v + (b.v-a.v)*(T-a.T)/(b.T-a.T)
}

// decaying is the same with straight lines in the logarithm, for viscosities.
func (c curve) decaying(T float64) float64 {
	i := sort.Search(len(c)-2, func(i int) bool { return T <= c[i+1].T })
	a, b := c[i], c[i+1]
	return a.v * math.Pow(b.v/a.v, (T-a.T)/(b.T-a.T))
}

// Half ethylene glycol by volume: density in kg/m³ against K, converted from °F and lb/ft³.
var glycolDensity = curve{
	{freezing - 28.889, 1090.05643}, {freezing - 23.333, 1088.93514}, {freezing - 17.778, 1087.65366}, {freezing - 12.222, 1086.05182},
	{freezing - 6.667, 1084.44997}, {freezing - 1.111, 1082.68794}, {freezing + 4.444, 1080.76572}, {freezing + 21.111, 1074.03797},
	{freezing + 37.778, 1066.02874}, {freezing + 60, 1053.21397}, {freezing + 82.222, 1037.99643},
}

// glycolViscosity is in Pa·s.
var glycolViscosity = curve{
	{freezing - 20, 22.07e-3}, {freezing - 10, 12.74e-3}, {freezing, 8.09e-3}, {freezing + 10, 5.50e-3}, {freezing + 20, 3.94e-3},
	{freezing + 30, 2.94e-3}, {freezing + 40, 2.26e-3}, {freezing + 60, 1.43e-3}, {freezing + 80, 0.98e-3},
}

// waterInGlycol is the share of molecules of water in it: 50 % by volume are 52.7 % by
// mass with 1113 and 998 kg/m³ (20 °C) and 62.07 and 18.015 g/mol.
const waterInGlycol = 0.756

func glycols() []Fluid {
	hydraulic := mineral{ // a water–glycol hydraulic liquid of the kind HFC
		law:     through(freezing+40, 46, freezing+60, 26),
		density: sloping{1080, freezing + 15, 0.65},
		bulk:    sloping{3.2e9, freezing + 20, 0},
	}
	return []Fluid{
		{
			Key: "water-glycol 50", Name: "ethylene glycol in water, 50 % by volume", Category: "water–glycol",
			Low: freezing - 20, High: freezing + 80,
			Sources: Sources{
				Density:        Source{LookedUp, "ASHRAE Fundamentals, density of ethylene glycol solutions, 50 % by volume, as reprinted in a design manual"},
				Viscosity:      Source{FromMemory, "ASHRAE Fundamentals, 50 % by volume"},
				BulkModulus:    Source{Common, "ρ·w² with a speed of sound of about 1650 m/s"},
				VapourPressure: Source{Common, "Raoult's law: 0.756 of that of water, the share of its molecules"},
			},
			Note: "tables of the viscosity differ by 10 to 20 %",
			at: func(T float64) Properties {
				return Properties{Density: glycolDensity.straight(T), Viscosity: glycolViscosity.decaying(T), BulkModulus: 2.9e9, VapourPressure: waterInGlycol * waterVapour(T)}
			},
		},
		{
			Key: "water-glycol HFC 46", Name: "water–glycol hydraulic liquid HFC of ISO VG 46", Category: "water–glycol",
			Low: freezing - 20, High: freezing + 60,
			Sources: Sources{
				Density:        Source{Common, "1080 kg/m³ at 15 °C falling by 0.65 kg/m³ each kelvin"},
				Viscosity:      Source{Common, "Walther's law (ASTM D341) through 46 mm²/s at 40 °C (ISO 3448) and 26 mm²/s at 60 °C (viscosity index about 200)"},
				BulkModulus:    Source{Common, "about 3.2 GPa"},
				VapourPressure: Source{Common, "0.8 of that of water"},
			},
			Note: "typical; a data sheet is better",
			at: func(T float64) Properties {
				p := hydraulic.at(T)
				p.VapourPressure = 0.8 * waterVapour(T)
				return p
			},
		},
	}
}
