package casefile

import "strings"

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
	ok := f.length(n, len(n.items), field)
	if !ok && field.Ascending && len(n.items) > maxPoints {
		return false
	}
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
	if ok && field.Ascending {
		slots := make([]Slot, len(x.list))
		for i := range x.list {
			slots[i] = x.list[i].list[0].slot
		}
		ok = f.r.rising(f.o, field, slots)
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
