package network

import "strconv"

// balance forms the imbalance: what flows into each store and drives each free flow.
// Where there is a steady state it is that of the change from it, which keeps more
// digits than sums of which the steady part cancels; where all is steady it is 0.
func (c *flowStart) balance() {
	pl := c.n.plan
	whole := c.rates(c.s.pt, c.s.Flows, c.s.pt.flow)
	var change []float64
	if c.steady != nil {
		change = c.changed()
	}
	put := func(k, island int, open bool) {
		switch {
		case island >= 0 && !c.moved[island] && !open:
		case c.steady != nil && !open:
			c.s.Imbalance[k] = change[k]
		default:
			c.s.Imbalance[k] = whole[k]
		}
	}
	for m := pl.massless; m < pl.free; m++ {
		id := pl.order[m]
		put(m-pl.massless, pl.island[id], c.steady == nil || c.steady.open[id])
	}
	for k, b := range c.f.plan.free {
		v := c.n.g.inertances[b]
		put(pl.stores+k, c.n.islandOf(v), c.open(v))
	}
}

// changed returns the rates of the change from the steady state.
func (c *flowStart) changed() []float64 {
	pl := c.n.plan
	pt := &point{pl: pl, held: make([]float64, len(c.s.pt.held)), ref: make([]float64, pl.islands), dev: make([]float64, pl.free)}
	for m := pl.massless; m < pl.free; m++ {
		id := pl.order[m]
		if c.moved[pl.island[id]] && !c.steady.open[id] {
			pt.dev[m] = c.s.pt.dev[m] - c.steady.deviation(c.rest, id, c.s.pt.ref[pl.island[id]])
		}
	}
	i := make([]float64, len(c.s.Flows))
	for b := range i {
		if !c.open(c.n.g.inertances[b]) {
			i[b] = c.s.Flows[b] - c.steady.flow[b]
		}
	}
	return c.rates(pt, i, make([]float64, pl.free))
}

// rates returns C·x' of the stores and what drives the free flows at a point with
// the flows i, sources bringing flow.
func (c *flowStart) rates(pt *point, i, flow []float64) []float64 {
	n, pl := c.n, c.n.plan
	f := append([]float64(nil), flow...)
	for b, v := range n.g.inertances {
		if at := pl.pos[v.to]; int(at) < pl.free {
			f[at] += i[b]
		}
		if at := pl.pos[v.from]; int(at) < pl.free {
			f[at] -= i[b]
		}
	}
	rates := make([]float64, pl.stores+len(c.f.plan.free))
	for k := range c.f.plan.free {
		row, lost := c.f.drops(k), 0.0
		for b, x := range c.f.plan.n {
			if x[k] != 0 {
				lost += x[k] * c.p.LR[b] * i[b]
			}
		}
		rates[pl.stores+k] = row.along(pt, f) - lost
	}
	c.e.forward(pl, f, pl.massless)
	for m := pl.massless; m < pl.free; m++ {
		rates[m-pl.massless] = c.e.inflow(pl, pt, f, m)
	}
	return rates
}

// along applies the weights of a drop to a point into which flow is brought: levels as
// differences from the one that weighs most.
func (w *weights) along(pt *point, flow []float64) float64 {
	most, sum := -1, 0.0
	for i, c := range w.at {
		sum += c
		if c != 0 && (most < 0 || c > w.at[most] || -c > w.at[most]) {
			most = i
		}
	}
	y := 0.0
	for i, c := range w.at {
		if c != 0 {
			y += c * pt.difference(i, most)
		}
	}
	for m, c := range w.flow {
		if c != 0 {
			y += c * flow[m]
		}
	}
	if most >= 0 && sum != 0 {
		y += sum * pt.level(most)
	}
	return y
}

// levels fills the levels of all nodes, of massless nodes from what is around them.
func (c *flowStart) levels() {
	n, pl := c.n, c.n.plan
	c.s.Levels = c.s.pt.levels()
	for m := range pl.massless {
		id := pl.order[m]
		o := n.Level(id)
		w := n.outputWeights(c.e, c.p, &o, c.f)
		c.s.Levels[id] = w.atStart(n, c.p, c.s)
	}
}

// name says how the state was found.
func (c *flowStart) name() {
	given, stores := c.n.countGiven(c.p)
	c.s.How = how(given, stores)
	if c.p.HasAllStart {
		return
	}
	for _, has := range c.p.HasStartFlow {
		if has && c.s.How == SteadyStart || !has && c.s.How == GivenStart {
			c.s.How = MixedStart
		}
	}
}

// misfit is the fault of a stated flow that the others do not allow.
func (c *flowStart) misfit(b InertanceID, follows float64) error {
	v := c.n.g.inertances[b]
	return &ParamFault{List: []Fault{{Code: StartConflict, Nodes: []NodeID{v.from, v.to}, Refs: []Ref{v.ref}, Text: "inertance " + strconv.Quote(v.name) +
		": start is " + number(c.p.StartFlow[b]) + ", and the flows stated at its joint make it " + number(follows)}}}
}

// notShut is the fault of a stated flow through what is shut.
func (c *flowStart) notShut(b InertanceID) error {
	v := c.n.g.inertances[b]
	text, figure := c.n.g.figured(v.from, "inertance "+strconv.Quote(v.name)+": start is ", c.p.StartFlow[b], ", and it is shut just before t = 0")
	return &ParamFault{List: []Fault{{Code: StartConflict, Nodes: []NodeID{v.from}, Refs: []Ref{v.ref}, Text: text, Figure: figure}}}
}

// unattained fills Unattained where feedbacks could make the network unstable. A
// network without them never gains energy.
func (c *flowStart) unattained() error {
	n := c.n
	active := false
	for _, k := range c.p.K {
		active = active || k != 0
	}
	if !active || c.p.HasAllStart {
		return nil
	}
	r := &Reduction{net: n, whole: n, e: c.e, flows: c.f}
	r.realiseFlows(c.p)
	sys, err := newSystem(r.Realisation)
	if err != nil {
		return err
	}
	for _, p := range sys.Poles() {
		if real(p.P) <= p.Radius {
			continue
		}
		for _, id := range n.plan.order[n.plan.massless:n.plan.free] {
			if _, given := c.p.startOf(id); !given {
				c.s.Unattained = append(c.s.Unattained, id)
			}
		}
		return nil
	}
	return nil
}
