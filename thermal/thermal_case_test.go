package thermal

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile/casetest"
	"lagbook/testdata/demo"

	"pgregory.net/rapid"
)

// hotBody is a body that loses heat to air at 20 °C, with what else a test puts in.
func hotBody(start, rest string) string {
	if start != "" {
		start = "start = \"" + start + "\"\n"
	}
	return "[run]\n" + start + `to = "10 h"
[thermal.node.air]
held = "20 °C"
[thermal.node.body]
capacitance = "1 kJ/K"
` + rest + `
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`
}

const plainLoss = `
[thermal.resistance.loss]
between     = ["body", "air"]
conductance = "2 W/K"
`

// A conductance whose scale slides: T − T_a = 60 K · exp(−(G/C)·∫s dt), with s = 1 + 0.5·sin(ωt).
func TestScaleThatSlides(t *testing.T) {
	m := read(t, "slides", hotBody("80 °C", strings.Replace(plainLoss, "\"2 W/K\"", "\"2 W/K\"\nscale = { sine = { mean = 1, amplitude = 0.5, period = \"10 min\", phase = \"-90 °\" } }", 1)))
	r := m.March(1800, "body")
	omega := 2 * math.Pi / 600
	phase := -math.Pi / 2
	for _, at := range []float64{60, 300, 900, 1800} {
		sum := at - 0.5/omega*(math.Cos(omega*at+phase)-math.Cos(phase))
		if got, want := r.At(0, at)-293.15, 60*math.Exp(-2e-3*sum); math.Abs(got-want) > 1e-5 {
			t.Errorf("after %g s %.9g K above the air, want %.9g", at, got, want)
		}
	}
}

// More conductance anywhere on the way out is never hotter: a body behind a random chain of layers, films by catalogue and
// radiation.
func TestMoreConductanceIsNeverHotter(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		factor := func(name string) float64 { return math.Pow(10, rapid.Float64Range(-1, 1).Draw(rt, name)) }
		x := []float64{factor("liner"), factor("sink"), factor("glow"), factor("film")}
		k := rapid.IntRange(0, len(x)-1).Draw(rt, "which")
		solve := func(x []float64) float64 {
			m := read(t, "chain", hotBody("", fmt.Sprintf(`
[thermal.node.shell]
[thermal.resistance.liner]
between     = ["body", "shell"]
conductance = "%g W/K"
[thermal.resistance.sink]
between  = ["shell", "air"]
value    = "%g K/W"
at_rise  = "30 K"
exponent = 0.3
[thermal.resistance.glow]
between   = ["shell", "air"]
radiation = { emissivity = 0.8, area = "%g m²" }
[thermal.resistance.film]
between = ["body", "air"]
points  = [["5 K", "%g K/W"], ["50 K", "%g K/W"]]
[thermal.source.heat]
into  = "body"
drive = "100 W"
`, 4*x[0], 1/x[1], 0.1*x[2], 3/x[3], 2/x[3])))
			return m.At(m.Operate(0), "body")[0]
		}
		before := solve(x)
		x[k] *= 1.3
		if after := solve(x); after > before*(1+1e-12) {
			rt.Fatalf("%.12g K, and %.12g K with more at place %d", before, after, k)
		}
	})
}

// Setters of cases that are marched take no memory once their laws are there.
func TestSettersOfLawsTakeNoMemory(t *testing.T) {
	for _, name := range []string{"batch-oven.toml", "hot-water-tank.toml", "motor-duty.toml", "many parts"} {
		text := []byte(manyParts)
		if name != "many parts" {
			var err error
			if text, err = demo.Cases.ReadFile(name); err != nil {
				t.Fatal(err)
			}
		}
		m := read(t, name, string(text))
		other := m.Net.NewParams()
		set := func(p *network.Params) {
			for _, s := range m.Set {
				if err := s(m.Values, p); err != nil {
					t.Fatal(err)
				}
			}
		}
		set(other)
		for i, l := range m.Params.Law {
			if l == other.Law[i] {
				t.Errorf("%s: two sets of numbers share law %d", name, i)
			}
		}
		if n := testing.AllocsPerRun(20, func() { set(m.Params) }); n != 0 {
			t.Errorf("%s: %g allocations in the setters, want none", name, n)
		}
	}
}

var _ casetest.Run = (*network.Trajectory)(nil)
