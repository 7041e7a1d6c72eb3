package thermal

import (
	"math"
	"testing"

	"lagbook/network/casefile/casetest"
	"lagbook/testdata/demo"
)

// What the hand checks in the demo cases promise.
func TestDemoCasesAreWhatTheirHandChecksSay(t *testing.T) {
	m := casetest.Demo(t, demo.Main, Vocabulary()...)
	r := m.Respond(1200, "junction", "plate", "plate - cabinet")
	for _, c := range []struct {
		what      string
		got, want float64
		within    float64
	}{
		{"junction while holding", r.Left(0, 0) - 273.15, 74.5, 0.05},
		{"plate while holding", r.Left(1, 0) - 273.15, 55.1, 0.05},
		{"plate at the end of the start", r.At(1, 3) - 273.15, 55.3, 0.05},
		{"junction at the end of the start", r.Max(0, 0, 1200).Y - 273.15, 117, 0.5},
		{"junction in the end", casetest.Final(t, r, 0) - 273.15, 86.6, 0.05},
		{"plate in the end", casetest.Final(t, r, 1) - 273.15, 59.8, 0.05},
		{"slow time constant", m.TimeConstants()[0], 195, 5},
	} {
		if math.Abs(c.got-c.want) > c.within {
			t.Errorf("servo drive, %s: %.2f, the hand check says %.2f", c.what, c.got, c.want)
		}
	}

	m = casetest.Demo(t, "curing-oven.toml", Vocabulary()...)
	r = m.Respond(6*3600, "load", "air", "outside")
	if v := casetest.Final(t, r, 1) - 273.15; math.Abs(v-158) > 0.5 {
		t.Errorf("curing oven: air %.2f °C in the end, the hand check says 158", v)
	}
	if v := casetest.Final(t, r, 2) - 273.15; math.Abs(v-26.7) > 0.1 {
		t.Errorf("curing oven: outside %.2f °C in the end, the hand check says 26.7", v)
	}
	if tau := m.TimeConstants()[0] / 60; math.Abs(tau-102) > 6 {
		t.Errorf("curing oven: slowest time constant %.1f min, the hand check says 102", tau)
	}
	if root, ok := r.First(0, 140+273.15, 0, 80*60); !ok || root.T < 40*60 {
		t.Errorf("curing oven: load at 140 °C after %v, %v", root, ok)
	}

	m = casetest.Demo(t, "wash-tank.toml", Vocabulary()...)
	r = m.Respond(6*3600, "tap")
	if tau := m.TimeConstants()[0] / 60; math.Abs(tau-29) > 0.5 {
		t.Errorf("wash tank: time constant %.1f min, the hand check says 29", tau)
	}
	fahrenheit := func(k float64) float64 { return (k-273.15)*1.8 + 32 }
	if v := fahrenheit(r.At(0, 3*3600)); math.Abs(v-130) > 1 {
		t.Errorf("wash tank: tap at %.1f °F before the boiler falls back, the hand check says 130", v)
	}
}
