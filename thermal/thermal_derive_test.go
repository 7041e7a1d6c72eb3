package thermal

import (
	"strings"
	"testing"
)

// manyParts is a case of parts that are not linear.
const manyParts = `
[run]
start = "20 °C"
[thermal.node.air]
held = "20 °C"
[thermal.node.body]
capacitance = "1 kJ/K"
[thermal.node.end]
capacitance = "1 kJ/K"
[thermal.resistance.sink]
between  = ["body", "air"]
value    = { value = "2 K/W", source = "maker's sheet" }
at_rise  = "40 K"
exponent = 0.25
[thermal.resistance.chart]
between = ["body", "air"]
points  = [["10 K", "9 K/W"], ["40 K", "7 K/W"]]
[thermal.resistance.board]
between = ["body", "air"]
shell   = { conductivity = [["0 °C", "0.2 W/(m·K)"], ["100 °C", "0.3 W/(m·K)"]], inner_radius = "1 cm", outer_radius = "2 cm", length = "1 m" }
[thermal.source.leak]
into          = "body"
drive         = "1 W"
doubles_every = "12 K"
at            = "50 °C"
[thermal.source.core]
into   = "body"
points = [["0 °C", "5 W"], ["60 °C", "9 W"]]
[thermal.heater.coil]
into   = "body"
watch  = "body"
on_off = { on_below = "30 °C", off_above = "33 °C" }
output = ["0 W", "20 W"]
[thermal.heater.fine]
into   = "body"
watch  = "body"
target = "25 °C"
pi     = { gain = "4 W/K", integral_time = "5 min" }
output = ["0 W", "20 W"]
[thermal.stream.pipe]
path  = ["air", "end"]
fluid = "water"
flow  = "1 L/min"
[thermal.plug.hold_up]
stream = "pipe"
volume = "2 L"
lumps  = 16
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`

// What check prints of parts that are not linear: the quantity, the formula and the numbers as typed.
func TestDerivationsOfRealParts(t *testing.T) {
	m := read(t, "derived", manyParts)
	for _, c := range []struct {
		quantity         string
		want             float64
		formula, numbers string
	}{
		{"resistance of sink at a rise of 40 K", 2, "R·(rise/at_rise)^(−n)", "2 K/W · (rise/40 K)^(−0.25)"},
		{"resistance of chart", 7, "R(rise), straight between points", "2 points; at the last, 40 K"},
		{"resistance of board at 20 °C", 0.5014445458014809, "ln(ro/ri)/(2π·k·L)", "(points)"}, // ln 2/(2π·0.22)
		{"doubling of leak", 12, "drive·2^((body − at)/doubles_every)", "doubles every 12 K from 50 °C on"},
		{"heat of core at the last of its points", 9, "heat(body), straight between points", "2 points, from 0 °C to 60 °C"},
		{"gap of coil", 3, "off_above − on_below", "33 °C − 30 °C"},
		{"proportional band of fine", 5, "(high − low)/gain", "(20 W − 0 W)/(4 W/K)"},
		{"travel time of hold_up", 120, "C/w", "(2 L of water at 20 °C)/(1 L/min of water at 20 °C)"},
		{"spread of a step in hold_up", 30, "τ/√N", "C/w/√16"},
	} {
		d := m.Derived(c.quantity)
		near(t, c.quantity, d.SI, c.want, 1e-9)
		if d.Formula != c.formula || !strings.Contains(d.Numbers, c.numbers) {
			t.Errorf("%s: %q with %q, want %q with %q", c.quantity, d.Formula, d.Numbers, c.formula, c.numbers)
		}
	}
	if d := m.Derived("resistance of sink at a rise of 40 K"); d.Source != "maker's sheet" {
		t.Errorf("source %q", d.Source)
	}
}

// Beyond their points, losses and catalogue resistances say so, once each.
func TestCautionsBeyondPoints(t *testing.T) {
	m := read(t, "beyond", hotBody("20 °C", `
[thermal.resistance.chart]
between = ["body", "air"]
points  = [["10 K", "2 K/W"], ["30 K", "1.5 K/W"]]
[thermal.source.core]
into   = "body"
points = [["10 °C", "40 W"], ["45 °C", "60 W"]]
`))
	said := map[string]int{}
	for _, w := range m.March(20000, "body").Cautions() {
		said[w.Text]++
	}
	for _, want := range []string{
		`the rise across resistance "chart" passes 30 K, the last of its points: its resistance there is used beyond`,
		`source "core" is asked beyond the temperatures of its points: the nearest of them is used`,
	} {
		if said[want] != 1 {
			t.Errorf("%q is said %d times: %v", want, said[want], said)
		}
	}
}
