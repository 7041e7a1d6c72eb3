package laplace

import (
	"encoding/json"
	"math"
	"math/cmplx"
	"os"
	"testing"
)

// distributedCase is an entry of testdata/distributed.json; sources are in it.
type distributedCase struct {
	ID, Title, F string
	T            []float64
	Y            []float64    `json:"f"`
	Jumps        [][3]float64 // t, left, right
	Values       [][4]float64 // Re s, Im s, Re F, Im F
}

func loadDistributed(t testing.TB) []distributedCase {
	t.Helper()
	b, err := os.ReadFile("testdata/distributed.json")
	if err != nil {
		t.Fatal(err)
	}
	var f struct{ Cases []distributedCase }
	if err := json.Unmarshal(b, &f); err != nil {
		t.Fatal(err)
	}
	return f.Cases
}

// sech and tanh in forms that do not overflow; both are even or odd, so that the
// root's sign does not matter where they are used.
func sech(q complex128) complex128 {
	if real(q) < 0 {
		q = -q
	}
	e := cmplx.Exp(-q)
	return 2 * e / (1 + e*e)
}

func tanhOf(q complex128) complex128 {
	sign := complex128(1)
	if real(q) < 0 {
		q, sign = -q, -1
	}
	e := cmplx.Exp(-2 * q)
	return sign * (1 - e) / (1 + e)
}

// friction is sqrt(s(s+0.6)) with its cut on [−0.6, 0].
func friction(s complex128) complex128 { return s * cmplx.Sqrt(1+0.6/s) }

// transforms are the formulas of testdata/distributed.json.
var transforms = map[string]func(s complex128) complex128{
	"1/(s*cosh(sqrt(s)))":                   func(s complex128) complex128 { return sech(cmplx.Sqrt(s)) / s },
	"1/cosh(sqrt(s))":                       func(s complex128) complex128 { return sech(cmplx.Sqrt(s)) },
	"tanh(sqrt(s))/sqrt(s)":                 func(s complex128) complex128 { return tanhOf(cmplx.Sqrt(s)) / cmplx.Sqrt(s) },
	"coth(sqrt(s))/(s*sqrt(s))":             func(s complex128) complex128 { return 1 / (tanhOf(cmplx.Sqrt(s)) * s * cmplx.Sqrt(s)) },
	"1/(s*sqrt(s))":                         func(s complex128) complex128 { return 1 / (s * cmplx.Sqrt(s)) },
	"1/sqrt(s)":                             func(s complex128) complex128 { return 1 / cmplx.Sqrt(s) },
	"exp(-sqrt(s))/s":                       func(s complex128) complex128 { return cmplx.Exp(-cmplx.Sqrt(s)) / s },
	"exp(-sqrt(s))":                         func(s complex128) complex128 { return cmplx.Exp(-cmplx.Sqrt(s)) },
	"1/(s*(1+sqrt(s)))":                     func(s complex128) complex128 { return 1 / (s * (1 + cmplx.Sqrt(s))) },
	"sqrt(s+2)*tanh(sqrt(s+2))/s":           func(s complex128) complex128 { q := cmplx.Sqrt(s + 2); return q * tanhOf(q) / s },
	"exp(-sqrt(s+2))/s":                     func(s complex128) complex128 { return cmplx.Exp(-cmplx.Sqrt(s+2)) / s },
	"sqrt(s+0.5)/s":                         func(s complex128) complex128 { return cmplx.Sqrt(s+0.5) / s },
	"1/sqrt(s+0.5)":                         func(s complex128) complex128 { return 1 / cmplx.Sqrt(s+0.5) },
	"1/(s*cosh(s))":                         func(s complex128) complex128 { return sech(s) / s },
	"tanh(s)/s":                             func(s complex128) complex128 { return tanhOf(s) / s },
	"exp(-sqrt(s*(s+0.6)))/s":               func(s complex128) complex128 { return cmplx.Exp(-friction(s)) / s },
	"exp(-sqrt(s*(s+0.6)))/sqrt(s*(s+0.6))": func(s complex128) complex128 { return cmplx.Exp(-friction(s)) / friction(s) },
	"exp(-s)/(s+1)":                         func(s complex128) complex128 { return cmplx.Exp(-s) / (s + 1) },
	"exp(-s)/(s*(s+1))":                     func(s complex128) complex128 { return cmplx.Exp(-s) / (s * (s + 1)) },
	"1/sqrt(s^2+1)":                         func(s complex128) complex128 { return 1 / cmplx.Sqrt(s*s+1) },
	"1/(s+0.5)":                             func(s complex128) complex128 { return 1 / (s + 0.5) },
	"1/((s+0.2)^2+1)":                       func(s complex128) complex128 { return 1 / ((s+0.2)*(s+0.2) + 1) },
	"1/s":                                   func(s complex128) complex128 { return 1 / s },
	"1/s^2":                                 func(s complex128) complex128 { return 1 / (s * s) },
	"1/(s+1)^2":                             func(s complex128) complex128 { return 1 / ((s + 1) * (s + 1)) },
	"1/(s^2+1)":                             func(s complex128) complex128 { return 1 / (s*s + 1) },
	"exp(-5*s)/s":                           func(s complex128) complex128 { return cmplx.Exp(-5*s) / s },
	"1/(s*(1+exp(-s)))":                     func(s complex128) complex128 { return 1 / (s * (1 + cmplx.Exp(-s))) },
	"atan(1/s)":                             func(s complex128) complex128 { return cmplx.Atan(1 / s) },
}

// TestTransforms checks that the formulas were copied rightly.
func TestTransforms(t *testing.T) {
	for _, c := range loadDistributed(t) {
		F := transforms[c.F]
		if F == nil {
			t.Errorf("%s: no formula for %s", c.ID, c.F)
			continue
		}
		for _, v := range c.Values {
			got, want := F(complex(v[0], v[1])), complex(v[2], v[3])
			if d := cmplx.Abs(got - want); !(d <= 1e-12*(1+math.Hypot(v[0], v[1])*1e-3)*cmplx.Abs(want)) {
				t.Errorf("%s at %g%+gi: %v, want %v", c.ID, v[0], v[1], got, want)
			}
		}
	}
}
