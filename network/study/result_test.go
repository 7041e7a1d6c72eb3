package study_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"lagbook/network/study"

	"pgregory.net/rapid"
)

// aside is a part whose law is not linear and that touches nothing else: with it a case is
// marched.
const aside = `
[thermal.node.lamp]
capacitance = "50 J/K"
[thermal.node.wall]
held = { step = { from = "10 °C", to = "60 °C", at = "0 s" } }
[thermal.resistance.glow]
between = ["lamp", "wall"]
radiation = { emissivity = 0.9, area = "0.01 m²" }
`

// warmed is a body that warms up, with results of each kind.
const warmed = `
[given]
part = 0.25
[run]
to = "10 min"
` + body + `
[result.mixed]
mean = { body = "= part", room = "= 1 - part" }
[result.above]
expression = "= body - 25 °C"
[result.twice]
expression = "= 2 * above + (mixed - room)"
[result.lost]
integral_of = "flow of film"
[result.late]
integral_of = "above"
after = "100 s"
[result.square]
expression = "= (body - room) * ` + "`flow of film`" + `"
[result.share]
expression = "= lost / lost_in_all"
[[table]]
show = ["mixed", "above", "twice", "lost", "late", "square", "share"]
times = ["0 s", "1 min", "200 s", "10 min"]
`

// closedForms are the results of warmed at t, in SI.
func closedForms(t float64) []float64 {
	warm, left := 1-math.Exp(-t/200), math.Exp(-t/200)
	lost := 10 * (t - 200*warm)
	late := 0.0
	if t > 100 {
		late = 15*(t-100) - 20*200*(math.Exp(-0.5)-left)
	}
	return []float64{293.15 + 20*warm*0.25, 20*warm - 5, 2*(20*warm-5) + 5*warm, lost, late, 200 * warm * warm, lost / 4000}
}

func withShare(src string) string {
	return strings.Replace(src, "part = 0.25", "part = 0.25\nlost_in_all = \"4 kJ\"", 1)
}

// Results of each kind are their closed forms, in the closed form of the network and in a
// march.
func TestResults(t *testing.T) {
	for _, c := range []struct {
		name, src string
		tol       float64
	}{{"closed", withShare(warmed), 1e-11}, {"marched", withShare(warmed) + aside, 2e-5}} {
		m := model(t, c.src)
		a, err := m.Tables()
		if err != nil {
			t.Fatal(c.name, err)
		}
		if kinds := a.Tables[0].Columns; kinds[1].Kind != "level" || kinds[2].Kind != "difference" || kinds[4].Unit != "J" || kinds[5].Unit != "s·K" || kinds[7].Unit != "1" {
			t.Errorf("%s: columns %+v", c.name, kinds)
		}
		for _, row := range a.Tables[0].Rows {
			for k, want := range closedForms(row[0]) {
				if e := math.Abs(row[k+1]-want) / math.Max(1, math.Abs(want)); e > c.tol {
					t.Errorf("%s: %s at %v s is %v, want %v", c.name, a.Tables[0].Columns[k+1].Name, row[0], row[k+1], want)
				}
			}
		}
		if len(a.Results) != 7 || a.Results[3].Name != "lost" || math.Abs(a.Results[3].Value-closedForms(600)[3]) > 1e4*c.tol {
			t.Errorf("%s: results at the end %+v", c.name, a.Results)
		}
		sampled := 0
		for _, w := range a.Warnings {
			if w.Code == "sampled-result" {
				sampled++
			}
		}
		if sampled != 2 { // square and share; the others are sums or integrals
			t.Errorf("%s: %d results are sampled: %+v", c.name, sampled, a.Warnings)
		}
	}
}

// Extremes and crossings of results: of an integral where its integrand changes its sign, of
// an expression by its polynomials.
func TestResultLimits(t *testing.T) {
	src := withShare(warmed) + `
[limit.dip]
of = "fall"
stay_above = "-1 K·s"
[limit.square]
of = "square"
reach = "100 W·K"
within = "8 min"
[limit.lost]
of = "lost"
reach = "2 kJ"
within = "8 min"
[result.fall]
integral_of = "above"
[find.back]
when = "fall"
crosses = "0 K·s"
`
	for _, c := range []struct {
		name, src string
		tol       float64
	}{{"closed", src, 1e-7}, {"marched", src + aside, 1e-3}} {
		a, err := model(t, c.src).Limits()
		if err != nil {
			t.Fatal(c.name, err)
		}
		dip, square, lost := a.Limits[0], a.Limits[1], a.Limits[2]
		turn := -200 * math.Log(0.75) // 20(1 − e^(−t/200)) = 5
		near(t, c.name+" dip at", dip.At, turn, 10*c.tol)
		near(t, c.name+" dip", dip.Value, 15*turn-20*200*0.25, 100*c.tol)
		if dip.Met || dip.FirstOutside == nil {
			t.Errorf("%s: %+v", c.name, dip)
		}
		near(t, c.name+" square", square.At, -200*math.Log(1-math.Sqrt(0.5)), 100*c.tol)
		if !square.Met || !lost.Met || lost.Unit != "s" {
			t.Errorf("%s: %+v %+v", c.name, square, lost)
		}
		at := *lost.At
		if got := 10 * (at - 200*(1-math.Exp(-at/200))); math.Abs(got-2000) > 2000*c.tol {
			t.Errorf("%s: lost is %v at %v", c.name, got, at)
		}
		if f := a.Finds[0]; f.At == nil || *f.At != 0 || !slices.ContainsFunc(a.Warnings, func(w study.Warning) bool { return w.Code == "true-at-start" }) {
			t.Errorf("%s: %+v", c.name, f)
		}
	}
}

// A mean is linear in its weights, an integral adds up over time, whatever the load.
func TestResultsAddUp(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		share := rapid.Float64Range(0.01, 0.99).Draw(rt, "share")
		after := rapid.Float64Range(1, 500).Draw(rt, "after")
		high := float64(rapid.IntRange(-20_000, 20_000).Draw(rt, "high")) / 1000 // a file refuses numbers below the normal ones
		src := fmt.Sprintf(`
[given]
share = %v
[run]
to = "10 min"
`, share) + strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`, fmt.Sprintf(`{ points = [["0 s", "0 W"], ["100 s", "%v W"], ["300 s", "%v W"], ["300 s", "3 W"]] }`, high, -high/2), 1) + fmt.Sprintf(`
[result.mean]
mean = { body = "= share", room = "= 1 - share" }
[result.all]
integral_of = "flow of film"
[result.rest]
integral_of = "flow of film"
after = "%v s"
[[table]]
show = ["body", "room", "mean", "all", "rest"]
times = ["0 s", "%v s", "10 min"]
`, after, after)
		m := model(t, src)
		a, err := m.Tables()
		if err != nil {
			rt.Fatal(err)
		}
		rows := a.Tables[0].Rows
		for _, r := range rows {
			if d := r[3] - (share*r[1] + (1-share)*r[2]); math.Abs(d) > 1e-11 {
				rt.Fatalf("mean off by %v at %v", d, r[0])
			}
		}
		if d := rows[1][4] + rows[2][5] - rows[2][4]; math.Abs(d) > 1e-9 || rows[1][5] != 0 {
			rt.Fatalf("integral off by %v", d)
		}
	})
}

// A result without a value says so instead of a number.
func TestResultWithoutValue(t *testing.T) {
	m := model(t, body+`
[run]
to = "10 min"
[result.ratio]
expression = "= 1 K / (body - room)"
[[table]]
show = ["ratio"]
times = ["0 s", "1 min"]
`)
	if _, err := m.Tables(); err == nil || !strings.Contains(err.Error(), `result "ratio" has no value at 0 s`) {
		t.Errorf("%v", err)
	}
}

// In the periodic state an integral counts one period: what the load brings is carried off.
func TestResultCycle(t *testing.T) {
	pulsed := strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`,
		`{ pulse = { low = "0 W", high = "10 W", width = "30 s", period = "120 s", at = "40 s" } }`, 1) + `
[run]
to = "1 h"
[result.carried]
integral_of = "flow of film"
[limit.carried]
of = "carried"
in = "cycle"
stay_below = "301 J"
`
	for _, c := range []struct {
		src string
		tol float64
	}{{pulsed, 1e-9}, {pulsed + aside, 1e-2}} {
		m := model(t, c.src)
		a, err := m.Limits()
		if err != nil {
			t.Fatal(err)
		}
		l := a.Limits[0]
		near(t, "one period brings", l.Value, 300, c.tol)
		near(t, "at its end", l.At, 120, 1e-6)
		if !l.Met || l.In != "cycle" {
			t.Errorf("%+v", l)
		}
		y, err := m.Cycle()
		if err != nil {
			t.Fatal(err)
		}
		k := slices.IndexFunc(y.Cycles, func(c study.Cycle) bool { return c.Output == "carried" })
		if k < 0 {
			t.Fatalf("%+v", y)
		}
		near(t, "cycle", &y.Cycles[k].Max, 300, c.tol)
	}
}
