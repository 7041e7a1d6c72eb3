package study

import (
	"fmt"
	"maps"
	"slices"
)

// Linear returns a model of the same case that answers by its linear network about the
// start, in the s-domain: deviations, added to the values at that state. A linear case
// is answered as ever.
func (m *Model) Linear() *Model {
	c := m.copied()
	c.linearly = true
	return c
}

// copied is a model of the same case that may be asked for other outputs.
func (m *Model) copied() *Model {
	c := *m
	c.spare, c.borrowed = nil, true
	c.index = maps.Clone(m.index)
	c.outs, c.shows = slices.Clone(m.outs), slices.Clone(m.shows)
	c.march = marched{begun: m.march.begun}
	for _, k := range m.march.moments { // the states, not what was worked out for other outputs
		c.march.moments = append(c.march.moments, &moment{at: k.at, state: k.state, outs: -1})
	}
	c.forget()
	return &c
}

// bare is a model of the same case with its named nodes as outputs alone.
func (m *Model) bare() (*Model, error) {
	c := m.copied()
	c.outs, c.shows, c.index = nil, nil, map[string]int{}
	return c, c.wantModes()
}

// respondLinearly finds the response of the linear network about the start.
func (m *Model) respondLinearly() error {
	k, err := m.moment(nil)
	if err != nil {
		return err
	}
	red, err := m.reducedAt(k)
	if err != nil {
		return err
	}
	if err := m.findEnd(); err != nil {
		return err
	}
	r, err := red.Respond(k.lin.Params, m.until)
	if err != nil {
		return err
	}
	m.resp = &added{r, k.base}
	return nil
}

// linearWarnings say what the linear answer to a nonlinear case leaves out.
func (m *Model) linearWarnings() []Warning {
	if !m.linearly || !m.Nonlinear() {
		return nil
	}
	return append([]Warning{{"linearised", "this is the linear answer about the start: right for small changes; --both shows how far it is from the march"}}, m.frozen()...)
}

// frozen names the switches that the linear answer leaves where they are.
func (m *Model) frozen() (warn []Warning) {
	if !m.Nonlinear() {
		return nil
	}
	for _, s := range m.Net.Switches() {
		if !m.par.Switch[s.ID].Constant() {
			warn = append(warn, Warning{"linearised", s.Name + " moves, and keeps its value at the start in the linear answer"})
		}
	}
	return warn
}

// aboutWarnings say which state transfer functions of a nonlinear case are about.
func (m *Model) aboutWarnings(pairs []pair) []Warning {
	if !m.Nonlinear() {
		return nil
	}
	warn := []Warning{{"linearised", fmt.Sprintf("the case is not linear (%s): what stands here of poles is its linear network about the state named with each, right for small changes about it",
		join(firstNames(m.nonlinearParts())))}}
	if len(pairs) > 0 && commonAbout(pairs) == nil {
		for _, p := range pairs {
			if p.about == nil {
				warn[0].Text += `; about = "2 s" in a [[transfer]] gives another moment`
				break
			}
		}
	}
	return warn
}
