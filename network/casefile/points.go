package casefile

import "fmt"

// pointTable reads {points = [...], source = "..."}.
func (f fielder) pointTable(n *node, field *Field, x *entry) bool {
	inner := f
	inner.word += "." + field.Name
	list, source, ok := inner.fields(n, []Field{{Name: "points", Type: loose}}, nil)
	x.source = source
	for i := range list {
		ok = f.points(list[i].n, field, x) && ok
	}
	return ok
}

// points reads the points of a value against something else.
func (f fielder) points(n *node, field *Field, x *entry) bool {
	first := *field.Against
	second := field
	if field.Type == Word {
		second = field.Second
	}
	plain := *second
	plain.Name, plain.Or, plain.Against, plain.Required = field.Name, nil, nil, false
	pairs := &Field{Name: field.Name, Type: Pairs, Dim: first.Dim, Also: first.Also, Kind: first.Kind, Unit: first.Unit,
		Min: first.Min, Max: first.Max, HasMin: first.HasMin, HasMax: first.HasMax, MinOpen: first.MinOpen, Ascending: true, Second: &plain}
	y := entry{field: pairs, name: "points", n: n, slot: noSlot, wave: noSlot}
	ok := f.items(n, pairs, &y)
	x.form, x.list = pointList, []entry{y}
	if ok && len(plain.Also) > 0 {
		ok = f.oneDimension(field, y.list)
	}
	return ok
}

// oneDimension checks that all second numbers of some points are of one dimension.
func (f fielder) oneDimension(field *Field, list []entry) bool {
	slots := f.r.c.slots
	for i := range list {
		if a, b := &slots[list[0].list[1].slot], &slots[list[i].list[1].slot]; a.dim != b.dim {
			f.r.at(b.n.span, Diagnostic{Code: "kinds", Thing: f.o.thing(), Text: fmt.Sprintf("%s: %s is of another kind than %s before it", field.Name, quoted(b.n.text), quoted(a.n.text))})
			return false
		}
	}
	return true
}
