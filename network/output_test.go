package network_test

import (
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// summed is two bodies between two held nodes, with outputs and sums of them: of levels,
// flows and what a held node is fed, and a constant. Where bent is asked for, a part whose
// law is not linear stands beside them.
func summed(t *testing.T, bent bool) (net *network.Network, p *network.Params, outs []network.Output) {
	b := network.NewBuilder()
	warm, cool := b.Node("warm", network.NoRef), b.Node("cool", network.NoRef)
	hot, room, joint := b.Node("hot", network.NoRef), b.Node("room", network.NoRef), b.Node("joint", network.NoRef)
	b.Hold(hot, network.NoRef)
	b.Hold(room, network.NoRef)
	b.Capacity(warm, network.NoRef)
	b.Capacity(cool, network.NoRef)
	var rs []network.ResistanceID
	for _, ends := range [][2]network.NodeID{{hot, joint}, {joint, warm}, {warm, cool}, {cool, room}} {
		rs = append(rs, b.Resistance("r", ends[0], ends[1], network.NoRef))
	}
	column := b.Inertance("column", warm, room, network.NoRef)
	into := b.Source("load", cool, 1, network.NoRef)
	var id network.ElementID
	if bent {
		far := b.Node("far", network.NoRef)
		b.Capacity(far, network.NoRef)
		id = b.Between("bend", far, hot, false, network.NoRef)
	}
	net, p = finished(t, b)
	copy(p.C, []float64{100, 40, 30})
	copy(p.G, []float64{2, 4, 1, 0.5})
	p.L[column], p.LR[column] = 50, 3
	p.Datum[cool] = 7
	p.Wave[0], p.Wave[1], p.Wave[into] = laplace.Step(0, 50, 1), laplace.Sine(0, 5, 0.1, 0), laplace.Step(0, 20, 30)
	if bent {
		p.Law[id] = &network.Through{Flow: flowOf(func(a, b float64) (q, da, db float64) {
			d := a - b
			return d * math.Abs(d), 2 * math.Abs(d), -2 * math.Abs(d)
		})}
	}
	p.HasAllStart = true
	outs = []network.Output{net.Level(warm), net.Level(cool), net.FlowOf(rs[1]), net.InertanceFlowOf(column), net.SupplyOf(room), net.SourceFlowOf(into)}
	var parts []network.Part
	for k := range outs {
		parts = append(parts, network.Part{Coef: weightOf(k), Output: outs[k]})
	}
	whole := network.Output{Name: "whole", Parts: parts, Constant: 11}
	levels := network.Output{Name: "levels", Terms: []network.Term{{Node: warm, Coef: 0.3}, {Node: cool, Coef: 0.7}}, Constant: -5}
	nested := network.Output{Name: "nested", Parts: []network.Part{{Coef: -2, Output: whole}, {Coef: 3, Output: levels}}}
	return net, p, append(outs, whole, levels, nested)
}

func weightOf(k int) float64 { return []float64{0.5, -0.25, 2, 1.5, -1, 3}[k] }

// sumsOf are what the last three outputs must be by the others.
func sumsOf(y func(out int) float64) [3]float64 {
	whole := 11.0
	for k := range 6 {
		whole += weightOf(k) * y(k)
	}
	levels := 0.3*y(0) + 0.7*y(1) - 5
	return [3]float64{whole, levels, -2*whole + 3*levels}
}

// Sums of outputs are the sums, in the closed form, in a march, and in the linear network
// about a state.
func TestSumsOfOutputs(t *testing.T) {
	check := func(what string, y func(out int) float64, tol float64) {
		t.Helper()
		for k, want := range sumsOf(y) {
			if got := y(6 + k); math.Abs(got-want) > tol {
				t.Errorf("%s: sum %d is %v, want %v", what, k, got, want)
			}
		}
	}
	net, p, outs := summed(t, false)
	red, err := net.Reduce(p, outs)
	if err != nil {
		t.Fatal(err)
	}
	r, err := red.Respond(p, 100)
	if err != nil {
		t.Fatal(err)
	}
	curved, q, outs := summed(t, true)
	m := marched(t, curved, q, outs, network.Run{Until: 100})
	for _, at := range []float64{0, 0.5, 1, 7, 30, 99} {
		check("closed", func(out int) float64 { return r.At(out, at) }, 1e-11)
		check("just before, closed", func(out int) float64 { return r.Left(out, at) }, 1e-11)
		check("marched", func(out int) float64 { return m.At(out, at) }, 1e-5)
		for k := range outs {
			if a, b := r.At(k, at), m.At(k, at); math.Abs(a-b) > 1e-4 {
				t.Errorf("output %d at %v: %v closed, %v marched", k, at, a, b)
			}
		}
	}
	lin, err := curved.Linearise(q, m.End())
	if err != nil {
		t.Fatal(err)
	}
	deviations, base := lin.Outputs(outs)
	check("at the state", func(out int) float64 { return base[out] }, 1e-10)
	if red, err = lin.Net.Reduce(lin.Params, deviations); err != nil {
		t.Fatal(err)
	}
	if r, err = red.Respond(lin.Params, 10); err != nil {
		t.Fatal(err)
	}
	check("linear", func(out int) float64 { return base[out] + r.At(out, 5) }, 1e-9)
}
