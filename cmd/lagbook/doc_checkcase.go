package main

import (
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// profilesPart lists the profiles: what each is, and whether it is answered in closed form.
func profilesPart(p study.Printer, notes *sourceNotes, list []study.CheckProfile) present.Table {
	t := present.Table{
		Caption:  "Profiles",
		Columns:  []present.Column{{Head: "name"}, {Head: "as written"}, {Head: "against time"}, {Head: "form"}, {Head: "source"}},
		FullHead: []string{"name", "unit", "as written", "against time", "form", "bound", "source"},
	}
	for _, x := range list {
		form := "closed form"
		if x.Bound != nil {
			form = "sampled, within " + p.Value(*x.Bound, x.Unit, gapKind(x.Kind))
		}
		if !x.Used {
			form += "; not used"
		}
		t.Rows = append(t.Rows, []string{x.Name, x.Text, x.Wave, form, notes.cell(x.Source)})
		t.Full = append(t.Full, []string{x.Name, x.Unit + kindWord(x.Kind), x.Text, x.Wave, x.Form, fullOf(x.Bound), x.Source})
	}
	return t
}

// usesPart lists the uses of parts.
func usesPart(p study.Printer, notes *sourceNotes, list []study.CheckUse) present.Table {
	t := present.Table{
		Caption:  "Uses of parts",
		Columns:  []present.Column{{Head: "use"}, {Head: "part"}, {Head: "joined"}, {Head: "given in it"}, {Head: "source"}},
		FullHead: []string{"use", "part", "joined", "given in it", "source"},
	}
	for _, u := range list {
		var joins, set []string
		for _, j := range u.Join {
			joins = append(joins, j[0]+" to "+j[1])
		}
		for _, s := range u.Set {
			words := s.Name + " " + p.Value(s.Value, s.Unit, s.Kind)
			if s.Own {
				words += " (as the part says)"
			}
			set = append(set, words)
		}
		row := []string{u.Name, u.Part, semicolons(joins), semicolons(set), notes.cell(u.Source)}
		t.Rows = append(t.Rows, row)
		t.Full = append(t.Full, []string{u.Name, u.Part, semicolons(joins), semicolons(set), u.Source})
	}
	return t
}

// semicolons joins words that may hold commas.
func semicolons(words []string) string { return strings.Join(words, "; ") }

// scenariosPart lists what each scenario changes of the case as written.
func scenariosPart(p study.Printer, notes *sourceNotes, list []study.CheckScenario) present.Table {
	t := present.Table{
		Caption:  "Scenarios, and what each changes of the case as written",
		Columns:  []present.Column{{Head: "scenario"}, {Head: "title"}, {Head: "changes"}, {Head: "asked for"}, {Head: "poles"}, {Head: "source"}},
		FullHead: []string{"scenario", "title", "changes", "asked for", "changes the network", "source"},
	}
	for _, s := range list {
		poles := "the same"
		if s.Network {
			poles = "of its own"
		}
		t.Rows = append(t.Rows, []string{s.Name, s.Title, scenarioChanges(p, s), scenarioAsked(s), poles, notes.cell(s.Source)})
		t.Full = append(t.Full, []string{s.Name, s.Title, scenarioChanges(p, s), scenarioAsked(s), lower(s.Network), s.Source})
	}
	return t
}

// scenarioChanges puts in words what a scenario changes: "inlet 25 °C → 32 °C; climb for
// current".
func scenarioChanges(p study.Printer, s study.CheckScenario) string {
	var words []string
	for _, c := range s.Set {
		words = append(words, c.Given+" "+p.Value(c.From, c.Unit, c.Kind)+" → "+p.Value(c.To, c.Unit, c.Kind))
	}
	for _, f := range s.Profiles {
		words = append(words, f[1]+" for "+f[0])
	}
	if len(words) == 0 {
		return "nothing: as written"
	}
	return semicolons(words)
}

// scenarioAsked says which tables and limits a scenario is asked for.
func scenarioAsked(s study.CheckScenario) string {
	words := []string{}
	for _, of := range []struct {
		what string
		list []string
	}{{"tables", s.Tables}, {"limits", s.Limits}} {
		switch {
		case of.list == nil:
		case len(of.list) == 0:
			words = append(words, "no "+of.what)
		default:
			words = append(words, of.what+" "+list(of.list))
		}
	}
	if len(words) == 0 {
		return "all"
	}
	return semicolons(words)
}

// scenarioFacts are the scenarios in a few lines.
func scenarioFacts(p study.Printer, list []study.CheckScenario) (facts []present.Fact) {
	for _, s := range list {
		value := scenarioChanges(p, s)
		if s.Title != "" {
			value = s.Title + " (" + value + ")"
		}
		facts = append(facts, present.Fact{Name: "Scenario " + s.Name, Value: value})
	}
	return facts
}
