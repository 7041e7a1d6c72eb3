package study_test

import (
	"math"
	"strings"
	"testing"
)

// A limit that a march which had to stop does not show is neither met nor failed, and
// says so; rows stand at the decimals asked for.
func TestNotJudged(t *testing.T) {
	m := model(t, dry+`
[[table]]
show = ["vessel"]
every = "0.1 s"
[limit.high]
of = "vessel"
stay_below = "2 bar(a)"
[limit.late]
of = "vessel"
after = "3 s"
stay_below = "2 bar(a)"
[limit.low]
of = "vessel"
stay_above = "0.9 bar(a)"
`)
	l, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	for _, v := range l.Limits {
		if v.NotJudged != (v.Name != "low") || v.Met || v.Governs != (v.Name == "low") {
			t.Errorf("%+v", v)
		}
	}
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	for k, want := range []float64{0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7} {
		if got := a.Tables[0].Rows[k][0]; got != want {
			t.Errorf("row %d at %v, want %v", k, got, want)
		}
	}
}

// A row is read at its own instant, not at the decimal that it is printed as: at the jumps
// of a load that repeats it shows what comes after.
func TestRowsAtJumps(t *testing.T) {
	a, err := model(t, `
[thermal.node.body]
[thermal.node.room]
held = "0 °C"
[thermal.resistance.film]
between = ["body", "room"]
value = "1 K/W"
[thermal.source.load]
into = "body"
drive = { pulse = { low = "0 W", high = "1 W", width = "0.1 s", period = "0.2 s" } }
[run]
to = "1.1 s"
[[table]]
show = ["flow of film"]
every = "0.1 s"
`).Tables()
	if err != nil {
		t.Fatal(err)
	}
	for k, r := range a.Tables[0].Rows {
		if want := float64(1 - k%2); math.Abs(r[1]-want) > 1e-12 {
			t.Errorf("%v s: %v W, want %v", r[0], r[1], want)
		}
	}
}

// What is stated of a source and what it gives more as it gets hotter are one line, what
// a hot held node gives is brought in, and no share is above all.
func TestFlowsOfParts(t *testing.T) {
	m := model(t, `
[thermal.node.amb]
held = "40 °C"
[thermal.node.hot]
held = "140 °C"
[thermal.resistance.bridge]
between = ["hot", "amb"]
value = "10 K/W"
[thermal.node.j]
capacitance = "10 J/K"
[thermal.resistance.r]
between = ["j", "amb"]
value = "1 K/W"
[thermal.source.leak]
into = "j"
drive = "2 W"
at = "40 °C"
doubles_every = "10 K"
[thermal.node.skin]
capacitance = "1 kJ/K"
[thermal.node.sky]
held = "5 °C"
[thermal.surface.face]
node = "skin"
area = "1 m²"
film = "12 W/(m²·K)"
air = "amb"
emissivity = 0.9
sky = "sky"
absorbs = "700 W/m²"
absorptance = 0.6
`)
	list, err := m.Flows()
	if err != nil {
		t.Fatal(err)
	}
	x := 2.0 // x = 2·2^(x/10), by iteration
	for range 200 {
		x = 2 * math.Exp2(x/10)
	}
	f := list[0]
	near(t, "brought in", &f.In, 10+x+420, 1e-6)
	var parts []string
	for _, l := range f.Lines {
		parts = append(parts, l.Part+" "+l.From+">"+l.To)
		if l.Part == "leak" {
			near(t, "flow of leak", &l.Flow, x, 1e-6)
		}
		if l.Share == nil || *l.Share > 1 {
			t.Errorf("%s: share %v", l.Part, l.Share)
		}
	}
	if got := strings.Join(parts, ", "); strings.Count(got, "leak") != 1 || strings.Count(got, "face") != 3 ||
		!strings.Contains(got, "face skin>amb") || !strings.Contains(got, "face skin>sky") || !strings.Contains(got, "face >skin") {
		t.Error(got)
	}
	c, err := m.Check()
	if err != nil {
		t.Fatal(err)
	}
	for _, b := range c.Branches {
		if b.Name == "leak" {
			near(t, "flow of leak", b.Flow, x, 1e-6)
		}
	}
}

// leaky is a source that doubles every 10 K over 2 K/W, with the digits of a fine answer.
const leaky = `
[thermal.node.amb]
held = "40 °C"
[thermal.node.j]
capacitance = "10 J/K"
[thermal.resistance.r]
between = ["j", "amb"]
value = "2 K/W"
[thermal.source.leak]
into = "j"
drive = "2 W"
at = "40 °C"
doubles_every = "10 K"
[print]
digits = 6
`

// The end of steady states is printed to the digits to which it is found, and a steady
// state that does not hold itself is named.
func TestRunawayWords(t *testing.T) {
	notes := func(start string) string {
		a, err := model(t, leaky+"[run]\nto = \"1 min\"\nstart = \""+start+"\"\n").Check()
		if err != nil {
			t.Fatal(err)
		}
		return strings.Join(a.Notes, "\n")
	}
	// d·log₂(d/(P·R·ln 2)) − d/ln 2 = 4.07999 K
	if got := notes("steady"); !strings.Contains(got, "4.08 K hotter (amb at 44.08 °C)") {
		t.Error(got)
	}
	if got := notes("70 °C"); !strings.Contains(got, "found from the start (j at 70 °C) has j at 68.1513 °C and") {
		t.Error(got)
	}
}

// Step measures whose search was given up are left out: here those of a pipe that swings
// as good as undamped.
func TestStepGivenUp(t *testing.T) {
	a, err := model(t, `
[hydraulic]
density = "1000 kg/m³"
viscosity = "1e-6 Pa·s"
bulk_modulus = "1e9 Pa"
[hydraulic.node.r]
held = "0 bar"
[hydraulic.node.e]
[hydraulic.line.p]
between = ["r", "e"]
pipe = { length = "100 m", bore = "100 mm", accuracy = "2 %", up_to = "10 Hz" }
[run]
start = "at rest"
[[table]]
show = ["e"]
times = ["0 s", "1 s"]
`).Poles()
	if err != nil {
		t.Fatal(err)
	}
	stopped := false
	for _, w := range a.Warnings {
		stopped = stopped || w.Code == "search-stopped" && strings.Contains(w.Text, "left out")
	}
	if s := a.Transfers[0].Step; !stopped || s != nil && (s.RiseTime != nil || s.Overshoot != nil || s.Undershoot != nil || s.Peak != nil || s.Settling2 != nil) {
		t.Errorf("%+v, %+v", s, a.Warnings)
	}
}

// A film that begins at no difference of temperatures is read less well within the first
// step of the march: that is said as what it is, and not called rounding.
func TestBetweenSteps(t *testing.T) {
	a, err := model(t, `
[run]
start = "20 °C"
to = "48 h"
clock = "00:00"
[thermal.node.air]
held = { sine = { mean = "20 °C", amplitude = "8 K", period = "24 h", highest_at = "15:00" } }
[thermal.node.skin]
capacitance = "30 kJ/K"
[thermal.surface.roof]
node = "skin"
area = "1 m²"
film = { natural = "horizontal plate", length = "1 m" }
air = "air"
emissivity = 0.9
[[table]]
show = ["skin", "coefficient of roof"]
times = ["0 h", "3 h"]
`).Tables()
	if err != nil {
		t.Fatal(err)
	}
	codes := ""
	for _, w := range a.Warnings {
		codes += w.Code + " "
	}
	if !strings.Contains(codes, "between-steps") || strings.Contains(codes, "rounding") {
		t.Error(codes)
	}
}
