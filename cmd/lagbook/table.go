package main

import (
	"lagbook/cmd/lagbook/internal/present"

	"github.com/spf13/cobra"
)

// table prints levels and flows against time.
func (a *app) table() *cobra.Command {
	return &cobra.Command{
		Use:     "table [CASE.toml]",
		Short:   "temperature, pressure and flow against time",
		Long:    "table prints each [[table]] of the case, with the changes of the loads marked on\ntheir rows. Without [[table]], every named node at thirteen instants of the run.\nCSV and JSON carry full precision.",
		Example: "  lagbook table --format csv",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.model(args)
			if err != nil {
				return err
			}
			ans, err := m.Tables()
			if err != nil {
				return a.failed(m, err)
			}
			return a.answer(ans, func() present.Doc { return tablesDoc(m, ans) })
		},
	}
}
