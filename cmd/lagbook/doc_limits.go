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
		facts := append(scenarioFact(m.Case, limitScenarios(a.Limits)), askedLimits(p, a.Limits))
		d.Parts = append(d.Parts, present.Facts{List: append(facts, verdict(a.Limits)...)})
		d.Parts = append(d.Parts, doubts(a.Evidence)...)
		d.Parts = append(d.Parts, limitsParts(p, a.Limits)...)
	} else {
		d.Parts = append(d.Parts, doubts(a.Evidence)...)
	}
	d.Parts = append(d.Parts, resultsParts(m.Show, a.Results)...)
	d.Parts = append(d.Parts, findsParts(m.Show, a.Finds)...)
	d.Parts = append(d.Parts, eventsParts(m.Show, a.Evidence)...)
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// verdict is the answer in two lines: how many are met, and which governs.
func verdict(limits []study.Limit) []present.Fact {
	met, open := 0, 0
	var governs study.Limit
	for _, l := range limits {
		if l.Met {
			met++
		}
		if l.NotJudged {
			open++
		}
		if l.Governs {
			governs = l
		}
	}
	answer := fmt.Sprintf("%d of %d limits met", met, len(limits))
	switch {
	case open > 0 && len(limits) == 1:
		answer = "the limit is not judged"
	case open > 0 && met+open < len(limits):
		answer += fmt.Sprintf(", %d NOT met, %d not judged", len(limits)-met-open, open)
	case open > 0:
		answer += fmt.Sprintf(", %d not judged", open)
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
	s := limitName(l) + ": " + l.Text
	if l.Met && l.Percent != nil {
		s += " (" + way(l) + " of the way left)"
	}
	return s
}

// limitName names a verdict: "cores under climb".
func limitName(l study.Limit) string {
	if l.Scenario == "" {
		return l.Name
	}
	return l.Name + " under " + l.Scenario
}

// briefly is how many limits the opening names.
const briefly = 4

// askedLimits is what was asked, in one line.
func askedLimits(p study.Printer, limits []study.Limit) present.Fact {
	var words, names []string
	for _, l := range limits { // of several under scenarios the first
		if !slices.Contains(names, l.Name) {
			names, words = append(names, l.Name), append(words, l.Of+" "+brief(p, l))
		}
	}
	if n := len(words) - briefly; n > 1 {
		words = append(words[:briefly], fmt.Sprintf("%d more", n))
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
	case "reach", "settle":
	case "time_above":
		return "above " + level + " for < " + allowedTime(p, l)
	default:
		return briefWords[l.Demand] + " < " + level
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

// briefWords name what is to stay below a level of its own.
var briefWords = map[string]string{
	"overshoot_below": "overshoots", "swing_below": "swings", "rate_below": "changes", "rise_rate_below": "rises", "fall_rate_below": "falls",
}

// allowedTime is how long something may be above a level: "2 h a day".
func allowedTime(p study.Printer, l study.Limit) string {
	if l.LessThan == nil {
		return ""
	}
	s := p.Time(*l.LessThan)
	if l.PerDay {
		s += " a day"
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
	case rates(l):
		return rateWords(p, l, *l.Level)
	case l.Demand == "settle" || l.Demand == "overshoot_below" || l.Demand == "swing_below":
		return p.Value(*l.Level, l.LevelUnit, "difference")
	}
	return p.Value(*l.Level, l.LevelUnit, l.Kind)
}

// wayWords explain a column.
const (
	allowedWords = " Of a swing, a rate or a time it is the share of what is allowed."

	wayWords = "Way left: the margin as a share of the way from the start to the level; below zero, the level is passed by so much of that way."
)

// limitsParts are the table of verdicts and, below it, what more there is to say
// about some of them.
func limitsParts(p study.Printer, limits []study.Limit) []present.Part {
	t := present.Table{
		Caption: "Verdicts",
		Columns: []present.Column{{Head: "limit"}, {Head: "scenario"}, {Head: "asked"}, {Head: "came out", Align: present.Right}, {Head: "at", Align: present.Right},
			{Head: "margin", Align: present.Right}, {Head: "way left", Align: present.Right}, {Head: "met"}},
		FullHead: []string{"limit", "scenario", "of", "demand", "level", "level unit", "met", "value", "at / s", "margin", "unit", "percent", "governs",
			"worst", "first outside / s"},
	}
	var more []string
	for _, l := range limits {
		t.Rows = append(t.Rows, []string{l.Name, l.Scenario, l.Of + " " + demand(p, l), cameOut(p, l), atWords(p, l), margin(p, l), way(l), metWords(l)})
		mark := ""
		switch {
		case l.Governs:
			mark = "governs"
		case l.Worst:
			mark = "worst"
		}
		t.Marks = append(t.Marks, mark)
		t.Full = append(t.Full, []string{l.Name, l.Scenario, l.Of, l.Demand, fullOf(l.Level), l.LevelUnit, strings.ToLower(metWords(l)), fullOf(l.Value), fullOf(l.At),
			fullOf(l.Margin), l.Unit, fullOf(l.Percent), lower(l.Governs), lower(l.Worst), fullOf(l.FirstOutside)})
		if !l.Met || strings.Contains(l.Text, ";") {
			more = append(more, limitName(l)+": "+l.Text)
		}
	}
	if names := limitScenarios(limits); !severalScenarios(names) {
		dropColumn(&t, 1)
	}
	if !slices.ContainsFunc(limits, func(l study.Limit) bool { return l.Scenario != "" }) {
		dropFull(&t, "scenario")
		dropFull(&t, "worst")
	}
	parts := []present.Part{t}
	if slices.ContainsFunc(limits, func(l study.Limit) bool { return l.Percent != nil }) {
		words := wayWords
		if slices.ContainsFunc(limits, func(l study.Limit) bool { return l.Demand == "time_above" || briefWords[l.Demand] != "" }) {
			words += allowedWords
		}
		parts = append(parts, present.Paragraph{Text: words})
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
	case l.Demand == "time_above" && l.Value != nil:
		return p.Time(*l.Value)
	case l.Unit == "s" && l.At != nil:
		return map[string]string{"reach": "reached", "settle": "settled"}[l.Demand]
	case l.Unit == "s" && l.Value == nil:
		return "not in the run"
	case l.Value == nil:
		return "–"
	case rates(l):
		return rateWords(p, l, *l.Value)
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

// metWords say whether a limit is met; one that is not judged is neither.
func metWords(l study.Limit) string {
	if l.NotJudged {
		return "not judged"
	}
	return yes(l.Met)
}

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
	if rates(l) {
		return rateWords(p, l, v)
	}
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

// demandWords are what is asked, before the level.
var demandWords = map[string]string{
	"stay_below": "stays below ", "stay_above": "stays above ", "reach": "reaches ", "settle": "settles to ± ", "overshoot_below": "overshoots less than ",
	"swing_below": "swings less than ", "rate_below": "changes slower than ", "rise_rate_below": "rises slower than ", "fall_rate_below": "falls slower than ",
	"time_above": "is above ",
}

// demand puts what is asked in words: "stays below 135 °C until 72 h".
func demand(p study.Printer, l study.Limit) string {
	s := demandWords[l.Demand] + levelWords(p, l)
	if l.LessThan != nil {
		s += " for less than " + allowedTime(p, l)
	}
	if l.In != "" {
		s += " in the " + l.In
	}
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
