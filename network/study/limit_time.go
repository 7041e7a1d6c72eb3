package study

import (
	"fmt"
	"math"
)

// reach judges reach: the first instant in the window at which the level is met.
// Within counts from after, else from 0.
func (t *trial) reach(v *Limit) []Warning {
	out := t.show.out
	v.Unit, v.Kind = "s", t.show.kind
	within := t.within(v)
	y0 := t.resp.At(out, t.t0)
	r, ok := t.resp.First(out, t.level, t.t0, t.t1)
	if ok && r.T <= t.t0 || math.Abs(y0-t.level) <= 4*t.slack {
		v.Text = fmt.Sprintf("already at %s when the window begins: nothing is shown by it", t.value(t.level))
		return []Warning{t.warning("true-at-start", v.Text)}
	}
	if !ok {
		return t.neverReached(v, y0)
	}
	if r.Capped {
		return []Warning{t.capped(v)}
	}
	v.At = &r.T
	t.judgeMargin(v, t.t0+within-r.T, within, t.asked())
	v.Text = fmt.Sprintf("reaches %s at %s", t.value(t.level), t.print.Time(r.T))
	t.timeWords(v)
	if r.Touch {
		v.Text += "; it only just touches the level"
		return []Warning{t.warning("touch", "an extreme just meets the level, within rounding")}
	}
	return nil
}

// neverReached says how near the output came.
func (t *trial) neverReached(v *Limit, y0 float64) []Warning {
	e, word := t.resp.Max(t.show.out, t.t0, t.t1), "highest"
	if y0 > t.level {
		e, word = t.resp.Min(t.show.out, t.t0, t.t1), "lowest"
	}
	v.Value, v.Unit = &e.Y, t.show.unit
	v.Text = fmt.Sprintf("never reaches %s in the run of %s; %s %s at %s", t.value(t.level), t.print.Time(t.run), word, t.value(e.Y), t.print.Time(e.T))
	if f, ok := t.resp.Final(t.show.out); ok {
		v.Text += "; in the end " + t.value(f)
		if (f-t.level)*(y0-t.level) <= 0 {
			v.Text += ", so later it does: let the run be longer"
			return []Warning{t.warning("beyond-the-run", "the level is reached only after the run")}
		}
	}
	return nil
}

// within is the time allowed.
func (t *trial) within(v *Limit) float64 {
	w := t.t1 - t.t0
	if t.ask.HasWithin {
		w = t.allowed
	}
	v.Within = &w
	return w
}

// timeWords adds the time left or exceeded.
func (t *trial) timeWords(v *Limit) {
	switch left := *v.Margin; {
	case left < 0:
		v.Text += fmt.Sprintf(", %s later than the %s allowed", t.print.Time(-left), t.print.Time(*v.Within))
	case !v.Met:
		v.Text += fmt.Sprintf(", only %s before the %s allowed where %s is asked", t.print.Time(left), t.print.Time(*v.Within), t.print.Time(t.asked()))
	default:
		v.Text += fmt.Sprintf(", %s before the %s allowed", t.print.Time(left), t.print.Time(*v.Within))
	}
}

// settle judges settle: the last instant outside the band about the steady
// state, or about the last value of the run where there is no steady state.
func (t *trial) settle(v *Limit) []Warning {
	out := t.show.out
	v.Unit, v.Kind = "s", kindDifference
	within := t.within(v)
	mid, band, warn := t.target(v)
	if !(band > 0) {
		v.Text = "cannot be judged: the value does not change, so a share of the change is no band"
		return append(warn, t.warning(nothingChanges, v.Text))
	}
	r, outside := t.resp.LastOutside(out, mid, band, t.t0, t.run)
	about := fmt.Sprintf("%s ± %s", t.value(mid), t.gap(band))
	if r.Capped {
		return append(warn, t.capped(v))
	}
	at := t.t0
	if outside {
		at = r.T
	}
	if outside && at >= t.run*(1-1e-12) {
		v.Text = fmt.Sprintf("not within %s when the run ends at %s", about, t.print.Time(t.run))
		return append(warn, t.warning("beyond-the-run", v.Text))
	}
	v.At = &at
	t.judgeMargin(v, t.t0+within-at, within, t.asked())
	if !outside {
		v.Text = "within " + about + " from the start of the window"
	} else {
		v.Text = "within " + about + " for good from " + t.print.Time(at)
	}
	t.timeWords(v)
	if r.Touch {
		warn = append(warn, t.warning("touch", "an extreme just meets the band: a small change moves the settling time by a swing"))
	}
	return warn
}

// target is the value to settle at and the half width of the band.
func (t *trial) target(v *Limit) (mid, band float64, warn []Warning) {
	mid, steady := t.resp.Final(t.show.out)
	if !steady {
		mid = t.resp.At(t.show.out, t.run)
		warn = append(warn, t.warning("no-steady-state", "there is no steady state to settle at: judged about the value at the end of the run, "+t.value(mid)))
	}
	if t.ask.Percent {
		v.LevelUnit, v.Kind = "1", ""
		return mid, t.level * math.Abs(mid-t.begin), warn
	}
	return mid, t.level, warn
}

// overshoot judges overshoot_below: how far the output goes past its final
// value, as a fraction of the change or as a difference.
func (t *trial) overshoot(v *Limit) []Warning {
	out := t.show.out
	final, band, warn := t.target(v)
	v.Unit, v.Kind = "1", ""
	change := final - t.begin
	sign, e := 1.0, t.resp.Max(out, t.t0, t.t1)
	if change < 0 {
		sign, e = -1, t.resp.Min(out, t.t0, t.t1)
	}
	if math.Abs(change) <= 8*t.slack {
		v.Text = "cannot be judged: the final value is the start value, so there is no change to exceed"
		return append(warn, t.warning(nothingChanges, v.Text))
	}
	over := math.Max(0, sign*(e.Y-final))
	by := t.gap(over)
	asked := t.asked()
	if t.ask.Percent {
		over /= math.Abs(change)
		band = t.level
		by = t.print.Percent(over) + " of the change"
	} else {
		v.Unit, v.Kind = t.show.unit, kindDifference
	}
	v.Value = &over
	if over > 0 {
		v.At = &e.T
	}
	t.judgeMargin(v, band-over, band, asked)
	limit := t.gap(band)
	if t.ask.Percent {
		limit = t.print.Percent(band)
	}
	if over == 0 {
		v.Text = fmt.Sprintf("never past its final %s", t.value(final))
		return warn
	}
	v.Text = fmt.Sprintf("goes %s past its final %s, to %s at %s; %s allowed", by, t.value(final), t.value(e.Y), t.print.Time(e.T), limit)
	return warn
}
