package casefile

import (
	"fmt"

	"lagbook/network/quantity"
)

// limitKeys are the keys that state a limit, by LimitKind.
var limitKeys = [...]string{"stay_below", "stay_above", "reach", "settle", "overshoot_below"}

var limitFields = []Field{
	{Name: "of", Type: loose, Help: `"a node"`, Required: true},
	{Name: "above", Type: Name},
	{Name: "after", Type: Number, Dim: dimTime, HasMin: true},
	{Name: "until", Type: Number, Dim: dimTime, HasMin: true, MinOpen: true},
	{Name: "within", Type: Number, Dim: dimTime, HasMin: true, MinOpen: true},
	{Name: "margin", Type: loose},
	{Name: "stay_below", Type: loose, Help: `"90 °C"`},
	{Name: "stay_above", Type: loose},
	{Name: "reach", Type: loose, Help: `"90 °C"`, With: []string{"within"}},
	{Name: "settle", Type: loose, With: []string{"within"}},
	{Name: "overshoot_below", Type: loose},
}

var limitNotBuilt = []string{"limit.swing_below", "limit.rate_below", "limit.rise_rate_below", "limit.fall_rate_below", "limit.time_above", "limit.in"}

// limits reads [limit.NAME].
func (r *reader) limits(k *key) {
	if k.value.kind != kindTable {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "tables like [limit.NAME]")
		return
	}
	for i := range k.value.table.keys {
		l := &k.value.table.keys[i]
		if l.value.kind != kindTable {
			r.at(l.span, Diagnostic{Code: "wrong-type", Text: fmt.Sprintf("%s stands where the name of a limit is expected", quoted(l.name)), Hint: "write [limit.NAME] above it"})
			continue
		}
		r.limit(l)
	}
}

func (r *reader) limit(k *key) {
	o := owner{label: "limit " + quoted(k.name)}
	named := r.checkName(k, o)
	f := fielder{r: r, o: o, v: &Vocabulary{NotBuilt: limitNotBuilt}, word: "limit", header: k.span}
	list, _, ok := f.fields(k.value, limitFields, [][]string{limitKeys[:]})
	ask := AskLimit{Name: k.name, Ref: r.c.ref(k.span, o), Margin: noSlot}
	stated := map[string]*node{}
	for i := range list {
		x := &list[i]
		stated[x.name] = x.n
		switch x.name {
		case "of":
			var good bool
			ask.Of, good = r.shownList(o, x.n)
			ok = ok && good
		case "above":
			var good bool
			ask.Above, good = r.above(o, x.n)
			ok = ok && good
		case "after":
			ask.After, ask.HasAfter = x.slot, true
		case "until":
			ask.Until, ask.HasUntil = x.slot, true
		case "within":
			ask.Within, ask.HasWithin = x.slot, true
		case "margin":
			ask.HasMargin = true
		default:
			for kind, key := range limitKeys {
				if key == x.name {
					ask.Kind = LimitKind(kind)
				}
			}
		}
	}
	ok = ok && named && r.window(o, stated, &ask)
	if ok && ask.Above != "" {
		ok = r.rises(o, stated["above"], ask.Of)
	}
	if ok && r.demand(o, stated, &ask) {
		r.c.Questions.Limits = append(r.c.Questions.Limits, ask)
	}
}

// shownList reads a name or a list of names.
func (r *reader) shownList(o owner, n *node) ([]Shown, bool) {
	if n.kind == kindString {
		s, ok := r.shown(o, n)
		return []Shown{s}, ok
	}
	f := fielder{r: r, o: o}
	list, ok := f.names(n, &Field{Name: "of", Type: Names})
	var all []Shown
	for i := range list {
		s, good := r.shown(o, list[i].n)
		ok = ok && good
		all = append(all, s)
	}
	for _, s := range all {
		if ok && (s.Kind != all[0].Kind || s.Dim != all[0].Dim) {
			r.at(n.span, Diagnostic{Code: "kinds", Thing: o.thing(), Text: fmt.Sprintf("of mixes %s and %s, which are not of one kind", quoted(all[0].Text), quoted(s.Text))})
			ok = false
		}
	}
	return all, ok
}

// window checks the times of a limit against each other and the run.
func (r *reader) window(o owner, stated map[string]*node, ask *AskLimit) bool {
	at := func(s Slot, has bool) float64 {
		if has {
			return r.c.slots[s].si
		}
		return 0
	}
	ok := true
	after := at(ask.After, ask.HasAfter)
	for _, t := range []struct {
		name string
		has  bool
		at   float64
	}{{"after", ask.HasAfter, after}, {"until", ask.HasUntil, at(ask.Until, ask.HasUntil)}, {"within", ask.HasWithin, after + at(ask.Within, ask.HasWithin)}} {
		if t.has {
			ok = r.inRun(o, stated[t.name], t.name, t.at) && ok
		}
	}
	if ask.HasUntil && ask.HasAfter && at(ask.Until, true) <= after {
		r.at(stated["until"].span, Diagnostic{Code: "order", Thing: o.thing(), Text: fmt.Sprintf("until, %s, does not come after after, %s",
			quantity.Duration(at(ask.Until, true)), quantity.Duration(after))})
		ok = false
	}
	timed := ask.Kind == Reach || ask.Kind == Settle
	if ask.HasWithin && !timed {
		r.at(stated["within"].span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "within goes with reach and settle, not with " + ask.Kind.String(),
			Hint: "until ends the time in which a limit holds"})
		ok = false
	}
	if ask.HasUntil && timed {
		r.at(stated["until"].span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: "until does not go with " + ask.Kind.String() + "; within says how soon"})
		ok = false
	}
	return ok
}

// demand reads the level, band and margin of a limit.
func (r *reader) demand(o owner, stated map[string]*node, ask *AskLimit) bool {
	dim, kind := ask.Of[0].Dim, ask.Of[0].Kind
	apart := kind // of how far two of that kind are apart
	if kind == quantity.Level {
		apart = quantity.Difference
	}
	if ask.Above != "" {
		kind = apart
	}
	name := ask.Kind.String()
	n := stated[name]
	var ok bool
	switch ask.Kind {
	case StayBelow, StayAbove, Reach:
		ask.Level, ok = r.number(o, n, &Field{Name: name, Dim: dim, Kind: kind})
	default:
		ask.Level, ask.Percent, ok = r.band(o, n, name, dim, apart)
	}
	if !ok || !ask.HasMargin {
		return ok
	}
	m := &Field{Name: "margin", Dim: dim, Kind: apart, HasMin: true}
	switch {
	case ask.Kind == Reach || ask.Kind == Settle:
		m = &Field{Name: "margin", Dim: dimTime, HasMin: true}
	case ask.Percent:
		m = &Field{Name: "margin", HasMin: true}
	}
	ask.Margin, ok = r.number(o, stated["margin"], m)
	return ok
}

// band reads a percentage of the final change, or a difference.
func (r *reader) band(o owner, n *node, name string, dim quantity.Dim, kind quantity.Kind) (s Slot, percent, ok bool) {
	f := &Field{Name: name, Dim: dim, Kind: kind, HasMin: true, MinOpen: name == "settle"}
	if n = r.bareValue(o, n); n == nil {
		return noSlot, false, false
	}
	if n.kind == kindString || n.kind == kindInteger || n.kind == kindFloat {
		_, v, ok := r.quantity(o, n, &Field{Name: name})
		if !ok {
			return noSlot, false, false
		}
		if v.Dim == (quantity.Dim{}) {
			percent = true
			f = &Field{Name: name, HasMin: true, MinOpen: f.MinOpen, HasMax: name == "settle", Max: 1}
		}
	}
	s, ok = r.number(o, n, f)
	return s, percent, ok
}
