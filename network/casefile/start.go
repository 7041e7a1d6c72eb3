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
	r.reportAll(diags)
	r.c.warn(diags)
	if Failed(diags) || r.c.net == nil {
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

// A startedness is which parts of one domain state a start: nodes that store, and
// lines whose flow has inertia.
type startedness struct {
	with    network.Ref // the first that does
	without []string
}

// halfStarted reports a domain in which some parts state a start and others do
// not, and [run] start does not say what the others have.
func (r *reader) halfStarted(p *network.Params) {
	domains := map[string]*startedness{}
	var order []*startedness
	note := func(name string, ref network.Ref, has bool) {
		domain := ""
		if ref >= 0 && r.c.refs[ref].e != nil {
			domain = r.c.refs[ref].e.domain
		}
		s := domains[domain]
		if s == nil {
			s = &startedness{with: network.NoRef}
			domains[domain], order = s, append(order, s)
		}
		switch {
		case !has:
			s.without = append(s.without, r.partOf(name))
		case s.with == network.NoRef:
			s.with = ref
		}
	}
	for id, name := range r.c.net.Nodes() {
		if node := r.c.net.Node(network.NodeID(id)); !node.Held && !node.Massless {
			note(name, node.Ref, p.HasStart[id])
		}
	}
	for _, b := range r.c.net.Branches() {
		if b.Kind == network.InertanceBranch {
			note(b.Name, b.Ref, p.HasStartFlow[b.Index])
		}
	}
	for _, s := range order {
		if s.with != network.NoRef && s.without != nil {
			r.halfStart(s)
		}
	}
}

func (r *reader) halfStart(s *startedness) {
	without := distinct(s.without)
	const most = 8
	names := strings.Join(without[:min(len(without), most)], ", ")
	if len(without) > most {
		names += fmt.Sprintf(" and %d more", len(without)-most)
	}
	d := r.c.Diagnose(s.with, "half-started", "it states a start, but "+names+" do not", `state start for all, or [run] start = "steady", "at rest" or a level for the rest`)
	if len(without) == 1 {
		d.Text = "it states a start, but " + names + " does not"
	}
	if e := r.c.refs[s.with].e; e != nil {
		if x := e.find("start"); x != nil {
			d = r.c.src.place(d, x.n.span)
		}
	}
	r.report(d)
}

// partOf names the part that a node or a branch belongs to: a node of its own, or the
// part it lies inside, as "wall.2" or "pipe/2".
func (r *reader) partOf(node string) string {
	node, _, _ = strings.Cut(node, "/")
	e, ok := r.c.Part(node)
	if dot := strings.LastIndexByte(node, '.'); !ok && dot > 0 {
		e, ok = r.c.Part(node[:dot])
	}
	switch {
	case ok && (e.FullName() != e.Name || e.use != nil):
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
