package study

// swing judges swing_below: the highest less the lowest value of the window.
func (t *trial) swing(v *Limit) []Warning {
	hi, lo := t.resp.Max(t.show.out, t.t0, t.t1), t.resp.Min(t.show.out, t.t0, t.t1)
	swing := hi.Y - lo.Y
	if swing <= 4*t.slack {
		swing = 0 // they differ by rounding only
	}
	v.Kind = differenceOf(t.show.kind)
	v.Value = &swing
	at := max(hi.T, lo.T)
	v.At = &at
	t.judgeMargin(v, t.level-swing, t.level, t.asked())
	v.Text = "swings by " + t.gap(swing) + ", from " + t.value(lo.Y) + " at " + t.print.Time(lo.T) + " to " + t.value(hi.Y) + " at " + t.print.Time(hi.T) + t.gapWords(v)
	if (hi.Capped || lo.Capped) && *v.Margin >= 0 {
		v.Met = false
		return []Warning{t.capped(v)}
	}
	return nil
}

// gapWords says how far a difference is from the one allowed.
func (t *trial) gapWords(v *Limit) string {
	switch m := *v.Margin; {
	case m < 0:
		return ", " + t.gap(-m) + " more than the " + t.gap(t.level) + " allowed"
	case !v.Met:
		return ", only " + t.gap(m) + " less than the " + t.gap(t.level) + " allowed where " + t.gap(t.asked()) + " is asked"
	default:
		return ", " + t.gap(m) + " less than the " + t.gap(t.level) + " allowed"
	}
}
