package study

import (
	"errors"

	"lagbook/network"
	"lagbook/network/casefile"
)

// A periodic is the periodic state, worked out once for all limits on it.
type periodic struct {
	m      *Model
	resp   answers // nil until asked for
	period float64
	warn   []Warning
	err    error
}

// answers returns one period of the periodic state, from t = 0 on.
func (c *periodic) answers() (answers, []Warning, error) {
	if c.resp == nil && c.err == nil {
		if c.m.marches() {
			c.err = c.marched()
		} else {
			c.err = c.closed()
		}
		return c.resp, c.warn, c.err
	}
	return c.resp, nil, c.err
}

// closed is the closed form; of a case that is not linear that of its linear network about
// the start.
func (c *periodic) closed() error {
	var around *moment
	var err error
	red, par := (*network.Reduction)(nil), c.m.par
	if c.m.Nonlinear() {
		if around, err = c.m.moment(nil); err != nil {
			return err
		}
		red, err = c.m.reducedAt(around)
		par = around.lin.Params
	} else {
		red, err = c.m.reduction()
	}
	if err != nil {
		return err
	}
	cycle, _, err := red.Cycle(par)
	if err != nil {
		return err
	}
	if c.period = cycle.Period; c.period == 0 {
		return &network.NoCycle{Text: "no load repeats for ever"}
	}
	if around != nil {
		return c.wrap(&added{cycle.Response(), around.base})
	}
	return c.wrap(cycle.Response())
}

// marched is the last of as many periods as it takes.
func (c *periodic) marched() error {
	m := c.m.copied()
	a, err := m.marchCycle(m.limitedInCycle())
	if err != nil {
		return err
	}
	for _, w := range a.Warnings {
		if w.Code == "no-cycle" || w.Code == "own-rhythm" {
			c.warn = append(c.warn, w)
		}
	}
	end := 0.0
	if c.period, _, err = m.commonPeriod(); err != nil {
		return err
	}
	if c.period > 0 {
		end = m.until
	} else {
		e, period, ok := m.rhythm()
		if !ok {
			return &network.NoCycle{Text: "no load repeats for ever, and nothing that switches has come to a rhythm when the run ends"}
		}
		c.period, end = period, e.At
	}
	return c.wrap(m.march.run.Since(end - c.period))
}

// limitedInCycle are the outputs of the network that limits on the periodic state depend on.
func (m *Model) limitedInCycle() (list []shown) {
	needed := make([]bool, len(m.shows))
	for _, ask := range m.limitAsks() {
		for _, s := range ask.Of {
			if w, err := m.want(s, ask.Above); err == nil && ask.InCycle {
				needed[w.out] = true
			}
		}
	}
	for k := len(m.shows) - 1; k >= 0; k-- { // each stands after those it is made of
		if w := m.shows[k]; needed[k] && w.derived() {
			for _, of := range w.from.of {
				needed[of] = true
			}
		}
	}
	for k, w := range m.shows {
		if needed[k] && !w.derived() {
			list = append(list, w)
		}
	}
	return list
}

// wrap adds results: an integral counts from the start of the period.
func (c *periodic) wrap(base answers) (err error) {
	c.resp, err = c.m.withResults(base, 0, c.period)
	return err
}

// inCycle puts the period in the place of the run. What the margin is a share of is the way
// from the mean.
func (t *trial) inCycle(c *periodic) {
	t.cycle, t.t0, t.t1, t.run, t.stopped = c.period, 0, c.period, c.period, ""
	t.begin = c.resp.Integral(t.show.out, 0, c.period) / c.period
}

// unjudgedInCycle is the verdict on a limit where there is no periodic state.
func (m *Model) unjudgedInCycle(ask casefile.AskLimit, err error) (Limit, []Warning, error) {
	why := err.Error()
	var none *network.NoCycle
	if errors.As(err, &none) {
		why = "there is no cycle: " + none.Text
	}
	w, err := m.want(ask.Of[0], ask.Above)
	if err != nil {
		return Limit{}, nil, err
	}
	level := m.val.Num[ask.Level]
	v := Limit{Name: ask.Name, Of: w.name, Demand: ask.Kind.String(), Unit: w.unit, Kind: w.kind, Level: &level, LevelUnit: w.unit, In: "cycle", Text: "cannot be judged: " + why, NotJudged: true}
	if ask.Above != "" {
		v.Of += " above " + ask.Above
	}
	t := trial{ask: ask}
	return v, []Warning{t.warning("no-cycle", v.Text)}, nil
}
