package thermal

import (
	"math"
	"strings"
	"testing"
)

const plugCase = `
[run]
start = "20 °C"
[thermal.node.source]
held = { step = { from = "20 °C", to = "80 °C", at = "0 s" } }
[thermal.node.tap]
capacitance = "1 mJ/K"
[thermal.stream.pipe]
path  = ["source", "tap"]
fluid = "brine"
flow  = "6 L/min"
[material.brine]
density       = "1100 kg/m³"
specific_heat = "3.6 kJ/(kg·K)"
[thermal.plug.hold_up]
stream = "pipe"
volume = "20 L"
lumps  = 8
[[table]]
show  = ["tap"]
times = ["0 s", "1 s"]
`

// N stirred volumes of τ/N each: the step leaves as 1 − exp(−x)·Σ x^k/k!, k < N, with x = N·t/τ, whose
// mean is τ and whose standard deviation is τ/√N (Levenspiel, 3rd ed., eqs. 14.1 and 14.2).
func TestPlugIsTanksInSeries(t *testing.T) {
	m := read(t, "plug", plugCase)
	near(t, "capacitance", m.Derived("capacitance of hold_up").SI, 20e-3*1100*3600, 1e-13)
	near(t, "travel time", m.Derived("travel time of hold_up").SI, 200, 1e-13)
	near(t, "spread", m.Derived("spread of a step in hold_up").SI, 200/math.Sqrt(8), 1e-13)
	r := m.Respond(1000, "tap", "hold_up.8")
	for _, at := range []float64{30, 120, 200, 350, 700} {
		x, term, sum := 8*at/200, 1.0, 0.0
		for k := range 8 {
			sum += term
			term *= x / float64(k+1)
		}
		near(t, "last volume", r.At(1, at)-293.15, 60*(1-math.Exp(-x)*sum), 1e-9)
		near(t, "tap", r.At(0, at), r.At(1, at), 1e-7) // 3 µs behind
	}
}

func TestPlugFaults(t *testing.T) {
	for _, c := range []struct{ name, was, is, want string }{
		{"no fluid", "fluid = \"brine\"\nflow  = \"6 L/min\"", "capacity_rate = \"400 W/K\"", "states a capacity rate and no fluid"},
		{"no lumps", "lumps  = 8", "", "lumps is missing"},
		{"both", "volume =", "capacitance = \"1 kJ/K\"\nvolume =", "stated-twice: "},
		{"another on its stretch", "[[table]]", "[thermal.plug.second]\nstream = \"pipe\"\nvolume = \"1 L\"\nlumps = 2\n[[table]]", `plug "hold_up" lies on the same stretch of stream "pipe"`},
	} {
		if got := faults(strings.Replace(plugCase, c.was, c.is, 1)); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
}
