package main

import (
	"lagbook/cmd/lagbook/internal/present"

	"github.com/spf13/cobra"
)

// check lists the network as understood.
func (a *app) check() *cobra.Command {
	return &cobra.Command{
		Use:     "check [CASE.toml]",
		Short:   "read, check and list the network as understood, in SI",
		Long:    "check reads a case, reports every mistake with its place, and lists the network\nas understood: nodes, parts with how each number follows from what was typed,\nloads in words, and how the initial state is found.",
		Example: "  lagbook check",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.model(args)
			if err != nil {
				return err
			}
			ans, err := m.Check()
			if err != nil {
				return a.failed(m, err)
			}
			return a.answer(ans, func() present.Doc { return checkDoc(m, ans) })
		},
	}
}
