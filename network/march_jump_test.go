package network_test

import (
	"math"
	"slices"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// Both sides of a jump are kept: at the start, within the run, and at its end.
func TestJumps(t *testing.T) {
	b := network.NewBuilder()
	supply, mid, store := b.Node("supply", network.NoRef), b.Node("mid", network.NoRef), b.Node("store", network.NoRef)
	b.Hold(supply, network.NoRef)
	b.Capacity(store, network.NoRef)
	b.Resistance("a", supply, mid, network.NoRef)
	id := b.Between("b", mid, store, false, network.NoRef)
	net, p := finished(t, b)
	p.C[0], p.G[0], p.Law[id] = 100, 1, &network.Through{Flow: proportional(1)}
	var err error
	if p.Wave[0], err = laplace.Stairs([][2]float64{{0, 8}, {3, 2}, {10, 6}}); err != nil {
		t.Fatal(err)
	}
	p.Wave[0] = p.Wave[0].WithBefore(4)
	outs := []network.Output{net.Level(supply), net.Level(mid), net.Level(store), net.SupplyOf(supply)}
	r := marched(t, net, p, outs, network.Run{Until: 10})
	for _, c := range []struct{ at, left, right float64 }{{0, 4, 8}, {3, 8, 2}, {10, 2, 6}} {
		near(t, "supply before", r.Left(0, c.at), c.left, 1e-15, 1)
		near(t, "supply after", r.At(0, c.at), c.right, 1e-15, 1)
		s := r.At(2, c.at)
		near(t, "store goes on", r.Left(2, c.at), s, 1e-12, 1)
		near(t, "mid before", r.Left(1, c.at), (c.left+s)/2, 1e-12, 1)
		near(t, "mid after", r.At(1, c.at), (c.right+s)/2, 1e-12, 1)
		near(t, "delivered after", r.At(3, c.at), (c.right-s)/2, 1e-12, 1)
	}
	near(t, "before the start", r.At(1, -1), 4, 1e-12, 1)
	if got := r.Breaks(); !slices.Equal(got, []float64{0, 3, 10}) {
		t.Errorf("breaks %v", got)
	}
	top := r.Max(1, 0, 10)
	want := r.Left(1, 3)
	if !top.AtLeft || top.T != 3 || math.Abs(top.Y-want) > 1e-12 {
		t.Errorf("highest %+v, want %v just before 3 s", top, want)
	}
	if x, ok := r.First(0, 5, 0, 10); !ok || x.T != 3 {
		t.Errorf("the jump over 5 is at %+v %v, want 3 s", x, ok)
	}
	if x, ok := r.FirstOutside(1, 0, 7, 0, 10); ok {
		t.Errorf("outside at %+v", x)
	}
}

// A run of no length, and one that asks for nothing, are runs too.
func TestEmptyRuns(t *testing.T) {
	w := newOne(t, 2, 900, 300, proportional(0.1))
	r := marched(t, w.net, w.p, []network.Output{w.net.Level(w.node)}, network.Run{})
	if r.Until() != 0 || r.At(0, 0) != 900 || r.At(0, 5) != 900 || r.Integral(0, 0, 0) != 0 {
		t.Errorf("until %v: %v", r.Until(), r.At(0, 0))
	}
	if m := r.Max(0, 0, 1); m.Y != 900 || m.T != 0 {
		t.Errorf("highest %+v", m)
	}
	r = marched(t, w.net, w.p, nil, network.Run{Until: 10})
	near(t, "end", r.End().Levels[w.node], 300+600*math.Exp(-0.5), 1e-6, 900)
	if r.End().T != 10 || r.End().Beginning {
		t.Errorf("ends at %v", r.End().T)
	}
}
