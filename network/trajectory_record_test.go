package network_test

import (
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// An output that bends within a step, as a flow that one way only lets through, is as
// right between the ends of the step as there.
func TestBentOutput(t *testing.T) {
	b := network.NewBuilder()
	swing, still := b.Node("swing", network.NoRef), b.Node("still", network.NoRef)
	b.Hold(swing, network.NoRef)
	b.Capacity(still, network.NoRef)
	id := b.Between("way", swing, still, false, network.NoRef)
	net, p := finished(t, b)
	p.C[0] = 1e12
	p.Law[id] = &network.Through{Flow: flowOf(func(a, b float64) (q, da, db float64) {
		if a < b {
			return 0, 0, 0
		}
		return 3 * (a - b), 3, -3
	})}
	p.Wave[0] = laplace.Sine(0, 2, 1.5, 0)
	p.HasAllStart = true
	out := network.Output{Name: "flow", Flow: &network.FlowTerm{Kind: network.PortFlow, Element: id, Port: 1, Sign: 1}}
	r := marched(t, net, p, []network.Output{out, net.Level(swing)}, network.Run{Until: 20})
	flow := func(t float64) float64 { return max(0, 6*math.Sin(1.5*t)) }
	if e := worst(r, 0, 20, 6, flow); e > 0.003 { // within a sixty-fourth of the step around the bend
		t.Errorf("flow wrong by %.2e of its largest value", e)
	}
	if e := worst(r, 1, 20, 2, func(t float64) float64 { return 2 * math.Sin(1.5*t) }); e > 1e-6 {
		t.Errorf("level wrong by %.2e of its largest value", e)
	}
	near(t, "what came over", r.Integral(0, 0, 20), 5*6*2/1.5, 1e-6, 40) // five whole swings
	taken, _ := r.Steps()
	t.Logf("%d steps", taken)
}
