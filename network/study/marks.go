package study

import (
	"fmt"
	"sort"
	"strings"

	"lagbook/network"
)

// A change is a jump of one input, or what happened to a part.
type change struct {
	at    float64
	name  string
	text  string // "light 75 W", "relief opens"
	event bool
}

// changes lists the jumps of all inputs and what happened to parts in [t0, t1] in order
// of time, at most so many; cut is true where there are more.
func (m *Model) changes(t0, t1 float64, most int) (list []change, cut bool) {
	for _, in := range m.Net.Inputs() {
		w := m.par.Wave[in.ID]
		times, err := w.JumpTimes(t0, t1, most)
		if err != nil {
			cut = true
		}
		for _, t := range times {
			list = append(list, change{at: t, name: in.Name, text: in.Name + " " + m.inputValue(in, w.At(t))})
		}
	}
	turned, more := m.switched(t0, t1, most)
	list, cut = append(list, turned...), cut || more
	driven, more := m.driven(t0, t1, most)
	list, cut = append(list, driven...), cut || more
	for _, e := range m.events() {
		if e.At >= t0 && e.At <= t1 {
			list = append(list, change{at: e.At, name: e.Part, text: e.Part + " " + e.What, event: true})
		}
	}
	sort.SliceStable(list, func(i, j int) bool { return list[i].at < list[j].at })
	if len(list) > most {
		return list[:most], true
	}
	return list, cut
}

// driven lists the jumps of what drives elements.
func (m *Model) driven(t0, t1 float64, most int) (list []change, cut bool) {
	for _, e := range m.elements() {
		for _, k := range ownDrives(e) {
			w := m.par.Drive[e.ID][k]
			times, err := w.JumpTimes(t0, t1, most)
			cut = cut || err != nil
			for _, t := range times {
				list = append(list, change{at: t, name: e.Drives[k], text: m.driveMoves(e.Drives[k], w.At(t))})
			}
		}
	}
	return list, cut
}

// inputValue prints the value of an input: a level or a flow.
func (m *Model) inputValue(in network.InputView, v float64) string {
	if in.Held {
		return m.levelAt(in.Node, v)
	}
	return m.Show.Value(v, m.swingUnit(in), "")
}

// jumps are the instants in [t0, t1] at which an input jumps.
func (m *Model) jumps(t0, t1 float64) (times []float64, cut bool) {
	list, cut := m.changes(t0, t1, mostJumps)
	for _, c := range list {
		times = append(times, c.at)
	}
	return unique(times), cut
}

// marks says by each row what was set there or since the row before, and what
// has its extreme there.
func (m *Model) marks(times []float64, peaks map[float64][]string) []Mark {
	marks := []Mark{}
	list, cut := m.changes(times[0], times[len(times)-1], mostJumps)
	if cut {
		list = nil
		peaks[times[0]] = append([]string{"the loads change too often to be marked"}, peaks[times[0]]...)
	}
	k := 0
	for i, t := range times {
		var here []change
		for k < len(list) && list[k].at <= t+sameTime*(1e-6*m.until+t) {
			here = append(here, list[k])
			k++
		}
		words := append(m.changeWords(here, t), peaks[t]...)
		if len(words) > 0 {
			marks = append(marks, Mark{i, strings.Join(words, "; ")})
		}
	}
	return marks
}

// changeWords puts the changes since the last row in words.
func (m *Model) changeWords(list []change, row float64) []string {
	if len(list) > mostChanges {
		last := map[string]string{}
		var names []string
		for _, c := range list {
			if _, ok := last[c.name]; !ok {
				names = append(names, c.name)
			}
			last[c.name] = c.text
		}
		if len(names) > mostChanges {
			return []string{fmt.Sprintf("%d loads changed", len(names))}
		}
		var words []string
		for _, n := range names {
			words = append(words, last[n])
		}
		return []string{fmt.Sprintf("%d changes, now %s", len(list), strings.Join(words, ", "))}
	}
	var words []string
	for _, c := range list {
		if near := sameTime * (1e-6*m.until + row); row-c.at > near {
			since := " from "
			if c.event {
				since = " at "
			}
			words = append(words, c.text+since+m.Show.Time(c.at))
			continue
		}
		words = append(words, c.text)
	}
	return words
}
