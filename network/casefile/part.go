package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// A part is written once, [part.NAME.thermal.node.X], and stands in the case as often
// as it is used. It has the tables of the domains, given values of its own in
// [part.NAME.given], and may use other parts, [part.NAME.use.X].
type part struct {
	name   string
	words  string // as messages say it: part "cell"
	key    *key
	names  map[string]map[string]bool // of its parts, by domain
	given  []stated                   // its own given values
	uses   []*key                     // of other parts
	inner  map[string]bool            // the names of those uses
	source string
	used   bool
	sound  bool // made of what a part is made of
	cost   cost // of one use
	weigh  weighing
	// mentioned are the words of its expressions, and those of the parts it uses.
	mentioned map[string]bool
}

// A stated is one value under a name, in set and in [part.NAME.given].
type stated struct {
	name   string
	key    span
	n      *node
	source string
	bad    bool // at fault, which is reported
}

// cost is what one use of a part adds to the case.
type cost struct{ parts, values int }

// plus adds up without running over.
func (c cost) plus(d cost) cost {
	const most = 1 << 30
	return cost{min(most, c.parts+d.parts), min(most, c.values+d.values)}
}

// weighing is how far the cost of a part has been reckoned.
type weighing uint8

const (
	unweighed weighing = iota
	going
	gone
)

// What uses may add to a case at most. It is reckoned before any is written out.
const (
	maxUsed = 20_000 // parts and uses
	maxDeep = 4      // uses in parts in uses
)

// partLabel is what a part is called in messages.
func partLabel(name string) string { return "part " + quoted(name) }

// readParts reads what parts are made of, and the uses of them; what stands in the
// tables of a part is read with each use.
func (r *reader) readParts(root *node) {
	if k := root.table.find("part"); k != nil {
		r.eachNamed(k, "[part.NAME.DOMAIN.TABLE.X]", r.part)
	}
	k := root.table.find("use")
	if k == nil {
		return
	}
	if !r.fits(k) {
		r.later, r.anything = true, true
		return
	}
	r.eachNamed(k, "[use.NAME]", func(k *key) { r.useOf(k, nil) })
}

// eachNamed calls read for every table [WORD.NAME].
func (r *reader) eachNamed(k *key, like string, read func(k *key)) {
	if k.value.kind != kindTable {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "tables like "+like)
		r.later, r.anything = true, true
		return
	}
	for i := range k.value.table.keys {
		x := &k.value.table.keys[i]
		if x.value.kind != kindTable {
			r.at(x.span, Diagnostic{Code: "wrong-type", Text: fmt.Sprintf("%s stands where the name of a %s is expected", quoted(x.name), k.name), Hint: "write " + like})
			r.later, r.anything = true, true
			continue
		}
		read(x)
	}
}

// part reads what one part is made of.
func (r *reader) part(k *key) {
	p := &part{name: k.name, words: partLabel(k.name), key: k, names: map[string]map[string]bool{}, inner: map[string]bool{}}
	o := owner{label: p.words}
	p.sound = r.checkName(k, o)
	for i := range k.value.table.keys {
		x := &k.value.table.keys[i]
		v := r.domainNamed(x.name)
		switch {
		case v != nil:
			p.sound = r.partDomain(p, v, x) && p.sound
		case x.name == "given":
			p.sound = r.partGiven(p, x) && p.sound
		case x.name == "use":
			r.eachNamed(x, "[part."+tomlKey(p.name)+".use.NAME]", func(k *key) { p.uses, p.inner[k.name] = append(p.uses, k), true })
		case x.name == "source":
			r.text(x, &p.source)
		default:
			r.notInPart(o, x, x.name, r.partWords(), "a part is made of ")
			p.sound = false
		}
	}
	if r.parts == nil {
		r.parts = map[string]*part{}
	}
	r.parts[p.name] = p
	r.partList = append(r.partList, p)
}

// domainNamed returns the vocabulary of a domain with tables, nil where there is none.
func (r *reader) domainNamed(name string) *Vocabulary {
	for i := range r.voc {
		if v := &r.voc[i]; v.Domain == name && name != "" && len(v.Tables) > 0 {
			return v
		}
	}
	return nil
}

// partWords lists what a part may be made of.
func (r *reader) partWords() []string {
	var words []string
	for i := range r.voc {
		if v := &r.voc[i]; v.Domain != "" && len(v.Tables) > 0 {
			words = append(words, v.Domain)
		}
	}
	return append(words, "given", "use", "source")
}

// notInPart reports a word that has no place in a part.
func (r *reader) notInPart(o owner, k *key, word string, words []string, made string) {
	d := Diagnostic{Code: "unknown-key", Thing: o.thing(), Text: quoted(word) + " has no place in a part", Found: word}
	if near, ok := quantity.Nearest(word, words); ok {
		d.Fix = near
	} else {
		d.Hint = made + strings.Join(words, ", ")
	}
	r.at(k.span, d)
}

// partDomain notes the names in the tables of one domain of a part.
func (r *reader) partDomain(p *part, v *Vocabulary, k *key) bool {
	o := owner{label: p.words}
	if k.value.kind != kindTable {
		r.wrongType(o, k.value, &Field{Name: k.name}, "tables like [part."+tomlKey(p.name)+"."+v.Domain+"."+v.Tables[0].Name+".NAME]")
		return false
	}
	names, ok := map[string]bool{}, true
	p.names[v.Domain] = names
	for i := range k.value.table.keys {
		t := &k.value.table.keys[i]
		switch {
		case fieldNamed(v.Head, t.name) != nil:
			r.at(t.span, Diagnostic{Code: "unknown-key", Thing: o.thing(), Text: quoted(t.name) + " is said for the whole case, not in a part", Hint: "write it in [" + v.Domain + "]"})
			ok = false
		case v.table(t.name) == nil && contains(v.NotBuilt, t.name):
			r.notBuilt(o, t, t.name)
			ok = false
		case v.table(t.name) == nil:
			r.notInPart(o, t, t.name, v.justTables(), "there are ")
			ok = false
		case t.value.kind == kindTable:
			for j := range t.value.table.keys {
				names[t.value.table.keys[j].name] = true
			}
		}
	}
	return ok
}

// justTables lists the tables of a domain, without the keys in its head.
func (v *Vocabulary) justTables() []string {
	return v.tableNames()[:len(v.Tables)]
}

// partGiven reads [part.NAME.given]: what the given values of the part are where a use
// does not set them.
func (r *reader) partGiven(p *part, k *key) bool {
	list, ok := r.statedIn(owner{label: p.words}, k, "a table of named quantities")
	p.given = list
	ok = ok || list != nil // one at fault does not keep the part from being read
	for i := range list {
		ok = r.givenName(owner{label: p.words}, &list[i]) && ok
	}
	return ok
}

// statedIn reads the names of a table of values; a.b = … makes the name "a.b". ok is false
// where one of them is at fault, or the table is none.
func (r *reader) statedIn(o owner, k *key, want string) (list []stated, ok bool) {
	if k.value.kind != kindTable {
		r.wrongType(o, k.value, &Field{Name: k.name}, want)
		return nil, false
	}
	ok = true
	var within func(n *node, prefix string)
	within = func(n *node, prefix string) {
		for i := range n.table.keys {
			x := &n.table.keys[i]
			s := stated{name: prefix + x.name, key: x.span, n: x.value}
			switch {
			case x.value.kind == kindTable && x.value.get("value") == nil:
				within(x.value, s.name+".")
				continue
			case x.value.kind == kindTable:
				if s.n, s.source = r.withSource(o, x.value); s.n == nil {
					s.n, s.bad, ok = x.value, true, false
				}
			}
			list = append(list, s)
		}
	}
	within(k.value, "")
	return list, ok
}

// givenName checks that an expression can use a name.
func (r *reader) givenName(o owner, s *stated) bool {
	d := Diagnostic{Code: "bad-name", Thing: o.thing(), Text: quoted(s.name) + " cannot stand in an expression", Hint: "a given name is letters, digits, _ and dots, and begins with a letter"}
	switch {
	case quantity.Reserved(s.name):
		d.Text, d.Hint = quoted(s.name)+" has a meaning of its own in expressions", "choose another name"
	case identifier(s.name):
		return true
	}
	r.at(s.key, d)
	return false
}

// fits reports whether the case stays within bounds with all uses written out.
func (r *reader) fits(k *key) bool {
	if k.value.kind != kindTable {
		return true // reported where it is read
	}
	var all cost
	for i := range k.value.table.keys {
		x := &k.value.table.keys[i]
		all = all.plus(r.costOfUse(x))
		text := ""
		switch {
		case all.parts > maxUsed:
			text = fmt.Sprintf("with this, uses make more than the %d parts they may", maxUsed)
		case all.values > maxValues:
			text = fmt.Sprintf("with this, the parts that are used hold more than %d values", maxValues)
		default:
			continue
		}
		r.at(x.span, Diagnostic{Code: "too-many", Thing: useLabel(x.name), Text: text})
		return false
	}
	return true
}

// costOfUse is what one use adds, itself included.
func (r *reader) costOfUse(k *key) cost {
	c := cost{parts: 1}
	n := k.value.get("part")
	if n == nil || n.kind != kindString || r.parts[n.text] == nil {
		return c
	}
	return c.plus(r.costOf(r.parts[n.text]))
}

// costOf is what a part adds with each use. A part that holds itself, which is
// reported where it is used, costs nothing more.
func (r *reader) costOf(p *part) cost {
	switch p.weigh {
	case going:
		return cost{}
	case gone:
		return p.cost
	}
	p.weigh = going
	all := cost{values: p.key.value.size()}
	for _, names := range p.names {
		all.parts += len(names)
	}
	for _, k := range p.uses {
		all = all.plus(r.costOfUse(k))
	}
	p.weigh, p.cost = gone, all
	return all
}

// size counts the values below a node and itself.
func (n *node) size() int {
	all := 1
	for _, item := range n.items {
		all += item.size()
	}
	if n.table != nil {
		for i := range n.table.keys {
			all += n.table.keys[i].value.size()
		}
	}
	return all
}

// unusedParts warns of parts that nothing uses, and of given values that nothing in
// their part uses.
func (r *reader) unusedParts() {
	for _, p := range r.partList {
		if !p.used {
			r.at(p.key.span, Diagnostic{Severity: Warning, Code: "unused", Thing: p.words, Text: "nothing in the case uses it; what is in it is not looked at"})
			continue
		}
		for i := range p.given {
			if s := &p.given[i]; !r.mentions(p, s.name) {
				r.at(s.key, Diagnostic{Severity: Warning, Code: "unused", Thing: "given " + quoted(s.name) + " (" + p.words + ")", Text: "nothing in the part uses it"})
			}
		}
	}
}
