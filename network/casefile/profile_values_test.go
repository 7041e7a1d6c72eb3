package casefile_test

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// profiled is a case in which source s follows drive and node n is held at held, beside
// profiles and a clock of 06:00.
func profiled(profiles, drive, held string) string {
	return `[given]
r = "2 mΩ"
v0 = "0.5 V"
k = 3
[run]
to = "100 s"
clock = "06:00"
` + profiles + `
[thermal.node.core]
capacitance = "1.8 kJ/K"
[thermal.node.air]
held = ` + held + `
[thermal.resistance.roll]
between = ["core", "air"]
value = "= 0.25 K/W * (k + r / 1 Ω + v0 / 1 V)"
[thermal.source.s]
into = "core"
drive = ` + drive + "\n"
}

const loads = `[profile.ramp]
points = [["0 s", "0 A"], ["10 s", "20 A"], ["20 s", "20 A"], ["20 s", "-4 A"], ["30 s", "6 A"]]
[profile.shift]
stairs = [["0 s", 1], ["5 s", 0.25], ["15 s", 2]]
before = 4
[profile.outside]
points = [["0 s", "20 °C"], ["100 s", "30 °C"]]
[profile.inside]
points = [["0 s", "20 °C"], ["100 s", "293.15 K"]]
[profile.swing]
sine = { mean = "1 A", amplitude = "2 A", period = "8 s" }
[profile.fade]
decay = [{ amplitude = "10 A", time_constant = "4 s" }]
[profile.beat]
pulse = { low = 0, high = 1, width = "1 s", period = "3 s" }
[profile.day]
stairs = [["00:00", "1 A"], ["08:00", "2 A"], ["18:00", "3 A"]]
repeat = "24 h"
`

func readProfiled(t *testing.T, text string) (*casefile.Case, casefile.Values) {
	t.Helper()
	c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if c == nil {
		t.Fatalf("%s", casefile.Listing(diags))
	}
	v, faults := c.Eval(nil)
	if faults != nil {
		t.Fatal(casefile.Listing(faults))
	}
	return c, v
}

func waveAt(t *testing.T, c *casefile.Case, v casefile.Values, table, name, key string) (at, left func(float64) float64, before float64) {
	t.Helper()
	e, ok := c.Element(table, name)
	if !ok {
		t.Fatal(name)
	}
	w := v.Wave[e.Wave(key)]
	return w.At, w.Left, w.Before
}

// TestProfileExpressions compares expressions with values worked out by hand at times
// between, at and before the breaks of their profiles.
func TestProfileExpressions(t *testing.T) {
	e := math.Exp
	sine := func(t float64) float64 { return 1 + 2*math.Sin(2*math.Pi*t/8) }
	tests := []struct {
		drive  string
		before float64
		at     map[float64]float64
		bound  bool // sampled
	}{
		{"= v0*ramp + r*ramp^2", 0, map[float64]float64{0: 0, 5: 5.2, 10: 10.8, 20: -1.968, 25: 0.502, 1000: 3.072}, false},
		{"= r*ramp^3/(1 A) - 1 W", -1, map[float64]float64{5: 1, 20: -1.128}, false},
		{"= r*(ramp*shift)^2", 0, map[float64]float64{2.5: 0.05, 5: 0.0125, 12.5: 0.05, 17: 3.2}, false},
		{"= 12 W * shift ^ -1", 3, map[float64]float64{0: 12, 5: 48, 15: 6}, false},
		{"= 12 W / shift + 2 W * sqrt(shift)", 7, map[float64]float64{0: 14, 5: 49, 15: 6 + 2*math.Sqrt2}, false},
		{"= 1 W * exp(-shift) * max(shift, 1)", 4 * e(-4), map[float64]float64{0: e(-1), 5: e(-0.25), 15: 2 * e(-2)}, false},
		{"= v0 * max(ramp, 5 A)", 2.5, map[float64]float64{0: 2.5, 2.5: 2.5, 5: 5, 20: 2.5, 29: 2.5, 29.5: 2.75}, false},
		{"= v0 * min(ramp, 5 A, 7 A)", 0, map[float64]float64{1: 1, 15: 2.5, 20: -2}, false},
		{"= v0 * abs(ramp)", 0, map[float64]float64{5: 5, 20: 2, 24: 0, 26: 1}, false},
		{"= -v0 * ramp", 0, map[float64]float64{5: -5, 20: 2}, false},
		{"= r * swing^2", 0.002, map[float64]float64{0: 0.002, 2: 0.018, 3.3: 0.002 * sine(3.3) * sine(3.3)}, false},
		{"= r * fade^2 + v0 * swing", 0.7, map[float64]float64{4: 0.002*100*e(-2) + 0.5*sine(4), 50: 0.002*100*e(-25) + 0.5*sine(50)}, false},
		{"= r * fade * swing * k", 0.06, map[float64]float64{3: 0.006 * 10 * e(-0.75) * sine(3)}, false},
		{"= 1 W * exp(-ramp/(10 A))", 1, map[float64]float64{5: e(-1), 15: e(-2), 20: e(0.4), 25: e(-0.1)}, true},
		{"= r * 1 A * abs(swing)", 0.002, map[float64]float64{1: 0.002 * sine(1), 6: 0.002}, true},
		{"= 1 W / (3 + ramp/(1 A) + shift)", 1.0 / 7, map[float64]float64{0: 1.0 / 4, 5: 1 / 13.25, 10: 1 / 23.25}, true},
		{"= 1 W * beat * (1 - beat) + v0*1 A", 0.5, map[float64]float64{0.5: 0.5, 1.5: 0.5, 300: 0.5}, false},
		{"= v0 * day", 0.5, map[float64]float64{0: 0.5, 2 * 3600: 1, 12 * 3600: 1.5, 17.9 * 3600: 1.5, 18 * 3600: 0.5, 26 * 3600: 1}, false},
		{"= v0*1 A + 1 W * (outside - inside)/(10 K)", 0.5, map[float64]float64{50: 1, 100: 1.5}, false},
		{"= r * ramp^2 * 0", 0, map[float64]float64{5: 0}, false},
		{"= 2 W ^ 1 * 2 ^ shift", 32, map[float64]float64{0: 4, 15: 8}, false},
	}
	for _, test := range tests {
		c, v := readProfiled(t, profiled(loads, fmt.Sprintf("%q", test.drive), `"20 °C"`))
		at, _, before := waveAt(t, c, v, "source", "s", "drive")
		el, _ := c.Element("source", "s")
		info := c.WaveInfo(el.Wave("drive"))
		if info.Form != "profile" || info.Constant || (info.Bound > 0) != test.bound || info.Bound > 1e-5 || info.Dim != dimPower {
			t.Errorf("%s: %+v", test.drive, info)
		}
		if math.Abs(before-test.before) > 1e-12+info.Bound {
			t.Errorf("%s: before %g, want %g", test.drive, before, test.before)
		}
		for x, want := range test.at {
			if got := at(x); math.Abs(got-want) > 1e-12*(1+math.Abs(want))+info.Bound {
				t.Errorf("%s: at %g s %.15g, want %.15g", test.drive, x, got, want)
			}
		}
	}
}

// TestProfileJumps holds that a jump of a profile stays one, exactly at its instant.
func TestProfileJumps(t *testing.T) {
	for _, drive := range []string{"= r*ramp^2", "= 1 W * exp(ramp/(20 A))"} {
		c, v := readProfiled(t, profiled(loads, fmt.Sprintf("%q", drive), `"20 °C"`))
		at, left, _ := waveAt(t, c, v, "source", "s", "drive")
		f := func(i float64) float64 {
			if strings.Contains(drive, "exp") {
				return math.Exp(i / 20)
			}
			return 0.002 * i * i
		}
		if a, b := left(20), at(20); math.Abs(a-f(20)) > 1e-6 || math.Abs(b-f(-4)) > 1e-6 {
			t.Errorf("%s: %g before the jump, %g after it", drive, a, b)
		}
	}
}

// TestProfileLevels reads levels and differences: a level stays one, the difference of two
// is a difference.
func TestProfileLevels(t *testing.T) {
	for held, want := range map[string]float64{
		`"= outside - 12 K"`: 286.15, `"outside"`: 298.15, `"= inside"`: 293.15, `"= inside + (outside - inside) * 0.5"`: 295.65,
		`"= max(outside, inside)"`: 298.15, `"= min(outside, 295 K)"`: 295, `{ expression = "= outside - 2 K", before = "0 °C" }`: 296.15,
	} {
		c, v := readProfiled(t, profiled(loads, `"= v0 * ramp"`, held))
		at, _, before := waveAt(t, c, v, "node", "air", "held")
		if got := at(50); math.Abs(got-want) > 1e-11 {
			t.Errorf("%s: %g, want %g", held, got, want)
		}
		if strings.Contains(held, "before") && before != 273.15 {
			t.Errorf("%s: before %g", held, before)
		}
	}
}

// TestProfileViews finds dimension and kind of profiles from their values.
func TestProfileViews(t *testing.T) {
	ampere := quantity.Dim{0, 0, 0, 0, 1}
	tests := []struct {
		text string
		dim  quantity.Dim
		kind quantity.Kind
	}{
		{`points = [["0 s", "1 A"], ["1 s", "20 mA"]]`, ampere, quantity.Plain},
		{`points = [["0 s", "290 K"], ["1 s", "20 °C"]]`, dimTemperature, quantity.Level},
		{`points = [["0 s", "290 K"], ["1 s", "300 K"]]`, dimTemperature, quantity.Either},
		{`points = [["0 s", "5 K"], ["1 s", "9 Δ°F"]]`, dimTemperature, quantity.Difference},
		{`stairs = [["0 s", 1], ["1 s", "20 %"]]`, quantity.Dim{}, quantity.Plain},
		{`stairs = [["0 s", "1 bar"], ["1 s", "2 bar(g)"]]`, dimPressure, quantity.Gauge},
		{`step = { from = "1 V·s", to = "= 2 V·s", at = "1 s" }`, quantity.Dim{1, 2, -2, 0, -1}, quantity.Plain},
		{`pulse = { low = "0 J", high = "1 J", width = "1 s" }`, quantity.Dim{1, 2, -2, 0, 0}, quantity.Plain},
		{`sine = { mean = "20 °C", amplitude = "5 K", period = "1 h" }`, dimTemperature, quantity.Level},
		{`sine = { mean = "50 Hz", amplitude = "1 Hz", period = "1 h" }`, dimRate, quantity.Plain},
		{`decay = [{ amplitude = "1 C", time_constant = "1 s" }]`, quantity.Dim{0, 0, 1, 0, 1}, quantity.Plain},
		{`value = "3 Ω"`, quantity.Dim{1, 2, -3, 0, -2}, quantity.Plain},
		{`expression = "= outside - inside"`, dimTemperature, quantity.Difference},
		{`expression = "= outside - 3 K"`, dimTemperature, quantity.Level},
		{`value = "ramp"`, ampere, quantity.Plain},
	}
	for _, test := range tests {
		c, _ := readProfiled(t, profiled(loads+"[profile.tried]\n"+test.text+"\nsource = \"invented\"", `"= v0 * ramp"`, `"20 °C"`))
		list := c.Profiles()
		p := list[len(list)-1]
		if p.Name != "tried" || p.Dim != test.dim || p.Kind != test.kind || p.Used || p.Source != "invented" || p.Bound != 0 {
			t.Errorf("%s: %+v", test.text, p)
		}
		if c.WaveInfo(p.Wave).Form != "profile" || c.WaveInfo(p.Wave).Text != strings.Trim(strings.TrimPrefix(test.text, "value = "), `"`) && c.WaveInfo(p.Wave).Text != test.text {
			t.Errorf("%s: %+v", test.text, c.WaveInfo(p.Wave))
		}
	}
	c, _ := readProfiled(t, profiled(loads+"[profile]\ninline = \"= r * ramp\"", `"= 1 A * inline"`, `"20 °C"`))
	used := map[string]bool{}
	for _, p := range c.Profiles() {
		used[p.Name] = p.Used
	}
	if !used["ramp"] || !used["inline"] || used["shift"] {
		t.Errorf("used: %v", used)
	}
}

// TestProfileFile reads the columns of a data file as profiles.
func TestProfileFile(t *testing.T) {
	dir := t.TempDir()
	text := "time / h;I / A;T [°C];duty\n0;0,5;20;0\n1;1,5;25;1\n"
	if err := os.WriteFile(filepath.Join(dir, "log.csv"), []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	read := func(profiles, drive, held string) (*casefile.Case, []casefile.Diagnostic) {
		return casefile.Read("case.toml", []byte(profiled(profiles, drive, held)), root, testVocabulary()...)
	}
	c, diags := read("[profile.i]\nfile = \"log.csv\"\ncolumn = \"I\"\n[profile.t]\nfile = \"log.csv\"\ntime = \"time\"\ncolumn = \"T\"\n"+
		"[profile.d]\nfile = \"log.csv\"\ncolumn = \"duty\"\nrepeat = \"1 h\"\n", `"= r * i^2 * d"`, `"= t + 2 K"`)
	if c == nil {
		t.Fatal(casefile.Listing(diags))
	}
	v, _ := c.Eval(nil)
	at, _, _ := waveAt(t, c, v, "source", "s", "drive")
	if got := at(1800); math.Abs(got-0.001) > 1e-15 {
		t.Errorf("the loss is %g", got)
	}
	if at, _, _ = waveAt(t, c, v, "node", "air", "held"); math.Abs(at(1800)-297.65) > 1e-10 {
		t.Errorf("the air is %g", at(1800))
	}
	for column, want := range map[string]string{`"amps"`: "no column", `"T"`: "comes to"} {
		_, diags := read("[profile.i]\nfile = \"log.csv\"\ncolumn = "+column, `"= r * i * 1 A"`, `"20 °C"`)
		if !strings.Contains(casefile.Listing(diags), want) && !strings.Contains(casefile.Listing(diags), "multiple of a level") {
			t.Errorf("column %s:\n%s", column, casefile.Listing(diags))
		}
	}
}
