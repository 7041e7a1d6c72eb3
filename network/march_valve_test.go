package network_test

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// flap lets through one way only: mode 0 open, q = g·(a − b), mode 1 shut.
type flap struct{ g float64 }

func (f *flap) Eval(s *network.Stamp) {
	if s.Mode == 1 {
		return
	}
	n := len(s.X)
	s.F[0], s.F[1] = -f.g*(s.X[0]-s.X[1]), f.g*(s.X[0]-s.X[1])
	s.DF[0], s.DF[1], s.DF[n], s.DF[n+1] = -f.g, f.g, f.g, -f.g
}

func (f *flap) Guards(s *network.Stamp, g []float64) int {
	if g[0] = s.X[0] - s.X[1]; s.Mode == 1 {
		g[0] = -g[0]
	} else {
		g[0] += 1e-9 // a hair, so that it does not shut again at the instant it opens
	}
	return 1
}

func (f *flap) Next(s *network.Stamp, _ int) (int, string, bool) {
	return 1 - s.Mode, [2]string{"shuts", "opens"}[s.Mode], false
}
func (f *flap) Shut(mode int) bool { return mode == 1 }

func (f *flap) Begin(s *network.Stamp, steady bool) {
	if s.Mode = 0; s.X[0] <= s.X[1] {
		s.Mode = 1
	}
}

// A vessel behind a flap keeps the highest level that its supply has reached, less what
// the flap's resistance holds back: in closed form for a ramp up and down.
func TestFlapHoldsThePeak(t *testing.T) {
	b := network.NewBuilder()
	supply, vessel := b.Node("supply", network.NoRef), b.Node("vessel", network.NoRef)
	b.Hold(supply, network.NoRef)
	b.Capacity(vessel, network.NoRef)
	id := b.Element(network.Shape{Name: "flap", Ports: []network.NodeID{supply, vessel}, Joins: true}, network.NoRef)
	net, p := finished(t, b)
	const c, g = 2.0, 0.5
	p.C[0], p.Law[id] = c, &flap{g}
	var err error
	if p.Wave[0], err = laplace.Points([][2]float64{{0, 0}, {20, 40}, {40, 0}, {60, 40}}); err != nil {
		t.Fatal(err)
	}
	p.HasAllStart = true
	r := marched(t, net, p, []network.Output{net.Level(vessel)}, network.Run{Until: 60})
	// up: x = 2(t − τ(1 − e^(−t/τ))), τ = c/g; down from 20 s: x = 40 − 2s + 2τ − B e^(−s/τ) meets 40 − 2s
	tau := c / g
	at20 := 2 * (20 - tau*(1-math.Exp(-20/tau)))
	B := 40 + 2*tau - at20
	shuts := tau * math.Log(B/(2*tau))
	peak := 40 - 2*shuts
	events := r.Events()
	if len(events) < 2 {
		t.Fatalf("events %+v", events)
	}
	var last, before network.Event = events[len(events)-1], events[len(events)-2]
	near(t, "shuts at", before.At, 20+shuts, 1e-7, 20)
	near(t, "opens at", last.At, 40+peak/2, 1e-7, 60)
	near(t, "held", r.At(0, 45), peak, 1e-7, 40)
	if before.What != "shuts" || last.What != "opens" {
		t.Errorf("events %+v", events)
	}
}

// Vessels joined by flaps and swinging supplies: nothing runs back, the march ends, and a
// tighter tolerance says the same.
func TestFlapsEverywhere(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := network.NewBuilder()
		n := rapid.IntRange(2, 6).Draw(t, "nodes")
		var nodes []network.NodeID
		var holds int
		for i := range n {
			id := b.Node(fmt.Sprint("n", i), network.NoRef)
			if i == 0 || i == 3 {
				b.Hold(id, network.NoRef)
				holds++
			} else {
				b.Capacity(id, network.NoRef)
			}
			nodes = append(nodes, id)
		}
		var ends [][2]int
		for i := 1; i < n; i++ {
			j := rapid.IntRange(0, i-1).Draw(t, "to")
			b.Resistance("leak", nodes[i], nodes[j], network.NoRef)
			for range 2 {
				a, c := rapid.IntRange(0, n-1).Draw(t, "a"), i
				if a == c {
					continue
				}
				ends = append(ends, [2]int{a, c})
				b.Element(network.Shape{Name: fmt.Sprint("flap", len(ends)), Ports: []network.NodeID{nodes[a], nodes[c]}, Joins: true}, network.NoRef)
			}
		}
		net, p := finished(t, b)
		for k := range p.C {
			p.C[k] = float64(rapid.IntRange(1, 32).Draw(t, "C")) / 8
		}
		for k := range p.G {
			p.G[k] = float64(rapid.IntRange(1, 32).Draw(t, "G")) / 64
		}
		for k := range ends {
			p.Law[k] = &flap{float64(rapid.IntRange(1, 64).Draw(t, "g")) / 8}
		}
		for k := range holds {
			p.Wave[k] = laplace.Sine(0, float64(rapid.IntRange(1, 8).Draw(t, "size")), float64(rapid.IntRange(1, 12).Draw(t, "omega"))/4, 0)
		}
		p.HasAllStart = true
		var outs []network.Output
		for _, id := range nodes {
			outs = append(outs, net.Level(id))
		}
		for k := range ends {
			outs = append(outs, network.Output{Name: "q", Flow: &network.FlowTerm{Kind: network.PortFlow, Element: network.ElementID(k), Port: 1, Sign: 1}})
		}
		a := marched(t, net, p, outs, network.Run{Until: 12})
		if e := a.Balance(); e > 1e-9 {
			t.Fatalf("the balance is off by %g", e)
		}
		c := marched(t, net, p, outs, network.Run{Until: 12, RelTol: 1e-9})
		for o := range outs {
			if o >= n {
				if low := a.Min(o, 0, 12); low.Y < -1e-4 {
					t.Fatalf("%v runs back through a flap at %v", low.Y, low.T)
				}
				continue
			}
			for k := range 60 {
				at := 12 * (float64(k) + 0.5) / 60
				near(t, "level", a.At(o, at), c.At(o, at), 1e-4, 10)
			}
		}
	})
}
