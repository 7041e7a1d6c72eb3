package thermal

import "math"

// root is √Re, made straight below Re of about 1 so that its slope stays finite at rest:
// Re·(1 + Re²)^(−1/4), less than √Re by 2.5e-5 at Re = 100.
func root(re jet) jet { return re.mul(re.mul(re).add(1).pow(-1. / 4)) }

// Where a boundary layer along a plate turns turbulent.
const turnsTurbulent = 5e5

// flatPlate is the mean over a plate: 0.664 Re^(1/2) Pr^(1/3) (Pohlhausen 1921) up to
// 5e5, and beyond (0.037 Re^(4/5) − 871) Pr^(1/3) (Incropera eqs. 7.30 and 7.38), up to
// 1e8. They meet within 0.1 % at 5e5, where the larger takes over.
func flatPlate(re, pr jet) jet {
	nu := root(re).times(0.664)
	if re.v > turnsTurbulent/2 {
		nu = larger(nu, re.pow(4./5).times(0.037).add(-871))
	}
	return nu.mul(pr.pow(1. / 3))
}

// acrossCylinder is Churchill and Bernstein, J. Heat Transfer 99 (1977) 300 (Incropera
// eq. 7.54), Re·Pr > 0.2, up to Re = 1e7; 0.3 at rest.
func acrossCylinder(re, pr jet) jet {
	lead := root(re).mul(pr.pow(1. / 3)).times(0.62).mul(pr.times(1 / 0.4).pow(-2. / 3).add(1).pow(-1. / 4))
	return lead.mul(re.times(1. / 282000).pow(5. / 8).add(1).pow(4. / 5)).add(0.3)
}

// Between these Reynolds numbers flow in a tube is neither laminar nor turbulent:
// Gnielinski, Int. J. Heat Mass Transfer 63 (2013) 134.
const laminarEnds, turbulentBegins = 2300, 4000

// inTube is the mean over a tube of the ratio diameter/length (0: long). Laminar: 3.66 +
// 0.065 Gz/(1 + 0.04 Gz^(2/3)), Gz = Re·Pr·D/L, at a uniform wall temperature (Edwards,
// Denny and Mills 1979; Cengel eq. 8-62). Turbulent: Gnielinski, Int. Chem. Eng. 16
// (1976) 359, with 1 + (D/L)^(2/3) for the entrance, to Re = 5e6. From 2300 to 4000
// straight from the one to the other (Gnielinski 2013).
func inTube(re, pr jet, byLength float64) jet {
	switch {
	case re.v <= laminarEnds:
		return laminarTube(re, pr, byLength)
	case re.v >= turbulentBegins:
		return turbulentTube(re, pr, byLength)
	}
	return ramped(re, laminarTube(jet{v: laminarEnds}, pr, byLength), turbulentTube(jet{v: turbulentBegins}, pr, byLength), laminarEnds, turbulentBegins)
}

func laminarTube(re, pr jet, byLength float64) jet {
	gz := re.mul(pr).times(byLength)
	return gz.times(0.065).over(gz.pow(2. / 3).times(0.04).add(1)).add(3.66)
}

// turbulentTube takes the friction factor of Petukhov (1970), (0.790 ln Re − 1.64)^(−2).
func turbulentTube(re, pr jet, byLength float64) jet {
	f8 := re.log().times(0.790).add(-1.64).pow(-2).times(1. / 8)
	nu := f8.mul(re.add(-1000)).mul(pr).over(f8.pow(1. / 2).mul(pr.pow(2. / 3).add(-1)).times(12.7).add(1))
	return nu.times(1 + math.Pow(byLength, 2./3))
}
