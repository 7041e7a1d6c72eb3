package hydraulic

import (
	"math"
	"testing"

	"lagbook/network"
)

func TestOneWayLaws(t *testing.T) {
	check := &checkLaw{rooted(1e-5, 1e-4, 1e-3), 2000}
	relief := &reliefLaw{powerFlow{40.0 / 6e4 / math.Sqrt(190e5), leastCore, 2}, 175e5, 190e5}
	for _, d := range []float64{-1e5, 1e3, 2e3 - 1, 2500, 3e5, 174e5, 180e5, 189.9e5, 191e5, 4e7} {
		for _, c := range []struct {
			name string
			law  network.Law
		}{{"check", check}, {"relief", relief}} {
			trial := trial{law: c.law, ports: 2, x: []float64{d, 0}, step: []float64{0.05, 0.05}}
			if c.name == "relief" {
				trial.step = []float64{50, 50}
			}
			trial.jacobian(t, c.name, true)
			trial.mode = wayShut
			if s := trial.stamp(trial.x); s.F[0] != 0 || s.DF[0] != 0 {
				t.Errorf("%s, shut, passes %v at %v Pa", c.name, s.F[1], d)
			}
		}
	}
	for _, d := range []float64{-3e4, -1e-3, 1e-3, 5, 3e4} {
		for mode := range 2 {
			c := trial{law: &outfallLaw{-4000, 9800}, ports: 2, unknowns: 1, x: []float64{-4000 + d, -15000, 0.01}, step: []float64{math.Abs(d) * 1e-3, 1, 1e-4}, mode: mode}
			c.jacobian(t, "outfall", true)
		}
	}
}

// Straight from 0 at set to 40 L/min at full_open, an orifice above.
func TestReliefCurve(t *testing.T) {
	l := &reliefLaw{powerFlow{40.0 / 6e4 / math.Sqrt(190e5), leastCore, 2}, 175e5, 190e5}
	for _, c := range []struct{ drop, share float64 }{{175e5, 0}, {182.5e5, 0.5}, {190e5, 1}, {4 * 190e5, 2}} {
		s := (&trial{law: l, ports: 2}).stamp([]float64{c.drop + 5e5, 5e5})
		if got := s.F[1] * 6e4 / 40; math.Abs(got-c.share) > 1e-12 {
			t.Errorf("at a drop of %v bar %v of the flow, want %v", c.drop/1e5, got, c.share)
		}
	}
}

// A valve that opens does not shut at once again, and the other way round.
func TestOneWaySwitching(t *testing.T) {
	l := &checkLaw{rooted(1e-5, 1e-4, 1e-3), 2000}
	s := &network.Stamp{X: []float64{1e5, 0}}
	g := make([]float64, 1)
	for _, step := range []struct {
		drop float64
		what string
	}{{1900, "shuts"}, {2100, "opens"}, {-1e5, "shuts"}} {
		s.X[0] = step.drop
		if l.Guards(s, g); g[0] > 0 {
			t.Fatalf("at %v Pa in mode %d nothing happens", step.drop, s.Mode)
		}
		mode, what, last := l.Next(s, 0)
		if s.Mode = mode; what != step.what || last {
			t.Errorf("at %v Pa it %s, want %s", step.drop, what, step.what)
		}
		if s.X[0] = 2000; l.Guards(s, g) != 1 || g[0] < 0 {
			t.Errorf("at the drop at which it %s it changes back", what)
		}
		if l.Shut(mode) != (mode == wayShut) {
			t.Error("shut is not shut")
		}
	}
	s.X[0] = 2500
	if l.Begin(s, false); s.Mode != wayOpen {
		t.Error("begins shut under a drop that opens it")
	}
	s.X[0], s.Mode = 1500, wayOpen
	if l.Begin(s, true); s.Mode != wayOpen {
		t.Error("a steady state is overruled")
	}
	if l.Begin(s, false); s.Mode != wayShut {
		t.Error("begins open under a drop that does not open it")
	}
}

// A lip passes what comes at the pressure of the air: 30 m³/h take a thousandth of a pascal.
func TestLip(t *testing.T) {
	l := &outfallLaw{-4000, 9800}
	const q = 30.0 / 3600
	s := (&trial{law: l, ports: 2, unknowns: 1}).stamp([]float64{-4000 + q*lipResistance, -15000, q})
	if s.F[1] != q || math.Abs(s.F[2]) > 1e-9 {
		t.Errorf("%v m³/s, amiss %v", s.F[1], s.F[2])
	}
	g := make([]float64, 1)
	if l.Guards(s, g); g[0] < 0 {
		t.Error("it runs, and would be dry")
	}
	s.X[0], s.X[2] = -4001, -10
	if l.Guards(s, g); g[0] > 0 {
		t.Error("it is dry, and nothing says so")
	}
	s.X[1] = -3000
	if code, _ := l.Caution(s); code != "outfall-drowned" {
		t.Errorf("under water: %q", code)
	}
}
