package study

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/network"
)

// A moment is a state of a case that is not linear, with the linear network about it.
type moment struct {
	at    *float64 // s; nil: just before t = 0
	state *network.State
	lin   *network.Linear
	red   *network.Reduction // with the first outs of the outputs
	base  []float64          // their values at the state
	outs  int
}

// moment returns the state that a time is about: just before t = 0 where it is nil,
// else what a march comes to.
func (m *Model) moment(at *float64) (*moment, error) {
	from := (*network.State)(nil)
	for _, k := range m.march.moments {
		switch {
		case at == nil && k.at == nil, at != nil && k.at != nil && *at == *k.at:
			return k, m.lineariseAt(k)
		case at != nil && k.at != nil && *k.at < *at && (from == nil || k.state.T > from.T):
			from = k.state
		}
	}
	state, err := m.begin()
	if err != nil {
		return nil, err
	}
	if at != nil {
		if from == nil {
			from = state
		}
		run, err := m.Net.March(m.par, from, nil, network.Run{Until: *at})
		if err != nil {
			return nil, err
		}
		if state = run.End(); run.Until() < *at*(1-1e-12) {
			return nil, fmt.Errorf("about %s: the run ends before, at %s", m.Show.Time(*at), m.Show.Time(run.Until()))
		}
	}
	k := &moment{at: at, state: state, outs: -1}
	if err := m.lineariseAt(k); err != nil {
		return nil, err
	}
	m.march.moments = append(m.march.moments, k)
	return k, nil
}

// lineariseAt finds the linear network about a moment, once.
func (m *Model) lineariseAt(k *moment) (err error) {
	if k.lin == nil {
		k.lin, err = m.Net.Linearise(m.par, k.state)
	}
	return err
}

// reducedAt reduces the linear network about a moment, with every output wanted so far.
func (m *Model) reducedAt(k *moment) (*network.Reduction, error) {
	if k.outs != len(m.outs) {
		outs, base := k.lin.Outputs(m.outs)
		red, err := k.lin.Net.Reduce(k.lin.Params, outs)
		if err != nil {
			return nil, err
		}
		k.red, k.base, k.outs = red, base, len(m.outs)
	}
	return k.red, nil
}

// reducedAbout is reducedAt of the moment that a time is about.
func (m *Model) reducedAbout(at *float64) (*network.Reduction, error) {
	k, err := m.moment(at)
	if err != nil {
		return nil, err
	}
	return m.reducedAt(k)
}

// modal returns the system whose poles are the modes of the case, and the model that has
// its outputs: of the network just before t = 0 or, of one that is not linear, of the
// linear network about the state that every transfer function is about, and in words
// which that is. That network then has no part in it of what is shown and only adds up,
// such as the energy a heater has used, a pole at 0 that nothing moves with.
func (m *Model) modal(pairs []pair) (*Model, *laplace.System, string, error) {
	if !m.Nonlinear() {
		red, err := m.reduction()
		if err != nil {
			return nil, nil, "", err
		}
		return m, red.System, "", nil
	}
	at := commonAbout(pairs)
	c, err := m.bare()
	if err != nil {
		return nil, nil, "", err
	}
	red, err := c.reducedAbout(at)
	if err != nil {
		return nil, nil, "", err
	}
	return c, red.System, m.aboutWords(pair{about: at}), nil
}

// modesOf is how the transfer functions say that they are of the state of the modes.
func (m *Model) modesOf(about string) string {
	if !m.Nonlinear() && m.turns() {
		return aboutStart
	}
	return about
}

// commonAbout is the time that all transfer functions are about, nil where they differ
// or are about the start.
func commonAbout(pairs []pair) *float64 {
	if len(pairs) == 0 {
		return nil
	}
	at := pairs[0].about
	for _, p := range pairs {
		if (p.about == nil) != (at == nil) || at != nil && *p.about != *at {
			return nil
		}
	}
	return at
}

// transferOf returns the transfer function of a pair, of the network at the time it is
// about.
func (m *Model) transferOf(p pair) (*laplace.Transfer, error) {
	if m.Nonlinear() {
		k, err := m.moment(p.about)
		if err != nil {
			return nil, err
		}
		red, err := m.reducedAt(k)
		if err != nil {
			return nil, err
		}
		in := p.in.ID
		if p.drive != nil {
			in = k.lin.Input(p.drive.element, p.drive.place)
		}
		return red.System.Transfer(int(in), p.show.out)
	}
	red, err := m.reduction()
	if err != nil {
		return nil, err
	}
	if p.about != nil && m.turns() {
		par, err := m.par.At(*p.about)
		if err != nil {
			return nil, err
		}
		if red, err = m.Net.Reduce(par, m.outs); err != nil {
			return nil, err
		}
	}
	return red.System.Transfer(int(p.in.ID), p.show.out)
}

// aboutWords says what a transfer function is about, "" where there is no choice.
func (m *Model) aboutWords(p pair) string {
	switch {
	case p.about != nil:
		return m.Show.Time(*p.about)
	case m.turns() || m.Nonlinear():
		return aboutStart
	}
	return ""
}
