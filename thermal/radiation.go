package thermal

import "math"

// stefanBoltzmann is σ in W/(m²·K⁴), exact in the SI of 2019 to the digits given: CODATA
// recommended values 2018 (Tiesinga, Mohr, Newell, Taylor, Rev. Mod. Phys. 93, 025010, 2021).
const stefanBoltzmann = 5.670374419e-8

// radiant is the heat by radiation between two levels in K, k·(T_a⁴ − T_b⁴), where k is
// σ times the area times what emissivities and view factor leave of it.
type radiant struct {
	k    float64 // W/K⁴
	area float64 // m², of the first surface: the coefficient belongs to it
}

// Between these levels radiation follows the fourth power; below it goes on oddly and above
// along its tangent, so that a search for a steady state may pass through what no body has.
const hottest = 1e5 // K

// Flow implements network.Flow.
func (r *radiant) Flow(a, b float64) (q, da, db float64) {
	if ordinary(a) && ordinary(b) {
		// of the difference, which keeps its digits between levels close together
		return r.k * (a - b) * cubes(a, b), 4 * r.k * a * a * a, -4 * r.k * b * b * b
	}
	fa, dfa := fourth(a)
	fb, dfb := fourth(b)
	return r.k * (fa - fb), r.k * dfa, -r.k * dfb
}

// Coefficient is h_r = q/(A·(T_a − T_b)) in W/(m²·K), with its derivatives.
func (r *radiant) Coefficient(a, b float64) (h, da, db float64) {
	a, b = math.Min(math.Max(a, 0), hottest), math.Min(math.Max(b, 0), hottest)
	k := r.k / r.area
	return k * cubes(a, b), k * (3*a*a + 2*a*b + b*b), k * (a*a + 2*a*b + 3*b*b)
}

func ordinary(x float64) bool { return x >= 0 && x <= hottest }

// cubes is (a⁴ − b⁴)/(a − b).
func cubes(a, b float64) float64 { return (a + b) * (a*a + b*b) }

// fourth is x³·|x| with its derivative, straight beyond hottest.
func fourth(x float64) (y, dy float64) {
	size := math.Abs(x)
	if size <= hottest {
		return x * size * size * size, 4 * size * size * size
	}
	const cube = hottest * hottest * hottest
	return math.Copysign(hottest*cube+4*cube*(size-hottest), x), 4 * cube
}
