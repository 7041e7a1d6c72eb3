package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// resultsParts list the results at the end of the run.
func resultsParts(p study.Printer, list []study.Result) []present.Part {
	if len(list) == 0 {
		return nil
	}
	t := present.Table{
		Caption:  "Results at the end of the run",
		Columns:  []present.Column{{Head: "result"}, {Head: "scenario"}, {Head: "value", Align: present.Right}},
		FullHead: []string{"result", "scenario", "value", "unit", "kind"},
	}
	for _, r := range list {
		t.Rows = append(t.Rows, []string{r.Name, r.Scenario, p.Value(r.Value, r.Unit, r.Kind)})
		t.Full = append(t.Full, []string{r.Name, r.Scenario, full(r.Value), r.Unit, r.Kind})
	}
	withoutScenario(&t, 1, scenariosOf(list, func(r study.Result) string { return r.Scenario }))
	return []present.Part{t}
}

// findsParts list what was looked for.
func findsParts(p study.Printer, list []study.Find) []present.Part {
	if len(list) == 0 {
		return nil
	}
	t := present.Table{
		Caption:  "Found",
		Columns:  []present.Column{{Head: "find"}, {Head: "scenario"}, {Head: "answer", Align: present.Right}, {Head: "in words"}},
		FullHead: []string{"find", "scenario", "of", "at / s", "value", "unit", "in words"},
	}
	for _, f := range list {
		answer := valueOf(p, f.Value, f.Unit, f.Kind)
		if f.At != nil {
			answer = p.Time(*f.At)
		}
		t.Rows = append(t.Rows, []string{f.Name, f.Scenario, answer, f.Text})
		t.Full = append(t.Full, []string{f.Name, f.Scenario, f.Of, fullOf(f.At), fullOf(f.Value), f.Unit, f.Text})
	}
	withoutScenario(&t, 1, scenariosOf(list, func(f study.Find) string { return f.Scenario }))
	return []present.Part{t}
}
