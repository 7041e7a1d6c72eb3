package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// domainTables reads the tables of a domain, or a table outside domains.
func (r *reader) domainTables(k *key) bool {
	for i := range r.voc {
		v := &r.voc[i]
		if v.Domain == k.name && v.Domain != "" {
			r.domain(v, k)
			return true
		}
		if v.Domain != "" {
			continue
		}
		for j := range v.Tables {
			if v.Tables[j].Name == k.name {
				r.elements(v, &v.Tables[j], k)
				return true
			}
		}
	}
	return false
}

// domain reads [domain.table.NAME].
func (r *reader) domain(v *Vocabulary, k *key) {
	if k.value.kind != kindTable {
		want := "a table, [" + k.name + "]"
		if len(v.Tables) > 0 {
			want = "tables like [" + k.name + "." + v.Tables[0].Name + ".NAME]"
		}
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, want)
		return
	}
	for i := range k.value.table.keys {
		t := &k.value.table.keys[i]
		if fieldNamed(v.Head, t.name) != nil {
			continue // read before
		}
		if table := v.table(t.name); table != nil {
			r.elements(v, table, t)
			continue
		}
		r.lose(t.value)
		if contains(v.NotBuilt, t.name) {
			r.notBuilt(owner{}, t, t.name)
			continue
		}
		d := Diagnostic{Code: "unknown-key", Text: quoted(t.name) + " is not a part of [" + v.Domain + "]"}
		if len(v.Tables) == 0 {
			d.Text = quoted(t.name) + " is not a key of [" + v.Domain + "]"
		}
		if near, ok := quantity.Nearest(t.name, v.tableNames()); ok {
			d.Fix = near
		} else {
			d.Hint = "there are " + strings.Join(v.tableNames(), ", ")
		}
		r.at(t.span, d)
	}
}

func (v *Vocabulary) table(name string) *Table {
	for i := range v.Tables {
		if v.Tables[i].Name == name {
			return &v.Tables[i]
		}
	}
	return nil
}

func (v *Vocabulary) tableNames() []string {
	names := make([]string, 0, len(v.Tables)+len(v.Head))
	for i := range v.Tables {
		names = append(names, v.Tables[i].Name)
	}
	for i := range v.Head {
		names = append(names, v.Head[i].Name)
	}
	return names
}

// elements reads every element of one table.
func (r *reader) elements(v *Vocabulary, t *Table, k *key) {
	head := t.Name
	if v.Domain != "" {
		head = r.scope.heading() + v.Domain + "." + t.Name
	}
	if k.value.kind != kindTable {
		r.blame(k.value)
		d := Diagnostic{Code: "wrong-type", Text: quoted(t.Name) + " needs a name", Hint: "write [" + head + ".NAME]"}
		r.at(k.span, d)
		return
	}
	for i := range k.value.table.keys {
		x := &k.value.table.keys[i]
		if x.value.kind != kindTable && t.field(x.name) {
			r.lose(k.value)
			at := x.span
			if k.value.table.made == byHeader {
				at = k.span
			}
			r.at(at, Diagnostic{Code: "wrong-type", Text: "the name of the " + t.Name + " is missing", Hint: "write [" + head + ".NAME]"})
			return
		}
		r.element(v, t, head, x)
	}
}

// field reports whether the table has a field of that name.
func (t *Table) field(name string) bool { return name == "source" || fieldNamed(t.Fields, name) != nil }

// element reads one element.
func (r *reader) element(v *Vocabulary, t *Table, head string, k *key) {
	if k.value.kind != kindTable {
		r.blame(k.value)
		d := Diagnostic{Code: "wrong-type", Text: fmt.Sprintf("%s stands where the name of a %s is expected", quoted(k.name), t.Name),
			Hint: "write [" + head + ".NAME] above it"}
		r.at(k.span, d)
		return
	}
	e := r.newElement()
	*e = Element{Name: r.scope.in(k.name), Table: t, c: r.c, domain: v.Domain, use: r.scope, header: k.span}
	o := owner{e: e}
	e.Ref = r.c.ref(k.span, o)
	named := r.checkName(k, o)
	f := fielder{r: r, o: o, v: v, word: t.Name, header: k.span}
	var ok bool
	e.fields, e.source, ok = f.fields(k.value, t.Fields, t.OneOf)
	if first := r.c.enter(e); first != nil {
		r.second[tablePath(v.Domain, t.Name)+"."+e.Name] = true
		r.taken(k, e, first)
		named = false
	}
	if e.use != nil {
		r.lodge(e)
	}
	if e.faulty = e.faulty || !ok || !named; e.faulty {
		e.use.wound()
		r.blamed[e.Name] = true
		r.blame(k.value)
	}
	r.c.Elements = append(r.c.Elements, e)
}

// newElement and newEntries take from slabs, so that a case of many parts costs
// few allocations.
func (r *reader) newElement() *Element {
	if len(r.elems) == 0 {
		r.elems = make([]Element, 64)
	}
	e := &r.elems[0]
	r.elems = r.elems[1:]
	return e
}

func (r *reader) newEntries(n int) []entry {
	if len(r.entries) < n {
		r.entries = make([]entry, max(n, 128))
	}
	list := r.entries[:0:n]
	r.entries = r.entries[n:]
	return list
}
