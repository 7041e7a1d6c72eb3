package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
	"lagbook/network/study"
)

// scenarioTitle is a scenario with its title: "charge: Fast charge, 25 °C water".
func scenarioTitle(c *casefile.Case, name string) string {
	for _, s := range c.Questions.Scenarios {
		if s.Name == name && s.Title != "" {
			return name + ": " + s.Title
		}
	}
	return name
}

// scenarioFact says under which scenario a page holds where that is one alone.
func scenarioFact(c *casefile.Case, names []string) []present.Fact {
	if len(names) == 0 {
		return nil
	}
	for _, n := range names {
		if n != names[0] || n == "" {
			return nil
		}
	}
	return []present.Fact{{Name: "Scenario", Value: scenarioTitle(c, names[0])}}
}

// scenarioOpening opens a page that holds under one scenario alone.
func scenarioOpening(c *casefile.Case, names []string) []present.Part {
	if f := scenarioFact(c, names); f != nil {
		return []present.Part{present.Facts{List: f}}
	}
	return nil
}

// underWords says in a heading under which of several scenarios something holds.
func underWords(names []string, name string) string {
	if !severalScenarios(names) {
		return ""
	}
	return " (under " + name + ")"
}

// underHeading heads what holds under one scenario of several.
func underHeading(c *casefile.Case, name string) present.Heading {
	return present.Heading{Level: 1, Text: "Under " + scenarioTitle(c, name)}
}

// severalScenarios reports whether a list holds under more than one scenario.
func severalScenarios(names []string) bool {
	for _, n := range names {
		if n != names[0] {
			return true
		}
	}
	return false
}

func scenariosOf[T any](list []T, of func(T) string) []string {
	names := make([]string, len(list))
	for i, x := range list {
		names[i] = of(x)
	}
	return names
}

func tableScenarios(list []study.Table) []string {
	return scenariosOf(list, func(t study.Table) string { return t.Scenario })
}

func limitScenarios(list []study.Limit) []string {
	return scenariosOf(list, func(l study.Limit) string { return l.Scenario })
}

// titled is a table whose title says under which scenario it holds, where several are
// shown.
func titled(c *casefile.Case, t study.Table, several bool) study.Table {
	switch {
	case !several:
	case t.Title == "":
		t.Title = scenarioTitle(c, t.Scenario)
	default:
		t.Title += " – " + scenarioTitle(c, t.Scenario)
	}
	return t
}
