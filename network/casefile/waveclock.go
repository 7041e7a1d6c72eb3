package casefile

import "math"

// Times of a waveform may be times of day where [run] states a clock: "06:00" is then
// the time from t = 0 to six o'clock of the day on which the run starts, negative where
// that is before. In a list, times of day go on into the next day where they would go
// back; "24:00" is the midnight that ends a day.

const day = 86400.0 // s

// timeOfDay reads a time of day, and 24:00.
func timeOfDay(s string) (float64, bool) {
	if s == "24:00" || s == "24:00:00" {
		return day, true
	}
	return clockTime(s)
}

// clocked reads a time that may be one of day. is tells that it is.
func (r *reader) clocked(o owner, n *node, f *Field) (s Slot, is, ok bool) {
	if n.kind != kindString {
		return noSlot, false, false
	}
	at, is := timeOfDay(n.text)
	switch {
	case !is:
		return noSlot, false, false
	case !r.c.Questions.HasClock:
		r.at(n.span, Diagnostic{Code: "no-clock", Thing: o.thing(), Text: label(f) + quoted(n.text) + " is a time of day; [run] states no clock", Hint: `add clock = "00:00" to [run]`})
		return noSlot, true, false
	}
	return r.c.constant(at - r.c.Questions.Clock), true, true
}

// laterDay moves a time of day that would go back before another time into the days after.
func laterDay(n *node, t, before float64) float64 {
	if _, is := timeOfDay(n.text); !is || n.kind != kindString || t >= before {
		return t
	}
	return t + day*math.Ceil((before-t)/day)
}

// onClock reports whether the first time of a list is one of day and lies before t = 0.
func (m *maker) onClock() bool {
	if m.w.form == "file" || len(m.w.list) == 0 {
		return false
	}
	n := m.w.list[0].list[0].n
	_, is := timeOfDay(n.text)
	return is && n.kind == kindString && m.at(m.w.list[0].list[0].slot) < 0
}

// around turns the points of a period that began before t = 0 into those of one from
// t = 0 on: what lies before comes again after a period.
func (m *maker) around(pts [][2]float64) [][2]float64 {
	period := m.at(m.w.repeat)
	m.first = pts[0][0]
	if m.last-m.first > period {
		return pts // reported where it is repeated
	}
	list := append([][2]float64(nil), pts...)
	end, last := pts[0][0]+period, pts[len(pts)-1]
	if last[0] < end && m.w.form == "points" {
		list = append(list, [2]float64{end, last[1]}) // held until the period begins again
	}
	for i, p := range pts {
		if i > 0 || last[0] < end || p[1] != last[1] { // else the period ends where it begins
			list = append(list, [2]float64{p[0] + period, p[1]})
		}
		if p[0] >= 0 {
			break
		}
	}
	return list
}

// onClock reads a time from t = 0, or on the clock where the case has one.
func (f fielder) onClock(n *node) (Slot, bool) {
	if at, ok := clockTime(n.text); ok && n.kind == kindString {
		if !f.r.c.Questions.HasClock {
			f.r.at(n.span, Diagnostic{Code: "no-clock", Thing: f.o.thing(), Text: quoted(n.text) + " is a time of day; [run] states no clock", Hint: `add clock = "00:00" to [run]`})
			return noSlot, false
		}
		return f.r.c.constant(at), true
	}
	return f.r.number(f.o, n, &Field{Name: "highest_at", Dim: dimTime})
}
