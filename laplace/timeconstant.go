package laplace

import (
	"math"
	"math/cmplx"
)

// A Lag is one factor of a time-constant form, with its multiplicity:
//
//	1 + T s                        of a real root −1/T (Omega 0); T < 0 on the right
//	1 + 2ζ s/ω + (s/ω)²            of a conjugate pair of modulus ω
type Lag struct {
	T           float64 // s
	Omega, Zeta float64 // rad/s; damping ratio
	Mult        int
}

// TimeConstants is a transfer in time-constant form,
//
//	H(s) = Gain · s^Origin · Π Numerator / Π Denominator,
//
// slowest first. Origin is negative for poles at 0. Gain is H(0) where Origin is 0,
// the rate at which a step is integrated where it is −1.
type TimeConstants struct {
	Gain                   float64
	Origin                 int
	Numerator, Denominator []Lag
}

// TimeConstants returns the transfer in time-constant form, after cancellation.
func (h *Transfer) TimeConstants() TimeConstants {
	var f TimeConstants
	var zerosAt0, polesAt0 int
	f.Numerator, zerosAt0 = lags(h.Zeros)
	f.Denominator, polesAt0 = lags(h.Poles)
	f.Origin = zerosAt0 - polesAt0
	switch {
	case h.Zero:
	case f.Origin == 0 && h.HasGain && h.Gain != 0:
		f.Gain = h.Gain
	default:
		f.Gain = h.Lead() * real(rootRatio(h.Zeros, h.Poles))
	}
	return f
}

// lags turns roots into factors and counts those at 0.
func lags(roots []Pole) (list []Lag, atZero int) {
	for _, p := range roots {
		w := cmplx.Abs(p.P)
		switch {
		case p.P == 0:
			atZero += p.Mult
		case imag(p.P) > 0:
			list = append(list, Lag{Omega: w, Zeta: -real(p.P) / w, Mult: p.Mult})
		case imag(p.P) == 0:
			list = append(list, Lag{T: -1 / real(p.P), Mult: p.Mult})
		}
	}
	return list, atZero
}

// Eval returns H(s).
func (f *TimeConstants) Eval(s complex128) complex128 {
	h := complex(f.Gain, 0)
	for range max(f.Origin, 0) {
		h *= s
	}
	for range max(-f.Origin, 0) {
		h /= s
	}
	for k := range max(len(f.Numerator), len(f.Denominator)) {
		if k < len(f.Numerator) {
			h *= f.Numerator[k].eval(s)
		}
		if k < len(f.Denominator) {
			h /= f.Denominator[k].eval(s)
		}
	}
	return h
}

func (l Lag) eval(s complex128) complex128 {
	x := 1 + complex(l.T, 0)*s
	if l.Omega > 0 {
		q := s / complex(l.Omega, 0)
		x = 1 + complex(2*l.Zeta, 0)*q + q*q
	}
	y := x
	for range l.Mult - 1 {
		y *= x
	}
	return y
}

// A PartialFraction is Coef/(s − Pole)^Power.
type PartialFraction struct {
	Pole  complex128
	Power int
	Coef  complex128
}

// PartialFractions returns H(s) = rate·s + direct + Σ fractions, poles slowest first, powers
// ascending. In the response to an impulse a fraction is Coef·t^(Power−1)·
// exp(Pole·t)/(Power−1)!. Where poles nearly coincide the coefficients are huge and
// cancel: for numbers use Eval, Respond or Frequency, which do not add them up.
func (h *Transfer) PartialFractions() (rate, direct float64, list []PartialFraction) {
	for i, p := range h.Poles {
		for k, c := range h.Residues[i] {
			list = append(list, PartialFraction{p.P, k + 1, c})
		}
	}
	return h.rate, h.direct, list
}

// Eval returns the fraction at s.
func (f PartialFraction) Eval(s complex128) complex128 {
	x := f.Coef
	for range f.Power {
		x /= s - f.Pole
	}
	return x
}

// Impulse returns the fraction's part of the response to an impulse at t ≥ 0 in s; of
// a conjugate pair each member its half.
func (f PartialFraction) Impulse(t float64) float64 {
	x := f.Coef * cexp(f.Pole, t)
	return real(x) * math.Pow(t, float64(f.Power-1)) / math.Gamma(float64(f.Power))
}
