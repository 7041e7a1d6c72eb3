package study_test

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"lagbook/hydraulic"
	"lagbook/network/casefile"
	"lagbook/network/study"
	"lagbook/thermal"
)

// vocabulary is what the cases of these tests are made of.
func vocabulary() []casefile.Vocabulary {
	return append(thermal.Vocabulary(), hydraulic.Vocabulary()...)
}

// model builds the case of a text that is free of faults.
func model(t testing.TB, src string) *study.Model {
	t.Helper()
	c, ds := casefile.Read("case.toml", []byte(src), nil, vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, ds := study.New(c)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	return m
}

// body is one store of 100 J/K behind 2 K/W: a time constant of 200 s.
const body = `
[thermal.node.body]
capacitance = "100 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.film]
between = ["body", "room"]
value = "2 K/W"
[thermal.source.load]
into = "body"
drive = { step = { from = "0 W", to = "10 W", at = "0 s" } }
`

// rise is the closed form of body's rise above the room.
func rise(t float64) float64 { return 20 * -math.Expm1(-t/200) }

func near(t *testing.T, what string, got *float64, want, tol float64) {
	t.Helper()
	if got == nil {
		t.Errorf("%s is absent, want %v", what, want)
		return
	}
	if math.Abs(*got-want) > tol {
		t.Errorf("%s is %v, want %v ± %.1g", what, *got, want, tol)
	}
}

// Rows are reckoned from the first, the last is the end, and marks say what changed.
func TestTableTimes(t *testing.T) {
	m := model(t, body+`
[[table]]
show = ["body", "body - room", "flow of film"]
from = "0 s"
to = "1 s"
every = "0.1 s"
[[table]]
show = ["body"]
above = "room"
times = ["0 s", "200 s"]
also = ["peaks"]
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	rows := a.Tables[0].Rows
	if len(rows) != 11 || rows[10][0] != 1 || rows[3][0] != 0.3 {
		t.Errorf("%d rows, the last at %v", len(rows), rows[len(rows)-1][0])
	}
	for _, r := range rows {
		near(t, "body", &r[1], 293.15+rise(r[0]), 1e-10)
		near(t, "difference", &r[2], rise(r[0]), 1e-12)
		near(t, "flow", &r[3], rise(r[0])/2, 1e-12)
	}
	if c := a.Tables[0].Columns; c[1].Kind != "level" || c[2].Kind != "difference" || c[3].Unit != "W" {
		t.Errorf("columns %+v", c)
	}
	second := a.Tables[1]
	near(t, "rise", &second.Rows[1][1], rise(200), 1e-12)
	if len(second.Marks) != 2 || second.Marks[0].Text != "load 10 W" || second.Marks[1].Text != "peak of body" {
		t.Errorf("marks %+v", second.Marks)
	}
}

// Without a question there is still a sensible answer.
func TestUnasked(t *testing.T) {
	m := model(t, body)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	if len(tab.Tables) != 1 || len(tab.Tables[0].Rows) != 13 {
		t.Fatalf("%+v", tab.Tables)
	}
	near(t, "end of the run: five time constants", &tab.Tables[0].Rows[12][0], 1000, 1e-9)
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	if len(p.Transfers) != 2 { // room and load, each to body
		t.Fatalf("%d transfers", len(p.Transfers))
	}
	lim, err := m.Limits()
	if err != nil || !lim.Met || lim.Warnings[0].Code != "no-limits" {
		t.Errorf("%+v, %v", lim, err)
	}
}

// A load typed from 0 s starts the case at its own steady state: said so.
func TestStartUnderLoad(t *testing.T) {
	m := model(t, strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`, `{ stairs = [["0 s", "10 W"], ["60 s", "5 W"]] }`, 1))
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	if len(a.Warnings) != 1 || a.Warnings[0].Code != "start-under-load" {
		t.Errorf("warnings %+v", a.Warnings)
	}
}

// JSON has no null, and no number that is not one.
func TestJSONHasNoNull(t *testing.T) {
	a, err := model(t, body+"[[table]]\nshow = [\"body\"]\nevery = \"1 min\"\n[run]\nto = \"1 h\"\n[limit.x]\nof = \"body\"\nreach = \"90 °C\"\nwithin = \"1 h\"").Page()
	if err != nil {
		t.Fatal(err)
	}
	b, err := json.Marshal(a)
	if err != nil {
		t.Fatal(err)
	}
	if strings.Contains(string(b), "null") {
		t.Errorf("%s", b)
	}
}

// By hand and by computer agree exactly where there is one way out.
func TestHand(t *testing.T) {
	h, err := model(t, body).Hand()
	if err != nil {
		t.Fatal(err)
	}
	if len(h) != 3 {
		t.Fatalf("%d lines", len(h))
	}
	for _, l := range h {
		near(t, l.What, l.Off, 0, 1e-12)
	}
}

// A source that follows its own temperature grows: said in words, with the doubling time.
func TestUnstable(t *testing.T) {
	m := model(t, body+"slope = \"1 W/K\"\nabout = \"20 °C\"\n[run]\nstart = \"20 °C\"\nto = \"10 min\"\n")
	a, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	growth := (1 - 0.5) / 100.0
	near(t, "pole", &a.Modes[0].Re, growth, 1e-15)
	near(t, "time constant", a.Modes[0].TimeConstant, -1/growth, 1e-9)
	want := "unstable: an excess doubles every 2.31 min" // ln 2/0.005 = 138.6 s
	if len(a.Warnings) != 1 || a.Warnings[0].Text != want {
		t.Errorf("warnings %+v, want %q", a.Warnings, want)
	}
	h, err := m.Hand()
	if err != nil {
		t.Fatal(err)
	}
	if len(h) != 1 { // series resistances and Σ C·R say nothing of a case that runs away
		t.Fatalf("%+v", h)
	}
	near(t, "doubling by hand", h[0].Off, 0, 1e-12)
}

// The nodes that move together, and what each mode carries of the rise.
func TestModes(t *testing.T) {
	m := model(t, `
[thermal.node.small]
capacitance = "1 J/K"
[thermal.node.big]
capacitance = "1000 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.joint]
between = ["small", "big"]
value = "1 K/W"
[thermal.resistance.film]
between = ["big", "room"]
value = "9 K/W"
[thermal.source.load]
into = "small"
drive = "1 W"
[[transfer]]
from = "load"
to = "small"
`)
	a, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	slow, fast := a.Modes[0], a.Modes[1]
	if len(slow.Moves) != 2 || len(fast.Moves) != 1 || fast.Moves[0].Node != "small" {
		t.Errorf("slow %+v, fast %+v", slow.Moves, fast.Moves)
	}
	sum := 0.0
	for _, d := range a.Modes {
		if len(d.Shares) != 1 {
			t.Fatalf("shares %+v", d.Shares)
		}
		sum += d.Shares[0].Share
	}
	near(t, "shares add up", &sum, 1, 1e-12)
	near(t, "the slow share is about 9 of 10 K/W", &slow.Shares[0].Share, 0.9, 0.002)
	near(t, "gain", a.Transfers[0].Gain, 10, 1e-13)
}

// The network as understood: kinds, derivations, directions, the start.
func TestCheck(t *testing.T) {
	a, err := model(t, `
leaves_out = ["radiation"]
[given]
h = { value = "10 W/(m²·K)", source = "measured" }
[thermal.node.body]
capacitance = "100 J/K"
[thermal.node.skin]
[thermal.node.room]
held = "20 °C"
[thermal.resistance.joint]
between = ["body", "skin"]
value = "1 K/W"
[thermal.resistance.film]
between = ["skin", "room"]
film = { coefficient = "= h", area = "0.1 m²" }
[thermal.source.load]
into = "body"
drive = "3 W"
`).Check()
	if err != nil {
		t.Fatal(err)
	}
	kinds := map[string]string{}
	for _, n := range a.Nodes {
		kinds[n.Name] = n.Kind
	}
	if kinds["body"] != "stored" || kinds["skin"] != "massless" || kinds["room"] != "held" {
		t.Errorf("kinds %v", kinds)
	}
	near(t, "start of body", a.Nodes[0].Start, 293.15+3*2, 1e-10)
	film := a.Branches[1]
	if film.From != "skin" || film.To != "room" || film.Unit != "K/W" || math.Abs(film.Value-1) > 1e-15 || film.Formula != "1/(h·A)" {
		t.Errorf("%+v", film)
	}
	if len(a.Given) != 1 || a.Given[0].Value != 10 || a.Given[0].Source != "measured" {
		t.Errorf("%+v", a.Given)
	}
	if a.Start != "steady state of the values just before t = 0" || len(a.LeavesOut) != 1 {
		t.Errorf("start %q, left out %v", a.Start, a.LeavesOut)
	}
}

// Where heat has several ways out, the balance of a node is the check by hand.
func TestHandBalance(t *testing.T) {
	h, err := model(t, body+`
[thermal.node.cellar]
held = "10 °C"
[thermal.resistance.floor]
between = ["body", "cellar"]
value = "4 K/W"
`).Hand()
	if err != nil {
		t.Fatal(err)
	}
	if len(h) != 3 || h[0].Unit != "W" || math.Abs(h[0].Hand) > 1e-12 {
		t.Errorf("%+v", h)
	}
	if off := *h[1].Off; off < 0 {
		t.Errorf("Σ C·R by one way out is a bound from above, off by %v", off)
	}
}

// The same model answers for other given values.
func TestAt(t *testing.T) {
	m := model(t, strings.Replace(body, `value = "2 K/W"`, `value = "= r"`, 1)+"[given]\nr = \"2 K/W\"\n")
	gain := func() float64 {
		a, err := m.Poles()
		if err != nil {
			t.Fatal(err)
		}
		return *a.Transfers[1].Gain
	}
	if g := gain(); g != 2 {
		t.Errorf("gain %v, want 2", g)
	}
	given := m.Case.GivenValues()
	given[0].SI, given[0].Exact = 3, nil
	if ds := m.At(given); casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	if g := gain(); math.Abs(g-3) > 1e-15 {
		t.Errorf("gain %v, want 3", g)
	}
}
