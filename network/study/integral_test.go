package study_test

import (
	"math"
	"strings"
	"testing"
)

// filled is a vessel whose pressure steps from 1 to 2 bar at 5 s: it takes in 1 L at once,
// beside what runs off through a line.
const filled = `
[hydraulic.node.vessel]
held = { step = { from = "1 bar", to = "2 bar", at = "5 s" } }
compliance = "1e-8 m³/Pa"
[hydraulic.node.drain]
held = "0 bar"
[hydraulic.line.outlet]
between = ["vessel", "drain"]
resistance = "150 MPa·s/m³"
[run]
to = "20 s"
[result.fed]
integral_of = "flow of vessel"
[result.drained]
integral_of = "flow of outlet"
[result.kept]
expression = "= fed - drained"
[[table]]
show = ["fed", "drained", "kept"]
times = ["0 s", "4 s", "5 s", "20 s"]
[limit.fed]
of = "fed"
stay_below = "5 L"
[limit.rate]
of = "fed"
rate_below = "1 m³/s"
[find.four]
when = "fed"
crosses = "4 L"
`

// An impulse in a flow is a jump of its integral: what is fed in less what runs off is what
// the vessel takes.
func TestIntegralOfImpulse(t *testing.T) {
	m := model(t, filled)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	const off = 1e5 / 150e6 // m³/s at 1 bar
	for i, want := range [][3]float64{{0, 0, 0}, {4 * off, 4 * off, 0}, {5*off + 1e-3, 5 * off, 1e-3}, {35*off + 1e-3, 35 * off, 1e-3}} {
		row := tab.Tables[0].Rows[i]
		for k, v := range want {
			near(t, tab.Tables[0].Columns[k+1].Name, &row[k+1], v, 1e-13)
		}
	}
	lim, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	if l := lim.Limits[0]; l.Met || math.Abs(*l.Value-35*off-1e-3) > 1e-12 {
		t.Errorf("%+v", l)
	}
	near(t, "passes 5 L", lim.Limits[0].FirstOutside, 5+(4e-3-5*off)/2/off, 1e-6)
	if l := lim.Limits[1]; l.Met || !strings.Contains(l.Text, "jumps by 1 L at 5 s") {
		t.Errorf("%+v", l)
	}
	near(t, "at the jump", lim.Finds[0].At, 5, 0) // from 3.3 L to 4.3 L
}

// An integral that comes back has its extremes where its integrand changes its sign, in a
// sine of twelve periods too; the integral of an integral is known as well as its pieces.
func TestIntegralOfSine(t *testing.T) {
	src := `
[thermal.node.sky]
held = { sine = { mean = "20 °C", amplitude = "8 K", period = "100 s" } }
[thermal.node.box]
capacitance = "1 J/K"
[thermal.resistance.lid]
between = ["sky", "box"]
value = "1 K/W"
[run]
to = "20 min"
[result.warmth]
expression = "= sky - 20 °C"
[result.once]
integral_of = "warmth"
[result.twice]
integral_of = "once"
[[table]]
show = ["once", "twice"]
times = ["0 s", "25 s", "130 s", "20 min"]
[limit.top]
of = "once"
stay_below = "200 K·s"
[limit.swing]
of = "once"
swing_below = "1000 K·s"
[limit.low]
of = "once"
after = "60 s"
until = "110 s"
stay_above = "100 K·s"
[limit.reach]
of = "once"
reach = "1 K·s"
within = "1 min"
`
	m := model(t, src)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	w := 2 * math.Pi / 100
	for _, row := range tab.Tables[0].Rows {
		at := row[0]
		near(t, "once", &row[1], 8/w*(1-math.Cos(w*at)), 1e-9)
		near(t, "twice", &row[2], 8/w*(at-math.Sin(w*at)/w), 1e-4)
	}
	l := limitsOf(t, src)
	near(t, "highest", l["top"].Value, 16/w, 1e-9)
	near(t, "at", l["top"].At, 50, 1e-6)
	near(t, "first beyond", l["top"].FirstOutside, math.Acos(1-200*w/8)/w, 1e-9)
	near(t, "swing", l["swing"].Value, 16/w, 1e-9)
	near(t, "lowest of a window", l["low"].Value, 0, 1e-9)
	near(t, "at", l["low"].At, 100, 1e-6)
	near(t, "reached", l["reach"].At, math.Acos(1-w/8)/w, 1e-9)
}
