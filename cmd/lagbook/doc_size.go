package main

import (
	"fmt"
	"strconv"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/quantity"
	"lagbook/network/study"
)

// sizeDoc is the page of the verb size.
func sizeDoc(m *study.Model, a *study.Sizes) present.Doc {
	p, d := m.Show, newDoc(m.Case)
	var facts []present.Fact
	for _, s := range a.Sizes {
		facts = append(facts, present.Fact{Name: s.Name, Value: s.Text})
	}
	if facts != nil {
		d.Parts = append(d.Parts, present.Facts{List: facts})
	}
	d.Parts = append(d.Parts, doubts(a.Evidence)...)
	if len(a.Sizes) > 0 {
		d.Parts = append(d.Parts, sizesPart(p, a.Sizes))
	}
	for _, s := range a.Sizes {
		if len(s.Crossings) > 0 {
			d.Parts = append(d.Parts, crossingsPart(p, s))
		}
		if s.Choice != nil && (len(s.RunnersUp) > 0 || len(s.Choice.Sets) > 0) {
			d.Parts = append(d.Parts, choicesPart(p, s))
		}
	}
	return withClosing(d, m, a.Evidence)
}

// sizesPart is one row for each size.
func sizesPart(p study.Printer, list []study.Size) present.Table {
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption:  "Sizes",
		Columns:  []present.Column{{Head: "size"}, {Head: "varies"}, right("value"), right("taken"), {Head: "governs"}, {Head: "scenario"}, right("margin"), {Head: "met"}},
		FullHead: []string{"size", "varies", "value", "unit", "taken", "taken value", "governing limit", "scenario", "margin", "margin asked", "margin unit", "crossings", "met"},
	}
	scenes := false
	for _, s := range list {
		taken, takenValue, left := "–", "", s.Margin
		if s.Just {
			left = s.MarginAsked
		}
		if s.Choice != nil {
			taken, takenValue = s.Choice.Name, full(s.Choice.Value)
		}
		t.Rows = append(t.Rows, []string{s.Name, s.Vary, valueOf(p, s.Value, s.Unit, s.Kind), taken, s.GoverningLimit, s.Scenario, marginOf(p, left, s.MarginUnit), yes(s.Met)})
		t.Full = append(t.Full, []string{s.Name, s.Vary, fullOf(s.Value), s.Unit, taken, takenValue, s.GoverningLimit, s.Scenario, fullOf(s.Margin), fullOf(s.MarginAsked), s.MarginUnit, strconv.Itoa(len(s.Crossings)), lower(s.Met)})
		scenes = scenes || s.Scenario != ""
	}
	if !scenes {
		dropColumn(&t, 5)
		dropFull(&t, "scenario")
	}
	return t
}

// marginOf prints a margin that may be absent, in the unit of its limit.
func marginOf(p study.Printer, v *float64, unit string) string {
	if v == nil {
		return "–"
	}
	if unit == "1" {
		return p.Percent(*v)
	}
	return p.Value(*v, unit, "difference")
}

// crossingsPart lists where the limits begin, and cease, to be met.
func crossingsPart(p study.Printer, s study.Size) present.Table {
	t := present.Table{
		Caption:  fmt.Sprintf("Where the limits begin or cease to be met: %s, from %s to %s", s.Name, p.Value(s.Range[0], s.Unit, s.Kind), p.Value(s.Range[1], s.Unit, s.Kind)),
		Columns:  []present.Column{{Head: s.Vary, Align: present.Right}, {Head: "met"}, {Head: "by"}, {Head: "scenario"}},
		FullHead: []string{"size", head(s.Vary, s.Unit), "met", "limit", "scenario"},
	}
	scenes := false
	for _, c := range s.Crossings {
		t.Rows = append(t.Rows, []string{p.Value(c.Value, s.Unit, s.Kind), c.Met + " it", c.Limit, c.Scenario})
		t.Full = append(t.Full, []string{s.Name, full(c.Value), c.Met, c.Limit, c.Scenario})
		scenes = scenes || c.Scenario != ""
	}
	if !scenes {
		dropColumn(&t, 3)
		dropFull(&t, "scenario")
	}
	return t
}

// choicesPart lists what was taken and the runners-up.
func choicesPart(p study.Printer, s study.Size) present.Table {
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption:  "Taken and next best: " + s.Name,
		Columns:  []present.Column{{Head: "choice"}, {Head: "sets"}, right("margin"), {Head: "limit"}, {Head: "scenario"}, right("least"), {Head: "met"}},
		FullHead: []string{"size", "choice", "sets", "margin", "margin unit", "limit", "scenario", "least", "least unit", "met"},
	}
	scenes, least := false, false
	for _, c := range append([]study.Choice{*s.Choice}, s.RunnersUp...) {
		var sets, exact []string
		for _, x := range c.Sets {
			sets = append(sets, x.Given+" "+p.Value(x.Value, x.Unit, x.Kind))
			exact = append(exact, x.Given+"="+full(x.Value)+" "+x.Unit)
		}
		if sets == nil {
			sets = []string{s.Vary + " " + p.Value(c.Value, s.Unit, s.Kind)}
		}
		cost := "–"
		if c.Least != nil {
			cost, least = quantity.Join(quantity.Number(*c.Least, 6), c.LeastUnit), true
		}
		t.Rows = append(t.Rows, []string{c.Name, list(sets), marginOf(p, c.Margin, c.Unit), c.Limit, c.Scenario, cost, yes(c.Met)})
		t.Full = append(t.Full, []string{s.Name, c.Name, strings.Join(exact, "; "), fullOf(c.Margin), c.Unit, c.Limit, c.Scenario, fullOf(c.Least), c.LeastUnit, lower(c.Met)})
		scenes = scenes || c.Scenario != ""
	}
	if !least {
		dropColumn(&t, 5)
	}
	if !scenes {
		dropColumn(&t, 4)
	}
	return t
}
