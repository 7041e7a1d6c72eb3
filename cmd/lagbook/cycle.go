package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// cycle prints the periodic steady state under loads that repeat.
func (a *app) cycle() *cobra.Command {
	var s scenes
	return s.flags(&cobra.Command{
		Use:   "cycle [CASE.toml]",
		Short: "the periodic steady state under repeating loads",
		Long: "cycle says what each thing that tables and limits name comes to when the loads\n" +
			"repeat for ever: highest, lowest and mean, when in the period, and how many\n" +
			"periods pass from the start until it stays within 2 % of its swing of that.\n" +
			"Loads with periods in a whole-number ratio make a common period; a load that\n" +
			"settles counts with its final value. The answer is the closed form, no march; a case\n" +
			"that is not linear is marched, period after period, until one is like the next.\n" +
			"Where no load repeats but something switches, as a thermostat does, its own rhythm.\n" +
			"Under each scenario of the case, or with --scenario under those named.",
		Example: "  lagbook cycle",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.modelOr(s.example(demo.Round), args)
			if err != nil {
				return err
			}
			list, err := s.of(m)
			if err != nil {
				return err
			}
			ans, err := m.CyclesUnder(list)
			if err != nil {
				return a.failed(m, err)
			}
			return a.answer(ans, func() present.Doc { return cycleDoc(m, ans) })
		},
	})
}
