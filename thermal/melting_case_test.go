package thermal

import (
	"math"
	"testing"
)

// A lump that melts with something fixed to it that does not: 2 kg · 2 kJ/(kg·K) · 1.25 = 5 kJ/K and 2 kg · 150 kJ/kg.
func TestLumpThatMeltsInACase(t *testing.T) {
	m := read(t, "wax", `
[run]
start = "20 °C"
[material.wax]
specific_heat = "2 kJ/(kg·K)"
[thermal.node.far]
held = "20 °C"
[thermal.node.pack]
lump = { material = "wax", mass = "2 kg", extra = "25 %", melts = { at = "50 °C", over = "4 K", latent = "150 kJ/kg" } }
[thermal.resistance.hardly]
between     = ["pack", "far"]
conductance = "1e-9 W/K"
[thermal.source.heat]
into  = "pack"
drive = { stairs = [["0 s", "1 kW"], ["600 s", "-1 kW"]] }
[[table]]
show  = ["pack"]
times = ["0 s", "1 s"]
`)
	near(t, "capacitance", m.Derived("capacitance of pack").SI, 5000)
	near(t, "latent heat", m.Derived("latent heat of pack").SI, 300e3)
	r := m.March(1200, "pack", "liquid fraction of pack", "stored of pack")
	// 28 K · 5 kJ/K = 140 s to 48 °C, then 4 K · 5 kJ/K + 300 kJ = 320 s, then on
	for _, c := range []struct{ at, rise, share float64 }{{100, 20, 0}, {140, 28, 0}, {300, 30, 0.5}, {460, 32, 1}, {600, 60, 1}, {900, 30, 0.5}, {1100, 20, 0}, {1200, 0, 0}} {
		near(t, "level", r.At(0, c.at), 293.15+c.rise, 1e-9)
		if got := r.At(1, c.at); math.Abs(got-c.share) > 1e-6 {
			t.Errorf("after %g s %g is molten, want %g", c.at, got, c.share)
		}
	}
	near(t, "heat", r.At(2, 600)-r.At(2, 0), 600e3, 1e-9)
	if events := r.Events(); len(events) != 4 || events[0].What != "begins to melt" || events[3].What != "is frozen" || math.Abs(events[1].At-460) > 1e-4 {
		t.Errorf("what happened: %v", events)
	}
}
