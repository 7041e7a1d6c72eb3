package network_test

import (
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// crest spills what stands above a height.
type crest struct{ height float64 }

func (c *crest) Eval(s *network.Stamp) {
	if over := s.X[0] - c.height; over > 0 {
		s.F[0], s.DF[0] = -over, -1
	}
}

// A vessel that nothing acts on but flaps that are shut and an overflow far above stays
// where it is: that is steady.
func TestVesselBehindFlapsKeepsItsLevel(t *testing.T) {
	b := network.NewBuilder()
	low, vessel, high := b.Node("low", network.NoRef), b.Node("vessel", network.NoRef), b.Node("high", network.NoRef)
	b.Hold(low, network.NoRef)
	b.Hold(high, network.NoRef)
	b.Capacity(vessel, network.NoRef)
	in := b.Element(network.Shape{Name: "in", Ports: []network.NodeID{low, vessel}, Joins: true}, network.NoRef)
	out := b.Element(network.Shape{Name: "out", Ports: []network.NodeID{vessel, high}, Joins: true}, network.NoRef)
	over := b.Element(network.Shape{Name: "overflow", Ports: []network.NodeID{vessel}, Joins: true}, network.NoRef)
	net, p := finished(t, b)
	p.C[0], p.Law[in], p.Law[out], p.Law[over] = 1, &flap{2}, &flap{3}, &crest{10}
	p.Wave[0], p.Wave[1] = laplace.Constant(0), laplace.Constant(5)
	s, err := net.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	if x := s.Levels[vessel]; x < 0 || x > 5 {
		t.Errorf("the vessel stands at %g, which opens a flap", x)
	}
	p.Wave[0] = laplace.Constant(20) // through both flaps and over the crest
	if s, err = net.Begin(p); err != nil {
		t.Fatal(err)
	}
	near(t, "vessel", s.Levels[vessel], (2*20+3*5+10)/6., 1e-9, 20)
}
