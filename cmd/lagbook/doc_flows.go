package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// flowsParts say where the heat or the liquid goes: watts and share in each part, and
// the stack of levels from the source outwards.
func flowsParts(p study.Printer, list []study.Flows) []present.Part {
	var parts []present.Part
	for _, f := range list {
		parts = append(parts, flowsPart(p, f))
		if len(f.Stack) > 0 {
			parts = append(parts, stackPart(p, f))
		}
	}
	return parts
}

// whenWords says of which instant flows are.
func whenWords(p study.Printer, f study.Flows) string {
	if f.When == "start" {
		return "just before t = 0"
	}
	return "at the end of the run, " + p.Time(f.At)
}

func flowsPart(p study.Printer, f study.Flows) present.Table {
	what := map[string]string{"W": "heat", "m³/s": "liquid"}[f.Unit]
	if what == "" {
		what = "flow"
	}
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption:  "Where the " + what + " goes, " + whenWords(p, f) + ": " + p.Value(f.In, f.Unit, "") + " brought in",
		Columns:  []present.Column{{Head: "part"}, {Head: "from → to"}, right("flow"), right("share")},
		FullHead: []string{"part", "from", "to", "flow", "unit", "share"},
	}
	for _, l := range f.Lines {
		share := "–"
		if l.Share != nil {
			share = p.Percent(*l.Share)
		}
		t.Rows = append(t.Rows, []string{l.Part, arrow(l.From, l.To), p.Value(l.Flow, f.Unit, ""), share})
		t.Full = append(t.Full, []string{l.Part, l.From, l.To, full(l.Flow), f.Unit, fullOf(l.Share)})
	}
	return t
}

func stackPart(p study.Printer, f study.Flows) present.Table {
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption:  "From the source outwards, " + whenWords(p, f) + ", along what carries most",
		Columns:  []present.Column{{Head: "at"}, right("level"), {Head: "through"}, right("flow"), right("down by"), {Head: "to"}},
		FullHead: []string{"at", "level", "level unit", "through", "flow", "flow unit", "down by", "to"},
	}
	for _, s := range f.Stack {
		t.Rows = append(t.Rows, []string{s.From, p.Value(s.Level, f.LevelUnit, "level"), s.Part, p.Value(s.Flow, f.Unit, ""), p.Value(s.Drop, f.LevelUnit, "difference"), s.To})
		t.Full = append(t.Full, []string{s.From, full(s.Level), f.LevelUnit, s.Part, full(s.Flow), f.Unit, full(s.Drop), s.To})
	}
	return t
}
