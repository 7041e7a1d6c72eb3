package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// A fielder reads the fields of one element, or of a group in it.
type fielder struct {
	r       *reader
	o       owner
	v       *Vocabulary
	word    string // where this is, in the words of NotBuilt: "resistance.film"
	header  span   // where something missing is reported
	profile int    // 1 + the profile that is read; 0: none
}

// fields reads a table's keys. ok is false where something in it is at fault.
func (f fielder) fields(n *node, fields []Field, oneOf [][]string) (list []entry, source string, ok bool) {
	ok = true
	whole := true
	if len(n.table.keys) > 0 {
		list = f.r.newEntries(len(n.table.keys))
	}
	for i := range n.table.keys {
		k := &n.table.keys[i]
		field := fieldNamed(fields, k.name)
		switch {
		case field != nil && f.pointsNotBuilt(k, field):
			ok = false
		case field != nil:
			x, good := f.entry(k.value, field)
			ok = ok && good
			list = append(list, x)
		case k.name == "source":
			if k.value.kind != kindString {
				f.r.wrongType(f.o, k.value, &Field{Name: "source"}, "a text in quotes")
				ok = false
			}
			source = k.value.text
		default:
			f.unknown(n, k, fields)
			ok = false
			// [a.b.c]: what is meant to be in b may all be in c
			whole = whole && !(k.value.kind == kindTable && k.value.table.made != byBraces)
		}
	}
	return list, source, whole && f.complete(n, fields, oneOf) && ok
}

func fieldNamed(fields []Field, name string) *Field {
	for i := range fields {
		if fields[i].Name == name {
			return &fields[i]
		}
	}
	return nil
}

// pointsNotBuilt refuses points of a number against something else, where such are
// agreed: "material.conductivity.points" in NotBuilt.
func (f fielder) pointsNotBuilt(k *key, field *Field) bool {
	if field.Type != Number || field.Against != nil || k.value.kind != kindArray || f.v == nil || !contains(f.v.NotBuilt, f.word+"."+k.name+".points") {
		return false
	}
	f.r.notBuilt(f.o, k, "points of "+k.name)
	return true
}

// unknown reports a key that is no field.
func (f fielder) unknown(n *node, k *key, fields []Field) {
	if f.v != nil && contains(f.v.NotBuilt, f.word+"."+k.name) {
		f.r.notBuilt(f.o, k, k.name)
		return
	}
	names := make([]string, 0, len(fields)+1)
	for i := range fields {
		if n.table.find(fields[i].Name) == nil { // what is stated already was not meant
			names = append(names, fields[i].Name)
		}
	}
	names = append(names, "source")
	if f.r.full() {
		f.r.report(Diagnostic{})
		return
	}
	d := Diagnostic{Code: "unknown-key", Thing: f.o.thing(), Text: quoted(k.name) + " is not a key of " + f.word, Found: k.name}
	near, ok := quantity.Nearest(k.name, names)
	switch {
	case ok:
		d.Fix = near
	case k.value.kind == kindTable && k.value.table.made != byBraces:
		d.Hint = `a name with a dot is written in quotes: [… ."a.b"]`
	default:
		d.Hint = "it may also have " + strings.Join(names, ", ")
	}
	f.r.at(k.span, d)
}

// complete checks that what must be there is, and that nothing is stated twice.
func (f fielder) complete(n *node, fields []Field, oneOf [][]string) bool {
	ok := true
	for i := range fields {
		x := &fields[i]
		k := n.table.find(x.Name)
		if x.Required && k == nil {
			f.missing(n, x.Name+" is missing", "add "+x.Name+" = "+sample(x))
			ok = false
		}
		if k == nil {
			continue
		}
		for _, other := range x.With {
			if n.table.find(other) == nil {
				d := Diagnostic{Code: "missing-key", Thing: f.o.thing(), Text: x.Name + " needs " + other + " beside it"}
				if o := fieldNamed(fields, other); o != nil {
					d.Hint = "add " + other + " = " + sample(o)
				}
				f.r.at(k.span, d)
				ok = false
			}
		}
	}
	for _, group := range oneOf {
		ok = f.one(n, fields, group) && ok
	}
	return ok
}

// one checks that exactly one of a group of keys is stated.
func (f fielder) one(n *node, fields []Field, group []string) bool {
	var first *key
	optional := false
	ok := true
	for i := range n.table.keys {
		k := &n.table.keys[i]
		if !contains(group, k.name) {
			continue
		}
		if first == nil {
			first = k
			continue
		}
		f.r.at(k.span, Diagnostic{Code: "stated-twice", Thing: f.o.thing(), Text: fmt.Sprintf("%s and %s state one thing two ways", first.name, k.name),
			Hint: "keep one of them"})
		ok = false
	}
	for _, name := range group {
		optional = optional || name == ""
	}
	if first == nil && !optional {
		if f.misspelt(n, fields, group) {
			return false // the key misspelt is reported already
		}
		hint := ""
		if x := fieldNamed(fields, group[0]); x != nil {
			hint = "add " + group[0] + " = " + sample(x)
		}
		f.missing(n, "one of "+strings.Join(group, ", ")+" is missing", hint)
		return false
	}
	return ok
}

// misspelt reports whether an unknown key was probably meant as one of a group.
func (f fielder) misspelt(n *node, fields []Field, group []string) bool {
	for i := range n.table.keys {
		name := n.table.keys[i].name
		if name == "source" || fieldNamed(fields, name) != nil {
			continue
		}
		if _, ok := quantity.Nearest(name, group); ok {
			return true
		}
		if f.v != nil && contains(f.v.NotBuilt, f.word+"."+name) {
			return true
		}
	}
	return false
}

// missing reports something that is not there.
func (f fielder) missing(n *node, text, hint string) {
	at := f.header
	if n.table.made == byBraces {
		at = n.span
	}
	if strings.HasSuffix(text, " is missing") && f.misspelt(n, nil, []string{strings.TrimSuffix(text, " is missing")}) {
		return
	}
	f.r.at(at, Diagnostic{Code: "missing-key", Thing: f.o.thing(), Text: text, Hint: hint})
}

// sample shows what may stand after a key.
func sample(f *Field) string {
	switch f.Type {
	case Name:
		if f.Refers != "" {
			return `"the name of a ` + f.Refers + `"`
		}
		return `"a name"`
	case Names:
		return `["a", "b"]`
	case Count:
		return "1"
	case Flag:
		return "true"
	case Numbers:
		one := sample(&Field{Dim: f.Dim, Kind: f.Kind, Unit: f.Unit})
		return "[" + one + ", …]"
	case loose:
		return f.Help
	case Word:
		return `"` + f.Words[0] + `"`
	case Text:
		return `"…"`
	case Group:
		return "{ … }"
	case Groups:
		return "[{ … }, …]"
	case Pairs:
		return "[[" + sample(&Field{Dim: f.Dim, Kind: f.Kind, Unit: f.Unit}) + ", " + sample(&Field{Dim: f.Second.Dim, Kind: f.Second.Kind, Unit: f.Second.Unit}) + "], …]"
	}
	if f.Dim == (quantity.Dim{}) {
		return "1"
	}
	if f.Dim == dimKelvin && f.Kind == quantity.Level {
		return `"20 °C"`
	}
	return `"1 ` + unitOf(f) + `"`
}
