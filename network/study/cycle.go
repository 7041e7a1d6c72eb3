package study

import (
	"fmt"
	"math"
	"slices"

	"lagbook/laplace"
)

// nearCycle is how near to the steady cycle counts as there, as a share of its swing.
const nearCycle = 0.02

// Cycles answers the verb cycle.
type Cycles struct {
	Title  string  `json:"title"`
	Cycles []Cycle `json:"cycles"`
	// Periods counts the whole periods that were marched from the start, 0 where the
	// answer is the closed form.
	Periods int `json:"periods_marched,omitempty"`

	Each []*Cycles `json:"-"` // under each scenario, where there are several
	Evidence
}

// A Cycle is the periodic steady state of one output. Times are in s, those of the
// extremes within the period from t = 0 of the run; a time equal to the period is the
// instant just before a jump there. Cycles counts whole periods from t = 0 until the
// run stays within 2 % of the swing of the steady cycle for good: absent where the
// output does not move.
type Cycle struct {
	Output   string   `json:"output"`
	Scenario string   `json:"scenario,omitempty"`
	Unit     string   `json:"unit"`
	Kind     string   `json:"kind,omitempty"`
	Period   float64  `json:"period"`
	Max      float64  `json:"max"`
	MaxAt    float64  `json:"t_max"`
	Min      float64  `json:"min"`
	MinAt    float64  `json:"t_min"`
	Mean     float64  `json:"mean"`
	Cycles   *float64 `json:"cycles_to_2pct,omitempty"`
}

// Cycle answers for each thing that tables and limits name or, without any, for
// every named node of a small network that is not held.
func (m *Model) Cycle() (*Cycles, error) {
	outs, err := m.cycled()
	if err != nil {
		return nil, err
	}
	if m.Nonlinear() {
		return m.marchCycle(outs)
	}
	red, err := m.reduction()
	if err != nil {
		return nil, err
	}
	a := &Cycles{Title: m.Case.Title, Cycles: []Cycle{}}
	c, approach, err := red.Cycle(m.par)
	if err != nil {
		return nil, err
	}
	var warn []Warning
	if c.Period == 0 {
		warn = append(warn, Warning{"nothing-repeats", "no load repeats for ever, so there is no cycle: everything settles at a steady state"})
		outs = nil
	}
	for _, w := range outs {
		y, more, err := m.cycle(c, approach, w)
		if err != nil {
			return nil, fmt.Errorf("cycle of %s: %w", w.name, err)
		}
		a.Cycles, warn = append(a.Cycles, y), append(warn, more...)
	}
	a.Evidence = m.evidence(warn)
	return a, nil
}

// cycled are the outputs whose cycle is shown, rises above a node as such.
func (m *Model) cycled() ([]shown, error) {
	list, err := m.unasked()
	if err != nil {
		return nil, err
	}
	seen := map[int]bool{}
	for _, w := range list {
		seen[w.out] = true
	}
	add := func(w shown, above string, err error) error {
		if err != nil || seen[w.out] || above == "" {
			return err
		}
		seen[w.out] = true
		w.name += " above " + above
		list = append(list, w)
		return nil
	}
	for _, t := range m.Case.Questions.Tables {
		for _, s := range t.Show {
			w, err := m.want(s, t.Above)
			if err := add(w, t.Above, err); err != nil {
				return nil, err
			}
		}
	}
	for _, l := range m.Case.Questions.Limits {
		for _, s := range l.Of {
			w, err := m.want(s, l.Above)
			if err := add(w, l.Above, err); err != nil {
				return nil, err
			}
		}
	}
	return list, nil
}

// cycle reads the steady cycle of one output.
func (m *Model) cycle(c *laplace.Cycle, approach *laplace.Approach, w shown) (Cycle, []Warning, error) {
	if w.derived() {
		return m.resultCycle(c.Response(), w, c.Period)
	}
	hi, lo := c.Max(w.out), c.Min(w.out)
	y := Cycle{Output: w.name, Unit: w.unit, Kind: w.kind, Period: c.Period,
		Max: hi.Y, MaxAt: hi.T, Min: lo.Y, MinAt: lo.T, Mean: c.Mean(w.out)}
	if math.Abs(y.Mean) <= 4*c.Response().Rounding(w.out) {
		y.Mean = 0 // what it is, as far as its parts are known
	}
	impulses, err := c.Impulses(w.out)
	if err != nil {
		return y, nil, err
	}
	if len(impulses) == 0 {
		y.Mean = min(max(y.Mean, y.Min), y.Max) // no rounding puts it beyond what it is the mean of
	}
	warn := m.impulseWarning(w, gathered(impulses, 0, c.Period))
	if hi.Capped || lo.Capped {
		warn = append(warn, Warning{"search-stopped", "the search for the extremes of " + w.name + " was given up: the loads change too often"})
	}
	n, ok, err := approach.Cycles(w.out, nearCycle)
	switch {
	case err != nil:
		return y, nil, err
	case ok:
		y.Cycles = &n
	case c.Swing(w.out) > 0:
		warn = append(warn, Warning{"search-stopped", "the search for when " + w.name + " has come to its cycle was given up: the loads change too often"})
	}
	return y, warn, nil
}

// repeats reports whether any load or scale repeats for ever.
func (m *Model) repeats() bool {
	repeats := func(w laplace.Waveform) bool { return w.Repeats() }
	for _, drives := range m.par.Drive {
		if slices.ContainsFunc(drives, repeats) {
			return true
		}
	}
	return slices.ContainsFunc(m.par.Wave, repeats) || slices.ContainsFunc(m.par.Switch, repeats)
}
