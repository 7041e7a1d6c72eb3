package casefile

import (
	"errors"

	"lagbook/network"
	"lagbook/network/quantity"
)

// Build hands out the network and the setters, to be called in order with the
// values of each Eval. It was built when the case was read, so that whatever is
// wrong with it is among the diagnostics of Read.
func (c *Case) Build() (*network.Network, []Setter, []Diagnostic) {
	return c.net, c.setters, c.faults
}

// build builds every element that is in order, stage by stage. Where others are
// not, what the network says of nodes they might have joined is not reported.
func (r *reader) build() {
	b := network.NewBuilder()
	last := 0
	for _, e := range r.c.Elements {
		last = max(last, e.Table.Stage)
	}
	for stage := 0; stage <= last; stage++ {
		for _, e := range r.c.Elements {
			if e.Table.Stage == stage && e.Table.Build != nil {
				r.buildOne(e, b)
			}
		}
	}
	net, err := b.Build()
	if err == nil {
		r.c.net = net
		r.c.noteFlows()
		r.remarks(net)
		return
	}
	r.structure(err)
}

func (r *reader) buildOne(e *Element, b *network.Builder) {
	r.scope = e.use
	defer func() { r.scope = nil }()
	if e.faulty || r.unready[e.domain] || r.leans(e, e.fields) {
		if !e.faulty {
			e.faulty = true
			r.blamed[e.Name] = true
			r.blameNames(e.fields)
		}
		return
	}
	set, diags := e.Table.Build(e, r.c, b)
	r.reportAll(diags)
	if Failed(diags) {
		e.faulty = true
		r.blamed[e.Name] = true
		r.blameNames(e.fields)
	}
	if set != nil {
		r.c.setters = append(r.c.setters, set)
	}
}

// leans reports whether an element refers to one that was not built.
func (r *reader) leans(e *Element, list []entry) bool {
	for i := range list {
		x := &list[i]
		switch {
		case x.field.Refers == "":
			if x.holdsFields() && r.leans(e, x.list) {
				return true
			}
		case x.field.Type == Name:
			if other := r.c.byName[elementKey(e.domain, x.field.Refers, x.n.text)]; other != nil && other.faulty {
				return true
			}
		case x.field.Type == Names:
			for j := range x.list {
				if other := r.c.byName[elementKey(e.domain, x.field.Refers, x.list[j].n.text)]; other != nil && other.faulty {
					return true
				}
			}
		}
	}
	return false
}

// structure reports the faults of a graph, but for those that may only follow
// from faults already reported.
func (r *reader) structure(err error) {
	var faults *network.Faults
	if !errors.As(err, &faults) {
		r.reportAll(r.c.Explain(err))
		return
	}
	hurt := Failed(r.diags)
	names := make([]string, 0, len(r.c.nodes))
	for _, e := range r.c.Elements {
		if _, ok := r.c.nodes[e.FullName()]; ok {
			names = append(names, e.Name)
		}
	}
	if hurt {
		r.blameNearly(names)
	}
	for _, f := range faults.List {
		if r.full() {
			r.report(Diagnostic{})
			return
		}
		follows := f.Code == network.Empty || f.Code == network.Unconnected || f.Code == network.Undetermined
		if hurt && follows && (r.anything || f.Code == network.Empty || r.touches(f)) {
			continue
		}
		r.report(r.c.fault(f))
	}
}

// blameNearly blames the nodes that a misspelt name in a faulty part may mean.
func (r *reader) blameNearly(nodes []string) {
	var near []string
	for word := range r.blamed {
		if _, ok := r.c.nodes[word]; !ok {
			if n, ok := quantity.Nearest(word, nodes); ok {
				near = append(near, n)
			}
		}
	}
	for _, n := range near { // a set: the order in which it is filled does not matter
		r.blamed[n] = true
	}
}

// touches reports whether a fault is about a node that something faulty names.
func (r *reader) touches(f network.Fault) bool {
	for _, ref := range f.Refs {
		if ref >= 0 && int(ref) < len(r.c.refs) {
			if e := r.c.refs[ref].e; e != nil && r.blamed[e.Name] {
				return true
			}
		}
	}
	return false
}

// remarks warns of what is legal and worth a word.
func (r *reader) remarks(net *network.Network) {
	for _, f := range net.Remarks() {
		d := r.c.fault(f)
		d.Severity = Warning
		r.report(d)
	}
}
