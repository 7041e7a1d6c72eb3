package main

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/quantity"
	"lagbook/network/study"
)

// limitsDoc is the page of the verb limits.
func limitsDoc(m *study.Model, a *study.Limits) present.Doc {
	p, d := m.Show, newDoc(m.Case)
	if len(a.Limits) > 0 {
		d.Parts = append(d.Parts, present.Facts{List: append([]present.Fact{askedLimits(p, a.Limits)}, verdict(a.Limits)...)})
		d.Parts = append(d.Parts, doubts(a.Evidence)...)
		d.Parts = append(d.Parts, limitsParts(p, a.Limits)...)
	} else {
		d.Parts = append(d.Parts, doubts(a.Evidence)...)
	}
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// verdict is the answer in two lines: how many are met, and which governs.
func verdict(limits []study.Limit) []present.Fact {
	met := 0
	var governs study.Limit
	for _, l := range limits {
		if l.Met {
			met++
		}
		if l.Governs {
			governs = l
		}
	}
	answer := fmt.Sprintf("%d of %d limits met", met, len(limits))
	switch {
	case met == len(limits) && met == 1:
		answer = "the limit is met"
	case met == len(limits) && met == 2:
		answer = "both limits met"
	case met == len(limits):
		answer = fmt.Sprintf("all %d limits met", met)
	case len(limits) == 1:
		answer = "the limit is NOT met"
	case met == 0:
		answer = fmt.Sprintf("none of %d limits met", len(limits))
	}
	return []present.Fact{
		{Name: "Answer", Value: answer},
		{Name: "Governs", Value: governing(governs)},
	}
}

// governing is the sentence on the limit that governs.
func governing(l study.Limit) string {
	s := l.Name + ": " + l.Text
	if l.Met && l.Percent != nil {
		s += " (" + way(l) + " of the way left)"
	}
	return s
}

// briefly is how many limits the opening names.
const briefly = 4

// askedLimits is what was asked, in one line.
func askedLimits(p study.Printer, limits []study.Limit) present.Fact {
	var words []string
	for i, l := range limits {
		if i == briefly && len(limits) > briefly+1 {
			words = append(words, fmt.Sprintf("%d more", len(limits)-i))
			break
		}
		words = append(words, l.Of+" "+brief(p, l))
	}
	return present.Fact{Name: "Asked", Value: list(words)}
}

// brief puts what is asked in a few signs: "< 125 °C".
func brief(p study.Printer, l study.Limit) string {
	level := levelWords(p, l)
	switch l.Demand {
	case "stay_below":
		return "< " + level
	case "stay_above":
		return "> " + level
	case "overshoot_below":
		return "overshoots < " + level
	}
	s := "at " + level
	if l.Demand == "settle" {
		s = "settled to ± " + level
	}
	if l.Within != nil {
		s += " in " + p.Time(*l.Within)
	}
	return s
}

// levelWords prints the level, or the band, in its own unit.
func levelWords(p study.Printer, l study.Limit) string {
	switch {
	case l.Level == nil:
		return ""
	case l.Percentage:
		return p.Percent(*l.Level)
	case l.Demand == "settle" || l.Demand == "overshoot_below":
		return p.Value(*l.Level, l.LevelUnit, "difference")
	}
	return p.Value(*l.Level, l.LevelUnit, l.Kind)
}

// wayWords explain a column.
const wayWords = "Way left: the margin as a share of the way from the start to the level; below zero, the level is passed by so much of that way."

// limitsParts are the table of verdicts and, below it, what more there is to say
// about some of them.
func limitsParts(p study.Printer, limits []study.Limit) []present.Part {
	t := present.Table{
		Caption: "Verdicts",
		Columns: []present.Column{{Head: "limit"}, {Head: "asked"}, {Head: "came out", Align: present.Right}, {Head: "at", Align: present.Right},
			{Head: "margin", Align: present.Right}, {Head: "way left", Align: present.Right}, {Head: "met"}},
		FullHead: []string{"limit", "of", "demand", "level", "level unit", "met", "value", "at / s", "margin", "unit", "percent", "governs",
			"first outside / s"},
	}
	var more []string
	for _, l := range limits {
		t.Rows = append(t.Rows, []string{l.Name, l.Of + " " + demand(p, l), cameOut(p, l), atWords(p, l), margin(p, l), way(l), yes(l.Met)})
		mark := ""
		if l.Governs {
			mark = "governs"
		}
		t.Marks = append(t.Marks, mark)
		t.Full = append(t.Full, []string{l.Name, l.Of, l.Demand, fullOf(l.Level), l.LevelUnit, lower(l.Met), fullOf(l.Value), fullOf(l.At),
			fullOf(l.Margin), l.Unit, fullOf(l.Percent), lower(l.Governs), fullOf(l.FirstOutside)})
		if !l.Met || strings.Contains(l.Text, ";") {
			more = append(more, l.Name+": "+l.Text)
		}
	}
	parts := []present.Part{t}
	if slices.ContainsFunc(limits, func(l study.Limit) bool { return l.Percent != nil }) {
		parts = append(parts, present.Paragraph{Text: wayWords})
	}
	if more != nil {
		parts = append(parts, present.List{Items: more})
	}
	return parts
}

// cameOut prints what a verdict rests on: a value; or that what was asked came,
// where the question is when.
func cameOut(p study.Printer, l study.Limit) string {
	switch {
	case l.Unit == "s" && l.At != nil:
		return map[string]string{"reach": "reached", "settle": "settled"}[l.Demand]
	case l.Unit == "s" && l.Value == nil:
		return "not in the run"
	case l.Value == nil:
		return "–"
	case l.Unit == "1":
		return p.Percent(*l.Value)
	}
	return p.Value(*l.Value, l.Unit, l.Kind)
}

func atWords(p study.Printer, l study.Limit) string {
	if l.At == nil {
		return "–"
	}
	return p.Time(*l.At)
}

// lower is a verdict for machines, yes one for readers.
func lower(b bool) string { return strings.ToLower(yes(b)) }

func yes(b bool) string {
	if b {
		return "yes"
	}
	return "NO"
}

// margin prints what is left, in the limit's unit.
func margin(p study.Printer, l study.Limit) string {
	if l.Margin == nil {
		return "–"
	}
	return amount(p, l, *l.Margin)
}

// amount prints a margin, which is a difference, in the limit's unit.
func amount(p study.Printer, l study.Limit, v float64) string {
	switch l.Unit {
	case "1":
		return p.Percent(v)
	case "s":
		return p.Time(v)
	case "K", "Pa":
		return p.Value(v, l.Unit, "difference")
	}
	return p.Value(v, l.Unit, l.Kind)
}

func way(l study.Limit) string {
	if l.Percent == nil {
		return "–"
	}
	return quantity.Number(*l.Percent, 3) + " %"
}

// demand puts what is asked in words: "stays below 135 °C until 72 h".
func demand(p study.Printer, l study.Limit) string {
	s := map[string]string{
		"stay_below": "stays below ", "stay_above": "stays above ", "reach": "reaches ", "settle": "settles to ± ", "overshoot_below": "overshoots less than ",
	}[l.Demand]
	s += levelWords(p, l)
	if l.Within != nil {
		s += " within " + p.Time(*l.Within)
	}
	if l.After != nil {
		s += " after " + p.Time(*l.After)
	}
	if l.Until != nil {
		s += " until " + p.Time(*l.Until)
	}
	if l.MarginAsked != nil {
		s += " with " + amount(p, l, *l.MarginAsked) + " to spare"
	}
	return s
}
