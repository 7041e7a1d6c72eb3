package main

import (
	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// frequencyFlags are the flags of the verb frequency.
type frequencyFlags struct {
	at            []string
	perDecade     int
	ripple, below string
}

// frequency prints gain and phase against frequency or period.
func (a *app) frequency() *cobra.Command {
	var f frequencyFlags
	var s scenes
	c := s.flags(&cobra.Command{
		Use:   "frequency [CASE.toml]",
		Short: "gain and phase against frequency or period",
		Long: "frequency says how a steady swing at the input of each [[transfer]] arrives at its\n" +
			"output: gain, phase, time lag, and the decrement, which is the gain as a share of\n" +
			"that at rest; the corners; and the frequency above which the gain stays below\n" +
			"1/√2 of that at rest. Without --at, at round periods about the corners.\n\n" +
			"--at takes a period (24 h), turns (2 Hz, 50 rpm), an angle (5 rad/s) or a range of\n" +
			"them (0.1 Hz..10 kHz), and may be repeated. 1 Hz is 2π rad/s. With --ripple and\n" +
			"--below: the period up to which a swing of that amplitude at the input stays\n" +
			"below that level at the output.",
		Example: "  lagbook frequency --at 1min --at 0.1..10Hz --per-decade 4\n" +
			"  lagbook frequency --ripple 1L/min --below 0.1bar",
		Args: oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			q, err := f.question()
			if err != nil {
				return err
			}
			m, err := a.modelOr(s.example(demo.Swing), args)
			if err != nil {
				return err
			}
			list, err := s.of(m)
			if err != nil {
				return err
			}
			ans, err := m.FrequencyUnder(list, q)
			if err != nil {
				return a.failed(m, err)
			}
			return a.answer(ans, func() present.Doc { return frequencyDoc(m, ans, q) })
		},
	})
	c.Flags().StringArrayVar(&f.at, "at", nil, "`FREQUENCY`, period or range of them to answer at; may be repeated")
	c.Flags().IntVar(&f.perDecade, "per-decade", 10, "`N` points in each factor of ten of a range")
	c.Flags().StringVar(&f.ripple, "ripple", "", "`AMPLITUDE` of a swing at the input, such as \"5 W\"; with --below")
	c.Flags().StringVar(&f.below, "below", "", "`LEVEL` that the output is to stay below, such as \"0.1 K\"; with --ripple")
	return c
}

// question reads the flags before the case is read.
func (f *frequencyFlags) question() (study.FrequencyQuestion, error) {
	q := study.FrequencyQuestion{PerDecade: f.perDecade}
	if f.perDecade < 1 {
		return q, &fault{exitUsage, "--per-decade wants a number of at least 1"}
	}
	for _, text := range f.at {
		b, err := study.ParseBand(text)
		if err != nil {
			return q, &fault{exitUsage, "--at " + err.Error()}
		}
		q.At = append(q.At, b)
	}
	switch {
	case f.ripple == "" && f.below == "":
		return q, nil
	case f.ripple == "" || f.below == "":
		return q, &fault{exitUsage, "--ripple and --below belong together: an amplitude at the input and what it may come to at the output"}
	}
	if err := q.ParseRipple(f.ripple, f.below); err != nil {
		return q, &fault{exitUsage, "--ripple, --below: " + err.Error()}
	}
	return q, nil
}
