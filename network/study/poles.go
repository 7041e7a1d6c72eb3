package study

import (
	"fmt"
	"math"
	"math/cmplx"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
)

const (
	smallNetwork = 12  // nodes up to which every node is an output nobody asked for
	mostPairs    = 200 // transfer functions found without being asked for
)

// A pair is an input and an output whose transfer function is wanted.
type pair struct {
	in   network.InputView
	show shown
	from string // the SI unit in which the input swings

	drive *drive   // of an element, in the place of an input of the network
	about *float64 // s; the network just after that time; nil: just before t = 0
}

// Poles answers for each [[transfer]] or, without any, for each input and each
// thing that tables and limits name.
func (m *Model) Poles() (*Poles, error) {
	if _, _, err := m.pairs(); err != nil { // which makes outputs of them
		return nil, err
	}
	if err := m.wantModes(); err != nil {
		return nil, err
	}
	pairs, found, warn, err := m.transfers()
	if err != nil {
		return nil, err
	}
	of, sys, about, err := m.modal(pairs)
	if err != nil {
		return nil, err
	}
	a := &Poles{Title: m.Case.Title, About: about, Transfers: []Transfer{}, Modes: of.modes(sys)}
	for i, p := range pairs {
		h := found[i]
		t := m.transfer(p, h)
		t.About = m.aboutWords(p)
		switch s, err := h.Step(); {
		case err != nil:
			warn = append(warn, Warning{"no-step-measures", p.in.Name + " to " + p.show.name + ": " + err.Error()})
		case s != nil:
			if s.Capped {
				s = &laplace.Measures{Final: s.Final} // how far a search came is no measure
				warn = append(warn, Warning{"search-stopped", p.in.Name + " to " + p.show.name + ": a search among the swings of the step was given up; rise, settling, overshoot and peak are left out"})
			}
			t.Step = step(s)
		}
		a.Transfers = append(a.Transfers, t)
		for _, w := range h.Warnings {
			warn = append(warn, Warning{w.Code, p.in.Name + " to " + p.show.name + ": " + w.Text})
		}
	}
	shares(a, m.modesOf(about))
	a.Range = m.rangeAboutStart(pairs)
	warn = append(warn, m.switching(pairs)...)
	warn = append(warn, m.aboutWarnings(pairs)...)
	warn = append(warn, m.growing(sys)...)
	a.Evidence = m.evidence(warn)
	return a, nil
}

// pairs lists the transfer functions wanted.
func (m *Model) pairs() ([]pair, []Warning, error) {
	q := &m.Case.Questions
	var list []pair
	if len(q.Transfers) > 0 {
		byName := map[string]network.InputView{}
		for _, in := range m.Net.Inputs() {
			byName[in.Name] = in
		}
		for _, t := range q.Transfers {
			w, err := m.want(t.To, "")
			if err != nil {
				return nil, nil, err
			}
			p := pair{show: w}
			var ok bool
			if p.in, ok = byName[t.From]; ok {
				p.from = m.swingUnit(p.in)
			} else if p.drive, ok = m.driveOf(t.From); ok {
				p.in.Name, p.from = t.From, p.drive.unit
			} else {
				return nil, nil, fmt.Errorf("transfer from %q: not a source, a held node or what drives a part", t.From)
			}
			if t.HasAbout {
				p.about = &m.val.Num[t.About]
			}
			list = append(list, p)
		}
		return list, nil, nil
	}
	outs, err := m.unasked()
	if err != nil {
		return nil, nil, err
	}
	for _, in := range m.Net.Inputs() {
		for _, w := range outs {
			if len(list) == mostPairs {
				return list, []Warning{{"transfers-left-out", fmt.Sprintf("only the first %d transfer functions are shown: name those wanted in [[transfer]]", mostPairs)}}, nil
			}
			if !w.derived() && !(in.Held && w.name == in.Name) && m.at(in.Node).domain == w.domain {
				list = append(list, pair{in: in, show: w, from: m.swingUnit(in)})
			}
		}
	}
	return list, nil, nil
}

// unasked are the outputs nobody put in a [[transfer]]: what tables and limits
// name, else every free node of a small network, else where the sources act.
func (m *Model) unasked() ([]shown, error) {
	var list []shown
	seen := map[string]bool{}
	add := func(s casefile.Shown) error {
		if seen[s.Text] || s.Node != "" && s.Minus == "" && m.held(s.Node) {
			return nil
		}
		seen[s.Text] = true
		w, err := m.want(s, "")
		if err == nil {
			list = append(list, w)
		}
		return err
	}
	for _, s := range m.asked() {
		if err := add(s); err != nil {
			return nil, err
		}
	}
	if len(list) > 0 {
		return list, nil
	}
	names := m.freeNames()
	if len(names) > smallNetwork {
		names = nil
		for _, in := range m.Net.Inputs() {
			if !in.Held {
				names = append(names, m.Net.Name(in.Node))
			}
		}
	}
	for _, n := range names {
		if err := add(casefile.Shown{Text: n, Node: n}); err != nil {
			return nil, err
		}
	}
	return list, nil
}

// asked lists what tables and limits name, in file order.
func (m *Model) asked() []casefile.Shown {
	var all []casefile.Shown
	for _, t := range m.Case.Questions.Tables {
		all = append(all, t.Show...)
	}
	for _, l := range m.Case.Questions.Limits {
		all = append(all, l.Of...)
	}
	return all
}

// held reports whether a node of that name is held.
func (m *Model) held(name string) bool {
	id, ok := m.Case.Node(name)
	return ok && m.Net.Node(id).Held
}

// freeNames are the nodes that the case names and that are not held, in order.
func (m *Model) freeNames() []string {
	var names []string
	for id := range m.Net.NodeCount() {
		n := m.Net.Node(network.NodeID(id))
		if own, ok := m.Case.Node(n.Name); ok && own == n.ID && !n.Held {
			names = append(names, n.Name)
		}
	}
	return names
}

// transfer copies a transfer function into its answer.
func (m *Model) transfer(p pair, h *laplace.Transfer) Transfer {
	t := Transfer{
		Input: p.in.Name, Output: p.show.name, Unit: gainUnit(p),
		Form: h.Form, RelativeDegree: h.RelativeDegree, Behaviour: h.Behaviour,
		Poles: []Pole{}, Zeros: zeros(h.Zeros), Cancelled: zeros(h.Cancelled), Residues: [][][2]float64{},
		Numerator: h.Numerator, Denominator: h.Denominator,
	}
	if h.HasGain {
		t.Gain = &h.Gain
	}
	if h.RelativeDegree < 0 {
		t.Polynomial = h.Polynomial()
	}
	for i, p := range h.Poles {
		q := pole(p)
		if i < len(h.Weights) {
			q.Share = &h.Weights[i]
		}
		t.Poles = append(t.Poles, q)
	}
	for _, r := range h.Residues {
		row := make([][2]float64, len(r))
		for k, c := range r {
			row[k] = [2]float64{real(c), imag(c)}
		}
		t.Residues = append(t.Residues, row)
	}
	return t
}

// gainUnit is the unit of output over input.
func gainUnit(p pair) string { return unitOf(over(dimOf(p.show.unit), dimOf(p.from))) }

func zeros(list []laplace.Pole) []Zero {
	z := []Zero{}
	for _, p := range list {
		z = append(z, Zero{real(p.P), imag(p.P), p.Mult})
	}
	return z
}

// pole copies a pole and derives what is read from it.
func pole(p laplace.Pole) Pole {
	re, im := real(p.P), imag(p.P)
	q := Pole{Re: re, Im: im, Multiplicity: p.Mult, ErrorBound: finite(p.Radius)}
	switch {
	case im != 0:
		w := cmplx.Abs(p.P)
		zeta := 0.0
		if math.Abs(re) > p.Radius { // else it is on the axis, as far as anyone can tell
			zeta = -re / w
		}
		q.NaturalFrequency, q.DampingRatio = &w, &zeta
	case re != 0:
		tau := -1 / re
		q.TimeConstant = &tau
	}
	return q
}

// finite returns a pointer to v, nil where v is not a number to print.
func finite(v float64) *float64 {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return nil
	}
	return &v
}

func step(s *laplace.Measures) *Step {
	t := &Step{
		Final: s.Final, RiseTime: s.RiseTime, Settling2: s.Settling2, Settling5: s.Settling5,
		Overshoot: s.Overshoot, Undershoot: s.Undershoot, Peak: s.Peak, PeakTime: s.PeakTime, TouchesBand: s.Touch,
	}
	if *t == (Step{}) {
		return nil
	}
	return t
}
