package hydraulic

import (
	"math"
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// circulation is an invented pump that drives water around against a valve alone, so that
// by affinity its flow goes with its speed.
const circulation = `
[hydraulic]
density = "1000 kg/m³"
[hydraulic.node.suction]
held = "1 bar"
[hydraulic.node.delivery]
[hydraulic.node.return]
held = "1 bar"
[hydraulic.pump.pump]
from = "suction"
to = "delivery"
rated_speed = "1450 rpm"
head = { flow = ["0 L/s", "8 L/s", "10 L/s", "15 L/s"], head = ["32 m", "26 m", "20 m", "5 m"], efficiency = [0, 0.7, 0.6, 0.3] }
[hydraulic.restriction.valve]
between = ["delivery", "return"]
rated = { flow = "10 L/s", drop = "196133 Pa" }
`

// A pump whose drive fails runs down against a square drop as s = 1/(1 + P·t/(J·ω²)): its
// power falls with s³ and its flow with s.
func TestTrip(t *testing.T) {
	m := casetest.Read(t, "trip.toml", strings.Replace(circulation, "[hydraulic.restriction.valve]",
		"trip = { at = \"1 s\", inertia = \"0.4 kg·m²\" }\n[hydraulic.restriction.valve]", 1), Vocabulary()...)
	tr := m.March(6, "speed of pump", "flow of pump", "shaft power of pump")
	omega, power := 2*math.Pi*1450/60, 1000*9.80665*0.01*20/0.6
	nearly(t, "power before", tr.At(2, 0.5), power, 1e-6)
	for _, at := range []float64{1.5, 3, 6} {
		s := 1 / (1 + power*(at-1)/(0.4*omega*omega))
		nearly(t, "speed", tr.At(0, at), 1450.0/60*s, 1e-5)
		nearly(t, "flow", tr.At(1, at), 0.01*s, 1e-5)
		nearly(t, "power", tr.At(2, at), power*s*s*s, 3e-5)
	}
	if e := tr.Events(); len(e) != 1 || e[0].What != "trips" || e[0].At != 1 {
		t.Errorf("events %v", e)
	}
}

// Its speed follows a waveform, and its flow by affinity.
func TestSpeedOfAPump(t *testing.T) {
	m := casetest.Read(t, "speed.toml", strings.Replace(circulation, "rated_speed",
		"speed = { points = [[\"0 s\", \"1450 rpm\"], [\"2 s\", \"725 rpm\"]] }\nrated_speed", 1), Vocabulary()...)
	tr := m.March(3, "flow of pump", "head of pump", "power of pump")
	for _, c := range []struct{ at, s float64 }{{0, 1}, {1, 0.75}, {2, 0.5}, {3, 0.5}} {
		nearly(t, "flow", tr.At(0, c.at), 0.01*c.s, 1e-7)
		nearly(t, "head", tr.At(1, c.at), 20*c.s*c.s, 1e-6)
		nearly(t, "power", tr.At(2, c.at), 1961.33*c.s*c.s*c.s, 1e-6)
	}
}

// A stopped pump lets liquid run back unless its non-return shuts.
func TestNonReturn(t *testing.T) {
	text := strings.Replace(circulation, "held = \"1 bar\"\n[hydraulic.pump", "held = \"2 bar\"\n[hydraulic.pump", 1)
	text = strings.Replace(text, "rated_speed", "speed = { stairs = [[\"0 s\", \"1450 rpm\"], [\"1 s\", \"0 rpm\"], [\"2 s\", \"1450 rpm\"]] }\nrated_speed", 1)
	tr := casetest.Read(t, "back.toml", text, Vocabulary()...).March(3, "flow of pump")
	if q := tr.At(0, 1.5); q > -5e-3 {
		t.Errorf("%g m³/s through a stopped pump against 1 bar", q)
	}
	cautioned := false
	for _, w := range tr.Cautions() {
		cautioned = cautioned || w.Code == "backflow"
	}
	if !cautioned {
		t.Error("nothing is said of liquid that flows back")
	}
	tr = casetest.Read(t, "back.toml", strings.Replace(text, "rated_speed", "non_return = true\nrated_speed", 1), Vocabulary()...).March(3, "flow of pump")
	if q := tr.At(0, 1.5); q != 0 {
		t.Errorf("%g m³/s through a non-return", q)
	}
	nearly(t, "flow again", tr.At(0, 2.5), tr.At(0, 0.5), 1e-9)
	if !(tr.At(0, 0.5) > 0.005) {
		t.Errorf("%g m³/s", tr.At(0, 0.5))
	}
	what := ""
	for _, e := range tr.Events() {
		what += e.What + "; "
	}
	if what != "its non-return shuts; its non-return opens; " {
		t.Errorf("events: %s", what)
	}
}

// A pump switched by the level of a tank fills it between the two levels, in the time that
// volume over flow gives.
func TestOnOff(t *testing.T) {
	m := casetest.Read(t, "fill.toml", `
[hydraulic]
density = "1000 kg/m³"
[hydraulic.node.sump]
held = "0 bar"
[hydraulic.node.tank]
tank = { area = "2 m²", floor = "4 m", top = "7 m" }
start = { level = "0.8 m" }
[hydraulic.pump.screw]
from = "sump"
to = "tank"
displacement = "0.5 L"
rated_speed = "1200 rpm"
slip = "10 %"
on_off = { of = "tank", on_below = "1 m", off_above = "2 m" }
[hydraulic.source.use]
out_of = "tank"
drive = "4 L/s"
`, Vocabulary()...)
	tr := m.March(2000, "level of tank", "flow of screw")
	fill := 0.5e-3 * 20 * 0.9
	nearly(t, "flow", tr.At(1, 10), fill, 1e-9)
	up, down := 2/(fill-4e-3), 2/4e-3 // s for each metre
	var when []float64
	for _, e := range tr.Events() {
		when = append(when, e.At)
	}
	want := []float64{1.2 * up, 1.2*up + down}
	for len(want) < len(when) {
		n := len(want)
		want = append(want, want[n-2]+up+down)
	}
	if len(when) < 3 {
		t.Fatalf("events at %v", when)
	}
	for k := range when {
		nearly(t, "switching", when[k], want[k], 1e-6)
	}
}

// What slips back grows with the pressure: 16 cm³ · 1450/min less 1 L/min at 200 bar.
func TestSlip(t *testing.T) {
	m := casetest.Read(t, "slip.toml", `
[hydraulic]
density = "870 kg/m³"
[hydraulic.node.tank]
held = "0 bar"
[hydraulic.node.press]
held = "100 bar"
[hydraulic.pump.gear]
from = "tank"
to = "press"
displacement = "16 cm³"
rated_speed = "1450 rpm"
slip = { flow = "1 L/min", at = "200 bar" }
`, Vocabulary()...)
	nearly(t, "flow", m.At(m.Begin(), "flow of gear")[0], (16e-6*1450-0.5e-3)/60, 1e-12)
	nearly(t, "derived", m.Derived("flow of gear without slip").SI, 16e-6*1450/60, 1e-12)
}
