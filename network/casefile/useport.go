package casefile

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/network/quantity"
)

// A use joins every port of its part, and nothing else. Which ports there are shows when
// the part has been read; what they are joined to, when all parts have.

// ports checks what a use joins against the ports that its part has: every one, and
// none more.
func (r *reader) ports(u *use) {
	r.scope = u.outer
	defer func() { r.scope = nil }()
	misspelt := map[string]bool{}
	for i := range u.joins {
		j := &u.joins[i]
		if r.asks(u, j.name) || u.hurt && u.part.key.value.holds(j.name) {
			continue // a part at fault may have meant it
		}
		r.noPort(u, j, misspelt)
	}
	for _, p := range u.ports {
		if j := u.joinOf(p.name); j == nil && !misspelt[p.name] {
			r.notJoined(u, p)
		}
	}
}

// asks reports whether the part of a use has a port, in any domain.
func (r *reader) asks(u *use, name string) bool {
	return slices.ContainsFunc(r.voc, func(v Vocabulary) bool { return u.asked[[2]string{v.Domain, name}] })
}

// holds reports whether a text stands somewhere below a node.
func (n *node) holds(text string) bool {
	if n.kind == kindString && n.text == text {
		return true
	}
	for _, item := range n.items {
		if item.holds(text) {
			return true
		}
	}
	if n.table != nil {
		for i := range n.table.keys {
			if n.table.keys[i].value.holds(text) {
				return true
			}
		}
	}
	return false
}

// noPort reports a key of join that is no port.
func (r *reader) noPort(u *use, j *stated, misspelt map[string]bool) {
	if r.full() {
		r.report(Diagnostic{})
		return
	}
	d := Diagnostic{Code: "unknown-name", Thing: u.owner().thing(), Text: quoted(j.name) + " is not a port of " + u.part.words, Found: j.name, Want: "a port"}
	var open, ports []string
	for _, p := range u.ports {
		if ports = append(ports, p.name); u.joinOf(p.name) == nil {
			open = append(open, p.name)
		}
	}
	ports = distinct(ports)
	near, ok := quantity.Nearest(j.name, open)
	switch {
	case ok:
		d.Fix = tomlKey(near)
		misspelt[near] = true
	case r.ownNode(u, j.name):
		d.Text = quoted(j.name) + " is defined in " + u.part.words + ": it is no port"
	case ports == nil:
		d.Hint = "it has none: a port is a node that the part names and does not define"
	default:
		d.Hint = "its ports are" + strings.TrimPrefix(listed(ports), ":")
	}
	r.blame(j.n)
	r.at(j.key, d)
}

// ownNode reports whether a part defines something of that name.
func (r *reader) ownNode(u *use, name string) bool {
	for i := range r.voc {
		if u.part.names[r.voc[i].Domain][name] {
			return true
		}
	}
	return false
}

// notJoined reports a port without a join: a name misspelt in the part, where no use of
// it joins such a port and a node in it is called nearly so.
func (r *reader) notJoined(u *use, p port) {
	r.anything = true
	if p.e.faulty = true; r.silentPort(u, p) {
		return
	}
	r.blamed[p.e.Name] = true
	if r.full() {
		r.report(Diagnostic{})
		return
	}
	joined := slices.ContainsFunc(r.c.uses, func(v *use) bool { return v.part == u.part && v.joinOf(p.name) != nil })
	seen := r.seenFrom(u, p.domain, "node")
	for _, q := range u.ports {
		if q.domain == p.domain && u.joinOf(q.name) != nil {
			seen = append(seen, q.name)
		}
	}
	near, ok := quantity.Nearest(p.name, seen)
	if ok && !joined {
		r.scope = u
		r.at(p.n.span, Diagnostic{Code: "unknown-name", Thing: p.owner.thing(), Text: "node " + quoted(p.name) + " is not defined in the part", Found: p.name, Want: "a node",
			Fix: basic(near), Hint: "a node outside the part is joined by each use"})
		r.scope = u.outer
		return
	}
	d := Diagnostic{Code: "missing-key", Thing: u.owner().thing(), Text: fmt.Sprintf("port %s of %s is not joined", quoted(p.name), u.part.words)}
	at := u.key
	line := tomlKey(p.name) + ` = "the name of a node"`
	if r.c.byName[elementKey(p.domain, "node", u.outer.in(p.name))] != nil {
		line = tomlKey(p.name) + " = " + basic(p.name)
	}
	if d.Hint = "add join = { " + line + " }"; u.join != nil {
		at, d.Hint = u.join.span, "add "+line
	}
	r.at(at, d)
}

// silentPort reports whether a port of that name is reported for another domain.
func (r *reader) silentPort(u *use, p port) bool {
	for _, q := range u.ports {
		if q.name == p.name {
			return q.domain != p.domain
		}
	}
	return false
}

// joins checks that what ports are joined to are nodes. It is asked when all elements
// are known.
func (r *reader) joins() {
	for _, u := range r.c.uses {
		r.scope = u.outer
		for _, p := range u.ports {
			if j := u.joinOf(p.name); j != nil {
				r.joinedTo(u, p, j)
			}
		}
	}
	r.scope = nil
}

// joinedTo checks one.
func (r *reader) joinedTo(u *use, p port, j *stated) {
	bare := bareIn(p.domain, j.n.text)
	full, through := u.outer.resolve(p.domain, "node", bare)
	if through {
		return // a port of the part around: checked there
	}
	e := r.c.byName[elementKey(p.domain, "node", full)]
	if e != nil && e.isNode() || r.missing(full) {
		return
	}
	if r.full() {
		r.report(Diagnostic{})
		return
	}
	o := u.owner()
	if e != nil {
		r.at(j.n.span, Diagnostic{Code: "wrong-part", Thing: o.thing(), Found: bare, Want: "a node", Text: fmt.Sprintf("%s is %s, not a node", quoted(bare), article(e.Table.Name))})
		return
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "node " + quoted(j.n.text) + " is not defined", Found: j.n.text, Want: "a node"}
	names := r.namesOf(p.domain, "node")
	if u.outer != nil {
		names = r.seenFrom(u.outer, p.domain, "node")
	}
	if near, ok := quantity.Nearest(bare, names); ok {
		d.Fix = basic(near)
		r.blamed[u.outer.in(near)] = true
	} else if r.anything = true; names != nil {
		d.Hint = "the nodes are" + strings.TrimPrefix(listed(names), ":")
	}
	r.at(j.n.span, d)
}
