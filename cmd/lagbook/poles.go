package main

import (
	"lagbook/cmd/lagbook/internal/present"

	"github.com/spf13/cobra"
)

// poles lists transfer functions and what is read from their poles.
func (a *app) poles() *cobra.Command {
	return &cobra.Command{
		Use:     "poles [CASE.toml]",
		Short:   "transfer functions: gain, poles, zeros, time constants, settling",
		Long:    "poles prints each [[transfer]] of the case: gain, poles slowest first with time\nconstant or damping, zeros, what cancels, and the measures of a unit step; and\nwhich nodes move together in each time constant. Without [[transfer]], from each\nload to each thing that tables and limits name.",
		Example: "  lagbook poles --format json",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.model(args)
			if err != nil {
				return err
			}
			ans, err := m.Poles()
			if err != nil {
				return a.failed(m, err)
			}
			return a.answer(ans, func() present.Doc { return polesDoc(m, ans) })
		},
	}
}
