package casefile

import (
	"strings"

	"lagbook/network/quantity"
)

// nameProfiles gathers the names of [profile], before anything that may use one is read.
func (r *reader) nameProfiles(k *key) {
	r.c.profileIndex = map[string]int{}
	if k == nil {
		return
	}
	if k.value.kind != kindTable {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "tables like [profile.NAME]")
		return
	}
	r.collectProfiles(k.value, "")
}

// collectProfiles gathers the profiles under a table; [profile.a.b] makes the name "a.b".
func (r *reader) collectProfiles(n *node, prefix string) {
	for i := range n.table.keys {
		k := &n.table.keys[i]
		name := prefix + k.name
		if holdsProfiles(k.value) {
			r.collectProfiles(k.value, name+".")
			continue
		}
		o := owner{label: "profile " + quoted(name)}
		if !r.goodName(k, name, "the name of a profile") {
			continue
		}
		if first, ok := r.c.profileIndex[name]; ok {
			r.at(k.span, Diagnostic{Code: "defined-twice", Text: o.label + " is defined twice, first on line " + r.line(r.c.profiles[first].key)})
			continue
		}
		r.c.profileIndex[name] = len(r.c.profiles)
		p := profile{name: name, n: k.value, key: k.span, owner: o, wave: noSlot, ref: r.c.ref(k.span, o)}
		if s := k.value.get("source"); s != nil && s.kind == kindString {
			p.source = s.text
		}
		r.c.profiles = append(r.c.profiles, p)
	}
}

// holdsProfiles tells the table that [profile.a.b] makes of a from a profile.
func holdsProfiles(n *node) bool {
	if n.kind != kindTable || n.table.made != byPath && n.table.made != byDots {
		return false
	}
	for i := range n.table.keys {
		k := &n.table.keys[i]
		_, near := quantity.Nearest(k.name, profileKeys)
		if contains(profileKeys, k.name) || near && k.value.kind != kindTable {
			return false
		}
	}
	return true
}

// profileKeys are the keys of a table that is a profile.
var profileKeys = append([]string{"value", "source", "time", "column", "repeat", "before"}, waveForms[0]...)

// clashes reports profiles that have the name of a given value, at the later of both.
func (r *reader) clashes() {
	for i := range r.c.profiles {
		p := &r.c.profiles[i]
		g, ok := r.givenIndex[p.name]
		if !ok {
			continue
		}
		p.bad = true
		at, first, other := p.key, r.c.givens[g].key, "given"
		thing := p.owner.label
		if at.at < first.at {
			at, first, other, thing = first, at, "profile", "given "+quoted(p.name)
		}
		r.at(at, Diagnostic{Code: "defined-twice", Thing: thing, Text: "the name is taken by the " + other + " on line " + r.line(first),
			Hint: "given values and profiles share one set of names, since expressions use both"})
	}
}

// readProfiles reads all profiles, each after those it is made of.
func (r *reader) readProfiles() {
	r.clashes()
	r.c.curves = make([]*curve, len(r.c.profiles))
	for i := range r.c.profiles {
		r.profile(i, nil)
	}
}

// profile reads one; path are the profiles that are waiting for it.
func (r *reader) profile(i int, path []int) {
	p := &r.c.profiles[i]
	if p.state != unread {
		return
	}
	p.state = beingRead
	path = append(path, i)
	p.uses = r.madeOf(p.n)
	for _, u := range p.uses {
		switch r.c.profiles[u].state {
		case unread:
			r.profile(u, path)
		case beingRead:
			r.profileCycle(path, u)
		}
		p.bad = p.bad || r.c.profiles[u].bad
	}
	p.state = profileRead
	if p.bad {
		return
	}
	f := fielder{r: r, o: p.owner, word: "profile", header: p.key, profile: i + 1}
	ok := false
	if p.field, ok = f.profileField(p.n); ok {
		p.wave, _, ok = f.wave(p.n, p.field)
	}
	if p.bad = !ok; ok {
		p.kind = p.field.Kind
		if p.kind == quantity.Level && p.field.Dim == dimPressure {
			p.kind = r.c.Pressures.Kind()
		}
	}
}

// madeOf lists the profiles in the expression that stands for one; what is wrong with
// it is reported where it is read.
func (r *reader) madeOf(n *node) []int {
	n = expressionNode(n)
	if n == nil || !r.waveText(n) {
		return nil
	}
	expr, err := quantity.Compile(n.text, r.waveName)
	if err != nil {
		return nil
	}
	_, profiles := parted(expr)
	return profiles
}

// expressionNode returns the text that may be the expression of a waveform, nil for none.
func expressionNode(n *node) *node {
	if n.kind == kindTable {
		for _, name := range []string{"value", "expression"} {
			if x := n.get(name); x != nil {
				return expressionNode(x)
			}
		}
	}
	if n.kind != kindString {
		return nil
	}
	return n
}

// profileCycle reports the profiles from first on the path, which depend on themselves.
func (r *reader) profileCycle(path []int, first int) {
	at := len(path) - 1
	for path[at] != first {
		at--
	}
	var names []string
	fresh := false
	for _, i := range path[at:] {
		p := &r.c.profiles[i]
		fresh = fresh || !p.bad
		p.bad = true
		if len(names) < 8 {
			names = append(names, p.name)
		} else if len(names) == 8 {
			names = append(names, "…")
		}
	}
	if !fresh {
		return
	}
	p := &r.c.profiles[first]
	names = append(names, p.name)
	r.at(expressionNode(p.n).span, Diagnostic{Code: "cycle", Thing: p.owner.thing(), Text: "depends on itself: " + strings.Join(names, " → "),
		Hint: "let one of them be a waveform of its own: points, stairs, …"})
}
