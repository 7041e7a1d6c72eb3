package network_test

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/network"
)

// A chip on a heat sink in air: two stores, three resistances of which two meet at
// a massless node, and a load that comes on at t = 0.
func Example() {
	b := network.NewBuilder()
	chip := b.Node("chip", network.NoRef)
	joint := b.Node("joint", network.NoRef)
	sink := b.Node("sink", network.NoRef)
	air := b.Node("air", network.NoRef)
	b.Capacity(chip, network.NoRef)
	b.Capacity(sink, network.NoRef)
	hold := b.Hold(air, network.NoRef)
	b.Resistance("solder", chip, joint, network.NoRef)
	b.Resistance("grease", joint, sink, network.NoRef)
	b.Resistance("fins", sink, air, network.NoRef)
	load := b.Source("load", chip, 1, network.NoRef)
	net, err := b.Build()
	if err != nil {
		fmt.Println(err)
		return
	}

	p := net.NewParams()
	copy(p.C, []float64{2, 150})              // J/K
	copy(p.G, []float64{1 / 0.1, 1 / 0.3, 2}) // W/K
	p.Wave[hold] = laplace.Constant(298.15)   // K
	p.Wave[load] = laplace.Step(0, 20, 0)     // W

	r, err := net.Reduce(p, []network.Output{net.Level(chip), net.Level(joint), net.Difference(chip, sink)})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, pole := range r.System.Poles() {
		fmt.Printf("time constant %.4g s\n", -1/real(pole.P))
	}
	y, err := r.Respond(p, 600)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, t := range []float64{0, 10, 600} {
		fmt.Printf("%3.0f s: chip %.2f K, joint %.2f K, chip - sink %.2f K\n", t, y.At(0, t), y.At(1, t), y.At(2, t))
	}
	// Output:
	// time constant 76.01 s
	// time constant 0.7894 s
	//   0 s: chip 298.15 K, joint 298.15 K, chip - sink 0.00 K
	//  10 s: chip 307.20 K, joint 305.22 K, chip - sink 7.91 K
	// 600 s: chip 316.15 K, joint 314.15 K, chip - sink 8.00 K
}

// Every fault of a graph comes at once, with the nodes it is about.
func ExampleBuilder_Build() {
	b := network.NewBuilder()
	plate, air := b.Node("plate", 1), b.Node("air", 2)
	b.Capacity(plate, network.NoRef)
	b.Hold(air, network.NoRef)
	b.Resistance("film", plate, air, network.NoRef)
	left, right := b.Node("left", 3), b.Node("right", 4)
	b.Resistance("wire", left, right, network.NoRef)
	b.Node("spare", 5)
	_, err := b.Build()
	faults := err.(*network.Faults)
	for _, f := range faults.List {
		fmt.Println(f.Refs, f.Text)
	}
	// Output:
	// [5] node "spare": nothing connects to it
	// [3 4] nodes "left" and "right": have no capacity and no path from a held node or a store, so that nothing determines the level
}

// The steady state of a network with constant inputs, and where there is none.
func ExampleNetwork_SteadyState() {
	b := network.NewBuilder()
	body, air := b.Node("body", network.NoRef), b.Node("air", network.NoRef)
	b.Capacity(body, network.NoRef)
	b.Hold(air, network.NoRef)
	b.Resistance("film", body, air, network.NoRef)
	b.Feedback("self-heating", body, body, network.NoRef)
	b.Source("load", body, 1, network.NoRef)
	net, err := b.Build()
	if err != nil {
		fmt.Println(err)
		return
	}
	p := net.NewParams()
	p.C[0], p.G[0], p.About[0] = 50, 0.5, 20
	for _, gain := range []float64{0, 0.25, 0.5} {
		p.K[0] = gain
		x, err := net.SteadyState(p, []float64{20, 3})
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Printf("gain %.2f: %.1f\n", gain, x[body])
	}
	// Output:
	// gain 0.00: 26.0
	// gain 0.25: 32.0
	// network: no steady state: node "body": feedback balances the losses exactly, so that no level is steady or every one is
}
