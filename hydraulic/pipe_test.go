package hydraulic

import (
	"math"
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile/casetest"
)

// nearly fails unless got is want to a relative error.
func nearly(t *testing.T, what string, got, want, within float64) {
	t.Helper()
	if !(math.Abs(got-want) <= within*math.Abs(want)) {
		t.Errorf("%s is %.12g, want %.12g", what, got, want)
	}
}

// sumOf adds the capacities and the inertances of a network.
func sumOf(p *network.Params) (c, l float64) {
	for _, v := range p.C {
		c += v
	}
	for _, v := range p.L {
		l += v
	}
	return c, l
}

// A tube of n sections has the inertance ρ·l/A and the compliance A·l/(ρ·a²) as a whole, of
// which the half section at a held end is in nobody's balance, and 1/n of the laminar
// resistance in each.
func TestSectionsOfAPipe(t *testing.T) {
	m := casetest.Read(t, "tube.toml", oil+`
[hydraulic.line.tube]
between = ["main", "tank"]
pipe = { length = "15 m", bore = "8 mm", wave_speed = "1250 m/s", lumps = 10 }
`, Vocabulary()...)
	const rho, mu = 870.0, 46e-6 * 870
	area := math.Pi / 4 * 0.008 * 0.008
	c, l := sumOf(m.Params)
	nearly(t, "compliance", c-1e-6, area*15/(rho*1250*1250)*0.95, 1e-6)
	nearly(t, "inertance", l, rho*15/area, 1e-12)
	_, slope := m.Params.Drop[0].Drop(0)
	nearly(t, "resistance of a section", slope, 128*mu*1.5/(math.Pi*math.Pow(0.008, 4)), 1e-12)
	if len(m.Params.L) != 10 || len(m.Params.C) != 11 {
		t.Errorf("%d columns, %d capacities", len(m.Params.L), len(m.Params.C))
	}
	nearly(t, "derived inertance", m.Derived("inertance of tube").SI, rho*15/area, 1e-12)
	nearly(t, "derived resistance", m.Derived("laminar resistance of tube").SI, 10*slope, 1e-12)
	nearly(t, "derived wave speed", m.Derived("wave speed of tube").SI, 1250, 0)
}

// A steel tube of 12 m by 100 mm, wall 3 mm: V·(1/K + D/(E·e)) = 5.821e-11 m³/Pa.
func TestComplianceOfLiquidAndWall(t *testing.T) {
	text := strings.Replace(oil, "1.4 GPa", "2.19 GPa", 1) + `
[hydraulic.line.tube]
between = ["main", "tank"]
pipe = { length = "12 m", bore = "0.1 m", wall = "3 mm", wall_modulus = "207 GPa", lumps = 4 }
`
	m := casetest.Read(t, "tube.toml", text, Vocabulary()...)
	nearly(t, "compliance", m.Derived("compliance of tube").SI, 5.821229190689842e-11, 1e-12)

	// NPS 4, schedule 40, is 114.3 × 6.02 mm
	m = casetest.Read(t, "tube.toml", strings.Replace(text, `bore = "0.1 m", wall = "3 mm", wall_modulus = "207 GPa"`, `size = "NPS 4 sch 40"`, 1), Vocabulary()...)
	d := 0.1143 - 2*0.00602
	nearly(t, "wave speed", m.Derived("wave speed of tube").SI, math.Sqrt(2.19e9/870/(1+2.19e9*d/(206e9*0.00602))), 1e-12)
}

func TestSizesAreSound(t *testing.T) {
	seen := map[string]bool{}
	for _, s := range steelPipes {
		if seen[s.name] || s.wall < 1.5 || s.wall > 20 || s.bore() < 0.01 || s.bore() > 0.6 || sizeNamed(s.name).outer != s.outer {
			t.Errorf("%+v", s)
		}
		seen[s.name] = true
	}
	if s := sizeNamed("DN 50"); math.Abs(s.bore()-0.0545) > 1e-12 || !strings.Contains(s.source(), "EN 10220") {
		t.Errorf("DN 50: %g", s.bore())
	}
}

// Inner nodes lie on the line between the ends, or where the pipe says.
func TestElevationsOfAPipe(t *testing.T) {
	const text = `
[hydraulic]
density = "1000 kg/m³"
viscosity = "1 mPa·s"
bulk_modulus = "2 GPa"
[hydraulic.node.low]
held = "2 bar"
[hydraulic.node.high]
elevation = "9 m"
compliance = "1e-9 m³/Pa"
[hydraulic.line.riser]
between = ["low", "high"]
pipe = { length = "30 m", bore = "50 mm", lumps = 3 }
`
	datum := func(text, name string) float64 {
		m := casetest.Read(t, "riser.toml", text, Vocabulary()...)
		id, ok := m.Case.Node(name)
		if !ok {
			t.Fatal("no node", name)
		}
		return m.Params.Datum[id]
	}
	nearly(t, "riser.1", datum(text, "riser.1"), 1000*9.80665*3, 1e-12)
	nearly(t, "riser.2", datum(text, "riser.2"), 1000*9.80665*6, 1e-12)
	over := strings.Replace(text, "lumps = 3", `lumps = 3, elevations = [["0 m", "0 m"], ["20 m", "18 m"], ["30 m", "9 m"]]`, 1)
	nearly(t, "riser.1", datum(over, "riser.1"), 1000*9.80665*9, 1e-12)
	nearly(t, "riser.2", datum(over, "riser.2"), 1000*9.80665*18, 1e-12)
}

// A start of the flow starts every column, and the inner nodes between the ends.
func TestStartOfAPipe(t *testing.T) {
	text := strings.Replace(oil, "compliance", "start = \"1 bar\"\ncompliance", 1) + `
[hydraulic.line.tube]
between = ["main", "tank"]
start = "2 L/min"
pipe = { length = "15 m", bore = "8 mm", wave_speed = "1250 m/s", lumps = 4 }
`
	startsBetween(t, text)
	startsBetween(t, strings.Replace(text, `held = "2 bar"`, `held = { level = "23.441752303 m" }`, 1)) // 2 bar of 870 kg/m³
}

func startsBetween(t *testing.T, text string) {
	t.Helper()
	m := casetest.Read(t, "start.toml", text, Vocabulary()...)
	for i := range 4 {
		if !m.Params.HasStartFlow[i] || m.Params.StartFlow[i] != 2e-3/60 {
			t.Errorf("column %d starts with %g", i, m.Params.StartFlow[i])
		}
	}
	for i, want := range []float64{1.75e5, 1.5e5, 1.25e5} {
		id, _ := m.Case.Node([]string{"tube.1", "tube.2", "tube.3"}[i])
		nearly(t, "start of an inner node", m.Params.Start[id], want, 1e-6)
	}
}

// With free gas a pipe's compliance goes by the pressure: at the atmosphere it is that of
// the gas nearly alone, n·p/gas.
func TestFreeGasInAPipe(t *testing.T) {
	m := casetest.Read(t, "gas.toml", strings.Replace(oil, "[hydraulic]", "[hydraulic]\nfree_gas = \"1 %\"", 1)+`
[hydraulic.line.tube]
between = ["main", "tank"]
pipe = { length = "15 m", bore = "8 mm", lumps = 1 }
`, Vocabulary()...)
	half := math.Pi / 4 * 0.008 * 0.008 * 15 / 2
	for _, x := range m.Net.Elements() {
		if !x.Stores {
			continue
		}
		for _, c := range []struct{ gauge, want float64 }{{0, 1/1.4e9 + 0.01/(1.4*101325)}, {100e5, 1/1.4e9 + 0.01*math.Pow(101325/(100e5+101325), 1/1.4)/(1.4*(100e5+101325))}} {
			s := &network.Stamp{X: []float64{c.gauge}}
			m.Params.Law[x.ID].Eval(s)
			nearly(t, "compliance of half the tube", s.DStored, half*c.want, 1e-12)
			at := s.Stored
			s.X[0] += 100
			m.Params.Law[x.ID].Eval(s)
			nearly(t, "by differences", (s.Stored-at)/100, half*c.want, 1e-3)
		}
		return
	}
	t.Error("no element that stores")
}

// What a lumped pipe does worse than a real one is said where it can be known.
func TestWarningsOfPipes(t *testing.T) {
	const water = `
[hydraulic]
fluid = "water"
at = "20 °C"
[hydraulic.node.tank]
held = "3 bar"
[hydraulic.node.end]
[hydraulic.line.main]
between = ["tank", "end"]
pipe = { length = "600 m", bore = "0.2 m", wave_speed = "1200 m/s", lumps = 10 }
[hydraulic.source.draw]
out_of = "end"
drive = { step = { from = "31.4159265 L/s", to = "0 L/s", at = "1 s" } }
`
	valve := water[:strings.Index(water, "[hydraulic.source")] + `[hydraulic.node.out]
held = "0 bar"
[hydraulic.restriction.valve]
between = ["end", "out"]
valve = { kv = "200 m³/h", close = { at = "1 s", over = "0.2 s" } }
`
	for _, c := range []struct{ name, text, want string }{
		{"a sudden stop", water, `source "draw" stops or throttles the flow at "end" at once, in fewer than 8 section travel times (50 ms each)`},
		{"what it comes to", water, "ρ·a·ΔV is 11.98 bar for ΔV = 1 m/s; 2·l/a is 1 s"},
		{"a ramp in 0.3 s", strings.Replace(water, `{ step = { from = "31.4159265 L/s", to = "0 L/s", at = "1 s" } }`, `{ points = [["1 s", "31.4 L/s"], ["1.3 s", "0 L/s"]] }`, 1), "300 ms, in fewer than 8"},
		{"a valve", valve, `restriction "valve" stops or throttles the flow at "end" in 200 ms`},
		{"what a valve stops", valve, "for ΔV = "},
		{"a rigid column", strings.Replace(water, `wave_speed = "1200 m/s", lumps = 10`, `rigid = true`, 1), "a rigid column reads half the true peak"},
		{"oil in a tube", oil + "[hydraulic.line.tube]\nbetween = [\"main\", \"tank\"]\npipe = { length = \"15 m\", bore = \"8 mm\", lumps = 4 }\n", "laminar-damping: "},
	} {
		if got := faults(c.text); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
	for _, c := range []struct{ name, text string }{
		{"a slow stop", strings.Replace(water, `{ step = { from = "31.4159265 L/s", to = "0 L/s", at = "1 s" } }`, `{ points = [["1 s", "31.4 L/s"], ["2 s", "0 L/s"]] }`, 1)},
		{"a flow that begins", strings.Replace(water, `from = "31.4159265 L/s", to = "0 L/s"`, `from = "0 L/s", to = "31.4159265 L/s"`, 1)},
	} {
		if got := faults(c.text); got != "" {
			t.Errorf("%s: said\n%s", c.name, got)
		}
	}
}
