package casefile

import (
	"fmt"
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

// references checks that the names fields refer to exist.
func (r *reader) references() {
	for _, e := range r.c.Elements {
		if !r.refer(e, e.fields) {
			e.faulty = true
			r.blamed[e.Name] = true
			r.blameNames(e.fields)
		}
	}
}

func (r *reader) refer(e *Element, list []entry) bool {
	ok := true
	for i := range list {
		x := &list[i]
		switch {
		case x.field.Refers == "" || x.n == nil:
			if x.field.Type == Group || x.field.Type == Groups {
				ok = r.refer(e, x.list) && ok
			}
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

// exists checks one name.
func (r *reader) exists(e *Element, table string, n *node) bool {
	if n.kind != kindString || n.text == "" {
		return false // reported where it was read
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
		if r.blamed[n.text] = true; len(r.blamed) > most {
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
