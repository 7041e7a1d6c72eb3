package main

import (
	"errors"
	"fmt"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// compare prints two cases side by side.
func (a *app) compare() *cobra.Command {
	return &cobra.Command{
		Use:   "compare [A.toml B.toml]",
		Short: "two cases side by side: what they state differently, what comes out",
		Long: "compare lists what two cases state differently (values changed, parts and questions\n" +
			"added or removed; one quantity in two units is no difference) and sets beside each\n" +
			"other what comes out of each: time constants, levels at the start, the extremes of\n" +
			"tables, limits with their margins, under every scenario. Differences are B less A.\n" +
			"Without cases, two states of an embedded demo.",
		Example: "  lagbook compare\n  lagbook compare --format csv",
		Args: func(c *cobra.Command, args []string) error {
			switch {
			case len(args) != 0 && len(args) != 2:
				return &fault{exitUsage, fmt.Sprintf("compare takes two case files, not %d", len(args))}
			case len(args) == 2 && args[0] == "-" && args[1] == "-":
				return &fault{exitUsage, "standard input holds one case: name a file for the other"}
			}
			return nil
		},
		RunE: func(_ *cobra.Command, args []string) error {
			var files [2][]string // none: the demo
			if len(args) == 2 {
				files = [2][]string{args[:1], args[1:]}
			}
			var m [2]*study.Model
			var err error
			for i, example := range []string{demo.Duties, demo.Revised} {
				if m[i], err = a.modelOr(example, files[i]); err != nil {
					return err
				}
			}
			ans, err := study.Compare(m[0], m[1])
			if side := (*study.Side)(nil); errors.As(err, &side) {
				return a.failed(m[side.Case], side.Err)
			} else if err != nil {
				return &fault{exitCase, err.Error()}
			}
			return a.answer(ans, func() present.Doc { return compareDoc(m, ans) })
		},
	}
}
