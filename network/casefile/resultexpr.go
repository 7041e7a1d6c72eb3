package casefile

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"lagbook/network/quantity"
)

// In the expression of a result a name stands for what is shown under it: a node, another
// result, or else a given value. Anything else that can be shown, and a name with spaces,
// stands between backquotes: "= `flow of c.foot` / `cold plate`".

// A ResultExpr is the expression of a result.
type ResultExpr struct {
	Operands []Shown
	Text     string // as written

	c      *Case
	expr   *quantity.Expr   // its slots are the operands, then the given values
	like   []quantity.Value // dimension and kind of each
	givens []Slot
}

// Eval computes the expression from the operands' values at one instant, in SI and the
// order of Operands, with the given values of v. It is NaN where it has no value: a
// division by zero, the root of a negative number. It may be called by several
// goroutines at once.
func (e *ResultExpr) Eval(x []float64, v Values) float64 {
	in := slices.Clone(e.like)
	for i := range in {
		if i < len(x) && i < len(e.Operands) {
			in[i].SI = x[i]
		} else if k := i - len(e.Operands); k >= 0 {
			in[i].SI = v.Num[e.givens[k]]
		}
	}
	out, err := e.expr.Eval(in)
	if err != nil {
		return math.NaN()
	}
	return out.SI
}

// resultExpression reads the expression of a result.
func (r *reader) resultExpression(o owner, n *node, ask *AskResult) bool {
	m := markNames(n)
	if !strings.HasPrefix(strings.TrimLeft(n.text, " \t"), "=") {
		r.at(n.span, Diagnostic{Code: "no-equals", Thing: o.thing(), Text: "expression: it begins with =", Fix: basic("= " + n.text)})
		return false
	}
	e := &ResultExpr{Text: n.text, c: r.c}
	names, ok := r.operandsOf(o, n, m)
	if !ok {
		return false
	}
	slots := map[string]int{}
	for i, name := range names {
		slots[name] = i
	}
	expr, err := quantity.Compile(m.text, func(name string) (int, bool) { i, ok := slots[name]; return i, ok || r.isOperand(m, name) })
	if err != nil {
		return false // compiled before
	}
	e.expr = expr
	for _, name := range names {
		at, written, shown := m.find(n, name)
		if shown || r.showable(name) {
			s, good := r.shownAs(o, at, written)
			ok = ok && good
			e.Operands = append(e.Operands, s)
			e.like = append(e.like, quantity.Value{Dim: s.Dim, Kind: r.exprKind(s.Dim, s.Kind)})
			continue
		}
		ok = r.givenOperand(o, at, name, e) && ok
	}
	if !ok {
		return false
	}
	if len(e.Operands) == 0 {
		r.at(n.span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "expression: nothing in it is shown by the network: it holds no node, reading or result", Hint: "a number belongs in [given]"})
		return false
	}
	v, ok := r.resultKind(o, n, m, e)
	ask.Expr, ask.Dim, ask.Text = e, v.Dim, n.text
	switch {
	case isLevel(v.Kind):
		ask.Kind = quantity.Level
	case v.Kind == quantity.Difference || v.Kind == quantity.Either:
		ask.Kind = quantity.Difference
	}
	return ok
}

// exprKind is the kind that an expression gives to something shown: a level of pressure
// is gauge or absolute as the case states it.
func (r *reader) exprKind(dim quantity.Dim, kind quantity.Kind) quantity.Kind {
	if dim == dimPressure && isLevel(kind) {
		return r.c.Pressures.Kind()
	}
	return kind
}

// givenOperand adds a given value to those that an expression uses.
func (r *reader) givenOperand(o owner, n *node, name string, e *ResultExpr) bool {
	i, _ := r.givenSlot(name)
	g := &r.c.givens[i]
	if r.use(i); g.bad {
		return false
	}
	f := &Field{Name: name, Dim: g.value.Dim, Kind: g.value.Kind}
	if f.Dim == dimPressure && isLevel(f.Kind) {
		f.Kind = quantity.Level
	}
	expr, err := quantity.Compile("= "+name, r.givenSlot)
	if err != nil {
		return false
	}
	si, dim, err := r.c.want(g.value, f)
	if err != nil {
		r.report(r.c.dimension(o, n, f, err))
		return false
	}
	e.givens = append(e.givens, r.c.addSlot(slot{expr: expr, si: si, dim: dim, field: f, n: n, owner: o}))
	e.like = append(e.like, quantity.Value{SI: si, Dim: dim, Kind: r.exprKind(dim, f.Kind)})
	return true
}

// resultKind finds the dimension and kind of what an expression comes to.
func (r *reader) resultKind(o owner, n *node, m marked, e *ResultExpr) (quantity.Value, bool) {
	t, err := e.expr.Curves(func(slot int) quantity.Term {
		t := quantity.Term{Value: e.like[slot]}
		if slot < len(e.Operands) {
			t.Curve = e
		}
		return t
	}, func(quantity.Step) (any, error) { return e, nil })
	if err == nil {
		return t.Value, true
	}
	r.report(r.c.dimension(o, n, &Field{Name: "expression"}, m.spelled(err)))
	return t.Value, false
}

// showable reports whether a name alone is shown: of a node or a result.
func (r *reader) showable(name string) bool {
	_, result := r.resultIndex[name]
	return result || r.isNode(name)
}

// isOperand reports whether a name may stand in the expression of a result.
func (r *reader) isOperand(m marked, name string) bool {
	if _, ok := m.names[name]; ok || r.showable(name) {
		return true
	}
	_, ok := r.givenSlot(name)
	return ok
}

// operandsOf lists the names that an expression uses: those shown, then given values.
func (r *reader) operandsOf(o owner, n *node, m marked) ([]string, bool) {
	if m.open >= 0 {
		r.at(n.part(m.open, 1), Diagnostic{Code: "quantity", Thing: o.thing(), Text: "expression: a ` that is not closed", Hint: "a name between backquotes ends with one"})
		return nil, false
	}
	if m.empty >= 0 {
		r.at(n.part(m.empty, 2), Diagnostic{Code: "missing-name", Thing: o.thing(), Text: "expression: there is no name between the backquotes"})
		return nil, false
	}
	var seen []string
	index := map[string]int{}
	expr, err := quantity.Compile(m.text, func(name string) (int, bool) {
		if !r.isOperand(m, name) {
			return 0, false
		}
		i, ok := index[name]
		if !ok {
			i = len(seen)
			index[name], seen = i, append(seen, name)
		}
		return i, true
	})
	if err != nil {
		r.noOperand(o, n, m, err)
		return nil, false
	}
	var shown, given []string
	for _, i := range expr.Uses() {
		name := seen[i]
		_, marked := m.names[name]
		if !marked && !r.showable(name) {
			given = append(given, name)
			continue
		}
		if _, two := r.givenSlot(name); two && !marked {
			at, _, _ := m.find(n, name)
			d := Diagnostic{Severity: Warning, Code: "two-meanings", Thing: o.thing(), Text: fmt.Sprintf("%s is shown by the network and a given value too; the first is meant here", quoted(name))}
			if at.span != n.span {
				d.Fix = "`" + name + "`"
			}
			r.at(at.span, d)
		}
		shown = append(shown, name)
	}
	return append(shown, given...), true
}

// noOperand reports what is wrong with the text of an expression.
func (r *reader) noOperand(o owner, n *node, m marked, err error) {
	if r.full() {
		r.report(Diagnostic{})
		return
	}
	f := &Field{Name: "expression"}
	err = m.spelled(err)
	var e *quantity.SyntaxError
	if !errors.As(err, &e) || e.Name == "" {
		r.report(r.c.syntax(o, n, f, err))
		return
	}
	if r.missing(e.Name) {
		return
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: label(f) + quoted(e.Name) + " is not a node, a result or a given value", Found: e.Name}
	at := n.part(e.Off, e.Len)
	if name, off := r.unquoted(n.text, e.Off, e.Len); name != "" {
		at = n.part(off, len(name))
		d.Text, d.Found, d.Fix = label(f)+quoted(name)+" stands between backquotes in an expression", name, "`"+name+"`"
	} else if part := r.c.parts(e.Name); len(part) > 0 {
		d.Text = fmt.Sprintf("%s%s is %s, not a node", label(f), quoted(e.Name), article(part[0].Table.Name))
		if has := part[0].readings(); len(has) > 0 {
			d.Fix = "`" + has[0] + " of " + e.Name + "`"
		}
	} else if near, ok := quantity.Nearest(e.Name, append(append(r.nodeNames(), r.resultNames()...), r.c.givenNames()...)); ok {
		d.Fix = operandText(near)
	} else {
		d.Hint = "a name with spaces, and a reading, stands between backquotes: `flow of x`"
	}
	if at == n.span {
		d.Fix = ""
	}
	r.at(at, d)
}

// unquoted returns the longest name in a text about a place that needs backquotes in an
// expression, of a node, a result or a reading, and where it begins; "" for none.
func (r *reader) unquoted(text string, off, length int) (longest string, at int) {
	try := func(name string) {
		if len(name) <= len(longest) || quantity.IsName(name) {
			return
		}
		from := max(0, off+length-len(name))
		if i := strings.Index(text[from:], name); i >= 0 && from+i <= off {
			longest, at = name, from+i
		}
	}
	for _, name := range append(r.nodeNames(), r.resultNames()...) {
		try(name)
	}
	for _, word := range r.readingWords() {
		if !strings.Contains(text, word+" of ") {
			continue
		}
		for _, e := range r.c.Elements {
			if e.domain != "" && e.shows(word) {
				try(word + " of " + e.FullName())
			}
		}
	}
	return longest, at
}

// operandText writes a name as it stands in the expression of a result.
func operandText(name string) string {
	if quantity.IsName(name) {
		return name
	}
	return "`" + name + "`"
}

// resultNames lists the results in file order.
func (r *reader) resultNames() []string {
	var names []string
	for i := range r.results {
		names = append(names, r.results[i].key.name)
	}
	return names
}
