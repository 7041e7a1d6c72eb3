package study

import (
	"math"

	"lagbook/network/casefile"
)

// stay judges stay_below and stay_above: the extreme over the window against the level.
func (t *trial) stay(v *Limit) []Warning {
	out := t.show.out
	sign, e, word := 1.0, t.resp.Max(out, t.t0, t.t1), "highest"
	lo, hi := math.Inf(-1), t.level
	if t.ask.Kind == casefile.StayAbove {
		sign, e, word = -1, t.resp.Min(out, t.t0, t.t1), "lowest"
		lo, hi = t.level, math.Inf(1)
	}
	v.Value, v.At = &e.Y, &e.T
	way := sign * (t.level - t.begin)
	t.judgeMargin(v, sign*(t.level-e.Y), way, t.asked())
	if r, ok := t.resp.FirstOutside(out, lo, hi, t.t0, t.t1); ok && !v.Met {
		v.FirstOutside = &r.T
	}
	v.Text = word + " " + t.apart(e.Y) + " at " + t.print.Time(e.T)
	if e.AtLeft {
		v.Text += ", just before a jump"
	}
	switch {
	case v.FirstOutside != nil:
		v.Text += ", " + t.gap(-*v.Margin) + " beyond " + t.value(t.level) + "; first beyond at " + t.print.Time(*v.FirstOutside)
	case !v.Met && *v.Margin >= 0:
		v.Text += ", only " + t.gap(*v.Margin) + " from " + t.value(t.level) + " where " + t.gap(t.asked()) + " is asked"
	default:
		v.Text += ", " + t.gap(*v.Margin) + " from " + t.value(t.level)
	}
	if e.T >= t.run && t.t1 >= t.run && t.cycle == 0 {
		if f, ok := t.resp.Final(out); ok && sign*(f-e.Y) > 0 && t.apart(f) != t.apart(e.Y) {
			v.Text += "; still on its way to " + t.apart(f)
			if sign*(f-t.level) > 0 {
				v.Text += ", which is beyond the level, when the run ends"
			}
		}
	}
	if e.Capped && *v.Margin >= 0 { // a level passed somewhere is passed, however far the search came
		v.Met = false
		return []Warning{t.capped(v)}
	}
	return nil
}

// capped says that a search was given up: what was found so far proves nothing.
func (t *trial) capped(v *Limit) Warning {
	found := ""
	if v.Text != "" {
		found = "; so far " + v.Text
	}
	v.Text = "cannot be judged: the search was given up, the loads change too often" + found
	return t.warning("search-stopped", "the search for its extreme or crossing was given up")
}

// asked is the margin the case asks for, in the limit's unit.
func (t *trial) asked() float64 {
	if t.ask.HasMargin {
		return t.margin
	}
	return 0
}
