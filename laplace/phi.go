package laplace

import "math"

// The response of one mode z' = p z + u from rest to u = 1 is f1 = τ·φ₁(pτ), to
// u = τ it is f2 = τ²·φ₂(pτ), with φ₁(x) = (eˣ − 1)/x and φ₂(x) = (φ₁(x) − 1)/x.
// Both are formed without the cancellation that a slow pole would bring to
// "constant minus exponential", and a pole at 0 needs no case of its own.

// phi1 returns exp(pτ) and f1 of a real mode.
func phi1(p, tau float64) (e, f1 float64) {
	x := p * tau
	if x < -0.5 || x > 0.5 {
		e = math.Exp(x)
		return e, (e - 1) / p
	}
	if x < 1e-8 && x > -1e-8 { // also where x has underflowed
		return 1 + x, tau * (1 + x/2)
	}
	m := math.Expm1(x)
	return 1 + m, m / p
}

// phi2 returns f2 of a real mode; f1 is what phi1 gave.
func phi2(p, tau, f1 float64) float64 {
	x := p * tau
	if x < -0.5 || x > 0.5 {
		return (f1 - tau) / p
	}
	s := 0.0
	for k := len(invFactorial) - 1; k >= 2; k-- {
		s = s*x + invFactorial[k]
	}
	return tau * tau * s
}

// invFactorial holds 1/k!, enough for φ₂ to the last digit at |x| ≤ 0.5.
var invFactorial = [...]float64{1, 1, 1.0 / 2, 1.0 / 6, 1.0 / 24, 1.0 / 120, 1.0 / 720, 1.0 / 5040, 1.0 / 40320,
	1.0 / 362880, 1.0 / 3628800, 1.0 / 39916800, 1.0 / 479001600, 1.0 / 6227020800, 1.0 / 87178291200}

// cphi1 is phi1 for a complex pole. The imaginary part of f1 keeps its own
// relative accuracy where that of p is small: a pair that is nearly critically
// damped has weights as large as its imaginary part is small.
func cphi1(p complex128, tau float64) (e, f1 complex128) {
	x, y := real(p)*tau, imag(p)*tau
	if math.Abs(x)+math.Abs(y) < 0.5 {
		s := cseries(complex(x, y), 1)
		z := complex(x, y)
		return 1 + z*s, complex(tau*real(s), tau*imag(s))
	}
	sin, cos := math.Sincos(y)
	ex := math.Exp(x)
	m := math.Expm1(x)
	h := math.Sin(y / 2)
	em := complex(m*cos-2*h*h, ex*sin) // exp(x+iy) − 1
	return complex(ex*cos, ex*sin), em / p
}

// cphi2 is phi2 for a complex pole.
func cphi2(p complex128, tau float64, f1 complex128) complex128 {
	x, y := real(p)*tau, imag(p)*tau
	if math.Abs(x)+math.Abs(y) < 0.5 {
		s := cseries(complex(x, y), 2)
		return complex(tau*tau*real(s), tau*tau*imag(s))
	}
	return (f1 - complex(tau, 0)) / p
}

// cseries returns φ_k(z) for small z.
func cseries(z complex128, k int) complex128 {
	var s complex128
	for j := len(invFactorial) - 1; j >= k; j-- {
		s = s*z + complex(invFactorial[j], 0)
	}
	return s
}

// divided returns D = (exp(sτ) − exp(pτ))/(s − p), the response from rest of a
// mode p to exp(sτ), right at and near resonance too.
func divided(s, p complex128, tau float64) complex128 {
	d := s - p
	if real(d) > 0 {
		p, d = s, -d
	}
	_, f1 := cphi1(d, tau)
	return cexp(p, tau) * f1
}
