package laplace

import (
	"math"
	"math/cmplx"
)

// A Region is a part of the s-plane that poles are asked to lie in; zero fields ask
// nothing.
type Region struct {
	Decay   float64 // 1/s: Re p ≤ −Decay, faster than exp(−Decay·t)
	Damping float64 // −Re p/|p| ≥ Damping, from 0 to 1: the sector about the negative real axis
	Fastest float64 // rad/s: |p| ≤ Fastest
}

// inside returns how far p lies inside, negative outside: the distance to the nearest
// of the edges asked for, +Inf where none is.
func (r Region) inside(p complex128) float64 {
	d := math.Inf(1)
	if r.Decay != 0 {
		d = min(d, -r.Decay-real(p))
	}
	if r.Damping > 0 {
		// the edge of the sector, a line through 0 at the angle acos(Damping) from the axis
		sin := math.Sqrt((1 - r.Damping) * (1 + r.Damping))
		d = min(d, -real(p)*sin-math.Abs(imag(p))*r.Damping)
	}
	if r.Fastest > 0 {
		d = min(d, r.Fastest-cmplx.Abs(p))
	}
	return d
}

// Judge sorts poles by where they lie: those outside the region, and those of which
// the error bound does not decide it, an edge within their radius or touching it.
// The others are inside.
func (r Region) Judge(poles []Pole) (outside, undecided []Pole) {
	for _, p := range poles {
		switch d := r.inside(p.P); {
		case d < -p.Radius:
			outside = append(outside, p)
		case d < p.Radius:
			undecided = append(undecided, p)
		}
	}
	return outside, undecided
}

// Outside judges the poles left after cancellation. A pole that cancels is not among
// them; judge System.Poles for what the output does not show.
func (h *Transfer) Outside(r Region) (outside, undecided []Pole) { return r.Judge(h.Poles) }
