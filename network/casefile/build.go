package casefile

import (
	"errors"
	"strings"

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
		r.remarks(net)
		return
	}
	r.structure(err)
}

func (r *reader) buildOne(e *Element, b *network.Builder) {
	if e.faulty || r.leans(e, e.fields) {
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
			if (x.field.Type == Group || x.field.Type == Groups) && r.leans(e, x.list) {
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

// Words for the codes of package network; the codes themselves are numbers.
var faultWords = map[network.FaultCode]struct{ code, hint string }{
	network.Empty:            {"empty", "add a node"},
	network.Unconnected:      {"unconnected", "join it to another node, or remove it"},
	network.SelfLoop:         {"self-loop", ""},
	network.HeldTwice:        {"held-twice", ""},
	network.Undetermined:     {"undetermined", "give one of them a capacitance, hold it, or join it to a node that has either"},
	network.BadNumber:        {"range", ""},
	network.Unbalanced:       {"unbalanced", "what enters a node in streams must leave it, and the other way round"},
	network.SingularMassless: {"singular", "give the node a capacitance"},
	network.FlippedMassless:  {"singular", "give the node a capacitance"},
	network.OutOfRange:       {"range", ""},
	network.StartOfNoStore:   {"start-of-no-store", "only a node with a capacitance has a start of its own"},
	network.HeldCapacity:     {"held-capacity", ""},
	network.NoEffect:         {"no-effect", ""},
}

// fault turns a fault of the network into a diagnostic with a place.
func (c *Case) fault(f network.Fault) Diagnostic {
	w, ok := faultWords[f.Code]
	if !ok {
		w.code = "network"
	}
	ref := network.NoRef
	for _, candidate := range f.Refs {
		if candidate >= 0 {
			ref = candidate
			break
		}
	}
	if f.Code == network.Empty {
		w.hint += c.likeNode()
	}
	d := c.Diagnose(ref, w.code, f.Text, c.inWords(ref, w.hint))
	d.Thing = "" // the text names the parts
	return d
}

// likeNode shows how a node is written.
func (c *Case) likeNode() string {
	for i := range c.voc {
		if d := c.voc[i].Domain; d != "" {
			return ", like [" + d + ".node.NAME]"
		}
	}
	return ""
}

// inWords puts a hint about a capacitance in the words of the domain it is about.
func (c *Case) inWords(ref network.Ref, hint string) string {
	if ref >= 0 && int(ref) < len(c.refs) && c.refs[ref].e != nil {
		if key := c.Measures(c.refs[ref].e.domain).StoreKey; key != "" {
			return strings.ReplaceAll(hint, "capacitance", key)
		}
	}
	return hint
}

// remarks warns of what is legal and worth a word.
func (r *reader) remarks(net *network.Network) {
	for _, f := range net.Remarks() {
		d := r.c.fault(f)
		d.Severity = Warning
		r.report(d)
	}
}

// Explain turns an error of network, or of a setter, into diagnostics with
// places. An error that knows no place becomes one about the whole case.
func (c *Case) Explain(err error) []Diagnostic {
	if err == nil {
		return nil
	}
	if many, ok := err.(interface{ Unwrap() []error }); ok {
		var list []Diagnostic
		for _, e := range many.Unwrap() {
			list = append(list, c.Explain(e)...)
		}
		return inFileOrder(list)
	}
	var (
		one    Diagnostic
		faults *network.Faults
		params *network.ParamFault
		steady *network.NoSteady
		cycle  *network.NoCycle
		list   []Diagnostic
	)
	switch {
	case errors.As(err, &one):
		return []Diagnostic{one}
	case errors.As(err, &faults):
		for _, f := range faults.List {
			list = append(list, c.fault(f))
		}
	case errors.As(err, &params):
		for _, f := range params.List {
			list = append(list, c.fault(f))
		}
	case errors.As(err, &steady):
		for _, f := range steady.List {
			g := network.Fault{Refs: f.Refs, Text: f.Text}
			d := c.fault(g)
			d.Code, d.Hint = "no-steady-state", `state where it starts with [run] start, or start at the nodes`
			list = append(list, d)
		}
	case errors.As(err, &cycle):
		d := c.fault(network.Fault{Refs: cycle.Refs, Text: "there is no steady cycle: " + cycle.Text})
		d.Code, d.Hint = "no-cycle", ""
		list = append(list, d)
	default:
		return []Diagnostic{{File: c.File, Code: "not-computed", Text: err.Error()}}
	}
	return inFileOrder(list)
}
