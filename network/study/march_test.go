package study_test

import (
	"encoding/json"
	"math"
	"strings"
	"testing"
)

// stefanBoltzmann is the constant of 2018 CODATA, W/(m²·K⁴).
const stefanBoltzmann = 5.670374419e-8

// glowing is a body of 100 J/K at 800 K that radiates from 100 cm² to walls that are as
// good as at absolute zero: T' = −k·T⁴/C.
const glowing = `
[thermal.node.body]
capacitance = "100 J/K"
start = "800 K"
[thermal.node.walls]
held = "0.1 K"
[thermal.resistance.radiant]
between = ["body", "walls"]
radiation = { emissivity = 1, area = "100 cm²", view_factor = 1 }
`

// radiated is the closed form of glowing: 1/T³ = 1/T₀³ + 3·k·t/C.
func radiated(t float64) float64 {
	k := stefanBoltzmann * 0.01
	return math.Pow(math.Pow(800, -3)+3*k*t/100, -1.0/3)
}

// A case that is not linear is marched: its table, its limits and the balance.
func TestMarchedTable(t *testing.T) {
	m := model(t, glowing+`
[[table]]
show = ["body", "flow of radiant"]
from = "0 s"
to = "1000 s"
every = "100 s"
[limit.cool]
of = "body"
reach = "500 K"
within = "20 min"
[limit.hot]
of = "body"
stay_above = "400 K"
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range a.Tables[0].Rows {
		near(t, "body", &r[1], radiated(r[0]), 1e-4)
		near(t, "flow", &r[2], stefanBoltzmann*0.01*math.Pow(r[1], 4), 1e-6*r[2])
	}
	if a.Marched == nil || len(a.Events) != 0 || a.Balance.Error > 1e-6 || a.ValidUntil != nil {
		t.Errorf("the march says %+v", a.Marched)
	}
	if !strings.HasPrefix(a.Evidence.Linear, "marched: radiant follows a law") {
		t.Errorf("it rests on %q", a.Evidence.Linear)
	}
	l, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	// 1/500³ − 1/800³ = 3·k·t/C
	k := 3 * stefanBoltzmann * 0.01 / 100
	near(t, "time at 500 K", l.Limits[0].At, (math.Pow(500, -3)-math.Pow(800, -3))/k, 0.01)
	near(t, "lowest", l.Limits[1].Value, radiated(1200), 1e-4)
	text, err := json.Marshal(a)
	if err != nil || !strings.Contains(string(text), `"events":[],"balance":{"error":`) || strings.Contains(string(text), "valid_until") {
		t.Errorf("JSON %s, %v", text, err)
	}
}

// thermostat is a body of 200 s that a heater keeps between 40 °C and 50 °C: it would
// come to 80 °C, and cools to 20 °C.
const thermostat = `
[thermal.node.body]
capacitance = "100 J/K"
start = "40 °C"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.film]
between = ["body", "room"]
value = "2 K/W"
[thermal.heater.mat]
into = "body"
watch = "body"
on_off = { on_below = "41 °C", off_above = "50 °C" }
output = ["0 W", "30 W"]
`

// Events carry the part, what happened and when; by the closed form the mat switches off
// after 200 s·ln(40/30), and on again when the body has fallen from 50 °C to 41 °C.
func TestEvents(t *testing.T) {
	m := model(t, thermostat+`
[[table]]
show = ["body"]
from = "0 s"
to = "10 min"
every = "1 min"
also = ["jumps"]
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	if len(a.Events) < 2 {
		t.Fatalf("events %+v", a.Events)
	}
	off := 200 * math.Log(40.0/30)
	near(t, "switched off", &a.Events[0].At, off, 1e-4)
	near(t, "switched on", &a.Events[1].At, off+200*math.Log(30.0/21), 1e-4)
	if a.Events[0].Part != "mat" {
		t.Errorf("event %+v", a.Events[0])
	}
	found := false
	for _, k := range a.Tables[0].Marks {
		found = found || math.Abs(a.Tables[0].Rows[k.Row][0]-off) < 1e-3 && strings.Contains(k.Text, "mat")
	}
	if !found {
		t.Errorf("no row is marked with the switching: %+v", a.Tables[0].Marks)
	}
}

// Where no load repeats but something switches, cycle gives its own rhythm.
func TestOwnRhythm(t *testing.T) {
	m := model(t, "[run]\nto = \"30 min\"\n"+thermostat+"[[table]]\nshow = [\"body\"]\ntimes = [\"0 s\"]\n")
	a, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	if len(a.Cycles) != 1 {
		t.Fatalf("%+v, %+v", a.Cycles, a.Warnings)
	}
	c := a.Cycles[0]
	on, off := 200*math.Log(39.0/30), 200*math.Log(30.0/21)
	near(t, "period", &c.Period, on+off, 1e-3)
	near(t, "highest", &c.Max, 323.15, 1e-4)
	near(t, "lowest", &c.Min, 314.15, 1e-4)
	// over a period the balance closes: the mean rise is R times the mean heat
	near(t, "mean", &c.Mean, 293.15+2*30*on/(on+off), 1e-3)
}

// The cycle of a nonlinear case under a load that repeats is where a long march comes to.
func TestMarchedCycle(t *testing.T) {
	src := strings.Replace(glowing, "\"0.1 K\"", "\"300 K\"", 1) + `
[thermal.source.load]
into = "body"
drive = { pulse = { low = "0 W", high = "40 W", width = "30 s", period = "2 min" } }
[run]
to = "4 h"
[[table]]
show = ["body", "flow of radiant"]
from = "238 min"
to = "240 min"
every = "1 s"
`
	m := model(t, src)
	c, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	long, err := model(t, src).Tables()
	if err != nil {
		t.Fatal(err)
	}
	hi, lo := math.Inf(-1), math.Inf(1)
	for _, r := range long.Tables[0].Rows {
		hi, lo = math.Max(hi, r[1]), math.Min(lo, r[1])
	}
	body := c.Cycles[0]
	near(t, "period", &body.Period, 120, 0)
	near(t, "highest", &body.Max, hi, 1e-3)
	near(t, "lowest", &body.Min, lo, 1e-3)
	near(t, "at the end of the pulse", &body.MaxAt, 30, 1e-6)
	near(t, "what it radiates on the mean", &c.Cycles[1].Mean, 10, 1e-3)
	if c.Periods < 10 || body.Cycles == nil || *body.Cycles < 5 || *body.Cycles > float64(c.Periods) {
		t.Errorf("%d periods marched, %v to 2 %%", c.Periods, body.Cycles)
	}
}

// [run] start = "cycle" is refused where the case is not linear.
func TestNoCycleStart(t *testing.T) {
	src := strings.Replace(glowing, "start = \"800 K\"\n", "", 1)
	if got := refusal(t, "[run]\nstart = \"cycle\"\n"+src); !strings.Contains(got, "not linear") || !strings.Contains(got, "radiant") {
		t.Errorf("%s", got)
	}
}

// A slow store under fast pulses: thousands of periods from its cycle, which is found all
// the same. What comes in on the mean goes out, and at that mean nothing else moves.
func TestHastenedCycle(t *testing.T) {
	m := model(t, strings.Replace(strings.Replace(glowing, "\"0.1 K\"", "\"300 K\"", 1), "100 J/K\"\nstart = \"800 K\"", "2 kJ/K\"\nstart = \"300 K\"", 1)+`
[thermal.source.load]
into = "body"
drive = { pulse = { low = "0 W", high = "40 W", width = "1 s", period = "2 s" } }
[run]
to = "1 min"
[[table]]
show = ["body", "flow of radiant"]
every = "10 s"
`)
	c, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	body, flow := c.Cycles[0], c.Cycles[1]
	near(t, "what it radiates on the mean", &flow.Mean, 20, 1e-6)
	// the swing is so small that the mean is where T⁴ is: second order in it
	near(t, "mean", &body.Mean, math.Pow(300*300*300*300+20/(stefanBoltzmann*0.01), 0.25), 1e-4)
	near(t, "swing", ptr(body.Max-body.Min), 20.0/2000, 1e-6)
	if body.Cycles != nil || c.Warnings[0].Code != "search-stopped" {
		t.Errorf("%v periods to 2 %%, warnings %+v", body.Cycles, c.Warnings)
	}
}

func ptr(v float64) *float64 { return &v }
