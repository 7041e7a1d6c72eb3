package network_test

import (
	"errors"
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// cellar is a store behind a massless face to a held outdoors, with a load.
func cellar(t *testing.T) (*network.Network, *network.Params, []network.Output) {
	t.Helper()
	b := network.NewBuilder()
	out, face, room := b.Node("out", network.NoRef), b.Node("face", network.NoRef), b.Node("room", network.NoRef)
	b.Hold(out, network.NoRef)
	b.Capacity(room, network.NoRef)
	b.Resistance("film", out, face, network.NoRef)
	b.Resistance("wall", face, room, network.NoRef)
	b.Source("load", room, 1, network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.C[0], p.G[0], p.G[1] = 4e5, 20, 5
	p.Wave[0] = laplace.Sine(283, 8, 2*math.Pi/86400, 1)
	var fault error
	if p.Wave[1], fault = laplace.Pulse(laplace.PulseTrain{High: 300, Width: 5400, Period: 43200, At: 25200}); fault != nil {
		t.Fatal(fault)
	}
	return n, p, []network.Output{n.Level(room), n.Level(face)}
}

// The run that starts in its periodic state is the cycle, from the first instant on
// and for ever, and the start state is where it stands just before t = 0.
func TestStartInCycle(t *testing.T) {
	n, p, outs := cellar(t)
	r, err := n.Reduce(p, outs)
	if err != nil {
		t.Fatal(err)
	}
	steady, approach, err := r.Cycle(p)
	if err != nil {
		t.Fatal(err)
	}
	if steady.Period != 86400 {
		t.Errorf("period %v", steady.Period)
	}
	if c, ok, err := approach.Cycles(0, 0.02); c == 0 || !ok || err != nil {
		t.Errorf("from the steady start %v cycles, %v, %v", c, ok, err)
	}
	p.StartCycle = true
	resp, err := r.Respond(p, 30*86400)
	if err != nil {
		t.Fatal(err)
	}
	for _, at := range []float64{0, 30000, 86400, 2e6} {
		for o := range outs {
			near(t, "level", resp.At(o, at), steady.At(o, at), 1e-13, 300)
		}
	}
	s, err := n.Start(p)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "start of the room", s.Levels[2], steady.Left(0, 0), 1e-13, 300)
	near(t, "before the run", resp.Left(0, 0), steady.Left(0, 0), 1e-13, 300)
	if _, a, err := r.Cycle(p); err != nil {
		t.Error(err)
	} else if c, ok, _ := a.Cycles(0, 0.02); c != 0 || !ok {
		t.Errorf("from the cycle %v cycles", c)
	}
	// the mean by hand: 283 K and 300 W · 1.5/12 through 1/20 + 1/5 K/W
	near(t, "mean", steady.Mean(0), 283+37.5*0.25, 1e-13, 300)
}

// A load that does not repeat holds its value before 0 while the others come to
// their cycle, and then acts as it says.
func TestStartInCycleBesideAStep(t *testing.T) {
	n, p, outs := cellar(t)
	p.Wave[1] = laplace.Step(100, 250, 3600)
	p.StartCycle = true
	r, err := n.Reduce(p, outs)
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 60*86400)
	if err != nil {
		t.Fatal(err)
	}
	w, tau := 2*math.Pi/86400, 4e5/4.0
	swing := func(at float64) float64 { return 8 / math.Hypot(1, w*tau) * math.Sin(w*at+1-math.Atan(w*tau)) }
	for _, at := range []float64{0, 1000, 3600, 50000, 5e6} {
		want := 283 + 25 + swing(at) - 150*0.25*math.Expm1(-math.Max(0, at-3600)/tau)
		near(t, "room", resp.At(0, at), want, 1e-13, 300)
	}
}

// What has no cycle is refused with the names of the network.
func TestNoCycle(t *testing.T) {
	n, p, outs := cellar(t)
	refused := func(wave laplace.Waveform, want string) {
		t.Helper()
		p.Wave[1] = wave
		r, err := n.Reduce(p, outs)
		if err != nil {
			t.Fatal(err)
		}
		var no *network.NoCycle
		if _, _, err = r.Cycle(p); !errors.As(err, &no) || no.Text != want {
			t.Errorf("%v, want %q", err, want)
		}
	}
	refused(laplace.Waveform{Segments: []laplace.Segment{{B: 1}}}, `"load": it goes on straight for ever`)
	refused(laplace.Sine(0, 1, 2*math.Pi/86400/math.Sqrt2, 0),
		`"load" repeats every 122188 s and "out" every 86400 s, periods without a whole-number ratio, so that together they never repeat`)

	b := network.NewBuilder()
	tank := b.Node("tank", network.NoRef)
	b.Capacity(tank, network.NoRef)
	b.Source("heat", tank, 1, network.NoRef)
	island, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	q := island.NewParams()
	q.C[0], q.HasAllStart, q.AllStart = 10, true, 300
	if q.Wave[0], err = laplace.Pulse(laplace.PulseTrain{High: 5, Width: 2, Period: 4}); err != nil {
		t.Fatal(err)
	}
	r, err := island.Reduce(q, []network.Output{island.Level(tank)})
	if err != nil {
		t.Fatal(err)
	}
	var no *network.NoCycle
	if _, _, err = r.Cycle(q); !errors.As(err, &no) || no.Text != `"tank" moves on by 1 in every period, because what flows in on the mean finds no way out` {
		t.Error(err)
	}
}
