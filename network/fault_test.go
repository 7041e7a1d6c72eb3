package network_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// Every structural fault of a graph comes back at once, with nodes and references.
func TestFaultsAllAtOnce(t *testing.T) {
	b := network.NewBuilder()
	lone := b.Node("lone", 1)
	air := b.Node("air", 2)
	b.Hold(air, 3)
	b.Hold(air, 4)
	a, c := b.Node("a", 5), b.Node("c", 6)
	b.Resistance("ac", a, c, 7)
	body := b.Node("body", 8)
	b.Capacity(body, 9)
	b.Resistance("loop", body, body, 10)
	b.Resistance("film", body, air, 11)
	idle := b.Node("idle", 12)
	b.Hold(idle, 13)
	_, err := b.Build()
	var faults *network.Faults
	if !errors.As(err, &faults) {
		t.Fatalf("error %v", err)
	}
	want := []struct {
		code  network.FaultCode
		nodes []network.NodeID
		ref   network.Ref
	}{
		{network.HeldTwice, []network.NodeID{air}, 4},
		{network.SelfLoop, []network.NodeID{body}, 10},
		{network.Unconnected, []network.NodeID{lone}, 1},
		{network.Unconnected, []network.NodeID{idle}, 12},
		{network.Undetermined, []network.NodeID{a, c}, 5},
	}
	if len(faults.List) != len(want) {
		t.Fatalf("%d faults: %v", len(faults.List), err)
	}
	for i, w := range want {
		f := faults.List[i]
		if f.Code != w.code || f.Refs[0] != w.ref || len(f.Nodes) != len(w.nodes) || f.Nodes[0] != w.nodes[0] {
			t.Errorf("fault %d is %v %v %v, want %+v", i, f.Code, f.Nodes, f.Refs, w)
		}
	}
}

func TestEmptyNetwork(t *testing.T) {
	_, err := network.NewBuilder().Build()
	if list := faultsOf(err); len(list) != 1 || list[0].Code != network.Empty {
		t.Errorf("error %v", err)
	}
}

// A massless node that only a stream leaves, or that only feeds others, has no level;
// one that a stream reaches has.
func TestStreamDeterminesDownstreamOnly(t *testing.T) {
	for _, reversed := range []bool{false, true} {
		b := network.NewBuilder()
		inlet, mix := b.Node("inlet", network.NoRef), b.Node("mix", network.NoRef)
		b.Hold(inlet, network.NoRef)
		if reversed {
			b.OneWay("pipe", mix, inlet, network.NoRef)
		} else {
			b.OneWay("pipe", inlet, mix, network.NoRef)
		}
		_, err := b.Build()
		if (err != nil) != reversed {
			t.Errorf("reversed %v: error %v", reversed, err)
		}
	}
}

// rod is a body held to air by one resistance, with a source.
type rod struct {
	net    *network.Network
	p      *network.Params
	body   network.NodeID
	air    network.InputID
	heater network.InputID
}

func newRod(t *testing.T, gain ...float64) *rod {
	t.Helper()
	b := network.NewBuilder()
	body, air := b.Node("body", 1), b.Node("air", 2)
	b.Capacity(body, 3)
	hold := b.Hold(air, 4)
	b.Resistance("film", body, air, 5)
	heater := b.Source("heater", body, 1, 6)
	for range gain {
		b.Feedback("loss", body, body, 7)
	}
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	p.C[0], p.G[0] = 20, 0.5
	copy(p.K, gain)
	return &rod{net, p, body, hold, heater}
}

// Numbers that physics forbids come back by part; nothing later sees them.
func TestBadNumbers(t *testing.T) {
	for name, spoil := range map[string]func(p *network.Params){
		"capacity of zero":           func(p *network.Params) { p.C[0] = 0 },
		"negative capacity":          func(p *network.Params) { p.C[0] = -3 },
		"capacity that is no number": func(p *network.Params) { p.C[0] = math.NaN() },
		"infinite conductance":       func(p *network.Params) { p.G[0] = math.Inf(1) },
		"negative conductance":       func(p *network.Params) { p.G[0] = -1 },
		"no conductance":             func(p *network.Params) { p.G[0] = 0 },
		"huge conductance":           func(p *network.Params) { p.G[0] = 1e200 },
		"tiny capacity":              func(p *network.Params) { p.C[0] = 1e-200 },
		"infinite gain":              func(p *network.Params) { p.K[0] = math.Inf(-1) },
		"about no number":            func(p *network.Params) { p.About[0] = math.NaN() },
		"start no number":            func(p *network.Params) { p.Start[0], p.HasStart[0] = math.NaN(), true },
		"all start infinite":         func(p *network.Params) { p.AllStart, p.HasAllStart = math.Inf(1), true },
		"wave no number":             func(p *network.Params) { p.Wave[0].Before = math.NaN() },
		"start of a held node":       func(p *network.Params) { p.Start[1], p.HasStart[1] = 20, true },
	} {
		t.Run(name, func(t *testing.T) {
			r := newRod(t, 0.1)
			good, err := r.net.Reduce(r.p, nil)
			if err != nil {
				t.Fatal(err)
			}
			spoil(r.p)
			_, err = r.net.Reduce(r.p, nil)
			if len(faultsOf(err)) != 1 {
				t.Errorf("Reduce: error %v", err)
			}
			if _, err = good.Respond(r.p, 1); len(faultsOf(err)) != 1 {
				t.Errorf("Respond: error %v", err)
			}
			if _, err = r.net.Start(r.p); len(faultsOf(err)) != 1 {
				t.Errorf("Start: error %v", err)
			}
			if _, err = r.net.SteadyState(r.p, make([]float64, 2)); len(faultsOf(err)) != 1 {
				t.Errorf("SteadyState: error %v", err)
			}
		})
	}
}

// A waveform with a value that is none is named before it is used.
func TestBadWaveform(t *testing.T) {
	for _, bad := range []laplace.Segment{{A: math.Inf(1)}, {B: math.NaN()}, {Exp: []laplace.Exponential{{Amplitude: complex(0, math.NaN())}}}} {
		r := newRod(t)
		red, err := r.net.Reduce(r.p, nil)
		if err != nil {
			t.Fatal(err)
		}
		r.p.Wave[r.heater] = laplace.Waveform{Segments: []laplace.Segment{bad}}
		_, err = red.Respond(r.p, 1)
		if list := faultsOf(err); len(list) != 1 || list[0].Refs[0] != 6 {
			t.Errorf("error %v", err)
		}
	}
}

// Numbers so far apart that their products leave double precision are a fault.
func TestTooFarApart(t *testing.T) {
	b := network.NewBuilder()
	a, m, c, air := b.Node("a", 1), b.Node("m", 2), b.Node("c", 3), b.Node("air", 4)
	b.Capacity(a, 5)
	b.Capacity(c, 6)
	b.Hold(air, 7)
	for _, end := range []network.NodeID{a, c, air} {
		b.Resistance("r", m, end, 8)
	}
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.C, []float64{1e-100, 1e100})
	copy(p.G, []float64{1e-100, 1e-100, 1e100})
	if _, err = net.Reduce(p, nil); err != nil && len(faultsOf(err)) == 0 {
		t.Errorf("error %v", err)
	}
}

// A feedback that cancels, or outweighs, through a second massless node is found
// too, and names the node it leads into.
func TestMasslessFeedbackThroughNeighbour(t *testing.T) {
	b := network.NewBuilder()
	a, m, air := b.Node("a", 1), b.Node("m", 2), b.Node("air", 3)
	b.Hold(air, network.NoRef)
	b.Resistance("am", a, m, network.NoRef)
	b.Resistance("mair", m, air, network.NoRef)
	b.Feedback("gain", a, m, 9)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.G, []float64{2, 3})
	// a: 2(m−a) + K m = 0, m: 2(a−m) + 3(air−m) = 0, so that 3·m = K·m + 3·air.
	for gain, want := range map[float64]network.FaultCode{3: network.SingularMassless, 5: network.FlippedMassless} {
		p.K[0] = gain
		_, err := net.Reduce(p, nil)
		list := faultsOf(err)
		if len(list) != 1 || list[0].Code != want || list[0].Nodes[0] != a || list[0].Refs[0] != 9 {
			t.Errorf("gain %v: error %v", gain, err)
		}
	}
	p.K[0] = 1
	x, err := net.SteadyState(p, []float64{10})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "m", x[m], 15, 1e-15, 15)
	near(t, "a", x[a], 22.5, 1e-15, 22.5)
}

// A stream at rest determines nothing.
func TestStreamAtRest(t *testing.T) {
	b := network.NewBuilder()
	inlet, mix := b.Node("inlet", 1), b.Node("mix", 2)
	b.Hold(inlet, network.NoRef)
	b.OneWay("pipe", inlet, mix, network.NoRef)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	_, err = net.Reduce(net.NewParams(), nil)
	if list := faultsOf(err); len(list) != 1 || list[0].Code != network.Undetermined || list[0].Nodes[0] != mix {
		t.Errorf("error %v", err)
	}
}

func TestMessagesNameManyNodes(t *testing.T) {
	b := network.NewBuilder()
	first := b.Node("m0", network.NoRef)
	for _, name := range []string{"m1", "m2", "m3", "m4", "m5", "m6", "m7", "m8"} {
		b.Resistance("", first, b.Node(name, network.NoRef), network.NoRef)
	}
	_, err := b.Build()
	if err == nil || !strings.Contains(err.Error(), `nodes "m0", "m1", "m2", "m3", "m4", "m5" and 3 more: have`) {
		t.Errorf("message %v", err)
	}
}

func TestForeignPartsPanic(t *testing.T) {
	for name, misuse := range map[string]func(){
		"node":   func() { network.NewBuilder().Capacity(0, network.NoRef) },
		"params": func() { newRod(t).net.Check(new(network.Params)) },
		"output": func() {
			r := newRod(t)
			r.net.Reduce(r.p, []network.Output{r.net.FlowOf(0), {Terms: []network.Term{{Node: 2}}}})
		},
		"flow": func() {
			r := newRod(t)
			r.net.Reduce(r.p, []network.Output{{Flow: &network.FlowTerm{Resistance: 1}}})
		},
		"inputs": func() { r := newRod(t); r.net.SteadyState(r.p, nil) },
	} {
		t.Run(name, func(t *testing.T) {
			defer func() {
				if text, ok := recover().(string); !ok || !strings.HasPrefix(text, "network: ") {
					t.Errorf("panic %q", text)
				}
			}()
			misuse()
		})
	}
}

// Held nodes may store, and sources, streams and feedbacks may lead into them:
// nothing changes, and a remark says so.
func TestHeldNodesAreUnmoved(t *testing.T) {
	b := network.NewBuilder()
	body, air := b.Node("body", 1), b.Node("air", 2)
	b.Capacity(body, 3)
	b.Capacity(air, 4)
	b.Hold(air, 5)
	b.Resistance("film", body, air, 6)
	heater := b.Source("heater", air, 1, 7)
	b.Feedback("loss", air, body, 8)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	var codes []network.FaultCode
	for _, r := range net.Remarks() {
		codes = append(codes, r.Code)
	}
	if len(codes) != 3 || codes[0] != network.HeldCapacity || codes[1] != network.NoEffect || codes[2] != network.NoEffect {
		t.Errorf("remarks %v", net.Remarks())
	}
	p := net.NewParams()
	copy(p.C, []float64{20, 5})
	p.G[0], p.K[0] = 0.5, 3
	p.Wave[heater] = laplace.Step(0, 100, 0)
	r, err := net.Reduce(p, []network.Output{net.Level(body), net.Level(air)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 1000)
	if err != nil {
		t.Fatal(err)
	}
	if resp.At(0, 1000) != 0 || resp.At(1, 1000) != 0 {
		t.Errorf("levels %v and %v, want 0", resp.At(0, 1000), resp.At(1, 1000))
	}
	got := poles(r)
	if len(got) != 1 {
		t.Fatalf("poles %v", got)
	}
	near(t, "pole", real(got[0]), -0.025, 1e-15, 0.025)
}
