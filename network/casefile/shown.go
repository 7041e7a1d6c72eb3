package casefile

import (
	"fmt"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// measures says what a part's domain carries.
func (r *reader) measures(e *Element) Measures { return r.c.Measures(e.domain) }

// input checks that a name is that of a source or a held node, and returns its
// full name.
func (r *reader) input(o owner, n *node) (string, bool) {
	e, ok := r.pick(o, n, n.text, (*Element).drives)
	switch {
	case ok:
		return e.FullName(), true
	case e != nil && (e.faulty || e.drives()):
		return "", false // it may be an input, or two are, which is reported
	case e != nil:
		r.noInput(o, n, e)
		return "", false
	}
	if r.missing(n.text) {
		return "", false
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: quoted(n.text) + " is not defined", Found: n.text, Want: "a source or a held node"}
	var inputs []string
	for _, e := range r.c.Elements {
		if e.domain != "" && e.drives() {
			inputs = append(inputs, e.FullName())
		}
	}
	if strings.HasPrefix(n.text, "opening of ") {
		d.Code, d.Text = "not-built", quoted(n.text)+" is not known yet: this version does not build it"
	} else if near, ok := quantity.Nearest(n.text, inputs); ok {
		d.Fix = basic(near)
	} else {
		d.Hint = "an input is a source or a held node" + listed(inputs)
	}
	r.at(n.span, d)
	return "", false
}

// noInput reports a part that nothing drives.
func (r *reader) noInput(o owner, n *node, e *Element) {
	d := Diagnostic{Code: "no-input", Thing: o.thing(), Text: fmt.Sprintf("%s is %s, not an input", quoted(n.text), article(e.Table.Name)),
		Hint: "an input is a source or a held node"}
	if e.isNode() {
		d.Text = fmt.Sprintf("node %s is not held: it is not an input", quoted(n.text))
	}
	r.at(n.span, d)
}

// listed adds a few names to a hint.
func listed(names []string) string {
	const most = 8
	if len(names) == 0 {
		return ""
	}
	if len(names) > most {
		return ": " + strings.Join(names[:most], ", ") + ", …"
	}
	return ": " + strings.Join(names, ", ")
}

// drives reports whether an element has a waveform, and so is an input.
func (e *Element) drives() bool {
	for i := range e.fields {
		if e.fields[i].field.Type == Wave {
			return true
		}
	}
	return false
}

// Words that will name other things to show.
var shownNotBuilt = []string{"level of ", "stored of ", "spill of ", "travel of ", "heat of ", "energy of "}

// shown reads what is to be shown: "node", "a - b", "flow of part".
func (r *reader) shown(o owner, n *node) (Shown, bool) {
	s := Shown{Text: n.text, Kind: quantity.Level, Ref: r.c.ref(n.span, o)}
	if a, b, ok := strings.Cut(n.text, " - "); ok && !r.isNode(n.text) {
		return s, r.difference(o, n, &s, strings.TrimSpace(a), strings.TrimSpace(b))
	}
	if part, ok := strings.CutPrefix(n.text, "flow of "); ok && !r.isNode(n.text) {
		e, full, good := r.flow(o, n, strings.TrimSpace(part))
		if s.FlowOf, s.Kind = full, quantity.Plain; e != nil {
			s.Dim = r.measures(e).Flow
		}
		return s, good
	}
	for _, w := range shownNotBuilt {
		if strings.HasPrefix(n.text, w) && !r.isNode(n.text) {
			r.at(n.span, Diagnostic{Code: "not-built", Thing: o.thing(), Text: quoted(strings.TrimSpace(w)) + " is not known yet: this version does not build it"})
			return s, false
		}
	}
	full, e, ok := r.nodeAt(o, n, n.text)
	if s.Node = full; e != nil {
		s.Dim = r.measures(e).Level
	}
	return s, ok
}

// difference reads "a - b".
func (r *reader) difference(o owner, n *node, s *Shown, a, b string) bool {
	var one, other *Element
	var okA, okB bool
	s.Kind = quantity.Difference
	s.Node, one, okA = r.nodeAt(o, n, a)
	s.Minus, other, okB = r.nodeAt(o, n, b)
	if one != nil {
		s.Dim = r.measures(one).Level
	}
	text := ""
	switch {
	case !okA || !okB:
		return false
	case s.Node == s.Minus:
		text = "the difference of " + quoted(s.Node) + " and itself is always 0"
	case one != nil && other != nil && one.domain != other.domain:
		text = fmt.Sprintf("%s and %s are of two domains: their levels have no difference", quoted(a), quoted(b))
	default:
		return true
	}
	r.at(n.span, Diagnostic{Code: "same-name", Thing: o.thing(), Text: text})
	return false
}

// isNode reports whether the case has a node of that name, one inside a part
// included.
func (r *reader) isNode(name string) bool {
	if _, ok := r.c.innerNode(name); ok {
		return true
	}
	for _, e := range r.c.parts(name) {
		if e.isNode() {
			return true
		}
	}
	return false
}

// nodeAt checks the name of a node that stands in a text, and returns its full
// name and the element it is, or lies in.
func (r *reader) nodeAt(o owner, n *node, name string) (full string, e *Element, ok bool) {
	e, ok = r.pick(o, n, name, (*Element).isNode)
	switch {
	case ok:
		return e.FullName(), e, true
	case e != nil && e.isNode():
		return "", e, false // there are two: reported
	}
	if full, ok := r.c.innerNode(name); ok {
		return full, r.around(full), true
	}
	r.noNode(o, n, name, e)
	return "", e, false
}

// around returns the part that a node lies in.
func (r *reader) around(node string) *Element {
	if dot := strings.LastIndexByte(node, '.'); dot > 0 {
		if e, ok := r.c.Part(node[:dot]); ok {
			return e
		}
	}
	return nil
}

// noNode reports a name that is no node; e is the part of that name, nil if none.
func (r *reader) noNode(o owner, n *node, name string, e *Element) {
	if dot := strings.LastIndexByte(name, '.'); dot > 0 {
		if e, ok := r.c.Part(name[:dot]); ok && e.faulty {
			return // a node inside a part that could not be built
		}
	}
	if e == nil && r.missing(name) {
		return
	}
	at := n.part(strings.Index(n.text, name), len(name))
	whole := name == n.text || at == n.span
	fix := func(better string) string {
		if whole {
			return basic(strings.Replace(n.text, name, better, 1))
		}
		return better
	}
	if whole {
		at = n.span
	}
	if e != nil {
		d := Diagnostic{Code: "wrong-part", Thing: o.thing(), Text: fmt.Sprintf("%s is %s, not a node", quoted(name), article(e.Table.Name))}
		if name == n.text && r.flows(e.FullName()) {
			d.Fix = basic("flow of " + name)
		}
		r.at(at, d)
		return
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "node " + quoted(name) + " is not defined", Found: name, Want: "a node"}
	names := r.nodeNames()
	near, ok := quantity.Nearest(name, names)
	if domain, rest := r.c.domainOf(name); domain != "" && !ok {
		near, ok = quantity.Nearest(rest, names)
		near = domain + ":" + near
	}
	if ok {
		d.Fix = fix(near)
	} else {
		d.Hint = "the nodes are" + strings.TrimPrefix(listed(names), ":")
	}
	r.at(at, d)
}

// nodeNames lists the nodes in file order, then those inside parts.
func (r *reader) nodeNames() []string {
	var names []string
	own := map[string]bool{}
	for _, e := range r.c.Elements {
		if e.domain != "" && e.isNode() {
			names = append(names, e.FullName())
			own[e.FullName()] = true
		}
	}
	if r.c.net != nil {
		for _, name := range r.c.net.Nodes() {
			if !own[name] {
				names = append(names, name)
			}
		}
	}
	return names
}

// flow checks the name of a part whose flow is asked for, and returns the part
// and its full name.
func (r *reader) flow(o owner, n *node, name string) (*Element, string, bool) {
	at := n.part(strings.LastIndex(n.text, name), len(name))
	e, ok := r.pick(o, n, name, func(e *Element) bool { return r.c.net == nil || e.faulty || r.flows(e.FullName()) })
	switch {
	case ok:
		return e, e.FullName(), true
	case e != nil && (r.c.net == nil || r.flows(e.FullName())):
		return e, "", false // there are two: reported
	case e != nil:
		r.at(at, Diagnostic{Code: "no-flow", Thing: o.thing(), Text: fmt.Sprintf("%s is %s, whose flow cannot be shown", quoted(name), article(e.Table.Name)),
			Hint: "shown is the flow of a part between two nodes, of a source, or into a held node"})
		return e, "", false
	}
	if r.missing(name) {
		return nil, "", false
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: quoted(name) + " is not defined", Found: name, Want: "a part between two nodes"}
	var parts []string
	for _, e := range r.c.Elements {
		if e.domain != "" && !e.isNode() && (r.c.net == nil || r.flows(e.FullName())) {
			parts = append(parts, e.FullName())
		}
	}
	_, place, atPlace := strings.Cut(name, " at ")
	near, ok := quantity.Nearest(name, parts)
	switch {
	case atPlace && place != "":
		d = Diagnostic{Code: "not-built", Thing: o.thing(), Text: "the flow at one end, " + quoted("flow of … at …") + ", is not known yet: this version does not build it",
			Hint: "the flow of a part is read at its first-named end"}
	case ok && at == n.span:
		d.Fix = basic("flow of " + near)
	case ok:
		d.Fix = near
	case len(parts) > 0:
		d.Hint = "parts with a flow" + listed(parts)
	}
	r.at(at, d)
	return nil, "", false
}

// flows reports whether the network has a flow under a full name: that of a
// branch, of a source, or what a held node is supplied with.
func (r *reader) flows(name string) bool {
	if r.c.net == nil {
		return false
	}
	if r.branches == nil {
		r.branches = map[string]bool{}
		for _, b := range r.c.net.Branches() {
			if b.Kind == network.ResistanceBranch || b.Kind == network.InertanceBranch {
				r.branches[b.Name] = true
			}
		}
		for _, in := range r.c.net.Inputs() {
			r.branches[in.Name] = true
		}
	}
	return r.branches[name]
}
