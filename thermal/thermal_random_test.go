package thermal

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

// randomCase draws a case of lumps, some of which melt, joined by parts that are not linear, under loads that
// switch, sources that double and a thermostat.
func randomCase(t *rapid.T) string {
	var text strings.Builder
	put := func(format string, args ...any) { fmt.Fprintf(&text, format+"\n", args...) }
	scale := func(name string) float64 { return math.Pow(10, rapid.Float64Range(-0.7, 0.7).Draw(t, name)) }
	put(`[run]
start = "20 °C"
to = "4 h"
[material.wax]
specific_heat = [["0 °C", "1.8 kJ/(kg·K)"], ["90 °C", "2.4 kJ/(kg·K)"]]
[thermal.node.air]
held = { sine = { mean = "20 °C", amplitude = "5 K", period = "2 h" } }
[thermal.node.n0]
capacitance = "%g J/K"`, 500*scale("capacitance"))
	n := rapid.IntRange(2, 5).Draw(t, "nodes")
	for i := 1; i < n; i++ {
		switch rapid.IntRange(0, 2).Draw(t, "lump") {
		case 0:
			put("[thermal.node.n%d]\ncapacitance = \"%g J/K\"", i, 500*scale("capacitance"))
		case 1:
			put("[thermal.node.n%d]\nlump = { material = \"wax\", mass = \"%g kg\" }", i, 0.3*scale("mass"))
		default:
			put("[thermal.node.n%d]\nlump = { material = \"wax\", mass = \"%g kg\", melts = { at = \"%g °C\", over = \"%g K\", latent = \"150 kJ/kg\" } }",
				i, 0.3*scale("mass"), rapid.Float64Range(22, 60).Draw(t, "melting point"), 2*scale("range"))
		}
	}
	for i := range n {
		to := "air"
		if i > 0 {
			to = fmt.Sprintf("n%d", rapid.IntRange(0, i-1).Draw(t, "to"))
		}
		put("[thermal.resistance.r%d]\nbetween = [\"n%d\", \"%s\"]", i, i, to)
		switch rapid.IntRange(0, 4).Draw(t, "part") {
		case 0:
			put("radiation = { emissivity = 0.8, area = \"%g m²\" }", 0.5*scale("area"))
		case 1:
			put("value = \"%g K/W\"\nat_rise = \"30 K\"\nexponent = %g", scale("R"), float64(rapid.IntRange(0, 1000).Draw(t, "exponent"))/1000)
		case 2:
			put("points = [[\"5 K\", \"%g K/W\"], [\"30 K\", \"%g K/W\"]]", scale("R"), scale("R"))
		case 3:
			put("layer = { conductivity = [[\"0 °C\", \"%g W/(m·K)\"], [\"80 °C\", \"%g W/(m·K)\"]], thickness = \"1 cm\", area = \"0.05 m²\" }", 0.2*scale("k"), 0.2*scale("k"))
		default:
			put("conductance = \"%g W/K\"\nscale = { stairs = [[\"0 h\", 1], [\"1 h\", %g], [\"3 h\", 1]] }", scale("G"), scale("scale"))
		}
	}
	put("[thermal.source.load]\ninto = \"n%d\"\ndrive = { pulse = { low = \"0 W\", high = \"%g W\", width = \"20 min\", period = \"50 min\" } }\ndoubles_every = \"300 K\"\nat = \"20 °C\"",
		n-1, 10*scale("load"))
	put("[thermal.heater.h]\ninto = \"n0\"\nwatch = \"n%d\"\non_off = { on_below = \"25 °C\", off_above = \"28 °C\" }\noutput = [\"0 W\", \"%g W\"]", rapid.IntRange(0, n-1).Draw(t, "watched"), 10*scale("heater"))
	put("[[table]]\nshow = [\"n0\"]\ntimes = [\"0 s\", \"1 h\"]")
	return text.String()
}

// Whatever parts a case is made of, its balance closes, its temperatures stay where heat and air allow, and a march at
// a hundredth of the tolerance says the same.
func TestRandomCasesCloseTheirBalance(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		text := randomCase(rt)
		if said := faults(text); strings.Contains(said, "would drive less heat") {
			return
		}
		m := read(t, "random", text)
		turning(m)
		const until = 4 * 3600.0
		coarse := m.March(until, "n0", "energy of h")
		fine, err := m.Net.March(m.Params, m.Begin(), []network.Output{m.Net.Level(mustNode(rt, m.Case.Node, "n0"))}, network.Run{Until: until, RelTol: network.DefaultTolerance / 100})
		if err != nil {
			rt.Fatal(err)
		}
		if b := math.Abs(coarse.Balance()); b > 1e-6 {
			rt.Errorf("balance %g\n%s", b, text)
		}
		for _, at := range []float64{600, 3600, 7200, until} {
			a, b := coarse.At(0, at), fine.At(0, at)
			// a thermostat that switches now and then a millisecond later moves the level by as much as it moves in that
			// time, some 0.1 K/s, and all that follows with it
			if math.Abs(a-b) > 0.02 || math.IsNaN(a) || a < 273.15+10 {
				rt.Errorf("after %g s %.9g K, at a finer tolerance %.9g\n%s", at, a, b, text)
			}
		}
	})
}

func mustNode(t *rapid.T, find func(string) (network.NodeID, bool), name string) network.NodeID {
	id, ok := find(name)
	if !ok {
		t.Fatalf("no node %q", name)
	}
	return id
}
