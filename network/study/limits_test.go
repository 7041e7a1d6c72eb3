package study_test

import (
	"math"
	"strings"
	"testing"

	"lagbook/network/study"
)

func limitOf(t *testing.T, src string) study.Limit {
	t.Helper()
	a, err := model(t, body+src).Limits()
	if err != nil {
		t.Fatal(err)
	}
	if len(a.Limits) != 1 {
		t.Fatalf("%d limits", len(a.Limits))
	}
	return a.Limits[0]
}

// Every kind of limit against the closed form of one store.
func TestLimits(t *testing.T) {
	const run = "[run]\nto = \"10 min\"\n[limit.x]\nof = \"body\"\n"
	end := 20 + 273.15 + rise(600)

	l := limitOf(t, run+`stay_below = "39.5 °C"`)
	near(t, "highest", l.Value, end, 1e-10)
	near(t, "at", l.At, 600, 0)
	near(t, "margin", l.Margin, 39.5+273.15-end, 1e-10)
	near(t, "share", l.Percent, 100*(19.5-rise(600))/19.5, 1e-8)
	if !l.Met || !l.Governs || l.Unit != "K" || l.FirstOutside != nil {
		t.Errorf("%+v", l)
	}

	l = limitOf(t, run+`stay_below = "30 °C"`)
	near(t, "first outside", l.FirstOutside, 200*math.Ln2, 1e-7)
	if l.Met {
		t.Error("a limit passed at 139 s is met")
	}

	l = limitOf(t, run+`stay_below = "39 °C"`)
	if !strings.HasPrefix(l.Text, "highest 39.004 °C") {
		t.Errorf("the value must not be rounded to the level: %q", l.Text)
	}

	l = limitOf(t, run+"stay_below = \"39.5 °C\"\nmargin = \"1 K\"")
	if l.Met || *l.Margin < 0 || !strings.Contains(l.Text, "1 K is asked") {
		t.Errorf("margin asked for: %+v", l)
	}

	l = limitOf(t, run+"stay_above = \"25 °C\"\nafter = \"100 s\"")
	near(t, "lowest", l.Value, 293.15+rise(100), 1e-10)
	near(t, "at", l.At, 100, 0)

	l = limitOf(t, run+"reach = \"30 °C\"\nwithin = \"3 min\"")
	near(t, "reached", l.At, 200*math.Ln2, 1e-7)
	near(t, "time left", l.Margin, 180-200*math.Ln2, 1e-7)
	if !l.Met || l.Unit != "s" {
		t.Errorf("%+v", l)
	}

	l = limitOf(t, run+"reach = \"30 °C\"\nafter = \"1 min\"\nwithin = \"1 min\"")
	near(t, "time left from after", l.Margin, 120-200*math.Ln2, 1e-7)
	if l.Met {
		t.Error("reached 19 s late, and met")
	}

	l = limitOf(t, run+"settle = \"1 K\"\nwithin = \"10 min\"")
	near(t, "settled", l.At, 200*math.Log(20), 1e-6)

	l = limitOf(t, run+"settle = \"5 %\"\nwithin = \"10 min\"")
	near(t, "settled within 5 %", l.At, 200*math.Log(20), 1e-6)

	l = limitOf(t, run+`overshoot_below = "5 %"`)
	near(t, "overshoot of one store", l.Value, 0, 0)
	if !l.Met {
		t.Errorf("%+v", l)
	}

	l = limitOf(t, run+"stay_below = \"25 K\"\nabove = \"room\"")
	near(t, "rise", l.Value, rise(600), 1e-10)
	if l.Kind != "difference" {
		t.Errorf("the kind of a rise is %q", l.Kind)
	}
}

// What cannot be judged is not met, and says why.
func TestLimitsThatCannotBeJudged(t *testing.T) {
	const run = "[run]\nto = \"10 min\"\n[limit.x]\nof = \"body\"\n"
	for _, c := range []struct{ name, limit, says string }{
		{"already there", "reach = \"20 °C\"\nwithin = \"1 min\"", "already at 20 °C"},
		{"never reached", "reach = \"50 °C\"\nwithin = \"1 min\"", "never reaches 50 °C"},
		{"reached later", "reach = \"39.5 °C\"\nwithin = \"10 min\"", "let the run be longer"},
		{"not settled", "settle = \"0.01 K\"\nwithin = \"10 min\"", "when the run ends"},
	} {
		l := limitOf(t, run+c.limit)
		if l.Met || !strings.Contains(l.Text, c.says) {
			t.Errorf("%s: met %v, %q", c.name, l.Met, l.Text)
		}
	}
}

// The worst of several decides, and the least share of the way governs.
func TestWorstDecides(t *testing.T) {
	m := model(t, body+`
[thermal.node.lid]
capacitance = "50 J/K"
[thermal.resistance.joint]
between = ["lid", "body"]
value = "1 K/W"
[run]
to = "5 min"
[limit.both]
of = ["lid", "body"]
stay_below = "60 °C"
[limit.lid]
of = "lid"
stay_below = "40 °C"
`)
	a, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	if a.Limits[0].Of != "body" {
		t.Errorf("%s decides, want body: it is the hotter", a.Limits[0].Of)
	}
	if a.Limits[0].Governs || !a.Limits[1].Governs {
		t.Errorf("the limit at 40 °C must govern: %+v", a.Limits)
	}
}
