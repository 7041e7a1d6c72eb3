package casefile

import (
	"fmt"
	"strings"

	"lagbook/network"
)

// trial sets the network once with the values as written, which shows what only
// numbers can.
func (r *reader) trial() {
	v, diags := r.c.Eval(nil)
	if r.reportAll(diags); Failed(diags) || r.c.net == nil {
		return
	}
	p := r.c.net.NewParams()
	for _, set := range r.c.setters {
		if err := set(v, p); err != nil {
			r.reportAll(r.c.Explain(err))
			return
		}
	}
	if r.c.Questions.Start == StartCycle && r.startsOfItsOwn(p) {
		return
	}
	if err := r.c.net.Check(p); err != nil {
		r.reportAll(r.c.Explain(err))
		return
	}
	if r.c.Questions.Start == StartUnsaid {
		r.halfStarted(p)
	}
}

// halfStarted reports a case in which some nodes state a start and others that
// store, or lines whose flow has inertia, do not, and [run] start does not say
// what the others have.
func (r *reader) halfStarted(p *network.Params) {
	with := -1
	var without []string
	for id, name := range r.c.net.Nodes() {
		node := r.c.net.Node(network.NodeID(id))
		switch {
		case p.HasStart[id] && with < 0:
			with = id
		case p.HasStart[id] || node.Held || node.Massless:
		default:
			without = append(without, r.partOf(name))
		}
	}
	for id, b := range r.inertances() {
		if !p.HasStartFlow[id] {
			without = append(without, r.partOf(b.Name))
		}
	}
	if with < 0 || without == nil {
		return
	}
	without = distinct(without)
	const most = 8
	names := strings.Join(without[:min(len(without), most)], ", ")
	if len(without) > most {
		names += fmt.Sprintf(" and %d more", len(without)-most)
	}
	ref := r.c.net.Node(network.NodeID(with)).Ref
	d := r.c.Diagnose(ref, "half-started", "it states a start, but "+names+" do not", `state start for all, or [run] start = "steady" or a level for the rest`)
	if len(without) == 1 {
		d.Text = "it states a start, but " + names + " does not"
	}
	if e := r.c.refs[ref].e; e != nil {
		if x := e.find("start"); x != nil {
			d = r.c.src.place(d, x.n.span)
		}
	}
	r.report(d)
}

// inertances lists the branches whose flow is a state, by InertanceID.
func (r *reader) inertances() []network.BranchView {
	var list []network.BranchView
	for _, b := range r.c.net.Branches() {
		if b.Kind == network.InertanceBranch {
			list = append(list, b)
		}
	}
	return list
}

// partOf names the part a node belongs to: a node of its own, or the part it
// lies inside.
func (r *reader) partOf(node string) string {
	e, ok := r.c.Part(node)
	if dot := strings.LastIndexByte(node, '.'); !ok && dot > 0 {
		e, ok = r.c.Part(node[:dot])
	}
	switch {
	case ok && e.FullName() != e.Name:
		return e.Table.Name + " " + quoted(e.FullName())
	case ok:
		return e.Thing()
	}
	return "node " + quoted(node)
}

func distinct(list []string) []string {
	seen := map[string]bool{}
	var out []string
	for _, s := range list {
		if !seen[s] {
			out = append(out, s)
		}
		seen[s] = true
	}
	return out
}
