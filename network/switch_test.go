package network_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// A fan cools a case; it stops, and a hatch opens that was shut.
type fan struct {
	net  *network.Network
	p    *network.Params
	outs []network.Output
}

const (
	caseC, fixedG, fanG, skinG = 400.0, 1.0, 4.0, 2.0
)

// newFan is a store that loses through a massless skin to a held room by a fixed
// conductance, and to the room directly by one that a switch scales.
func newFan(t *testing.T, wave laplace.Waveform) *fan {
	t.Helper()
	b := network.NewBuilder()
	body, skin, room := b.Node("body", network.NoRef), b.Node("skin", network.NoRef), b.Node("room", network.NoRef)
	b.Capacity(body, network.NoRef)
	b.Hold(room, network.NoRef)
	b.Resistance("in", body, skin, network.NoRef)
	b.Resistance("out", skin, room, network.NoRef)
	blown := b.Resistance("fan", body, room, network.NoRef)
	b.Source("load", body, 1, network.NoRef)
	s := b.Switch("fan", network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.C[0], p.G[0], p.G[1] = caseC, skinG, skinG // fixedG together
	p.Wave[0], p.Wave[1] = laplace.Constant(293), laplace.Step(0, 100, 0)
	p.Switch[s] = wave
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.G[blown] = append([]float64(nil), now...), fanG*now[s]
		return c, nil
	}
	first, err := p.Turn([]float64{wave.Before})
	if err != nil {
		t.Fatal(err)
	}
	return &fan{n, first, []network.Output{n.Level(body), n.FlowOf(blown), n.Difference(skin, room)}}
}

func (f *fan) respond(t *testing.T, until float64) *laplace.Response {
	t.Helper()
	r, err := f.net.Reduce(f.p, f.outs)
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(f.p, until)
	if err != nil {
		t.Fatal(err)
	}
	return resp
}

// By hand: two time constants; the flow of the fan jumps to 0 and back.
func TestFanStops(t *testing.T) {
	stop, err := laplace.Pulse(laplace.PulseTrain{Low: 1, High: 0, Width: 60, At: 100, Count: 1})
	if err != nil {
		t.Fatal(err)
	}
	f := newFan(t, stop)
	resp := f.respond(t, 1000)
	runs, still := fixedG+fanG, fixedG
	at100 := -100 / runs * math.Expm1(-100*runs/caseC)
	at160 := 100/still + (at100-100/still)*math.Exp(-60*still/caseC)
	for _, x := range []struct{ at, rise, flow float64 }{
		{50, -100 / runs * math.Expm1(-50*runs/caseC), fanG},
		{100, at100, 0},
		{130, 100/still + (at100-100/still)*math.Exp(-30*still/caseC), 0},
		{160, at160, fanG},
		{400, 100/runs + (at160-100/runs)*math.Exp(-240*runs/caseC), fanG},
	} {
		near(t, "body", resp.At(0, x.at), 293+x.rise, 1e-14, 300)
		near(t, "flow", resp.At(1, x.at), x.flow*x.rise, 1e-13, 300)
		near(t, "skin", resp.At(2, x.at), x.rise/2, 1e-13, 300)
	}
	near(t, "flow before it stops", resp.Left(1, 100), fanG*at100, 1e-13, 300)
	hi := resp.Max(0, 0, 1000)
	near(t, "highest", hi.Y, 293+at160, 1e-14, 300)
	near(t, "when", hi.T, 160, 1e-12, 160)
}

// A switch that stays at 1 changes nothing, bit for bit; one that moves from 1 to 1 by
// way of nothing at all changes nothing either.
func TestSwitchOfNoEffect(t *testing.T) {
	ones, err := laplace.Stairs([][2]float64{{0, 1}, {10, 1}, {20, 1}})
	if err != nil {
		t.Fatal(err)
	}
	plain, same := newFan(t, laplace.Constant(1)).respond(t, 500), newFan(t, ones).respond(t, 500)
	late := newFan(t, laplace.Step(1, 0, 1e4)).respond(t, 500)
	for k := range 101 {
		at := 5 * float64(k)
		for o := range 3 {
			if a, b := plain.At(o, at), same.At(o, at); a != b {
				t.Errorf("%v, want %v", a, b)
			}
			near(t, "before the switch", late.At(o, at), plain.At(o, at), 1e-15, 300)
		}
	}
}

// What the store gains is what the load brings less what the branches carry off:
// the flows integrated in closed form over a cycle, in which the store gains nothing.
func TestSwitchedCycleBalance(t *testing.T) {
	turn, err := laplace.Pulse(laplace.PulseTrain{Low: 0.25, High: 1, Width: 70, Period: 200, At: 30})
	if err != nil {
		t.Fatal(err)
	}
	f := newFan(t, turn)
	if f.p.Wave[1], err = laplace.Pulse(laplace.PulseTrain{High: 100, Width: 40, Period: 100}); err != nil {
		t.Fatal(err)
	}
	turned := f.p.Turn
	f.p.Turn = func(now []float64) (*network.Params, error) {
		c, err := turned(now)
		if err == nil {
			c.Wave[1] = f.p.Wave[1]
		}
		return c, err
	}
	r, err := f.net.Reduce(f.p, f.outs)
	if err != nil {
		t.Fatal(err)
	}
	c, a, err := r.Cycle(f.p)
	if err != nil {
		t.Fatal(err)
	}
	if c.Period != 200 {
		t.Errorf("period %v", c.Period)
	}
	near(t, "mean flow out", c.Mean(1)+skinG*c.Mean(2), 40, 1e-13, 300)
	if n, ok, err := a.Cycles(0, 0.02); !ok || err != nil || n < 1 {
		t.Errorf("%v cycles, %v, %v", n, ok, err)
	}
	brute := f.respond(t, 500*200)
	for k := range 20 {
		near(t, "after 499 cycles", brute.At(0, 499*200+10*float64(k)), c.At(0, 10*float64(k)), 1e-13, 300)
	}
	f.p.StartCycle = true
	in := f.respond(t, 1000)
	for k := range 100 {
		near(t, "from the cycle", in.At(1, 10*float64(k)), c.At(1, 10*float64(k)), 1e-12, 300)
	}
	if _, a, err := r.Cycle(f.p); err != nil {
		t.Error(err)
	} else if n, ok, err := a.Cycles(0, 0.02); n != 0 || !ok || err != nil {
		t.Errorf("from the cycle %v cycles, %v, %v", n, ok, err)
	}
}

// A branch that opens can leave a massless node with nothing: named, with the time.
func TestSwitchLeavesANode(t *testing.T) {
	b := network.NewBuilder()
	body, lid, room := b.Node("body", network.NoRef), b.Node("lid", network.NoRef), b.Node("room", network.NoRef)
	b.Capacity(body, network.NoRef)
	b.Hold(room, network.NoRef)
	b.Resistance("path", body, room, network.NoRef)
	hinge := b.Resistance("hinge", body, lid, network.NoRef)
	b.Source("sun", lid, 1, network.NoRef)
	b.Switch("hinge", network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.C[0], p.G[0], p.G[hinge], p.Switch[0] = 10, 1, 1, laplace.Step(1, 0, 7)
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.G[hinge] = now, now[0]
		return c, nil
	}
	r, err := n.Reduce(p, []network.Output{n.Level(body)})
	if err != nil {
		t.Fatal(err)
	}
	var f *network.ParamFault
	if _, err := r.Respond(p, 20); !errors.As(err, &f) || f.List[0].Code != network.Undetermined || !strings.Contains(f.List[0].Text, `node "lid"`) || !strings.Contains(f.List[0].Text, "from 7 s on") {
		t.Error(err)
	}
}

// A hatch that is shut before t = 0 leaves the room behind it without a steady state;
// the cycle does not ask for one.
func TestCycleFromNowhere(t *testing.T) {
	hatch, err := laplace.Pulse(laplace.PulseTrain{Low: 0, High: 1, Width: 50, Period: 100})
	if err != nil {
		t.Fatal(err)
	}
	f := newFan(t, hatch)
	turned := f.p.Turn
	turn := func(now []float64) (*network.Params, error) { // with nothing else that leads out
		c, err := turned(now)
		if err == nil {
			c.G[0], c.G[1], c.Wave[1] = 0, 1, laplace.Constant(10)
		}
		return c, err
	}
	if f.p, err = turn([]float64{0}); err != nil {
		t.Fatal(err)
	}
	f.p.Turn = turn
	f.outs = f.outs[:1]
	f.p.StartCycle = true
	resp := f.respond(t, 1000)
	// by hand: up by 10/C·50 while shut, back by as much while open
	e := math.Exp(-50 * fanG / caseC)
	low := (2.5*(1-e) + e*1.25) / (1 - e)
	near(t, "start", resp.At(0, 0), 293+low+1.25, 1e-13, 300)
	near(t, "open", resp.At(0, 50), 293+low, 1e-13, 300)
	near(t, "a while later", resp.At(0, 950), 293+low, 1e-13, 300)
}

// A line with inertance into a vessel whose outlet turns, against the exponential of
// the two equations.
func TestSwitchBesideInertance(t *testing.T) {
	n := fedTank(t)
	const L, R, C, G = 2.0, 0.3, 0.5, 0.8
	p := n.NewParams()
	p.C[0], p.L[0], p.LR[0], p.G[0] = C, L, R, G
	p.Wave[0], p.Wave[1] = laplace.Step(1, 3, 0), laplace.Constant(0)
	p.Switch[0] = laplace.Step(1, 0.25, 2)
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.G[0] = now, G*now[0]
		return c, nil
	}
	r, err := n.Reduce(p, []network.Output{n.Level(1), n.InertanceFlowOf(0)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 6)
	if err != nil {
		t.Fatal(err)
	}
	x := []float64{1 / (1 + R*G), G / (1 + R*G)}
	step := func(g, h float64) {
		a := mat.NewDense(3, 3, []float64{-g / C * h, h / C, 0, -h / L, -R / L * h, 3 * h / L, 0, 0, 0})
		var e mat.Dense
		e.Exp(a)
		x = []float64{e.At(0, 0)*x[0] + e.At(0, 1)*x[1] + e.At(0, 2), e.At(1, 0)*x[0] + e.At(1, 1)*x[1] + e.At(1, 2)}
	}
	for _, s := range []struct{ until, g, h float64 }{{2, G, 2}, {6, G / 4, 4}} {
		step(s.g, s.h)
		near(t, "level", resp.Left(0, s.until), x[0], 1e-13, 1)
		near(t, "flow", resp.Left(1, s.until), x[1], 1e-13, 1)
	}
}

// Networks with massless nodes, streams and feedbacks whose resistances turn, against
// the march of the whole equations phase by phase.
func TestSwitchedMarchAgrees(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		for i := range s.kinds {
			if j := rapid.IntRange(0, len(s.kinds)-1).Draw(t, "round"); j != i && rapid.Bool().Draw(t, "stream") {
				rate := math.Exp2(rapid.Float64Range(-5, 5).Draw(t, "rate"))
				s.streams = append(s.streams, wire{i, j, rate}, wire{j, i, rate})
			}
		}
		which := rapid.IntRange(0, len(s.wires)-1).Draw(t, "which")
		s.switches = 1
		m := s.build(t)
		at := s.fastSpan(t)
		scale := []float64{1, rapid.SampledFrom([]float64{0.2, 0.5, 3}).Draw(t, "scale"), 1}
		stairs, err := laplace.Stairs([][2]float64{{0, scale[0]}, {at, scale[1]}, {2 * at, scale[2]}})
		if err != nil {
			t.Fatal(err)
		}
		m.p.Switch[0] = stairs
		m.p.Turn = func(now []float64) (*network.Params, error) {
			c := m.p.Clone()
			c.Now, c.G[which] = now, now[0]/s.wires[which].value
			return c, nil
		}
		x, u := s.stepped(t, m)
		resp := m.respond(t, m.levels(), 3*at)
		wires := append([]wire(nil), s.wires...)
		for k, f := range scale {
			s.wires = append([]wire(nil), wires...)
			s.wires[which].value /= f
			x = s.march(x, u, at, 24)
			size := 1.0
			for _, v := range x {
				size = max(size, math.Abs(v))
			}
			for o := range m.nodes {
				near(t, "level", resp.Left(o, at*float64(k+1)), x[o], 1e-9, size)
			}
		}
	})
}
