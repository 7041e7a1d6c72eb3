package casefile

import (
	"errors"
	"math"
	"strings"

	"lagbook/network/quantity"
)

// profileField finds the dimension and kind of a profile: of an expression by reckoning,
// of a data file from the unit of its column, else from its values. The first says what
// dimension all have; one level among values in kelvin makes all of them levels.
func (f fielder) profileField(n *node) (*Field, bool) {
	r := f.r
	if x := expressionNode(n); x != nil && r.waveText(x) {
		if field, is, ok := f.dimOfExpression(x); is {
			return field, ok
		}
	}
	if n.kind == kindTable && n.get("value") != nil {
		if n, _ = r.withSource(f.o, n); n == nil {
			return nil, false
		}
	}
	if n.kind != kindTable {
		_, v, ok := r.quantity(f.o, n, nil)
		return r.profileOf(v.Dim, v.Kind), ok
	}
	if n.get("file") != nil {
		return f.dimOfFile(n)
	}
	if x := expressionNode(n); x != nil {
		_, v, ok := r.quantity(f.o, x, nil)
		return r.profileOf(v.Dim, v.Kind), ok
	}
	return f.dimOfValues(valuesOf(n))
}

// profileOf returns the field of profiles of a dimension and kind, one for all of them,
// since the tables it is read with are made once for each field.
func (r *reader) profileOf(dim quantity.Dim, kind quantity.Kind) *Field {
	if isLevel(kind) {
		kind = quantity.Level // of a pressure: as the case states it
	}
	for _, f := range r.profileFields {
		if f.Dim == dim && f.Kind == kind {
			return f
		}
	}
	f := &Field{Type: Wave, Dim: dim, Kind: kind}
	r.profileFields = append(r.profileFields, f)
	return f
}

// dimOfValues finds the dimension from the values of a waveform.
func (f fielder) dimOfValues(values []*node) (*Field, bool) {
	r := f.r
	var dim quantity.Dim
	kind, found := quantity.Plain, false
	for _, n := range values {
		v, ok := r.peek(n)
		if !ok || found && v.Dim != dim {
			continue // reported where it is read
		}
		switch {
		case !found, isLevel(v.Kind):
			dim, kind, found = v.Dim, v.Kind, true
		case v.Kind == quantity.Difference && !isLevel(kind):
			kind = v.Kind
		}
		if isLevel(kind) || dim != dimKelvin && dim != dimPressure {
			break
		}
	}
	if !found && len(values) > 0 {
		_, _, ok := r.quantity(f.o, values[0], nil)
		return r.profileOf(dim, kind), ok
	}
	return r.profileOf(dim, kind), true
}

// peek reads a number without reporting what is wrong with it.
func (r *reader) peek(n *node) (quantity.Value, bool) {
	if n.kind == kindTable {
		if n = n.get("value"); n == nil {
			return quantity.Value{}, false
		}
	}
	switch {
	case n.kind == kindInteger || n.kind == kindFloat:
		return quantity.Value{SI: n.num}, !math.IsNaN(n.num) && !math.IsInf(n.num, 0)
	case n.kind != kindString:
		return quantity.Value{}, false
	case !strings.HasPrefix(strings.TrimLeft(n.text, " \t"), "="):
		v, err := r.parse(n.text)
		return v, err == nil
	}
	expr, err := quantity.Compile(n.text, r.givenSlot)
	if err != nil {
		return quantity.Value{}, false
	}
	for _, g := range expr.Uses() {
		if r.c.givens[g].bad {
			return quantity.Value{}, false
		}
	}
	v, err := expr.Eval(r.known)
	return v, err == nil
}

// valuesOf lists the nodes of a waveform's table that hold values of its dimension.
func valuesOf(n *node) []*node {
	var list []*node
	add := func(x *node) {
		if x != nil {
			list = append(list, x)
		}
	}
	for i := range n.table.keys {
		switch k := &n.table.keys[i]; k.name {
		case "step", "pulse", "sine":
			for _, name := range []string{"from", "to", "low", "high", "mean"} {
				add(k.value.get(name))
			}
		case "points", "stairs":
			for _, p := range k.value.items {
				if len(p.items) == 2 {
					add(p.items[1])
				}
			}
		case "decay":
			for _, p := range k.value.items {
				add(p.get("amplitude"))
			}
		}
	}
	add(n.get("before"))
	return list
}

// dimOfFile finds the dimension from the unit in the header of a column.
func (f fielder) dimOfFile(n *node) (*Field, bool) {
	word := func(key string) string {
		if x := n.get(key); x != nil && x.kind == kindString {
			return x.text
		}
		return ""
	}
	name := word("file")
	if n.get("file").kind != kindString {
		return f.r.profileOf(quantity.Dim{}, quantity.Plain), true // reported where it is read
	}
	data, err := f.r.open(name)
	key, v := "file", 0
	if err == nil {
		_, v, key, err = data.columns(name, word("time"), word("column"))
	}
	var value quantity.Value
	if err == nil {
		h := data.heads[v]
		value, err = quantity.Parse(strings.TrimSpace("0 " + h.unit))
		if err != nil {
			err = &errData{text: "column " + quoted(h.full) + " of " + quoted(name) + ": " + err.Error(), hint: "write the unit into the header, like " + quoted(h.name+" / A")}
			key = "column"
		}
	}
	if err != nil {
		f.dataFault(n, key, err)
		return nil, false
	}
	return f.r.profileOf(value.Dim, value.Kind), true
}

// dimOfExpression reckons an expression of profiles for its dimension. is tells that it
// is one: others are numbers.
func (f fielder) dimOfExpression(n *node) (field *Field, is, ok bool) {
	expr, profiles, ok := f.compileWave(n, &Field{Type: Wave})
	if !ok || len(profiles) == 0 {
		return nil, !ok, false
	}
	term, err := f.r.c.term(expr, f.r.asWritten())
	var e *noWave
	switch {
	case errors.As(err, &e):
		f.r.at(n.span, Diagnostic{Code: "wave", Thing: f.o.thing(), Text: e.text})
		return nil, true, false
	case err != nil:
		f.r.report(f.r.c.dimension(f.o, n, nil, err))
		return nil, true, false
	}
	return f.r.profileOf(term.Value.Dim, term.Value.Kind), true, true
}
