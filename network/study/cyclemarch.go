package study

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strconv"

	"lagbook/laplace"
	"lagbook/network"
)

// mostPeriods is how many periods a march goes on for in search of its cycle.
const mostPeriods = 1000

// marchCycle marches whole periods from the start until one is like the next, and reads
// the cycle off the last. What is left of the way to it is judged by how fast the change
// from one period to the next falls: geometrically in the end, so that of a change d with
// the ratio r another d·r/(1−r) is to come. Where many periods do not do, the cycle is
// looked for by hasten, and the march from the start goes on until it is near enough.
func (m *Model) marchCycle(outs []shown) (*Cycles, error) {
	period, from, err := m.commonPeriod()
	if err != nil {
		return nil, err
	}
	if period == 0 {
		return m.ownRhythm(outs)
	}
	state, err := m.begin()
	if err != nil {
		return nil, err
	}
	c := &cycling{m: m, outs: outs, period: period, state: state}
	for !c.settled(from) && (len(c.turns) < hastenAfter || float64(len(c.turns))*period < from) {
		if err := c.next(); err != nil {
			return nil, err
		}
	}
	steady := c
	if !c.settled(from) {
		steady = c.hastened()
	}
	for steady == nil && !c.settled(from) {
		if len(c.turns) >= mostPeriods {
			return nil, m.noCycle(outs, c.turns, period)
		}
		if err := c.next(); err != nil {
			return nil, err
		}
	}
	if steady == nil {
		steady = c
	}
	for steady != c && len(c.turns) < mostPeriods && !c.near(steady.last()) {
		if err := c.next(); err != nil {
			return nil, err
		}
	}
	return steady.answer(c), nil
}

// cycling is a march of period after period.
type cycling struct {
	m      *Model
	outs   []shown
	period float64
	state  *network.State
	run    *network.Trajectory // of the last period
	turns  []turn
}

// next marches one more period.
func (c *cycling) next() error {
	t0 := c.state.T
	t1 := (math.Round(t0/c.period) + 1) * c.period
	run, err := c.m.Net.March(c.m.par, c.state, c.m.outs, network.Run{Until: t1})
	if err != nil {
		return err
	}
	if run.Until() < t1*(1-1e-12) {
		c.m.march.run, c.m.until = run, t1
		return errors.New("there is no cycle: " + c.m.marchedEvidence().Stopped)
	}
	c.run, c.state = run, run.End()
	c.turns = append(c.turns, takeTurn(run, c.state, len(c.m.outs), t0, t1))
	return nil
}

func (c *cycling) settled(from float64) bool {
	return float64(len(c.turns)-1)*c.period >= from && settledTurns(c.outs, c.turns)
}

func (c *cycling) last() turn { return c.turns[len(c.turns)-1] }

// near reports whether the last period is well within nearCycle of a cycle.
func (c *cycling) near(cycle turn) bool {
	for _, w := range c.outs {
		if y := cycle.y[w.out]; apart(c.last().y[w.out], y) > nearCycle/2*swingOf(y)+restOfMarch*largest(y) {
			return false
		}
	}
	return true
}

// hastened is the march of the cycle itself, nil where it is not found.
func (c *cycling) hastened() *cycling {
	state, ok := c.m.hasten(c.state, c.period)
	if !ok {
		return nil
	}
	s := &cycling{m: c.m, outs: c.outs, period: c.period, state: state}
	for len(s.turns) < hastenAfter {
		if s.next() != nil {
			return nil
		}
		if settledTurns(s.outs, s.turns) {
			return s
		}
	}
	return nil
}

// answer reads the cycle off the last period, and counts those of the march from the start
// until it is near.
func (c *cycling) answer(start *cycling) *Cycles {
	m := c.m
	a := &Cycles{Title: m.Case.Title, Cycles: []Cycle{}, Periods: len(start.turns)}
	t1 := c.state.T
	m.march.run, m.until = c.run, t1
	var warn []Warning
	var uncounted []string
	for _, w := range c.outs {
		if w.derived() {
			y, more := m.marchedResult(c.run.Since(t1-c.period), w, c.period)
			a.Cycles, warn = append(a.Cycles, y...), append(warn, more...)
			continue
		}
		if by := drift(w, c.turns); by != 0 {
			warn = append(warn, Warning{"no-cycle", fmt.Sprintf("%s has no cycle: it moves on by %s in every period", w.name, m.Show.Value(by, w.unit, differenceOf(w.kind)))})
			continue
		}
		count, ok := countTurns(w, start.turns, c.last())
		if !ok {
			uncounted = append(uncounted, w.name)
		}
		a.Cycles = append(a.Cycles, cycleIn(c.run, w, t1-c.period, c.period, count))
	}
	if uncounted != nil {
		warn = append(warn, Warning{"search-stopped", fmt.Sprintf("%s: not within 2 %% of the swing after %d periods from the start, where the count was given up",
			join(firstNames(uncounted)), len(start.turns))})
	}
	a.Evidence = m.evidence(warn)
	a.Events = slices.DeleteFunc(a.Events, func(e Event) bool { return e.At < t1-c.period })
	for i := range a.Events {
		a.Events[i].At -= t1 - c.period // as the times of the extremes
	}
	return a
}

// commonPeriod is the period with which everything that drives the case repeats, and
// from when on.
func (m *Model) commonPeriod() (period, from float64, err error) {
	waves := slices.Concat(m.par.Wave, m.par.Switch)
	names := make([]string, 0, len(waves))
	refs := make([]network.Ref, 0, len(waves))
	for _, in := range m.Net.Inputs() {
		names, refs = append(names, in.Name), append(refs, in.Ref)
	}
	for _, s := range m.Net.Switches() {
		names, refs = append(names, s.Name), append(refs, s.Ref)
	}
	for _, e := range m.elements() {
		for k, w := range m.par.Drive[e.ID] {
			waves, names, refs = append(waves, w), append(names, e.Drives[k]), append(refs, e.Ref)
		}
	}
	period, from, err = laplace.CommonPeriod(waves)
	var wave *laplace.Unsettled
	var apart *laplace.NotCommensurate
	switch {
	case errors.As(err, &wave):
		err = &network.NoCycle{Refs: []network.Ref{refs[wave.Input]}, Text: strconv.Quote(names[wave.Input]) + ": " + wave.Why, Err: err}
	case errors.As(err, &apart):
		a, b := apart.Inputs[0], apart.Inputs[1]
		err = &network.NoCycle{Refs: []network.Ref{refs[b], refs[a]}, Err: err, Text: fmt.Sprintf("%q repeats every %s and %q every %s, periods without a whole-number ratio, so that together they never repeat",
			names[a], m.Show.Time(apart.Periods[0]), names[b], m.Show.Time(apart.Periods[1]))}
	}
	return period, from, err
}

// noCycle says what still changed when the search for a cycle was given up.
func (m *Model) noCycle(outs []shown, turns []turn, period float64) error {
	text := fmt.Sprintf("none is found within %d periods of %s from the start", mostPeriods, m.Show.Time(period))
	most, n := 0.0, len(turns)
	for _, w := range outs {
		a, b := turns[n-1].y[w.out], turns[n-2].y[w.out]
		d := apart(a, b)
		if swing := swingOf(a); swing > 0 && d/swing > most {
			most = d / swing
			text = fmt.Sprintf("none is found within %d periods of %s from the start: what still changes most is %s, by %s from one period to the next", mostPeriods,
				m.Show.Time(period), w.name, m.Show.Value(d, w.unit, differenceOf(w.kind)))
		}
	}
	return &network.NoCycle{Text: text}
}
