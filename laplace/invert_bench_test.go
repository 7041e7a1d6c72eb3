package laplace

import (
	"fmt"
	"math"
	"math/cmplx"
	"testing"
)

// threeLayers is the flux at the inner face of a wall of three layers after a unit
// step outside, per its final value: 1/(s·B(s)·U), B from the product of the chain
// matrices, each scaled by e^{−q} so that nothing overflows. Element values are
// illustrative.
func threeLayers() func(s complex128) complex128 {
	const inside, outside = 0.13, 0.04
	thick, lambda := [3]float64{0.10, 0.10, 0.15}, [3]float64{0.8, 0.035, 1.7}
	density, heat := [3]float64{1800, 30, 2300}, [3]float64{900, 1400, 900}
	var r, c [3]float64
	sum := inside + outside
	for i := range r {
		r[i], c[i] = thick[i]/lambda[i], thick[i]*density[i]*heat[i]
		sum += r[i]
	}
	u := complex(1/sum, 0)
	return func(s complex128) complex128 {
		a, b := complex128(1), complex128(outside)
		var exponent complex128
		for i := range r {
			q := cmplx.Sqrt(s * complex(r[i]*c[i], 0))
			e := cmplx.Exp(-2 * q)
			ch, sh := 0.5*(1+e), 0.5*(1-e)
			a, b = a*ch+b*(q*sh*complex(1/r[i], 0)), a*(complex(r[i], 0)*sh/q)+b*ch
			exponent += q
		}
		b += a * inside
		return cmplx.Exp(-exponent) / (s * b * u)
	}
}

// wallTimes are n times from 600 s to 100 h, evenly spaced in ln t.
func wallTimes(n int) []float64 {
	t := make([]float64, n)
	for i := range t {
		t[i] = 600 * math.Pow(600, float64(i)/float64(n-1))
	}
	return t
}

// TestWall compares with a contour of 44 points in quadruple precision.
func TestWall(t *testing.T) {
	times := wallTimes(10000)
	out, err := Invert(threeLayers(), times, InvertOptions{Tolerance: 1e-10})
	if err != nil {
		t.Fatal(err)
	}
	want := map[int]float64{0: 4.4330192469323982e-34, 2801: 8.3150151479975568e-07, 5000: 0.026929016603326465, 9999: 0.99917114752351033}
	for i, y := range want {
		if e := out[i]; !(math.Abs(e.Y-y) <= 2e-13) || !e.Trusted {
			t.Errorf("at %g s: %+v, want %g", times[i], e, y)
		}
	}
	for i, e := range out {
		if !e.Trusted || e.Error > 1e-10 {
			t.Fatalf("at %g s: %+v", times[i], e)
		}
	}
}

func BenchmarkInvert(b *testing.B) {
	for _, n := range []int{1, 100, 10000} {
		b.Run(fmt.Sprintf("wall/times=%d", n), func(b *testing.B) {
			F, t := threeLayers(), wallTimes(max(n, 2))[:n]
			evaluations := 0
			counted := func(s complex128) complex128 { evaluations++; return F(s) }
			for b.Loop() {
				evaluations = 0
				if _, err := Invert(counted, t, InvertOptions{Tolerance: 1e-10}); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(evaluations), "F/op")
		})
	}
}
