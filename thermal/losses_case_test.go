package thermal

import (
	"math"
	"strings"
	"testing"
)

// A leakage that doubles every 10 K on a body that loses 2 W/K: steady where it can be, none where it cannot, and
// then growth in numbers that says what it is.
func TestRunaway(t *testing.T) {
	leak := func(drive string) string {
		return plainLoss + `
[thermal.source.leak]
into          = "body"
drive         = "` + drive + `"
doubles_every = "10 K"
at            = "20 °C"
`
	}
	m := read(t, "stable", hotBody("", leak("5 W")))
	T := m.At(m.Operate(0), "body", "flow of leak")
	rise := T[0] - 293.15
	near(t, "loss at the steady state", 2*rise, 5*math.Exp2(rise/10), 1e-8)
	near(t, "flow of the leak", T[1], 2*rise, 1e-8)
	// tangent where 2·10/ln 2 = drive·e: 10.6 W
	m = read(t, "unstable", hotBody("20 °C", leak("11 W")))
	if _, err := m.Net.Operate(m.Params, 0, nil); err == nil {
		t.Error("a steady state where there is none")
	}
	r := m.March(5*3600, "body")
	if y := r.At(0, r.Until()); !(y > 450) || math.IsInf(y, 0) {
		t.Errorf("the body is at %g K", y)
	}
	said := false
	for _, w := range r.Cautions() {
		said = said || strings.Contains(w.Text, "runs away")
	}
	if !said {
		t.Errorf("nothing is said of the runaway: %v", r.Cautions())
	}
}

// A drive with a share per kelvin that is no stairs, against the classical Runge–Kutta method in small steps:
// C T' = P(t)·(1 + α(T − at)) − G(T − T_a).
func TestPerKelvinOfASlidingDrive(t *testing.T) {
	m := read(t, "slides", hotBody("20 °C", plainLoss+`
[thermal.source.copper]
into       = "body"
drive      = { points = [["0 s", "0 W"], ["20 min", "120 W"]] }
per_kelvin = "0.4 %/K"
at         = "20 °C"
`))
	r := m.March(2400, "body", "flow of copper")
	T, h := 0.0, 1.0
	slope := func(at, T float64) float64 {
		return (120*math.Min(at/1200, 1)*(1+0.004*T) - 2*T) / 1000
	}
	for at := 0.0; at < 2400; at += h {
		a := slope(at, T)
		b := slope(at+h/2, T+h/2*a)
		c := slope(at+h/2, T+h/2*b)
		d := slope(at+h, T+h*c)
		T += h / 6 * (a + 2*b + 2*c + d)
	}
	if got := r.At(0, 2400) - 293.15; math.Abs(got-T) > 1e-5 {
		t.Errorf("%.9g K above the air, want %.9g", got, T)
	}
	near(t, "copper", r.At(1, 2400), 120*(1+0.004*T), 1e-6)
}
