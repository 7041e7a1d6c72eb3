package thermal

import (
	"math"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

func controllerOf(mode int) (*controller, *network.Stamp) {
	s := stamp(2, 2, 1)
	s.Mode = mode
	return &controller{heating: heating{0, 250}, gain: 20, integral: 900}, s
}

// In every mode the law has its derivatives and gives the energy the rate of the heat.
func TestControllerIsSound(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		T, integral := rapid.Float64Range(290, 330).Draw(rt, "T"), rapid.Float64Range(-100, 300).Draw(rt, "integral")
		if math.Abs(T-310) < 1e-2 {
			return // where the integral turns
		}
		for mode := inRange; mode <= onLow; mode++ {
			h, s := controllerOf(mode)
			jacobian(t, "controller", h, s, []float64{1e-3, 1e-3, 1e-3, 1, 1e-3}, 1e-6, 300, T, integral, 5000, 310)
			s = at(h, s, 300, T, integral, 5000, 310)
			if s.F[0] != s.F[3] || s.F[1] != 0 {
				t.Errorf("mode %d: %g W into the node, %g into the energy, %g out of the node watched", mode, s.F[0], s.F[3], s.F[1])
			}
			grad := make([]float64, 5)
			if q := h.Read(s, readHeat, grad); mode != inRange && q != s.F[0] {
				t.Errorf("mode %d: heat reads %g, is %g", mode, q, s.F[0])
			}
			near(t, "energy", h.Read(s, readEnergy, nil), 5000)
		}
		// the node heated and watched in one
		h, s := controllerOf(inRange)
		s = &network.Stamp{X: make([]float64, 4), Rate: make([]float64, 4), F: make([]float64, 3), DF: make([]float64, 12), Mode: s.Mode}
		jacobian(t, "controller on one node", h, s, []float64{1e-3, 1e-3, 1, 1e-3}, 1e-6, T, integral, 5000, 310)
		for mode := range 2 {
			th := &thermostat{heating: heating{5, 40}, onBelow: 300, offAbove: 310}
			s := stamp(2, 1, 0)
			s.Mode = mode
			jacobian(t, "thermostat", th, s, []float64{1e-3, 1e-3, 1}, 1e-9, 300, T, 5000)
			near(t, "heat", at(th, s, 300, T, 5000).F[0], []float64{5, 40}[mode])
			near(t, "duty", th.Read(s, readDuty, nil), float64(mode))
		}
	})
}

// What a controller does at its limits, step by step as the hand check of an incubator has it: the
// sensor 17.5 K below the target, the output at its upper limit with the integral held at 0 until
// it is 12.5 K below, then kept there by the integral, until the sensor rises faster than that can
// follow.
func TestControllerAtItsLimits(t *testing.T) {
	h, s := controllerOf(inRange)
	g := make([]float64, 3)
	see := func(T, rising, integral float64) int {
		copy(s.X, []float64{300, T, integral, 0, 310.65})
		s.Rate[1] = rising
		return h.Guards(s, g)
	}
	see(293.15, 0.01, 0)
	h.Begin(s, false)
	if s.Mode != atHigh {
		t.Fatalf("begins in mode %d", s.Mode)
	}
	if at(h, s, s.X...).F[2] != 0 || s.F[0] != 250 {
		t.Errorf("at the limit: integral %g W/s, heat %g W", s.F[2], s.F[0])
	}
	see(298.15, 0.01, 0)
	near(t, "guard 12.5 K below the target", g[0]+1, 1, 1e-9)
	// the integral by itself would grow by 20·12.5/900 = 0.2778 W/s: it follows a sensor slower than 0.0139 K/s
	if mode, _, _ := h.Next(s, 0); mode != onHigh {
		t.Errorf("a slow sensor: mode %d, want the integral to keep the output", mode)
	}
	see(298.15, 0.02, 0)
	if mode, what, _ := h.Next(s, 0); mode != inRange || what != "leaves its upper limit" {
		t.Errorf("a fast sensor: mode %d, %q", mode, what)
	}
	s.Mode = onHigh
	see(300, 0.01, 37)
	near(t, "pull towards the limit", at(h, s, 300, 300, 38, 0, 310.65).F[2], -1/(trail*900), 1e-9)
	if g[byJump] <= 0 || g[tooFast] <= 0 || g[turned] <= 0 {
		t.Errorf("guards %v while it can follow", g)
	}
	if see(300, 0.012, 37); g[tooFast] >= 0 {
		t.Errorf("guard %g where it cannot", g[tooFast])
	}
	if see(300, -0.001, 37); g[turned] >= 0 {
		t.Errorf("guard %g where the sensor turns", g[turned])
	}
	if mode, _, _ := h.Next(s, turned); mode != atHigh {
		t.Errorf("a sensor that turns: mode %d", mode)
	}
	near(t, "integral then", s.X[2], 250-20*10.65, 1e-12)
	// the target jumps by 10 K and back: the integral stays, but for what it trails by
	for _, c := range []struct {
		by   float64
		mode int
	}{{10, atHigh}, {-10, inRange}} {
		s.Mode = onHigh
		see(300, 0.01, 37-20*0.01*trail*900)
		if g[byJump] <= 0 {
			t.Errorf("guard %g while it trails", g[byJump])
		}
		s.X[4] += c.by
		if h.Guards(s, g); g[byJump] >= 0 {
			t.Errorf("guard %g after a jump", g[byJump])
		}
		if mode, _, _ := h.Next(s, byJump); mode != c.mode {
			t.Errorf("a jump by %g K: mode %d, want %d", c.by, mode, c.mode)
		}
		near(t, "integral after a jump", s.X[2], 37, 1e-12)
	}
	// the same at the lower limit, mirrored
	s.Mode = atLow
	see(313, -0.001, 0)
	near(t, "guard at the lower limit", g[0], 20*(313-310.65), 1e-9)
	s.Mode = inRange
	see(313, -0.001, 47)
	if mode, _, _ := h.Next(s, 1); mode != onLow {
		t.Errorf("at the lower limit: mode %d", mode)
	}
}

// A thermostat starts on below off_above unless the case says.
func TestThermostatStarts(t *testing.T) {
	for _, c := range []struct {
		T            float64
		starts, want int
	}{{299, off, on}, {299, on, on}, {305, on, on}, {305, off, off}, {310, on, off}, {320, off, off}} {
		h := &thermostat{heating{0, 40}, 300, 310, c.starts}
		s := stamp(1, 1, 0)
		s.X[0] = c.T
		if h.Begin(s, false); s.Mode != c.want {
			t.Errorf("at %g K with start %d: mode %d, want %d", c.T, c.starts, s.Mode, c.want)
		}
		g := make([]float64, 1)
		if h.Guards(s, g); g[0] <= 0 && c.T != 310 {
			t.Errorf("at %g K the mode is over at once", c.T)
		}
	}
}

var (
	_ network.Switching = (*controller)(nil)
	_ network.Beginning = (*controller)(nil)
	_ network.Switching = (*thermostat)(nil)
)
