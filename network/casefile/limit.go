package casefile

import (
	"fmt"

	"lagbook/network"
)

// LimitKind is what a limit demands.
type LimitKind uint8

const (
	StayBelow LimitKind = iota
	StayAbove
	Reach
	Settle
	OvershootBelow
	SwingBelow    // the greatest less the least
	RateBelow     // how fast it rises or falls
	RiseRateBelow // how fast it rises
	FallRateBelow // how fast it falls, as a positive number
	TimeAbove     // how long it is above Level, all stretches together
)

// String returns the key that states it.
func (k LimitKind) String() string { return limitKeys[k] }

// AskLimit is one [limit.NAME]. All of Of are levels, or all are differences
// (so are rises, where Above is stated), or all are flows or other quantities of one
// dimension. Level is in their unit: of stay_below, stay_above, reach and time_above a
// value of that kind; of swing_below a difference; of settle and overshoot_below the
// band, a difference or, where Percent, a fraction of the final change; of the rates
// such a difference in a second.
//
// Margin is like how far the limited value may be from Level: a difference for
// stay_below, stay_above and swing_below, a rate for rates, like Level for
// overshoot_below, and a time for reach, settle and time_above. Where MarginShare it is
// a fraction instead: of Level, of Within for reach and settle, of LessThan for
// time_above. A level of temperature has no fraction.
type AskLimit struct {
	Name        string
	Of          []Shown
	Above       string
	Kind        LimitKind
	Level       Slot
	Percent     bool
	LessThan    Slot // s: of time_above
	PerDay      bool // LessThan is meant of every day of 24 h
	Within      Slot
	After       Slot
	Until       Slot
	Margin      Slot
	HasWithin   bool
	HasAfter    bool
	HasUntil    bool
	HasMargin   bool
	MarginShare bool
	Source      string // where it comes from, "" if not stated
	InCycle     bool   // of the periodic state, not of the run: After, Until and Within are not stated then
	Ref         network.Ref
}

// limitKeys are the keys that state a limit, by LimitKind.
var limitKeys = [...]string{"stay_below", "stay_above", "reach", "settle", "overshoot_below",
	"swing_below", "rate_below", "rise_rate_below", "fall_rate_below", "time_above"}

var limitFields = []Field{
	{Name: "of", Type: loose, Help: `"a node"`, Required: true},
	{Name: "above", Type: Name},
	{Name: "after", Type: Number, Dim: dimTime, HasMin: true},
	{Name: "until", Type: Number, Dim: dimTime, HasMin: true, MinOpen: true},
	{Name: "within", Type: Number, Dim: dimTime, HasMin: true, MinOpen: true},
	{Name: "in", Type: Word, Words: []string{"cycle"}},
	{Name: "margin", Type: loose},
	{Name: "stay_below", Type: loose, Help: `"90 °C"`},
	{Name: "stay_above", Type: loose},
	{Name: "reach", Type: loose, Help: `"90 °C"`, With: []string{"within"}},
	{Name: "settle", Type: loose, With: []string{"within"}},
	{Name: "overshoot_below", Type: loose},
	{Name: "swing_below", Type: loose},
	{Name: "rate_below", Type: loose},
	{Name: "rise_rate_below", Type: loose},
	{Name: "fall_rate_below", Type: loose},
	{Name: "time_above", Type: loose},
}

// maxLimits is how many limits a case may have.
const maxLimits = 10_000

// limits reads [limit.NAME].
func (r *reader) limits(k *key) {
	if r.countNamed(k, maxLimits) {
		r.eachAsked(k, r.limit)
	}
}

func (r *reader) limit(k *key) {
	o := owner{label: "limit " + quoted(k.name)}
	named := r.checkName(k, o)
	f := fielder{r: r, o: o, word: "limit", header: k.span}
	list, source, ok := f.fields(k.value, limitFields, [][]string{limitKeys[:]})
	ask := AskLimit{Name: k.name, Source: source, Ref: r.c.ref(k.span, o), Margin: noSlot, LessThan: noSlot}
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
		case "in":
			ask.InCycle = x.n.text == "cycle"
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
