package network

import (
	"math"
	"math/cmplx"

	"lagbook/laplace"
)

// A course is what a waveform does in one stretch of time: one of its segments.
type course struct {
	start, a, b float64
	poly        []float64 // of τ², τ³, …
	exp         []laplace.Exponential
}

// courseOf returns the segment in force around t, an instant that is no break.
func courseOf(w *laplace.Waveform, t float64) course {
	if t < 0 || len(w.Segments) == 0 {
		return course{a: w.Before}
	}
	first, n := w.Segments[0].At, 0.0
	if w.Period > 0 {
		first = w.Segments[w.Repeat].At
		if t >= first {
			n = math.Floor((t - first) / w.Period)
		}
	}
	for k := len(w.Segments) - 1; k >= 0; k-- {
		g := &w.Segments[k]
		start := g.At
		if n > 0 {
			start = first + n*w.Period + (g.At - first) // as laplace reckons the breaks
		}
		if start <= t || k == 0 || n > 0 && k == w.Repeat {
			return course{start, g.A, g.B, g.Poly, g.Exp}
		}
	}
	return course{}
}

func (c *course) constant() bool {
	for _, e := range c.exp {
		if e.Amplitude != 0 {
			return false
		}
	}
	for _, p := range c.poly {
		if p != 0 {
			return false
		}
	}
	return c.b == 0
}

// at returns the value at t.
func (c *course) at(t float64) float64 {
	tau := t - c.start
	v := c.a + c.b*tau
	if len(c.poly) > 0 {
		v += tau * tau * c.powers(tau, func(int) float64 { return 1 })
	}
	for _, e := range c.exp {
		v += real(e.Amplitude * cmplx.Exp(e.Rate*complex(tau, 0)))
	}
	return v
}

// rate returns the derivative at t.
func (c *course) rate(t float64) float64 {
	v := c.b
	if len(c.poly) > 0 {
		v += (t - c.start) * c.powers(t-c.start, func(k int) float64 { return float64(k) })
	}
	for _, e := range c.exp {
		v += real(e.Amplitude * e.Rate * cmplx.Exp(e.Rate*complex(t-c.start, 0)))
	}
	return v
}

// bend returns the second derivative at t.
func (c *course) bend(t float64) float64 {
	v := 0.0
	if len(c.poly) > 0 {
		v += c.powers(t-c.start, func(k int) float64 { return float64(k * (k - 1)) })
	}
	for _, e := range c.exp {
		v += real(e.Amplitude * e.Rate * e.Rate * cmplx.Exp(e.Rate*complex(t-c.start, 0)))
	}
	return v
}

// powers returns Σ weight(k)·c_k·τ^(k−2) over the powers k ≥ 2.
func (c *course) powers(tau float64, weight func(k int) float64) float64 {
	v := 0.0
	for i := len(c.poly) - 1; i >= 0; i-- {
		v = v*tau + weight(i+2)*c.poly[i]
	}
	return v
}

// most returns a bound of the absolute value over [t0, t1].
func (c *course) most(t0, t1 float64) float64 {
	v := max(math.Abs(c.a+c.b*(t0-c.start)), math.Abs(c.a+c.b*(t1-c.start)))
	tau := max(math.Abs(t0-c.start), math.Abs(t1-c.start))
	for k, p := range c.poly {
		v += math.Abs(p) * math.Pow(tau, float64(k+2))
	}
	for _, e := range c.exp {
		v += cmplx.Abs(e.Amplitude) * max(math.Exp(real(e.Rate)*(t0-c.start)), math.Exp(real(e.Rate)*(t1-c.start)))
	}
	return v
}
