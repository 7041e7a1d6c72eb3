package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// poles lists transfer functions and what is read from their poles.
func (a *app) poles() *cobra.Command {
	var s scenes
	return s.flags(&cobra.Command{
		Use:     "poles [CASE.toml]",
		Short:   "transfer functions: gain, poles, zeros, time constants, settling",
		Long:    "poles prints each [[transfer]] of the case: gain, poles slowest first with time\nconstant or damping, zeros, what cancels, and the measures of a unit step; and\nwhich nodes move together in each time constant. Without [[transfer]], from each\nload to each thing that tables and limits name. Scenarios that change loads alone have\nthe poles in common; where one changes the network, they stand under each.",
		Example: "  lagbook poles --format json",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.modelOr(s.example(demo.Main), args)
			if err != nil {
				return err
			}
			list, err := s.of(m)
			if err != nil {
				return err
			}
			ans, err := m.PolesUnder(list)
			if err != nil {
				return a.failed(m, err)
			}
			return a.answer(ans, func() present.Doc { return polesDoc(m, ans) })
		},
	})
}
