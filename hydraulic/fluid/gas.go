package fluid

import "math"

// A Mixture is a liquid with bubbles of free gas in it. Of a volume V that holds the
// share Gas of free gas at the pressure Atmosphere (both per volume of liquid) it takes up
//
//	v(p) = (p − Atmosphere)/Bulk + Gas·(1 − (Atmosphere/p)^(1/n))
//
// more for each V at the absolute pressure p, so that its bulk modulus is
//
//	1/K(p) = 1/Bulk + Gas·(Atmosphere/p)^(1/n)/(n·p)
//
// with n = 1 where bubbles keep their temperature (slow) and 1.4 where they do not
// (Merritt, Hydraulic Control Systems, 1967, section 2-3; Wylie and Streeter, Fluid
// Transients in Systems, 1993, section 1-4). Gas that dissolves or comes out of
// solution is not counted.
type Mixture struct {
	Bulk       float64 // Pa
	Gas        float64 // share of the volume at Atmosphere
	Atmosphere float64 // Pa, absolute
	Exponent   float64 // n
}

// thinnest is the share of the atmosphere below which bubbles are taken to give way as
// they do there: below it vapour forms, and a gas without pressure has no volume.
const thinnest = 0.01

// Taken returns v and its derivative 1/K at the absolute pressure p, which may be any
// finite number: below a hundredth of the atmosphere the law goes on straight.
func (m Mixture) Taken(p float64) (v, dv float64) {
	v, dv = (p-m.Atmosphere)/m.Bulk, 1/m.Bulk
	if m.Gas == 0 {
		return v, dv
	}
	at := max(p, thinnest*m.Atmosphere)
	left := m.Gas * math.Pow(m.Atmosphere/at, 1/m.Exponent)
	slope := left / (m.Exponent * at)
	return v + m.Gas - left + slope*(p-at), dv + slope
}
