package study_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"lagbook/network/study"
)

// warm is a body that radiates to a room at 300 K from the start on at its steady state,
// with a load that sets in.
func warm(load string) string {
	return strings.Replace(strings.Replace(glowing, "\"0.1 K\"", "\"300 K\"", 1), "start = \"800 K\"\n", "", 1) + `
[thermal.source.load]
into = "body"
drive = { step = { from = "0 W", to = "` + load + `", at = "0 s" } }
[run]
to = "4 h"
[[table]]
show = ["body"]
from = "0 s"
to = "4 h"
every = "10 min"
`
}

// slope is that of the radiation at 300 K, W/K.
const slope = 4 * stefanBoltzmann * 0.01 * 27e6

// --linear is the closed form about the start, added to it.
func TestLinearAnswer(t *testing.T) {
	m := model(t, warm("2 W")).Linear()
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range a.Tables[0].Rows {
		near(t, "body", &r[1], 300-2/slope*math.Expm1(-slope*r[0]/100), 1e-8)
	}
	if a.Marched != nil || a.Warnings[0].Code != "linearised" {
		t.Errorf("%+v", a.Evidence)
	}
}

// Poles of a nonlinear case are those about a state, which the answer names.
func TestPolesAbout(t *testing.T) {
	m := model(t, warm("20 W")+`
[[transfer]]
from = "load"
to = "body"
[[transfer]]
from = "load"
to = "body"
about = "4 h"
`)
	a, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "pole about the start", &a.Transfers[0].Poles[0].Re, -slope/100, 1e-12)
	near(t, "gain about the start", a.Transfers[0].Gain, 1/slope, 1e-9)
	hot := math.Pow(300*300*300*300+20/(stefanBoltzmann*0.01), 0.25) // as good as steady after 4 h
	near(t, "pole about 4 h", &a.Transfers[1].Poles[0].Re, -4*stefanBoltzmann*0.01*hot*hot*hot/100, 1e-7)
	if a.About != "start" || a.Transfers[0].About != "start" || a.Transfers[1].About != "4 h" {
		t.Errorf("about %q: %q, %q", a.About, a.Transfers[0].About, a.Transfers[1].About)
	}
	if a.Warnings[0].Code != "linearised" || !strings.Contains(a.Warnings[0].Text, "radiant") {
		t.Errorf("warnings %+v", a.Warnings)
	}
	f, err := m.Frequency(study.FrequencyQuestion{At: []study.Band{{From: 1e-3, To: 1e-3}}})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain at 1 mrad/s", f.Transfers[0].Points[0].Gain, 1/math.Hypot(slope, 100*1e-3), 1e-9)
}

// Both answers side by side: the largest difference, when, and over what change the
// linear one holds. In the end the difference is that of T⁴ and its tangent.
func TestBothAnswers(t *testing.T) {
	m := model(t, warm("20 W"))
	a, err := m.TablesBoth()
	if err != nil {
		t.Fatal(err)
	}
	hot := math.Pow(300*300*300*300+20/(stefanBoltzmann*0.01), 0.25)
	d := a.Differences[0]
	near(t, "largest difference", &d.Largest, hot-(300+20/slope), 0.05)
	if d.Output != "body" || d.At < 3*3600 || d.Share == nil {
		t.Errorf("%+v", d)
	}
	if a.Range == nil || a.Range.Share <= 0 || a.Range.Share >= 1 {
		t.Fatalf("range %+v", a.Range)
	}
	// for a share x of 20 W the linear rise is 20·x/slope and the true one a little less
	off := func(x float64) float64 {
		rise := math.Pow(300*300*300*300+20*x/(stefanBoltzmann*0.01), 0.25) - 300
		return 1 - rise/(20*x/slope)
	}
	if x := a.Range.Share; off(x) > 0.0505 || off(1.1*x) < 0.05 {
		t.Errorf("the linear answer is said to hold up to %v of the load, where it is off by %v", x, off(x))
	}
	if !strings.Contains(a.Range.Text, "load from 0 W to") {
		t.Errorf("range %q", a.Range.Text)
	}
	l, err := m.LimitsBoth()
	if err != nil || len(l.Limits) != 0 || !l.Met {
		t.Errorf("%+v, %v", l, err)
	}
}

// Where the heat goes: all that comes in goes out, at the start and in the end.
func TestFlows(t *testing.T) {
	m := model(t, warm("20 W")+`
[thermal.node.inner]
capacitance = "10 J/K"
[thermal.resistance.bond]
between = ["inner", "body"]
value = "0.5 K/W"
[thermal.source.core]
into = "inner"
drive = "4 W"
`)
	list, err := m.Flows()
	if err != nil {
		t.Fatal(err)
	}
	if len(list) != 2 || list[0].When != "start" || list[1].When != "end" {
		t.Fatalf("%+v", list)
	}
	start, end := list[0], list[1]
	near(t, "in at the start", &start.In, 4, 1e-9)
	near(t, "in at the end", &end.In, 24, 1e-9)
	if s := start.Stack; len(s) != 2 || s[0].From != "inner" || s[1].Part != "radiant" || s[1].To != "walls" {
		t.Fatalf("stack %+v", s)
	}
	near(t, "drop in the bond", &start.Stack[0].Drop, 2, 1e-9)
	near(t, "flow to the walls", &end.Stack[0].Flow, 24, 0.05)
	near(t, "share of the core at the start", start.Lines[0].Share, 1, 1e-9)
	c, err := m.Check()
	if err != nil {
		t.Fatal(err)
	}
	if len(c.Nonlinear) != 1 || c.Nonlinear[0] != "radiant" {
		t.Errorf("not linear: %v", c.Nonlinear)
	}
	for _, b := range c.Branches {
		if b.Name == "bond" || b.Name == "radiant" && b.Flow != nil {
			near(t, "flow of "+b.Name, b.Flow, 4, 1e-9)
		}
	}
}

// Losses that double every d kelvin, P·2^((T−T₀)/d), over a resistance R: the steady state
// is lost where the slopes meet, at T = T₀ + d·log₂(d/(P·R·ln 2)) and surroundings d/ln 2
// colder than that.
func TestRunaway(t *testing.T) {
	src := `
[thermal.node.core]
capacitance = "100 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.film]
between = ["core", "room"]
value = "2 K/W"
[thermal.source.leakage]
into = "core"
drive = "5 W"
doubles_every = "20 K"
at = "40 °C"
[run]
to = "1 h"
`
	hot := 40 + 20*math.Log2(20/(5*2*math.Ln2)) - 20/math.Ln2
	a, err := model(t, src).Check()
	if err != nil {
		t.Fatal(err)
	}
	notes := strings.Join(a.Notes, "\n")
	if want := study.NewPrinter(model(t, src).Case).Value(hot+273.15, "K", "level"); !strings.Contains(notes, "room at "+want) {
		t.Errorf("room at %s is not among\n%s", want, notes)
	}
	// the same fold in the losses: k·P·R·ln 2/d·2^((T−T₀)/d) = 1 at T = 20 °C + d/ln 2
	k := 20 / (5 * 2 * math.Ln2) / math.Exp2((20+20/math.Ln2-40)/20)
	if want := fmt.Sprintf("all losses less than %.4g times", k); !strings.Contains(notes, want) {
		t.Errorf("%s is not among\n%s", want, notes)
	}
	if got := uncomputed(t, strings.Replace(src, "held = \"20 °C\"", "held = \"45 °C\"", 1)); !strings.Contains(got, "no steady state") {
		t.Errorf("beyond it: %s", got)
	}
}

// Asked both ways a linear case answers twice the same.
func TestBothOfLinear(t *testing.T) {
	m := model(t, body+"[[table]]\nshow = [\"body\"]\ntimes = [\"0 s\", \"100 s\"]\n")
	a, err := m.TablesBoth()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "difference", &a.Differences[0].Largest, 0, 0)
	if a.Range != nil || a.Tables[0].Rows[1][1] != a.Linear[0].Rows[1][1] {
		t.Errorf("%+v", a)
	}
}

// uncomputed is what is said of a case that cannot be checked.
func uncomputed(t *testing.T, src string) string {
	t.Helper()
	if _, err := model(t, src).Check(); err != nil {
		return err.Error()
	}
	t.Error("it is computed")
	return ""
}

// By hand, about the operating point: the balance closes, and the one mass has the slope there.
func TestHandAboutPoint(t *testing.T) {
	m := model(t, warm("20 W"))
	h, err := m.Hand()
	if err != nil {
		t.Fatal(err)
	}
	if len(h) != 3 {
		t.Fatalf("%+v", h)
	}
	near(t, "balance", &h[0].Hand, 0, 1e-9)
	hot := math.Pow(300*300*300*300+20/(stefanBoltzmann*0.01), 0.25)
	near(t, "time constant", &h[2].Hand, 100/(4*stefanBoltzmann*0.01*hot*hot*hot), 1e-4)
	near(t, "off", h[2].Off, 0, 1e-9)
}
