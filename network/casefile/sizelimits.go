package casefile

import (
	"fmt"
	"slices"

	"lagbook/network/quantity"
)

// toMeet reads which limits a size is to meet: all, unless it lists some.
func (r *reader) toMeet(o owner, k *key, n *node, asked []*key, ask *AskSize) bool {
	known := limitNames(asked)
	if len(known) == 0 {
		r.at(k.span, Diagnostic{Code: "missing-key", Thing: o.thing(), Text: "the case states no limit that a size could meet", Hint: "add [limit.NAME]"})
		return false
	}
	if n == nil {
		return true
	}
	var ok bool
	if ask.ToMeet, ok = r.listed(o, n, "to_meet", "the name of a limit", known); !ok {
		return false
	}
	if len(ask.ToMeet) == 0 {
		r.at(n.span, Diagnostic{Code: "missing-name", Thing: o.thing(), Text: "to_meet names no limit", Hint: "leave it out to meet all, or name some of" + listed(known)})
		return false
	}
	return true
}

// sizeMargin reads the margin with which the limits are to be met: in the unit of their own
// margins, or a share.
func (r *reader) sizeMargin(o owner, n *node, ask *AskSize) (ok bool) {
	if n = r.bareValue(o, n); n == nil {
		return false
	}
	v, plain := r.peek(n)
	for i := range r.c.Questions.Limits {
		l := &r.c.Questions.Limits[i]
		if ask.ToMeet != nil && !slices.Contains(ask.ToMeet, l.Name) {
			continue
		}
		f, shared := l.marginField()
		text := ""
		switch {
		case !plain || v.Dim == f.Dim:
		case v.Dim == (quantity.Dim{}) && !shared:
			text = fmt.Sprintf("margin: %s is a share, and limit %s is on a level, which has no parts", quoted(n.text), quoted(l.Name))
		case v.Dim != (quantity.Dim{}):
			text = fmt.Sprintf("margin: %s is no margin of limit %s, which is %s", quoted(n.text), quoted(l.Name), wanted(f))
		}
		if text != "" {
			r.at(n.span, Diagnostic{Code: "dimension", Thing: o.thing(), Text: text, Hint: "write a margin that fits, or name in to_meet the limits it is for"})
			return false
		}
		if v.Dim != (quantity.Dim{}) || f.Dim == (quantity.Dim{}) {
			ask.Margin, ask.HasMargin = noSlot, true
			if ask.Margin, ok = r.number(o, n, f); !ok {
				return false
			}
		}
	}
	if ask.Margin == noSlot {
		ask.HasMargin, ask.MarginShare = true, true
		ask.Margin, ok = r.number(o, n, &Field{Name: "margin", HasMin: true, HasMax: true, Max: 1})
		return ok
	}
	return true
}

// marginField is the field of a limit's margin, and whether it may be a share.
func (l *AskLimit) marginField() (f *Field, shared bool) {
	f = &Field{Name: "margin", Dim: l.Of[0].Dim, Kind: l.Of[0].Kind, HasMin: true}
	level := f.Kind == quantity.Level && l.Above == ""
	if f.Kind == quantity.Level {
		f.Kind = quantity.Difference
	}
	switch l.Kind {
	case Reach, Settle, TimeAbove:
		return &Field{Name: "margin", Dim: dimTime, HasMin: true}, true
	case RateBelow, RiseRateBelow, FallRateBelow:
		f = rateField("margin", l.Of[0].Dim)
		f.MinOpen = false
		return f, true
	case OvershootBelow:
		if l.Percent {
			return &Field{Name: "margin", HasMin: true}, false
		}
		return f, true
	case SwingBelow:
		return f, true
	}
	return f, !level || f.Dim != dimKelvin
}
