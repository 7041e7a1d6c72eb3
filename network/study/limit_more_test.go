package study_test

import (
	"math"
	"slices"
	"strings"
	"testing"

	"lagbook/network/study"
)

// pulsed is body under a pulse train whose cycle is known: rises by 20 K at most.
var pulsed = strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`,
	`{ pulse = { low = "0 W", high = "10 W", width = "30 s", period = "120 s", at = "40 s" } }`, 1) + "[run]\nto = \"30 min\"\n"

// cycleOf is the lowest and highest rise of pulsed in its cycle.
func cycleOf() (low, high float64) {
	low = 20 * (math.Exp(-90.0/200) - math.Exp(-120.0/200)) / -math.Expm1(-120.0/200)
	return low, low*math.Exp(-30.0/200) - 20*math.Expm1(-30.0/200)
}

// limitsOf judges a case that has one limit of each name.
func limitsOf(t *testing.T, src string) map[string]study.Limit {
	t.Helper()
	a, err := model(t, src).Limits()
	if err != nil {
		t.Fatal(err)
	}
	list := map[string]study.Limit{}
	for _, l := range a.Limits {
		list[l.Name] = l
	}
	return list
}

// Limits on the periodic state, in closed form and marched.
func TestLimitsInCycle(t *testing.T) {
	src := pulsed + `
[limit.swing]
of = "body"
in = "cycle"
swing_below = "3 K"
[limit.top]
of = ["room", "body"]
in = "cycle"
stay_below = "30 °C"
[limit.rise]
of = "body"
in = "cycle"
rise_rate_below = "6 K/min"
margin = "1 %"
[limit.fall]
of = "body"
in = "cycle"
fall_rate_below = "1 K/min"
[limit.warm]
of = "body"
above = "room"
in = "cycle"
time_above = { level = "5 K", less_than = "1 min" }
[limit.daily]
of = "body"
above = "room"
in = "cycle"
time_above = { level = "5 K", less_than = "10 h", per = "day" }
`
	low, high := cycleOf()
	// above 5 K from where the pulse lifts it to where it has cooled to it
	above := 30 + 200*math.Log((20-5)/(20-low)) + 200*math.Log(high/5)
	for _, c := range []struct {
		name, src string
		tol       float64
	}{{"closed", src, 1e-9}, {"marched", src + aside, 2e-4}} {
		l := limitsOf(t, c.src)
		for _, x := range []struct {
			limit             string
			value, at, margin float64
			met               bool
			unit, of          string
		}{
			{"swing", high - low, 70, 3 - (high - low), true, "K", "body"},
			{"top", 293.15 + high, 70, 303.15 - 293.15 - high, true, "K", "body"},
			{"rise", (20 - low) / 200, 40, 0.1 - (20-low)/200, true, "K/s", "body"},
			{"fall", high / 200, 70, 1./60 - high/200, high/200 < 1./60, "K/s", "body"},
			{"warm", above, math.NaN(), 60 - above, above < 60, "s", "body above room"},
			{"daily", above * 720, math.NaN(), 36000 - above*720, above*720 < 36000, "s", "body above room"},
		} {
			v := l[x.limit]
			scale := math.Max(1, math.Abs(x.value))
			near(t, c.name+" "+x.limit, v.Value, x.value, c.tol*scale)
			near(t, c.name+" margin of "+x.limit, v.Margin, x.margin, c.tol*scale)
			if !math.IsNaN(x.at) {
				near(t, c.name+" "+x.limit+" at", v.At, x.at, 1e-6)
			}
			if v.Met != x.met || v.Unit != x.unit || v.Of != x.of || v.In != "cycle" {
				t.Errorf("%s: %+v", c.name, v)
			}
		}
		if v := l["top"]; v.Among != 2 || !strings.HasPrefix(v.Text, "body, the worst of 2: ") {
			t.Errorf("%+v", v)
		}
		near(t, "margin asked", l["rise"].MarginAsked, 0.001, 1e-15)
	}
}

// Without anything that repeats there is no cycle to judge.
func TestLimitInNoCycle(t *testing.T) {
	for _, src := range []string{body, body + aside} {
		l := limitsOf(t, src+"[run]\nto = \"1 h\"\n[limit.x]\nof = \"body\"\nin = \"cycle\"\nswing_below = \"1 K\"\n[limit.y]\nof = \"body\"\nstay_below = \"90 °C\"\n")
		if x := l["x"]; x.Met || x.Value != nil || !strings.Contains(x.Text, "there is no cycle: no load repeats for ever") {
			t.Errorf("%+v", x)
		}
		if !l["y"].Met {
			t.Errorf("%+v", l["y"])
		}
	}
}

// The linear answer to a case that is not linear judges the cycle of its linear network.
func TestLimitInLinearCycle(t *testing.T) {
	l, err := model(t, pulsed+aside+"[limit.swing]\nof = \"body\"\nin = \"cycle\"\nswing_below = \"3 K\"\n").LimitsBoth()
	if err != nil {
		t.Fatal(err)
	}
	low, high := cycleOf()
	near(t, "linear", l.Linear[0].Value, high-low, 1e-9)
	near(t, "marched", l.Limits[0].Value, high-low, 1e-4)
}

// Rates over the run: largest just after the step, 10 W / (100 J/K); windows; what jumps.
func TestRates(t *testing.T) {
	src := body + `
[run]
to = "10 min"
[thermal.node.skin]
[thermal.resistance.paint]
between = ["body", "skin"]
value = "0.5 K/W"
[thermal.source.lamp]
into = "skin"
drive = { step = { from = "0 W", to = "2 W", at = "100 s" } }
[limit.first]
of = "body"
rate_below = "0.2 K/s"
[limit.later]
of = "body"
after = "200 s"
rate_below = "0.2 K/s"
[limit.fall]
of = "body"
fall_rate_below = "0.2 K/s"
[limit.jump]
of = "skin"
rise_rate_below = "1 K/s"
[limit.not_down]
of = "skin"
fall_rate_below = "1 K/s"
[limit.before]
of = "skin"
until = "90 s"
rate_below = "1 K/s"
`
	for _, c := range []struct {
		src string
		tol float64
	}{{src, 1e-12}, {src + aside, 1e-5}} {
		l := limitsOf(t, c.src)
		near(t, "first", l["first"].Value, 0.1, c.tol)
		near(t, "at", l["first"].At, 0, 0)
		near(t, "share", l["first"].Percent, 50, 1e4*c.tol)
		near(t, "later", l["later"].Value, 0.1*math.Exp(-1)+0.02*math.Exp(-0.5), c.tol)
		near(t, "fall", l["fall"].Value, 0, c.tol)
		if v := l["jump"]; v.Met || v.Value != nil || *v.At != 100 || !strings.Contains(v.Text, "jumps by 1 K at 100 s") {
			t.Errorf("%+v", v)
		}
		if v := l["not_down"]; !v.Met {
			t.Errorf("%+v", v)
		}
		near(t, "before", l["before"].Value, 0.1, c.tol)
	}
}

// The time above a level of a sine is known; days run from t = 0, or from midnight where
// the clock says when that is.
func TestTimeAbove(t *testing.T) {
	src := `
[run]
to = "3 d"
CLOCK
[thermal.node.sky]
held = { sine = { mean = "20 °C", amplitude = "8 K", period = "1 d", highest_at = "14:00" } }
[thermal.node.box]
capacitance = "1 J/K"
[thermal.resistance.lid]
between = ["sky", "box"]
value = "1 K/W"
[limit.hot]
of = "sky"
time_above = { level = "24 °C", less_than = "1 d" }
[limit.daily]
of = "sky"
time_above = { level = "24 °C", less_than = "8.5 h", per = "day" }
margin = "10 %"
[limit.never]
of = "sky"
time_above = { level = "30 °C", less_than = "1 min" }
`
	above := 2 * math.Acos(0.5) / (2 * math.Pi) * 86400 // of each day: 8 h
	l := limitsOf(t, strings.Replace(src, "CLOCK", `clock = "00:00"`, 1))
	near(t, "hot", l["hot"].Value, 3*above, 1e-4)
	near(t, "first", l["hot"].At, 10*3600, 1e-4)
	near(t, "daily", l["daily"].Value, above, 1e-4)
	near(t, "margin", l["daily"].Margin, 0.5*3600, 1e-4)
	near(t, "asked", l["daily"].MarginAsked, 0.85*3600, 1e-9)
	if v := l["daily"]; v.Met || !v.PerDay || v.Unit != "s" { // half an hour in hand where 0.85 h are asked
		t.Errorf("%+v", v)
	}
	if v := l["never"]; !v.Met || *v.Value != 0 || v.At != nil {
		t.Errorf("%+v", v)
	}
	// at t = 0 it is 14:00: two hours of warmth in the first day are of the day before
	l = limitsOf(t, strings.Replace(src, "CLOCK", `clock = "14:00"`, 1))
	near(t, "three days from 14:00", l["hot"].Value, 3*above, 1e-4)
	near(t, "a day from midnight", l["daily"].Value, above, 1e-4)
}

// Of a list the worst decides, and the limit with the least share of its way in hand governs.
func TestLimitList(t *testing.T) {
	src := body + `
[run]
to = "10 min"
[thermal.node.far]
capacitance = "10 J/K"
[thermal.resistance.long]
between = ["body", "far"]
value = "30 K/W"
[limit.all]
of = ["far", "body"]
stay_below = "45 °C"
[limit.reached]
of = ["far", "body"]
reach = "20 °C"
within = "1 min"
[limit.swing]
of = ["body", "far"]
swing_below = "40 K"
`
	a, err := model(t, src).Limits()
	if err != nil {
		t.Fatal(err)
	}
	if l := a.Limits[0]; l.Of != "body" || l.Among != 2 || !l.Met {
		t.Errorf("%+v", l)
	}
	if l := a.Limits[1]; l.Met || !strings.Contains(l.Text, "already at 20 °C") || !l.Governs {
		t.Errorf("%+v", l)
	}
	if !slices.ContainsFunc(a.Warnings, func(w study.Warning) bool { return w.Code == "true-at-start" }) {
		t.Errorf("%+v", a.Warnings)
	}
	if l := a.Limits[2]; l.Of != "body" || !l.Met {
		t.Errorf("%+v", l)
	}
}
