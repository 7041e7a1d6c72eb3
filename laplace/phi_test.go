package laplace

import (
	"math"
	"math/big"
	"math/cmplx"
	"testing"
)

// series sums Σ x^k/(k+shift)! with 200 bits.
func series(re, im float64, shift int) complex128 {
	num := func(v float64) *big.Float { return new(big.Float).SetPrec(400).SetFloat64(v) }
	mul := func(a, b *big.Float) *big.Float { return new(big.Float).SetPrec(400).Mul(a, b) }
	x, y := num(re), num(im)
	tr, ti := num(1), num(0)
	for k := 1; k <= shift; k++ {
		tr.Quo(tr, num(float64(k)))
	}
	sr, si := num(0), num(0)
	for k := 1; k < 400; k++ {
		sr.Add(sr, tr)
		si.Add(si, ti)
		a := new(big.Float).SetPrec(400).Sub(mul(tr, x), mul(ti, y))
		b := new(big.Float).SetPrec(400).Add(mul(tr, y), mul(ti, x))
		tr, ti = a.Quo(a, num(float64(k+shift))), b.Quo(b, num(float64(k+shift)))
	}
	r, _ := sr.Float64()
	i, _ := si.Float64()
	return complex(r, i)
}

// φ₁ and φ₂ have full relative accuracy at every x, the imaginary part of a nearly
// real x on its own.
func TestPhi(t *testing.T) {
	for _, x := range []float64{-30, -3, -0.51, -0.5, -0.3, -1e-5, -1e-12, 0, 1e-300, 1e-9, 0.2, 0.5, 0.6, 4, 20} {
		const tau = 0.25
		e, f1 := phi1(x/tau, tau)
		f2 := phi2(x/tau, tau, f1)
		near(t, "exp", e, real(series(x, 0, 0)), 4e-16)
		near(t, "φ₁", f1, tau*real(series(x, 0, 1)), 4e-16)
		near(t, "φ₂", f2, tau*tau*real(series(x, 0, 2)), 2e-15)
		for _, y := range []float64{1e-9, 1e-3, 0.4, 2, 11} {
			p := complex(x/tau, y/tau)
			ce, c1 := cphi1(p, tau)
			c2 := cphi2(p, tau, c1)
			for k, v := range []complex128{ce, c1 / tau, c2 / (tau * tau)} {
				want := series(x, y, k)
				if cmplx.Abs(v-want) > 3e-15*cmplx.Abs(want) {
					t.Errorf("φ%d(%g%+gi) is %v, want %v", k, x, y, v, want)
				}
				if y < 0.01 && math.Abs(imag(v)-imag(want)) > 1e-14*math.Abs(imag(want)) {
					t.Errorf("Im φ%d(%g%+gi) is %v, want %v", k, x, y, imag(v), imag(want))
				}
			}
		}
	}
}

func TestDivided(t *testing.T) {
	for _, s := range []complex128{-1, -1 + 1e-12i, 2i, 0, 3, -400} {
		for _, p := range []complex128{-1, -1 - 1e-9, -2 + 1i, 0.5, -1e6} {
			const tau = 0.75
			got := divided(s, p, tau)
			if mirrored := divided(p, s, tau); cmplx.Abs(got-mirrored) > 1e-15*cmplx.Abs(got) {
				t.Errorf("D(%v, %v) is %v, turned round %v", s, p, got, mirrored)
			}
			if d := s - p; cmplx.Abs(d) > 0.1 {
				want := (cmplx.Exp(s*tau) - cmplx.Exp(p*tau)) / d
				if cmplx.Abs(got-want) > 1e-14*cmplx.Abs(want) {
					t.Errorf("D(%v, %v) is %v, want %v", s, p, got, want)
				}
			}
		}
	}
}
