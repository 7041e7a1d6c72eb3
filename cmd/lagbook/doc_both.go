package main

import (
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// tablesBothDoc is the page of table --both: each column marched and linear.
func tablesBothDoc(m *study.Model, a *study.TablesBoth) present.Doc {
	d := newDoc(m.Case)
	d.Parts = append(d.Parts, differencesParts(m.Show, a.Both)...)
	d.Parts = append(d.Parts, doubts(a.Evidence)...)
	several := severalScenarios(tableScenarios(a.Tables))
	for i, t := range a.Tables {
		d.Parts = append(d.Parts, tablePart(m.Show, titled(m.Case, sideBySide(t, a.Linear[i]), several)))
	}
	d.Parts = append(d.Parts, eventsParts(m.Show, a.Evidence)...)
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// sideBySide puts the columns of the linear answer beside those of the march, at the
// instants that both have.
func sideBySide(marched, linear study.Table) study.Table {
	t := study.Table{Title: marched.Title, Scenario: marched.Scenario, Columns: marched.Columns[:1:1], ValidUntil: marched.ValidUntil}
	for k, c := range marched.Columns[1:] {
		l := linear.Columns[k+1]
		l.Name += ", linear"
		t.Columns = append(t.Columns, c, l)
	}
	at := map[float64][]float64{}
	for _, r := range linear.Rows {
		at[r[0]] = r
	}
	marks := map[int]string{}
	for _, x := range marched.Marks {
		marks[x.Row] = x.Text
	}
	for i, r := range marched.Rows {
		l, ok := at[r[0]]
		if !ok {
			continue // an instant of one answer's own: a peak
		}
		row := []float64{r[0]}
		for k := 1; k < len(r); k++ {
			row = append(row, r[k], l[k])
		}
		if text := marks[i]; text != "" {
			t.Marks = append(t.Marks, study.Mark{Row: len(t.Rows), Text: text})
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// differencesParts open a page that shows both answers: how far they are apart, when,
// and over what change the linear one holds.
func differencesParts(p study.Printer, b study.Both) []present.Part {
	t := present.Table{
		Caption:  "The march less the linear answer about the start",
		Columns:  []present.Column{{Head: "of"}, {Head: "scenario"}, {Head: "largest difference", Align: present.Right}, {Head: "at", Align: present.Right}, {Head: "share of the swing", Align: present.Right}},
		FullHead: []string{"of", "scenario", "largest difference", "unit", "at / s", "share of the swing"},
	}
	for _, x := range b.Differences {
		share := "–"
		if x.Share != nil {
			share = p.Percent(*x.Share)
		}
		t.Rows = append(t.Rows, []string{x.Output, x.Scenario, p.Value(x.Largest, x.Unit, x.Kind), p.Time(x.At), share})
		t.Full = append(t.Full, []string{x.Output, x.Scenario, full(x.Largest), x.Unit, full(x.At), fullOf(x.Share)})
	}
	withoutScenario(&t, 1, scenariosOf(b.Differences, func(x study.Difference) string { return x.Scenario }))
	return append([]present.Part{t}, rangeParts(b.Range)...)
}

// rangeParts say over what change the linear answer holds, where that is known.
func rangeParts(r *study.Range) []present.Part {
	if r == nil {
		return nil
	}
	return []present.Part{present.Paragraph{Text: strings.ToUpper(r.Text[:1]) + r.Text[1:] + "."}}
}

// limitsBothDoc is the page of limits --both: the verdicts of the march, and beside
// each that of the linear answer.
func limitsBothDoc(m *study.Model, a *study.LimitsBoth) present.Doc {
	p, d := m.Show, newDoc(m.Case)
	if len(a.Limits) > 0 {
		d.Parts = append(d.Parts, present.Facts{List: append([]present.Fact{askedLimits(p, a.Limits)}, verdict(a.Limits)...)})
	}
	d.Parts = append(d.Parts, differencesParts(p, a.Both)...)
	d.Parts = append(d.Parts, doubts(a.Evidence)...)
	if len(a.Limits) > 0 {
		d.Parts = append(d.Parts, limitsParts(p, a.Limits)...)
		d.Parts = append(d.Parts, verdictsPart(p, a.Limits, a.Linear))
	}
	d.Parts = append(d.Parts, eventsParts(p, a.Evidence)...)
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// verdictsPart sets the two verdicts side by side.
func verdictsPart(p study.Printer, marched, linear []study.Limit) present.Table {
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption: "Marched and linear",
		Columns: []present.Column{{Head: "limit"}, right("marched"), right("at"), {Head: "met"}, right("linear"), right("at"), {Head: "met"}},
	}
	for i, l := range marched {
		k := linear[i]
		t.Rows = append(t.Rows, []string{limitName(l), cameOut(p, l), atWords(p, l), metWords(l), cameOut(p, k), atWords(p, k), metWords(k)})
	}
	return t
}
