package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// limits judges each limit; its exit status says whether all are met.
func (a *app) limits() *cobra.Command {
	var w ways
	var s scenes
	return s.flags(w.flags(&cobra.Command{
		Use:     "limits [CASE.toml]",
		Short:   "each limit, met or not, with its margin",
		Long:    "limits judges each [limit] of the case, with its margin and the instant that\ndecides, and names the one that governs. Extremes and crossings are roots of the\nclosed-form response, or of the march of a case that is not linear, never samples.\n--linear judges its linear network about the start, --both shows the two verdicts.\nOf a case with scenarios each limit is judged under each, the worst of them marked,\nand one governs over all; --scenario picks some. Exit status 3: a limit is not met.",
		Example: "  lagbook limits\n  lagbook limits --scenario charge --scenario climb",
		Args:    oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			if err := w.check(); err != nil {
				return err
			}
			m, err := a.modelOr(s.example(demo.Main), args)
			if err != nil {
				return err
			}
			list, err := s.of(m)
			if err != nil {
				return err
			}
			m, both := w.pick(a, m)
			if both {
				return a.limitsBoth(m, list)
			}
			ans, err := m.LimitsUnder(list)
			if err != nil {
				return a.failed(m, err)
			}
			if err := a.answer(ans, func() present.Doc { return limitsDoc(m, ans) }); err != nil {
				return err
			}
			return unmet(ans.Met, ans.Evidence)
		},
	}))
}

// limitsBoth prints the verdicts of the march and of the linear answer side by side.
func (a *app) limitsBoth(m *study.Model, list []*casefile.Scenario) error {
	ans, err := m.LimitsBothUnder(list)
	if err != nil {
		return a.failed(m, err)
	}
	if err := a.answer(ans, func() present.Doc { return limitsBothDoc(m, ans) }); err != nil {
		return err
	}
	return unmet(ans.Met, ans.Evidence)
}

// unmet is the fault of limits that are not met, or cannot be judged because the march
// had to stop.
func unmet(met bool, e study.Evidence) error {
	if err := stopped(e); err != nil {
		return err
	}
	if !met {
		return &fault{code: exitLimit}
	}
	return nil
}
