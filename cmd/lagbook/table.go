package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// table prints levels and flows against time.
func (a *app) table() *cobra.Command {
	var w ways
	var s scenes
	return s.flags(w.flags(&cobra.Command{
		Use:     "table [CASE.toml]",
		Short:   "temperature, pressure and flow against time",
		Long:    "table prints each [[table]] of the case, with the changes of the loads marked on\ntheir rows. Without [[table]], every named node at thirteen instants of the run.\nCSV and JSON carry full precision.\n\nA case that is not linear is marched, and what happened to its parts is listed;\n--linear answers by its linear network about the start, --both side by side.\n\nUnder each scenario of the case, or with --scenario under those named. A log that\nthe case holds as [measured] stands beside what is predicted.",
		Example: "  lagbook table --format csv\n  lagbook table --scenario climb",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			if err := w.check(); err != nil {
				return err
			}
			m, err := a.modelOr(s.example(demo.Main), args)
			if err != nil {
				return err
			}
			list, err := s.of(m)
			if err != nil {
				return err
			}
			m, both := w.pick(a, m)
			if both {
				return a.tableBoth(m, list)
			}
			ans, err := m.TablesUnder(list)
			if err != nil {
				return a.failed(m, err)
			}
			if err := a.answer(ans, func() present.Doc { return tablesDoc(m, ans) }); err != nil {
				return err
			}
			return stopped(ans.Evidence)
		},
	}))
}

// tableBoth prints the marched and the linear answer side by side.
func (a *app) tableBoth(m *study.Model, list []*casefile.Scenario) error {
	ans, err := m.TablesBothUnder(list)
	if err != nil {
		return a.failed(m, err)
	}
	if err := a.answer(ans, func() present.Doc { return tablesBothDoc(m, ans) }); err != nil {
		return err
	}
	return stopped(ans.Evidence)
}
