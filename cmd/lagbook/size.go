package main

import (
	"errors"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// size finds the values that meet the limits; its exit status says whether there are.
func (a *app) size() *cobra.Command {
	var names []string
	c := &cobra.Command{
		Use:     "size [CASE.toml]",
		Short:   "the value that meets the limits",
		Long:    "size varies the given value of each [size] of the case until the limits are met\nwith the margin asked for, under every scenario. Over a range every value at which\nthe limits begin or cease to be met is a root, found to ten digits (eight of a\nmarch), and rounded to a series where one is asked for; from a list or a catalogue\nit takes the best that meets them. What it takes is computed again. Where nothing\nmeets the limits it says what comes nearest, and which limit stands in the way.\nExit status 3: a size is not met.",
		Example: "  lagbook size\n  lagbook size --name film",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			m, err := a.modelOr(demo.Duties, args)
			if err != nil {
				return err
			}
			ans, err := m.Sizes(names)
			var none *study.NoSize
			if errors.As(err, &none) {
				return &fault{exitUsage, "--name " + none.Text}
			}
			if err != nil {
				return a.failed(m, err)
			}
			if err := a.answer(ans, func() present.Doc { return sizeDoc(m, ans) }); err != nil {
				return err
			}
			if !ans.Met {
				return &fault{code: exitLimit}
			}
			return nil
		},
	}
	c.Flags().StringArrayVar(&names, "name", nil, "answer the size `NAME` of the case, not all; may be repeated")
	return c
}
