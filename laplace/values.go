package laplace

import "math/cmplx"

// Lead returns lim s^r·H(s) for s → ∞ with r the relative degree: the ratio of the
// leading coefficients, by which the response to a step begins as Lead·t^r/r!. It is
// found from H itself far above the corners; 0 where H is identically zero.
func (h *Transfer) Lead() float64 {
	switch {
	case h.Zero:
		return 0
	case h.rate != 0:
		return h.rate
	case h.RelativeDegree == 0:
		return h.direct
	}
	r, err := h.Frequency()
	if err != nil {
		return h.leadOfRoots()
	}
	return r.lead()
}

// lead compares H with the product of its roots at one frequency.
func (r *FrequencyResponse) lead() float64 {
	omega := 1.0
	if c := r.h.Corners(); len(c) > 0 {
		omega = 0.37 * c[0].Omega
	}
	s := complex(0, omega)
	x := r.At(omega).H
	p, z := r.h.Poles, r.h.Zeros
	for k := range max(len(p), len(z)) {
		if k < len(p) {
			x *= cmplx.Pow(s-p[k].P, complex(float64(p[k].Mult), 0))
		}
		if k < len(z) {
			x /= cmplx.Pow(s-z[k].P, complex(float64(z[k].Mult), 0))
		}
	}
	return real(x)
}

// leadOfRoots is Lead from the gain at rest.
func (h *Transfer) leadOfRoots() float64 { return h.Gain / real(rootRatio(h.Zeros, h.Poles)) }

// Initial returns the value of the response to a unit step from rest at t = 0⁺, and
// its slope there in 1/s: the theorem of the initial value, lim s·H(s)/s for s → ∞.
// Both come from the equations, D and C·B, not from a limit taken in numbers. Of an
// improper transfer they are what follows the impulse.
func (h *Transfer) Initial() (value, slope float64) {
	value = h.direct
	if h.system == nil {
		return value, 0
	}
	if h.RelativeDegree > 1 { // by structure, whatever the rounding
		return value, 0
	}
	_, rates, err := h.system.plant.matrix(h.system.b[0])
	if err != nil {
		panic("laplace: equations that were taken apart have no matrix")
	}
	return value, dot(h.system.c[0], rates)
}

// Final returns the limit of the response to a unit step for t → ∞, which is H(0)
// where every pole left lies to the left of the imaginary axis by more than its error
// bound. It is false where the response does not settle: the theorem of the final
// value does not hold there, although H(0) may exist.
func (h *Transfer) Final() (float64, bool) {
	if !h.HasGain || !h.stable() {
		return 0, false
	}
	return h.Gain, true
}
