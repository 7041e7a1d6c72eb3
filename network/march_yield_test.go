package network_test

import (
	"strings"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// behind builds a source that feeds a node without a store, from which a flap leads to a
// vessel that holds 5, and a second to a pit that is held at level.
func behind(tb tester, level float64, flaps ...bool) (*network.Network, *network.Params, []network.NodeID) {
	b := network.NewBuilder()
	in, vessel, pit := b.Node("in", network.NoRef), b.Node("vessel", network.NoRef), b.Node("pit", network.NoRef)
	b.Source("pump", in, 1, network.NoRef)
	b.Hold(pit, network.NoRef)
	b.Capacity(vessel, network.NoRef)
	var ids []network.ElementID
	for k, to := range []network.NodeID{vessel, pit} {
		ends := []network.NodeID{in, to}
		if !flaps[k] {
			ends = []network.NodeID{to, in}
		}
		ids = append(ids, b.Element(network.Shape{Name: "flap to " + []string{"vessel", "pit"}[k], Ports: ends, Joins: true}, network.NoRef))
	}
	net, p := finished(tb, b)
	p.C[0], p.Start[vessel], p.HasStart[vessel] = 2, 5, true
	for _, id := range ids {
		p.Law[id] = &flap{0.5}
	}
	p.Wave[1] = laplace.Constant(level)
	return net, p, []network.NodeID{in, vessel, pit}
}

// What presses into a node behind flaps that are shut opens the one that gives way first:
// to the pit if that stands lower than the vessel, else to the vessel, which then rises
// by the flow over its capacity.
func TestSourceOpensWhatGivesWay(t *testing.T) {
	for _, c := range []struct {
		pit, at2, in float64
		opens        string
	}{{2, 5, 2 + 3/0.5, "flap to pit"}, {50, 5 + 3./2, 6.5 + 3/0.5, "flap to vessel"}} {
		net, p, n := behind(t, c.pit, true, true)
		var err error
		if p.Wave[0], err = laplace.Stairs([][2]float64{{0, 0}, {1, 3}, {2, 0}}); err != nil {
			t.Fatal(err)
		}
		r := marched(t, net, p, []network.Output{net.Level(n[1]), net.Level(n[0])}, network.Run{Until: 4})
		if len(r.Events()) == 0 || net.Elements()[r.Events()[0].Element].Name != c.opens || r.Events()[0].At != 1 {
			t.Fatalf("events %+v, not %q at 1 s first", r.Events(), c.opens)
		}
		if c.opens == "flap to vessel" {
			near(t, "vessel", r.At(0, 2), c.at2, 1e-9, 10)
			near(t, "in", r.At(1, 2-1e-9), c.in, 1e-6, 10)
		}
		if e := r.Balance(); e > 1e-9 {
			t.Errorf("the balance is off by %g", e)
		}
	}
}

// A source that takes from a node from which flaps only lead away finds none that opens.
func TestNothingGivesWay(t *testing.T) {
	net, p, _ := behind(t, 2, true, true)
	var err error
	if p.Wave[0], err = laplace.Stairs([][2]float64{{0, 0}, {1, -3}}); err != nil {
		t.Fatal(err)
	}
	s, err := net.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	_, err = net.March(p, s, nil, network.Run{Until: 2})
	if err == nil || !strings.Contains(err.Error(), `"pump" takes 3`) || !strings.Contains(err.Error(), `"flap to pit"`) {
		t.Fatalf("error %v does not name the source and the flaps", err)
	}
}

// A source that swings about 0 through two flaps, one each way, never stops the march.
func TestSwingingSourceOpensBothWays(t *testing.T) {
	net, p, n := behind(t, 2, true, false)
	var err error
	if p.Wave[0], err = laplace.Points([][2]float64{{0, 0}, {1, 2}, {3, -2}, {5, 2}, {6, 0}}); err != nil {
		t.Fatal(err)
	}
	r := marched(t, net, p, []network.Output{net.Level(n[1])}, network.Run{Until: 6})
	// two triangles of 2 over 2 s, 1 s and 1 s of it before and after: 2 + 2 into the vessel
	near(t, "vessel", r.At(0, 6), 5+4./2, 1e-7, 10)
}

// A column of liquid whose way is shut at once opens the flap beside it.
func TestColumnOpensWhatGivesWay(t *testing.T) {
	b := network.NewBuilder()
	high, meet, low, vessel := b.Node("high", network.NoRef), b.Node("meet", network.NoRef), b.Node("low", network.NoRef), b.Node("vessel", network.NoRef)
	b.Hold(high, network.NoRef)
	b.Hold(low, network.NoRef)
	b.Capacity(vessel, network.NoRef)
	b.Inertance("tube", high, meet, network.NoRef)
	valve := b.Between("valve", meet, low, true, network.NoRef)
	id := b.Element(network.Shape{Name: "flap", Ports: []network.NodeID{meet, vessel}, Joins: true}, network.NoRef)
	net, p := finished(t, b)
	p.L[0], p.LR[0], p.C[0] = 4, 1, 3
	p.Start[vessel], p.HasStart[vessel] = 20, true
	p.Law[valve], p.Law[id] = &network.Through{Flow: proportional(1)}, &flap{0.5}
	p.Wave[0], p.Wave[1] = laplace.Constant(10), laplace.Constant(0)
	var err error
	if p.Drive[valve][0], err = laplace.Stairs([][2]float64{{0, 1}, {1, 0}}); err != nil {
		t.Fatal(err)
	}
	r := marched(t, net, p, []network.Output{net.InertanceFlowOf(0), net.Level(vessel)}, network.Run{Until: 1.5})
	events := r.Events()
	if len(events) == 0 || events[0].At != 1 || events[0].What != "opens" {
		t.Fatalf("events %+v", events)
	}
	// just after, the column still brings its 10/(1 + 1) = 5
	near(t, "flow", r.At(0, 1+1e-9), 5, 1e-6, 5)
}
