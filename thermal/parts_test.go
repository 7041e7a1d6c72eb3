package thermal

import (
	"math"
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// near fails unless got is want to a relative 1e-12, or what is given.
func near(t *testing.T, what string, got, want float64, tol ...float64) {
	t.Helper()
	rel := 1e-12
	if tol != nil {
		rel = tol[0]
	}
	if !(math.Abs(got-want) <= rel*math.Abs(want)) {
		t.Errorf("%s is %.15g, want %.15g", what, got, want)
	}
}

// twoNodes is a held node, a part to be tried, and a second held node.
func twoNodes(part string) string {
	return `
[thermal.node.a]
held = "80 °C"
[thermal.node.b]
held = "20 °C"
[thermal.node.m]
[thermal.resistance.rest]
between = ["m", "b"]
value   = "1 K/W"
[thermal.resistance.part]
between = ["a", "m"]
` + part + `
[[table]]
show  = ["m"]
times = ["0 s", "1 s"]
`
}

func TestResistances(t *testing.T) {
	for _, c := range []struct {
		name, text       string
		want             float64
		formula, numbers string
	}{
		{"value", `value = "0.35 °C/W"`, 0.35, "R", "0.35 °C/W"},
		{"US customary", `value = "1 h·°F/BTU"`, 1.8956342406266344, "R", "1 h·°F/BTU"},
		{"conductance", `conductance = "4 W/K"`, 0.25, "1/G", "1/(4 W/K)"},
		{"layer", `layer = { conductivity = "3 W/(m·K)", thickness = "0.5 mm", area = "40 cm²" }`, 0.5e-3 / (3 * 40e-4),
			"t/(k·A)", "0.5 mm/(3 W/(m·K) · 40 cm²)"},
		{"layer of a handbook material", `layer = { material = "copper", thickness = "2 mm", area = "1 cm²" }`, 2e-3 / (401 * 1e-4),
			"t/(k·A)", "2 mm/(401 W/(m·K) · 1 cm²)"},
		{"shell", `shell = { conductivity = "0.25 W/(m·K)", inner_radius = "21 cm", outer_radius = "28.5 cm", length = "0.85 m" }`,
			math.Log(0.285/0.21) / (2 * math.Pi * 0.25 * 0.85), "ln(ro/ri)/(2π·k·L)", "ln(28.5 cm/21 cm)/(2π · 0.25 W/(m·K) · 0.85 m)"},
		{"contact", `contact = { coefficient = "9 kW/(m²·K)", area = "6 cm²" }`, 1 / (9000 * 6e-4), "1/(h·A)", "1/(9 kW/(m²·K) · 6 cm²)"},
		{"film", `film = { coefficient = "11 W/(m²·K)", area = "0.3 m²" }`, 1 / (11 * 0.3), "1/(h·A)", "1/(11 W/(m²·K) · 0.3 m²)"},
		{"finned film", `film = { coefficient = "11 W/(m²·K)", area = "0.3 m²", efficiency = "85 %" }`, 1 / (11 * 0.3 * 0.85),
			"1/(h·A·η)", "1/(11 W/(m²·K) · 0.3 m² · 85 %)"},
	} {
		m := read(t, c.name, twoNodes(c.text))
		d := m.Derived("resistance of part")
		near(t, c.name, d.SI, c.want, 1e-15)
		if d.Formula != c.formula || d.Numbers != c.numbers {
			t.Errorf("%s: derived as %q with %q, want %q with %q", c.name, d.Formula, d.Numbers, c.formula, c.numbers)
		}
		near(t, c.name+", flow", m.Respond(1, "flow of part").At(0, 0), 60/(1+c.want), 1e-13)
	}
}

// A shell a thousandth of its radius thick is a layer, to the second order: no digits may be lost in the logarithm.
func TestThinShell(t *testing.T) {
	m := read(t, "thin", twoNodes(`shell = { conductivity = "1 W/(m·K)", inner_radius = "1 m", outer_radius = "1.0000001 m", length = "1 m" }`))
	outer := 1.0000001
	x := outer - 1
	near(t, "shell", m.Derived("resistance of part").SI, (x-x*x/2+x*x*x/3)/(2*math.Pi), 1e-14)
}

func TestLumps(t *testing.T) {
	for _, c := range []struct {
		name, lump, materials string
		want                  float64
		formula, source       string
	}{
		{"handbook by volume", `{ material = "aluminium", volume = "100 cm³" }`, "", 2702 * 903 * 100e-6, "ρ·V·c", "aluminium, pure: Mechanical"},
		{"handbook by mass", `{ material = "copper", mass = "0.5 kg" }`, "", 385 * 0.5, "m·c", "copper, pure: "},
		{"with extra", `{ material = "copper", mass = "0.5 kg", extra = "25 %" }`, "", 385 * 0.5 * 1.25, "m·c·(1 + extra)", "copper, pure: "},
		{"recalled", `{ material = "carbon steel", mass = "1 kg" }`, "", 434, "m·c", "from memory, check before use"},
		{"liquid", `{ material = "water", volume = "1 L" }`, "", 998.2065 * 4184.19e-3, "ρ·V·c", "water at 0.1 MPa at 20 °C: IAPWS"},
		{"own", `{ material = "mud", volume = "1 L" }`, "[material.mud]\ndensity = \"1500 kg/m³\"\nspecific_heat = \"2 kJ/(kg·K)\"\nsource = \"measured\"\n", 3000, "ρ·V·c", "measured"},
		{"own hides the handbook", `{ material = "copper", volume = "1 L" }`, "[material.copper]\ndensity = \"1000 kg/m³\"\nspecific_heat = \"1 kJ/(kg·K)\"\n", 1000, "ρ·V·c", ""},
	} {
		m := read(t, c.name, c.materials+`
[run]
start = "20 °C"
[thermal.node.air]
held = "30 °C"
[thermal.node.body]
lump = `+c.lump+`
[thermal.resistance.film]
between = ["body", "air"]
value   = "2 K/W"
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`)
		d := m.Derived("capacitance of body")
		near(t, c.name, d.SI, c.want, 1e-14)
		near(t, c.name+", time constant", m.TimeConstants()[0], 2*c.want)
		if d.Formula != c.formula || !strings.Contains(d.Source, c.source) {
			t.Errorf("%s: derived as %q from %q", c.name, d.Formula, d.Source)
		}
	}
}

// A source with a slope is a loss that grows: the pole is (slope − 1/R)/C, stable or not.
func TestSlope(t *testing.T) {
	text := func(source string) string {
		return `
[run]
start = "25 °C"
[thermal.node.air]
held = "20 °C"
[thermal.node.body]
capacitance = "100 J/K"
[thermal.node.other]
capacitance = "50 J/K"
[thermal.resistance.film]
between     = ["body", "air"]
conductance = "2 W/K"
[thermal.resistance.other_film]
between     = ["other", "air"]
conductance = "1 W/K"
[thermal.source.loss]
` + source + `
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`
	}
	m := read(t, "runaway", text("into = \"body\"\ndrive = \"1 W\"\nslope = \"3 W/K\"\nabout = \"20 °C\""))
	// C dT/dt = 1 + 3(T−20) − 2(T−20): the excess e = T − 20 + 1 grows as exp(t/100 s) from 6
	r := m.Respond(100, "body")
	near(t, "runaway", r.At(0, 100)-293.15, 6*math.E-1)
	if p := m.RealParts(); !hasPole(p, 0.01) {
		t.Errorf("poles %v, want 0.01 1/s among them: unstable", p)
	}
	m = read(t, "stable", text("out_of = \"body\"\ndrive = \"1 W\"\nslope = \"3 W/K\"\nabout = \"20 °C\""))
	if p := m.RealParts(); !hasPole(p, -0.05) {
		t.Errorf("cooling that grows: poles %v, want -0.05 1/s among them", p)
	}
	m = read(t, "follows", text("into = \"body\"\ndrive = \"1 W\"\nslope = \"3 W/K\"\nabout = \"20 °C\"\nfollows = \"other\""))
	// other decays from 5 K as exp(−t/50 s), and so does body's own: C e' = 1 + 3·5·exp(−t/50) − 2e, double pole
	at := func(x float64) float64 { return 0.5 + (4.5+0.15*x)*math.Exp(-x/50) }
	near(t, "follows", m.Respond(100, "body").At(0, 70)-293.15, at(70), 1e-11)
	m = read(t, "per kelvin of another", text("into = \"body\"\ndrive = \"1 W\"\nper_kelvin = \"300 %/K\"\nat = \"20 °C\"\nfollows = \"other\""))
	near(t, "per kelvin of another", m.Respond(100, "body").At(0, 70)-293.15, at(70), 1e-11)
}

func hasPole(poles []float64, want float64) bool {
	for _, p := range poles {
		if math.Abs(p-want) < 1e-12*math.Abs(want) {
			return true
		}
	}
	return false
}

const ladderCase = `
[run]
start = "0 °C"
[thermal.node.junction]
[thermal.node.case]
held = "0 °C"
[thermal.impedance.z]
between = ["junction", "case"]
`

const ladderAsk = `
[thermal.source.loss]
into  = "junction"
drive = "1 W"
[[table]]
show  = ["junction"]
times = ["0 s", "1 s"]
`

// Terms with one time constant are one cell, however it is written; and a Foster set and its own ladder are one network.
func TestImpedanceForms(t *testing.T) {
	m := read(t, "equal times", ladderCase+`foster = [["0.2 K/W", "2 ms"], ["0.3 K/W", "0.5 s"], ["0.1 K/W", "0.002 s"]]`+ladderAsk)
	if n := m.Net.StoreCount(); n != 2 {
		t.Errorf("%d stores, want 2: two of the three terms share a time constant", n)
	}
	for _, at := range []float64{1e-4, 2e-3, 0.1, 3} {
		want := 0.3*-math.Expm1(-at/0.002) + 0.3*-math.Expm1(-at/0.5)
		near(t, "Zth", m.Respond(at, "junction").At(0, at)-273.15, want, 1e-11)
	}
	m = read(t, "by chance", "[given]\na = \"1 s\"\nb = \"1 s\"\n"+ladderCase+`foster = [["1 K/W", "= a"], ["2 K/W", "= b"]]`+ladderAsk)
	near(t, "Zth of given times that meet", m.Respond(2, "junction").At(0, 2)-273.15, 3*-math.Expm1(-2), 1e-12)
	f := read(t, "foster", ladderCase+`foster = [["1.5 K/W", "1 s"], ["= 1 K/W / 6", "= 1 s / 3"]]`+ladderAsk)
	c := read(t, "cauer", ladderCase+`cauer = [["0.5 J/K", "= 4 K/W / 3"], ["1.5 J/K", "= 1 K/W / 3"]]`+ladderAsk)
	for k, p := range f.RealParts() {
		near(t, "pole", c.RealParts()[k], p, 1e-14)
	}
	near(t, "inner node", f.Respond(1, "z.1").At(0, 1), c.Respond(1, "z.1").At(0, 1), 1e-14)
	near(t, "flow into the ladder", f.Respond(1, "flow of z").At(0, 1), (f.Respond(1, "junction - z.1").At(0, 1))/(4.0/3), 1e-12)
}

// Setters are called thousands of times by a sweep: they take no memory.
func TestSettersTakeNoMemory(t *testing.T) {
	for _, name := range []string{"servo-drive.toml", "curing-oven.toml", "wash-tank.toml"} {
		m := casetest.Demo(t, name, Vocabulary()...)
		n := testing.AllocsPerRun(20, func() {
			for _, set := range m.Set {
				if err := set(m.Values, m.Params); err != nil {
					t.Fatal(err)
				}
			}
		})
		if n != 0 {
			t.Errorf("%s: %g allocations in the setters, want none", name, n)
		}
	}
}

// What varies may be varied: the network's numbers follow the given values.
func TestGivenValuesVary(t *testing.T) {
	m := casetest.Demo(t, "servo-drive.toml", Vocabulary()...)
	slow := m.TimeConstants()[0]
	given := m.Case.GivenValues()
	for i, g := range m.Case.Given {
		if g.Name == "fan" {
			given[i].SI /= 2
			given[i].Exact = nil
		}
	}
	v, diags := m.Case.Eval(given)
	if diags != nil {
		t.Fatal(diags)
	}
	m.Values = v
	m.Apply()
	near(t, "time constant with half the film", m.TimeConstants()[0], 2*slow, 1e-3)
}
