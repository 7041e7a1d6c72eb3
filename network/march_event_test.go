package network_test

import (
	"errors"
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// relay heats its node while in mode 0, until the level passes off, and again from on
// downwards.
type relay struct{ power, on, off float64 }

func (r *relay) Eval(s *network.Stamp) {
	if s.Mode == 0 {
		s.F[0] = r.power
	}
}

func (r *relay) Guards(s *network.Stamp, g []float64) int {
	if g[0] = r.off - s.X[0]; s.Mode == 1 {
		g[0] = s.X[0] - r.on
	}
	return 1
}

func (r *relay) Next(s *network.Stamp, _ int) (int, string, bool) {
	if s.Mode == 0 {
		return 1, "off", false
	}
	return 0, "on", false
}

func (r *relay) Shut(mode int) bool { return mode == 1 }

// oven is a body that a relay heats and that loses heat to its surroundings.
func oven(tb tester, r *relay, loss float64) (*network.Network, *network.Params, network.NodeID) {
	b := network.NewBuilder()
	around, body := b.Node("around", network.NoRef), b.Node("body", network.NoRef)
	b.Hold(around, network.NoRef)
	b.Capacity(body, network.NoRef)
	b.Resistance("wall", body, around, network.NoRef)
	id := b.Element(network.Shape{Name: "heater", Ports: []network.NodeID{body}}, network.NoRef)
	net, p := finished(tb, b)
	p.C[0], p.G[0], p.Law[id] = 1000, loss, r
	p.Wave[0] = laplace.Constant(20)
	p.HasAllStart, p.AllStart = true, 20
	return net, p, body
}

// A thermostat switches at the instants of the closed form, again and again.
func TestThermostat(t *testing.T) {
	const loss, c = 2.0, 1000.0
	r := &relay{power: 400, on: 95, off: 105}
	net, p, body := oven(t, r, loss)
	run := marched(t, net, p, []network.Output{net.Level(body)}, network.Run{Until: 5000})
	tau, hot := c/loss, 20+r.power/loss
	at := tau * math.Log((hot-20)/(hot-r.off))
	down, up := tau*math.Log((r.off-20)/(r.on-20)), tau*math.Log((hot-r.on)/(hot-r.off))
	events := run.Events()
	for k, e := range events {
		near(t, "event", e.At, at, 1e-7, 5000)
		what := "off"
		if at += down; k%2 == 1 {
			what, at = "on", at-down+up
		}
		if e.What != what {
			t.Fatalf("event %d: %q, want %q", k, e.What, what)
		}
	}
	if at < 5000-down-up || len(events) < 10 {
		t.Errorf("%d events", len(events))
	}
	hi, lo := run.Max(0, 1000, 5000), run.Min(0, 1000, 5000)
	near(t, "highest", hi.Y, r.off, 1e-12, 100)
	near(t, "lowest", lo.Y, r.on, 1e-12, 100)
	if run.Balance() > 1e-9 {
		t.Errorf("balance %.2e", run.Balance())
	}
	if v, ok := run.Final(0); ok {
		t.Errorf("a thermostat settles to %v", v)
	}
}

// Without a difference between on and off a relay chatters, and is named.
func TestChatter(t *testing.T) {
	net, p, body := oven(t, &relay{power: 400, on: 100, off: 100}, 2)
	from, err := net.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	_, err = net.March(p, from, []network.Output{net.Level(body)}, network.Run{Until: 5000})
	var f *network.MarchFault
	if !errors.As(err, &f) || f.At < 200 || f.At > 300 {
		t.Fatalf("%v, want a fault at about 255 s", err)
	}
	t.Log(err)
}

// ender ends the run when its node passes a level.
type ender struct{ level float64 }

func (*ender) Eval(*network.Stamp) {}
func (l *ender) Guards(s *network.Stamp, g []float64) int {
	g[0] = l.level - s.X[0]
	return 1
}
func (*ender) Next(*network.Stamp, int) (int, string, bool) { return 1, "boils", true }
func (*ender) Shut(int) bool                                { return false }

// An event that is the last ends the run there.
func TestLastEventEndsTheRun(t *testing.T) {
	b := network.NewBuilder()
	n := b.Node("pot", network.NoRef)
	b.Capacity(n, network.NoRef)
	b.Source("fire", n, 1, network.NoRef)
	id := b.Element(network.Shape{Name: "pot", Ports: []network.NodeID{n}}, network.NoRef)
	net, p := finished(t, b)
	p.C[0], p.Wave[0], p.Law[id] = 2, laplace.Constant(10), &ender{100}
	p.Start[n], p.HasStart[n] = 20, true
	r := marched(t, net, p, []network.Output{net.Level(n)}, network.Run{Until: 100})
	near(t, "end", r.Until(), 16, 1e-13, 16)
	near(t, "level at the end", r.At(0, 50), 100, 1e-13, 100)
	if e := r.Events(); len(e) != 1 || !e[0].Last || e[0].What != "boils" || e[0].Element != id {
		t.Errorf("events %+v", e)
	}
	if r.End().T != r.Until() {
		t.Errorf("the state is of %v", r.End().T)
	}
	if _, ok := r.Final(0); ok {
		t.Error("a run that was ended has settled")
	}
}

// An excursion within one step, there and back, is not lost.
func TestShortExcursionIsSeen(t *testing.T) {
	b := network.NewBuilder()
	n := b.Node("swing", network.NoRef)
	b.Hold(n, network.NoRef)
	m := b.Node("slow", network.NoRef)
	b.Capacity(m, network.NoRef)
	b.Resistance("r", n, m, network.NoRef)
	id := b.Element(network.Shape{Name: "watch", Ports: []network.NodeID{n}}, network.NoRef)
	net, p := finished(t, b)
	const limit = 1 - 1e-5
	p.C[0], p.G[0], p.Law[id] = 1e6, 1, &ender{limit}
	p.Wave[0] = laplace.Sine(0, 1, 2*math.Pi, 0)
	p.HasAllStart = true
	r := marched(t, net, p, []network.Output{net.Level(n)}, network.Run{Until: 100})
	near(t, "end", r.Until(), math.Asin(limit)/(2*math.Pi), 1e-6, 1)
}

// A march that is told to stop stops, and one of too many breaks is refused.
func TestMarchStops(t *testing.T) {
	net, p, body := oven(t, &relay{power: 400, on: 95, off: 105}, 2)
	from, err := net.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	asked := 0
	_, err = net.March(p, from, []network.Output{net.Level(body)}, network.Run{Until: 5000, Stopped: func() bool { asked++; return asked > 3 }})
	if !errors.Is(err, network.ErrStopped) || asked != 4 {
		t.Errorf("%v after %d", err, asked)
	}
	p.Wave[0], err = laplace.Pulse(laplace.PulseTrain{Low: 20, High: 30, Width: 1e-4, Period: 1e-3})
	if err != nil {
		t.Fatal(err)
	}
	_, err = net.March(p, from, nil, network.Run{Until: 5000})
	var many *laplace.TooMany
	if !errors.As(err, &many) {
		t.Errorf("%v, want too many", err)
	}
}

// A march goes on from the end of another as if it had not ended.
func TestMarchGoesOn(t *testing.T) {
	net, p, body := oven(t, &relay{power: 400, on: 95, off: 105}, 2)
	outs := []network.Output{net.Level(body)}
	whole := marched(t, net, p, outs, network.Run{Until: 3000})
	a := marched(t, net, p, outs, network.Run{Until: 1234})
	b, err := net.March(p, a.End(), outs, network.Run{Until: 3000})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "before the second", b.Left(0, 1234), a.At(0, 1234), 1e-12, 100)
	for _, at := range []float64{1234, 1500, 2345, 3000} {
		near(t, "level", b.At(0, at), whole.At(0, at), 1e-6, 100)
	}
	if n := len(a.Events()) + len(b.Events()); n != len(whole.Events()) {
		t.Errorf("%d events in two, %d in one", n, len(whole.Events()))
	}
}
