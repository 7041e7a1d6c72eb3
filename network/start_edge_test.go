package network_test

import (
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// Without any store a network follows its inputs at once.
func TestNoStores(t *testing.T) {
	b := network.NewBuilder()
	hot, mid, cold := b.Node("hot", 1), b.Node("mid", 2), b.Node("cold", 3)
	up, down := b.Hold(hot, network.NoRef), b.Hold(cold, network.NoRef)
	b.Resistance("r1", hot, mid, network.NoRef)
	b.Resistance("r2", mid, cold, network.NoRef)
	direct := b.Resistance("r3", hot, cold, network.NoRef)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.G, []float64{3, 1, 2})
	p.Wave[up], p.Wave[down] = laplace.Step(10, 50, 5), laplace.Constant(10)
	r, err := net.Reduce(p, []network.Output{net.Level(mid), net.FlowOf(0), net.FlowOf(direct), net.Level(hot)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 10)
	if err != nil {
		t.Fatal(err)
	}
	for o, want := range []float64{40, 30, 80, 50} {
		near(t, "before", resp.At(o, 4), []float64{10, 0, 0, 10}[o], 0, 1)
		near(t, "after", resp.At(o, 5), want, 1e-15, want)
	}
	if n := len(r.System.Poles()); n != 0 {
		t.Errorf("%d poles", n)
	}
}

// Without any input two bodies at different levels share what they have.
func TestNoInputs(t *testing.T) {
	b := network.NewBuilder()
	x, y := b.Node("x", 1), b.Node("y", 2)
	b.Capacity(x, network.NoRef)
	b.Capacity(y, network.NoRef)
	b.Resistance("r", x, y, network.NoRef)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	p.C[0], p.C[1], p.G[0] = 1, 3, 0.75
	p.Start[x], p.HasStart[x] = 80, true
	p.AllStart, p.HasAllStart = 40, true
	r, err := net.Reduce(p, []network.Output{net.Level(x), net.Level(y)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 100)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "x", resp.At(0, 100), 50, 1e-14, 50)
	near(t, "y", resp.At(1, 100), 50, 1e-14, 50)
	if got := poles(r); len(got) != 2 || got[0] != 0 {
		t.Errorf("poles %v", got)
	}
}

// A lone body with a source is an adiabatic body.
func TestLoneBody(t *testing.T) {
	b := network.NewBuilder()
	x := b.Node("x", 1)
	b.Capacity(x, network.NoRef)
	load := b.Source("load", x, 1, 2)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	p.C[0] = 4
	p.Wave[load] = laplace.Constant(2)
	p.AllStart, p.HasAllStart = 20, true
	r, err := net.Reduce(p, []network.Output{net.Level(x)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 60)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "x", resp.At(0, 60), 50, 1e-15, 50)
}
