package main

import (
	"fmt"
	"math"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/quantity"
	"lagbook/network/study"
)

// frequencyDoc is the page of the verb frequency.
func frequencyDoc(m *study.Model, a *study.Frequency, q study.FrequencyQuestion) present.Doc {
	p, d := m.Show, newDoc(m.Case)
	names := scenariosOf(a.Transfers, func(t study.FrequencyTransfer) string { return t.Scenario })
	d.Parts = append(scenarioOpening(m.Case, names), doubts(a.Evidence)...)
	as := study.AsPeriod
	if len(q.At) > 0 {
		as = q.At[0].As
	}
	for _, t := range a.Transfers {
		d.Parts = append(d.Parts,
			present.Heading{Level: 1, Text: t.Input + " → " + t.Output + aboutWords(t.About, m.Nonlinear()) + underWords(names, t.Scenario)},
			present.Facts{List: frequencyFacts(p, t)},
			pointsPart(p, t, as))
	}
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// frequencyFacts are what is said of a frequency response as a whole.
func frequencyFacts(p study.Printer, t study.FrequencyTransfer) []present.Fact {
	facts := []present.Fact{}
	add := func(name, value string) { facts = append(facts, present.Fact{Name: name, Value: value}) }
	if t.Below != nil {
		add("Ripple", rippleWords(p, t))
	}
	if t.AtRest != nil {
		add("Gain at rest", p.Value(*t.AtRest, t.Unit, "difference"))
	}
	if t.Cutoff != nil {
		add("Cut-off", "a gain below 1/√2 of that at rest for every period shorter than "+periodWords(p, t.Cutoff.Omega))
	}
	switch {
	case t.Undamped != nil:
		add("Resonance", "without bound at a period of "+periodWords(p, t.Undamped.Omega))
	case t.Peak != nil && t.Peak.Gain != nil:
		add("Resonance", p.Value(*t.Peak.Gain, t.Unit, "difference")+" at a period of "+periodWords(p, t.Peak.Omega))
	}
	if len(t.Corners) > 0 {
		add("Corners", cornerWords(p, t.Corners))
	}
	return facts
}

// rippleWords answers the question of --ripple and --below.
func rippleWords(p study.Printer, t study.FrequencyTransfer) string {
	b := t.Below
	swing := p.Value(b.Ripple, b.RippleUnit, "difference") + " at " + t.Input
	level := p.Value(b.Level, b.LevelUnit, "difference")
	switch {
	case b.Never:
		return swing + " makes more than " + level + " at " + t.Output + " however short its period"
	case b.Always:
		return swing + " never makes as much as " + level + " at " + t.Output
	}
	s := swing + " makes less than " + level + " at " + t.Output + " for every period shorter than " + periodWords(p, *b.Omega)
	if b.Touch {
		s += "; a hump of the gain just meets the level there"
	}
	return s
}

// periodWords names a frequency as a period, as turns and as an angle.
func periodWords(p study.Printer, omega float64) string {
	return fmt.Sprintf("%s (%s, %s rad/s)", p.Time(2*math.Pi/omega), hertz(p, omega), p.Number(omega))
}

// hertz returns ω as turns, with the prefix that suits it.
func hertz(p study.Printer, omega float64) string {
	f := omega / (2 * math.Pi)
	unit, factor := hertzUnit(f)
	return p.Number(f/factor) + " " + unit
}

func hertzUnit(f float64) (unit string, factor float64) {
	for _, u := range []struct {
		unit   string
		factor float64
	}{{"GHz", 1e9}, {"MHz", 1e6}, {"kHz", 1e3}, {"Hz", 1}, {"mHz", 1e-3}, {"µHz", 1e-6}} {
		if f >= 0.99995*u.factor {
			return u.unit, u.factor
		}
	}
	return "nHz", 1e-9
}

// shortCorners is how many corners are spelled out.
const shortCorners = 8

// cornerWords lists the corners, slowest first.
func cornerWords(p study.Printer, list []study.Corner) string {
	var words []string
	for i, c := range list {
		if i == shortCorners {
			words = append(words, fmt.Sprintf("%d more", len(list)-i))
			break
		}
		w := p.Time(c.Period)
		if c.Of == "zero" {
			w += " (zero)"
		}
		if c.Count > 1 {
			w += fmt.Sprintf(" (%d)", c.Count)
		}
		words = append(words, w)
	}
	return strings.Join(words, ", ") + "; at a pole the gain bends down towards shorter periods, at a zero up"
}

// pointsPart is the table of gain and phase.
func pointsPart(p study.Printer, t study.FrequencyTransfer, as study.FrequencyWord) present.Table {
	right := func(h string) present.Column { return present.Column{Head: h, Align: present.Right} }
	tab := present.Table{
		Columns:  []present.Column{right("period"), right("frequency")},
		FullHead: []string{"input", "output", "omega / (rad/s)", "period / s", head("gain", t.Unit), "phase / °", "lag / s", "decrement"},
	}
	switch as {
	case study.AsHertz:
		tab.Columns = []present.Column{right("frequency"), right("period")}
	case study.AsRadians:
		tab.Columns = []present.Column{right("ω / (rad/s)"), right("period")}
	}
	tab.Columns = append(tab.Columns, right(head("gain", p.Unit(t.Unit, "difference"))), right("phase / °"), right("lag"), right("decrement"))
	for _, x := range t.Points {
		tab.Full = append(tab.Full, []string{t.Input, t.Output, full(x.Omega), full(x.Period), fullOf(x.Gain), fullOf(x.Phase), fullOf(x.Lag), fullOf(x.Decrement)})
		tab.Rows = append(tab.Rows, pointCells(p, t, x, as))
	}
	if t.AtRest == nil || *t.AtRest == 0 {
		dropLast(&tab)
	}
	return tab
}

func pointCells(p study.Printer, t study.FrequencyTransfer, x study.FrequencyPoint, as study.FrequencyWord) []string {
	cells := []string{p.Time(x.Period), hertz(p, x.Omega)}
	switch as {
	case study.AsHertz:
		cells = []string{hertz(p, x.Omega), p.Time(x.Period)}
	case study.AsRadians:
		cells = []string{p.Number(x.Omega), p.Time(x.Period)}
	}
	if x.Gain == nil {
		return append(cells, "without bound", "–", "–", "–")
	}
	cells = append(cells, p.Cell(p.In(*x.Gain, t.Unit, "difference")))
	if x.Phase == nil {
		return append(cells, "–", "–", "–")
	}
	cells = append(cells, tenth(*x.Phase), p.Time(*x.Lag))
	if x.Decrement == nil {
		return append(cells, "–")
	}
	return append(cells, p.Cell(*x.Decrement))
}

// tenth prints degrees to a tenth.
func tenth(v float64) string {
	return quantity.Column([]float64{math.Round(10*v) / 10, 100}, 4)[0]
}
