package study_test

import (
	"strings"
	"testing"
)

// dry is a vessel of water out of which more is drawn than comes in: vapour forms.
const dry = `
[hydraulic]
fluid = "water"
at = "20 °C"
pressures = "absolute"
[hydraulic.node.vessel]
compliance = "1e-9 m³/Pa"
start = "1 bar(a)"
[hydraulic.node.sump]
held = "0.5 bar(a)"
[hydraulic.restriction.leak]
between = ["sump", "vessel"]
rated = { flow = "1 L/min", drop = "1 bar" }
[hydraulic.source.draw]
out_of = "vessel"
drive = "6 L/min"
[run]
to = "4 s"
`

// A march that has to stop: tables end there and say so, limits that it does not show
// are open, those failed before stay failed.
func TestStoppedRun(t *testing.T) {
	m := model(t, dry+`
[[table]]
show = ["vessel"]
every = "0.5 s"
[limit.low]
of = "vessel"
stay_above = "0.9 bar(a)"
[limit.high]
of = "vessel"
stay_below = "2 bar(a)"
[limit.half]
of = "vessel"
reach = "0.5 bar(a)"
within = "3 s"
[limit.quiet]
of = "vessel"
settle = "5 %"
within = "3 s"
[limit.soon]
of = "vessel"
until = "0.5 s"
stay_above = "0.3 bar(a)"
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	tab := a.Tables[0]
	last := tab.Rows[len(tab.Rows)-1]
	// without the leak, 1e-9 m³/Pa·(1 bar − 23.4 mbar) last 0.977 s at 6 L/min
	if tab.ValidUntil == nil || last[0] != *tab.ValidUntil || last[0] < 0.97 || last[0] > 1 {
		t.Fatalf("valid until %v, last row %v", tab.ValidUntil, last)
	}
	near(t, "vapour pressure of water at 20 °C", &last[1], 2339, 5) // IAPWS saturation line, 2.339 kPa
	if a.ValidUntil == nil || *a.ValidUntil != last[0] || !strings.Contains(a.Stopped, "vessel") {
		t.Errorf("%+v", a.Marched)
	}
	l, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	met := map[string]bool{}
	for _, v := range l.Limits {
		met[v.Name] = v.Met
		open := strings.Contains(v.Text, "cannot be judged")
		if want := v.Name == "high" || v.Name == "quiet"; open != want {
			t.Errorf("%s: %s", v.Name, v.Text)
		}
		if open && (v.Margin != nil || v.Governs) {
			t.Errorf("%s is open and has a margin, or governs: %+v", v.Name, v)
		}
	}
	if met["low"] || met["high"] || !met["half"] || !met["soon"] || l.Met {
		t.Errorf("met: %v", met)
	}
}

// What is shown of a tank has the units and kinds of its readings, and [print] theirs.
func TestReadings(t *testing.T) {
	m := model(t, `
[hydraulic]
density = "1000 kg/m³"
pressures = "gauge"
[print]
flow = "m³/h"
[hydraulic.node.t1]
tank = { area = "2 m²", floor = "0 m", overflow = "1.5 m", top = "2 m" }
start = { level = "1 m" }
[hydraulic.node.drain]
held = "0 bar"
[hydraulic.restriction.hole]
between = ["t1", "drain"]
fitting = { bore = "40 mm", loss = 2 }
[run]
to = "10 min"
[[table]]
show = ["level of t1", "stored of t1", "spill of t1", "flow of hole"]
every = "1 min"
[limit.low]
of = "level of t1"
stay_above = "0.2 m"
`)
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	var heads []string
	for _, c := range a.Tables[0].Columns[1:] {
		heads = append(heads, c.Unit+" "+m.Show.Unit(c.Unit, c.Kind))
	}
	if got := strings.Join(heads, ", "); got != "m m, m³ m³, m³/s m³/h, m³/s m³/h" {
		t.Errorf("units %s", got)
	}
	first := a.Tables[0].Rows[0]
	near(t, "level", &first[1], 1, 1e-9)
	near(t, "stored", &first[2], 2, 1e-9)
	c, err := m.Check()
	if err != nil {
		t.Fatal(err)
	}
	if len(c.State) < 2 || c.State[0].Name != "level of t1" || c.State[0].Unit != "m" {
		t.Errorf("state %+v", c.State)
	}
	if n := c.Nodes[0]; n.Kind != "stored" || n.Capacitance == nil {
		t.Errorf("%+v", n)
	}
	near(t, "area over ρ·g", c.Nodes[0].Capacitance, 2/(1000*9.80665), 1e-12)
	if _, err := m.Limits(); err != nil {
		t.Error(err)
	}
}

// Transfer functions lead from what drives a part, in its units; one that nobody asked
// for by name and that leads nowhere is left out.
func TestDrivenTransfers(t *testing.T) {
	src := `
[hydraulic]
density = "1000 kg/m³"
viscosity = "1 mPa·s"
pressures = "gauge"
[hydraulic.node.main]
compliance = "1e-8 m³/Pa"
[hydraulic.node.out]
held = "0 bar"
[hydraulic.restriction.sv1]
between = ["main", "out"]
valve = { kv = "4 m³/h", opening = { points = [["0 s", "50 %"], ["10 s", "50 %"], ["12 s", "100 %"]] } }
[hydraulic.source.feed]
into = "main"
drive = "2 m³/h"
[thermal.node.body]
capacitance = "1 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.film]
between = ["body", "room"]
value = "1 K/W"
[run]
to = "30 s"
[[table]]
show = ["main", "body"]
every = "1 s"
`
	m := model(t, src+"[[transfer]]\nfrom = \"opening of sv1\"\nto = \"main\"\n[[transfer]]\nfrom = \"opening of sv1\"\nto = \"main\"\nabout = \"30 s\"\n")
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	// q = Kv·x·√(p/1 bar): at q = 2 m³/h dp/dx = −2·p/x with p = (2/(4·x))² bar
	near(t, "gain at half open", p.Transfers[0].Gain, -2*1e5/0.5, 20)
	near(t, "gain at fully open", p.Transfers[1].Gain, -2*0.25e5, 5)
	if p.Transfers[0].Unit != "Pa" {
		t.Errorf("unit %s", p.Transfers[0].Unit)
	}
	p, err = model(t, src).Poles()
	if err != nil {
		t.Fatal(err)
	}
	var pairs []string
	for _, tr := range p.Transfers {
		pairs = append(pairs, tr.Input+" to "+tr.Output)
	}
	if got := strings.Join(pairs, ", "); got != "out to main, room to body, feed to main" {
		t.Errorf("pairs %s", got)
	}
}
