package casefile

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/quantity"
)

// AskFind is one [find.NAME]. Either it asks when When crosses Crosses, or NoSteady: the
// value of the given value Vary at which the steady state is lost, sought in Range where
// that is stated.
type AskFind struct {
	Name     string
	When     Shown
	Crosses  Slot
	NoSteady bool
	Vary     string
	Range    [2]Slot
	HasRange bool
	Source   string // where it comes from, "" if not stated
	Ref      network.Ref
}

const maxFinds = 1000

var findFields = []Field{
	{Name: "when", Type: Name},
	{Name: "crosses", Type: loose, Help: `"90 °C"`, With: []string{"when"}},
	{Name: "no_steady_state", Type: Flag, With: []string{"vary"}},
	{Name: "vary", Type: Name, With: []string{"no_steady_state"}},
	{Name: "range", Type: loose, With: []string{"vary"}, Help: `["20 °C", "80 °C"]`},
}

var findForms = [][]string{{"crosses", "no_steady_state"}}

// finds reads [find.NAME].
func (r *reader) finds(k *key) {
	if r.countNamed(k, maxFinds) {
		r.eachAsked(k, r.find)
	}
}

// find reads one.
func (r *reader) find(k *key) {
	o := owner{label: "find " + quoted(k.name)}
	ok := r.checkName(k, o)
	f := fielder{r: r, o: o, word: "find", header: k.span}
	list, source, good := f.fields(k.value, findFields, findForms)
	ok = ok && good
	ask := AskFind{Name: k.name, Source: source, Ref: r.c.ref(k.span, o), Crosses: noSlot}
	var crosses, ends *node
	vary := -1
	for i := range list {
		x := &list[i]
		good := true
		switch x.name {
		case "when":
			if good = x.n.kind == kindString && x.n.text != ""; good {
				ask.When, good = r.shown(o, x.n)
			}
		case "crosses":
			crosses = x.n
		case "no_steady_state":
			ask.NoSteady = true
			if good = x.n.text == "true"; x.n.kind == kindBoolean && !good {
				r.at(x.n.span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "no_steady_state: false asks for nothing", Fix: "true"})
			}
		case "vary":
			if good = x.n.kind == kindString && x.n.text != ""; good {
				vary, good = r.varied(o, x.n)
				ask.Vary = x.n.text
			}
		case "range":
			ends = x.n
		}
		ok = ok && good
	}
	if n := k.value.get("when"); n != nil && ask.NoSteady && crosses == nil {
		r.at(n.span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "when goes with crosses, not with no_steady_state"})
		ok = false
	}
	if ok && crosses != nil {
		ask.Crosses, ok = r.number(o, crosses, &Field{Name: "crosses", Dim: ask.When.Dim, Kind: ask.When.Kind})
	}
	if ok && ends != nil && vary >= 0 {
		ask.Range, ok = r.between(o, ends, vary)
		ask.HasRange = ok
	}
	if ok {
		r.c.Questions.Finds = append(r.c.Questions.Finds, ask)
	}
}

// varied finds the given value that an answer is sought for: a number of its own.
func (r *reader) varied(o owner, n *node) (int, bool) {
	i, ok := r.c.GivenIndex(n.text)
	switch {
	case ok && r.c.givens[i].bad:
		return i, false
	case ok && r.c.Given[i].Derived:
		d := Diagnostic{Code: "derived", Thing: o.thing(), Text: fmt.Sprintf("vary: %s is an expression, %s: it follows from others", quoted(n.text), quoted(r.c.Given[i].Text))}
		var from []string
		for _, u := range r.c.givens[i].uses {
			if !r.c.Given[u].Derived {
				from = append(from, r.c.Given[u].Name)
			}
		}
		if d.Hint = "vary a given value that is a number"; from != nil {
			d.Hint = "vary one that it is made of" + listed(from)
		}
		r.at(n.span, d)
		return i, false
	case ok:
		return i, true
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "vary: " + quoted(n.text) + " is not defined in [given]", Found: n.text, Want: "a given value"}
	var names []string
	for i := range r.c.Given {
		if !r.c.Given[i].Derived {
			names = append(names, r.c.Given[i].Name)
		}
	}
	if near, ok := quantity.Nearest(n.text, names); ok {
		d.Fix = basic(near)
	} else if d.Hint = "what varies is a number in [given]"; len(names) > 0 {
		d.Hint += listed(names)
	}
	r.at(n.span, d)
	return 0, false
}

// between reads the range in which a given value is varied.
func (r *reader) between(o owner, n *node, vary int) (ends [2]Slot, ok bool) {
	if n.kind != kindArray || len(n.items) != 2 {
		r.wrongType(o, n, &Field{Name: "range"}, "a list of two values, the lower and the upper")
		return ends, false
	}
	like := r.c.givens[vary].value
	f := &Field{Name: "range", Dim: like.Dim, Kind: like.Kind}
	if like.Dim == dimPressure && isLevel(like.Kind) {
		f.Kind = quantity.Level
	}
	ok = true
	for i, item := range n.items {
		var good bool
		ends[i], good = r.number(o, item, f)
		ok = ok && good
	}
	if !ok {
		return ends, false
	}
	if low, high := r.c.slots[ends[0]].si, r.c.slots[ends[1]].si; !(low < high) {
		r.at(n.span, Diagnostic{Code: "order", Thing: o.thing(), Text: fmt.Sprintf("range goes from %s to %s; the lower value comes first", r.c.show(low, f), r.c.show(high, f))})
		return ends, false
	}
	return ends, true
}
