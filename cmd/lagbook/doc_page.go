package main

import (
	"fmt"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// shareColumns is how many transfer functions share the table of time constants.
const shareColumns = 2

// pageDoc is the page of the demo, in the order in which an engineer reads: the
// answer, the network, the time constants, the tables, the limits, a check by
// hand, what is assumed, the caution.
func pageDoc(m *study.Model, a *study.Page) present.Doc {
	p := m.Show
	d := newDoc(m.Case)
	add := func(parts ...present.Part) { d.Parts = append(d.Parts, parts...) }

	names := tableScenarios(a.Tables)
	add(present.Facts{List: append(scenarioFact(m.Case, names), opening(p, a)...)})
	add(doubts(a.Evidence)...)
	add(present.Heading{Level: 1, Text: "The network"})
	add(networkParts(p, &a.Understood)...)
	add(present.Heading{Level: 1, Text: "How slow"})
	if len(a.Each) == 0 {
		add(slownessParts(p, a.About, a.Modes, a.Transfers, a.Range)...)
	}
	for _, x := range a.Each {
		add(present.Heading{Level: 2, Text: "Under " + scenarioTitle(m.Case, polesScenario(x))})
		add(slownessParts(p, x.About, x.Modes, x.Transfers, x.Range)...)
	}
	add(present.Heading{Level: 1, Text: "Against time"})
	for _, t := range a.Tables {
		add(tablePart(p, titled(m.Case, t, severalScenarios(names))))
	}
	add(resultsParts(p, a.Results)...)
	add(findsParts(p, a.Finds)...)
	add(measuredParts(m.Case, p, a.Measured)...)
	add(eventsParts(p, a.Evidence)...)
	if len(a.Limits) > 0 {
		add(present.Heading{Level: 1, Text: "Limits"})
		add(limitsParts(p, a.Limits)...)
	}
	if len(a.Hand) > 0 {
		add(present.Heading{Level: 1, Text: "Check by hand"})
		for _, l := range a.Hand {
			add(present.Formula{Text: handWords(p, l)})
		}
	}
	add(present.Heading{Level: 1, Text: "Assumed"}, present.List{Items: assumed(m, a)}, present.Caution{Text: a.Caution})
	return d
}

// slownessParts are the time constants and the transfer functions in short.
func slownessParts(p study.Printer, about string, modes []study.Mode, transfers []study.Transfer, r *study.Range) []present.Part {
	parts := append([]present.Part{modesAbout(p, about, modes, transfers[:min(shareColumns, len(transfers))])}, rangeParts(r)...)
	return append(parts, gainsParts(p, transfers)...)
}

// opening is the answer in three lines: what was asked, what came out, which
// limit governs.
func opening(p study.Printer, a *study.Page) []present.Fact {
	slow := slowestWords(p, a.Modes)
	if len(a.Limits) == 0 {
		return []present.Fact{{Name: "Asked", Value: "how slow, and what against time"}, {Name: "Answer", Value: slow + "; no limit is stated"}}
	}
	v := verdict(a.Limits)
	v[0].Value += "; " + slow
	return append([]present.Fact{askedLimits(p, a.Limits)}, v...)
}

// slowestWords names the slowest time constant.
func slowestWords(p study.Printer, modes []study.Mode) string {
	if len(modes) == 0 {
		return "nothing is stored: every level follows at once"
	}
	if modes[0].NaturalFrequency != nil {
		return "slowest: a " + slowness(p, modes[0].Pole)
	}
	return "slowest time constant " + slowness(p, modes[0].Pole)
}

// networkParts are the network in a few lines.
func networkParts(p study.Printer, c *study.Understood) []present.Part {
	waves := map[string]string{}
	for _, in := range c.Inputs {
		if in.Held {
			waves[in.Name] = in.Wave
		}
	}
	byKind := map[string][]string{}
	for _, n := range c.Nodes {
		word := n.Name
		switch {
		case n.Kind == "held":
			word += " (" + waves[n.Name] + ")"
		case n.Kind == "stored" && n.Capacitance != nil:
			word += " (" + p.Value(*n.Capacitance, n.Unit, "") + ")"
		}
		byKind[n.Kind] = append(byKind[n.Kind], word)
	}
	var facts []present.Fact
	for _, k := range []struct{ kind, name string }{{"held", "Held"}, {"stored", "Stores"}, {"massless", "Massless"}} {
		if names := byKind[k.kind]; len(names) > 0 {
			facts = append(facts, present.Fact{Name: k.name, Value: list(firstFew(names))})
		}
	}
	for _, in := range c.Inputs {
		if !in.Held {
			facts = append(facts, present.Fact{Name: "Load " + in.Name, Value: in.What + ": " + in.Wave})
		}
	}
	facts = append(facts, scenarioFacts(p, c.Scenarios)...)
	t := present.Table{
		Columns:  []present.Column{{Head: "part"}, {Head: "from → to"}, {Head: "value"}, {Head: "how"}},
		FullHead: []string{"part", "from", "to", "value", "unit", "how"},
	}
	for i, b := range c.Branches {
		if rung := b.Numbers == "" && i+1 < len(c.Branches) && c.Branches[i+1].Name == b.Name; rung {
			continue // the sum of a ladder says enough here; the verb check lists its rungs
		}
		if len(t.Full) == longList {
			t.Caption = fmt.Sprintf("The first %d parts; the verb check lists all %d", longList, len(c.Branches))
		}
		if len(t.Full) < longList {
			t.Rows = append(t.Rows, []string{b.Name, arrow(b.From, b.To), p.Value(b.Value, b.Unit, b.Kind), b.How()})
		}
		t.Full = append(t.Full, []string{b.Name, b.From, b.To, full(b.Value), b.Unit, b.How()})
	}
	parts := []present.Part{present.Facts{List: facts}}
	if len(t.Rows) > 0 {
		parts = append(parts, t)
	}
	return parts
}

// firstFew keeps a list of names short.
func firstFew(names []string) []string {
	if len(names) <= longList {
		return names
	}
	return append(names[:longList:longList], fmt.Sprintf("%d more", len(names)-longList))
}

// gainsParts list gain and step response of each transfer function, a line each,
// and below what does not fit a cell.
func gainsParts(p study.Printer, transfers []study.Transfer) []present.Part {
	right := func(h string) present.Column { return present.Column{Head: h, Align: present.Right} }
	t := present.Table{
		Caption:  "Transfer functions, and the response to a unit step",
		Columns:  []present.Column{{Head: "from → to"}, right("gain"), {Head: "behaviour"}, right("rise 10–90 %"), right("within 5 %"), right("within 2 %"), right("overshoot")},
		FullHead: []string{"from", "to", "gain", "unit", "behaviour", "rise time / s", "within 5 % / s", "within 2 % / s", "overshoot / %"},
	}
	var more []string
	for i, tr := range transfers {
		m := tr.Step
		if m == nil {
			m = &study.Step{}
		}
		t.Full = append(t.Full, []string{tr.Input, tr.Output, fullOf(tr.Gain), tr.Unit, tr.Behaviour, fullOf(m.RiseTime), fullOf(m.Settling5), fullOf(m.Settling2), fullOf(m.Overshoot)})
		if i >= longList {
			continue
		}
		if len(tr.Poles) == 0 {
			m = &study.Step{} // follows at once: times of 0 s say nothing
		}
		gain := "–"
		if tr.Gain != nil {
			gain = p.Value(*tr.Gain, tr.Unit, "difference")
		}
		t.Rows = append(t.Rows, []string{arrow(tr.Input, tr.Output), gain, tr.Behaviour, timeOf(p, m.RiseTime), timeOf(p, m.Settling5), timeOf(p, m.Settling2), overshoot(p, m.Overshoot)})
		if words := peakWords(p, tr.Unit, m); words != "" {
			more = append(more, arrow(tr.Input, tr.Output)+": "+words)
		}
	}
	if n := len(transfers) - longList; n > 0 {
		t.Caption += fmt.Sprintf(" (%d more under the verb poles)", n)
	}
	if more == nil {
		return []present.Part{t}
	}
	return []present.Part{t, present.List{Items: more}}
}

// timeOf prints a time that may be absent.
func timeOf(p study.Printer, t *float64) string {
	if t == nil {
		return "–"
	}
	return p.Time(*t)
}

func overshoot(p study.Printer, percent *float64) string {
	switch {
	case percent == nil:
		return "–"
	case *percent == 0:
		return "none"
	}
	return p.Percent(*percent / 100)
}

// handWords is one line of the check by hand.
func handWords(p study.Printer, l study.HandLine) string {
	kind := ""
	if l.Unit == "K" || l.Unit == "Pa" {
		kind = "level"
	}
	if l.Computed != nil && *l.Computed == 0 { // a balance: there is no number but what is left over
		return l.What + ": " + l.Numbers + ": together " + l.Remark
	}
	s := l.What + ": " + l.Numbers + " = " + p.Value(l.Hand, l.Unit, kind)
	if l.Computed != nil {
		s += "; computed " + p.Value(*l.Computed, l.Unit, kind)
	}
	if l.Off != nil {
		s += ", off by " + offWords(p, *l.Off)
	}
	if l.Remark != "" {
		s += " (" + l.Remark + ")"
	}
	return s
}

func offWords(p study.Printer, off float64) string {
	if off > -5e-5 && off < 5e-5 {
		return "less than 0.01 %"
	}
	return p.Percent(off)
}

// assumed lists what the answer rests on.
func assumed(m *study.Model, a *study.Page) []string {
	items := append(supposed(m.Case, a.Evidence), a.Notes...)
	if len(a.LeavesOut) > 0 {
		items = append(items, "left out: "+list(a.LeavesOut))
	}
	return items
}
