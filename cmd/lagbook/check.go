package main

import (
	"lagbook/cmd/lagbook/internal/present"

	"github.com/spf13/cobra"
)

// check lists the network as understood.
func (a *app) check() *cobra.Command {
	var flows bool
	c := &cobra.Command{
		Use:     "check [CASE.toml]",
		Short:   "read, check and list the network as understood, in SI",
		Long:    "check reads a case, reports every mistake with its place, and lists the network\nas understood: nodes, parts with how each number follows from what was typed,\nloads in words, how the initial state is found, what flows at t = 0, and which\nparts are not linear. --flows adds where the heat, or the liquid, goes at the start\nand at the end of the run, and the stack of levels from the source outwards.",
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
			if flows {
				if ans.Flows, err = m.Flows(); err != nil {
					return a.failed(m, err)
				}
			}
			return a.answer(ans, func() present.Doc { return checkDoc(m, ans) })
		},
	}
	c.Flags().BoolVar(&flows, "flows", false, "add where the heat or the liquid goes, and the stack of levels")
	return c
}
