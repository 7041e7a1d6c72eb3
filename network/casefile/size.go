package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

const (
	maxSizes   = 100
	maxChoices = 1000 // values of choose_from
)

var sizeFields = []Field{
	{Name: "vary", Type: Name, Required: true},
	{Name: "range", Type: loose, Help: `["1 K/W", "20 K/W"]`},
	{Name: "choose_from", Type: loose, Help: `["1 K/W", "2 K/W"]`},
	{Name: "catalogue", Type: Text, Help: `"parts.csv"`},
	{Name: "least", Type: Text, With: []string{"catalogue"}},
	{Name: "to_meet", Type: loose, Help: `["a limit"]`},
	{Name: "margin", Type: loose},
	{Name: "series", Type: Word, Words: []string{"E12", "E24", "R10", "R20"}, With: []string{"range"}},
	{Name: "want", Type: Word, Words: []string{"smallest", "largest"}},
}

var sizeForms = [][]string{{"range", "choose_from", "catalogue"}}

// sizes reads [size.NAME], after all that a given value may have an effect on.
func (r *reader) sizes(asked []*key) {
	for _, k := range asked {
		if k.name == "size" && r.countNamed(k, maxSizes) {
			r.eachAsked(k, func(x *key) { r.size(x, asked) })
		}
	}
}

// size reads one.
func (r *reader) size(k *key, asked []*key) {
	o := owner{label: "size " + quoted(k.name)}
	ok := r.checkName(k, o)
	f := fielder{r: r, o: o, word: "size", header: k.span}
	list, source, good := f.fields(k.value, sizeFields, sizeForms)
	if !good || !ok {
		return
	}
	ask := AskSize{Name: k.name, Source: source, Ref: r.c.ref(k.span, o), Margin: noSlot, PerUnit: 1}
	at := map[string]*node{}
	for i := range list {
		at[list[i].name] = list[i].n
	}
	if n := at["vary"]; n.kind != kindString || n.text == "" {
		return // reported where it was read
	}
	vary, ok := r.sized(o, at["vary"])
	if !ok {
		return
	}
	ask.Vary = at["vary"].text
	if n := at["want"]; n != nil {
		ask.Want = n.text
	}
	switch {
	case at["range"] != nil:
		if ask.Range, ok = r.sizeRange(o, at["range"], vary); ok {
			ask.HasRange = true
			ok = r.series(o, at, vary, &ask)
		}
	case at["choose_from"] != nil:
		ask.Choose, ok = r.choices(o, at["choose_from"], vary)
	default:
		ask.Catalogue, ok = r.catalogue(f, k.value, at, vary)
	}
	ok = r.toMeet(o, k, at["to_meet"], asked, &ask) && ok
	if n := at["margin"]; ok && n != nil {
		ok = r.sizeMargin(o, n, &ask)
	}
	if ok {
		r.c.Questions.Sizes = append(r.c.Questions.Sizes, ask)
	}
}

// sized finds the given value that is sized, on which something must depend and which must
// not shape the network.
func (r *reader) sized(o owner, n *node) (int, bool) {
	i, ok := r.varied(o, n)
	if !ok {
		return i, false
	}
	if !r.c.givens[i].used {
		r.at(n.span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "vary: nothing in the case depends on " + quoted(n.text) + ": no value of it meets a limit sooner than another"})
		return i, false
	}
	return i, r.variable(o, n, i)
}

// variable refuses a given value that shapes the network, which is built once.
func (r *reader) variable(o owner, n *node, given int) bool {
	for _, s := range r.c.moving {
		x := &r.c.slots[s]
		if x.field != nil && x.field.Structural && r.reaches(x.expr.Uses(), given) {
			r.at(n.span, Diagnostic{Code: "structural", Thing: o.thing(), Text: fmt.Sprintf("%s shapes the network, by %s of %s: it cannot be varied", quoted(r.c.Given[given].Name), x.field.Name, x.owner.thing())})
			return false
		}
	}
	return true
}

// reaches reports whether some given values are, or are made of, another.
func (r *reader) reaches(uses []int, given int) bool {
	seen := map[int]bool{}
	for len(uses) > 0 {
		u := uses[len(uses)-1]
		uses = uses[:len(uses)-1]
		if u == given {
			return true
		}
		if !seen[u] {
			seen[u] = true
			uses = append(uses, r.c.givens[u].uses...)
		}
	}
	return false
}

// likeGiven is a field that takes what a given value may be.
func (r *reader) likeGiven(name string, given int) *Field {
	like := r.c.givens[given].value
	f := &Field{Name: name, Dim: like.Dim, Kind: like.Kind}
	if like.Dim == dimPressure && isLevel(like.Kind) {
		f.Kind = quantity.Level
	}
	return f
}

// sizeRange reads the range that is searched: it has one sign, unless of levels.
func (r *reader) sizeRange(o owner, n *node, vary int) (ends [2]Slot, ok bool) {
	if ends, ok = r.between(o, n, vary); !ok {
		return ends, false
	}
	f := r.likeGiven("range", vary)
	low, high := r.c.slots[ends[0]].si, r.c.slots[ends[1]].si
	if f.Kind != quantity.Level && low < 0 && high > 0 {
		r.at(n.span, Diagnostic{Code: "crosses-zero", Thing: o.thing(), Text: fmt.Sprintf("range goes from %s to %s and crosses zero: what is sized has one sign", r.c.show(low, f), r.c.show(high, f)),
			Hint: "let the range begin, or end, at zero"})
		return ends, false
	}
	return ends, true
}

// series reads the series of preferred numbers and the unit that they count in.
func (r *reader) series(o owner, at map[string]*node, vary int, ask *AskSize) bool {
	n := at["series"]
	if n == nil {
		return true
	}
	low := at["range"].items[0]
	if f := r.likeGiven("range", vary); f.Kind == quantity.Level || r.c.slots[ask.Range[1]].si <= 0 || r.c.slots[ask.Range[0]].si < 0 {
		r.at(n.span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "series: preferred numbers are positive, and those of sizes; " + quoted(ask.Vary) + " is " + wanted(f)})
		return false
	}
	ask.Series, ask.Unit = n.text, quantity.UnitOf(r.c.givens[vary].value.Dim)
	if low = r.bareValue(o, low); low != nil && low.kind == kindString && !strings.HasPrefix(strings.TrimSpace(low.text), "=") {
		unit := strings.TrimLeft(strings.TrimSpace(low.text), "0123456789.,_+-−eE \u00a0\u202f\u2009")
		if v, err := quantity.Parse("1 " + unit); err == nil && v.SI > 0 {
			ask.Unit, ask.PerUnit = unit, v.SI
		}
	}
	return true
}

// choices reads the values of choose_from.
func (r *reader) choices(o owner, n *node, vary int) (list []Slot, ok bool) {
	f := r.likeGiven("choose_from", vary)
	if n.kind != kindArray || len(n.items) == 0 {
		r.wrongType(o, n, f, "a list of values, like ["+sample(f)+"]")
		return nil, false
	}
	if len(n.items) > maxChoices {
		r.at(n.span, Diagnostic{Code: "too-many", Thing: o.thing(), Text: fmt.Sprintf("choose_from has %d values, more than the %d it may have", len(n.items), maxChoices)})
		return nil, false
	}
	ok = true
	for _, item := range n.items {
		s, good := r.number(o, item, f)
		ok = ok && good
		list = append(list, s)
	}
	return list, ok
}
