package thermal

import "math"

// Natural convection: what a correlation makes of the Rayleigh number. All hold for
// either sign of the difference, and end at zero difference in a value that is finite.

// verticalPlate is Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1323, for
// laminar and turbulent flow (Incropera eq. 9.26): 0.1 < Ra < 1e12.
func verticalPlate(ra, pr jet) jet {
	return sixthRoot(ra).mul(prandtlFactor(pr, 0.6710121288438785)).times(0.387).add(0.825).squared() // 0.492^(9/16)
}

// prandtlFactor is (1 + c·Pr^(−9/16))^(−8/27).
func prandtlFactor(pr jet, c float64) jet { return pr.pow(-9. / 16).times(c).add(1).pow(-8. / 27) }

func sixthRoot(ra jet) jet {
	if ra.v == 0 {
		return jet{}
	}
	v := math.Sqrt(math.Cbrt(ra.v))
	return ra.through(v, v/(6*ra.v))
}

// verticalCylinder adds to the plate what curvature does, 0.97·H/D: VDI-Wärmeatlas, F2
// (2013), from memory.
func verticalCylinder(ra, pr jet, height, diameter float64) jet {
	return verticalPlate(ra, pr).add(0.97 * height / diameter)
}

// horizontalCylinder is Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1049
// (Incropera eq. 9.34): Ra < 1e12.
func horizontalCylinder(ra, pr jet) jet {
	return sixthRoot(ra).mul(prandtlFactor(pr, 0.7209732340347785)).times(0.387).add(0.60).squared() // 0.559^(9/16)
}

// still is the Nusselt number of one side of a disc in air that does not move, with
// area/perimeter for its length: 4·k·r carries the heat, so 2/π (Carslaw and Jaeger,
// Conduction of Heat in Solids, 1959, 8.2).
const still = 2 / math.Pi

// Where the two formulas of a plate facing up are eased into each other: 10^6.5 and 10^7.5.
const blendFrom, blendTo = 3162277.66, 31622776.6

// plateUp is a hot plate that faces up, or a cold one that faces down: 0.54 Ra^(1/4) up to
// 1e7, 0.15 Ra^(1/3) up to 1e11 (McAdams 1954; Lloyd and Moran, J. Heat Transfer 96
// (1974) 443; Incropera 6th ed., eqs. 9.30 and 9.31), its length area/perimeter. The
// two differ by 6 % at 1e7: they are eased into each other between 10^6.5 and 10^7.5.
func plateUp(ra jet) jet {
	nu := eased(ra, ra.pow(1./4).times(0.54), ra.pow(1./3).times(0.15), blendFrom, blendTo)
	return joined(nu, jet{v: still}, 10)
}

// plateDown is a hot plate that faces down, or a cold one that faces up: 0.27 Ra^(1/4)
// (McAdams 1954; Incropera 6th ed., eq. 9.32), 1e5 < Ra < 1e10.
func plateDown(ra jet) jet {
	return joined(ra.pow(1./4).times(0.27), jet{v: still}, 10)
}

// uprightGap is a layer of air between upright walls: the largest of three, ElSherbiny,
// Raithby and Hollands, J. Heat Transfer 104 (1982) 96, for height/gap of 5 to 110 (from
// memory). Its length is the gap; 1 where the air stands still.
func uprightGap(ra jet, heightByGap float64) jet {
	const n, turn = 1.36, 147244.7871498523 // 6310^n
	r := ra.pow(0.293 + n).over(ra.pow(n).add(turn)).times(0.104)
	nu := r.pow(3).add(1).pow(1. / 3)
	nu = larger(nu, ra.pow(1./3).times(0.0605))
	return larger(nu, ra.times(1/heightByGap).pow(0.272).times(0.242))
}

// layerBelow is a flat layer of air heated from below: Hollands, Raithby and Konicek,
// Int. J. Heat Mass Transfer 18 (1975) 879, the form of Hollands et al., J. Heat Transfer
// 98 (1976) 189, without tilt; up to Ra = 1e8. Heated from above it stands still: 1.
func layerBelow(ra jet) jet {
	nu := jet{v: 1}
	if ra.v > 1708 {
		nu = nu.plus(ra.pow(-1).times(-1708).add(1).times(1.44))
	}
	if ra.v > 5830 {
		nu = nu.plus(ra.times(1. / 5830).pow(1. / 3).add(-1))
	}
	return nu
}
