package casefile

import (
	"fmt"
	"strconv"
	"strings"
	"unicode"

	"lagbook/network/quantity"
)

// longest is how many bytes a name may have.
const longest = 200

// checkName checks that a name is made of letters, digits, space, _ - . and
// holds no " - ", which is what a difference is written with.
func (r *reader) checkName(k *key, o owner) bool {
	better, why := legalName(k.name)
	if why == "" {
		return true
	}
	d := Diagnostic{Code: "bad-name", Thing: o.thing(), Text: "the name " + why, Found: k.name,
		Hint: "a name is letters, digits, space, _ - and ., without \" - \""}
	if better != "" {
		d.Fix, d.Hint = tomlKey(better), ""
	}
	r.at(k.span, d)
	return false
}

// legalName says what is wrong with a name and what it might be instead.
func legalName(name string) (better, why string) {
	switch {
	case name == "":
		return "", "is empty"
	case len(name) > longest:
		return "", fmt.Sprintf("has more than %d bytes", longest)
	}
	for _, c := range name {
		if !nameRune(c) {
			why = "holds " + quoted(string(c))
			break
		}
	}
	better = strings.Map(func(c rune) rune {
		if nameRune(c) {
			return c
		}
		return '_'
	}, name)
	if strings.Contains(better, " - ") {
		better = strings.ReplaceAll(better, " - ", "-")
		if why == "" {
			why = `holds " - ", which stands for a difference`
		}
	}
	if trimmed := strings.TrimSpace(better); trimmed != better {
		better = trimmed
		if why == "" {
			why = "begins or ends with a space"
		}
	}
	return better, why
}

func nameRune(c rune) bool {
	return c == ' ' || c == '_' || c == '-' || c == '.' || unicode.IsLetter(c) || unicode.IsDigit(c)
}

// tomlKey writes a name as a key, in quotes where it needs them.
func tomlKey(name string) string {
	for i := 0; i < len(name); i++ {
		if !bare(name[i]) {
			return basic(name)
		}
	}
	return name
}

// references checks that the names fields refer to exist, in parts at fault too: a
// fault of one key does not hide that of another.
func (r *reader) references() {
	r.joins()
	for _, e := range r.c.Elements {
		r.scope = e.use
		if !r.refer(e, e.fields, "") {
			e.faulty = true
			r.blamed[e.Name] = true
			r.blameNames(e.fields)
		}
	}
	r.scope = nil
}

// refer checks the names in a list of entries that lies under a path.
func (r *reader) refer(e *Element, list []entry, path string) bool {
	ok := true
	for i := range list {
		x := &list[i]
		switch {
		case x.n == nil:
		case x.field.Look != nil && x.n.kind == kindString && x.n.text != "":
			diags := x.field.Look(e, r.c, under(path, x, i))
			r.reportAll(diags)
			ok = ok && !Failed(diags)
		case x.holdsFields():
			ok = r.refer(e, x.list, under(path, x, i)) && ok
		case x.field.Refers == "":
		case x.field.Type == Name:
			ok = r.exists(e, x.field.Refers, x.n) && ok
		case x.field.Type == Names:
			for j := range x.list {
				ok = r.exists(e, x.field.Refers, x.list[j].n) && ok
			}
		}
	}
	return ok
}

// under is the path of entry i of a list: by its name, or by its place where it has none.
func under(path string, x *entry, i int) string {
	switch {
	case x.name == "":
		return path + "[" + strconv.Itoa(i) + "]"
	case path == "":
		return x.name
	}
	return path + "." + x.name
}

// exists checks one name.
func (r *reader) exists(e *Element, table string, n *node) bool {
	if n.kind != kindString || n.text == "" {
		return false // reported where it was read
	}
	if e.use != nil {
		return r.existsInUse(e, table, n)
	}
	if other := r.c.byName[elementKey(e.domain, table, n.text)]; other != nil {
		if other.Table.Name == table {
			return true
		}
		if r.second[tablePath(e.domain, table)+"."+n.text] {
			return false // it is there under a name that is taken, which is reported
		}
		r.at(n.span, Diagnostic{Code: "wrong-part", Thing: e.Thing(), Found: n.text, Want: article(table),
			Text: fmt.Sprintf("%s is %s, not %s", quoted(n.text), article(other.Table.Name), article(table))})
		return false
	}
	if r.missing(n.text) {
		return false
	}
	if r.full() {
		r.report(Diagnostic{})
		return false
	}
	d := Diagnostic{Code: "unknown-name", Thing: e.Thing(), Text: table + " " + quoted(n.text) + " is not defined", Found: n.text, Want: article(table)}
	if near, ok := quantity.Nearest(n.text, r.namesOf(e.domain, table)); ok {
		d.Fix = basic(near)
		r.blamed[near] = true
	} else {
		r.anything = true
		d.Hint = fmt.Sprintf("add [%s.%s]", tablePath(e.domain, table), tomlKey(n.text))
	}
	r.at(n.span, d)
	return false
}

func tablePath(domain, table string) string {
	if domain == "" {
		return table
	}
	return domain + "." + table
}

// namesOf lists the elements of a table.
func (r *reader) namesOf(domain, table string) []string {
	var names []string
	for _, e := range r.c.Elements {
		if e.domain == domain && e.Table.Name == table {
			names = append(names, e.Name)
		}
	}
	return names
}

// blame notes every text in a part at fault: a node of that name, or nearly of
// that name, may only seem unconnected.
func (r *reader) blame(n *node) {
	const most = 1000 // names looked at; beyond it nothing is said of connections
	if n == nil || r.anything {
		return
	}
	if n.kind == kindString {
		if r.blamed[r.inScope(n.text)] = true; len(r.blamed) > most {
			r.anything = true
		}
	}
	for _, item := range n.items {
		r.blame(item)
	}
	if n.table != nil {
		for i := range n.table.keys {
			r.blame(n.table.keys[i].value)
		}
	}
}

func (r *reader) blameNames(list []entry) {
	for i := range list {
		r.blame(list[i].n)
	}
}
