package network

import "lagbook/laplace"

// waves sets the inputs and drives as deviations.
func (l *Linear) waves() {
	p := l.p
	for k, w := range p.Wave {
		l.Params.Wave[k] = w.Plus(-valueAt(w, l.at))
	}
	for i := range l.drive {
		for k := range l.drive[i] {
			w := p.Drive[i][k]
			l.Params.Wave[l.Input(ElementID(i), k)] = w.Plus(-valueAt(w, l.at))
		}
	}
}

// findRates finds what the network does by itself at a beginning that is not steady:
// what flows into each node and each unknown too much, and for a column of liquid whose
// drop is not in balance, L·q' = e, the flow e/R that this comes to, where R is its resistance
// to a small change. Nodes that store nothing are in balance.
func (l *Linear) findRates() {
	e := l.equations
	l.inflow = make([]float64, len(l.of.g.nodes))
	if !l.at.Beginning || l.at.How == SteadyStart {
		return
	}
	f := make([]float64, e.size())
	e.rates(l.at.T, l.x, f)
	for i := range l.inflow {
		if id := NodeID(i); !l.of.g.isHeld(id) && !l.of.g.isMassless(id) {
			l.inflow[i] = e.acc[e.l.balance[i]]
			l.moves = l.moves || l.inflow[i] != 0
		}
	}
	l.rate = make([][]float64, len(l.of.g.elements))
	for i, places := range e.l.unknown {
		for _, at := range places {
			l.rate[i] = append(l.rate[i], f[at])
			l.moves = l.moves || f[at] != 0
		}
	}
	for b := range l.lost {
		if R := l.slope(b); R > 0 && !l.from.Shut[b] {
			l.lost[b] = f[e.l.flow[b]] / R
			l.moves = l.moves || l.lost[b] != 0
		}
	}
}

// sources adds constant sources of the rates: one into each free node and each unknown,
// two for each column, which counts its flow from what it comes to.
func (d *draft) sources() {
	l, g := d.l, &d.l.of.g
	if !l.moves {
		return
	}
	add := func(name string, into NodeID, sign, flow float64, r Ref) {
		if flow != 0 {
			id := d.b.Source("rate of "+name, into, sign, r)
			d.set = append(d.set, func(p *Params) { p.Wave[id] = laplace.Constant(flow) })
		}
	}
	for i, inflow := range l.inflow {
		add(g.nodes[i].name, NodeID(i), 1, inflow, g.nodes[i].ref)
	}
	for i, unknowns := range l.unknown {
		for k, node := range unknowns {
			if node == absent {
				continue
			}
			add(d.b.g.nodes[node].name, node, 1, l.rate[i][k], g.elements[i].ref)
		}
	}
	for b, v := range g.inertances {
		add(v.name, v.to, 1, l.lost[b], v.ref)
		add(v.name, v.from, -1, l.lost[b], v.ref)
	}
}

// start states the start: every deviation is 0, and so no steady state is asked for.
func (l *Linear) start() {
	l.Params.HasAllStart = true
	for b, lost := range l.lost {
		if lost != 0 {
			l.Params.StartFlow[b], l.Params.HasStartFlow[b] = -lost, true
		}
	}
}
