package casefile_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// TestCellLoss compares the loss r·i² + s·i of a cell under a ramped current with values
// worked out by hand: at 30 s 100 A, at 15 min 155 A, at 22.5 min 55 A; at 45 s of a climb
// that begins at 60 A, 88.125 A.
func TestCellLoss(t *testing.T) {
	profiles := `[profile.current]
points = [["0 min", "0 A"], ["1 min", "200 A"], ["10 min", "200 A"], ["20 min", "110 A"], ["25 min", "0 A"]]
[profile.climb]
points = [["0 min", "60 A"], ["2 min", "135 A"], ["30 min", "135 A"], ["31 min", "-40 A"], ["45 min", "-40 A"]]
[profile.hard]
expression = "= 1.5 * current"
[profile.loss]
expression = "= r * current^2 + 0.04 V * current"
`
	text := strings.Replace(profiled(profiles, `"loss"`, `"= 20 °C + 1 K/W * loss"`), "2 mΩ", "1.6 mΩ", 1)
	c, _ := readProfiled(t, text)
	loss := func(i, r float64) float64 { return r*i*i + 0.04*i }
	check := func(given []quantity.Value, swap [][2]string, r float64, at map[float64]float64) {
		t.Helper()
		v, diags := c.EvalWith(given, swap)
		if diags != nil {
			t.Fatal(casefile.Listing(diags))
		}
		drive, _, _ := waveAt(t, c, v, "source", "s", "drive")
		held, _, _ := waveAt(t, c, v, "node", "air", "held")
		for x, i := range at {
			if got, want := drive(x), loss(i, r); math.Abs(got-want) > 1e-12*(1+math.Abs(want)) || math.Abs(held(x)-want-293.15) > 1e-10 {
				t.Errorf("%v: at %g s %.15g W and %.15g K, want %.15g W", swap, x, got, held(x), want)
			}
		}
	}
	charge := map[float64]float64{0: 0, 30: 100, 60: 200, 900: 155, 1350: 55, 5000: 0}
	climb := map[float64]float64{0: 60, 45: 88.125, 1800: 135, 1830: 47.5, 1860: -40, 5000: -40}
	hard := map[float64]float64{30: 150, 900: 232.5}
	given := c.GivenValues()
	i, _ := c.GivenIndex("r")
	given[i].SI, given[i].Exact = 2e-3, nil
	check(nil, nil, 1.6e-3, charge)
	check(given, nil, 2e-3, charge)
	check(nil, [][2]string{{"current", "climb"}}, 1.6e-3, climb)
	check(given, [][2]string{{"current", "climb"}}, 2e-3, climb)
	check(nil, [][2]string{{"current", "hard"}}, 1.6e-3, hard) // made of what it stands in for
	check(nil, [][2]string{{"current", "climb"}, {"climb", "current"}}, 1.6e-3, climb)
	check(nil, nil, 1.6e-3, charge) // nothing is left of the swaps
}

// TestStandInSteps refuses a stand-in that does not change in steps where it must.
func TestStandInSteps(t *testing.T) {
	text := pond + `[hydraulic.flap.f]
between = ["pond", "sea"]
resistance = "1 GPa·s/m³"
scale = "= 1 - shift"
[profile.shift]
stairs = [["0 s", 1], ["10 s", 0]]
[profile.other]
stairs = [["0 s", 0.5], ["10 s", 0]]
[profile.ramp]
points = [["0 s", 1], ["10 s", 0]]
[profile.far]
stairs = [["0 s", 5]]
`
	c, diags := casefile.Read("case.toml", []byte(text), nil, profileVocabulary()...)
	if c == nil {
		t.Fatal(casefile.Listing(diags))
	}
	for _, test := range [][2]string{{"other", ""}, {"ramp", "in steps"}, {"far", "0 or above"}} {
		_, diags := c.EvalWith(nil, [][2]string{{"shift", test[0]}})
		if got := casefile.Listing(diags); test[1] == "" && got != "" || !strings.Contains(got, test[1]) {
			t.Errorf("%s: %q", test[0], got)
		}
	}
}

// TestProfileClock reads times of day: they count from the clock at t = 0, go on into the
// days after, and a period that began before t = 0 goes round.
func TestProfileClock(t *testing.T) {
	h := 3600.0
	tests := []struct {
		text string
		at   map[float64]float64
	}{
		{`stairs = [["08:00", "1 A"], ["18:00", "2 A"], ["02:00", "3 A"]]`, map[float64]float64{0: 1, 2 * h: 1, 12 * h: 2, 19 * h: 2, 20 * h: 3, 99 * h: 3}},
		{"stairs = [[\"00:00\", \"1 A\"], [\"08:00\", \"2 A\"], [\"18:00\", \"3 A\"]]\nrepeat = \"24 h\"", map[float64]float64{0: 1, 2 * h: 2, 12 * h: 3, 18 * h: 1, 26 * h: 2}},
		{"points = [[\"00:00\", \"0 A\"], [\"12:00\", \"12 A\"], [\"24:00\", \"0 A\"]]\nrepeat = \"24 h\"", map[float64]float64{0: 6, 3 * h: 9, 6 * h: 12, 17 * h: 1, 18 * h: 0, 19 * h: 1, 24 * h: 6, 30 * h: 12}},
		{"points = [[\"04:00\", \"4 A\"], [\"08:00\", \"8 A\"]]\nrepeat = \"24 h\"", map[float64]float64{0: 6, h: 7, 2 * h: 8, 21.9 * h: 8, 22 * h: 4, 23 * h: 5, 24 * h: 6}},
		{"points = [[\"06:00\", \"4 A\"], [\"24:00\", \"8 A\"], [\"24:00\", \"1 A\"], [\"06:00\", \"1 A\"]]", map[float64]float64{0: 4, 9 * h: 6, 18 * h: 1, 24 * h: 1}},
		{`step = { from = "1 A", to = "2 A", at = "07:30" }`, map[float64]float64{0: 1, 1.4 * h: 1, 1.5 * h: 2}},
		{`pulse = { low = "1 A", high = "2 A", at = "07:30", width = "1 h" }`, map[float64]float64{0: 1, 1.5 * h: 2, 2.5 * h: 1}},
		{`sine = { mean = "1 A", amplitude = "2 A", period = "24 h", highest_at = "15:00" }`, map[float64]float64{9 * h: 3, 21 * h: -1}},
	}
	for _, test := range tests {
		c, v := readProfiled(t, profiled("[profile.i]\n"+test.text, `"= 1 V * i"`, `"20 °C"`))
		at, _, _ := waveAt(t, c, v, "source", "s", "drive")
		for x, want := range test.at {
			if got := at(x); math.Abs(got-want) > 1e-9 {
				t.Errorf("%s: at %g h %g, want %g", test.text, x/h, got, want)
			}
		}
	}
}

// TestAnyExpression draws expressions of profiles and compares them, at times that are no
// breaks, with the same operations on what the profiles are there.
func TestAnyExpression(t *testing.T) {
	type fn = func(x map[string]float64) float64
	leaves := map[string]fn{}
	for _, name := range []string{"a", "b", "c", "d"} {
		leaves[name] = func(x map[string]float64) float64 { return x[name] }
	}
	const profiles = `[profile]
a.points = [["0 s", 1], ["3 s", -2], ["7 s", 4], ["7 s", 1], ["11 s", 2]]
b.stairs = [["0 s", 2], ["5 s", -1], ["9 s", 0.5]]
c.sine = { mean = 0.5, amplitude = 1, period = "6 s" }
d.pulse = { low = 1, high = 3, width = "1 s", period = "2 s" }
`
	var draw func(t *rapid.T, depth int) (string, fn)
	draw = func(t *rapid.T, depth int) (string, fn) {
		if depth == 0 || rapid.IntRange(0, 4).Draw(t, "leaf") == 0 {
			if rapid.Bool().Draw(t, "number") {
				n := float64(rapid.IntRange(-3, 3).Draw(t, "n"))
				return fmt.Sprintf("(%g)", n), func(map[string]float64) float64 { return n }
			}
			name := rapid.SampledFrom([]string{"a", "b", "c", "d"}).Draw(t, "name")
			return name, leaves[name]
		}
		p, f := draw(t, depth-1)
		q, g := draw(t, depth-1)
		switch rapid.IntRange(0, 6).Draw(t, "operation") {
		case 0:
			return "(" + p + " + " + q + ")", func(x map[string]float64) float64 { return f(x) + g(x) }
		case 1:
			return "(" + p + " - " + q + ")", func(x map[string]float64) float64 { return f(x) - g(x) }
		case 2:
			return p + " * " + q, func(x map[string]float64) float64 { return f(x) * g(x) }
		case 3:
			return "(" + p + ")^2", func(x map[string]float64) float64 { return f(x) * f(x) }
		case 4:
			return "min(" + p + ", " + q + ")", func(x map[string]float64) float64 { return math.Min(f(x), g(x)) }
		case 5:
			return "abs(" + p + ")", func(x map[string]float64) float64 { return math.Abs(f(x)) }
		}
		return p + " / (1 + (" + q + ")^2)", func(x map[string]float64) float64 { return f(x) / (1 + g(x)*g(x)) }
	}
	rapid.Check(t, func(rt *rapid.T) {
		text, f := draw(rt, 3)
		drive := fmt.Sprintf("%q", "= 1 W * ("+text+" + 0 * (a + b + c + d))")
		c, diags := casefile.Read("case.toml", []byte(profiled(profiles, drive, `"20 °C"`)), nil, testVocabulary()...)
		if c == nil {
			if !strings.Contains(casefile.Listing(diags), "more than") {
				rt.Fatalf("%s", casefile.Listing(diags))
			}
			return
		}
		v, _ := c.Eval(nil)
		e, _ := c.Element("source", "s")
		w, bound := v.Wave[e.Wave("drive")], c.WaveInfo(e.Wave("drive")).Bound
		size := 0.0
		var errs [][3]float64
		for x := 0.137; x < 30; x += 0.731 {
			now := map[string]float64{}
			for _, p := range c.Profiles() {
				now[p.Name] = v.Wave[p.Wave].At(x)
			}
			want := f(now)
			size = max(size, math.Abs(want))
			errs = append(errs, [3]float64{x, w.At(x), want})
		}
		for _, e := range errs {
			if math.Abs(e[1]-e[2]) > 1e-9*(1+size)+bound {
				rt.Fatalf("%s: at %g s %.15g, want %.15g, off by more than %g", text, e[0], e[1], e[2], bound)
			}
		}
	})
}

// TestProfileFaultsOfEval finds what only other given values make wrong, at its place.
func TestProfileFaultsOfEval(t *testing.T) {
	c, _ := readProfiled(t, profiled(loads, `"= 1 W * sqrt(shift + k)"`, `"= outside - 1 K / (k - 1)"`))
	given := c.GivenValues()
	i, _ := c.GivenIndex("k")
	for k, want := range map[float64]string{
		-0.5: `"sqrt(shift + k)" is the square root of a negative number at 5 s`, 1: "a division by zero", 1.001: "must be at or above absolute zero", 4: "",
	} {
		given[i].SI, given[i].Exact = k, nil
		_, diags := c.Eval(given)
		if got := casefile.Listing(diags); want == "" && got != "" || !strings.Contains(got, want) {
			t.Errorf("k = %g: %s", k, got)
		}
	}
}
