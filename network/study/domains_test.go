package study_test

import (
	"math"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/study"
)

// A tank of warm water: its temperature and its pressure, both called tank. The
// thermal time constant is 100 s, the hydraulic one 10 s.
const bothDomains = `
[thermal.node.tank]
capacitance = "50 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.skin]
between = ["tank", "room"]
value = "2 K/W"
[thermal.source.heater]
into = "tank"
drive = { step = { from = "0 W", to = "5 W", at = "0 s" } }

[hydraulic]
pressures = "gauge"
[hydraulic.node.tank]
compliance = "1e-6 m³/Pa"
[hydraulic.node.sewer]
held = "0 bar"
[hydraulic.line.outlet]
between = ["tank", "sewer"]
resistance = "10 MPa·s/m³"
[hydraulic.source.tap]
into = "tank"
drive = { step = { from = "0 L/min", to = "6 L/min", at = "0 s" } }
`

// Two domains in one file: each answers as if alone, in its own units.
func TestTwoDomains(t *testing.T) {
	m := model(t, bothDomains+`
[[transfer]]
from = "heater"
to = "thermal:tank"
[[transfer]]
from = "tap"
to = "hydraulic:tank"
[[table]]
show = ["thermal:tank", "hydraulic:tank", "hydraulic:tank - sewer", "flow of skin", "flow of outlet", "flow of room", "flow of tap"]
times = ["0 s", "10 s", "100 s"]
[limit.hot]
of = "thermal:tank"
stay_below = "29 °C"
[limit.full]
of = "hydraulic:tank"
above = "sewer"
stay_below = "9 kPa"
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	units, kinds := "", ""
	for _, c := range a.Tables[0].Columns[1:] {
		units += c.Unit + " "
		kinds += c.Kind + ","
	}
	if units != "K Pa Pa W m³/s W m³/s " || kinds != "level,level,difference,,,,," {
		t.Errorf("units %s, kinds %s", units, kinds)
	}
	for _, r := range a.Tables[0].Rows {
		warm, full := 10*-math.Expm1(-r[0]/100), 1000*-math.Expm1(-r[0]/10)
		near(t, "temperature", &r[1], 293.15+warm, 1e-10)
		near(t, "pressure", &r[2], full, 1e-9)
		near(t, "difference", &r[3], full, 1e-9)
		near(t, "heat", &r[4], warm/2, 1e-12)
		near(t, "flow", &r[5], full/1e7, 1e-16)
		near(t, "heat that the room supplies", &r[6], -warm/2, 1e-12)
		near(t, "flow of the tap", &r[7], 1e-4, 0)
	}
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain of heat", p.Transfers[0].Gain, 2, 1e-13)
	near(t, "gain of flow", p.Transfers[1].Gain, 1e7, 1e-5)
	if u := p.Transfers[0].Unit + " " + p.Transfers[1].Unit; u != "K/W Pa·s/m³" {
		t.Errorf("units of gains %s", u)
	}
	l, err := m.Limits()
	if err != nil || !l.Met {
		t.Errorf("%+v, %v", l, err)
	}
	if got := l.Limits[1].Text; !strings.Contains(got, "0.01 bar") || strings.Contains(got, "bar(g)") {
		t.Errorf("a rise of a pressure reads %q", got)
	}
}

// The words of the answers are those of the domain.
func TestWordsOfDomains(t *testing.T) {
	a, err := model(t, bothDomains).Page()
	if err != nil {
		t.Fatal(err)
	}
	var said []string
	for _, in := range a.Inputs {
		said = append(said, in.What)
	}
	if got, want := strings.Join(said, "; "), "temperature of room; pressure of sewer; heat into thermal:tank; flow into hydraulic:tank"; got != want {
		t.Errorf("%s\nwant %s", got, want)
	}
	notes := strings.Join(a.Notes, "; ")
	for _, want := range []string{"pressures are gauge, above an atmosphere of 1.01325 bar(a)", "order 2: 1 heat store and 1 vessel, that many poles", "2 islands"} {
		if !strings.Contains(notes, want) {
			t.Errorf("%q is not among %s", want, notes)
		}
	}
	if n := a.Nodes[0]; n.Name != "thermal:tank" || n.Domain != "thermal" || n.Unit != "J/K" || a.Nodes[2].Unit != "m³/Pa" || a.Nodes[2].LevelUnit != "Pa" {
		t.Errorf("nodes %+v", a.Nodes)
	}
}

// A level in [run] start is of the domain that measures its levels so.
func TestStartOfOneDomain(t *testing.T) {
	for _, c := range []struct {
		start      string
		temp, pres float64
	}{{"30 °C", 303.15, 0}, {"20 kPa", 293.15, 20000}, {"at rest", 293.15, 0}, {"steady", 293.15, 0}} {
		m := model(t, "[run]\nstart = \""+c.start+"\"\n"+bothDomains+"[[table]]\nshow = [\"thermal:tank\", \"hydraulic:tank\"]\ntimes = [\"0 s\", \"1 s\"]\n")
		a, err := m.Tables()
		if err != nil {
			t.Fatal(err)
		}
		near(t, c.start+": temperature", &a.Tables[0].Rows[0][1], c.temp, 1e-10)
		near(t, c.start+": pressure", &a.Tables[0].Rows[0][2], c.pres, 1e-9)
	}
}

// A start in one domain leaves the other at its steady state.
func TestStartInOneDomain(t *testing.T) {
	m := model(t, strings.Replace(bothDomains, "capacitance", "start = \"50 °C\"\ncapacitance", 1)+"[[table]]\nshow = [\"thermal:tank\", \"hydraulic:tank\"]\ntimes = [\"0 s\", \"1 s\"]\n")
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "temperature", &a.Tables[0].Rows[0][1], 323.15, 1e-10)
	near(t, "pressure", &a.Tables[0].Rows[0][2], 0, 1e-9)
}

// At rest nothing flows: held nodes that are joined stand at one level, and
// whatever stands at none of them needs a start.
func TestAtRest(t *testing.T) {
	line := `
[hydraulic.node.main]
held = { step = { from = "2 bar", to = "3 bar", at = "0 s" } }
[hydraulic.node.vessel]
compliance = "1e-9 m³/Pa"
[hydraulic.line.pipe]
between = ["main", "vessel"]
inertance = "1e8 Pa·s²/m³"
[hydraulic.source.draw]
out_of = "vessel"
drive = "1 L/min"
[run]
start = "at rest"
to = "1 s"
`
	m := model(t, line+"[[table]]\nshow = [\"vessel\", \"flow of pipe\"]\ntimes = [\"0 s\", \"1 s\"]\n")
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	first := a.Tables[0].Rows[0]
	near(t, "pressure", &first[1], 2e5, 1e-9)
	near(t, "flow", &first[2], 0, 1e-15)
	if !strings.HasPrefix(a.Start, "at rest: nothing flows") {
		t.Errorf("start %q", a.Start)
	}
	for _, c := range []struct{ name, more, want string }{
		{"held apart", "[hydraulic.node.drain]\nheld = \"0 bar\"\n[hydraulic.line.leak]\nbetween = [\"vessel\", \"drain\"]\nresistance = \"1 GPa·s/m³\"\n",
			"nothing is at rest: main is held at 2 bar(g) and drain at 0 bar(g)"},
		{"held by nothing", "[hydraulic.node.a]\ncompliance = \"1e-9 m³/Pa\"\n[hydraulic.node.b]\ncompliance = \"1e-9 m³/Pa\"\n[hydraulic.line.ab]\nbetween = [\"a\", \"b\"]\nresistance = \"1 GPa·s/m³\"\n",
			"no held node says at which level a and b stands at rest"},
	} {
		if got := refusal(t, line+c.more); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
}

// refusal is what is said of a case that gives no model.
func refusal(t *testing.T, src string) string {
	t.Helper()
	c, ds := casefile.Read("case.toml", []byte(src), nil, vocabulary()...)
	if c != nil {
		_, ds = study.New(c)
	}
	if !casefile.Failed(ds) {
		t.Error("it is accepted")
	}
	return casefile.Listing(ds)
}

// Names that two domains have must say which is meant.
func TestAmbiguousNames(t *testing.T) {
	for _, c := range []struct{ name, more, want string }{
		{"in a table", "[[table]]\nshow = [\"tank\"]\ntimes = [\"0 s\"]", `"tank" is a name in thermal and in hydraulic`},
		{"with advice", "[[table]]\nshow = [\"tank\"]\ntimes = [\"0 s\"]", `write "thermal:tank" or "hydraulic:tank"`},
		{"in a limit", "[limit.x]\nof = \"tank\"\nstay_below = \"30 °C\"", "is a name in thermal and in hydraulic"},
		{"as above", "[limit.x]\nof = \"room\"\nabove = \"tank\"\nstay_below = \"30 K\"", "is a name in thermal and in hydraulic"},
		{"no such domain", "[[table]]\nshow = [\"electric:tank\"]\ntimes = [\"0 s\"]", "is not defined"},
		{"no such name in it", "[[table]]\nshow = [\"thermal:sewer\"]\ntimes = [\"0 s\"]", `node "thermal:sewer" is not defined`},
		{"between two domains", "[[table]]\nshow = [\"thermal:tank - sewer\"]\ntimes = [\"0 s\"]", "of two domains"},
		{"above another domain", "[[table]]\nshow = [\"thermal:tank\"]\nabove = \"sewer\"\ntimes = [\"0 s\"]", "of two domains"},
		{"a limit of two kinds", "[limit.x]\nof = [\"room\", \"sewer\"]\nstay_below = \"30 °C\"", "not of one kind"},
		{"a branch to the other domain", "[thermal.resistance.x]\nbetween = [\"tank\", \"sewer\"]\nvalue = \"1 K/W\"", `node "sewer" is not defined`},
		{"a start of neither", "[run]\nstart = \"3 m\"", "dimension"},
	} {
		got := refusal(t, bothDomains+c.more+"\n")
		if !strings.Contains(got, c.want) && c.want != "dimension" || got == "" {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
	// where only one of the two fits, nothing is ambiguous
	m := model(t, bothDomains+"[hydraulic.node.skin]\nheld = \"1 bar\"\n[hydraulic.line.more]\nbetween = [\"skin\", \"tank\"]\nresistance = \"1 GPa·s/m³\"\n"+
		"[[table]]\nshow = [\"skin\", \"flow of thermal:skin\", \"thermal:room\"]\ntimes = [\"0 s\", \"1 s\"]\n")
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "the pressure of skin", &a.Tables[0].Rows[0][1], 1e5, 1e-9)
}

// A pressure that would fall below vacuum is said to, with its time.
func TestBelowVacuum(t *testing.T) {
	m := model(t, `
[hydraulic.node.vessel]
compliance = "1e-9 m³/Pa"
start = "0 bar"
[hydraulic.source.draw]
out_of = "vessel"
drive = "6 L/min"
[[table]]
show = ["vessel"]
times = ["0 s", "2 s"]
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	// 1e-4 m³/s out of 1e-9 m³/Pa: 1e5 Pa in each second
	if len(a.Warnings) != 1 || !strings.Contains(a.Warnings[0].Text, "vessel falls below vacuum at 1.013 s") {
		t.Errorf("warnings %+v", a.Warnings)
	}
}

// [print] pressure and flow; a level says whether it is gauge.
func TestPrintedUnits(t *testing.T) {
	m := model(t, "[print]\npressure = \"psi\"\nflow = \"gpm\"\nresistance = \"psi/gpm\"\n"+bothDomains)
	for _, c := range []struct {
		v          float64
		unit, kind string
		want       string
	}{
		{1e5, "Pa", "level", "14.5 psig"}, {1e5, "Pa", "difference", "14.5 psi"}, {1e5, "Pa", "absolute", "14.5 psia"},
		{1e-4, "m³/s", "", "1.585 gpm"}, {1e9, "Pa·s/m³", "", "9.15 psi/gpm"}, {2, "K/W", "", "2 K/W"}, {300, "K", "level", "26.85 °C"},
	} {
		if got := m.Show.Value(c.v, c.unit, c.kind); got != c.want {
			t.Errorf("%v %s %s prints as %q, want %q", c.v, c.unit, c.kind, got, c.want)
		}
	}
	plain := model(t, bothDomains)
	if got := plain.Show.Value(1.5e5, "Pa", "level") + ", " + plain.Show.Value(1e-4, "m³/s", "") + ", " + plain.Show.Value(3.4e5, "Pa·s/m³", ""); got != "1.5 bar(g), 6 L/min, 340 kPa·s/m³" {
		t.Errorf("without [print]: %s", got)
	}
}

// By hand: how fast a line swings against a vessel, and how damped.
func TestHandSwing(t *testing.T) {
	m := model(t, `
[hydraulic.node.in]
held = { step = { from = "0 bar", to = "1 bar", at = "0 s" } }
[hydraulic.node.vessel]
compliance = "1e-9 m³/Pa"
[hydraulic.line.pipe]
between = ["in", "vessel"]
inertance = "25 MPa·s²/m³"
resistance = "100 MPa·s/m³"
`)
	h, err := m.Hand()
	if err != nil {
		t.Fatal(err)
	}
	if len(h) != 3 {
		t.Fatalf("%+v", h)
	}
	near(t, "natural frequency", &h[1].Hand, 1/math.Sqrt(0.025), 1e-12)
	near(t, "damping", &h[2].Hand, 0.5e8*math.Sqrt(1e-9/25e6), 1e-12)
	for _, l := range h[1:] { // without a leak both are exact
		near(t, l.What, l.Off, 0, 1e-12)
	}
}
