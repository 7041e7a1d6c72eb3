package study

import (
	"fmt"
	"strings"

	"lagbook/network"
	"lagbook/network/casefile"
)

// evidence closes an answer: doubts, the start state in words, the caution.
func (m *Model) evidence(warn []Warning) Evidence {
	all := []Warning{}
	seen := map[Warning]bool{}
	for _, list := range [][]Warning{warn, m.remarked(), m.marchWarnings(), m.linearWarnings(), m.startWarnings(), m.surges(), m.dubious(), m.vacuum()} {
		for _, w := range list {
			if !seen[w] {
				seen[w] = true
				all = append(all, w)
			}
		}
	}
	return Evidence{Warnings: all, Start: m.startWords(), Linear: m.linear(), Marched: m.marchedEvidence(), Caution: Caution}
}

// linear is what an answer rests on: what does not change or, of a case that is not
// linear, which parts do and how it was computed.
func (m *Model) linear() string {
	if m.Nonlinear() {
		return m.nonlinear()
	}
	what, over := "resistances, capacitances and gains", []string{"temperature"}
	if d := m.Case.Domains(); len(d) == 1 && m.physicsOf(d[0]).level == "Pa" {
		what, over = "resistances, compliances and inertances", []string{"flow", "pressure"}
	} else if len(d) > 1 {
		what, over = "resistances, capacities and gains", []string{"temperature", "pressure", "flow"}
	}
	if m.turns() {
		return "linear between its steps: " + what + " change in the steps stated, and not with " + either(over) + "; valid as far as those numbers are"
	}
	return "linear: " + what + " do not change with " + either(append(over, "time")) + "; valid as far as those numbers are"
}

// either lists alternatives: "flow, pressure or time".
func either(words []string) string {
	last := len(words) - 1
	if last == 0 {
		return words[0]
	}
	return strings.Join(words[:last], ", ") + " or " + words[last]
}

// startWords says how the initial state is found.
func (m *Model) startWords() string {
	own := m.ownStarts()
	if _, err := m.startLevels(); err != nil {
		return "none: " + strings.TrimPrefix(err.Error(), "network: ")
	}
	switch {
	case m.par.StartCycle:
		return "the periodic state under the loads that repeat, every other at its value just before t = 0"
	case m.Case.Questions.Start == casefile.StartAtRest:
		return "at rest: nothing flows, every store at the level that holds it" + m.ownWords()
	case m.par.HasAllStart && len(own) == 0:
		return m.allStart() + " everywhere"
	case m.par.HasAllStart:
		return m.allStart() + " everywhere but at " + join(own) + ", as stated there"
	case len(own) == 0:
		return "steady state of the values just before t = 0"
	case len(own) < m.storeCount():
		return "as stated at " + join(own) + "; the rest at the steady state of the values just before t = 0"
	}
	return "as stated at each node"
}

// ownStarts lists the nodes with a start of their own.
func (m *Model) ownStarts() []string {
	var names []string
	for id, has := range m.par.HasStart {
		if has {
			n := fmt.Sprintf("%s (%s)", m.Net.Name(network.NodeID(id)), m.levelAt(network.NodeID(id), m.par.Start[id]))
			names = append(names, n)
		}
	}
	if len(names) > wavePieces {
		names = append(names[:wavePieces], fmt.Sprintf("%d more", len(names)-wavePieces))
	}
	return names
}

// allStart prints the level at which everything starts.
func (m *Model) allStart() string {
	return m.Show.Value(m.par.AllStart, m.physicsOf(m.Case.Questions.StartDomain).level, kindLevel)
}

// ownWords names the stores that do not start at rest because they state a start.
func (m *Model) ownWords() string {
	var names []string
	for id, own := range m.ownStart {
		if own {
			names = append(names, m.Net.Name(network.NodeID(id)))
		}
	}
	if names == nil {
		return ""
	}
	return ", but at " + join(firstNames(names)) + " as stated there"
}

// steadyStart reports whether no start is stated: the start is then the steady state.
func (m *Model) steadyStart() bool {
	return !m.par.HasAllStart && !m.par.StartCycle && len(m.ownStarts()) == 0
}

// startWarnings looks for a load that the start state already contains.
func (m *Model) startWarnings() []Warning {
	if m.par.StartCycle && !m.repeats() {
		return []Warning{{"nothing-repeats", "start = \"cycle\", but nothing repeats for ever: the case starts at the steady state"}}
	}
	if !m.steadyStart() {
		return nil
	}
	var warn []Warning
	for _, in := range m.Net.Inputs() {
		e := m.parts[in.Ref]
		if in.Held || e == nil || !e.Has("drive") {
			continue
		}
		w, info := m.par.Wave[in.ID], m.Case.WaveInfo(e.Wave("drive"))
		if !info.Constant && !info.HasBefore && typedFromZero[info.Form] && w.At(0) != 0 && w.Before == w.At(0) {
			v := m.inputValue(in, w.At(0))
			warn = append(warn, Warning{"start-under-load", fmt.Sprintf(
				"%s is %s from 0 s and says nothing about before: the case starts at the steady state of %s; give it before = … if the load begins at t = 0", in.Name, v, v)})
		}
	}
	if m.Nonlinear() {
		return warn
	}
	if s, err := m.startState(); err == nil && len(s.Unattained) > 0 {
		warn = append(warn, Warning{"unstable-start", "the start is a steady state that the network would not come to by itself: the least excess grows away from it"})
	}
	return warn
}

// typedFromZero are the waveforms that hold their first value before t = 0.
var typedFromZero = map[string]bool{"points": true, "stairs": true, "file": true, "decay": true}

// dubious names outputs whose rounding error, or of a march the error with which they are
// read between its steps, shows in the digits printed.
func (m *Model) dubious() []Warning {
	if m.resp == nil {
		return nil
	}
	var warn []Warning
	for _, w := range m.shows {
		slack := m.resp.Rounding(w.out)
		if slack < speck(w.unit) {
			continue
		}
		span := m.resp.Max(w.out, 0, m.reach()).Y - m.resp.Min(w.out, 0, m.reach()).Y
		if slack > doubtShare*span {
			size := m.Show.Value(slack, w.unit, kindDifference)
			if m.marches() {
				warn = append(warn, Warning{"between-steps", fmt.Sprintf("%s: between the steps of the march it is read to within %s, which shows in the digits printed", w.name, size)})
				continue
			}
			warn = append(warn, Warning{"rounding", fmt.Sprintf("%s: rounding may reach %s, which shows in the digits printed", w.name, size)})
		}
	}
	return warn
}

// Rounding errors below a speck or below doubtShare of what an output moves over
// the run do not show in four digits.
const doubtShare = 1e-4
