package quantity

import (
	"errors"
	"math"
	"strings"
	"testing"
)

// A ramp stands for what a caller keeps of a quantity that changes: its values at two instants.
type ramp [2]float64

// joined takes a step by its function at both instants.
func joined(s Step) (any, error) {
	var r ramp
	for i := range r {
		x := make([]float64, len(s.Terms))
		for k, t := range s.Terms {
			x[k] = t.Value.SI
			if c, ok := t.Curve.(ramp); ok {
				x[k] = c[i]
			}
		}
		if r[i] = s.Function(x); math.IsNaN(r[i]) || math.IsInf(r[i], 0) {
			return nil, &NoValue{Found: "nothing", Want: "something"}
		}
	}
	return r, nil
}

// curves has a name for each kind of quantity that may change, and given values as numbers.
var curves = map[string]Term{
	"i":       {Value{Dim: dimCurrent}, ramp{10, 20}},
	"outside": {Value{Dim: dimKelvin, Kind: Level}, ramp{280, 300}},
	"inside":  {Value{Dim: dimKelvin, Kind: Level}, ramp{293, 293}},
	"rise":    {Value{Dim: dimKelvin, Kind: Difference}, ramp{5, -5}},
	"kelvin":  {Value{Dim: dimKelvin, Kind: Either}, ramp{5, 6}},
	"p":       {Value{Dim: dimPressure, Kind: Gauge}, ramp{1e5, 2e5}},
	"share":   {Value{}, ramp{0, 0.5}},
	"r":       {Value: Value{SI: 0.002, Dim: Dim{1, 2, -3, 0, -2}}},
	"v0":      {Value: Value{SI: 0.04, Dim: Dim{1, 2, -3, 0, -1}}},
	"e_on":    {Value: Value{SI: 0.002, Dim: dimEnergy}},
	"zero":    {},
}

func curvesOf(t *testing.T, text string) (Term, error) {
	t.Helper()
	names := []string{"i", "outside", "inside", "rise", "kelvin", "p", "share", "r", "v0", "e_on", "zero"}
	e, err := Compile(text, testNames(names...))
	if err != nil {
		t.Fatal(text, err)
	}
	return e.Curves(func(slot int) Term { return curves[names[slot]] }, joined)
}

// TestCurves reckons with quantities that change: dimension and kind are found by the
// rules of numbers, values by the steps.
func TestCurves(t *testing.T) {
	for _, test := range []struct {
		text string
		unit string // of what comes out
		kind Kind
		want ramp
	}{
		{"= v0*i + r*i^2", "W", Plain, ramp{0.6, 1.6}},
		{"= e_on * 10 kHz * i / 10 A", "W", Plain, ramp{20, 40}},
		{"= r*i", "V", Plain, ramp{0.02, 0.04}},
		{"= v0 / i", "Ω", Plain, ramp{0.004, 0.002}},
		{"= i * 3 s", "C", Plain, ramp{30, 60}},
		{"= r*i*2 s", "V·s", Plain, ramp{0.04, 0.08}},
		{"= v0*i*2 s", "J", Plain, ramp{0.8, 1.6}},
		{"= 1/(share + 1) * 50 Hz", "1/s", Plain, ramp{50, 50 / 1.5}},
		{"= outside - 12 K", "K", Level, ramp{268, 288}},
		{"= outside + rise", "K", Level, ramp{285, 295}},
		{"= 5 K + outside", "K", Level, ramp{285, 305}},
		{"= inside - outside", "K", Difference, ramp{13, -7}},
		{"= 300 K - outside", "K", Difference, ramp{20, 0}},
		{"= outside - kelvin", "K", Level, ramp{275, 294}},
		{"= max(outside, inside)", "K", Level, ramp{293, 300}},
		{"= -rise", "K", Difference, ramp{-5, 5}},
		{"= abs(rise)", "K", Difference, ramp{5, 5}},
		{"= min(rise, 1 K, 2 K)", "K", Difference, ramp{1, -5}},
		{"= p + 1 bar", "Pa", Gauge, ramp{2e5, 3e5}},
		{"= sqrt(i^2)", "A", Plain, ramp{10, 20}},
		{"= exp(share) * 2^share", "1", Plain, ramp{1, math.Exp(0.5) * math.Sqrt2}},
		{"= ln(share + 1)", "1", Plain, ramp{0, math.Log(1.5)}},
		{"i", "A", Plain, ramp{10, 20}},
	} {
		got, err := curvesOf(t, test.text)
		if err != nil {
			t.Errorf("%s: %v", test.text, err)
			continue
		}
		w, ok := got.Curve.(ramp)
		if !ok || UnitOf(got.Value.Dim) != test.unit || got.Value.Kind != test.kind || got.Value.Text != test.text {
			t.Errorf("%s: %+v", test.text, got)
		}
		for i := range w {
			if math.Abs(w[i]-test.want[i]) > 1e-9*math.Abs(test.want[i]) {
				t.Errorf("%s: %v, want %v", test.text, w, test.want)
			}
		}
	}
	if got, err := curvesOf(t, "= r * 3 A + v0"); err != nil || got.Curve != nil || math.Abs(got.Value.SI-0.046) > 1e-15 {
		t.Errorf("of numbers alone: %+v, %v", got, err)
	}
}

// TestCurvesRefused holds what is refused of quantities that change, with its place.
func TestCurvesRefused(t *testing.T) {
	for text, want := range map[string]string{
		"= i + outside":           "two quantities of one dimension",
		"= 2 * outside":           "a part or a multiple of a level",
		"= outside + inside":      "a level plus a level",
		"= rise - outside":        "a difference minus a level",
		"= -outside":              "the negative of a level",
		"= abs(outside)":          "the magnitude of a level",
		"= outside^2":             "a power of a level",
		"= sqrt(i)":               "in fractions",
		"= i^share":               "a power that changes",
		"= 2^i":                   "a power that is",
		"= exp(i)":                "a function of a current",
		"= i / zero":              "a division by zero",
		"= i / (r - r)":           "a division by zero",
		"= max(outside, rise)":    "a level beside a difference",
		"= 1 / share":             "nothing",
		"= i^99 * i^99":           "a power beyond",
		"= i * 10^(share + 1e99)": "nothing",
	} {
		_, err := curvesOf(t, text)
		var d *DimensionError
		var v *ValueError
		if err == nil || !strings.Contains(err.Error(), want) || !errors.As(err, &d) && !errors.As(err, &v) {
			t.Errorf("%s: %v, expected %q", text, err, want)
		}
	}
	stop := errors.New("stop")
	e, _ := Compile("2*i", testNames("i"))
	if _, err := e.Curves(func(int) Term { return curves["i"] }, func(Step) (any, error) { return nil, stop }); err != stop {
		t.Errorf("an error of the caller comes back as %v", err)
	}
}

// TestElectricalUnits reads the units of electricity and what they make together.
func TestElectricalUnits(t *testing.T) {
	for text, unit := range map[string]string{
		"= 2 V * 3 A": "W", "= 2 mΩ * (3 A)^2": "W", "= 2 V / 3 A": "Ω", "= 2 V * 3 s": "V·s", "= 2 Wb": "V·s", "= 3 A * 2 s": "C",
		"= 2 mJ * 10 kHz": "W", "= 2 V·s / 3 A": "H", "= 3 C / 2 V": "F", "= 2 J / 3 C": "V", "= 2 V/K * 3 K": "V", "= 50 Hz": "1/s",
	} {
		e, err := Compile(text, testNames())
		if err != nil {
			t.Fatal(text, err)
		}
		if v, err := e.Eval(nil); err != nil || UnitOf(v.Dim) != unit {
			t.Errorf("%s is in %s, %v; want %s", text, UnitOf(v.Dim), err, unit)
		}
	}
	if s := (Print{}).Format(0.002, Dim{1, 2, -2, 0, -1}, Plain); s != "2 mV·s" {
		t.Errorf("printed %s", s)
	}
}
