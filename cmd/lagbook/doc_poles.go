package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// longList is the number of poles from which on only the slowest are printed;
// CSV and JSON carry all.
const longList = 24

// polesDoc is the page of the verb poles.
func polesDoc(m *study.Model, a *study.Poles) present.Doc {
	p, d := m.Show, newDoc(m.Case)
	d.Parts = append(scenarioOpening(m.Case, scenariosOf(a.Transfers, func(t study.Transfer) string { return t.Scenario })), doubts(a.Evidence)...)
	if len(a.Each) == 0 {
		d.Parts = append(d.Parts, networkPoles(p, a, m.Nonlinear())...)
	}
	for _, x := range a.Each {
		d.Parts = append(d.Parts, underHeading(m.Case, polesScenario(x)))
		d.Parts = append(d.Parts, networkPoles(p, x, m.Nonlinear())...)
	}
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// networkPoles are the time constants and transfer functions of one network.
func networkPoles(p study.Printer, a *study.Poles, nonlinear bool) (parts []present.Part) {
	if len(a.Modes) > 0 {
		parts = append(parts, modesAbout(p, a.About, a.Modes, nil))
	}
	parts = append(parts, rangeParts(a.Range)...)
	for _, t := range a.Transfers {
		parts = append(parts, transferParts(p, t, nonlinear)...)
	}
	return parts
}

// polesScenario is the scenario that an answer holds under.
func polesScenario(a *study.Poles) string {
	switch {
	case len(a.Transfers) > 0:
		return a.Transfers[0].Scenario
	case len(a.Modes) > 0:
		return a.Modes[0].Scenario
	}
	return ""
}

// modesAbout is modesPart, saying of a nonlinear case which state the modes belong to.
func modesAbout(p study.Printer, about string, modes []study.Mode, of []study.Transfer) present.Table {
	t := modesPart(p, modes, of)
	if about != "" {
		t.Caption += ", of the linear network about " + aboutState(about)
	}
	return t
}

// modesPart lists the modes of the network: how slow, and what moves together.
func modesPart(p study.Printer, modes []study.Mode, of []study.Transfer) present.Table {
	t := present.Table{
		Caption:  "Time constants, slowest first",
		Columns:  []present.Column{{Head: "time constant", Align: present.Right}, {Head: "pole / (1/s)", Align: present.Right}},
		FullHead: []string{"re / (1/s)", "im / (1/s)", "multiplicity", "moves together"},
	}
	for _, tr := range of {
		t.Columns = append(t.Columns, present.Column{Head: "share of " + tr.Input + " → " + tr.Output, Align: present.Right})
		t.FullHead = append(t.FullHead, "share of "+tr.Input+" to "+tr.Output)
	}
	t.Columns = append(t.Columns, present.Column{Head: "moves together"})
	for i, m := range modes {
		moves := movesWords(p, m.Moves)
		exact := []string{full(m.Re), full(m.Im), fmt.Sprint(m.Multiplicity), moves}
		cells := []string{slowness(p, m.Pole), pairWords(p, m.Pole)}
		for _, tr := range of {
			share, x := "–", ""
			for _, s := range m.Shares {
				if s.Input == tr.Input && s.Output == tr.Output {
					share, x = sharePercent(p, ofBoth(m.Pole)*s.Share), full(s.Share)
				}
			}
			cells, exact = append(cells, share), append(exact, x)
		}
		t.Full = append(t.Full, exact)
		if i < longList && m.Im >= 0 { // a pair is one row
			t.Rows = append(t.Rows, append(cells, moves))
		}
	}
	if !slices.ContainsFunc(modes, func(m study.Mode) bool { return len(m.Moves) > 0 }) {
		dropLast(&t) // too many nodes to say what moves together
	}
	if n := len(modes) - longList; n > 0 {
		t.Caption += fmt.Sprintf(" (%d faster ones are in csv and json)", n)
	}
	return t
}

// sharePercent prints a share; what does not show in three digits is said so.
func sharePercent(p study.Printer, s float64) string {
	if s > -0.0005 && s < 0.0005 {
		return "< 0.1 %"
	}
	return p.Percent(s)
}

// slowness is the time constant of a real pole, or period and damping of a pair.
func slowness(p study.Printer, q study.Pole) string {
	switch {
	case q.TimeConstant != nil && *q.TimeConstant < 0:
		return "grows, e-fold in " + p.Time(-*q.TimeConstant)
	case q.TimeConstant != nil:
		return p.Time(*q.TimeConstant)
	case q.NaturalFrequency != nil:
		return "swing of " + p.Time(2*math.Pi/math.Abs(q.Im)) + ", ω0 " + p.Number(*q.NaturalFrequency) + " rad/s, " + dampingWords(p, *q.DampingRatio)
	}
	return "never (integrates)"
}

// dampingWords writes a damping ratio.
func dampingWords(p study.Printer, zeta float64) string {
	if zeta == 0 {
		return "undamped"
	}
	return "ζ " + p.Number(zeta)
}

// shownRe is the real part of a pole as it is read: 0 of one that is undamped.
func shownRe(q study.Pole) float64 {
	if q.DampingRatio != nil && *q.DampingRatio == 0 {
		return 0
	}
	return q.Re
}

// rounding is the share of a complex number below which a part of it is not shown.
const rounding = 1e-14

// pairWords writes a pole, or both of a pair.
func pairWords(p study.Printer, q study.Pole) string {
	s := poleWords(p, shownRe(q), q.Im, q.Multiplicity)
	if q.Im > 0 {
		s = strings.Replace(s, " + ", " ± ", 1)
	}
	return s
}

// ofBoth is 2 for one of a pair, whose shares are equal.
func ofBoth(q study.Pole) float64 {
	if q.Im != 0 {
		return 2
	}
	return 1
}

func poleWords(p study.Printer, re, im float64, multiplicity int) string {
	if math.Abs(re) < rounding*math.Abs(im) {
		re = 0
	}
	s := p.Number(re)
	switch {
	case math.Abs(im) < rounding*math.Abs(re):
	case im > 0:
		s += " + " + p.Number(im) + "i"
	case im < 0:
		s += " − " + p.Number(-im) + "i"
	}
	if multiplicity > 1 {
		s += fmt.Sprintf(" (%d-fold)", multiplicity)
	}
	return s
}

// together is how near to the largest a node moves to be named without a number.
const together = 0.95

// movesWords says which nodes move together, what moves less or against them,
// and which parts move inside.
func movesWords(p study.Printer, moves []study.Move) string {
	var same, rest, inside []string
	for _, m := range moves {
		switch {
		case m.Inside != "":
			if !slices.Contains(inside, m.Inside) {
				inside = append(inside, m.Inside)
			}
		case m.Size >= together:
			same = append(same, m.Node)
		case m.Size > 0:
			rest = append(rest, m.Node+" "+p.Rough(100*m.Size)+" %")
		default:
			rest = append(rest, m.Node+" "+p.Rough(-100*m.Size)+" % against")
		}
	}
	var words []string
	for _, group := range [][]string{same, rest} {
		if len(group) > 0 {
			words = append(words, list(group))
		}
	}
	if len(inside) > 0 {
		words = append(words, "inside "+list(inside))
	}
	return strings.Join(words, "; ")
}

// transferParts shows one transfer function.
func transferParts(p study.Printer, t study.Transfer, nonlinear bool) []present.Part {
	parts := []present.Part{
		present.Heading{Level: 1, Text: t.Input + " → " + t.Output + aboutWords(t.About, nonlinear)},
		present.Facts{List: transferFacts(p, t)},
	}
	if len(t.Poles) > 0 {
		parts = append(parts, transferPoles(p, t))
	}
	return parts
}

// shortRatio is the order up to which H(s) is written out.
const shortRatio = 4

// transferFacts are what is said of a transfer function beside its poles.
func transferFacts(p study.Printer, t study.Transfer) []present.Fact {
	facts := []present.Fact{}
	add := func(name, value string) { facts = append(facts, present.Fact{Name: name, Value: value}) }
	if t.Gain != nil {
		add("Gain", p.Value(*t.Gain, t.Unit, "difference"))
	}
	if t.Gain != nil && *t.Gain == 0 && len(t.Poles) == 0 {
		add("Behaviour", "identically zero: the input does not act on the output")
		return facts
	}
	behaviour := t.Behaviour
	if behaviour == "" {
		behaviour = "follows at once"
	}
	add("Behaviour", fmt.Sprintf("%s, %s, relative degree %d", behaviour, t.Form, t.RelativeDegree))
	if len(t.Polynomial) > 0 {
		add("For large s", "tends to "+polynomial(p, t.Polynomial)+": a step at the input makes an impulse")
	}
	if len(t.Zeros) > 0 {
		add("Zeros / (1/s)", zeroWords(p, t.Zeros))
	}
	if len(t.Cancelled) > 0 {
		add("Cancelled / (1/s)", zeroWords(p, t.Cancelled))
	}
	if words := stepWords(p, t); words != "" {
		add("Unit step", words)
	}
	if n := len(t.Denominator) - 1; n > 0 && n <= shortRatio {
		add("H(s)", "("+polynomial(p, t.Numerator)+") / ("+polynomial(p, t.Denominator)+")")
	}
	return facts
}

// transferPoles lists the poles of a transfer function.
func transferPoles(p study.Printer, t study.Transfer) present.Table {
	tab := present.Table{
		Columns: []present.Column{{Head: "pole / (1/s)", Align: present.Right}, {Head: "time constant", Align: present.Right},
			{Head: "residue", Align: present.Right}, {Head: "share", Align: present.Right}},
		FullHead: []string{"input", "output", "re / (1/s)", "im / (1/s)", "multiplicity", "time constant / s", "error bound / (1/s)", "share", "residue re", "residue im"},
	}
	for i, q := range t.Poles {
		share, res, rr, ri := "–", "–", "", ""
		if q.Share != nil {
			share = sharePercent(p, *q.Share)
		}
		if i < len(t.Residues) && len(t.Residues[i]) > 0 {
			r := t.Residues[i][0]
			res, rr, ri = poleWords(p, r[0], r[1], 1), full(r[0]), full(r[1])
		}
		if i < longList {
			tab.Rows = append(tab.Rows, []string{poleWords(p, shownRe(q), q.Im, q.Multiplicity), slowness(p, q), res, share})
		}
		tab.Full = append(tab.Full, []string{t.Input, t.Output, full(q.Re), full(q.Im), fmt.Sprint(q.Multiplicity), fullOf(q.TimeConstant), fullOf(q.ErrorBound), fullOf(q.Share), rr, ri})
	}
	if !slices.ContainsFunc(t.Poles, func(q study.Pole) bool { return q.Share != nil }) {
		dropLast(&tab)
	}
	return tab
}

func zeroWords(p study.Printer, zeros []study.Zero) string {
	var words []string
	for i, z := range zeros {
		if i == longList {
			words = append(words, fmt.Sprintf("%d more", len(zeros)-i))
			break
		}
		words = append(words, poleWords(p, z.Re, z.Im, z.Multiplicity))
	}
	return strings.Join(words, ", ")
}

// stepWords are the measures of the response to a unit step.
func stepWords(p study.Printer, t study.Transfer) string {
	s := t.Step
	if s == nil || len(t.Poles) == 0 {
		return ""
	}
	var words []string
	for _, m := range []struct {
		name string
		v    *float64
	}{{"rise 10–90 % in ", s.RiseTime}, {"within 5 % after ", s.Settling5}, {"within 2 % after ", s.Settling2}} {
		if m.v != nil {
			words = append(words, m.name+p.Time(*m.v))
		}
	}
	if s.Overshoot != nil && *s.Overshoot == 0 {
		words = append(words, "no overshoot")
	} else if s.Overshoot != nil {
		words = append(words, "overshoot "+p.Percent(*s.Overshoot/100))
	}
	if peak := peakWords(p, t.Unit, s); peak != "" {
		words = append(words, peak)
	}
	return strings.Join(words, ", ")
}

// peakWords say how far a step response goes over, and the other way.
func peakWords(p study.Printer, unit string, s *study.Step) string {
	var words []string
	if s.Overshoot != nil && *s.Overshoot > 0 && s.PeakTime != nil && s.Peak != nil {
		words = append(words, "peak "+p.Value(*s.Peak, unit, "difference")+" at "+p.Time(*s.PeakTime))
	}
	if s.Undershoot != nil && *s.Undershoot > 0 {
		words = append(words, "goes the other way first by "+p.Percent(*s.Undershoot/100))
	}
	return strings.Join(words, ", ")
}

// aboutState names the state that a linear network is about.
func aboutState(about string) string {
	if about == "start" {
		return "the start"
	}
	return "the state at " + about
}

// aboutWords says of a network that switches when it is as described, and of one that
// is not linear about which state it is taken so.
func aboutWords(about string, nonlinear bool) string {
	switch {
	case about == "":
		return ""
	case nonlinear:
		return " (about " + aboutState(about) + ")"
	case about == "start":
		return " (just before t = 0)"
	}
	return " (from " + about + " on)"
}
