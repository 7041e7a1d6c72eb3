package laplace

import (
	"fmt"
	"math"
	"math/cmplx"
)

// addLaws returns x + y.
func addLaws(x, y Segment) (Segment, string) {
	a, b := x.powers(), y.powers()
	if len(a) < len(b) {
		a, b = b, a
	}
	for k, v := range b {
		a[k] += v
	}
	return law(a, append(append([]Exponential(nil), x.Exp...), y.Exp...)), ""
}

// multiplyLaws returns x·y, or why that is no law of a segment.
func multiplyLaws(x, y Segment) (Segment, string) {
	a, b := trimmed(x.powers()), trimmed(y.powers())
	if d := len(a) + len(b) - 2; d > MaxDegree {
		return Segment{}, fmt.Sprintf("time to the power of %d, and at most %d is kept", d, MaxDegree)
	}
	if x.swings() && len(b) > 1 || y.swings() && len(a) > 1 {
		return Segment{}, "a ramp or a power of time times an exponential or a sine"
	}
	var list []Exponential
	for _, e := range x.Exp {
		list = append(list, Exponential{scale(e.Amplitude, at(b, 0)), e.Rate})
		for _, f := range y.Exp {
			list = append(list, e.times(f)...)
		}
	}
	for _, f := range y.Exp {
		list = append(list, Exponential{scale(f.Amplitude, at(a, 0)), f.Rate})
	}
	if len(a) == 0 || len(b) == 0 {
		return law(nil, list), ""
	}
	return law(times(a, b), list), ""
}

// times returns e·f: Re X·Re Y = ½ Re(X Y) + ½ Re(X Y*).
func (e Exponential) times(f Exponential) []Exponential {
	switch {
	case imag(f.Rate) == 0:
		return []Exponential{{scale(e.Amplitude, real(f.Amplitude)), e.Rate + f.Rate}}
	case imag(e.Rate) == 0:
		return []Exponential{{scale(f.Amplitude, real(e.Amplitude)), e.Rate + f.Rate}}
	}
	half := scale(e.Amplitude, 0.5)
	return []Exponential{
		{half * f.Amplitude, e.Rate + f.Rate},
		{half * cmplx.Conj(f.Amplitude), e.Rate + cmplx.Conj(f.Rate)},
	}
}

func scale(z complex128, k float64) complex128 { return complex(k*real(z), k*imag(z)) }

// raiseLaw returns xⁿ, or why that is no law of a segment.
func raiseLaw(x Segment, n int) (Segment, string) {
	if x.constant() {
		return Segment{A: math.Pow(x.A, float64(n))}, ""
	}
	if n < 0 {
		return Segment{}, "a divisor that moves"
	}
	y := Segment{A: 1}
	for range n {
		var why string
		if y, why = multiplyLaws(y, x); why != "" {
			return y, why
		}
	}
	return y, ""
}

// over returns the segment divided by d.
func (g *Segment) over(d float64) Segment {
	c := g.powers()
	for k := range c {
		c[k] /= d
	}
	var list []Exponential
	for _, e := range g.Exp {
		list = append(list, Exponential{over(e.Amplitude, d), e.Rate})
	}
	return law(c, list)
}

// swings reports that an exponential takes part.
func (g *Segment) swings() bool {
	for _, e := range g.Exp {
		if e.Amplitude != 0 {
			return true
		}
	}
	return false
}

// law returns the segment of the powers c and the exponentials, of equal rates each once
// and with Im ≥ 0; one of rate 0 is a constant.
func law(c []float64, list []Exponential) Segment {
	g := Segment{A: at(c, 0), B: at(c, 1)}
	if c = trimmed(c); len(c) > 2 {
		g.Poly = c[2:]
	}
	for _, e := range list {
		if e.Rate == 0 {
			g.A += real(e.Amplitude)
		} else if e.Amplitude != 0 {
			g.addExponential(e)
		}
	}
	return g
}

func (g *Segment) addExponential(e Exponential) {
	if imag(e.Rate) < 0 {
		e.Amplitude, e.Rate = cmplx.Conj(e.Amplitude), cmplx.Conj(e.Rate)
	}
	for i := range g.Exp {
		if g.Exp[i].Rate == e.Rate {
			g.Exp[i].Amplitude += e.Amplitude
			return
		}
	}
	g.Exp = append(g.Exp, e)
}
