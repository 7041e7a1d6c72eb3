package main

import (
	"fmt"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// mostEvents is how many events a page lists; CSV and JSON carry all.
const mostEvents = 40

// eventsParts lists what happened to parts in a march, nothing where nothing did.
func eventsParts(p study.Printer, e study.Evidence) []present.Part {
	if e.Marched == nil || len(e.Events) == 0 {
		return nil
	}
	t := present.Table{
		Caption:  "What happened",
		Columns:  []present.Column{{Head: "t", Align: present.Right}, {Head: "scenario"}, {Head: "part"}, {Head: "what"}},
		FullHead: []string{"t / s", "scenario", "part", "what"},
	}
	if n := len(e.Events) - mostEvents; n > 0 {
		t.Caption = fmt.Sprintf("What happened (the first %d; %d more are in csv and json)", mostEvents, n)
	}
	for i, x := range e.Events {
		if i < mostEvents {
			t.Rows = append(t.Rows, []string{p.Time(x.At), x.Scenario, x.Part, x.What})
		}
		t.Full = append(t.Full, []string{full(x.At), x.Scenario, x.Part, x.What})
	}
	withoutScenario(&t, 1, scenariosOf(e.Events, func(x study.Event) string { return x.Scenario }))
	return []present.Part{t}
}

// captionOf is the title of a table, and until when it holds where that is not all that
// was asked for.
func captionOf(p study.Printer, t study.Table) string {
	switch {
	case t.ValidUntil == nil:
		return t.Title
	case t.Title == "":
		return "Valid until " + p.Time(*t.ValidUntil)
	}
	return t.Title + " (valid until " + p.Time(*t.ValidUntil) + ")"
}
