package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// Given values of a use are values of their own, "c.r_cell" in Case.Given: what set says,
// else what the part says. In the part they go before those of the case. An expression in
// set is one outside the part: set = { r = "= 2 * r" } doubles the r around.

// givenIndex finds a given value as the part of a use names it: its own, then those of
// the parts around.
func (u *use) givenIndex(name string) (int, bool) {
	for ; u != nil; u = u.outer {
		if i, ok := u.given[name]; ok {
			return i, true
		}
	}
	return 0, false
}

// givenNames lists the given values that a part sees beside those of the case.
func (u *use) givenNames() []string {
	var names []string
	for ; u != nil; u = u.outer {
		for i := range u.set {
			names = append(names, u.set[i].name)
		}
		for i := range u.part.given {
			names = append(names, u.part.given[i].name)
		}
	}
	return names
}

// usesGiven reads the given values of all uses, those of the use around first.
func (r *reader) usesGiven() {
	for _, u := range r.c.uses {
		r.useGiven(u)
	}
	r.scope = nil
}

// useGiven reads those of one.
func (r *reader) useGiven(u *use) {
	first := len(r.c.givens)
	for i := range u.set {
		if s := &u.set[i]; r.settable(u, s) {
			r.addUseGiven(u, s, u.outer)
		}
	}
	var over []*stated // that set says otherwise
	for i := range u.part.given {
		s := &u.part.given[i]
		if _, ok := u.given[s.name]; ok {
			over = append(over, s)
			continue
		}
		r.addUseGiven(u, s, u)
	}
	for i := first; i < len(r.c.givens); i++ {
		if r.scope = r.c.givens[i].scope; !r.c.givens[i].bad {
			r.compileGiven(i)
		}
	}
	state := make([]weighing, len(r.c.givens)-first)
	for i := first; i < len(r.c.givens); i++ {
		r.settle(i, first, state)
	}
	for i := range u.set {
		if at, ok := u.given[u.set[i].name]; ok {
			r.alike(u, &u.set[i], at)
		}
	}
	for _, s := range over {
		r.partValue(u, s) // is read all the same, for its faults
	}
}

// addUseGiven adds one, compiled with the names of scope.
func (r *reader) addUseGiven(u *use, s *stated, scope *use) {
	i := len(r.c.givens)
	u.given[s.name] = i
	source := s.source
	switch {
	case source != "":
	case scope == u:
		source = u.part.source
	default:
		source = u.source
	}
	r.c.givens = append(r.c.givens, given{n: s.n, key: s.key, use: u, scope: scope, bad: s.bad})
	r.known = append(r.known, quantity.Value{})
	r.c.Given = append(r.c.Given, Given{Name: u.in(s.name), Text: s.n.text, Source: source, Use: u.name, Used: true})
	r.c.Given[i].Ref = r.c.ref(s.key, r.c.givenOwner(i))
}

// givenOwner is a given value as the owner of what it states: one of a use is what set
// states, or stands in the part.
func (c *Case) givenOwner(i int) owner {
	g := &c.givens[i]
	if g.use == nil || g.scope == g.use {
		return owner{label: "given " + quoted(c.Given[i].Name) + g.use.said()}
	}
	return owner{label: g.use.owner().label + ": set " + brief(strings.TrimPrefix(c.Given[i].Name, g.use.name+"."))}
}

// settable checks the name of a value in set: one that something in the part uses.
func (r *reader) settable(u *use, s *stated) bool {
	o := u.owner()
	if !r.givenName(o, s) {
		return false
	}
	if _, ok := u.given[s.name]; ok { // a.b beside "a.b"
		r.at(s.key, Diagnostic{Code: "defined-twice", Thing: o.thing(), Text: "set states " + quoted(s.name) + " twice"})
		return false
	}
	if _, ok := r.givenIndex[u.in(s.name)]; ok {
		r.at(s.key, Diagnostic{Code: "defined-twice", Thing: o.thing(), Text: "set makes the given value " + quoted(u.in(s.name)) + ", which [given] defines too", Hint: "give one of them another name"})
		return true // what uses it in the part is not at fault
	}
	if r.mentions(u.part, s.name) {
		return true
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "set: nothing in " + u.part.words + " uses " + quoted(s.name), Found: s.name}
	for _, g := range u.part.given {
		if g.name == s.name {
			d.Hint = "it is given in the part, and no expression there holds it"
		}
	}
	if near, ok := quantity.Nearest(s.name, r.settableNames(u)); ok && d.Hint == "" {
		d.Fix = near
	}
	r.at(s.key, d)
	return false
}

// settableNames lists what set of a use may state and does not.
func (r *reader) settableNames(u *use) []string {
	var names []string
	add := func(name string) {
		for i := range u.set {
			if u.set[i].name == name {
				return
			}
		}
		if r.mentions(u.part, name) {
			names = append(names, name)
		}
	}
	for i := range u.part.given {
		add(u.part.given[i].name)
	}
	for _, name := range u.outer.givenNames() {
		add(name)
	}
	for i := range r.c.Given {
		if r.c.Given[i].Use == "" {
			add(r.c.Given[i].Name)
		}
	}
	return names
}

// mentions reports whether an expression in a part holds a name, in the parts that it
// uses too.
func (r *reader) mentions(p *part, name string) bool {
	if p.mentioned == nil {
		p.mentioned = map[string]bool{}
		p.key.value.mention(p.mentioned)
		for _, k := range p.uses {
			if n := k.value.get("part"); n != nil && r.parts[n.text] != nil {
				inner := r.parts[n.text]
				r.mentions(inner, "")
				for word := range inner.mentioned {
					p.mentioned[word] = true
				}
			}
		}
	}
	return p.mentioned[name]
}

// mention notes the words of the expressions below a node. Units are among them: more is
// noted than there is.
func (n *node) mention(words map[string]bool) {
	if n.kind == kindString && strings.HasPrefix(strings.TrimLeft(n.text, " \t"), "=") {
		for _, word := range strings.FieldsFunc(n.text, func(c rune) bool { return !wordRune(c) }) {
			words[word] = true
		}
	}
	for _, item := range n.items {
		item.mention(words)
	}
	if n.table != nil {
		for i := range n.table.keys {
			n.table.keys[i].value.mention(words)
		}
	}
}

// wordRune reports what a given name is made of.
func wordRune(c rune) bool {
	return c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c >= '0' && c <= '9' || c == '_' || c == '.'
}

// settle reckons a given value of a use after those of the same use that it needs.
func (r *reader) settle(i, first int, state []weighing) {
	switch state[i-first] {
	case gone:
		return
	case going:
		g := &r.c.givens[i]
		if !g.bad {
			r.scope = g.use
			r.at(g.n.span, Diagnostic{Code: "cycle", Thing: r.c.givenOwner(i).thing(), Text: "depends on itself", Hint: "give it a value"})
		}
		g.bad = true
		return
	}
	state[i-first] = going
	for _, at := range r.c.givens[i].uses {
		if at >= first {
			r.settle(at, first, state)
		}
	}
	state[i-first] = gone
	r.scope = r.c.givens[i].scope
	r.evalGiven(i)
	for _, at := range r.c.givens[i].uses {
		r.use(at)
	}
	r.c.givens[i].used = true
	r.c.order = append(r.c.order, i)
}

// alike checks that what set states has the dimension of the given value in whose place
// it stands: that of the part, else that of the case.
func (r *reader) alike(u *use, s *stated, at int) {
	g := &r.c.givens[at]
	if g.bad {
		return
	}
	like, ok := r.unset(u, s.name)
	if !ok {
		return
	}
	kind := quantity.Plain
	if like.Dim == dimKelvin {
		kind = like.Kind
	}
	if g.value.Dim == like.Dim && like.Dim != dimKelvin {
		return
	}
	if _, err := g.value.Want(like.Dim, kind); err != nil {
		r.scope = u.outer
		r.report(r.c.dimension(u.owner(), s.n, &Field{Name: "set " + s.name}, err))
		g.bad = true
	}
}

// unset returns what a given value would be if a use did not set it.
func (r *reader) unset(u *use, name string) (v quantity.Value, ok bool) {
	for i := range u.part.given {
		if s := &u.part.given[i]; s.name == name {
			return r.partValue(u, s)
		}
	}
	at, ok := u.outer.givenIndex(name)
	if !ok {
		at, ok = r.givenIndex[name]
	}
	if !ok || r.c.givens[at].bad {
		return v, false
	}
	return r.c.givens[at].value, true
}

// partValue reads what the part says of a given value that a use sets.
func (r *reader) partValue(u *use, s *stated) (quantity.Value, bool) {
	if s.bad {
		return quantity.Value{}, false
	}
	r.scope = u
	_, v, ok := r.quantity(owner{label: "given " + quoted(u.in(s.name)) + u.said()}, s.n, nil)
	return v, ok
}

// setBy says which use sets a given value that a number in a part is made of, "" for none.
func (c *Case) setBy(s *slot) string {
	if s.expr == nil {
		return ""
	}
	for _, i := range s.expr.Uses() {
		if i >= len(c.givens) {
			continue // a profile
		}
		if g := &c.givens[i]; g.use != nil && g.scope != g.use {
			return fmt.Sprintf("%s sets %s on line %d", useLabel(g.use.name), strings.TrimPrefix(c.Given[i].Name, g.use.name+"."), c.src.place(Diagnostic{}, g.key).Line)
		}
	}
	return ""
}
