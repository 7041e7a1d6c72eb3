package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// measures says what a part's domain carries.
func (r *reader) measures(e *Element) Measures { return r.c.Measures(e.domain) }

// shown reads what is to be shown: "node", "a - b", "flow of part", "level of part".
func (r *reader) shown(o owner, n *node) (Shown, bool) {
	s := Shown{Text: n.text, Kind: quantity.Level, Ref: r.c.ref(n.span, o)}
	if is, ok := r.resultShown(o, n, &s); is {
		return s, ok
	}
	if a, b, ok := strings.Cut(n.text, " - "); ok && !r.isNode(n.text) {
		return s, r.difference(o, n, &s, strings.TrimSpace(a), strings.TrimSpace(b))
	}
	if word, part, ok := r.asReading(n.text); ok && !r.isNode(n.text) {
		return s, r.reading(o, n, &s, word, part)
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
	for _, half := range []string{a, b} {
		_, result := r.resultIndex[half]
		if _, _, ok := r.asReading(half); (ok || result) && !r.isNode(half) {
			r.at(n.part(strings.Index(n.text, half), len(half)), Diagnostic{Code: "kinds", Thing: o.thing(),
				Text: quoted(half) + " is no node: a difference is one of two nodes",
				Hint: `show each by itself, or write a result: [result.NAME] expression = "= ` + operandText(a) + " - " + operandText(b) + `"`})
			return false
		}
	}
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
	if r.full() {
		r.report(Diagnostic{})
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
		if has := e.readings(); name == n.text && len(has) > 0 {
			d.Fix = basic(has[0] + " of " + name)
		}
		r.at(at, d)
		return
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "node " + quoted(name) + " is not defined", Found: name, Want: "a node"}
	names := r.nodeNames()
	if whole {
		names = append(names, r.resultNames()...)
	}
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
