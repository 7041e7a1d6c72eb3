package network

import "math"

// startWithFlows finds the start state of a network with inertances. A flow that is
// not stated is the steady one; from rest (HasAllStart) it is 0, and so it is where
// every level around it is stated and there is no one steady state. Flows into a
// joint always sum to zero: those of inertances that nothing states follow.
func (n *Network) startWithFlows(p *Params, e *exchange, f *flows) (*StartState, error) {
	u := make([]float64, len(p.Wave))
	for k := range u {
		u[k] = p.Wave[k].Before
	}
	s := &StartState{Imbalance: make([]float64, n.plan.stores+len(f.plan.free)), pt: n.newPoint(p, e, u),
		Flows: make([]float64, len(n.g.inertances))}
	c := &flowStart{n: n, p: p, e: e, f: f, s: s, u: u}
	if !p.HasAllStart {
		c.rest = n.newRest(p)
		var err error
		if c.steady, err = c.rest.solve(p, u); err != nil {
			return nil, err
		}
		if faults := c.lacking(); len(faults) > 0 {
			return nil, &NoSteady{List: faults}
		}
		s.Circulating = c.circulating()
	}
	c.putLevels()
	if err := c.putFlows(); err != nil {
		return nil, err
	}
	c.balance()
	c.levels()
	c.name()
	return s, c.unattained()
}

// A flowStart is a start state in the making.
type flowStart struct {
	n      *Network
	p      *Params
	e      *exchange
	f      *flows
	s      *StartState
	u      []float64
	rest   *rest // nil from rest
	steady *restState
	moved  []bool // by island: not all of it is steady
}

// islandOf returns the island an inertance belongs to, −1 between held nodes.
func (n *Network) islandOf(b branch) int { return max(n.plan.island[b.from], n.plan.island[b.to]) }

// lacking returns why there is no steady state, wherever one is needed: where a
// level is not stated, or a flow among nodes that store nothing.
func (c *flowStart) lacking() (faults []SteadyFault) {
	n := c.n
	given, stores := n.countGiven(c.p)
	needed := make([]bool, n.plan.islands)
	for k := range needed {
		needed[k] = given[k] < stores[k]
	}
	direct := make([]bool, len(n.g.nodes)) // held nodes with an inertance between them whose flow is not stated
	for b, v := range n.g.inertances {
		switch k := n.islandOf(v); {
		case c.p.HasStartFlow[b], v.shut():
		case k < 0:
			direct[v.from], direct[v.to] = true, true
		case stores[k] == 0:
			needed[k] = true
		}
	}
	for _, f := range c.steady.faults {
		for _, id := range f.at {
			if k := n.plan.island[id]; k >= 0 && needed[k] || k < 0 && direct[id] {
				faults = append(faults, f.SteadyFault)
				break
			}
		}
	}
	return faults
}

// circulating lists the inertances whose steady flow leaves a flow round a loop open,
// where nothing states one of them.
func (c *flowStart) circulating() (list []InertanceID) {
	for _, b := range c.rest.circulating(c.p) {
		if v := c.n.g.inertances[b]; !c.p.HasStartFlow[b] && !c.open(v) {
			list = append(list, b)
		}
	}
	return list
}

// open tells whether an inertance has no steady flow.
func (c *flowStart) open(b branch) bool {
	return c.steady == nil || c.steady.open[b.from] || c.steady.open[b.to]
}

// putLevels sets the stores, as differences from their islands' references: those of
// the steady state where there is one.
func (c *flowStart) putLevels() {
	n, pl := c.n, c.n.plan
	c.moved = make([]bool, pl.islands)
	if c.steady != nil {
		refs := make([]float64, pl.islands)
		for i := range pl.free {
			id := pl.order[i]
			refs[pl.island[id]] = c.steady.ref(c.rest, id)
		}
		c.s.pt = n.newPointAt(c.p, c.e, c.u, refs)
	}
	for m := pl.massless; m < pl.free; m++ {
		id := pl.order[m]
		ref := c.s.pt.ref[pl.island[id]]
		if level, ok := c.p.startOf(id); ok {
			c.s.pt.dev[m] = level - ref
			c.moved[pl.island[id]] = true
			continue
		}
		c.s.pt.dev[m] = c.steady.deviation(c.rest, id, ref)
	}
}

// ref returns the level that differences around a node are taken from.
func (s *restState) ref(r *rest, id NodeID) float64 {
	if k := r.net.plan.island[r.of[id]]; k >= 0 {
		return s.pt.ref[k]
	}
	return r.level(s, id)
}

// deviation returns the level of a node less ref.
func (s *restState) deviation(r *rest, id NodeID, ref float64) float64 {
	at := r.of[id]
	if k := r.net.plan.island[at]; k >= 0 && s.pt.ref[k] == ref {
		return s.pt.dev[r.net.plan.pos[at]]
	}
	return r.level(s, id) - ref
}

// putFlows sets the flows.
func (c *flowStart) putFlows() error {
	n, p, i := c.n, c.p, c.s.Flows
	stated := false
	for b, v := range n.g.inertances {
		k := n.islandOf(v)
		switch {
		case v.shut():
			if p.HasStartFlow[b] && p.StartFlow[b] != 0 {
				return c.notShut(InertanceID(b))
			}
		case p.HasStartFlow[b]:
			i[b], stated = p.StartFlow[b], true
			if k >= 0 {
				c.moved[k] = true
			}
		case !c.open(v):
			i[b] = c.steady.flow[b]
		case k >= 0:
			c.moved[k] = true
		}
	}
	if len(c.f.plan.rep) == 0 || c.steady != nil && !stated && !c.anyOpen() {
		return nil
	}
	if !stated {
		c.pressed()
		return nil
	}
	return c.follow()
}

func (c *flowStart) anyOpen() bool {
	for _, open := range c.steady.open {
		if open {
			return true
		}
	}
	return false
}

// pressed sets the flows that are not steady to those that sources press into joints
// at rest: i = (M − N kick) q.
func (c *flowStart) pressed() {
	for b, v := range c.n.g.inertances {
		if !c.open(v) {
			continue
		}
		sum := 0.0
		for q, x := range c.f.plan.m[b] {
			if u := c.u[q]; x != 0 && u != 0 {
				sum += x * u
			}
		}
		for k, x := range c.f.plan.n[b] {
			for q, u := range c.u {
				if x != 0 && u != 0 {
					sum -= x * c.f.kick[k][q] * u
				}
			}
		}
		c.s.Flows[b] = sum
	}
}

// followTolerance is by how much stated flows may miss a joint's balance, relative.
const followTolerance = 1e-9

// follow sets the flows that depend at joints from the others: of inertances whose
// flow is stated as few as can be depend, and those must fit.
func (c *flowStart) follow() error {
	n, i := c.n, c.s.Flows
	var order []InertanceID
	for _, stated := range [2]bool{false, true} {
		for b, has := range c.p.HasStartFlow {
			if has == stated && !n.g.inertances[b].shut() {
				order = append(order, InertanceID(b))
			}
		}
	}
	plan := *c.f.plan
	plan.choose(&n.g, order)
	for b := range i {
		sum, size := 0.0, 0.0
		add := func(x float64) { sum, size = sum+x, size+math.Abs(x) }
		for k, x := range plan.n[b] {
			add(x * i[plan.free[k]])
		}
		for q, x := range plan.m[b] {
			add(x * c.u[q])
		}
		if c.p.HasStartFlow[b] && !n.g.inertances[b].shut() {
			if math.Abs(sum-i[b]) > followTolerance*(size+math.Abs(i[b])) {
				return c.misfit(InertanceID(b), sum)
			}
			continue
		}
		if !plan.isFree(InertanceID(b)) {
			i[b] = sum
		}
	}
	return nil
}

func (f *flowPlan) isFree(b InertanceID) bool {
	for _, k := range f.free {
		if k == b {
			return true
		}
	}
	return false
}
