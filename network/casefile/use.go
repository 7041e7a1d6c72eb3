package casefile

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A use puts a part into the case: what is X in the part is U.X in the case, as if it
// were written there. A node that is named in the part and not defined in it is a port,
// which the use joins to a node outside. A part is not copied: its tables are read once
// with each use, and while they are, names are looked up through it.
type use struct {
	name   string // in full: "a", or "a.x" of use x in the part of use a
	words  string // as messages say it: part "cell", use "a"
	key    span
	order  []int32 // where it stands, that of the use around it first
	part   *part
	outer  *use // whose part it stands in; nil: the case
	joins  []stated
	joinAt map[string]int     // their places, by port
	join   *node              // what states them, nil for none
	set    []stated           // given values
	given  map[string]int     // all of its own, in Case.Given
	ports  []port             // that its part turned out to have
	asked  map[[2]string]bool // the domains and names of those
	hurt   bool               // something in its part is at fault
	source string
	ref    network.Ref
}

// A port is a node that a part names and does not define, in one domain.
type port struct {
	domain, name string
	e            *Element // that names it first
	owner        owner    // of the place where it is named: e, or a use in the part
	n            *node
}

// usage is what a reader knows of parts and uses.
type usage struct {
	parts    map[string]*part
	partList []*part
	scope    *use            // whose part is being read; nil: none
	alias    map[*node]alias // names in parts, by the node that holds the full one
	absent   map[string]bool // full names of uses that could not be read
	same     gathering
	unread   map[string]error // data files that could not be read in a part
}

// useLabel is what a use is called in messages.
func useLabel(name string) string { return "use " + quoted(name) }

// owner is the use as the owner of what it states.
func (u *use) owner() owner { return owner{label: useLabel(u.name) + u.outer.said()} }

// said is what messages add to the name of something in a use.
func (u *use) said() string {
	if u == nil {
		return ""
	}
	return " (" + u.words + ")"
}

// in returns the full name of something in the part of a use, nil for none.
func (u *use) in(name string) string {
	if u == nil {
		return name
	}
	return u.name + "." + name
}

// heading is what stands before the name of a table in the header of an element.
func (u *use) heading() string {
	if u == nil {
		return ""
	}
	return "part." + tomlKey(u.part.name) + "."
}

var useFields = []Field{
	{Name: "part", Type: Name, Required: true},
	{Name: "join", Type: loose, Help: `{ port = "a node" }`},
	{Name: "set", Type: loose, Help: `{ given = "a value" }`},
}

// useOf reads one use, in the case or in the part of another, and those in its part.
func (r *reader) useOf(k *key, outer *use) {
	u := &use{name: outer.in(k.name), key: k.span, outer: outer, given: map[string]int{}, joinAt: map[string]int{}, asked: map[[2]string]bool{}}
	if outer != nil {
		u.order = append(u.order, outer.order...)
	}
	u.order = append(u.order, k.at)
	o := u.owner()
	u.ref = r.c.ref(k.span, o)
	r.scope = outer
	defer func() { r.scope = nil }()
	f := fielder{r: r, o: o, word: "use", header: k.span}
	named := r.checkName(k, o)
	list, source, ok := f.fields(k.value, useFields, nil)
	u.source = source
	for i := range list {
		x := &list[i]
		good := true
		switch x.name {
		case "part":
			good = x.n.kind == kindString && r.partNamed(o, u, x.n)
		case "join":
			u.join = x.n
			u.joins, good = r.joined(o, x.n)
			for i := range u.joins {
				u.joinAt[u.joins[i].name] = i
			}
		case "set":
			u.set, good = r.statedIn(o, k.value.table.find("set"), `a table like { given = "a value" }`)
			good = good || u.set != nil // one at fault does not keep the part from being read
		}
		ok = ok && good
	}
	if first := r.c.useNamed[u.name]; named && first != nil {
		r.at(k.span, Diagnostic{Code: "defined-twice", Thing: o.thing(), Text: "the name is taken by the use on line " + r.line(first.key)})
		named = false
	}
	if !ok || !named || !u.part.sound {
		if r.absent == nil {
			r.absent = map[string]bool{}
		}
		r.absent[u.name] = true
		r.blame(k.value)
		return
	}
	u.words = u.part.words + ", use " + quoted(u.name)
	u.part.used = true
	r.c.addUse(u)
	for _, k := range u.part.uses {
		r.useOf(k, u)
	}
}

// partNamed finds the part of a use.
func (r *reader) partNamed(o owner, u *use, n *node) bool {
	p := r.parts[n.text]
	if p == nil {
		if n.text == "" || r.later {
			return false // reported
		}
		d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: partLabel(n.text) + " is not defined", Found: n.text, Want: "a part"}
		var names []string
		for _, p := range r.partList {
			names = append(names, p.name)
		}
		near, ok := quantity.Nearest(n.text, names)
		switch {
		case ok:
			d.Fix = basic(near)
		case names != nil:
			d.Hint = "the parts are" + strings.TrimPrefix(listed(names), ":")
		default:
			d.Hint = "write what it is made of in [part." + tomlKey(n.text) + "." + r.partWords()[0] + "…]"
		}
		r.at(n.span, d)
		return false
	}
	u.part = p
	p.used = true
	depth := 1
	for around := u.outer; around != nil; around = around.outer {
		if depth++; around.part == p {
			r.at(n.span, Diagnostic{Code: "cycle", Thing: o.thing(), Text: p.words + " lies within itself: " + u.chain(), Hint: "a part may use other parts only"})
			return false
		}
	}
	if depth > maxDeep {
		r.at(n.span, Diagnostic{Code: "too-deep", Thing: o.thing(), Text: fmt.Sprintf("parts lie in one another more than %d deep: %s", maxDeep, u.chain())})
		return false
	}
	return true
}

// chain names the parts that a use lies in: "a → b → a".
func (u *use) chain() string {
	text := brief(u.part.name)
	for around := u.outer; around != nil; around = around.outer {
		text = brief(around.part.name) + " → " + text
		if around.part == u.part {
			break
		}
	}
	return text
}

// joined reads join = {port = "node"}.
func (r *reader) joined(o owner, n *node) (list []stated, ok bool) {
	if n.kind != kindTable {
		r.wrongType(o, n, &Field{Name: "join"}, `a table like { port = "node" }`)
		return nil, false
	}
	ok = true
	for i := range n.table.keys {
		x := &n.table.keys[i]
		if x.value.kind != kindString || x.value.text == "" {
			r.wrongType(o, x.value, &Field{Name: "join." + x.name}, "the name of a node in quotes")
			ok = false
			continue
		}
		list = append(list, stated{name: x.name, key: x.span, n: x.value})
	}
	return list, ok
}

// joinOf returns what a use joins to a port, nil where it does not.
func (u *use) joinOf(port string) *stated {
	if i, ok := u.joinAt[port]; ok {
		return &u.joins[i]
	}
	return nil
}

// expand reads the tables of every part once with each use of it.
func (r *reader) expand() {
	for _, u := range r.c.uses {
		r.scope = u
		for i := range u.part.key.value.table.keys {
			k := &u.part.key.value.table.keys[i]
			v := r.domainNamed(k.name)
			if v == nil {
				continue
			}
			for j := range k.value.table.keys {
				t := &k.value.table.keys[j]
				r.elements(v, v.table(t.name), t)
			}
		}
	}
	r.scope = nil
	for _, u := range r.c.uses {
		r.ports(u)
	}
}

// usedDomains adds the domains that only parts have tables of.
func (r *reader) usedDomains() {
	var list []*Vocabulary
	for i := range r.voc {
		v := &r.voc[i]
		has := slices.Contains(r.domains, v)
		for _, u := range r.c.uses {
			has = has || len(u.part.names[v.Domain]) > 0
		}
		if has {
			list = append(list, v)
		}
	}
	r.domains = list
}

// inFile compares two elements by where they stand: what a use makes stands where the
// use does, among itself as in the part.
func inFile(a, b *Element) int {
	for depth := 0; ; depth++ {
		x, okX := a.place(depth)
		y, okY := b.place(depth)
		switch {
		case !okX && !okY:
			return 0
		case x != y:
			return int(x) - int(y)
		}
	}
}

// place is where an element stands: in the case, in the part, in the part of that; -1
// and false behind the last.
func (e *Element) place(depth int) (int32, bool) {
	if e.use != nil {
		if depth < len(e.use.order) {
			return e.use.order[depth], true
		}
		depth -= len(e.use.order)
	}
	if depth == 0 {
		return e.header.at, true
	}
	return -1, false
}

// inAbsent reports whether a name may be that of something in a use that could not be
// read.
func (r *reader) inAbsent(name string) bool {
	return r.absent != nil && begun(name, r.absent)
}

// begun reports whether a name begins with one of some names and a dot.
func begun(name string, with map[string]bool) bool {
	for i := range name {
		if name[i] == '.' && with[name[:i]] {
			return true
		}
	}
	return false
}

// wound notes that something in the part of a use is at fault.
func (u *use) wound() {
	if u != nil {
		u.hurt = true
	}
}

// inner returns the use that an element stands in, nil for none.
func (e *Element) inner() *use {
	if e == nil {
		return nil
	}
	return e.use
}
