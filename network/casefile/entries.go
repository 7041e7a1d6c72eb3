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
	if ok, is := f.instead(n, field, &x); is {
		return x, ok
	}
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
	case Numbers:
		x.list, ok = f.numbers(n, field)
	case Flag:
		ok = f.flag(n, field)
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

// flag reads true or false.
func (f fielder) flag(n *node, field *Field) bool {
	if n.kind == kindBoolean {
		return true
	}
	d := Diagnostic{Code: "wrong-type", Thing: f.o.thing(), Text: label(field) + "this is " + n.kind.a() + "; expected true or false", Found: n.kind.a(), Want: "true or false"}
	switch n.text {
	case "true", "yes", "on", "1":
		d.Fix = "true"
	case "false", "no", "off", "0":
		d.Fix = "false"
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
	ok := f.length(n, len(n.items), field)
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
func (f fielder) length(n *node, got int, field *Field) bool {
	least, most := 1, maxValues
	switch {
	case field.Items > 0:
		least, most = field.Items, field.Items
	case field.Type == Numbers || field.Type == Pairs && field.Ascending:
		most = maxPoints
	case field.Type != Pairs:
		if field.HasMin {
			least = max(1, int(field.Min))
		}
		if field.HasMax {
			most = int(field.Max)
		}
	}
	want := ""
	switch {
	case got >= least && got <= most:
		return true
	case least == most:
		want = strconv.Itoa(least)
	case got < least:
		want = "at least " + strconv.Itoa(least)
	default:
		want = "at most " + strconv.Itoa(most)
	}
	f.r.at(n.span, Diagnostic{Code: "list-length", Thing: f.o.thing(), Text: fmt.Sprintf("%s has %s, must have %s", field.Name, items(got), want)})
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
