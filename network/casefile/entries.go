package casefile

import (
	"fmt"
	"strconv"
	"strings"

	"lagbook/network/quantity"
)

// entry reads the value of one field.
func (f fielder) entry(n *node, field *Field) (x entry, ok bool) {
	x = entry{field: field, name: field.Name, n: n, slot: noSlot, wave: noSlot}
	switch field.Type {
	case Number:
		if n.kind == kindTable {
			n, x.source = f.r.withSource(f.o, n)
			if n == nil {
				return x, false
			}
			x.n = n
		}
		x.slot, ok = f.r.number(f.o, n, field)
	case Count:
		x.slot, ok = f.count(n, field)
	case Name, Text, Word:
		ok = f.text(n, field)
	case Names:
		x.list, ok = f.names(n, field)
	case Wave:
		x.wave, x.source, ok = f.wave(n, field)
	case Group:
		ok = f.group(n, field, &x)
	case Pairs, Groups:
		ok = f.items(n, field, &x)
	case loose:
		ok = true
	}
	return x, ok
}

// withSource takes {value = …, source = …} apart; nil after a fault.
func (r *reader) withSource(o owner, n *node) (value *node, source string) {
	ok := true
	for i := range n.table.keys {
		k := &n.table.keys[i]
		switch k.name {
		case "value":
			value = k.value
		case "source":
			if k.value.kind != kindString {
				r.wrongType(o, k.value, &Field{Name: "source"}, "a text in quotes")
				ok = false
			}
			source = k.value.text
		case "points", "level":
			r.notBuilt(o, k, k.name)
			ok = false
		default:
			f := fielder{r: r, o: o, word: "a value with its source"}
			f.unknown(n, k, []Field{{Name: "value"}})
			ok = false
		}
	}
	if value == nil && ok {
		r.at(n.span, Diagnostic{Code: "missing-key", Thing: o.thing(), Text: "value is missing", Hint: `write { value = "…", source = "…" }`})
	}
	if !ok {
		return nil, source
	}
	return value, source
}

// count reads a whole number.
func (f fielder) count(n *node, field *Field) (Slot, bool) {
	if n.kind != kindInteger {
		f.r.wrongType(f.o, n, field, "a whole number")
		return noSlot, false
	}
	x := slot{si: n.num, field: field, n: n, owner: f.o}
	if d := f.r.c.inRange(&x, x.si); d != nil {
		f.r.report(*d)
		return noSlot, false
	}
	const most = 1 << 30
	if x.si > most || x.si < -most {
		f.r.at(n.span, Diagnostic{Code: "range", Thing: f.o.thing(), Text: field.Name + " is " + n.text + ", must be " + strconv.Itoa(most) + " or below"})
		return noSlot, false
	}
	return f.r.c.addSlot(x), true
}

// text reads one text, name or word.
func (f fielder) text(n *node, field *Field) bool {
	if n.kind != kindString {
		f.notText(n, field)
		return false
	}
	if field.Type == Name && n.text == "" {
		f.r.at(n.span, Diagnostic{Code: "missing-name", Thing: f.o.thing(), Text: field.Name + " is empty", Want: "a name"})
		return false
	}
	if field.Type != Word || contains(field.Words, n.text) {
		return true
	}
	d := Diagnostic{Code: "unknown-word", Thing: f.o.thing(), Text: fmt.Sprintf("%s: %s is not one of its words", field.Name, quoted(n.text)), Found: n.text}
	if near, ok := quantity.Nearest(n.text, field.Words); ok {
		d.Fix = basic(near)
	} else {
		d.Hint = "there are " + strings.Join(field.Words, ", ")
	}
	f.r.at(n.span, d)
	return false
}

// notText reports something else where a text stands.
func (f fielder) notText(n *node, field *Field) {
	want := "a text in quotes"
	if field.Type == Name {
		want = "a name in quotes"
	}
	d := Diagnostic{Code: "wrong-type", Thing: f.o.thing(), Text: label(field) + "this is " + n.kind.a() + "; expected " + want, Found: n.kind.a(), Want: want}
	if len(n.items) == 1 && n.items[0].kind == kindString {
		d.Fix = basic(n.items[0].text)
	}
	f.r.at(n.span, d)
}

// names reads a list of names; what is shown and the ends of a part differ.
func (f fielder) names(n *node, field *Field) ([]entry, bool) {
	if n.kind != kindArray {
		d := Diagnostic{Code: "wrong-type", Thing: f.o.thing(), Text: label(field) + "this is " + n.kind.a() + "; expected a list of names, like [\"a\", \"b\"]"}
		if n.kind == kindString && !(field.HasMin && field.Min > 1) {
			d.Fix = "[" + basic(n.text) + "]"
		}
		f.r.at(n.span, d)
		f.meansAny(field)
		return nil, false
	}
	ok := f.length(n, field)
	list := f.r.newEntries(len(n.items))
	var seen map[string]bool
	for i, item := range n.items {
		if item.kind != kindString || item.text == "" {
			f.r.wrongType(f.o, item, field, "a name in quotes")
			ok = false
			continue
		}
		if i == short {
			seen = make(map[string]bool, len(n.items))
			for _, before := range n.items[:i] {
				seen[before.text] = true
			}
		}
		if different(field) && repeated(n.items[:i], item.text, seen) {
			f.r.at(item.span, Diagnostic{Code: "same-name", Thing: f.o.thing(), Text: fmt.Sprintf("%s names %s twice", field.Name, quoted(item.text))})
			f.meansAny(field)
			ok = false
		}
		list = append(list, entry{field: field, n: item, slot: noSlot, wave: noSlot})
	}
	return list, ok
}

// meansAny notes that a part at fault may have meant any name: no other is then called
// unconnected.
func (f fielder) meansAny(field *Field) {
	if field.Refers != "" {
		f.r.anything = true
	}
}

// different reports whether no name may stand twice in a list: in the nodes that
// a stream passes one may, where it comes round.
func different(field *Field) bool {
	return field.Refers == "" || field.HasMax && field.Max == 2
}

// short is how long a list is searched through rather than put into a map.
const short = 16

// repeated reports whether a name stands among those before it. A short list is
// looked through; of a long one seen keeps the names.
func repeated(before []*node, name string, seen map[string]bool) bool {
	if seen == nil {
		for _, n := range before {
			if n.kind == kindString && n.text == name {
				return true
			}
		}
		return false
	}
	again := seen[name]
	seen[name] = true
	return again
}

// length checks the number of items in a list.
func (f fielder) length(n *node, field *Field) bool {
	least, most := 1, maxValues
	if field.Type != Pairs {
		if field.HasMin {
			least = max(1, int(field.Min))
		}
		if field.HasMax {
			most = int(field.Max)
		}
	}
	want := ""
	switch got := len(n.items); {
	case got >= least && got <= most:
		return true
	case least == most:
		want = strconv.Itoa(least)
	case got < least:
		want = "at least " + strconv.Itoa(least)
	default:
		want = "at most " + strconv.Itoa(most)
	}
	f.r.at(n.span, Diagnostic{Code: "list-length", Thing: f.o.thing(), Text: fmt.Sprintf("%s has %s, must have %s", field.Name, items(len(n.items)), want)})
	return false
}

func items(n int) string {
	switch n {
	case 0:
		return "nothing in it"
	case 1:
		return "1 item"
	}
	return strconv.Itoa(n) + " items"
}

// group reads a table inside a value.
func (f fielder) group(n *node, field *Field, x *entry) bool {
	if n.kind != kindTable {
		f.r.wrongType(f.o, n, field, "a table like { "+firstKeys(field)+" }")
		return false
	}
	inner := f
	inner.word += "." + field.Name
	var ok bool
	x.list, x.source, ok = inner.fields(n, field.Fields, field.OneOf)
	return ok
}

// firstKeys shows the keys a group cannot do without.
func firstKeys(field *Field) string {
	var list []string
	for i := range field.Fields {
		if field.Fields[i].Required {
			list = append(list, field.Fields[i].Name+" = …")
		}
	}
	if list == nil && len(field.Fields) > 0 {
		list = append(list, field.Fields[0].Name+" = …")
	}
	return strings.Join(list, ", ")
}

// items reads a list of pairs or of tables.
func (f fielder) items(n *node, field *Field, x *entry) bool {
	what := "a list of tables, like [{ " + firstKeys(field) + " }, …]"
	if field.Type == Pairs {
		what = "a list of pairs, like " + sample(field)
	}
	if n.kind != kindArray {
		f.r.wrongType(f.o, n, field, what)
		return false
	}
	ok := f.length(n, field)
	x.list = make([]entry, len(n.items))
	second := field.Second
	if second != nil && second.Name == "" {
		named := *second
		named.Name = field.Name
		second = &named
	}
	for i, item := range n.items {
		y := entry{field: field, n: item, slot: noSlot, wave: noSlot}
		good := false
		switch {
		case field.Type == Pairs:
			good = f.pair(item, field, second, &y)
		case item.kind == kindTable:
			inner := f
			inner.word += "." + field.Name
			inner.header = item.span
			y.list, y.source, good = inner.fields(item, field.Fields, field.OneOf)
		default:
			f.r.wrongType(f.o, item, field, "a table like { "+firstKeys(field)+" }")
		}
		x.list[i] = y
		ok = ok && good
	}
	return ok
}

// pair reads [first, second].
func (f fielder) pair(n *node, field, second *Field, y *entry) bool {
	if n.kind != kindArray || len(n.items) != 2 {
		found := n.kind.a()
		if n.kind == kindArray {
			found = "a list with " + items(len(n.items))
		}
		d := Diagnostic{Code: "wrong-type", Thing: f.o.thing(), Text: label(field) + "this is " + found + "; expected a pair like " +
			strings.TrimSuffix(strings.TrimPrefix(sample(field), "["), ", …]")}
		f.r.at(n.span, d)
		return false
	}
	good := true
	y.list = []entry{{field: field, name: "first"}, {field: second, name: "second"}}
	for i := range y.list {
		x := &y.list[i]
		x.n, x.slot, x.wave = n.items[i], noSlot, noSlot
		if x.n.kind == kindTable && x.n.get("value") != nil {
			value, source := f.r.withSource(f.o, x.n)
			if value == nil {
				good = false
				continue
			}
			x.n, x.source = value, source
		}
		var ok bool
		x.slot, ok = f.r.number(f.o, x.n, x.field)
		good = good && ok
	}
	return good
}
