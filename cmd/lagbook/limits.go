package main

import (
	"lagbook/cmd/lagbook/internal/present"

	"github.com/spf13/cobra"
)

// limits judges each limit; its exit status says whether all are met.
func (a *app) limits() *cobra.Command {
	return &cobra.Command{
		Use:     "limits [CASE.toml]",
		Short:   "each limit, met or not, with its margin",
		Long:    "limits judges each [limit] of the case, with its margin and the instant that\ndecides, and names the one that governs. Extremes and crossings are roots of the\nclosed-form response, never samples. Exit status 3: a limit is not met.",
		Example: "  lagbook limits",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.model(args)
			if err != nil {
				return err
			}
			ans, err := m.Limits()
			if err != nil {
				return a.failed(m, err)
			}
			if err := a.answer(ans, func() present.Doc { return limitsDoc(m, ans) }); err != nil {
				return err
			}
			if !ans.Met {
				return &fault{code: exitLimit}
			}
			return nil
		},
	}
}
