package study

import (
	"math"

	"lagbook/laplace"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// rate judges rate_below, rise_rate_below and fall_rate_below: the extreme of the
// derivative in the window. What jumps has no rate that is below anything.
func (t *trial) rate(v *Limit) []Warning {
	out := t.show.out
	v.Unit = unitOf(over(dimOf(t.show.unit), quantity.Dim{0, 0, 1, 0, 0}))
	v.LevelUnit, v.Kind = v.Unit, ""
	if jump, ok := t.jump(); ok {
		v.At, v.FirstOutside = &jump.T, &jump.T
		v.Text = "jumps by " + t.gap(jump.Y) + " at " + t.print.Time(jump.T) + ", which is faster than any rate"
		return nil
	}
	var e laplace.Extreme
	word := "rises"
	switch t.ask.Kind {
	case casefile.RiseRateBelow:
		e = t.resp.MaxRate(out, t.t0, t.t1)
	case casefile.FallRateBelow:
		e, word = t.resp.MinRate(out, t.t0, t.t1), "falls"
	default:
		e = t.resp.MaxRate(out, t.t0, t.t1)
		if d := t.resp.MinRate(out, t.t0, t.t1); -d.Y > e.Y {
			e, word = d, "falls"
		}
	}
	rate := e.Y
	if word == "falls" {
		rate = -rate
	}
	rate = math.Max(rate, 0) // what only falls rises by nothing
	v.Value, v.At = &rate, &e.T
	t.judgeMargin(v, t.level-rate, t.level, t.asked())
	unit, factor := t.perTime()
	say := func(x float64) string {
		return t.print.Number(t.print.In(x*factor, t.show.unit, differenceOf(t.show.kind))) + " " + unit
	}
	switch m := *v.Margin; {
	case m < 0:
		v.Text = word + " by " + say(rate) + " at " + t.print.Time(e.T) + ", " + say(-m) + " more than the " + say(t.level) + " allowed"
	case !v.Met:
		v.Text = word + " by " + say(rate) + " at " + t.print.Time(e.T) + ", only " + say(m) + " less than the " + say(t.level) + " allowed where " + say(t.asked()) + " is asked"
	default:
		v.Text = word + " by " + say(rate) + " at most, at " + t.print.Time(e.T) + ", " + say(m) + " less than the " + say(t.level) + " allowed"
	}
	if e.Capped && *v.Margin >= 0 {
		v.Met = false
		return []Warning{t.capped(v)}
	}
	return nil
}

// perTime is the unit in which rates are said, and its length in s: the time in which what
// is allowed is a number of a usual size.
func (t *trial) perTime() (unit string, factor float64) {
	base := t.print.Unit(t.show.unit, differenceOf(t.show.kind))
	x := math.Abs(t.print.In(t.level, t.show.unit, differenceOf(t.show.kind)))
	switch {
	case x >= 0.1:
		return base + "/s", 1
	case x*60 >= 0.1:
		return base + "/min", 60
	}
	return base + "/h", 3600
}

// jump returns the first jump in the window in a direction that the limit is about, at its
// start only where that is the start of the run: T, and Y by how much.
func (t *trial) jump() (laplace.Extreme, bool) {
	out := t.show.out
	for _, at := range t.resp.Breaks() {
		if at < t.t0 || at > t.t1 || at == t.t0 && (t.t0 > 0 || t.cycle > 0) {
			continue
		}
		if d := t.resp.At(out, at) - t.resp.Left(out, at); t.jumps(d) {
			return laplace.Extreme{T: at, Y: math.Abs(d)}, true
		}
	}
	if t.cycle > 0 { // from the end of a period to the start of the next
		if d := t.resp.At(out, 0) - t.resp.Left(out, t.t1); t.jumps(d) {
			return laplace.Extreme{T: 0, Y: math.Abs(d)}, true
		}
	}
	return laplace.Extreme{}, false
}

// jumps reports whether a change at an instant is more than rounding, and counts.
func (t *trial) jumps(d float64) bool {
	if math.Abs(d) <= 16*t.slack {
		return false
	}
	return t.ask.Kind == casefile.RateBelow || d > 0 == (t.ask.Kind == casefile.RiseRateBelow)
}
