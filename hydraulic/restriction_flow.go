package hydraulic

import "math"

// leastCore is the narrowest drop below which a flow goes straight through zero, 1 Pa or
// a tenth of a millimetre of water: nobody sees it, and a flow of the square root of the drop
// would have an infinite slope there, which takes more digits than a pressure has.
const leastCore = 1

// A powerFlow is q = k·sign(Δ)·|Δ|^(1/n) with a core in which it is proportional:
//
//	q = k·Δ·(Δ² + core²)^((1/n − 1)/2)
//
// smooth everywhere, odd, rising, and off the power by no more than (core/Δ)²·(1 − 1/n)/2
// of the flow: 1e-6 from 500 times the core on where n is 2.
type powerFlow struct {
	k    float64 // m³/(s·Pa^(1/n))
	core float64 // Pa, > 0
	n    float64 // 2 where the drop goes by the square of the flow, 1 where it is proportional
}

// across returns the flow at the drop d, and its derivative.
func (l *powerFlow) across(d float64) (q, dq float64) {
	size := math.Hypot(d, l.core)
	f := l.k
	switch l.n {
	case 1:
	case 2:
		f /= math.Sqrt(size)
	default:
		f *= math.Pow(size, 1/l.n-1)
	}
	d1, c1 := d/size, l.core/size
	return f * d, f * (d1*d1/l.n + c1*c1)
}

// Flow implements network.Flow.
func (l *powerFlow) Flow(a, b float64) (q, da, db float64) {
	q, d := l.across(drop(a, b))
	return q, d, -d
}

// drop is a − b, kept finite.
func drop(a, b float64) float64 {
	const most = 1e300
	return min(max(a-b, -most), most)
}

// A twoWay is a passage that resists one way otherwise than the other. Both have the
// same slope at zero, so that the whole is smooth there.
type twoWay struct {
	forth, back powerFlow
}

// Flow implements network.Flow.
func (l *twoWay) Flow(a, b float64) (q, da, db float64) {
	way := &l.forth
	if a < b {
		way = &l.back
	}
	return way.Flow(a, b)
}

// creep is the laminar coefficient δ of a sharp round opening, with which its coefficient
// of discharge is δ·√Re as long as the flow creeps (Merritt, Hydraulic Control Systems,
// 1967, section 3.4, value from memory): the flow is then 2·δ²·D·A/µ times the drop.
const creep = 0.2

// creeping is that slope in m³/(s·Pa) for an opening of the area a in m², of the diameter
// of a circle of it; infinite where the viscosity (Pa·s) is not known.
func creeping(a, viscosity float64) float64 {
	if viscosity == 0 {
		return math.Inf(1)
	}
	return 2 * creep * creep * math.Sqrt(4*a/math.Pi) * a / viscosity
}

// rooted is q = k·√Δ with the core in which an opening of that area creeps.
func rooted(k, area, viscosity float64) powerFlow {
	return withSlope(k, min(k/math.Sqrt(leastCore), creeping(area, viscosity)))
}

// withSlope is q = k·√Δ with that slope at zero, in m³/(s·Pa).
func withSlope(k, slope float64) powerFlow { return powerFlow{k, (k / slope) * (k / slope), 2} }

// straight is q = Δ/r.
func straight(r float64) powerFlow { return powerFlow{1 / r, leastCore, 1} }

// settled is how far a drop between the pressures a and b must fall below that at which a
// way opens before it shuts, in Pa: some errors of a march, whose share of a value is a
// third of this.
func settled(a, b float64) float64 { return 1e-3 + 3e-7*math.Max(math.Abs(a), math.Abs(b)) }
