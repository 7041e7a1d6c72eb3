package fluid

import "math"

// water is pure ordinary water at atmospheric pressure.
var water = Fluid{
	Key: "water", Name: "water, pure", Category: "water", Low: freezing, High: freezing + 100,
	Sources: Sources{
		Density:        Source{Published, "Kell, J. Chem. Eng. Data 20 (1975) 97, at 101.325 kPa"},
		Viscosity:      Source{Published, "IAPWS SR6-08, Supplementary Release on Properties of Liquid Water at 0.1 MPa, eq. (7)"},
		BulkModulus:    Source{Published, "ρ·w², speed of sound by Bilaniuk and Wong, J. Acoust. Soc. Am. 93 (1993) 1609"},
		VapourPressure: Source{Published, "Wagner and Pruß, J. Phys. Chem. Ref. Data 31 (2002) 387, eq. (2.5)"},
	},
	at: func(T float64) Properties {
		density, w := waterDensity(T), waterSound(T)
		return Properties{Density: density, Viscosity: waterViscosity(T), BulkModulus: density * w * w, VapourPressure: waterVapour(T)}
	},
}

// waterDensity is that of water at 101.325 kPa in kg/m³ (Kell 1975, 0 to 100 °C; coefficients
// from memory, held to IAPWS-IF97 in the tests).
func waterDensity(T float64) float64 {
	t := T - freezing
	return polynomial(t, 999.83952, 16.945176, -7.9870401e-3, -46.170461e-6, 105.56302e-9, -280.54253e-12) / (1 + 16.879850e-3*t)
}

// waterViscosity is the dynamic viscosity in Pa·s (IAPWS SR6-08, −20 to 110 °C).
func waterViscosity(T float64) float64 {
	tau := T / 300
	return 1e-6 * (280.68*math.Pow(tau, -1.9) + 511.45*math.Pow(tau, -7.7) + 61.131*math.Pow(tau, -19.6) + 0.45903*math.Pow(tau, -40))
}

// waterSound is the speed of sound in m/s at atmospheric pressure (0 to 100 °C).
func waterSound(T float64) float64 {
	return polynomial(T-freezing, 1402.38744, 5.03836171, -5.81172916e-2, 3.34638117e-4, -1.48259672e-6, 3.16585020e-9)
}

// waterVapour is the saturation pressure in Pa.
func waterVapour(T float64) float64 {
	const critical, pressure = 647.096, 22.064e6 // K, Pa
	x := 1 - T/critical
	r := math.Sqrt(x)
	sum := -7.85951783*x + 1.84408259*x*r - 11.7866497*x*x*x + 22.6807411*x*x*x*r - 15.9618719*x*x*x*x + 1.80122502*math.Pow(x, 7.5)
	return pressure * math.Exp(critical/T*sum)
}

// polynomial is c0 + c1·x + c2·x² + …
func polynomial(x float64, c ...float64) float64 {
	sum := 0.0
	for i := len(c) - 1; i >= 0; i-- {
		sum = sum*x + c[i]
	}
	return sum
}
