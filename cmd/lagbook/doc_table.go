package main

import (
	"math"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// tablesDoc is the page of the verb table.
func tablesDoc(m *study.Model, a *study.Tables) present.Doc {
	d := newDoc(m.Case)
	names := tableScenarios(a.Tables)
	d.Parts = append(scenarioOpening(m.Case, names), doubts(a.Evidence)...)
	for _, t := range a.Tables {
		d.Parts = append(d.Parts, tablePart(m.Show, titled(m.Case, t, severalScenarios(names))))
	}
	d.Parts = append(d.Parts, resultsParts(m.Show, a.Results)...)
	d.Parts = append(d.Parts, findsParts(m.Show, a.Finds)...)
	d.Parts = append(d.Parts, measuredParts(m.Case, m.Show, a.Measured)...)
	d.Parts = append(d.Parts, eventsParts(m.Show, a.Evidence)...)
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// tablePart shows one table against time.
func tablePart(p study.Printer, t study.Table) present.Table {
	out := present.Table{Caption: captionOf(p, t), Marks: make([]string, len(t.Rows))}
	times := make([]float64, len(t.Rows))
	for i, r := range t.Rows {
		times[i] = r[0]
	}
	unit, factor := p.TimeUnit(times)
	each := spread(times)
	if each {
		out.Columns = []present.Column{{Head: "t", Align: present.Right}}
	} else {
		out.Columns = []present.Column{{Head: head("t", unit), Align: present.Point}}
	}
	out.FullHead = []string{"t / s"}
	for _, c := range t.Columns[1:] {
		out.Columns = append(out.Columns, present.Column{Head: head(c.Name, p.Unit(c.Unit, c.Kind)), Align: present.Point})
		out.FullHead = append(out.FullHead, head(c.Name, c.Unit))
	}
	for _, r := range t.Rows {
		cells := []string{p.Number(r[0] / factor)}
		if each {
			cells[0] = p.Time(r[0])
		}
		exact := []string{full(r[0])}
		for k, v := range r[1:] {
			c := t.Columns[k+1]
			cells = append(cells, p.Cell(p.In(v, c.Unit, c.Kind)))
			exact = append(exact, full(v))
		}
		out.Rows, out.Full = append(out.Rows, cells), append(out.Full, exact)
	}
	for _, m := range t.Marks {
		out.Marks[m.Row] = m.Text
	}
	return out
}

// spread reports whether times are too far apart for one unit.
func spread(times []float64) bool {
	low, high := math.Inf(1), 0.0
	for _, t := range times {
		if t = math.Abs(t); t > 0 {
			low, high = math.Min(low, t), math.Max(high, t)
		}
	}
	return high > 1000*low
}
