package casefile

import "fmt"

// What only acts on a node, a source, a heater, a surface, may have the node's name: a
// pan with a heater called pan. The node is then meant by the name alone, the other by
// what only it has: "heat of pan". Case.byName holds the node under the plain key and the
// other beside it.

// hangs reports whether the elements of a table act on nodes and lie between none: they
// name nodes one by one, and nothing else.
func (t *Table) hangs() bool {
	on := false
	for i := range t.Fields {
		f := &t.Fields[i]
		switch {
		case f.Refers == "":
		case f.Refers != "node" || f.Type != Name || f.Name == "from" || f.Name == "to":
			return false
		default:
			on = true
		}
	}
	return on && t.Name != "node"
}

// besideKey is the key of what has the name of a node.
func besideKey(domain, name string) elementName { return elementName{domain, "beside a node", name} }

// enter puts an element under its name. Where that is taken it returns by what.
func (c *Case) enter(e *Element) (first *Element) {
	key := elementKey(e.domain, e.Table.Name, e.Name)
	first = c.byName[key]
	beside := besideKey(e.domain, e.Name)
	switch {
	case first == nil:
		c.byName[key] = e
		return nil
	case e.domain == "" || c.byName[beside] != nil:
	case first.isNode() && e.Table.hangs() && !twoInputs(first, e):
		c.byName[beside] = e
		return nil
	case e.isNode() && first.Table.hangs() && !twoInputs(e, first):
		c.byName[key], c.byName[beside] = e, first
		return nil
	}
	return first
}

// twoInputs reports whether a node and what acts on it would be inputs of one name.
func twoInputs(node, other *Element) bool { return node.stated("held") && other.followed() }

// stated reports whether a key of an element is there, be it at fault.
func (e *Element) stated(key string) bool {
	for i := range e.fields {
		if e.fields[i].name == key {
			return true
		}
	}
	return false
}

// followed reports whether an element is an input by its name alone, by what it states.
func (e *Element) followed() bool {
	for i := range e.fields {
		if f := e.fields[i].field; f.Type == Wave && f.Drives == "" && f.Name != "scale" {
			return true
		}
	}
	return false
}

// twin returns the other element of the same name in the domain, nil for none.
func (e *Element) twin() *Element {
	if e.domain == "" {
		return nil
	}
	beside := e.c.byName[besideKey(e.domain, e.Name)]
	switch {
	case beside == nil:
		return nil
	case beside == e:
		return e.c.byName[elementKey(e.domain, "", e.Name)]
	}
	return beside
}

// shows reports whether something is shown under a word of this element, and not of
// another with its name.
func (e *Element) shows(word string) bool {
	if e.twin() != nil {
		switch flow := word == flowWord || len(word) > len(atWord) && word[:len(atWord)] == atWord; {
		case flow && e.isNode():
			if !e.stated("held") {
				return false
			}
		case !flow && e.Table.reading(word) == nil:
			return false
		}
	}
	_, ok := e.c.Showing(e.FullName(), word)
	return ok
}

// taken says that the name of an element is taken.
func (r *reader) taken(k *key, e, first *Element) {
	d := Diagnostic{Code: "defined-twice", Thing: e.Thing(), Text: fmt.Sprintf("the name is taken by the %s on line %s",
		first.Table.Name, r.line(first.header)), Hint: "the parts of a domain share one set of names"}
	switch {
	case first.isNode() && e.Table.hangs() && twoInputs(first, e), e.isNode() && first.Table.hangs() && twoInputs(e, first):
		d.Hint = "both are inputs, which are called by name: a held node and what acts on it need two"
	case first.isNode() && e.Table.hangs():
		d.Hint = "one thing that acts on a node may have its name, not two"
	}
	r.at(k.span, d)
}
