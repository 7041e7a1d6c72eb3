package study

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
)

// aboutStart is what a transfer function of a network that switches is about where
// the case does not say otherwise: the network just before t = 0.
const aboutStart = "start"

// turn sets the switches of the network to their values just before t = 0, and tells
// it how the numbers come about for others: by the same setters.
func (m *Model) turn(v casefile.Values) error {
	par := m.par
	if len(par.Switch) == 0 {
		return nil
	}
	for i, w := range par.Switch {
		par.Now[i] = w.Before
	}
	set := func(p *network.Params) error {
		for _, s := range m.set {
			if err := s(v, p); err != nil {
				return err
			}
		}
		return nil
	}
	par.Turn = func(now []float64) (*network.Params, error) {
		p := par.Clone()
		copy(p.Now, now)
		err := set(p)
		copy(p.Start, par.Start)
		copy(p.HasStart, par.HasStart)
		copy(p.StartFlow, par.StartFlow)
		copy(p.HasStartFlow, par.HasStartFlow)
		return p, err
	}
	return set(par)
}

// turns reports whether the network switches while it runs.
func (m *Model) turns() bool { return m.par.Turns() }

// switching warns that what is shown of poles is that of one phase.
func (m *Model) switching(pairs []pair) []Warning {
	if !m.turns() || m.Nonlinear() {
		return nil
	}
	var names []string
	for _, s := range m.Net.Switches() {
		if !m.par.Switch[s.ID].Constant() {
			names = append(names, s.Name)
		}
	}
	for _, p := range pairs {
		if p.about == nil {
			return []Warning{{"switches", fmt.Sprintf("the network switches with %s: what stands here of poles is the network just before t = 0; "+
				"about = \"2 s\" in a [[transfer]] gives the one just after that moment", join(names))}}
		}
	}
	return nil
}

// switchValue puts a value of a switch in words: a share of the conductance, or the
// drive of a source.
func (m *Model) switchValue(s network.SwitchView, v float64) string {
	if m.scales(s) {
		return m.Show.Percent(v)
	}
	return m.Show.Value(v, "W", "")
}

// scales reports whether a switch is the scale of a part, not the drive of a source,
// which stands among the inputs.
func (m *Model) scales(s network.SwitchView) bool {
	e := m.parts[s.Ref]
	return e != nil && e.Has("scale")
}

// checkSwitches lists the scales among what drives the network.
func (m *Model) checkSwitches() []CheckInput {
	var list []CheckInput
	for _, s := range m.Net.Switches() {
		if m.scales(s) {
			value := func(v float64) string { return m.switchValue(s, v) }
			list = append(list, CheckInput{Name: s.Name, What: m.scaledWord(s) + s.Name + ", as a share of what is stated",
				Wave: waveWords(m.par.Switch[s.ID], value, m.Show.Time)})
		}
	}
	return list
}

// scaledWord says what of a part its scale multiplies.
func (m *Model) scaledWord(s network.SwitchView) string {
	if m.parts[s.Ref].Table.Name == "stream" {
		return "capacity rate of "
	}
	return "conductance of "
}

// grows says in words which poles grow, in any state that the network is switched to
// in the run.
func (m *Model) grows() []Warning {
	switch {
	case m.marches():
		return nil // what grows is seen in the numbers; poles and check name it
	case m.Nonlinear():
		red, err := m.reducedAbout(nil)
		if err != nil {
			return nil // whoever asked for the response has heard of it
		}
		return m.growing(red.System)
	case !m.turns():
		return m.growing(m.red.System)
	}
	var warn []Warning
	for _, sys := range m.closed.Systems() {
		for _, w := range m.growing(sys) {
			w.Text += ", while the network is switched to one of its states"
			warn = append(warn, w)
		}
	}
	return warn
}

// switched lists the changes of scales in [t0, t1], at most so many.
func (m *Model) switched(t0, t1 float64, most int) (list []change, cut bool) {
	for _, s := range m.Net.Switches() {
		if !m.scales(s) {
			continue
		}
		w := m.par.Switch[s.ID]
		times, err := w.JumpTimes(t0, t1, most)
		cut = cut || err != nil
		for _, t := range times {
			list = append(list, change{at: t, name: s.Name, text: s.Name + " " + m.switchValue(s, w.At(t))})
		}
	}
	return list, cut
}
