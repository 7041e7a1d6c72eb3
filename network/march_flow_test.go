package network_test

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// A network with inertances, joints among them, marches as its closed form says: levels,
// flows, and what must be delivered into held nodes.
func TestMarchOfTubesAgreesWithClosedForm(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyTubes(t)
		m := s.build(t)
		const until = 8
		for i := range m.p.Wave { // continuous, since a source into a joint may not jump
			w, err := laplace.Points([][2]float64{{0, 0}, {1, float64(rapid.IntRange(-8, 8).Draw(t, "u"))}, {3, float64(rapid.IntRange(-8, 8).Draw(t, "v"))}})
			if err != nil {
				t.Fatal(err)
			}
			m.p.Wave[i] = w
		}
		resp := m.respond(t, until)
		outs := m.outputs()
		run := marched(t, m.net, m.p, outs, network.Run{Until: until})
		for o := range outs {
			scale := 1.0
			for p := range outs {
				scale = max(scale, resp.Max(p, 0, until).Y, -resp.Min(p, 0, until).Y)
			}
			for k := range 40 {
				at := until * (float64(k) + 0.5) / 40
				near(t, fmt.Sprintf("%s at %g", outs[o].Name, at), run.At(o, at), resp.At(o, at), 1e-4, scale)
			}
		}
	})
}

// A passive network that is left alone gains nothing: ½ C x² + ½ L q² never rises, with
// losses that are not in proportion to the flow as well.
func TestPassiveNetworkNeverGains(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := network.NewBuilder()
		n := rapid.IntRange(2, 6).Draw(t, "nodes")
		var nodes []network.NodeID
		var outs []func(net *network.Network) network.Output
		for i := range n {
			id := b.Node(fmt.Sprint("n", i), network.NoRef)
			b.Capacity(id, network.NoRef)
			nodes = append(nodes, id)
			outs = append(outs, func(net *network.Network) network.Output { return net.Level(id) })
		}
		for i := 1; i < n; i++ {
			id := b.Inertance("t", nodes[rapid.IntRange(0, i-1).Draw(t, "to")], nodes[i], network.NoRef)
			b.Dropping(id)
			outs = append(outs, func(net *network.Network) network.Output { return net.InertanceFlowOf(id) })
		}
		net, p := finished(t, b)
		size := make([]float64, len(outs))
		for i := range n {
			p.C[i] = float64(rapid.IntRange(1, 32).Draw(t, "C")) / 8
			p.Start[i], p.HasStart[i] = float64(rapid.IntRange(-8, 8).Draw(t, "x")), true
			size[i] = p.C[i]
		}
		for k := range p.L {
			p.L[k] = float64(rapid.IntRange(1, 32).Draw(t, "L")) / 8
			p.Drop[k] = squared{float64(rapid.IntRange(0, 8).Draw(t, "k")) / 8}
			p.HasStartFlow[k] = true
			size[n+k] = p.L[k]
		}
		var list []network.Output
		for _, o := range outs {
			list = append(list, o(net))
		}
		run := marched(t, net, p, list, network.Run{Until: 20})
		energy := func(at float64) float64 {
			e := 0.0
			for o, s := range size {
				y := run.At(o, at)
				e += s * y * y / 2
			}
			return e
		}
		first := energy(0)
		before := first
		for k := 1; k <= 200; k++ {
			now := energy(20 * float64(k) / 200)
			if now > before+2e-6*first {
				t.Fatalf("energy rises from %v to %v of %v", before, now, first)
			}
			before = math.Min(before, now)
		}
	})
}

// A node without store between an inertance and a throttle that bends within a hair of
// zero flow, at levels ten million times that hair: the flow swings through zero, and the
// march goes on.
func TestSwingThroughAThrottle(t *testing.T) {
	b := network.NewBuilder()
	lake, foot, shaft := b.Node("lake", network.NoRef), b.Node("foot", network.NoRef), b.Node("shaft", network.NoRef)
	b.Hold(lake, network.NoRef)
	b.Capacity(shaft, network.NoRef)
	tunnel := b.Inertance("tunnel", lake, foot, network.NoRef)
	throttle := b.Between("throttle", foot, shaft, false, network.NoRef)
	net, p := finished(t, b)
	p.L[tunnel], p.C[0] = 5e5, 0.03
	p.Wave[0] = laplace.Constant(1.2e6)
	p.Start[shaft], p.HasStart[shaft], p.StartFlow[tunnel], p.HasStartFlow[tunnel] = 1.2e6, true, 20, true
	outs := []network.Output{net.Level(shaft), net.InertanceFlowOf(tunnel)}
	for _, core := range []float64{1, 0.1, 0.01} {
		p.Law[throttle] = &network.Through{Flow: outlet(0.2, core)}
		for _, tol := range []float64{1e-4, 1e-5, 1e-6, 1e-7, 1e-8} {
			r := marched(t, net, p, outs, network.Run{Until: 3000, RelTol: tol})
			taken, back := r.Steps()
			t.Logf("core %g, tolerance %g: %d steps, %d back", core, tol, taken, back)
			if r.Until() != 3000 || math.Abs(r.At(0, 3000)-1.2e6) > 6e4 {
				t.Errorf("ends at %v s at %v", r.Until(), r.At(0, 3000))
			}
		}
	}
}
