package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// demo runs a case end to end: the page that a design note opens with.
func (a *app) demo() *cobra.Command {
	var s scenes
	return s.flags(&cobra.Command{
		Use:     "demo [CASE.toml]",
		Short:   "run the embedded demo, or a case, end to end",
		Long:    "demo prints the whole page for the embedded demo case, whose data are invented:\nthe answer, the network, the time constants with what moves together in each, a\ntable, the limits, a hand check, what is assumed. With a case, the same for it.",
		Example: "  lagbook demo",
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
			ans, err := m.PageUnder(list)
			if err != nil {
				return a.failed(m, err)
			}
			if err := a.answer(ans, func() present.Doc { return pageDoc(m, ans) }); err != nil {
				return err
			}
			return stopped(ans.Evidence)
		},
	})
}
