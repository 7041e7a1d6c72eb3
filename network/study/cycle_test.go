package study_test

import (
	"math"
	"strings"
	"testing"
)

// The cycle of one store under pulses by hand: extremes at the edges, mean by the
// mean load, cycles by the logarithm.
func TestCycle(t *testing.T) {
	m := model(t, strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`,
		`{ pulse = { low = "0 W", high = "10 W", width = "30 s", period = "120 s", at = "40 s" } }`, 1)+`
[[table]]
show = ["body"]
above = "room"
times = ["0 s", "1 min"]
`)
	a, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	c := a.Cycles[0]
	low := 20 * (math.Exp(-90.0/200) - math.Exp(-120.0/200)) / -math.Expm1(-120.0/200)
	high := low*math.Exp(-30.0/200) - 20*math.Expm1(-30.0/200)
	if c.Output != "body" || c.Unit != "K" || c.Kind != "level" || c.Period != 120 {
		t.Errorf("%+v", c)
	}
	near(t, "max", &c.Max, 293.15+high, 1e-11)
	near(t, "min", &c.Min, 293.15+low, 1e-11)
	near(t, "t_max", &c.MaxAt, 70, 1e-9)
	near(t, "t_min", &c.MinAt, 40, 1e-9)
	near(t, "mean", &c.Mean, 293.15+5, 1e-11)
	start := high * math.Exp(-50.0/200) // how far off it is at t = 0
	near(t, "cycles", c.Cycles, math.Ceil(200*math.Log(start/(0.02*(high-low)))/120), 0)
	rise := a.Cycles[len(a.Cycles)-1]
	if rise.Output != "body above room" || rise.Kind != "difference" {
		t.Errorf("%+v", rise)
	}
	near(t, "mean rise", &rise.Mean, 5, 1e-12)
}

// A start in the cycle, and where nothing repeats.
func TestStartCycle(t *testing.T) {
	m := model(t, "[run]\nstart = \"cycle\"\nto = \"10 min\"\n"+strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`,
		`{ pulse = { low = "0 W", high = "10 W", width = "30 s", period = "120 s" } }`, 1))
	a, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "cycles", a.Cycles[0].Cycles, 0, 0)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	rows := tab.Tables[0].Rows
	near(t, "first row", &rows[0][1], a.Cycles[0].Min, 1e-11)
	near(t, "last row", &rows[len(rows)-1][1], a.Cycles[0].Min, 1e-11)
	if !strings.Contains(tab.Start, "periodic state") {
		t.Errorf("start: %s", tab.Start)
	}
	still, err := model(t, body).Cycle()
	if err != nil || len(still.Cycles) != 0 || still.Warnings[0].Code != "nothing-repeats" {
		t.Errorf("%+v, %v", still, err)
	}
}
