package network_test

import (
	"errors"
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// chain builds air — a — b — m — air2: two stores and a massless node between two
// held nodes, with a source into each free node.
type chain struct {
	net               *network.Network
	p                 *network.Params
	air, a, b, m, sun network.NodeID
	hold              [2]network.InputID
	source            [3]network.InputID
}

func newChain(t *testing.T) *chain {
	t.Helper()
	g := network.NewBuilder()
	c := &chain{air: g.Node("air", 1), a: g.Node("a", 2), b: g.Node("b", 3), m: g.Node("m", 4), sun: g.Node("sun", 5)}
	g.Capacity(c.a, network.NoRef)
	g.Capacity(c.b, network.NoRef)
	c.hold = [2]network.InputID{g.Hold(c.air, network.NoRef), g.Hold(c.sun, network.NoRef)}
	at := []network.NodeID{c.air, c.a, c.b, c.m, c.sun}
	for i := range 4 {
		g.Resistance("", at[i], at[i+1], network.NoRef)
	}
	for i := range 3 {
		c.source[i] = g.Source("", at[i+1], 1, network.NoRef)
	}
	var err error
	if c.net, err = g.Build(); err != nil {
		t.Fatal(err)
	}
	c.p = c.net.NewParams()
	copy(c.p.C, []float64{100, 200})
	copy(c.p.G, []float64{1, 1, 1, 1})
	return c
}

// A network at rest at some level starts there exactly, and stays.
func TestRestIsExact(t *testing.T) {
	c := newChain(t)
	c.p.Wave[c.hold[0]], c.p.Wave[c.hold[1]] = laplace.Constant(293.15), laplace.Constant(293.15)
	s, err := c.net.Start(c.p)
	if err != nil {
		t.Fatal(err)
	}
	if s.How != network.SteadyStart || s.How.String() != "steady" {
		t.Errorf("start is %v", s.How)
	}
	for i, x := range s.Levels {
		if x != 293.15 {
			t.Errorf("node %d starts at %v", i, x)
		}
	}
}

// The steady start is that of the values before t = 0: air at 10, sun at 50, 8 into
// m: four equal resistances, so that by hand a = 22, b = 34, m = 46 (m takes in
// 12 from b's side: (34−46) + (50−46) + 8 = 0).
func TestSteadyStart(t *testing.T) {
	c := newChain(t)
	c.p.Wave[c.hold[0]], c.p.Wave[c.hold[1]] = laplace.Constant(10), laplace.Step(50, 90, 0)
	c.p.Wave[c.source[2]] = laplace.Step(8, 0, 0)
	s, err := c.net.Start(c.p)
	if err != nil {
		t.Fatal(err)
	}
	for n, want := range map[network.NodeID]float64{c.air: 10, c.a: 22, c.b: 34, c.m: 46, c.sun: 50} {
		near(t, c.net.Name(n), s.Levels[n], want, 1e-15, 50)
	}
	r, err := c.net.Reduce(c.p, []network.Output{c.net.Level(c.m), c.net.FlowOf(2)})
	if err != nil {
		t.Fatal(err)
	}
	if r.HasImbalance {
		t.Error("a steady start has an imbalance")
	}
	resp, err := r.Respond(c.p, 1e6)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "m after the jump", resp.At(0, 0), (34+90)/2.0, 1e-15, 90) // follows at once
	near(t, "m in the end", resp.At(0, 1e6), 70, 1e-14, 90)
	near(t, "flow b → m in the end", resp.At(1, 1e6), -20, 1e-14, 90)
}

// Given levels: the imbalance is formed from differences, so that at 293.15 K
// everywhere it is exactly zero, and one node 1 mK above shows only that.
func TestGivenStart(t *testing.T) {
	c := newChain(t)
	c.p.Wave[c.hold[0]], c.p.Wave[c.hold[1]] = laplace.Constant(293.15), laplace.Constant(293.15)
	c.p.AllStart, c.p.HasAllStart = 293.15, true
	s, err := c.net.Start(c.p)
	if err != nil {
		t.Fatal(err)
	}
	if s.How != network.GivenStart || s.Imbalance[0] != 0 || s.Imbalance[1] != 0 {
		t.Errorf("start %v, imbalance %v", s.How, s.Imbalance)
	}
	warm := 293.151
	c.p.Start[c.a], c.p.HasStart[c.a] = warm, true
	if s, err = c.net.Start(c.p); err != nil {
		t.Fatal(err)
	}
	d := warm - 293.15
	for i, want := range []float64{-2 * d, d} {
		if k := state(t, c, i); s.Imbalance[k] != want {
			t.Errorf("imbalance of store %d is %v, want %v", i, s.Imbalance[k], want)
		}
	}
}

// state finds the index of store i of a chain among the states.
func state(t *testing.T, c *chain, i int) int {
	t.Helper()
	r, err := c.net.Reduce(c.p, nil)
	if err != nil {
		t.Fatal(err)
	}
	for k, n := range r.States {
		if n == []network.NodeID{c.a, c.b}[i] {
			return k
		}
	}
	t.Fatal("no such state")
	return 0
}

// Some levels given, the rest steady: the given one takes the place of its own
// steady level, the others begin where they were, and all returns to steady.
func TestMixedStart(t *testing.T) {
	c := newChain(t)
	c.p.Wave[c.hold[0]], c.p.Wave[c.hold[1]] = laplace.Constant(10), laplace.Constant(50)
	c.p.Wave[c.source[2]] = laplace.Constant(8)
	c.p.Start[c.a], c.p.HasStart[c.a] = 80, true
	s, err := c.net.Start(c.p)
	if err != nil {
		t.Fatal(err)
	}
	if s.How != network.MixedStart {
		t.Errorf("start is %v", s.How)
	}
	near(t, "a", s.Levels[c.a], 80, 0, 1)
	near(t, "b", s.Levels[c.b], 34, 1e-15, 50)
	r, err := c.net.Reduce(c.p, []network.Output{c.net.Level(c.a), c.net.Level(c.b), c.net.Difference(c.a, c.b)})
	if err != nil {
		t.Fatal(err)
	}
	if !r.HasImbalance {
		t.Fatal("no imbalance")
	}
	resp, err := r.Respond(c.p, 1e5)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "a at 0", resp.At(0, 0), 80, 1e-15, 80)
	near(t, "a − b at 0", resp.At(2, 0), 46, 1e-15, 80)
	near(t, "a at last", resp.At(0, 1e5), 22, 1e-13, 80)
	near(t, "b at last", resp.At(1, 1e5), 34, 1e-13, 80)
}

// A Reduction answers for other waveforms and starts than it was made with.
func TestRespondWithOtherStart(t *testing.T) {
	c := newChain(t)
	outs := []network.Output{c.net.Level(c.a), c.net.Level(c.m)}
	r, err := c.net.Reduce(c.p, outs)
	if err != nil {
		t.Fatal(err)
	}
	for _, start := range []float64{0, 20, -5} {
		c.p.AllStart, c.p.HasAllStart = start, start != 0
		c.p.Wave[c.source[0]] = laplace.Step(1, 2, 0)
		again, err := c.net.Reduce(c.p, outs)
		if err != nil {
			t.Fatal(err)
		}
		x, err := r.Respond(c.p, 300)
		if err != nil {
			t.Fatal(err)
		}
		y, err := again.Respond(c.p, 300)
		if err != nil {
			t.Fatal(err)
		}
		for o := range outs {
			for _, at := range []float64{0, 10, 300} {
				near(t, "level", x.At(o, at), y.At(o, at), 1e-14, 20)
			}
		}
	}
}

// An island without a held node has no steady state of its own: which nodes, and
// whether it takes in heat, is said; given levels are enough.
func TestAdiabaticIsland(t *testing.T) {
	b := network.NewBuilder()
	x, y, m := b.Node("x", 1), b.Node("y", 2), b.Node("m", 3)
	b.Capacity(x, network.NoRef)
	b.Capacity(y, network.NoRef)
	b.Resistance("", x, m, network.NoRef)
	b.Resistance("", m, y, network.NoRef)
	in, out := b.Source("in", x, 1, network.NoRef), b.Source("out", m, -1, network.NoRef)
	body, air := b.Node("body", 4), b.Node("air", 5)
	b.Capacity(body, network.NoRef)
	hold := b.Hold(air, network.NoRef)
	b.Resistance("", body, air, network.NoRef)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.C, []float64{2, 3, 7})
	copy(p.G, []float64{1, 4, 0.5})
	p.Wave[hold] = laplace.Constant(20)
	for i, want := range []network.SteadyReason{network.LevelOpen, network.Integrating} {
		heat := 3 * float64(i)
		p.Wave[in], p.Wave[out] = laplace.Constant(5+heat), laplace.Constant(5)
		_, err := net.Start(p)
		var none *network.NoSteady
		if !errors.As(err, &none) || len(none.List) != 1 {
			t.Fatalf("error %v", err)
		}
		f := none.List[0]
		if f.Reason != want || len(f.Nodes) != 3 || f.Nodes[0] != x || f.Refs[2] != 3 {
			t.Errorf("heat %v: fault %+v", heat, f)
		}
		near(t, "net", f.Net, heat, 1e-14, 5)
		r, err := net.Reduce(p, []network.Output{net.Level(x), net.Level(body)})
		if err != nil {
			t.Fatalf("poles need no start: %v", err)
		}
		if got := poles(r); len(got) != 3 || got[0] != 0 {
			t.Errorf("poles %v", got)
		}
		if _, err = r.Respond(p, 1); !errors.As(err, &none) {
			t.Errorf("Respond: error %v", err)
		}
	}
	p.Start[x], p.HasStart[x] = 30, true
	p.Start[y], p.HasStart[y] = 40, true
	s, err := net.Start(p)
	if err != nil {
		t.Fatal(err)
	}
	if s.How != network.MixedStart || s.Levels[body] != 20 {
		t.Errorf("start %v, body at %v", s.How, s.Levels[body])
	}
	r, err := net.Reduce(p, []network.Output{net.Level(x), net.Level(y), net.Level(body)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 1000)
	if err != nil {
		t.Fatal(err)
	}
	// The island gains 3 for ever: the mean of both grows by 3/5 a second.
	near(t, "mean", (2*resp.At(0, 1000)+3*resp.At(1, 1000))/5, 36+0.6*1000, 1e-14, 600)
	near(t, "body", resp.At(2, 1000), 20, 0, 20)
}

// Feedback beyond the losses: the steady point is found and said not to be reached;
// feedback equal to them: no steady point.
func TestFeedbackAndSteadyState(t *testing.T) {
	r := newRod(t, 0.6)
	r.p.Wave[r.air], r.p.Wave[r.heater], r.p.About[0] = laplace.Constant(20), laplace.Constant(1), 20
	s, err := r.net.Start(r.p)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "steady point", s.Levels[r.body], 10, 1e-14, 20) // 0.5(20−x) + 0.6(x−20) + 1 = 0
	if len(s.Unattained) != 1 || s.Unattained[0] != r.body {
		t.Errorf("unattained %v", s.Unattained)
	}
	r.p.K[0] = 0.4
	if s, err = r.net.Start(r.p); err != nil || len(s.Unattained) != 0 {
		t.Errorf("below the losses: unattained %v, error %v", s.Unattained, err)
	}
	r.p.K[0] = 0.5
	_, err = r.net.Start(r.p)
	var none *network.NoSteady
	if !errors.As(err, &none) || none.List[0].Reason != network.FeedbackExact || none.List[0].Nodes[0] != r.body {
		t.Errorf("at the losses: error %v", err)
	}
	if _, err = r.net.SteadyState(r.p, []float64{0, 0}); !errors.As(err, &none) {
		t.Errorf("SteadyState: error %v", err)
	}
}

// Feedbacks of either sign between several nodes: the dense route agrees with a
// solution by hand, and stability is taken from the poles.
func TestCrossFeedback(t *testing.T) {
	b := network.NewBuilder()
	x, y, air := b.Node("x", 1), b.Node("y", 2), b.Node("air", 3)
	b.Capacity(x, network.NoRef)
	b.Capacity(y, network.NoRef)
	b.Hold(air, network.NoRef)
	b.Resistance("", x, air, network.NoRef)
	b.Resistance("", y, air, network.NoRef)
	b.Feedback("", x, y, network.NoRef)
	b.Feedback("", y, x, network.NoRef)
	heater := b.Source("", x, 1, network.NoRef)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.C, []float64{1, 1})
	copy(p.G, []float64{1, 1})
	p.Wave[heater] = laplace.Constant(10)
	for _, c := range []struct {
		k1, k2   float64
		attained bool
	}{
		{-2, 2, true},   // poles −1 ± 2i
		{3, 3, false},   // poles −1 ± 3
		{-3, -3, false}, // the same
		{0.5, 0.5, true},
		{-0.5, -0.5, true},
	} {
		p.K[0], p.K[1] = c.k1, c.k2
		s, err := net.Start(p)
		if err != nil {
			t.Fatal(err)
		}
		// x = k1 y + 10, y = k2 x
		want := 10 / (1 - c.k1*c.k2)
		near(t, "x", s.Levels[x], want, 1e-14, math.Abs(want))
		near(t, "y", s.Levels[y], c.k2*want, 1e-14, math.Abs(c.k2*want))
		if (len(s.Unattained) == 0) != c.attained {
			t.Errorf("%+v: unattained %v", c, s.Unattained)
		}
	}
}
