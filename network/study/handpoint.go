package study

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network"
)

// handPoint is the check by hand of a case that is not linear, about its operating
// point: the steady state with every load as it is at the time that the transfer
// functions are about, else at the end of the run. It adds up what flows into the node
// most asked about there, part by part, and takes everything as one mass with the slopes
// that the laws have there. Where there is no such state nothing is reckoned.
func (m *Model) handPoint(subject network.NodeID) []HandLine {
	h := []HandLine{}
	if _, err := m.response(); err != nil {
		return h
	}
	at := m.reach()
	if pairs, _, err := m.pairs(); err == nil && commonAbout(pairs) != nil {
		at = *commonAbout(pairs)
	}
	point, err := m.Net.Operate(m.par, at, m.lastState())
	if err != nil {
		return h
	}
	lin, err := m.Net.Linearise(m.par, point)
	if err != nil {
		return h
	}
	s := &snapshot{m: m, at: at, levels: point.Levels, flows: point.Flows, lin: lin}
	units := m.at(subject)
	one := func(id network.NodeID) bool { return id == subject }
	if l, ok := s.handFlows(m.Net.Name(subject)+" at "+m.levelAt(subject, point.Levels[subject]), units, one); ok {
		h = append(h, l)
	}
	all := func(id network.NodeID) bool { return !m.Net.Node(id).Held && m.at(id).domain == units.domain }
	if l, ok := s.handFlows("everything not held", units, all); ok {
		h = append(h, l)
	}
	if l, ok := m.handSlopes(lin, subject); ok {
		h = append(h, l)
	}
	return h
}

// lastState is where the search for an operating point begins.
func (m *Model) lastState() *network.State {
	if m.march.run != nil {
		return m.march.run.End()
	}
	return m.march.begun
}

// handFlows adds up what flows into a node, or into all nodes of its domain together, at
// an operating point.
func (s *snapshot) handFlows(what string, units physics, inside func(network.NodeID) bool) (HandLine, bool) {
	b := balance{print: s.m.Show, units: units}
	for _, r := range s.running(units.domain) {
		in, out := r.in != nowhere && inside(r.in), r.out != nowhere && inside(r.out)
		switch {
		case r.flow < 1e-3*speck(units.flow) || in == out:
		case in:
			b.add(r.flow, s.m.Show.Value(r.flow, units.flow, ""), r.part)
		default:
			b.add(-r.flow, s.m.Show.Value(r.flow, units.flow, ""), r.part)
		}
	}
	if len(b.terms) == 0 {
		return HandLine{}, false
	}
	zero, rest := 0.0, "less than 0.001 %"
	if share := math.Abs(b.sum) / b.size; share > 1e-5 {
		rest = s.m.Show.Percent(share)
	}
	return HandLine{
		What:    fmt.Sprintf("%s into %s for ever with every load as at %s", units.FlowWord, what, s.m.Show.Time(s.at)),
		Numbers: strings.TrimPrefix(strings.Join(b.terms, " "), "+ "), Hand: b.sum, Computed: &zero, Unit: units.flow,
		Remark: "nothing, to " + rest + " of the largest",
	}, true
}

// handSlopes is the slowest time constant of everything as one mass, by the slopes at
// an operating point, beside that of the linear network there.
func (m *Model) handSlopes(lin *network.Linear, subject network.NodeID) (HandLine, bool) {
	for _, e := range m.elements() {
		if len(e.Unknowns) > 0 || len(e.Drives) > 0 {
			return HandLine{}, false // more than levels moves
		}
	}
	if m.inertial() {
		return HandLine{}, false
	}
	red, err := lin.Net.Reduce(lin.Params, nil)
	if err != nil {
		return HandLine{}, false
	}
	c := m.copied()
	c.Net, c.par, c.red = lin.Net, lin.Params, red
	l, ok := c.handMass(lin.Net.Node(subject).Island)
	if ok {
		l.What += ", by the slopes there"
	}
	return l, ok
}
