package network

import (
	"math"

	"lagbook/laplace"
	"lagbook/laplace/matrix"
)

// realiseFlows makes the system of a network with inertances. Its states are the
// levels of the stores and, after them, the free flows with the kick of sources that
// lead into joints (findKick):
//
//	C x'     = exchange + what the flows bring + B u
//	NᵀLN j'  = Nᵀ (drop − LR i)
func (r *Reduction) realiseFlows(p *Params) {
	n, f := r.net, r.flows
	g, pl := &n.g, n.plan
	inputs := len(g.inputs)
	if r.HasImbalance {
		inputs++
	}
	N := pl.stores + len(f.plan.free)
	r.Realisation = laplace.Realisation{Balance: r.widened(p, N), K: make([]float64, N*N), B: grid(inputs, N), Output: grid(len(r.weights), N)}
	f.fillMass(&r.Realisation, pl.stores)
	f.fillStores(r)
	f.fillLoops(r)
	r.Realisation.D = grid(len(r.weights), inputs)
	for m := range r.weights {
		f.fillOutput(&r.weights[m], r.Realisation.Output[m], r.Realisation.D[m])
	}
	f.kickInputs(&r.Realisation)
	r.Realisation.Rounded = f.rounded(r.weights)
	if r.HasImbalance {
		copy(r.Realisation.B[len(g.inputs)], r.start.Imbalance)
	}
	r.fillRate()
}

func grid(rows, columns int) [][]float64 {
	all := make([]float64, rows*columns)
	list := make([][]float64, rows)
	for i := range list {
		list[i], all = all[:columns:columns], all[columns:]
	}
	return list
}

// widened is the balance of the stores with room for the flows.
func (r *Reduction) widened(p *Params, N int) matrix.Balance {
	pl := r.net.plan
	s := slab(make([]float64, pl.stores*(2+pl.stores)))
	b := r.e.balance(pl, &r.net.g, p, pl.allStores(), &s)
	w := matrix.Balance{N: N, C: make([]float64, N), F: make([]float64, N*N), Leak: make([]float64, N)}
	copy(w.C, b.C)
	copy(w.Leak, b.Leak)
	for i := range b.N {
		copy(w.F[i*N:], b.F[i*b.N:(i+1)*b.N])
	}
	return w
}

// fillMass writes the inertances of the free flows.
func (f *flows) fillMass(r *laplace.Realisation, first int) {
	N, M := r.Balance.N, len(f.plan.free)
	diagonal, whole := f.mass()
	copy(r.Balance.C[first:], diagonal)
	if whole == nil {
		return
	}
	r.Mass = make([]float64, N*N)
	for i := range first {
		r.Mass[i*N+i] = r.Balance.C[i]
	}
	for c := range M {
		copy(r.Mass[(first+c)*N+first:], whole[c*M:(c+1)*M])
	}
}

// fillStores writes what inertances and inputs bring into the stores.
func (f *flows) fillStores(r *Reduction) {
	pl, real := f.n.plan, &r.Realisation
	r.fillInputs()
	N := real.Balance.N
	brought := make([]float64, pl.free)
	for b, v := range f.n.g.inertances {
		f.bring(r.e, b, v, brought)
		for i, k := range brought[pl.massless:] {
			if k == 0 {
				continue
			}
			for c, x := range f.plan.n[b] {
				real.K[i*N+pl.stores+c] += k * x
			}
			for q, x := range f.plan.m[b] {
				real.B[q][i] += k * x
			}
		}
	}
}

// bring writes what a unit of the flow of inertance b brings to the stores. Where
// nothing acts one way only that is what its drop takes of them.
func (f *flows) bring(e *exchange, b int, v branch, brought []float64) {
	g, pl := &f.n.g, f.n.plan
	clear(brought)
	if len(g.oneWays)+len(g.feedbacks) == 0 {
		for m := pl.massless; m < pl.free; m++ {
			brought[m] = -f.drop[b].at[m]
		}
		return
	}
	if at := pl.pos[v.to]; int(at) < pl.free {
		brought[at]++
	}
	if at := pl.pos[v.from]; int(at) < pl.free {
		brought[at]--
	}
	e.forward(pl, brought, pl.massless)
}

// fillLoops writes the equations of the free flows, Nᵀ (drop − LR i).
func (f *flows) fillLoops(r *Reduction) {
	pl, real := f.n.plan, &r.Realisation
	N := real.Balance.N
	brought := make([]float64, len(real.B))
	for c := range f.plan.free {
		row, at := f.loop(c), pl.stores+c
		clear(brought)
		f.fillOutput(&row, real.K[at*N:(at+1)*N], brought)
		for q, v := range brought {
			real.B[q][at] = v
		}
	}
}

// loop returns the weights of what drives the free flow c.
func (f *flows) loop(c int) weights {
	row := f.drops(c)
	for b, x := range f.plan.n {
		if r := f.p.LR[b]; x[c] != 0 && r != 0 {
			row.carry(f.n, InertanceID(b), -x[c]*r)
		}
	}
	f.settle(&row)
	return row
}

// drops returns the weights of the drops around the loop of the free flow c.
func (f *flows) drops(c int) weights {
	row := f.n.noWeights()
	for b := range f.drop {
		if x := f.plan.n[b][c]; x != 0 {
			row.plus(x, &f.drop[b])
		}
	}
	return row
}

// fillOutput writes settled weights as weights of the states and of the inputs.
func (f *flows) fillOutput(w *weights, states, direct []float64) {
	g, pl := &f.n.g, f.n.plan
	copy(states, w.at[pl.massless:pl.free])
	for k, in := range g.inputs {
		at := int(pl.pos[in.node])
		switch {
		case in.held:
			direct[k] = w.at[at]
		case at < pl.massless:
			direct[k] = in.sign * w.flow[at]
		}
		if w.direct != nil {
			direct[k] += w.direct[k]
		}
	}
	for b, x := range w.inert {
		if x == 0 {
			continue
		}
		for c, y := range f.plan.n[b] {
			states[pl.stores+c] += x * y
		}
		for k, y := range f.plan.m[b] {
			direct[k] += x * y
		}
	}
}

// kickInputs turns weights and equations of the free flows into those of the states,
// j = state − kick q.
func (f *flows) kickInputs(r *laplace.Realisation) {
	for q := range f.n.g.inputs {
		if !f.kicked(q) {
			continue
		}
		for i := range r.Balance.N {
			r.B[q][i] = f.less(r.B[q][i], r.K[i*r.Balance.N:(i+1)*r.Balance.N], q)
		}
		for m := range r.Output {
			r.D[m][q] = f.less(r.D[m][q], r.Output[m], q)
		}
	}
}

func (f *flows) kicked(q int) bool {
	for _, kicks := range f.kick {
		if kicks[q] != 0 {
			return true
		}
	}
	return false
}

// less returns x less what the kick of input q takes off the free flows, weighed; a
// result that is rounding of what cancels is 0.
func (f *flows) less(x float64, weights []float64, q int) float64 {
	size := math.Abs(x)
	for c, kicks := range f.kick {
		v := weights[f.n.plan.stores+c] * kicks[q]
		x -= v
		size += math.Abs(v)
	}
	if math.Abs(x) <= weightNoise*size {
		return 0
	}
	return x
}

// rounded tells whether a source leads into a joint, a joint's level or a sum of flows
// is shown: rounded numbers then stand where exact ones would cancel.
func (f *flows) rounded(outs []weights) bool {
	for _, row := range f.kick {
		for _, k := range row {
			if k != 0 {
				return true
			}
		}
	}
	for _, w := range outs {
		if w.rounded {
			return true
		}
	}
	return false
}
