package study

import (
	"fmt"
	"math"
)

// sameRhythm is how much two intervals of a rhythm may differ, as a share.
const sameRhythm = 1e-3

// ownRhythm answers for a case in which no load repeats, but where something that
// switches may have a rhythm of its own: a thermostat, a pump between two pressures.
// The cycle is then the last interval between two like events of the run.
func (m *Model) ownRhythm(outs []shown) (*Cycles, error) {
	a := &Cycles{Title: m.Case.Title, Cycles: []Cycle{}}
	if _, err := m.response(); err != nil {
		return nil, err
	}
	e, period, ok := m.rhythm()
	if !ok {
		a.Evidence = m.evidence([]Warning{{"nothing-repeats", "no load repeats for ever, and nothing that switches has come to a rhythm when the run ends: there is no cycle"}})
		return a, nil
	}
	t0 := e.At - period
	warn := []Warning{{"own-rhythm", fmt.Sprintf("no load repeats: this is the rhythm in which %s %s, every %s, as the run to %s comes to it; times are those of its last interval",
		e.Part, e.What, m.Show.Time(period), m.Show.Time(m.until))}}
	for _, w := range outs {
		if w.derived() {
			y, more := m.marchedResult(m.march.run.Since(t0), w, period)
			for i := range y {
				y[i].MaxAt, y[i].MinAt = y[i].MaxAt+t0, y[i].MinAt+t0
			}
			a.Cycles, warn = append(a.Cycles, y...), append(warn, more...)
			continue
		}
		y := cycleIn(m.march.run, w, t0, period, nil)
		y.MaxAt, y.MinAt = y.MaxAt+t0, y.MinAt+t0
		a.Cycles = append(a.Cycles, y)
	}
	a.Evidence = m.evidence(warn)
	return a, nil
}

// rhythm finds the last event whose last two intervals agree: the one with the longest
// interval, so that the shorter ones of other parts fit into it.
func (m *Model) rhythm() (last Event, period float64, ok bool) {
	type like struct{ part, what string }
	times := map[like][]float64{}
	var order []Event // the first of each kind, in order of time
	for _, e := range m.events() {
		k := like{e.Part, e.What}
		if times[k] == nil {
			order = append(order, e)
		}
		times[k] = append(times[k], e.At)
	}
	for _, e := range order {
		t := times[like{e.Part, e.What}]
		n := len(t)
		if n < 3 {
			continue
		}
		d, before := t[n-1]-t[n-2], t[n-2]-t[n-3]
		if math.Abs(d-before) <= sameRhythm*d && d > period {
			last, period, ok = Event{Part: e.Part, What: e.What, At: t[n-1]}, d, true
		}
	}
	return last, period, ok
}
