package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// window checks the times of a limit against each other and the run.
func (r *reader) window(o owner, stated map[string]*node, ask *AskLimit) bool {
	at := func(s Slot, has bool) float64 {
		if has {
			return r.c.slots[s].si
		}
		return 0
	}
	timed := ask.Kind == Reach || ask.Kind == Settle
	if ask.InCycle && (timed || ask.Kind == OvershootBelow) {
		r.at(stated["in"].span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: `in = "cycle" does not go with ` + ask.Kind.String() + ": nothing in a cycle comes to rest",
			Hint: "in a cycle there are stay_below, stay_above, swing_below, the rates and time_above"})
		return false
	}
	ok := true
	after := at(ask.After, ask.HasAfter)
	for _, t := range []struct {
		name string
		has  bool
		at   float64
	}{{"after", ask.HasAfter, after}, {"until", ask.HasUntil, at(ask.Until, ask.HasUntil)}, {"within", ask.HasWithin, after + at(ask.Within, ask.HasWithin)}} {
		switch {
		case t.has && ask.InCycle:
			r.at(stated[t.name].span, Diagnostic{Code: "no-effect", Thing: o.thing(), Text: t.name + ` does not go with in = "cycle": a cycle has no beginning`})
			ok = false
		case t.has:
			ok = r.inRun(o, stated[t.name], t.name, t.at) && ok
		}
	}
	if !ok {
		return false
	}
	if ask.HasUntil && ask.HasAfter && at(ask.Until, true) <= after {
		r.at(stated["until"].span, Diagnostic{Code: "order", Thing: o.thing(), Text: fmt.Sprintf("until, %s, does not come after after, %s",
			quantity.Duration(at(ask.Until, true)), quantity.Duration(after))})
		ok = false
	}
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

// demand reads what a limit demands, and its margin.
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
	margin := &Field{Name: "margin", Dim: dim, Kind: apart, HasMin: true}
	shared := kind != quantity.Level || dim != dimKelvin // a margin may be a part of the limit
	var ok bool
	switch ask.Kind {
	case StayBelow, StayAbove:
		ask.Level, ok = r.number(o, n, &Field{Name: name, Dim: dim, Kind: kind})
	case Reach:
		margin, shared = &Field{Name: "margin", Dim: dimTime, HasMin: true}, true
		ask.Level, ok = r.number(o, n, &Field{Name: name, Dim: dim, Kind: kind})
	case SwingBelow:
		shared = true
		ask.Level, ok = r.number(o, n, &Field{Name: name, Dim: dim, Kind: apart, HasMin: true, MinOpen: true})
	case RateBelow, RiseRateBelow, FallRateBelow:
		margin = rateField("margin", dim)
		shared = true
		ask.Level, ok = r.rate(o, n, rateField(name, dim))
	case TimeAbove:
		margin, shared = &Field{Name: "margin", Dim: dimTime, HasMin: true}, true
		ok = r.timeAbove(o, n, &Field{Name: name + ".level", Dim: dim, Kind: kind}, ask)
	default:
		ask.Level, ask.Percent, ok = r.band(o, n, name, dim, apart)
		if !ok {
			return false // whether a margin is a share depends on the band
		}
		if shared = ask.Kind == Settle || !ask.Percent; ask.Percent {
			margin.Dim, margin.Kind = quantity.Dim{}, quantity.Plain
		}
		if ask.Kind == Settle {
			margin = &Field{Name: "margin", Dim: dimTime, HasMin: true}
		}
	}
	if !ask.HasMargin {
		return ok
	}
	margin.MinOpen = false
	return r.margin(o, stated["margin"], margin, shared, ask) && ok
}

// rateField is the field of how fast something of a dimension changes.
func rateField(name string, dim quantity.Dim) *Field {
	f := &Field{Name: name, Dim: dim, HasMin: true, MinOpen: true}
	f.Dim[2]--
	if dim == dimKelvin {
		f.Unit = "K/min"
	}
	return f
}

// rate reads how fast something may change; where the time is missing it offers one.
func (r *reader) rate(o owner, n *node, f *Field) (Slot, bool) {
	apart := f.Dim
	apart[2]++
	if v, ok := r.peek(n); ok && v.Dim == apart && v.Dim != (quantity.Dim{}) && n.kind == kindString {
		d := Diagnostic{Code: "dimension", Thing: o.thing(), Found: n.text, Text: fmt.Sprintf("%s: %s is no rate: it lacks a time", f.Name, quoted(n.text))}
		unit := strings.TrimSpace(n.text) + "/min"
		if v, err := quantity.Parse(unit); err == nil && v.Dim == f.Dim {
			d.Fix = basic(unit)
		} else {
			d.Hint = "a rate is " + wanted(f)
		}
		r.at(n.span, d)
		return noSlot, false
	}
	return r.number(o, n, f)
}

// margin reads a margin: in the unit of the limit or, where it may be, a part of it.
func (r *reader) margin(o owner, n *node, f *Field, shared bool, ask *AskLimit) (ok bool) {
	if shared && f.Dim != (quantity.Dim{}) {
		if n = r.bareValue(o, n); n == nil {
			return false
		}
		if v, plain := r.peek(n); plain && v.Dim == (quantity.Dim{}) && n.kind == kindString {
			ask.MarginShare = true
			f = &Field{Name: "margin", HasMin: true, HasMax: true, Max: 1}
		}
	}
	ask.Margin, ok = r.number(o, n, f)
	return ok
}

// timeAbove reads {level, less_than, per}.
func (r *reader) timeAbove(o owner, n *node, level *Field, ask *AskLimit) bool {
	if n.kind != kindTable {
		r.wrongType(o, n, &Field{Name: ask.Kind.String()}, "a table like { level = "+sample(&Field{Dim: level.Dim, Kind: level.Kind})+`, less_than = "1 h" }`)
		return false
	}
	fields := []Field{
		{Name: "level", Type: loose, Required: true, Help: sample(&Field{Dim: level.Dim, Kind: level.Kind})},
		{Name: "less_than", Type: Number, Dim: dimTime, Required: true, HasMin: true, MinOpen: true},
		{Name: "per", Type: Word, Words: []string{"day"}},
	}
	f := fielder{r: r, o: o, word: "time_above", header: n.span}
	list, _, ok := f.fields(n, fields, nil)
	for i := range list {
		x := &list[i]
		switch x.name {
		case "level":
			var good bool
			ask.Level, good = r.number(o, x.n, level)
			ok = ok && good
		case "less_than":
			ask.LessThan = x.slot
		case "per":
			ask.PerDay = x.n.text == "day"
		}
	}
	if day := 86400.0; ok && ask.PerDay && r.c.slots[ask.LessThan].si > day {
		r.at(n.get("less_than").span, Diagnostic{Code: "range", Thing: o.thing(), Text: "less_than is " + quoted(n.get("less_than").text) + " per day, more than a day has"})
		return false
	}
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
