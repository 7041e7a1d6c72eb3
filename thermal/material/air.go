package material

import "math"

// The constants of dry air, ISO 2533:1975 (Standard atmosphere), table 1, the same as
// in U.S. Standard Atmosphere, 1976, but for the last digit.
const (
	airGas      = 287.05287 // J/(kg·K)
	gravity     = 9.80665   // m/s²
	earthRadius = 6356766.0 // m, for the height that counts in the standard atmosphere
)

// Between AirLow and AirHigh, in K, the formulas of AirAt were held against tables;
// beyond airLeast and airMost they are not evaluated: the nearest value counts.
const (
	AirLow, AirHigh   = 200.0, 1000.0
	airLeast, airMost = 100.0, 2500.0
)

// AirSource says where AirAt has its numbers from.
const AirSource = "ideal gas; viscosity and conductivity of U.S. Standard Atmosphere, 1976, eqs. 51 and 53; " +
	"specific heat of Irvine and Liley, Steam and Gas Tables with Computer Equations, 1984 (from memory, checked against tables)"

// AirAt returns the properties of dry air at temperature T in K and absolute pressure p
// in Pa, and their slopes against temperature, per K: density by the ideal gas law, viscosity
// and conductivity by Sutherland's form, the specific heat by a polynomial. Pressure
// acts on the density alone.
//
// Against Incropera, Table A.4, from 200 to 1000 K: density within 0.4 %, specific
// heat 0.3 %, viscosity 2.2 %, conductivity 1.3 %, Prandtl number 3.6 %; below 500 K
// viscosity within 1.2 %, the Prandtl number 1.8 %. Against Cengel, Table A-15, −20 to 160 °C: conductivity
// within 3.2 %, specific heat 0.5 %, viscosity 1.5 %: the two tables differ by as much.
//
// Any finite T is accepted; below 100 K and above 2500 K the properties stay what they
// are there.
func AirAt(T, p float64) (at, slope Point) {
	inside := 1.0
	if !(T > airLeast) {
		T, inside = airLeast, 0
	} else if !(T < airMost) {
		T, inside = airMost, 0
	}
	root := T * math.Sqrt(T)
	at = Point{Temperature: T, Density: p / (airGas * T), Viscosity: 1.458e-6 * root / (T + 110.4), Source: AirSource}
	slope.Density = -inside * at.Density / T
	slope.Viscosity = inside * at.Viscosity * (1.5/T - 1/(T+110.4))
	e := 245.4 * math.Exp(-12*math.Ln10/T)
	at.Conductivity = 2.64638e-3 * root / (T + e)
	slope.Conductivity = inside * at.Conductivity * (1.5/T - (1+e*12*math.Ln10/(T*T))/(T+e))
	at.SpecificHeat, slope.SpecificHeat = airHeat(T)
	slope.SpecificHeat *= inside
	return at, slope
}

// airHeat is the specific heat in J/(kg·K) and its slope.
func airHeat(T float64) (c, slope float64) {
	a := [5]float64{1034.09, -0.2848870, 0.7816818e-3, -0.4970786e-6, 0.1077024e-9}
	for i := len(a) - 1; i >= 0; i-- {
		slope = slope*T + c
		c = c*T + a[i]
	}
	return c, slope
}

// Heights between which StandardAtmosphere is defined here, in m.
const (
	LowestAltitude, HighestAltitude = -1000.0, 20000.0
)

// StandardAtmosphere returns temperature in K and absolute pressure in Pa at an
// altitude in m above sea level, from −1 km to 20 km (beyond, that of the end).
// Source: ISO 2533:1975, layers of 6.5 K/km up to 11 km and of 216.65 K above, in
// heights corrected for the fall of gravity.
func StandardAtmosphere(altitude float64) (T, p float64) {
	altitude = math.Min(math.Max(altitude, LowestAltitude), HighestAltitude)
	h := altitude * earthRadius / (earthRadius + altitude)
	const T0, p0, lapse, tropopause = 288.15, 101325.0, 0.0065, 11000.0
	T = T0 - lapse*math.Min(h, tropopause)
	p = p0 * math.Pow(T/T0, gravity/(airGas*lapse))
	if h > tropopause {
		p *= math.Exp(-gravity * (h - tropopause) / (airGas * T))
	}
	return T, p
}
