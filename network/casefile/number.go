package casefile

import (
	"errors"
	"math"
	"strings"

	"lagbook/network/quantity"
)

// number reads a quantity or an expression into a slot. ok is false where it is
// at fault; where that is because a given value it uses is, nothing is reported.
func (r *reader) number(o owner, n *node, f *Field) (s Slot, ok bool) {
	if n = r.bareValue(o, n); n == nil {
		return noSlot, false
	}
	if f.clock {
		if s, is, ok := r.clocked(o, n, f); is {
			return s, ok
		}
	}
	expr, v, ok := r.quantity(o, n, f)
	if !ok {
		return noSlot, false
	}
	if f.Unit == turns && strings.Contains(n.text, "rad") && !strings.HasPrefix(strings.TrimSpace(n.text), "=") {
		r.radians(o, n, f)
		return noSlot, false
	}
	si, dim, err := r.c.want(v, f)
	if err != nil {
		d := r.c.dimension(o, n, f, err)
		if expr == nil && f.Unit != "" && v.Dim == (quantity.Dim{}) && d.Fix != "" {
			d.Fix = basic(strings.TrimSpace(n.text) + " " + f.Unit)
		}
		if key := f.orFor(v.Dim); key != "" && d.Fix == "" && n.kind == kindString {
			d = r.src.place(d, n.span)
			d.Fix = "{ " + key + " = " + basic(n.text) + " }"
		}
		r.report(d)
		return noSlot, false
	}
	x := slot{expr: expr, si: si, dim: dim, field: f, n: n, owner: o}
	if d := r.c.inRange(&x, si); d != nil {
		r.report(*d)
		return noSlot, false
	}
	return r.c.addSlot(x), true
}

// bareValue is what stands for value in {value = …, source = …}, or n itself;
// nil after a fault.
func (r *reader) bareValue(o owner, n *node) *node {
	if n.kind == kindTable && n.get("value") != nil {
		n, _ = r.withSource(o, n)
	}
	return n
}

// addSlot keeps a slot.
func (c *Case) addSlot(x slot) Slot {
	c.slots = append(c.slots, x)
	s := Slot(len(c.slots) - 1)
	if x.expr != nil {
		c.moving = append(c.moving, s)
	}
	return s
}

// quantity reads what stands for a number: its expression, nil for a constant,
// and its value with the given values as written. f, which may be nil where
// the dimension is not known beforehand, only serves messages.
func (r *reader) quantity(o owner, n *node, f *Field) (*quantity.Expr, quantity.Value, bool) {
	var none quantity.Value
	if n = r.bareValue(o, n); n == nil {
		return nil, none, false
	}
	switch n.kind {
	case kindInteger, kindFloat:
		x := n.num
		if math.IsNaN(x) || math.IsInf(x, 0) {
			r.at(n.span, Diagnostic{Code: "not-finite", Thing: o.thing(), Text: label(f) + n.text + " is not a number a case can use"})
			return nil, none, false
		}
		if f != nil && !f.bare() {
			unit := unitOf(f)
			r.at(n.span, Diagnostic{Code: "no-unit", Thing: o.thing(), Text: label(f) + n.text + " has no unit; expected " + wanted(f),
				Found: n.text, Want: wanted(f), Fix: `"` + n.text + " " + unit + `"`})
			return nil, none, false
		}
		return nil, quantity.Value{SI: x, Text: n.text}, true
	case kindString:
		if strings.HasPrefix(strings.TrimLeft(n.text, " \t"), "=") {
			return r.expression(o, n, f)
		}
		v, err := r.parse(n.text)
		if err != nil {
			r.syntax(o, n, f, err)
			return nil, none, false
		}
		return nil, v, true
	}
	r.wrongType(o, n, f, wanted(f))
	return nil, none, false
}

// parse reads a quantity. Many in a case are written alike: each text is read once.
func (r *reader) parse(text string) (quantity.Value, error) {
	if v, ok := r.parsed[text]; ok {
		return v, nil
	}
	v, err := quantity.Parse(text)
	if err == nil {
		r.parsed[text] = v
	}
	return v, err
}

// expression compiles "= a + b".
func (r *reader) expression(o owner, n *node, f *Field) (*quantity.Expr, quantity.Value, bool) {
	expr, err := quantity.Compile(n.text, r.givenSlot)
	if err != nil {
		r.syntax(o, n, f, err)
		return nil, quantity.Value{}, false
	}
	for _, g := range expr.Uses() {
		r.use(g)
		if r.c.givens[g].bad {
			return nil, quantity.Value{}, false
		}
	}
	v, err := expr.Eval(r.known)
	if err != nil {
		r.report(r.c.dimension(o, n, f, err))
		return nil, v, false
	}
	if len(expr.Uses()) == 0 {
		expr = nil
	}
	return expr, v, true
}

// evaluate computes a slot from given values.
func (c *Case) evaluate(s *slot, known []quantity.Value) (float64, *Diagnostic) {
	v, err := s.expr.Eval(known)
	if err != nil {
		d := c.dimension(s.owner, s.n, s.field, err)
		return 0, &d
	}
	f := s.field
	if len(f.Also) > 0 { // what the value may be was settled when the file was read
		one := *f
		one.Dim, one.Also = s.dim, nil
		f = &one
	}
	si, _, err := c.want(v, f)
	if err != nil {
		d := c.dimension(s.owner, s.n, s.field, err)
		return 0, &d
	}
	return si, c.inRange(s, si)
}

// inRange checks a value against its field's bounds.
func (c *Case) inRange(s *slot, si float64) *Diagnostic {
	f := s.field
	if len(f.Also) > 0 && s.dim != f.Dim {
		one := *f
		one.Dim = s.dim
		f = &one
	}
	must := ""
	least, words := c.lowest(f)
	switch {
	case math.IsNaN(si) || math.IsInf(si, 0):
		must = "a finite number"
	case si < least:
		must = "at or above " + words
	case f.HasMin && f.MinOpen && !(si > f.Min):
		must = "above " + c.show(f.Min, f)
		switch {
		case f.Min == 0 && f.Kind == quantity.Level:
			must = "above absolute zero"
		case f.Min == 0:
			must = "positive"
		}
	case f.HasMin && si < f.Min:
		must = c.show(f.Min, f) + " or above"
	case f.HasMax && si > f.Max:
		must = c.show(f.Max, f) + " or below"
	default:
		return nil
	}
	found := brief(s.n.text)
	if s.expr != nil || strings.HasPrefix(strings.TrimSpace(found), "=") {
		found = c.show(si, f) + " (" + found + ")"
	}
	d := c.src.place(Diagnostic{Code: "range", Thing: s.owner.thing(), Text: f.Name + " is " + found + ", must be " + must,
		Found: found, Want: must, Hint: c.setBy(s)}, s.n.span)
	return &d
}

var dimLength = quantity.Dim{0, 1, 0, 0, 0}
var dimKelvin = quantity.Dim{0, 0, 0, 1, 0}
var dimTime = quantity.Dim{0, 0, 1, 0, 0}

// syntax reports an error of reading a quantity or an expression.
func (r *reader) syntax(o owner, n *node, f *Field, err error) {
	if r.full() {
		r.report(Diagnostic{})
		return
	}
	if r.changes(o, n, f, err) {
		return
	}
	d := r.c.syntax(o, n, f, err)
	if expr, bad := quantity.Compile(n.text, r.givenSlot); bad == nil && len(expr.Uses()) > 0 && !strings.HasPrefix(strings.TrimSpace(n.text), "=") {
		d = r.src.place(Diagnostic{Code: "no-equals", Thing: o.thing(), Text: label(f) + "an expression begins with =", Fix: basic("= " + n.text)}, n.span)
	}
	r.report(d)
}

// syntax places an error of reading a quantity or an expression.
func (c *Case) syntax(o owner, n *node, f *Field, err error) Diagnostic {
	d := Diagnostic{Code: "quantity", Thing: o.thing(), Text: label(f) + err.Error()}
	var e *quantity.SyntaxError
	if !errors.As(err, &e) {
		return c.dimension(o, n, f, err)
	}
	d.Found, d.Want = e.Found, e.Want
	d.Text = label(f) + e.Found
	if e.Want != "" && e.Want != "a unit" { // that it is not one has been said
		d.Text += "; expected " + e.Want
	}
	at := n.part(e.Off, e.Len)
	switch {
	case e.Name != "":
		d.Code = "unknown-name"
		names, where := c.namesFor(f)
		d.Text = label(f) + quoted(e.Name) + " is not defined in " + where
		if near, ok := quantity.Nearest(e.Name, append(o.e.inner().givenNames(), names...)); ok {
			d.Fix = near
			if at == n.span {
				d.Fix = basic(strings.Replace(n.text, e.Name, near, 1))
			}
		}
	case e.Suggest != "":
		d.Fix, at = narrowed(n, e.Suggest)
	}
	return c.src.place(d, at)
}

// narrowed makes a replacement for a whole text one for the part that differs,
// cut at what belongs together, so that the underline shows where to look.
func narrowed(n *node, suggest string) (string, span) {
	if !n.exact || strings.ContainsAny(suggest, "\"\\'") {
		return basic(suggest), n.span
	}
	old := n.text
	from := 0
	for from < len(old) && from < len(suggest) && old[from] == suggest[from] {
		from++
	}
	// back to the beginning of the unit or word
	from = strings.LastIndexAny(old[:from], " \t") + 1
	if from >= len(old) || from >= len(suggest) {
		return basic(suggest), n.span
	}
	return suggest[from:], span{n.inner + int32(from), n.inner + int32(len(old))}
}

// basic writes a text as a TOML string.
func basic(s string) string {
	r := strings.NewReplacer(`\`, `\\`, `"`, `\"`, "\n", `\n`, "\t", `\t`, "\r", `\r`)
	return `"` + r.Replace(s) + `"`
}

// dimension places an error about the dimension or the value of a quantity.
func (c *Case) dimension(o owner, n *node, f *Field, err error) Diagnostic {
	d := Diagnostic{Code: "dimension", Thing: o.thing(), Text: label(f) + err.Error()}
	at := n.span
	var e *quantity.DimensionError
	var v *quantity.ValueError
	switch {
	case errors.As(err, &e):
		d.Found, d.Want = e.Found, e.Expected
		if e.Suggest != "" {
			d.Fix = basic(e.Suggest)
		} else {
			at = n.part(e.Off, e.Len)
		}
	case errors.As(err, &v):
		d.Code, d.Found, d.Want = "value", v.Found, v.Expected
		at = n.part(v.Off, v.Len)
	default:
		return c.src.place(d, at)
	}
	d.Text = label(f) + d.Found
	if d.Want != "" {
		d.Text += "; expected " + d.Want
	}
	return c.src.place(d, at)
}

// label is the name of a field before a message about its value.
func label(f *Field) string {
	if f == nil || f.Name == "" {
		return ""
	}
	return f.Name + ": "
}
