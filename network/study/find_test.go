package study_test

import (
	"math"
	"strings"
	"testing"

	"lagbook/network/study"
)

// findsOf answers a case that asks for finds alone.
func findsOf(t *testing.T, src string) map[string]study.Find {
	t.Helper()
	list, _, err := model(t, src).Finds()
	if err != nil {
		t.Fatal(err)
	}
	byName := map[string]study.Find{}
	for _, f := range list {
		byName[f.Name] = f
	}
	return byName
}

// The time of a crossing is the answer; that it never comes is said.
func TestFindCrossing(t *testing.T) {
	src := body + `
[run]
to = "10 min"
[find.half]
when = "body"
crosses = "30 °C"
[find.never]
when = "body - room"
crosses = "25 K"
[find.later]
when = "body"
crosses = "39.5 °C"
[find.over]
when = "flow of load"
crosses = "5 W"
`
	for _, c := range []struct {
		src string
		tol float64
	}{{src, 1e-9}, {src + aside, 1e-3}} {
		f := findsOf(t, c.src)
		near(t, "half way", f["half"].At, 200*math.Ln2, c.tol)
		if x := f["half"]; x.Unit != "s" || x.Value != nil {
			t.Errorf("%+v", x)
		}
		if x := f["never"]; x.At != nil || !strings.Contains(x.Text, "never crosses 25 K in the run of 10 min; highest 19") {
			t.Errorf("%+v", x)
		}
		near(t, "jumps over it", f["over"].At, 0, 0)
		if x := f["later"]; x.At != nil || len(c.src) == len(src) && !strings.Contains(x.Text, "so later it does") {
			t.Errorf("%+v", x)
		}
	}
}

// runaway is a loss that doubles every 20 K over 2 K/W: lost where the slopes meet.
const runaway = `
[given]
loss = "5 W"
ambient = "20 °C"
film = "2 K/W"
[thermal.node.core]
capacitance = "100 J/K"
[thermal.node.room]
held = "= ambient"
[thermal.resistance.film]
between = ["core", "room"]
value = "= film"
[thermal.source.leakage]
into = "core"
drive = "= loss"
doubles_every = "20 K"
at = "40 °C"
[run]
to = "1 h"
`

// The steady state of losses P·2^((T−T₀)/d) over R is lost where P·R·ln 2/d·2^((T−T₀)/d) = 1
// and T − T_a = d/ln 2.
func TestFindLostSteadyState(t *testing.T) {
	const d, t0 = 20.0, 40.0
	hot := t0 + d*math.Log2(d/(5*2*math.Ln2)) - d/math.Ln2 + 273.15
	pr := d / math.Ln2 / math.Exp2((20+d/math.Ln2-t0)/d) // P·R at the fold, ambient 20 °C
	f := findsOf(t, runaway+`
[find.ambient]
no_steady_state = true
vary = "ambient"
[find.loss]
no_steady_state = true
vary = "loss"
[find.film]
no_steady_state = true
vary = "film"
range = ["1 K/W", "20 K/W"]
[find.not_there]
no_steady_state = true
vary = "film"
range = ["0.1 K/W", "2.5 K/W"]
[find.beyond]
no_steady_state = true
vary = "ambient"
range = ["80 °C", "90 °C"]
`)
	near(t, "ambient", f["ambient"].Value, hot, 1e-6)
	near(t, "loss", f["loss"].Value, pr/2, 1e-7)
	near(t, "film", f["film"].Value, pr/5, 1e-7)
	if x := f["ambient"]; x.Unit != "K" || x.Kind != "level" || x.At != nil || !strings.Contains(x.Text, "above 41.") {
		t.Errorf("%+v", x)
	}
	if x := f["not_there"]; x.Value != nil || !strings.Contains(x.Text, "is not lost") {
		t.Errorf("%+v", x)
	}
	if x := f["beyond"]; x.Value != nil || !strings.Contains(x.Text, "no steady state is found") {
		t.Errorf("%+v", x)
	}
}

// Of a linear network a pole crosses 0: where the slope of the load is the conductance.
func TestFindPoleAtZero(t *testing.T) {
	src := "[given]\nfeeds = \"0.1 W/K\"\n[scenario.hot]\nset = { feeds = \"0.45 W/K\" }\n" + body + `slope = "= feeds"
about = "20 °C"
[run]
start = "20 °C"
to = "10 min"
[find.grows]
no_steady_state = true
vary = "feeds"
`
	m := model(t, src)
	for _, under := range []string{"", "hot"} {
		if under != "" {
			list, err := m.Scenarios([]string{under})
			if err != nil {
				t.Fatal(err)
			}
			m.Use(list[0])
		}
		list, _, err := m.Finds()
		if err != nil {
			t.Fatal(err)
		}
		near(t, "slope", list[0].Value, 0.5, 1e-9)
		if list[0].Unit != "W/K" {
			t.Errorf("%+v", list[0])
		}
	}
}
