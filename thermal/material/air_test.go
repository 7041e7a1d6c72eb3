package material

import (
	"math"
	"testing"
)

// airTable is Incropera, DeWitt, Bergman, Lavine: Fundamentals of Heat and Mass
// Transfer, Table A.4, air at atmospheric pressure (from memory): K, kg/m³,
// J/(kg·K), 1e-7 Pa·s, 1e-3 W/(m·K), Prandtl number.
var airTable = [][6]float64{
	{200, 1.7458, 1007, 132.5, 18.1, 0.737},
	{250, 1.3947, 1006, 159.6, 22.3, 0.720},
	{300, 1.1614, 1007, 184.6, 26.3, 0.707},
	{350, 0.9950, 1009, 208.2, 30.0, 0.700},
	{400, 0.8711, 1014, 230.1, 33.8, 0.690},
	{450, 0.7740, 1021, 250.7, 37.3, 0.686},
	{500, 0.6964, 1030, 270.1, 40.7, 0.684},
	{600, 0.5804, 1051, 305.8, 46.9, 0.685},
	{700, 0.4975, 1075, 338.8, 52.4, 0.695},
	{800, 0.4354, 1099, 369.8, 57.3, 0.709},
	{900, 0.3868, 1121, 398.1, 62.0, 0.720},
	{1000, 0.3482, 1141, 424.4, 66.7, 0.726},
}

// The deviations that the comment of AirAt states.
func TestAirAgainstTables(t *testing.T) {
	for _, row := range airTable {
		at, _ := AirAt(row[0], 1e5) // the table's densities are those of 1 bar
		got := [5]float64{at.Density, at.SpecificHeat, at.Viscosity * 1e7, at.Conductivity * 1e3, at.Viscosity * at.SpecificHeat / at.Conductivity}
		within := [5]float64{0.004, 0.003, 0.0225, 0.0135, 0.036}
		if row[0] <= 500 {
			within = [5]float64{0.004, 0.003, 0.0125, 0.0135, 0.0185}
		}
		for i, want := range row[1:] {
			if d := got[i]/want - 1; math.Abs(d) > within[i] {
				t.Errorf("%g K, column %d: %.4g, table %g: off by %.2f %%", row[0], i+1, got[i], want, 100*d)
			}
		}
	}
	air, _ := Find("air")
	for _, p := range air.Points { // Cengel, Table A-15
		at, _ := AirAt(p.Temperature, 101325)
		for _, x := range [][3]float64{{at.Density, p.Density, 0.002}, {at.SpecificHeat, p.SpecificHeat, 0.005},
			{at.Viscosity, p.Viscosity, 0.015}, {at.Conductivity, p.Conductivity, 0.032}} {
			if math.Abs(x[0]/x[1]-1) > x[2] {
				t.Errorf("%g K: %g, table %g", p.Temperature, x[0], x[1])
			}
		}
	}
}

// U.S. Standard Atmosphere, 1976: sea level.
func TestAirAtSeaLevel(t *testing.T) {
	at, _ := AirAt(288.15, 101325)
	for _, c := range []struct{ got, want, within float64 }{
		{at.Density, 1.225, 5e-5}, {at.Viscosity, 1.7894e-5, 5e-10}, {at.Conductivity, 0.025326, 5e-6},
	} {
		if math.Abs(c.got-c.want) > c.within { // half a unit of the last printed digit, and a little for conductivity
			t.Errorf("%.7g, want %g", c.got, c.want)
		}
	}
}

// Slopes against central differences; all of it finite whatever the temperature.
func TestAirSlopes(t *testing.T) {
	for T := 110.0; T < 2400; T *= 1.13 {
		const h = 1e-3
		_, s := AirAt(T, 9e4)
		a, _ := AirAt(T-h, 9e4)
		b, _ := AirAt(T+h, 9e4)
		for _, c := range [][3]float64{{s.Density, a.Density, b.Density}, {s.Viscosity, a.Viscosity, b.Viscosity},
			{s.Conductivity, a.Conductivity, b.Conductivity}, {s.SpecificHeat, a.SpecificHeat, b.SpecificHeat}} {
			if d := (c[2] - c[1]) / (2 * h); math.Abs(c[0]-d) > 1e-7*math.Abs(c[2])/T+1e-7*math.Abs(d) {
				t.Errorf("%g K: slope %g, difference %g", T, c[0], d)
			}
		}
	}
	for _, T := range []float64{-1e300, -1, 0, 1e300} {
		if at, s := AirAt(T, 1e5); !(at.Density > 0) || math.IsInf(at.Density, 0) || s.Density != 0 {
			t.Errorf("%g K: %+v", T, at)
		}
	}
}

// ISO 2533:1975, table 5 (from memory): kelvin and pascals at heights above sea level.
func TestStandardAtmosphere(t *testing.T) {
	for _, c := range []struct{ h, T, p, within float64 }{
		{0, 288.15, 101325, 1e-6},
		{1000, 281.651, 89876.2, 1e-5},
		{2000, 275.154, 79501.4, 1e-5},
		{5000, 255.676, 54048.2, 1e-5},
		{10000, 223.252, 26499.9, 1e-5},
		{15000, 216.650, 12111.8, 1e-5},
	} {
		T, p := StandardAtmosphere(c.h)
		if math.Abs(T-c.T) > 1e-3 || math.Abs(p/c.p-1) > c.within {
			t.Errorf("%g m: %.3f K, %.1f Pa, want %g, %g", c.h, T, p, c.T, c.p)
		}
	}
	_, low := StandardAtmosphere(-1e9)
	_, high := StandardAtmosphere(1e9)
	if !(low < 1.2e5 && high > 5000) {
		t.Errorf("beyond the ends: %g, %g", low, high)
	}
}
