package network_test

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// asElements builds a spec of wires alone with a Through for every wire; order says in
// which order the nodes are added, nil in their own.
func (s *spec) asElements(t interface{ Fatal(...any) }, order []int) *built {
	b, m := network.NewBuilder(), &built{hold: map[int]network.InputID{}, nodes: make([]network.NodeID, len(s.kinds))}
	C := []float64{}
	for k := range s.kinds {
		i := k
		if order != nil {
			i = order[k]
		}
		id := b.Node(fmt.Sprint("n", i), network.NoRef)
		m.nodes[i] = id
		switch s.kinds[i] {
		case store:
			b.Capacity(id, network.NoRef)
			C = append(C, s.C[i])
		case held:
			m.hold[i] = b.Hold(id, network.NoRef)
		}
	}
	for _, w := range s.wires {
		b.Between("w", m.nodes[w.from], m.nodes[w.to], false, network.NoRef)
	}
	for _, n := range s.sources {
		m.source = append(m.source, b.Source("", m.nodes[n], 1, network.NoRef))
	}
	var err error
	if m.net, err = b.Build(); err != nil {
		t.Fatal(err)
	}
	m.p = m.net.NewParams()
	copy(m.p.C, C)
	for i, w := range s.wires {
		m.p.Law[i] = &network.Through{Flow: proportional(1 / w.value)}
	}
	m.p.HasAllStart = true
	return m
}

// anyWave draws a wave that is 0 before t = 0 and moves within a span of time.
func anyWave(t *rapid.T, span float64) laplace.Waveform {
	size := float64(rapid.IntRange(-40, 40).Draw(t, "size")) / 8
	switch rapid.IntRange(0, 3).Draw(t, "wave") {
	case 0:
		return laplace.Step(0, size, 0)
	case 1:
		return laplace.Sine(0, size, rapid.Float64Range(1, 30).Draw(t, "turns")/span, 0)
	case 2:
		w, err := laplace.Pulse(laplace.PulseTrain{High: size, Width: span / 20, Period: span / (float64(rapid.IntRange(3, 8).Draw(t, "pulses")) + 0.37)})
		if err != nil {
			t.Fatal(err)
		}
		return w
	}
	w, err := laplace.Points([][2]float64{{0, 0}, {span / 3, size}, {span / 2, size / 2}, {span, -size}})
	if err != nil {
		t.Fatal(err)
	}
	return w
}

// A linear network marches as its closed form says, within and at the steps.
func TestMarchAgreesWithClosedForm(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		span := s.span(t)
		m, e := s.build(t), s.asElements(t, nil)
		for i, n := range s.sources {
			w := anyWave(t, span)
			if s.kinds[n] == massless {
				w = w.Scaled(0x1p-10)
			}
			m.p.Wave[m.source[i]], e.p.Wave[e.source[i]] = w, w
		}
		for i, id := range m.hold {
			w := anyWave(t, span)
			m.p.Wave[id], e.p.Wave[e.hold[i]] = w, w
		}
		resp := m.respond(t, m.levels(), span)
		run := marched(t, e.net, e.p, e.levels(), network.Run{Until: span})
		scale := 1.0
		for o := range m.nodes {
			scale = max(scale, resp.Max(o, 0, span).Y, -resp.Min(o, 0, span).Y)
		}
		for k := range 60 {
			at := span * float64(k) / 59
			for o := range m.nodes {
				near(t, fmt.Sprintf("level of n%d at %g", o, at/span), run.At(o, at), resp.At(o, at), 1e-5, scale)
				near(t, fmt.Sprintf("level of n%d at %g, by Rounding", o, at/span), run.At(o, at), resp.At(o, at), 1, 20*run.Rounding(o)+1e-12*scale)
			}
		}
	})
}

// The order in which nodes are named changes nothing but the rounding of steps.
func TestRenumberingChangesNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		span := s.span(t)
		a := s.asElements(t, nil)
		b := s.asElements(t, rapid.Permutation(indices(len(s.kinds))).Draw(t, "order"))
		for i := range s.sources {
			w := laplace.Step(0, rapid.Float64Range(-5, 5).Draw(t, "u"), span/7)
			a.p.Wave[a.source[i]], b.p.Wave[b.source[i]] = w, w
		}
		x := marched(t, a.net, a.p, a.levels(), network.Run{Until: span})
		y := marched(t, b.net, b.p, b.levels(), network.Run{Until: span})
		scale := 1.0
		for o := range a.nodes {
			scale = max(scale, x.Max(o, 0, span).Y, -x.Min(o, 0, span).Y)
		}
		for k := range 20 {
			for o := range a.nodes {
				at := span * float64(k) / 19
				near(t, "level", y.At(o, at), x.At(o, at), 1e-6, scale)
			}
		}
	})
}

func indices(n int) []int {
	all := make([]int, n)
	for i := range all {
		all[i] = i
	}
	return all
}

// Slower by a power of two is the same, later.
func TestMarchScalesWithTime(t *testing.T) {
	run := func(k float64) (*network.Trajectory, float64) {
		w := newOne(t, 2*k, 4e4, 0, outlet(3e-3, 10))
		return marched(t, w.net, w.p, []network.Output{w.net.Level(w.node)}, network.Run{Until: 1e5 * k}), k
	}
	a, _ := run(1)
	steps, _ := a.Steps()
	for _, k := range []float64{0x1p-20, 8, 0x1p20} {
		b, _ := run(k)
		taken, _ := b.Steps()
		for i := range 50 {
			at := 1e5 * float64(i) / 49
			near(t, "level", b.At(0, at*k), a.At(0, at), 1e-13, 4e4)
		}
		if taken != steps {
			t.Errorf("%d steps, %d with time × %g", steps, taken, k)
		}
	}
}

// A column of liquid between two vessels swings; losses in proportion to the square of
// its flow damp it.
type squared struct{ k float64 }

func (s squared) Drop(q float64) (h, dh float64) { return s.k * q * math.Abs(q), 2 * s.k * math.Abs(q) }

// Halving the tolerance moves no peak by a thousandth, and not by a millionth either.
func TestPeaksHold(t *testing.T) {
	b := network.NewBuilder()
	tank, surge, valve := b.Node("tank", network.NoRef), b.Node("surge", network.NoRef), b.Node("valve", network.NoRef)
	b.Hold(tank, network.NoRef)
	b.Capacity(surge, network.NoRef)
	b.Capacity(valve, network.NoRef)
	long := b.Inertance("tunnel", tank, surge, network.NoRef)
	b.Dropping(long)
	short := b.Inertance("shaft", surge, valve, network.NoRef)
	b.Source("turbine", valve, -1, network.NoRef)
	net, p := finished(t, b)
	p.C[0], p.C[1] = 3e-3, 2e-7
	p.L[long], p.L[short], p.LR[short] = 8e4, 2e5, 3e3
	p.Drop[long] = squared{120}
	var err error
	p.Wave[0] = laplace.Constant(9e5)
	if p.Wave[1], err = laplace.Points([][2]float64{{0, 25}, {3, 25}, {9, 0}}); err != nil {
		t.Fatal(err)
	}
	p.Wave[1] = p.Wave[1].WithBefore(25)
	outs := []network.Output{net.Level(surge), net.Level(valve), net.InertanceFlowOf(long)}
	a := marched(t, net, p, outs, network.Run{Until: 600})
	c := marched(t, net, p, outs, network.Run{Until: 600, RelTol: network.DefaultTolerance / 2})
	for o := range outs {
		hi, lo := a.Max(o, 0, 600), a.Min(o, 0, 600)
		near(t, "highest", c.Max(o, 0, 600).Y, hi.Y, 1e-6, hi.Y-lo.Y)
		near(t, "lowest", c.Min(o, 0, 600).Y, lo.Y, 1e-6, hi.Y-lo.Y)
	}
	taken, back := a.Steps()
	t.Logf("%d steps, %d back; balance %.1e", taken, back, a.Balance())
	if a.Balance() > 1e-9 {
		t.Errorf("balance %.2e", a.Balance())
	}
}
