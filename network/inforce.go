package network

import "slices"

// shut tells whether an inertance is shut, in a network made by inForce: both ends of
// it are then at one node, where nothing drives it and nothing flows.
func (b branch) shut() bool { return b.from == b.to }

// inForce returns the network without the branches that p shuts: n itself where that
// makes no difference to flows with inertance. Identifiers stay what they are. A massless node that is
// left with inertances only becomes a joint, so that a column of liquid before a valve
// that shuts stops with it; what is left with nothing at all is a fault.
func (n *Network) inForce(p *Params) (*Network, error) {
	if len(n.g.inertances) == 0 || !slices.Contains(p.Shut, true) && (len(p.Switch) == 0 || !slices.Contains(p.G, 0)) {
		return n, nil
	}
	if err := n.Check(p); err != nil {
		return nil, err
	}
	g := n.g
	g.resistances, g.inertances = slices.Clone(g.resistances), slices.Clone(g.inertances)
	for k, v := range p.G {
		if v == 0 {
			g.resistances[k].to = g.resistances[k].from
		}
	}
	for k, shut := range p.Shut {
		if shut {
			g.inertances[k].to = g.inertances[k].from
		}
	}
	if !slices.Contains(p.Shut, true) && slices.EqualFunc(g.joints(), n.g.joints(), slices.Equal[[]NodeID]) {
		return n, nil // what is open leaves every place where inertances meet as it is
	}
	none := make([]bool, len(g.nodes))
	var faults []Fault
	for _, nodes := range g.undetermined(none) {
		faults = append(faults, Fault{Code: Undetermined, Nodes: nodes, Refs: g.refsOf(nodes), Text: g.named(nodes) + ": " + plural(nodes, "has", "have") +
			" no capacity, and " + atRest(p) + " nothing determines the level"})
	}
	if len(faults) == 0 {
		faults = g.mixed(none)
	}
	if len(faults) == 0 {
		faults = n.fed(&g)
	}
	if len(faults) > 0 {
		return nil, &ParamFault{List: faults}
	}
	return &Network{g: g, plan: newPlan(&g), remarks: n.remarks}, nil
}

// fed finds sources that lead into places where inertances meet, while something is
// shut: what they bring would have to set the flows at once.
func (n *Network) fed(g *graph) (faults []Fault) {
	member := make([]bool, len(g.nodes))
	for _, list := range [2][][]NodeID{n.g.joints(), g.joints()} {
		for _, nodes := range list {
			for _, id := range nodes {
				member[id] = true
			}
		}
	}
	for _, in := range g.inputs {
		if id := []NodeID{in.node}; !in.held && member[in.node] {
			faults = append(faults, Fault{Code: Undetermined, Nodes: id, Refs: append([]Ref{in.ref}, g.refsOf(id)...), Text: g.named(id) +
				": while something is shut only inertances are left to take what a source brings here, so that its flow would have to set theirs at once; give a capacity"})
		}
	}
	return faults
}

// Stopped returns the inertances in which nothing can flow with the numbers of p: those
// that are shut, and those in series with what is shut with no store between. Elements
// count as open. It returns *ParamFault as Reduce does.
func (n *Network) Stopped(p *Params) (list []InertanceID, err error) {
	if n.g.nonlinear() {
		if err := n.Check(p); err != nil {
			return nil, err
		}
		return n.deadEnds(p), nil
	}
	in, err := n.inForce(p)
	if err != nil || in.plan.flows == nil {
		return nil, err
	}
	zero := func(row []float64) bool { return !slices.ContainsFunc(row, func(x float64) bool { return x != 0 }) }
	for b := range in.g.inertances {
		if zero(in.plan.flows.n[b]) && zero(in.plan.flows.m[b]) {
			list = append(list, InertanceID(b))
		}
	}
	return list, nil
}
