package network

import "lagbook/laplace/matrix"

// flows are the numbers of the inertances of a network with its massless nodes
// eliminated.
type flows struct {
	n    *Network
	p    *Params
	plan *flowPlan
	drop []weights           // level at from less level at to of each inertance; joints count as 0
	star *matrix.Elimination // the joints with what acts on them through 1/L
	kick [][]float64         // by place in free, by input: what a jump of the input takes off the free flow
}

// newFlows prepares the drops along the inertances and the joints.
//
// The level λ of a joint follows from Σ ±i' + Σ q' = 0 with i' = (drop − LR·i)/L: it
// is that of a massless node with conductances 1/L and sources q', found without
// subtraction. A source whose flow changes is felt there at once: such a level is
// improper.
func (n *Network) newFlows(e *exchange, p *Params) (*flows, error) {
	if n.plan.flows == nil {
		return nil, nil
	}
	f := &flows{n: n, p: p, plan: n.plan.flows}
	for _, b := range n.g.inertances {
		w := e.dropOf(n.plan, b)
		for _, m := range f.plan.rep {
			w.at[m] = 0
		}
		f.drop = append(f.drop, w)
	}
	if len(f.plan.rep) > 0 {
		var err error
		if f.star, err = f.joints().Eliminate(); err != nil {
			return nil, outOfRange()
		}
	}
	return f, f.findKick()
}

// dropOf weighs the level at from less that at to.
func (e *exchange) dropOf(pl *plan, b branch) weights {
	w := weights{at: make([]float64, len(pl.order)), flow: make([]float64, pl.massless), size: make([]float64, len(pl.order))}
	w.add(pl, b.from, 1)
	w.add(pl, b.to, -1)
	e.expandDifference(pl, &w, int(max(pl.pos[b.from], pl.pos[b.to])))
	e.gather(pl, w.flow)
	w.clean()
	return w
}

// joints is the balance of Σ ±i' with the other nodes as the reference.
func (f *flows) joints() *matrix.Balance {
	N := len(f.plan.rep)
	b := &matrix.Balance{N: N, C: make([]float64, N), F: make([]float64, N*N), Leak: make([]float64, N)}
	for k := range b.C {
		b.C[k] = 1
	}
	for k, ends := range f.plan.ends {
		from, to, g := ends[0], ends[1], 1/f.p.L[k]
		switch {
		case from == to:
		case from >= 0 && to >= 0:
			b.F[from*N+to] += g
			b.F[to*N+from] += g
		default:
			b.Leak[max(from, to)] += g
		}
	}
	return b
}

// settle puts what is known of joints and massless nodes in the place of their
// levels: afterwards w weighs stores, held nodes, inertances and inputs only, and in
// flow sources alone.
func (f *flows) settle(w *weights) {
	share := make([]float64, len(f.plan.rep)) // of each joint
	some := false
	for k, m := range f.plan.rep {
		share[k], w.at[m] = w.at[m], 0
		some = some || share[k] != 0
	}
	if some {
		w.rounded = true
		f.settleJoints(w, f.star.SolveTransposed(share))
	}
	for b, v := range f.n.g.inertances {
		if k := f.intoMassless(w.flow, v); k != 0 {
			w.carry(f.n, InertanceID(b), k)
		}
	}
}

// intoMassless is the weight of what an inertance brings to massless nodes.
func (f *flows) intoMassless(flow []float64, b branch) float64 {
	pos, sum := f.n.plan.pos, 0.0
	if m := int(pos[b.to]); m < len(flow) {
		sum += flow[m]
	}
	if m := int(pos[b.from]); m < len(flow) {
		sum -= flow[m]
	}
	return sum
}

// settleJoints adds the joints' levels, part of each being what its equation's right
// side carries.
func (f *flows) settleJoints(w *weights, part []float64) {
	at := func(joint int) float64 {
		if joint < 0 {
			return 0
		}
		return part[joint]
	}
	for b, ends := range f.plan.ends {
		k := (at(ends[1]) - at(ends[0])) / f.p.L[b]
		if ends[0] == ends[1] || k == 0 {
			continue
		}
		w.plus(k, &f.drop[b])
		if r := f.p.LR[b]; r != 0 {
			w.carry(f.n, InertanceID(b), -k*r)
		}
	}
	for k, in := range f.n.g.inputs {
		if v := in.sign * at(f.plan.group[in.node]); !in.held && v != 0 {
			if w.rate == nil {
				w.rate = make([]float64, len(f.n.g.inputs))
			}
			w.rate[k] += v
		}
	}
}

// mass returns the inertance of the free flows, Nᵀ L N, and nil in its place where
// it is diagonal.
func (f *flows) mass() (diagonal, whole []float64) {
	N := len(f.plan.free)
	whole = make([]float64, N*N)
	diagonal = make([]float64, N)
	coupled := false
	for b, row := range f.plan.n {
		for c, x := range row {
			if x == 0 {
				continue
			}
			for d, y := range row {
				whole[c*N+d] += x * y * f.p.L[b]
			}
		}
	}
	for c := range diagonal {
		diagonal[c] = whole[c*N+c]
		for d := range N {
			coupled = coupled || c != d && whole[c*N+d] != 0
		}
	}
	if !coupled {
		return diagonal, nil
	}
	return diagonal, whole
}
