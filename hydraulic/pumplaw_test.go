package hydraulic

import (
	"math"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

// slopes compares what a law says of its derivatives with central differences at x, in
// steps of h, each of the size of its variable, and checks that what leaves one port
// enters another.
func slopes(t *rapid.T, law network.Law, mode int, x, h []float64, rows, ports int) {
	eval := func(x []float64) *network.Stamp {
		s := &network.Stamp{X: x, Mode: mode, F: make([]float64, rows), DF: make([]float64, rows*len(x))}
		law.Eval(s)
		return s
	}
	at := eval(x)
	sum := 0.0
	for _, f := range at.F[:ports] {
		sum += f
	}
	if sum != 0 {
		t.Fatalf("%g into the ports together", sum)
	}
	for k := range x {
		up, down := append([]float64{}, x...), append([]float64{}, x...)
		up[k] += h[k]
		down[k] -= h[k]
		a, b := eval(up), eval(down)
		for i := range rows {
			by, size := (a.F[i]-b.F[i])/(2*h[k]), math.Abs(a.F[i])+math.Abs(b.F[i])
			if got := at.DF[i*len(x)+k]; math.Abs(got-by) > 1e-5*(math.Abs(got)+math.Abs(by))+1e-9*size/h[k] {
				t.Fatalf("mode %d at %v: ∂F%d/∂X%d = %g, by differences %g", mode, x, i, k, got, by)
			}
		}
	}
}

// invented is a pump of 30 m at no flow and 20 L/s at most.
func inventedCurve(efficiency ...float64) pumpCurve {
	c := pumpCurve{flow: make([]float64, 4), head: make([]float64, 4), slope: make([]float64, 3), efficiency: efficiency}
	for k, p := range [][2]float64{{0, 30}, {0.006, 28}, {0.012, 22}, {0.02, 8}} {
		c.set(k, p[0], p[1])
	}
	return c
}

// kinked reports whether a flow lies too near a kink of a curve for differences.
func kinked(q, s float64, c *pumpCurve) bool {
	for _, x := range append([]float64{0}, c.flow...) {
		if math.Abs(q-s*x) < 1e-5 {
			return true
		}
	}
	h, _, _ := c.at(q, s)
	return math.Abs(h) < 0.05 || math.Abs(s-still) < 1e-4
}

func TestHeadPumpSlopes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := &headPump{curve: inventedCurve(0, 0.6, 0.75, 0.5), ports: 2, weight: 9800, rated: 24, inertia: 500,
			pumpModes: pumpModes{nonReturn: true, trips: rapid.Bool().Draw(t, "trips"), switched: true}}
		mode := rapid.SampledFrom([]int{0, pumpShut, pumpOff, pumpShut | pumpOff}).Draw(t, "mode")
		q, s := rapid.Float64Range(-0.01, 0.03).Draw(t, "q"), rapid.Float64Range(0.05, 1.2).Draw(t, "s")
		x := []float64{rapid.Float64Range(-1e5, 5e5).Draw(t, "from"), rapid.Float64Range(-1e5, 5e5).Draw(t, "to"), q}
		h := []float64{1, 1, 1e-7}
		rows := 3
		if l.trips {
			mode = mode&^pumpOff | rapid.SampledFrom([]int{0, pumpTripped}).Draw(t, "tripped")
			x, h = append(x, s, 24*s, 1), append(h, 1e-6, 1e-5, 1e-3)
			rows = 4
		} else {
			x, h = append(x, 24*s), append(h, 1e-5)
		}
		share := s
		if mode&pumpOff != 0 {
			share = 0
		}
		if kinked(q, share, &l.curve) || kinked(q/s, 1, &l.curve) {
			return
		}
		slopes(t, l, mode, x, h, rows, 2)
	})
}

func TestDisplacementPumpSlopes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := &displacementPump{ports: 3, volume: 1.6e-5, leak: rapid.SampledFrom([]float64{0, 1e-11}).Draw(t, "leak"), rise: 1e4, weight: 8500,
			pumpModes: pumpModes{nonReturn: true, switched: true, watch: 2}}
		mode := rapid.SampledFrom([]int{0, pumpShut, pumpOff, pumpShut | pumpOff}).Draw(t, "mode")
		x := []float64{rapid.Float64Range(0, 1e5).Draw(t, "from"), rapid.Float64Range(0, 2e7).Draw(t, "to"), 1e6, rapid.Float64Range(1, 30).Draw(t, "speed")}
		slopes(t, l, mode, x, []float64{10, 10, 10, 1e-3}, 3, 3)
		for k := range 4 {
			readingSlopes(t, l, mode, x, []float64{10, 10, 10, 1e-3}, k)
		}
	})
}

// readingSlopes does for a reading what slopes does for a law.
func readingSlopes(t *rapid.T, law network.Readable, mode int, x, h []float64, reading int) {
	grad := make([]float64, len(x))
	law.Read(&network.Stamp{X: x, Mode: mode}, reading, grad)
	for k := range x {
		up, down := append([]float64{}, x...), append([]float64{}, x...)
		up[k] += h[k]
		down[k] -= h[k]
		a, b := law.Read(&network.Stamp{X: up, Mode: mode}, reading, nil), law.Read(&network.Stamp{X: down, Mode: mode}, reading, nil)
		if by := (a - b) / (2 * h[k]); math.Abs(by-grad[k]) > 1e-4*(math.Abs(by)+math.Abs(grad[k]))+1e-9*(math.Abs(a)+math.Abs(b))/h[k] {
			t.Fatalf("mode %d, reading %d: derivative %d is %g, by differences %g", mode, reading, k, grad[k], by)
		}
	}
}

func TestHeadPumpReadings(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := &headPump{curve: inventedCurve(0, 0.6, 0.75, 0.5), ports: 2, weight: 9800, rated: 24}
		q, s := rapid.Float64Range(0.0005, 0.02).Draw(t, "q"), rapid.Float64Range(0.1, 1.2).Draw(t, "s")
		if kinked(q/s, 1, &l.curve) {
			return
		}
		for _, k := range []int{readHead, readPower, readSpeed, readShaft, readNPSH} {
			readingSlopes(t, l, 0, []float64{1e5, 3e5, q, 24 * s}, []float64{1, 1, 1e-7, 1e-4}, k)
		}
	})
}

// Affinity: at s times its speed a pump has s² times the head at s times the flow and
// takes s³ times the power (White, Fluid Mechanics, ch. 11).
func TestAffinity(t *testing.T) {
	c := inventedCurve(0.7)
	rapid.Check(t, func(t *rapid.T) {
		q, s := rapid.Float64Range(0, 0.04).Draw(t, "q"), rapid.Float64Range(0.01, 2).Draw(t, "s")
		h, _, _ := c.at(s*q, s)
		rated, _, _ := c.at(q, 1)
		if math.Abs(h-s*s*rated) > 1e-12*30 {
			t.Fatalf("%g m at %g times the speed, %g at the rated one", h, s, rated)
		}
	})
	l := &headPump{curve: c, ports: 2, weight: 9810, rated: 1}
	full := l.shaft(&network.Stamp{X: []float64{0, 0, 0.01, 1}}, 0.01, func(int, float64) {})
	h, _, _ := c.at(0.01, 1)
	if want := 9810 * 0.01 * h / 0.7; math.Abs(full-want) > 1e-9*want {
		t.Errorf("%g W at the shaft, want ρ·g·Q·H/η = %g", full, want)
	}
	if slow := l.shaft(&network.Stamp{X: []float64{0, 0, 0.008, 0.8}}, 0.008, func(int, float64) {}); math.Abs(slow/full-0.512) > 1e-12 {
		t.Errorf("power falls to %g, want 0.8³", slow/full)
	}
}

// Its guards lead through its modes.
func TestPumpModes(t *testing.T) {
	l := &headPump{curve: inventedCurve(0.7), ports: 2, weight: 9800, rated: 24, carried: true, pumpModes: pumpModes{nonReturn: true, switched: true, watch: 1, on: 1e5, off: 2e5, begin: asLevel}}
	s := &network.Stamp{X: []float64{0, 2.5e5, 0, 24}}
	if l.Begin(s, true); s.Mode != pumpOff|pumpShut {
		t.Errorf("begins in mode %d above off", s.Mode)
	}
	s.Mode, s.X[2] = 0, 0.004
	g := make([]float64, 3)
	if n := l.Guards(s, g); n != 2 || g[0] != 0.004 || g[1] != -0.5e5 {
		t.Errorf("guards %v", g[:n])
	}
	mode, what, _ := l.Next(s, 1)
	if mode != pumpOff || what != "switched off" { // liquid is under way
		t.Errorf("off leads to %d, %q", mode, what)
	}
	s.X[2], s.Mode = -1e-9, mode
	if mode, _, _ = l.Next(s, 0); mode != pumpOff|pumpShut {
		t.Errorf("no flow leads to %d", mode)
	}
	s.X[1], s.Mode = 0.9e5, mode
	if n := l.Guards(s, g); n != 2 || g[0] != 0.9e5 || g[1] != -0.1e5 {
		t.Errorf("guards %v", g[:n])
	}
	if mode, what, _ = l.Next(s, 1); mode != 0 || what != "switched on" {
		t.Errorf("on leads to %d, %q", mode, what)
	}
}
