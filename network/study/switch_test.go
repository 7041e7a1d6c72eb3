package study_test

import (
	"math"
	"strings"
	"testing"
)

// cooled is the body of the other tests with a film that loses part of its strength.
func cooled(scale, more string) string {
	return strings.Replace(body, `value = "2 K/W"`, `value = "2 K/W"`+"\nscale = "+scale, 1) + more
}

// A fan that slows down: two time constants by hand, the change on its row, the peak
// and the limit through it, the transfer functions before and after.
func TestScale(t *testing.T) {
	m := model(t, cooled(`{ step = { from = 1, to = "25 %", at = "100 s" } }`, `
[[transfer]]
from = "load"
to = "body"
[[transfer]]
from = "load"
to = "body"
about = "100 s"
[[table]]
show = ["body", "flow of film"]
times = ["0 s", "50 s", "100 s", "300 s", "1000 s"]
[limit.warm]
of = "body"
stay_below = "60 °C"
`))
	at := func(t float64) float64 { return 80 + (rise(100)-80)*math.Exp(-(t-100)/800) }
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	rows := tab.Tables[0].Rows
	near(t, "before", &rows[1][1], 293.15+rise(50), 1e-11)
	near(t, "flow after", &rows[2][2], rise(100)/8, 1e-11)
	near(t, "after", &rows[3][1], 293.15+at(300), 1e-11)
	near(t, "flow", &rows[4][2], at(1000)/8, 1e-11)
	if marks := tab.Tables[0].Marks; len(marks) != 2 || marks[1].Text != "film 25 %" || marks[1].Row != 2 {
		t.Errorf("marks %+v", tab.Tables[0].Marks)
	}
	if !strings.Contains(tab.Linear, "between its steps") {
		t.Errorf("%s", tab.Linear)
	}
	lim, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "first outside", lim.Limits[0].FirstOutside, 100+800*math.Log((80-rise(100))/40), 1e-9)
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain before", p.Transfers[0].Gain, 2, 1e-14)
	near(t, "gain after", p.Transfers[1].Gain, 8, 1e-14)
	if p.Transfers[0].About != "start" || p.Transfers[1].About != "100 s" || p.Warnings[0].Code != "switches" {
		t.Errorf("about %q, %q, %+v", p.Transfers[0].About, p.Transfers[1].About, p.Warnings)
	}
	c, err := m.Check()
	if err != nil {
		t.Fatal(err)
	}
	if last := c.Inputs[len(c.Inputs)-1]; last.Name != "film" || last.Wave != "100 % from 0 s, 25 % from 100 s" {
		t.Errorf("%+v", last)
	}
}

// A winding whose loss grows with its temperature: drive·(1 + α(T − at)) by hand.
func TestPerKelvin(t *testing.T) {
	m := model(t, strings.Replace(body, `{ step = { from = "0 W", to = "10 W", at = "0 s" } }`,
		`{ step = { from = "10 W", to = "20 W", at = "60 s" } }`+"\nper_kelvin = \"1 %/K\"\nat = \"20 °C\"", 1)+`
[[table]]
show = ["body"]
times = ["0 s", "60 s", "400 s"]
[[transfer]]
from = "load"
to = "body"
about = "2 min"
`)
	tab, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	rows := tab.Tables[0].Rows
	start, end := 10/(0.5-0.1), 20/(0.5-0.2)
	near(t, "start", &rows[0][1], 293.15+start, 1e-11)
	near(t, "at the step", &rows[1][1], 293.15+start, 1e-11)
	near(t, "after", &rows[2][1], 293.15+end+(start-end)*math.Exp(-340*0.3/100), 1e-11)
	p, err := m.Poles()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain", p.Transfers[0].Gain, 1/0.3, 1e-13)
}

// A scale that never changes is the same as other numbers: of a stream with a
// passage, and of an impedance.
func TestConstantScale(t *testing.T) {
	const text = `
[thermal.node.inlet]
held = "15 °C"
[thermal.node.water]
capacitance = "80 J/K"
[thermal.node.plate]
capacitance = "200 J/K"
[thermal.stream.loop]
path = ["inlet", "water"]
capacity_rate = "RATE"
[thermal.passage.along]
stream = "loop"
along = "plate"
conductance = "3 W/K"
[thermal.impedance.joint]
between = ["plate", "room"]
cauer = [["10 J/K", "R1"], ["30 J/K", "R2"]]
[thermal.node.room]
held = "20 °C"
[thermal.source.load]
into = "plate"
drive = { step = { from = "0 W", to = "50 W", at = "0 s" } }
[[table]]
show = ["water", "plate", "flow of joint"]
times = ["0 s", "20 s", "100 s"]
`
	rows := func(text string) [][]float64 {
		a, err := model(t, text).Tables()
		if err != nil {
			t.Fatal(err)
		}
		return a.Tables[0].Rows
	}
	plain := rows(strings.NewReplacer("RATE", "2 W/K", "R1", "4 K/W", "R2", "2 K/W").Replace(text))
	scaled := rows(strings.NewReplacer(`"RATE"`, "\"4 W/K\"\nscale = 0.5", "R1", "2 K/W", `"R2"]]`, "\"1 K/W\"]]\nscale = \"50 %\"").Replace(text))
	for i := range plain {
		for k := range plain[i] {
			near(t, "scaled", &scaled[i][k], plain[i][k], 1e-11)
		}
	}
	// switched to half just at t = 0⁺ from half before is no switch; to nothing, the water
	// keeps its level and the plate no longer feels it
	off := rows(strings.NewReplacer(`"RATE"`, "\"4 W/K\"\nscale = { step = { from = 1, to = 0, at = \"10 s\" } }", "R1", "2 K/W", `"R2"`, `"1 K/W"`).Replace(text))
	near(t, "water at rest", &off[2][1], off[1][1], 1e-11)
}

// A door in the cycle: its period counts, and a start in the cycle stays in it.
func TestScaleCycle(t *testing.T) {
	m := model(t, "[run]\nstart = \"cycle\"\nto = \"1 h\"\n"+cooled(`{ pulse = { low = 1, high = 4, width = "1 min", period = "10 min", at = "2 min" } }`, ""))
	a, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	c := a.Cycles[0]
	// low up to 2 min, then 1 min of the strong film, by hand
	g1, g4 := math.Exp(-540.0/200), math.Exp(-60.0/50)
	high := (20*(1-g1) + g1*5*(1-g4)) / (1 - g1*g4)
	near(t, "max", &c.Max, 293.15+high, 1e-11)
	near(t, "t_max", &c.MaxAt, 120, 1e-9)
	near(t, "min", &c.Min, 293.15+5+(high-5)*g4, 1e-11)
	near(t, "period", &c.Period, 600, 0)
	// the load comes to its 10 W at t = 0, when the body stands at the room's level
	off, band := 20+(high-20)*math.Exp(120.0/200), 0.02*(c.Max-c.Min)
	if !(off*g1*g4 > band && off*g1*g4*g1*g4 < band) {
		t.Fatal("the case is not what the test takes it for")
	}
	near(t, "cycles", c.Cycles, 2, 0)
}
