package thermal

import (
	"io/fs"
	"math"
	"testing"

	"lagbook/testdata/demo"
)

func demoText(t *testing.T, name string) string {
	t.Helper()
	text, err := fs.ReadFile(demo.Cases, name)
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// What the hand checks in the demo cases promise.
func TestDemoCasesAreWhatTheirHandChecksSay(t *testing.T) {
	m := read(t, demo.Main, demoText(t, demo.Main))
	r := m.respond(1200, "junction", "plate", "plate - cabinet")
	for _, c := range []struct {
		what      string
		got, want float64
		within    float64
	}{
		{"junction while holding", r.Left(0, 0) - 273.15, 74.5, 0.05},
		{"plate while holding", r.Left(1, 0) - 273.15, 55.1, 0.05},
		{"plate at the end of the start", r.At(1, 3) - 273.15, 55.3, 0.05},
		{"junction at the end of the start", r.Max(0, 0, 1200).Y - 273.15, 117, 0.5},
		{"junction in the end", final(t, r, 0) - 273.15, 86.6, 0.05},
		{"plate in the end", final(t, r, 1) - 273.15, 59.8, 0.05},
		{"slow time constant", -1 / m.poles()[0], 195, 5},
	} {
		if math.Abs(c.got-c.want) > c.within {
			t.Errorf("servo drive, %s: %.2f, the hand check says %.2f", c.what, c.got, c.want)
		}
	}

	m = read(t, "curing-oven.toml", demoText(t, "curing-oven.toml"))
	r = m.respond(6*3600, "load", "air", "outside")
	if v := final(t, r, 1) - 273.15; math.Abs(v-158) > 0.5 {
		t.Errorf("curing oven: air %.2f °C in the end, the hand check says 158", v)
	}
	if v := final(t, r, 2) - 273.15; math.Abs(v-26.7) > 0.1 {
		t.Errorf("curing oven: outside %.2f °C in the end, the hand check says 26.7", v)
	}
	if tau := -1 / m.poles()[0] / 60; math.Abs(tau-102) > 6 {
		t.Errorf("curing oven: slowest time constant %.1f min, the hand check says 102", tau)
	}
	if root, ok := r.First(0, 140+273.15, 0, 80*60); !ok || root.T < 40*60 {
		t.Errorf("curing oven: load at 140 °C after %v, %v", root, ok)
	}

	m = read(t, "wash-tank.toml", demoText(t, "wash-tank.toml"))
	r = m.respond(6*3600, "tap")
	if tau := -1 / m.poles()[0] / 60; math.Abs(tau-29) > 0.5 {
		t.Errorf("wash tank: time constant %.1f min, the hand check says 29", tau)
	}
	fahrenheit := func(k float64) float64 { return (k-273.15)*1.8 + 32 }
	if v := fahrenheit(r.At(0, 3*3600)); math.Abs(v-130) > 1 {
		t.Errorf("wash tank: tap at %.1f °F before the boiler falls back, the hand check says 130", v)
	}
}

func final(t *testing.T, r interface{ Final(int) (float64, bool) }, out int) float64 {
	t.Helper()
	v, ok := r.Final(out)
	if !ok {
		t.Fatal("no final value")
	}
	return v
}
