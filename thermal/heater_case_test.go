package thermal

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

const control = `
[thermal.heater.h]
into   = "body"
watch  = "body"
target = "60 °C"
pi     = { gain = "10 W/K", integral_time = "10 min" }
output = ["0 W", "%s"]
`

// Under control from a steady start the body is at its target, with the heat it takes; with too
// small a heater it is where that brings it, and the integral no further than the limit: when the
// target falls within reach the output leaves the limit at once.
func TestControllerFromASteadyStart(t *testing.T) {
	m := read(t, "steady", hotBody("", plainLoss+fmt.Sprintf(control, "200 W")))
	r := m.March(3600, "body", "heat of h", "energy of h")
	for _, at := range []float64{0, 1800, 3600} {
		near(t, "body", r.At(0, at), 333.15, 1e-9)
		near(t, "heat", r.At(1, at), 80, 1e-6)
		near(t, "energy", r.At(2, at)+1, 80*at+1, 1e-6)
	}
	small := strings.Replace(fmt.Sprintf(control, "50 W"), `"60 °C"`, `{ step = { from = "60 °C", to = "42 °C", at = "10 min" } }`, 1)
	m = read(t, "too small", hotBody("", plainLoss+small))
	r = m.March(7200, "body", "heat of h", "duty of h")
	near(t, "body", r.At(0, 300), 293.15+25, 1e-9)
	near(t, "duty", r.At(2, 300), 1, 1e-9)
	if q := r.At(1, 601); q > 5 {
		t.Errorf("%g W just after the target has fallen below the body", q)
	}
	near(t, "body in the end", r.At(0, 7200), 315.15, 1e-5)
}

// A loop whose linear range holds all the way is the linear network of its equations: C T' = −G(T − T_a) + g·e + I,
// I' = g·e/t_i. From 5 K below the target with the integral at 0, against the matrix exponential of two states.
func TestControllerInItsRangeIsLinear(t *testing.T) {
	const C, G, g, ti = 1000, 2, 10, 600
	wide := strings.Replace(control, `["0 W", "%s"]`, `["-1 kW", "1 kW"]`, 1)
	m := read(t, "range", hotBody("55 °C", plainLoss+wide))
	r := m.March(3600, "body", "heat of h")
	// about the steady state, x = T − 60 °C, y = I − 80 W: x' = (−(G+g)x + y)/C, y' = −g·x/ti
	a, b, c := -(G+g)/float64(C), 1/float64(C), -g/float64(ti)
	p, q := a/2, math.Sqrt(math.Abs(a*a/4+b*c))
	x0, y0 := -5.0, -80.0
	for _, at := range []float64{10, 120, 600, 3000} {
		// two real poles p ± q, or a pair: the sums of the two exponentials, real either way
		var even, odd float64 // cosh and sinh/q, or cos and sin/q
		if a*a/4+b*c > 0 {
			even, odd = math.Cosh(q*at), math.Sinh(q*at)/q
		} else {
			even, odd = math.Cos(q*at), math.Sin(q*at)/q
		}
		x := math.Exp(p*at) * (x0*even + (a/2*x0+b*y0)*odd)
		if got := r.At(0, at) - 333.15; math.Abs(got-x) > 2e-6 { // 20 times the tolerance of a step on 5 K
			t.Errorf("after %g s: %.9g K from the target, want %.9g", at, got, x)
		}
	}
}
