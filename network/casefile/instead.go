package casefile

import (
	"strings"

	"lagbook/network/quantity"
)

// instead reads what stands in the place of a plain value: a table with the keys of
// Or, or points against something else. is tells whether that is what stands there.
func (f fielder) instead(n *node, field *Field, x *entry) (ok, is bool) {
	if field.Against == nil && field.Or == nil {
		return false, false
	}
	switch {
	case field.Against != nil && n.kind == kindArray && (field.Type == Number || holdsLists(n)):
		return f.points(n, field, x), true
	case n.kind == kindTable && field.Against != nil && n.get("value") != nil && n.get("points") != nil:
		f.r.at(n.table.find("points").span, Diagnostic{Code: "stated-twice", Thing: f.o.thing(), Text: label(field) + "value and points state one thing two ways", Hint: "keep one of them"})
		return false, true
	case n.kind != kindTable || n.get("value") != nil:
		return false, false
	case field.Against != nil && n.get("points") != nil:
		return f.pointTable(n, field, x), true
	case field.meansOr(n):
		inner := f
		inner.word += "." + field.Name
		x.form = orTable
		x.list, x.source, ok = inner.fields(n, field.Or, field.OneOf)
		return ok, true
	case field.Type == Wave && field.Or != nil && !knownWave(n):
		f.neither(n, field)
		return false, true
	}
	return false, false
}

// knownWave reports whether a table has a key of a waveform, or nearly.
func knownWave(n *node) bool {
	for i := range n.table.keys {
		name := n.table.keys[i].name
		if _, near := quantity.Nearest(name, waveForms[0]); near || contains(waveForms[0], name) {
			return true
		}
	}
	return false
}

// neither reports a table that is neither a waveform nor has a key of Or.
func (f fielder) neither(n *node, field *Field) {
	names := make([]string, len(field.Or))
	for i := range field.Or {
		names[i] = field.Or[i].Name
	}
	d := Diagnostic{Code: "unknown-key", Thing: f.o.thing(), Text: label(field) + "an empty table"}
	at := n.span
	if len(n.table.keys) > 0 {
		k := &n.table.keys[0]
		d.Text, d.Found, at = quoted(k.name)+" is not a key of "+f.word+"."+field.Name, k.name, k.span
	}
	d.Hint = "it may have " + strings.Join(names, ", ") + ", or be a waveform with " + strings.Join(waveForms[0], ", ")
	f.r.at(at, d)
}

func holdsLists(n *node) bool {
	return len(n.items) > 0 && n.items[0].kind == kindArray
}

// meansOr reports whether a table was meant to have the keys of Or: not for one that
// is a waveform, or nearly.
func (field *Field) meansOr(n *node) bool {
	if field.Or == nil {
		return false
	}
	names := make([]string, len(field.Or))
	for i := range field.Or {
		names[i] = field.Or[i].Name
	}
	for i := range n.table.keys {
		name := n.table.keys[i].name
		if contains(names, name) {
			return true
		}
	}
	if field.Type == Wave && knownWave(n) {
		return false
	}
	for i := range n.table.keys {
		if _, ok := quantity.Nearest(n.table.keys[i].name, names); ok {
			return true
		}
	}
	return field.Type != Wave
}

// orFor returns the key of Or that a value of a dimension was meant for: the only one
// that takes it, where no other must stand beside it.
func (field *Field) orFor(dim quantity.Dim) string {
	key := ""
	for i := range field.Or {
		x := &field.Or[i]
		switch {
		case x.Type != Number && x.Type != Wave || x.Dim != dim:
			if x.Required {
				return ""
			}
		case key != "" || len(x.With) > 0:
			return ""
		default:
			key = x.Name
		}
	}
	return key
}
