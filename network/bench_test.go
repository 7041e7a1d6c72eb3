package network_test

import (
	"fmt"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// ladder builds n stores in a row with a massless node in every joint, a film to
// air at each, and a source at the first: 3n resistances.
func ladder(b interface{ Fatal(...any) }, n int) (*network.Network, *network.Params) {
	g := network.NewBuilder()
	air := g.Node("air", network.NoRef)
	g.Hold(air, network.NoRef)
	var G []float64
	join := func(a, b network.NodeID, v float64) {
		g.Resistance("", a, b, network.NoRef)
		G = append(G, v)
	}
	last := air
	for i := range n {
		joint, body := g.Node(fmt.Sprint("joint", i), network.NoRef), g.Node(fmt.Sprint("body", i), network.NoRef)
		g.Capacity(body, network.NoRef)
		join(last, joint, 3+float64(i%7))
		join(joint, body, 20)
		join(body, air, 0.01)
		last = body
	}
	g.Source("load", last, 1, network.NoRef)
	net, err := g.Build()
	if err != nil {
		b.Fatal(err)
	}
	p := net.NewParams()
	for i := range p.C {
		p.C[i] = 1 + float64(i%5)
	}
	copy(p.G, G)
	p.Wave[0], p.Wave[1] = laplace.Constant(20), laplace.Step(0, 5, 0)
	return net, p
}

func BenchmarkReduce(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		b.Run(fmt.Sprintf("stores=%d", n), func(b *testing.B) {
			net, p := ladder(b, n)
			outs := []network.Output{net.Level(1), net.Level(network.NodeID(net.NodeCount() - 1))}
			b.ReportAllocs()
			for b.Loop() {
				if _, err := net.Reduce(p, outs); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// Of a reduction, what this package does itself: numbers into place, massless nodes
// out, steady start.
func BenchmarkStart(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		b.Run(fmt.Sprintf("stores=%d", n), func(b *testing.B) {
			net, p := ladder(b, n)
			b.ReportAllocs()
			for b.Loop() {
				if _, err := net.Start(p); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkBuild(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		b.Run(fmt.Sprintf("stores=%d", n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				ladder(b, n)
			}
		})
	}
}
