package main

import (
	"fmt"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// compareDoc is the page of the verb compare.
func compareDoc(m [2]*study.Model, a *study.Comparison) present.Doc {
	d := newDoc(m[0].Case)
	d.Title, d.About = "Two cases side by side", nil
	if m[1].Case.Author == invented || d.Label == "" {
		d.Label = newDoc(m[1].Case).Label
	}
	d.Parts = append(d.Parts, present.Facts{List: []present.Fact{
		{Name: "A", Value: caseWords(a, 0)}, {Name: "B", Value: caseWords(a, 1)}, {Name: "Answer", Value: compareWords(a)},
	}})
	d.Parts = append(d.Parts, doubts(a.Evidence)...)
	d.Parts = append(d.Parts, inputDifferences(a.Inputs), comparedPart(m[0].Show, a.Results))
	return withClosing(d, m[0], a.Evidence)
}

// withClosing ends a page, with what it assumes.
func withClosing(d present.Doc, m *study.Model, e study.Evidence) present.Doc {
	d.Parts = append(d.Parts, closing(m.Case, e)...)
	return d
}

// caseWords name one of the two cases: title, file, revision.
func caseWords(a *study.Comparison, i int) string {
	if a.Titles[i] == "" {
		return a.Files[i]
	}
	return a.Titles[i] + " (" + a.Files[i] + ")"
}

// compareWords are the answer in one line.
func compareWords(a *study.Comparison) string {
	count := map[string]int{}
	for _, x := range a.Inputs {
		count[x.Change]++
	}
	other := 0
	for _, r := range a.Results {
		if r.A == nil || r.B == nil || *r.A != *r.B {
			other++
		}
	}
	if len(a.Inputs) == 0 {
		return "the two state the same"
	}
	return fmt.Sprintf("%d stated otherwise, %d in A alone, %d in B alone; %d of %d results differ", count["changed"], count["removed"], count["added"], other, len(a.Results))
}

// inputDifferences lists what is stated differently.
func inputDifferences(list []study.InputDifference) present.Table {
	t := present.Table{
		Caption:  "Stated differently",
		Columns:  []present.Column{{Head: "where"}, {Head: "key"}, {Head: "A"}, {Head: "B"}},
		FullHead: []string{"table", "key", "change", "A", "B"},
	}
	for _, x := range list {
		where := "top of the file"
		if x.Table != "" {
			where = "[" + x.Table + "]"
		}
		absent := map[string][2]string{"removed": {x.A, "–"}, "added": {"–", x.B}, "changed": {x.A, x.B}}[x.Change]
		t.Rows = append(t.Rows, []string{where, x.Key, absent[0], absent[1]})
		t.Full = append(t.Full, []string{x.Table, x.Key, x.Change, x.A, x.B})
	}
	return t
}

// comparedPart sets the results side by side.
func comparedPart(p study.Printer, list []study.Compared) present.Table {
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption:  "What comes out",
		Columns:  []present.Column{{Head: "what"}, {Head: "of"}, {Head: "scenario"}, right("A"), right("B"), right("B less A"), {Head: "verdict"}},
		FullHead: []string{"what", "of", "scenario", "unit", "kind", "A", "B", "B less A", "verdict"},
	}
	scenes := false
	for _, r := range list {
		scenes = scenes || r.Scenario != ""
		difference := r.Kind
		if difference == "level" {
			difference = "difference"
		}
		t.Rows = append(t.Rows, []string{r.What, r.Name, r.Scenario, valueOf(p, r.A, r.Unit, r.Kind), valueOf(p, r.B, r.Unit, r.Kind), valueOf(p, r.Difference, r.Unit, difference), r.Text})
		t.Full = append(t.Full, []string{r.What, r.Name, r.Scenario, r.Unit, r.Kind, fullOf(r.A), fullOf(r.B), fullOf(r.Difference), r.Text})
	}
	if !scenes {
		dropColumn(&t, 2)
	}
	return t
}

// valueOf prints a value that may be absent.
func valueOf(p study.Printer, v *float64, unit, kind string) string {
	if v == nil {
		return "–"
	}
	return p.Value(*v, unit, kind)
}
