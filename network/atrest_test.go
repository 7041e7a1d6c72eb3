package network_test

import (
	"testing"

	"lagbook/network"
)

// TestFlowIntoDeadEndIsZeroAtRest: a capacity that hangs on a massless junction takes no
// heat at rest, and no rounding of the junction's elimination may say otherwise: the gain
// read −1.1e-16 W/K with an undershoot of 1e17 %.
func TestFlowIntoDeadEndIsZeroAtRest(t *testing.T) {
	b := network.NewBuilder()
	warm, hall := b.Node("warm", 0), b.Node("hall", 1)
	a, junction, end := b.Node("a", 2), b.Node("junction", 3), b.Node("end", 4)
	inputs := []network.InputID{b.Hold(warm, 5), b.Hold(hall, 6)}
	b.Capacity(a, 7)
	b.Capacity(end, 8)
	b.Resistance("r1", a, warm, 9)
	b.Resistance("r2", a, junction, 10)
	into := b.Resistance("r3", junction, end, 11)
	b.Resistance("r4", hall, junction, 12)
	inputs = append(inputs, b.Source("q", a, 1, 13))
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.C, []float64{100, 30})
	copy(p.G, []float64{1 / 0.7, 1 / 0.3, 1 / 0.13, 1 / 0.37})
	red, err := net.Reduce(p, []network.Output{
		{Name: "flow", Flow: &network.FlowTerm{Resistance: into, Sign: 1}},
		{Name: "difference", Terms: []network.Term{{Node: junction, Coef: 1}, {Node: end, Coef: -1}}},
	})
	if err != nil {
		t.Fatal(err)
	}
	for in := range inputs {
		for out := range 2 {
			h, err := red.System.Transfer(in, out)
			if err != nil {
				t.Fatal(err)
			}
			if !h.HasGain || h.Gain != 0 {
				t.Errorf("input %d, output %d: gain %g, want exactly 0", in, out, h.Gain)
			}
			if len(h.Zeros) == 0 || h.Zeros[0].P != 0 || h.Numerator[0] != 0 {
				t.Errorf("input %d, output %d: zeros %v, numerator %v, want one zero at exactly 0", in, out, h.Zeros, h.Numerator)
			}
			if m, err := h.Step(); err != nil || m.Settling2 != nil || m.Undershoot != nil {
				t.Errorf("input %d, output %d: measures relative to a final value of 0: %+v, %v", in, out, m, err)
			}
		}
	}
}

// TestColumnShortsAHeldLevelAtRest: a column without friction shorts a junction at rest, so
// the gain from a held pressure behind it is exactly 0.
func TestColumnShortsAHeldLevelAtRest(t *testing.T) {
	b := network.NewBuilder()
	main, swing := b.Node("main", 0), b.Node("swing", 1)
	junction, vessel := b.Node("junction", 2), b.Node("vessel", 3)
	b.Hold(main, 4)
	in := b.Hold(swing, 5)
	b.Capacity(vessel, 6)
	b.Resistance("l0", vessel, main, 7)
	b.Inertance("l1", junction, main, 8)
	b.Resistance("l3", swing, junction, 9)
	b.Inertance("l4", main, junction, 10)
	b.Resistance("l5", junction, vessel, 11)
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	p.C[0] = 5.93e-8
	copy(p.G, []float64{1 / 5.82e6, 1 / 0.019e9, 1 / 7.81e7})
	copy(p.L, []float64{1.28e6, 12e6})
	p.LR[1] = 0.01064e9
	red, err := net.Reduce(p, []network.Output{{Name: "vessel", Terms: []network.Term{{Node: vessel, Coef: 1}}}})
	if err != nil {
		t.Fatal(err)
	}
	h, err := red.System.Transfer(int(in), 0)
	if err != nil {
		t.Fatal(err)
	}
	if !h.HasGain || h.Gain != 0 || len(h.Zeros) == 0 || h.Zeros[0].P != 0 {
		t.Errorf("gain %g, zeros %v: want a gain of exactly 0 and a zero there", h.Gain, h.Zeros)
	}
}
