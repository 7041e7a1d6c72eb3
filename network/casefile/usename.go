package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// Names in a part mean what is in the part first. What is not is a port where it names
// a node; anything else, a stream that a passage lies along, is looked for around.

// An alias is a name in a part as it is written there, kept under the node that has
// taken its place and holds the full name.
type alias struct {
	text string
	port bool
}

// resolve returns the full name that a name in the part of a use stands for, and
// whether it goes through a port. Of a port that is not joined the name is "".
func (u *use) resolve(domain, table, name string) (full string, through bool) {
	switch {
	case u == nil:
		return name, false
	case u.part.names[domain][name] || u.inUse(name):
		return u.in(name), false
	case table == "node":
		j := u.joinOf(name)
		if j == nil {
			return "", true
		}
		full, _ = u.outer.resolve(domain, table, bareIn(domain, j.n.text))
		return full, true
	}
	return u.outer.resolve(domain, table, name)
}

// bareIn takes "thermal:" off a name.
func bareIn(domain, name string) string { return strings.TrimPrefix(name, domain+":") }

// inUse reports whether a name is that of something in a use within the part: "x.out".
func (u *use) inUse(name string) bool {
	return begun(name, u.part.inner)
}

// lodge makes an element of a part one of the use: its names are those of the case, and
// where it states no source its data come from where those of the use or the part do.
func (r *reader) lodge(e *Element) {
	r.rename(e, e.fields)
	for u := e.use; u != nil && e.source == ""; u = u.outer {
		if e.source = u.source; e.source == "" {
			e.source = u.part.source
		}
	}
}

// rename puts the full names in the place of those that an element in a part refers to.
func (r *reader) rename(e *Element, list []entry) {
	for i := range list {
		x := &list[i]
		switch {
		case x.n == nil:
		case x.holdsFields():
			r.rename(e, x.list)
		case x.field.Refers == "":
		case x.field.Type == Name:
			x.n = r.renamed(e, x.field, x.n)
		case x.field.Type == Names:
			all := *x.n
			all.items = nil
			for j := range x.list {
				x.list[j].n = r.renamed(e, x.field, x.list[j].n)
				all.items = append(all.items, x.list[j].n)
			}
			x.n = &all
			r.apart(e, x)
		}
	}
}

// renamed returns a node with the full name of what a name in a part stands for.
func (r *reader) renamed(e *Element, f *Field, n *node) *node {
	if n.kind != kindString || n.text == "" {
		return n
	}
	full, through := e.use.resolve(e.domain, f.Refers, n.text)
	if through {
		e.use.ask(port{e.domain, n.text, e, owner{e: e}, n})
	}
	if full == "" {
		full = e.use.in(n.text) // reported as a port that is not joined
	}
	other := *n
	other.text, other.exact = full, false
	if r.alias == nil {
		r.alias = map[*node]alias{}
	}
	r.alias[&other] = alias{n.text, through}
	return &other
}

// apart checks that the two ends of an element that differ in the part do so in the case.
func (r *reader) apart(e *Element, x *entry) {
	if !different(x.field) || len(x.list) != 2 || x.list[0].n.text != x.list[1].n.text {
		return
	}
	a, b := r.alias[x.list[0].n], r.alias[x.list[1].n]
	if !b.port {
		a, b = b, a
	}
	j := e.use.joinOf(b.text)
	if a.text == b.text || j == nil {
		return
	}
	e.faulty = true
	r.at(j.n.span, Diagnostic{Code: "same-name", Thing: e.use.owner().thing(),
		Text: fmt.Sprintf("both ends of %s, %s and %s, become one node", e.use.outside(e.Thing()), quoted(a.text), quoted(b.text))})
}

// ask notes a port, and that of the part around which it is joined to.
func (u *use) ask(p port) {
	for ; u != nil && !u.part.names[p.domain][p.name] && !u.inUse(p.name); u = u.outer {
		at := [2]string{p.domain, p.name}
		if u.asked[at] {
			return
		}
		u.asked[at] = true
		u.ports = append(u.ports, p)
		j := u.joinOf(p.name)
		if j == nil {
			return
		}
		p.name, p.owner, p.n = bareIn(p.domain, j.n.text), u.owner(), j.n
	}
}

// inScope is what a text in a part may name, whatever it is.
func (r *reader) inScope(text string) string {
	u := r.scope
	if u == nil {
		return text
	}
	for i := range r.voc {
		if d := r.voc[i].Domain; u.part.names[d][text] {
			return u.in(text)
		}
	}
	if j := u.joinOf(text); j != nil {
		return j.n.text
	}
	return text
}

// existsInUse checks one name in a part.
func (r *reader) existsInUse(e *Element, table string, n *node) bool {
	as := r.alias[n]
	other := r.c.byName[elementKey(e.domain, table, n.text)]
	switch {
	case other != nil && other.Table.Name == table:
		return true
	case as.port, r.second[tablePath(e.domain, table)+"."+n.text]:
		return false // reported where it is joined, or where the name is taken
	case other != nil:
		r.at(n.span, Diagnostic{Code: "wrong-part", Thing: e.Thing(), Found: as.text, Want: article(table),
			Text: fmt.Sprintf("%s is %s, not %s", quoted(as.text), article(other.Table.Name), article(table))})
		return false
	case r.missing(n.text):
		return false
	}
	d := Diagnostic{Code: "unknown-name", Thing: e.Thing(), Text: table + " " + quoted(as.text) + " is not defined", Found: as.text, Want: article(table)}
	if near, ok := quantity.Nearest(as.text, r.seenFrom(e.use, e.domain, table)); ok {
		d.Fix = basic(near)
	} else {
		d.Hint = fmt.Sprintf("add [part.%s.%s.%s]", tomlKey(e.use.part.name), tablePath(e.domain, table), tomlKey(as.text))
	}
	r.anything = true
	r.at(n.span, d)
	return false
}

// seenFrom lists the elements of a table as a part names them: its own, then, but for
// nodes, those around.
func (r *reader) seenFrom(u *use, domain, table string) []string {
	all := r.namesOf(domain, table)
	var names []string
	for ; u != nil; u = u.outer {
		for _, name := range all {
			if own, ok := strings.CutPrefix(name, u.name+"."); ok {
				names = append(names, own)
			}
		}
		if table == "node" {
			return names
		}
	}
	return append(names, all...)
}
