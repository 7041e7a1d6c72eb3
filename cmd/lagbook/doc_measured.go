package main

import (
	"fmt"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
	"lagbook/network/study"
)

// mostLogRows is how many rows of a log a page lists; CSV and JSON carry all.
const mostLogRows = 40

// measuredParts set predictions beside what was measured.
func measuredParts(c *casefile.Case, p study.Printer, list []study.Measured) []present.Part {
	if len(list) == 0 {
		return nil
	}
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	sum := present.Table{
		Caption:  "Predicted less measured",
		Columns:  []present.Column{{Head: "log"}, {Head: "of"}, {Head: "scenario"}, right("root-mean-square"), right("worst"), right("at"), right("offset"), right("rows")},
		FullHead: []string{"log", "of", "scenario", "unit", "root-mean-square", "worst", "at / s", "offset", "rows"},
	}
	parts := []present.Part{}
	several := severalScenarios(scenariosOf(list, func(m study.Measured) string { return m.Scenario }))
	for _, m := range list {
		gap := gapKind(m.Kind)
		sum.Rows = append(sum.Rows, []string{m.Name, m.Of, m.Scenario, p.Value(m.RMS, m.Unit, gap), p.Value(m.Worst, m.Unit, gap), p.Time(m.At), p.Value(m.Offset, m.Unit, gap), fmt.Sprint(len(m.Rows))})
		sum.Full = append(sum.Full, []string{m.Name, m.Of, m.Scenario, m.Unit, full(m.RMS), full(m.Worst), full(m.At), full(m.Offset), fmt.Sprint(len(m.Rows))})
		parts = append(parts, logPart(c, p, m, several))
	}
	withoutScenario(&sum, 2, scenariosOf(list, func(m study.Measured) string { return m.Scenario }))
	return append([]present.Part{present.Heading{Level: 1, Text: "Against what was measured"}, sum}, parts...)
}

// gapKind is the kind of a difference of two values of a kind.
func gapKind(kind string) string {
	if kind == "level" {
		return "difference"
	}
	return kind
}

// logPart lists one log row by row.
func logPart(c *casefile.Case, p study.Printer, m study.Measured, several bool) present.Table {
	times := make([]float64, len(m.Rows))
	for i, r := range m.Rows {
		times[i] = r[0]
	}
	unit, factor := p.TimeUnit(times)
	of, gap := p.Unit(m.Unit, m.Kind), p.Unit(m.Unit, gapKind(m.Kind))
	t := present.Table{
		Caption: m.Name + ": " + m.Of + " against column " + m.Column + " of " + m.File,
		Columns: []present.Column{{Head: head("t", unit), Align: present.Point}, {Head: head("predicted", of), Align: present.Point},
			{Head: head("measured", of), Align: present.Point}, {Head: head("difference", gap), Align: present.Point}},
		FullHead: []string{"t / s", head("predicted", m.Unit), head("measured", m.Unit), head("difference", m.Unit)},
	}
	if several {
		t.Caption += " – " + scenarioTitle(c, m.Scenario)
	}
	if n := len(m.Rows) - mostLogRows; n > 0 {
		t.Caption += fmt.Sprintf(" (the first %d rows; %d more are in csv and json)", mostLogRows, n)
	}
	for i, r := range m.Rows {
		d := r[1] - r[2]
		if i < mostLogRows {
			t.Rows = append(t.Rows, []string{p.Number(r[0] / factor), p.Cell(p.In(r[1], m.Unit, m.Kind)), p.Cell(p.In(r[2], m.Unit, m.Kind)), p.Cell(p.In(d, m.Unit, gapKind(m.Kind)))})
		}
		t.Full = append(t.Full, []string{full(r[0]), full(r[1]), full(r[2]), full(d)})
	}
	return t
}
