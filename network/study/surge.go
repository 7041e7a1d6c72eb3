package study

import (
	"slices"

	"lagbook/laplace"
	"lagbook/network"
)

// mostTurns is how many instants of switching are looked at for columns that stop.
const mostTurns = 64

// surges warns of columns of liquid that something shut stops at once: the pressure
// that stops them acts for no time, and no level holds it.
func (m *Model) surges() []Warning {
	if !m.turns() || !m.inertial() {
		return nil
	}
	before, err := m.Net.Stopped(m.par)
	if err != nil {
		return nil // whoever asks for a response hears of it
	}
	var names []string
	first := 0.0
	for _, t := range m.turnsAt() {
		p, err := m.par.At(t)
		if err != nil {
			break
		}
		now, err := m.Net.Stopped(p)
		if err != nil {
			break
		}
		for _, id := range now {
			if name := m.inertanceName(id); !slices.Contains(before, id) && !slices.Contains(names, name) {
				if names == nil {
					first = t
				}
				names = append(names, name)
			}
		}
		before = now
	}
	if names == nil {
		return nil
	}
	verb, it := " is", "its"
	if len(names) > 1 {
		verb, it = " are", "their"
	}
	return []Warning{{"surge-not-shown", join(firstNames(names)) + verb + " shut at once, first at " + m.Show.Time(first) + ": the pressure surge at " + it +
		" shut end is not in this answer; stop what flows more slowly, in steps of scale, or reckon the surge apart"}}
}

// turnsAt lists the instants at which a switch moves, ascending; of one that repeats,
// those of the first period and its return.
func (m *Model) turnsAt() (list []float64) {
	for _, w := range m.par.Switch {
		for _, g := range w.Segments {
			list = append(list, g.At)
		}
		if w.Period > 0 {
			list = append(list, back(w))
		}
	}
	slices.Sort(list)
	list = slices.Compact(list)
	return list[:min(len(list), mostTurns)]
}

// back is when a wave that repeats begins again.
func back(w laplace.Waveform) float64 { return w.Segments[w.Repeat].At + w.Period }

// inertanceName is the name of the part that an inertance is.
func (m *Model) inertanceName(id network.InertanceID) string {
	for _, b := range m.Net.Branches() {
		if b.Kind == network.InertanceBranch && b.Index == int(id) {
			return m.partOf(b.Ref)
		}
	}
	return ""
}
