package laplace

import "math/cmplx"

// integral returns ∫ y dτ over the whole piece, by the φ-functions of one order
// more: nothing is summed from samples, and a pole at 0 is no case of its own.
func (c *curve) integral() float64 {
	h := c.length
	y := h * (c.base + c.slope*h/2)
	for i := range c.real {
		t := &c.real[i]
		_, f1 := phi1(t.p, h)
		f2 := phi2(t.p, h, f1)
		y += t.h*f1 + t.a*f2
		if t.b != 0 {
			y += t.b * phi3(t.p, h, f2)
		}
	}
	for i := range c.pair {
		t := &c.pair[i]
		_, f1 := cphi1(t.p, h)
		f2 := cphi2(t.p, h, f1)
		y += real(t.h*f1 + t.a*f2 + t.b*cphi3(t.p, h, f2))
	}
	for i := range c.forced {
		t := &c.forced[i]
		y += real(t.k * dividedIntegral(t.s, t.p, h))
	}
	for i := range c.direct {
		_, f1 := cphi1(c.direct[i].Rate, h)
		y += real(c.direct[i].Amplitude * f1)
	}
	for i := range c.block {
		y += c.block[i].integral(h)
	}
	if c.degree > 1 {
		y += c.bentIntegral()
	}
	return y
}

// integral returns out·∫z dτ = out·(τφ₁z + τ²φ₂a + τ³φ₃b). φ₃b is what φ₂ of the
// block bordered by b holds in its last column (Sidje 1998).
func (t *blockTerm) integral(h float64) float64 {
	n := t.q.n
	t.w.at(n, t.q.t, h)
	y := h * (t.dot(t.w.p1, t.q.z) + h*t.dot(t.w.p2, t.q.a))
	if allZero(t.q.b) {
		return y
	}
	m := n + 1
	bordered := make([]float64, m*m)
	for i := range n {
		copy(bordered[i*m:], t.q.t[i*n:(i+1)*n])
		bordered[i*m+n] = t.q.b[i]
	}
	w := newBlockWork(m)
	w.at(m, bordered, h)
	for i, o := range t.out {
		y += o * h * h * w.p2[i*m+n]
	}
	return y
}

// phi3 returns f3 = τ³·φ₃(pτ), the integral of f2, with f2 from phi2.
func phi3(p, tau, f2 float64) float64 {
	x := p * tau
	if x < -0.5 || x > 0.5 {
		return (f2 - tau*tau/2) / p
	}
	s := 0.0
	for k := len(invFactorial) - 1; k >= 3; k-- {
		s = s*x + invFactorial[k]
	}
	return tau * tau * tau * s
}

// cphi3 is phi3 for a complex pole.
func cphi3(p complex128, tau float64, f2 complex128) complex128 {
	if abs1(p)*tau < 0.5 {
		return complex(tau*tau*tau, 0) * cseries(complex(real(p)*tau, imag(p)*tau), 3)
	}
	return (f2 - complex(tau*tau/2, 0)) / p
}

// dividedIntegral returns the integral of D(s, p) over [0, τ]; of the two ways to
// write it, the one that divides by the larger rate.
func dividedIntegral(s, p complex128, tau float64) complex128 {
	if cmplx.Abs(s) < cmplx.Abs(p) {
		s, p = p, s
	}
	if cmplx.Abs(s)*tau < 0.5 { // Σ τ^(n+2)/(n+2)! h_n, h_n the sum of all products of n rates
		x, y := s*complex(tau, 0), p*complex(tau, 0)
		var sum complex128
		h, power := complex(1, 0), complex(1, 0)
		for n := 2; n < len(invFactorial); n++ {
			sum += h * complex(invFactorial[n], 0)
			power *= y
			h = x*h + power
		}
		return complex(tau*tau, 0) * sum
	}
	_, f1 := cphi1(p, tau)
	return (divided(s, p, tau) - f1) / s
}
