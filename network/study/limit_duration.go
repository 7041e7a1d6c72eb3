package study

import (
	"fmt"
	"math"
)

const day = 86400.0 // s

// timeAbove judges time_above: how long the output is above a level in the window, all
// stretches together, or in the worst of its days.
func (t *trial) timeAbove(v *Limit) []Warning {
	allowed := t.lessThan
	v.LessThan, v.PerDay = &allowed, t.ask.PerDay
	v.Unit, v.Kind = "s", t.show.kind
	list, capped := t.above()
	sum, first := 0.0, math.NaN()
	for _, s := range list {
		sum += s[1] - s[0]
		if math.IsNaN(first) {
			first = s[0]
		}
	}
	each, warn := "", []Warning(nil)
	switch {
	case t.ask.PerDay && t.cycle > 0:
		each = " a day"
		if n := day / t.cycle; math.Abs(n-math.Round(n)) > 1e-9*n {
			warn = append(warn, t.warning("days", fmt.Sprintf("its period, %s, does not fit into a day a whole number of times: the time above is that of a mean day", t.print.Time(t.cycle))))
		}
		sum *= day / t.cycle
	case t.ask.PerDay:
		var begin float64
		sum, begin = worstDay(list, t.midnight)
		each = " in the day from " + t.print.Time(begin)
		if t.t1-t.t0 < day {
			warn = append(warn, t.warning("days", "its window is shorter than a day, and counts as one"))
		}
	case t.cycle > 0:
		each = " in every period"
	}
	v.Value = &sum
	if !math.IsNaN(first) {
		v.At = &first
	}
	t.judgeMargin(v, allowed-sum, allowed, t.asked())
	switch {
	case sum == 0:
		v.Text = "never above " + t.value(t.level)
	default:
		v.Text = "above " + t.value(t.level) + " for " + t.print.Time(sum) + each
		if n := len(list); n > 1 {
			v.Text += fmt.Sprintf(", %d stretches in all", n)
		}
		v.Text += ", first from " + t.print.Time(first)
	}
	switch left := *v.Margin; {
	case left < 0:
		v.Text += ", " + t.print.Time(-left) + " more than the " + t.print.Time(allowed) + " allowed"
	case !v.Met:
		v.Text += ", only " + t.print.Time(left) + " less than the " + t.print.Time(allowed) + " allowed where " + t.print.Time(t.asked()) + " is asked"
	default:
		v.Text += ", " + t.print.Time(left) + " less than the " + t.print.Time(allowed) + " allowed"
	}
	if capped && *v.Margin >= 0 {
		v.Met = false
		warn = append(warn, t.capped(v))
	}
	return warn
}

// above are the stretches of the window in which the output is above the level, between
// crossings of it.
func (t *trial) above() (list [][2]float64, capped bool) {
	none, out := math.Inf(1), t.show.out
	for at := t.t0; ; {
		if len(list) >= mostSignChanges {
			return list, true
		}
		up, ok := t.resp.FirstOutside(out, -none, t.level, at, t.t1)
		if !ok || up.Capped {
			return list, ok
		}
		down, falls := t.resp.FirstOutside(out, t.level, none, up.T, t.t1)
		if falls && down.Capped {
			return list, true
		}
		if !falls {
			return append(list, [2]float64{up.T, t.t1}), false
		}
		list, at = append(list, [2]float64{up.T, down.T}), down.T
	}
}

// worstDay is the longest time of stretches in one day, and when that begins; days begin at
// midnights.
func worstDay(list [][2]float64, midnight float64) (most, begin float64) {
	sums := map[float64]float64{}
	for _, s := range list {
		for a := s[0]; a < s[1]; {
			n := math.Floor((a - midnight) / day)
			b := min(s[1], midnight+(n+1)*day)
			if !(b > a) {
				n++
				b = min(s[1], midnight+(n+1)*day)
			}
			sums[n] += b - a
			if sums[n] > most {
				most, begin = sums[n], max(0, midnight+n*day)
			}
			a = b
		}
	}
	return most, begin
}
