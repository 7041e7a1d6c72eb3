package study_test

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"lagbook/hydraulic"
	"lagbook/network/casefile"
	"lagbook/network/study"
)

// riser fills a tank from a main; by hand: R = 50, L = 20, R_out = 150 in MPa, C = 0.1 L/kPa.
const riser = `
[hydraulic.node.main]
held = "3 bar"
[hydraulic.node.tank]
compliance = "1e-7 m³/Pa"
[hydraulic.node.drain]
held = "0 bar"
[hydraulic.line.riser]
between = ["main", "tank"]
resistance = "50 MPa·s/m³"
inertance = "20 MPa·s²/m³"
scale = { step = { from = 1, to = 0, at = "10 s" } }
[hydraulic.line.outlet]
between = ["tank", "drain"]
resistance = "150 MPa·s/m³"
[[transfer]]
from = "main"
to = "tank"
about = "10 s"
[[table]]
show = ["tank", "flow of riser"]
times = ["0 s", "10 s", "25 s"]
`

func codes(list []study.Warning) string {
	var s []string
	for _, w := range list {
		s = append(s, w.Code)
	}
	return strings.Join(s, " ")
}

// A riser that is shut: the tank drains by itself with 15 s, nothing comes from the
// main, and whoever reads it hears of the surge.
func TestRiserShut(t *testing.T) {
	m := model(t, riser)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	rows := tab.Tables[0].Rows
	near(t, "before", &rows[0][1], 225e3, 1e-13)
	near(t, "flow before", &rows[0][2], 1.5e-3, 1e-13)
	near(t, "after", &rows[2][1], 225e3*math.Exp(-1), 1e-7)
	if rows[1][2] != 0 || rows[2][2] != 0 {
		t.Errorf("flow while shut %v, %v", rows[1][2], rows[2][2])
	}
	if !strings.Contains(codes(tab.Warnings), "surge-not-shown") || !strings.Contains(tab.Warnings[0].Text, "riser is shut at once, first at 10 s") {
		t.Errorf("%+v", tab.Warnings)
	}
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain while shut", p.Transfers[0].Gain, 0, 0)
}

// A column before a valve that shuts, and a scale that only throttles: the one has a
// surge, the other none.
func TestSurgeOnlyWhereItStops(t *testing.T) {
	throttled := strings.Replace(riser, "to = 0, at", "to = 0.5, at", 1)
	tab, err := model(t, throttled).Tables()
	if err != nil {
		t.Fatal(err)
	}
	if strings.Contains(codes(tab.Warnings), "surge") {
		t.Errorf("%+v", tab.Warnings)
	}
	near(t, "flow before", &tab.Tables[0].Rows[0][2], 1.5e-3, 1e-13)
	valve := strings.Replace(riser, "scale = { step = { from = 1, to = 0, at = \"10 s\" } }\n", "", 1)
	valve = strings.Replace(valve, `"1e-7 m³/Pa"`, `"1e-7 m³/Pa"`+"\n[hydraulic.node.gate]", 1)
	valve = strings.Replace(valve, `["main", "tank"]`, `["main", "gate"]`, 1) + `
[hydraulic.line.valve]
between = ["gate", "tank"]
resistance = "1 MPa·s/m³"
scale = { step = { from = 1, to = 0, at = "4 s" } }
`
	if tab, err = model(t, valve).Tables(); err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(codes(tab.Warnings), "surge-not-shown") || tab.Tables[0].Rows[1][2] != 0 {
		t.Errorf("%+v, %v", tab.Warnings, tab.Tables[0].Rows)
	}
}

// Without a resistance there is nothing that a scale could divide but to shut it.
func TestScaleNeedsResistance(t *testing.T) {
	text := strings.Replace(riser, "resistance = \"50 MPa·s/m³\"\n", "", 1)
	c, ds := casefile.Read("case.toml", []byte(strings.Replace(text, "to = 0, at", "to = 0.5, at", 1)), nil, hydraulic.Vocabulary()...)
	if !casefile.Failed(ds) {
		_, ds = study.New(c)
	}
	if !strings.Contains(casefile.Listing(ds), `line "riser": a scale of 0.5 on a line with inertance and no resistance`) {
		t.Errorf("%s", casefile.Listing(ds))
	}
	model(t, text)
}

// A vessel held at a pressure that steps takes in C·Δp at once: 1 L. No number shown
// holds it, no limit in whose way it stands is judged, and JSON has no infinity.
func TestImpulse(t *testing.T) {
	text := `
[hydraulic.node.vessel]
held = { step = { from = "1 bar", to = "2 bar", at = "5 s" } }
compliance = "1e-8 m³/Pa"
[hydraulic.node.drain]
held = "0 bar"
[hydraulic.line.outlet]
between = ["vessel", "drain"]
resistance = "150 MPa·s/m³"
[[transfer]]
from = "vessel"
to = "flow of vessel"
[[table]]
show = ["flow of vessel", "flow of outlet"]
times = ["0 s", "5 s", "20 s"]
also = ["peaks"]
[limit.most]
of = "flow of vessel"
stay_below = "1 m³/s"
[limit.least]
of = "flow of vessel"
stay_above = "0 L/s"
[limit.later]
of = "flow of vessel"
stay_below = "1 m³/s"
after = "6 s"
`
	m := model(t, text)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	if w := tab.Warnings[0]; w.Code != "impulse" || !strings.Contains(w.Text, "an impulse of 1 L at 5 s") {
		t.Errorf("%+v", tab.Warnings)
	}
	for _, mark := range tab.Tables[0].Marks {
		if strings.Contains(mark.Text, "peak of flow of vessel") {
			t.Errorf("%+v", tab.Tables[0].Marks)
		}
	}
	near(t, "after the impulse", &tab.Tables[0].Rows[1][1], 2e5/150e6, 1e-14)
	lim, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	for k, met := range []bool{false, true, true} {
		if lim.Limits[k].Met != met || (lim.Limits[k].Value == nil) == met {
			t.Errorf("%+v", lim.Limits[k])
		}
	}
	if !strings.Contains(lim.Limits[0].Text, "cannot be judged: an impulse of 1 L at 5 s") {
		t.Errorf("%q", lim.Limits[0].Text)
	}
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	if tr := p.Transfers[0]; tr.Form != "improper" || len(tr.Polynomial) != 2 || tr.Polynomial[1] != 1e-8 {
		t.Errorf("%+v", tr)
	}
	f, err := m.Frequency(study.FrequencyQuestion{})
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(codes(f.Warnings), "improper") {
		t.Errorf("%+v", f.Warnings)
	}
	for _, answer := range []any{tab, lim, p, f} { // JSON refuses what is not finite
		if _, err := json.Marshal(answer); err != nil {
			t.Error(err)
		}
	}
	pulse := strings.Replace(text, `{ step = { from = "1 bar", to = "2 bar", at = "5 s" } }`, `{ pulse = { low = "1 bar", high = "2 bar", width = "5 s", period = "20 s" } }`, 1)
	c, err := model(t, pulse).Cycle()
	if err != nil {
		t.Fatal(err)
	}
	if w := c.Warnings[0]; w.Code != "impulse" || !strings.Contains(w.Text, "an impulse of 1 L at 0 s and 1 more") {
		t.Errorf("%+v", c.Warnings)
	}
}

// A pair on the axis has the damping ratio 0, whatever rounding its real part holds,
// and a run of no stated end shows five swings.
func TestUndamped(t *testing.T) {
	m := model(t, `
[hydraulic.node.a]
compliance = "1.1e-7 m³/Pa"
start = "1 bar"
[hydraulic.node.b]
compliance = "3.3e-7 m³/Pa"
start = "0 bar"
[hydraulic.node.c]
compliance = "2.7e-7 m³/Pa"
start = "0 bar"
[hydraulic.line.ab]
between = ["a", "b"]
inertance = "21 MPa·s²/m³"
start = "0 L/s"
[hydraulic.line.bc]
between = ["b", "c"]
inertance = "7.3 MPa·s²/m³"
start = "0 L/s"
[hydraulic.line.ca]
between = ["c", "a"]
inertance = "5.9 MPa·s²/m³"
start = "0 L/s"
[hydraulic.source.s]
into = "a"
drive = { step = { from = "0 L/s", to = "1 L/s", at = "1 s" } }
`)
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	pairs, slowest := 0, math.Inf(1)
	for _, q := range p.Modes {
		if q.Im == 0 {
			continue
		}
		pairs++
		slowest = math.Min(slowest, math.Abs(q.Im))
		if *q.DampingRatio != 0 || math.Signbit(*q.DampingRatio) || math.Abs(q.Re) > *q.ErrorBound {
			t.Errorf("%+v: damping ratio %v", q, *q.DampingRatio)
		}
	}
	if pairs == 0 {
		t.Fatal("no pair")
	}
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	rows := tab.Tables[0].Rows
	near(t, "end", &rows[len(rows)-1][0], 10*math.Pi/slowest, 1e-12)
}
