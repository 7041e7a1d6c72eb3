package thermal

import (
	"math"
	"strings"
	"testing"
)

// Stirred tanks in a row: outlet = 1 − Σ (t/τ)^k/k! exp(−t/τ), a pole as often as there are tanks.
func TestTanksInARow(t *testing.T) {
	m := read(t, "row", `
[run]
start = "0 °C"
[thermal.node.inlet]
held = "1 °C"
[thermal.node.a]
capacitance = "50 J/K"
[thermal.node.b]
capacitance = "50 J/K"
[thermal.node.c]
capacitance = "50 J/K"
[thermal.node.outlet]
[thermal.stream.s]
path          = ["inlet", "a", "b", "c", "outlet"]
capacity_rate = "5 W/K"
[[table]]
show  = ["outlet"]
times = ["0 s", "1 s"]
`)
	for _, p := range m.RealParts() {
		near(t, "pole", p, -0.1, 1e-13)
	}
	x := 1.7
	near(t, "outlet", m.Respond(17, "outlet").At(0, 17)-273.15, 1-math.Exp(-x)*(1+x+x*x/2), 1e-11)
}

func TestCapacityRates(t *testing.T) {
	for _, c := range []struct {
		name, text string
		want       float64
	}{
		{"stated", `capacity_rate = "9 W/K"`, 9},
		{"litres of water at the usual 20 °C", "fluid = \"water\"\nflow = \"6 L/min\"", 1e-4 * 998.2065 * 4184.19},
		{"litres of water at 65 °C", "fluid = \"water\"\nflow = \"6 L/min\"\nflow_at = \"65 °C\"", 1e-4 * (983.1953 + 977.764) / 2 * (4184.9 + 4190.12) / 2},
		{"gallons", "fluid = \"water\"\nflow = \"1 gpm\"", 6.30901964e-5 * 998.2065 * 4184.19},
		{"kilograms of water", "fluid = \"water\"\nflow = \"0.1 kg/s\"", 418.419},
		{"air", "fluid = \"air\"\nflow = \"36 m³/h\"\nflow_at = \"20 °C\"", 0.01 * 1.204 * 1007},
		{"kilograms of air", "fluid = \"air\"\nflow = \"10 g/s\"", 10.07},
		{"own fluid", "fluid = \"brine\"\nflow = \"1 L/s\"", 1e-3 * 1100 * 3500},
		{"own fluid by mass", "fluid = \"brine\"\nflow = \"2 kg/s\"", 7000},
	} {
		m := read(t, c.name, `
[material.brine]
density       = "1100 kg/m³"
specific_heat = "3.5 kJ/(kg·K)"
[run]
start = "0 °C"
[thermal.node.inlet]
held = "10 °C"
[thermal.node.tank]
capacitance = "1 kJ/K"
[thermal.stream.s]
path = ["inlet", "tank"]
`+c.text+`
[[table]]
show  = ["tank"]
times = ["0 s", "1 s"]
`)
		near(t, c.name, m.Derived("capacity rate of s").SI, c.want, 1e-12)
		near(t, c.name+": pole", m.RealParts()[0], -c.want/1000, 1e-12)
	}
}

// passing is a stream along a plate, which is held or heated.
func passageCase(plate, contact string) string {
	return `
[thermal.node.inlet]
held = "20 °C"
[thermal.node.outlet]
[thermal.node.plate]
` + plate + `
[thermal.stream.s]
path          = ["inlet", "outlet"]
capacity_rate = "240 W/K"
[thermal.passage.p]
stream = "s"
along  = "plate"
` + contact + `
[[table]]
show  = ["outlet"]
times = ["0 s", "1 s"]
`
}

// Along a plate of one temperature the stream leaves at T_plate + (T_in − T_plate) exp(−UA/w), from short passages to
// long ones, and what the plate loses the stream gains.
func TestPassage(t *testing.T) {
	for _, c := range []struct {
		contact string
		ua      float64
	}{
		{`conductance = "45 W/K"`, 45},
		{"film = \"900 W/(m²·K)\"\narea = \"0.5 m²\"", 450},
		{`conductance = "1 mW/K"`, 1e-3},
		{`conductance = "1 MW/K"`, 1e6},
	} {
		m := read(t, "held plate", passageCase(`held = "60 °C"`, c.contact))
		near(t, "outlet", m.Respond(1, "outlet").At(0, 0)-273.15, 60-40*math.Exp(-c.ua/240), 1e-14)
		m = read(t, "heated plate", passageCase("capacitance = \"400 J/K\"\n[thermal.source.heat]\ninto = \"plate\"\ndrive = \"72 W\"", c.contact))
		r := m.Respond(1, "outlet", "plate", "outlet - inlet", "plate - inlet")
		near(t, "warming of the stream", r.At(2, 0), 72.0/240)
		carried := -240 * math.Expm1(-c.ua/240) // between entry and plate
		near(t, "rise of the plate", r.At(3, 0), 72/carried)
		near(t, "pole", m.RealParts()[0], -carried/400)
		near(t, "effectiveness", m.Derived("effectiveness of p").SI, carried/240, 1e-14)
	}
}

// Three cells on a rail, as the water passes them one after another: what goes in at the plates comes out in the water
// at every instant, but for what the plates store. Here the sum is formed from the answer alone.
func TestPassagesCloseTheHeatBalance(t *testing.T) {
	m := read(t, "rail", `
[run]
start = "25 °C"
[thermal.node.inlet]
held = "25 °C"
[thermal.node.m1]
[thermal.node.m2]
[thermal.node.outlet]
[thermal.node.p1]
capacitance = "400 J/K"
[thermal.node.p2]
capacitance = "300 J/K"
[thermal.node.p3]
capacitance = "500 J/K"
[thermal.stream.water]
path          = ["inlet", "m1", "m2", "outlet"]
capacity_rate = "24 W/K"
[thermal.passage.r1]
stream = "water"
along  = "p1"
between = ["inlet", "m1"]
conductance = "45 W/K"
[thermal.passage.r2]
stream = "water"
along  = "p2"
between = ["m1", "m2"]
conductance = "5 W/K"
[thermal.passage.r3]
stream = "water"
along  = "p3"
between = ["outlet", "m2"]
conductance = "45 W/K"
[thermal.source.s1]
into = "p1"
drive = "72 W"
[thermal.source.s2]
into = "p2"
drive = "31 W"
[thermal.source.s3]
into = "p3"
drive = "88 W"
[[table]]
show  = ["outlet"]
times = ["0 s", "1 s"]
`)
	r := m.Respond(300, "outlet - inlet", "p1", "p2", "p3")
	const h = 1e-2 // s, for the rates: central differences, off by h²/6 of the third derivative
	for _, at := range []float64{3, 20, 100} {
		stored := 0.0
		for k, c := range []float64{400, 300, 500} {
			stored += c * (r.At(k+1, at+h) - r.At(k+1, at-h)) / (2 * h)
		}
		near(t, "in − out − stored", 24*r.At(0, at)+stored, 72+31+88, 1e-6)
	}
	final, _ := r.Final(0)
	near(t, "outlet in the end", final, (72.0+31+88)/24)
}

// The faults of streams and passages, each in one line of what a user is told.
func TestStreamFaults(t *testing.T) {
	base := `
[thermal.node.in]
held = "10 °C"
[thermal.node.a]
capacitance = "1 kJ/K"
[thermal.node.b]
lump = { material = "copper", mass = "1 kg" }
[thermal.node.out]
[thermal.resistance.r]
between = ["a", "b"]
value   = "1 K/W"
[thermal.resistance.in_a]
between = ["in", "a"]
value   = "1 K/W"
[thermal.resistance.out_a]
between = ["out", "a"]
value   = "1 K/W"
[[table]]
show  = ["a"]
times = ["0 s", "1 s"]
`
	stream := "[thermal.stream.s]\npath = [\"in\", \"a\", \"out\"]\ncapacity_rate = \"4 W/K\"\n"
	for _, c := range []struct{ name, text, want string }{
		{"solid in the path", "[thermal.stream.s]\npath = [\"in\", \"b\", \"out\"]\ncapacity_rate = \"4 W/K\"", `node "b" is solid (copper)`},
		{"from nowhere", "[thermal.stream.s]\npath = [\"a\", \"out\"]\ncapacity_rate = \"4 W/K\"", `more leaves node "a" than enters it: 0 W/K in, 4 W/K out`},
		{"more out than in", stream + "[thermal.stream.s2]\npath = [\"a\", \"out\"]\ncapacity_rate = \"1 W/K\"", `more leaves node "a" than enters it: 4 W/K in, 5 W/K out`},
		{"solid fluid", "[thermal.stream.s]\npath = [\"in\", \"a\"]\nfluid = \"copper\"\nflow = \"1 L/s\"", "copper is a solid; expected a liquid or a gas"},
		{"volume of a gas", "[thermal.stream.s]\npath = [\"in\", \"a\"]\nfluid = \"air\"\nflow = \"1 L/s\"", "flow_at is missing"},
		{"no flow", "[thermal.stream.s]\npath = [\"in\", \"a\"]\nfluid = \"air\"", "fluid without flow"},
		{"unknown fluid", "[thermal.stream.s]\npath = [\"in\", \"a\"]\nfluid = \"watr\"\nflow = \"1 L/s\"", `material "watr" is not known`},
		{"beyond the handbook", "[thermal.stream.s]\npath = [\"in\", \"a\"]\nfluid = \"water\"\nflow = \"1 L/s\"\nflow_at = \"150 °C\"",
			"the handbook knows water from 0 °C to 100 °C: its values at 100 °C are used"},
		{"two passages on one stretch", stream + "[thermal.passage.p]\nstream = \"s\"\nalong = \"b\"\nbetween = [\"in\", \"a\"]\nconductance = \"1 W/K\"\n" +
			"[thermal.passage.q]\nstream = \"s\"\nalong = \"b\"\nbetween = [\"in\", \"a\"]\nconductance = \"1 W/K\"", `passage "p" lies on the same stretch of stream "s", "in" to "a"`},
		{"which stretch", stream + "[thermal.passage.p]\nstream = \"s\"\nalong = \"b\"\nconductance = \"1 W/K\"", `stream "s" passes 3 nodes: between is missing`},
		{"no neighbours", stream + "[thermal.passage.p]\nstream = \"s\"\nalong = \"b\"\nbetween = [\"in\", \"out\"]\nconductance = \"1 W/K\"", "are not neighbours"},
		{"along itself", stream + "[thermal.passage.p]\nstream = \"s\"\nalong = \"a\"\nbetween = [\"in\", \"a\"]\nconductance = \"1 W/K\"", "in the stream's own path"},
		{"film without area", stream + "[thermal.passage.p]\nstream = \"s\"\nalong = \"b\"\nbetween = [\"in\", \"a\"]\nfilm = \"1 W/(m²·K)\"", "missing-key: "},
		{"turns back", "[thermal.stream.s]\npath = [\"in\", \"a\", \"a\"]\ncapacity_rate = \"4 W/K\"", "\"a\" follows itself"},
	} {
		if got := faults(base + c.text + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
	if got := faults(base + stream); strings.Contains(got, "case.toml") && strings.Contains(got, "more leaves") {
		t.Errorf("a stream that ends in a node with nothing after it is legal:\n%s", got)
	}
}
