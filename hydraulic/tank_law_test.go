package hydraulic

import (
	"math"
	"testing"

	"lagbook/network"
)

// surveyed is a tank by areas, with its volumes worked out.
func surveyed(height, area []float64) *survey {
	s := &survey{height: height, area: area}
	s.sum()
	return s
}

// blunted is a round vessel with its ends worked out.
func blunted(of round) *blunt {
	b := &blunt{of: of}
	b.settle()
	return b
}

// Volumes of whole and half vessels, from their formulas.
func TestVessels(t *testing.T) {
	for _, c := range []struct {
		name string
		v    vessel
		h    float64
		want float64
	}{
		{"prism", &prism{2.5}, 1.2, 3},
		{"lying, half full", blunted(&lying{2, 5}), 1, math.Pi / 2 * 5},
		{"lying, full", blunted(&lying{2, 5}), 2, math.Pi * 5},
		{"lying, a quarter of the height", blunted(&lying{2, 5}), 0.5, 5 * (math.Acos(0.5) - 0.5*math.Sqrt(0.75))},
		{"sphere, half full", blunted(&sphere{3}), 1.5, 2 * math.Pi / 3 * math.Pow(1.5, 3)},
		{"sphere, full", blunted(&sphere{3}), 3, 4 * math.Pi / 3 * math.Pow(1.5, 3)},
		{"cone", blunted(&cone{0, 2, 3}), 3, math.Pi},
		{"cone, half the height", blunted(&cone{0, 2, 3}), 1.5, math.Pi / 8},
		{"lying, a film", blunted(&lying{2, 5}), 0.002, 5 * (math.Acos(1-0.002) - (1-0.002)*math.Sqrt(0.002*1.998))},
		{"frustum", blunted(&cone{1, 2, 3}), 3, math.Pi / 12 * 3 * (1 + 2 + 4)},
		{"survey", surveyed([]float64{0, 1, 3}, []float64{2, 4, 4}), 2, 3 + 4},
		{"survey, below a point", surveyed([]float64{0, 1, 3}, []float64{2, 4, 4}), 0.5, 0.5 * (2 + 3) / 2},
		{"strapping", &strapping{[]float64{0, 1, 3}, []float64{0, 3, 11}}, 2, 7},
	} {
		if got, _ := c.v.fill(c.h); math.Abs(got-c.want) > 1e-12*c.want {
			t.Errorf("%s: %v m³ at %v m, want %v", c.name, got, c.h, c.want)
		}
	}
}

func tanks() map[string]*tankLaw {
	all := map[string]*tankLaw{
		"prism":     {vessel: &prism{12}, crest: crest{height: 1.8}, top: 2, has: tankEdges{true, true}},
		"weir":      {vessel: &prism{12}, crest: crest{1.5, 0.8}, top: 2, has: tankEdges{true, true}},
		"lying":     {vessel: blunted(&lying{2, 5}), top: 2, has: tankEdges{top: true}},
		"sphere":    {vessel: blunted(&sphere{2}), top: 2, has: tankEdges{top: true}},
		"cone":      {vessel: blunted(&cone{0.2, 2, 2}), top: 2, has: tankEdges{top: true}},
		"survey":    {vessel: surveyed([]float64{0, 1.1, 3}, []float64{2, 4, 4})},
		"strapping": {vessel: &strapping{[]float64{0, 1.1, 3}, []float64{0, 3, 11}}},
	}
	for _, l := range all {
		l.zero, l.weight = 4900, 9780
		l.prepare()
	}
	return all
}

func TestTanks(t *testing.T) {
	for name, l := range tanks() {
		for k, h := range []float64{-0.3, -2e-3, 0.013, 0.4, 1.05, 1.49, 1.503, 1.77, 1.803, 1.99, 2.003, 2.4} {
			c := trial{law: l, ports: 1, unknowns: 1, x: []float64{l.zero + h*l.weight, 0.02}, step: []float64{0.5, 1e-4}, mode: k % 4}
			c.jacobian(t, name, false)
			for k := range 2 {
				grad := []float64{0, 0}
				s := c.stamp(c.x)
				l.Read(s, k, grad)
				s.X = []float64{c.x[0] + 0.5, 0.02}
				up := l.Read(s, k, nil)
				s.X = []float64{c.x[0] - 0.5, 0.02}
				if q := up - l.Read(s, k, nil); math.Abs(q-grad[0]) > 1e-3*math.Abs(q)+1e-9 {
					t.Errorf("%s at %v m: reading %d goes by %v, by differences %v", name, h, k, grad[0], q)
				}
			}
		}
		for _, x := range []float64{1e300, -1e300} {
			s := (&trial{law: l, ports: 1, unknowns: 1}).stamp([]float64{x, 0})
			if bad := s.F[0] + s.Stored + s.DStored; math.IsNaN(bad) || math.IsInf(bad, 0) {
				t.Errorf("%s at %v Pa: %v, %v", name, x, s.F, s.Stored)
			}
		}
	}
}

// At its crest a tank takes what comes and stands there: 30 L/s over a plain crest lift
// it by some micrometres.
func TestPlainCrest(t *testing.T) {
	l := tanks()["prism"]
	c := trial{law: l, ports: 1, unknowns: 1, mode: tankOver}
	s := c.stamp([]float64{l.zero + (1.8+0.03*edgeTime/12)*l.weight, 0.03})
	if math.Abs(s.F[1]) > 1e-7 || s.F[0] != -0.03 {
		t.Errorf("some micrometres above the crest %v m³/s run over, and %v are amiss", -s.F[0], s.F[1])
	}
	c.mode = tankBetween
	if s := c.stamp([]float64{l.zero + 1.9*l.weight, 0}); s.F[0] != 0 || s.F[1] != 0 {
		t.Errorf("between floor and crest %v m³/s run over", -s.F[0])
	}
}

// A sharp-crested rectangular weir of 1 m, 0.5 m high, under a head of 0.25 m: Rehbock's
// coefficient is 0.611 + 0.075/2 = 0.6485, so 0.2394 m³/s for each metre (formula from memory).
func TestWeir(t *testing.T) {
	c := crest{0.5, 1}
	if q, _ := c.weir(0.25); math.Abs(q-2.0/3*0.6485*math.Sqrt(2*gravity)*0.125) > 1e-12 {
		t.Errorf("%v m³/s", q)
	}
	for _, u := range []float64{1e-3, 0.1, 2.4, 2.6, 7} {
		_, dq := c.weir(u)
		a, _ := c.weir(u * (1 + 1e-6))
		b, _ := c.weir(u * (1 - 1e-6))
		if q := (a - b) / (2e-6 * u); math.Abs(q/dq-1) > 1e-6 {
			t.Errorf("slope at %v m: %v, by differences %v", u, dq, q)
		}
	}
}

// What a tank says as its level rises from the floor over a weir to the top and falls to
// nothing, with what passes the edge that holds it.
func TestTankTells(t *testing.T) {
	l := tanks()["weir"]
	s := &network.Stamp{X: []float64{0, 0}}
	at := func(h, w float64) { s.X[0], s.X[1] = l.zero+h*l.weight, w }
	at(1, 0)
	l.Begin(s, false)
	g := make([]float64, 4)
	for _, step := range []struct {
		h, w float64
		what string
		rest float64 // what passes in the next mode
	}{{1.6, 0, "runs over", 0}, {2.0000001, 0, "runs over its top", 1e-3}, {2, -1e-5, "runs over its top no more", 0}, {1.4, 0, "runs over no more", 0},
		{-0.1, 0, "runs empty", -1e-3}, {-dregs, 1e-5, "holds liquid again", 0}} {
		at(step.h, step.w)
		said := ""
		for k := range l.Guards(s, g) {
			if g[k] < 0 && said == "" {
				s.Mode, said, _ = l.Next(s, k)
			}
		}
		if said != step.what {
			t.Errorf("at %v m it says %q, want %q", step.h, said, step.what)
		}
		s.X[1] = step.rest
		for k := range l.Guards(s, g) {
			if g[k] < 0 {
				t.Errorf("at %v m it would change its mode %d at once again", step.h, s.Mode)
			}
		}
	}
	s.Mode = tankBrim
	over, _ := l.Caution(s)
	s.Mode = tankEmpty
	empty, _ := l.Caution(s)
	if over != "over-top" || empty != "tank-empty" {
		t.Errorf("cautions %q and %q", over, empty)
	}
}
