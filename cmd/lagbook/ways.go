package main

import (
	"lagbook/network/study"

	"github.com/spf13/cobra"
)

// ways are the flags that say how a case that is not linear is answered against time:
// by a march unless they say otherwise.
type ways struct{ linear, both bool }

func (w *ways) flags(c *cobra.Command) *cobra.Command {
	c.Flags().BoolVar(&w.linear, "linear", false, "answer a nonlinear case by its linear network about the start")
	c.Flags().BoolVar(&w.both, "both", false, "answer a nonlinear case both ways, with the largest difference")
	return c
}

// check refuses flags that exclude each other, before the case is read.
func (w *ways) check() error {
	if w.linear && w.both {
		return &fault{exitUsage, "--linear and --both exclude each other: --both holds the linear answer too"}
	}
	return nil
}

// pick returns the model that answers, and whether both answers are wanted. A linear
// case has one answer, whatever is asked for.
func (w *ways) pick(a *app, m *study.Model) (answers *study.Model, both bool) {
	switch {
	case !w.linear && !w.both:
		return m, false
	case !m.Nonlinear():
		a.note("the case is linear: there is one answer, in closed form")
		return m, false
	case w.linear:
		return m.Linear(), false
	}
	return m, true
}

// stopped is the fault of a march that had to stop before the end of the run, after
// what is known was printed; nil where it did not.
func stopped(e study.Evidence) error {
	if e.Marched == nil || e.Stopped == "" {
		return nil
	}
	return &fault{exitCase, e.Stopped}
}
