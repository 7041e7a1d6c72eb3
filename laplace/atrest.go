package laplace

import (
	"math"
	"math/cmplx"
)

const (
	restNoise = 4 * epsilon // of the sum of |parts| of H(0): below it H(0) is their rounding
	restZero  = 1e-12       // of the slowest pole: a zero nearer to 0 than that may be one at 0
)

// settleAtRest makes a gain of 0 exactly 0 where the numbers of the system are too
// rounded to say so: where massless nodes have been eliminated the flow into a dead end,
// which is 0 at rest, comes out as some 1e-17, and every share of it as nonsense. Two
// signs are asked for, that H(0) is the rounding of what it is added up from and that a
// zero lies next to 0.
func (h *Transfer) settleAtRest(sub *System) {
	if !h.HasGain || len(h.Poles) == 0 {
		return
	}
	near := -1
	for i, z := range h.Zeros {
		if imag(z.P) == 0 && cmplx.Abs(z.P) <= restZero*cmplx.Abs(h.Poles[0].P) {
			near = i
			break
		}
	}
	if near < 0 || math.Abs(h.Gain) > restNoise*h.sizeOfRest(sub) {
		return
	}
	h.Gain, h.Zeros[near].P, h.Zeros[near].Radius = 0, 0, 0
	if len(h.Numerator) > 0 {
		h.Numerator[0] = 0
	}
}

// sizeOfRest returns what H(0) is added up from: the shares of the stores and, where flows
// have inertia and the elimination subtracts, those of the poles.
func (h *Transfer) sizeOfRest(sub *System) float64 {
	size := sub.sizeAtRest()
	if sub.plant.coupled() {
		size = max(size, 4*h.size())
	}
	return size
}

// sizeAtRest returns the sum of |parts| of the stores in H(0) of a system with one input
// and one output, 0 where its stores have no level at rest.
func (s *System) sizeAtRest() float64 {
	at := s.atRest()
	if at == nil {
		return 0
	}
	size := math.Abs(s.d[0][0])
	for i, v := range at(s.b[0]) {
		size += math.Abs(s.c[0][i] * v)
	}
	return size
}
