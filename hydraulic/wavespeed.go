package hydraulic

import "math"

// How a pipe is held along its axis, which decides how much its wall gives way.
const (
	anchoredUpstream   = "upstream"
	anchoredThroughout = "throughout"
	expansionJoints    = "expansion joints"
)

// thickWall is the ratio of bore to wall below which a wall counts as thick.
const thickWall = 25

// giving is c₁, by which the hoop strain bore/(E·wall) of a pipe is multiplied (Wylie
// and Streeter, Fluid Transients in Systems, 1993, section 1-4: thin walls 1 − ν/2,
// 1 − ν² and 1, thick ones below a ratio of 25 of bore to wall). A pipe of which the case
// does not say how it is held has 1, the plain formula of Korteweg.
func giving(restraint string, bore, wall, poisson float64) float64 {
	var thin float64
	switch restraint {
	case anchoredUpstream:
		thin = 1 - poisson/2
	case anchoredThroughout:
		thin = 1 - poisson*poisson
	case expansionJoints:
		thin = 1
	default:
		return 1
	}
	if bore/wall >= thickWall {
		return thin
	}
	return 2*wall/bore*(1+poisson) + bore/(bore+wall)*thin
}

// waveSpeed is the speed in m/s of a pressure wave in a liquid of density ρ whose own
// compressibility and that of the wall add up, both in 1/Pa.
func waveSpeed(density, liquid, wall float64) float64 {
	return math.Sqrt(1 / (density * (liquid + wall)))
}
