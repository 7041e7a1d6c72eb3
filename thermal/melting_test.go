package thermal

import (
	"math"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

// The enthalpy of a lump that melts: what it stores, its slope, and that the modes meet where
// they pass into each other. c·T + L·share, by hand.
func TestMeltingStoresItsLatentHeat(t *testing.T) {
	l := &melting{storing: storing{capacity: 2000}, latent: 180e3, at: 330, over: 4}
	s := stamp(1, 0, 0)
	for _, c := range []struct {
		T    float64
		mode int
		want float64
	}{
		{300, solid, 2000 * (300 - 273.15)},
		{328, solid, 2000 * (328 - 273.15)},
		{328, melts, 2000 * (328 - 273.15)},
		{330, melts, 2000*(330-273.15) + 90e3},
		{332, melts, 2000*(332-273.15) + 180e3},
		{332, liquid, 2000*(332-273.15) + 180e3},
		{350, liquid, 2000*(350-273.15) + 180e3},
	} {
		s.Mode = c.mode
		near(t, "stored", at(l, s, c.T).Stored, c.want, 1e-13)
		near(t, "reading", l.Read(s, readStored, nil), c.want, 1e-13)
		jacobian(t, "melting", l, s, []float64{1e-3}, 1e-6, c.T)
	}
	for _, c := range []struct {
		T, share float64
		mode     int
	}{{300, 0, solid}, {327.9, 0, solid}, {329, 0.25, melts}, {331, 0.75, melts}, {332, 1, liquid}, {400, 1, liquid}} {
		s.X[0] = c.T
		if l.Begin(s, false); s.Mode != c.mode {
			t.Errorf("at %g K it begins in mode %d, want %d", c.T, s.Mode, c.mode)
		}
		grad := make([]float64, 1)
		if got := l.Read(s, readLiquid, grad); math.Abs(got-c.share) > 1e-14 {
			t.Errorf("at %g K %g is liquid, want %g", c.T, got, c.share)
		}
		if g := make([]float64, 2); l.Guards(s, g) == 0 || g[0] <= 0 {
			t.Errorf("at %g K the mode %d is over at once: %v", c.T, s.Mode, g)
		}
	}
}

// Whatever the specific heat is between its points, the lump stores its integral, and the slope
// of that is its capacitance.
func TestSpecificHeatAgainstTemperature(t *testing.T) {
	l := &storing{mass: 3, heat: curveOf([2]float64{280, 400}, [2]float64{380, 600})}
	s := stamp(1, 0, 0)
	hot := at(l, s, 380).Stored
	near(t, "from 280 K to 380 K", hot-at(l, s, 280).Stored, 3*500*100, 1e-13)
	near(t, "at 0 °C", at(l, s, 273.15).Stored, 0)
	near(t, "at 280 K", at(l, s, 280).Stored, 3*400*(280-273.15), 1e-13)
	rapid.Check(t, func(rt *rapid.T) {
		T := rapid.Float64Range(200, 500).Draw(rt, "T")
		if math.Abs(T-280) < 1e-2 || math.Abs(T-380) < 1e-2 {
			return
		}
		jacobian(t, "storing", l, s, []float64{1e-3}, 1e-6, T)
	})
}

// A lump of wax under a steady 40 W from 20 °C on: the mode passes on exactly when the heat put
// in is m·c·ΔT and m·c·ΔT + m·L, and no heat is lost where it does.
func TestMeltingKeepsItsHeat(t *testing.T) {
	l := &melting{storing: storing{capacity: 2000}, latent: 180e3, at: 330, over: 4}
	s := stamp(1, 0, 0)
	s.X[0] = 293.15
	l.Begin(s, false)
	level := func(stored float64) float64 { // within a mode the law is a straight line
		at(l, s, 300)
		return 300 + (stored-s.Stored)/s.DStored
	}
	start := at(l, s, 293.15).Stored
	for heat := 0.0; heat <= 400e3; heat += 500 {
		T := level(start + heat)
		s.X[0] = T
		g := make([]float64, 2)
		n := l.Guards(s, g)
		for k := range n {
			if g[k] < 0 {
				s.Mode, _, _ = l.Next(s, k)
				T = level(start + heat)
			}
		}
		want := 293.15 + heat/2000
		switch solidEnd := 2000 * (328 - 293.15); {
		case heat > solidEnd+2000*4+180e3:
			want = 332 + (heat-solidEnd-2000*4-180e3)/2000
		case heat > solidEnd:
			want = 328 + (heat-solidEnd)/(2000+180e3/4)
		}
		if math.Abs(T-want) > 1e-9*want {
			t.Fatalf("after %g J it is at %.12g K, want %.12g", heat, T, want)
		}
	}
}

var _ network.Switching = (*melting)(nil)
var _ network.Beginning = (*melting)(nil)
var _ network.Readable = (*storing)(nil)
