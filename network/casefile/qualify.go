package casefile

import (
	"fmt"
	"strings"

	"lagbook/network"
)

// Names are unique in a domain. Where two domains have a part of one name, it is
// called "thermal:tank" wherever both are in reach: in questions and answers, in
// the network. A colon is no part of a name.

// FullName is the element's name, with its domain before it where another domain
// has a part of that name.
func (e *Element) FullName() string {
	if e.domain == "" {
		return e.Name
	}
	for i := range e.c.voc {
		d := e.c.voc[i].Domain
		if d != "" && d != e.domain && e.c.byName[elementKey(d, "", e.Name)] != nil {
			return e.domain + ":" + e.Name
		}
	}
	return e.Name
}

// Node returns the node of that name in the element's own domain.
func (e *Element) Node(name string) (network.NodeID, bool) {
	if n := e.c.byName[elementKey(e.domain, "", name)]; n != nil {
		name = n.FullName()
	}
	id, ok := e.c.nodes[name]
	return id, ok
}

// domainOf splits "thermal:tank"; the domain is "" where none is named.
func (c *Case) domainOf(name string) (domain, rest string) {
	before, after, ok := strings.Cut(name, ":")
	for i := range c.voc {
		if ok && before != "" && c.voc[i].Domain == before {
			return before, after
		}
	}
	return "", name
}

// parts returns the parts that a name may mean: those of all domains, or that of
// the domain it names.
func (c *Case) parts(name string) []*Element {
	domain, rest := c.domainOf(name)
	var list []*Element
	for i := range c.voc {
		d := c.voc[i].Domain
		if d == "" || domain != "" && d != domain {
			continue
		}
		for _, key := range []elementName{elementKey(d, "", rest), besideKey(d, rest)} {
			if e := c.byName[key]; e != nil {
				list = append(list, e)
			}
		}
	}
	return list
}

// innerNode returns the full name of a node inside a part: "wall.2".
func (c *Case) innerNode(name string) (string, bool) {
	if _, ok := c.nodes[name]; ok {
		return name, true
	}
	domain, rest := c.domainOf(name)
	if dot := strings.LastIndexByte(rest, '.'); domain != "" && dot > 0 {
		if e := c.byName[elementKey(domain, "", rest[:dot])]; e != nil {
			full := e.FullName() + rest[dot:]
			_, ok := c.nodes[full]
			return full, ok
		}
	}
	return "", false
}

// pick returns the one part of a name that fits. Where none does, e is one of
// that name, nil if there is none; where several do, that is reported.
func (r *reader) pick(o owner, n *node, name string, fits func(*Element) bool) (e *Element, ok bool) {
	var fitting []*Element
	list := r.c.parts(name)
	for _, e := range list {
		if fits(e) {
			fitting = append(fitting, e)
		}
	}
	switch {
	case len(fitting) == 1:
		return fitting[0], true
	case len(fitting) > 1:
		r.ambiguous(o, n, name, fitting)
		return fitting[0], false
	case len(list) > 0:
		return list[0], false
	}
	return nil, false
}

// ambiguous reports a name that two domains have.
func (r *reader) ambiguous(o owner, n *node, name string, list []*Element) {
	var words []string
	for _, e := range list {
		words = append(words, quoted(e.FullName()))
	}
	d := Diagnostic{Code: "ambiguous", Thing: o.thing(), Found: name,
		Text: fmt.Sprintf("%s is a name in %s and in %s", quoted(name), list[0].domain, list[1].domain), Hint: "write " + strings.Join(words, " or ")}
	if list[0].domain == list[1].domain {
		d.Text = fmt.Sprintf("%s is %s and %s, and both may be meant here", quoted(name), article(list[0].Table.Name), article(list[1].Table.Name))
		d.Hint = "give one of them another name"
	}
	at := n.span
	if name != n.text {
		at = n.part(strings.LastIndex(n.text, name), len(name))
	}
	r.at(at, d)
}

// isNode is what a node's table is called in every domain.
func (e *Element) isNode() bool { return e.Table.Name == "node" }
