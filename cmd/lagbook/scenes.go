package main

import (
	"strconv"

	"lagbook/network/casefile"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// scenes is the flag that says under which scenarios a verb answers: all, unless it names
// some.
type scenes struct{ names []string }

func (s *scenes) flags(c *cobra.Command) *cobra.Command {
	c.Flags().StringArrayVar(&s.names, "scenario", nil, "answer under the scenario `NAME` of the case, not under all; may be repeated")
	return c
}

// example is the embedded case that is used without one: of those that are asked for a
// scenario the one that has some.
func (s *scenes) example(other string) string {
	if len(s.names) > 0 {
		return demo.Duties
	}
	return other
}

// of are the scenarios to answer under, of a case without any the case as written.
func (s *scenes) of(m *study.Model) ([]*casefile.Scenario, error) {
	list, err := m.Scenarios(s.names)
	if err != nil {
		return nil, &fault{exitUsage, "--scenario " + err.Error()}
	}
	return list, nil
}

// under adds to diagnostics the scenario that the fault came up in.
func under(scenario string, ds []casefile.Diagnostic) []casefile.Diagnostic {
	for i := range ds {
		ds[i].Text += ", in scenario " + strconv.Quote(scenario)
	}
	return ds
}
