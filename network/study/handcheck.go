package study

import (
	"fmt"
	"math"
	"sort"
	"strings"

	"lagbook/network"
)

// handTerms is how many terms of a sum are written out.
const handTerms = 5

// Hand reckons what an engineer would on paper: the steady level of the thing
// most asked about from series resistances, or, where there are several ways to
// go, the balance of its flows; the sum of R·C; and everything taken as one mass;
// or, where a line swings against a vessel, how fast and how damped.
// Off says how far that is from what was computed.
//
// Statements used, all standard results from memory: along a tree the level is
// the sum of flow times resistance; the sum of all time constants of a network
// of resistances and capacitances is Σ C_i·R_ii with R_ii the resistance that
// node i sees (the trace of the inverse; for a ladder known as the delay sum of
// Elmore, 1948); leaving branches out can only make R_ii larger (Rayleigh's
// monotonicity law); and with everything at one level the ratio ΣC/ΣG is at most
// the slowest time constant (Rayleigh quotient).
func (m *Model) Hand() ([]HandLine, error) {
	subject, ok := m.subject()
	h := []HandLine{}
	if ok && m.Nonlinear() {
		return m.handPoint(subject), nil
	}
	if !ok || m.turns() { // what is done by hand knows one set of numbers
		return h, nil
	}
	if _, err := m.response(); err != nil {
		return nil, err
	}
	p := m.findPaths()
	fed := m.hasFeedback()
	exact := p.forest && m.oneAmbient(subject) && !math.IsInf(p.far[subject], 1) && !fed
	final, settles := m.finalOf(subject)
	switch {
	case exact && settles:
		h = append(h, m.handLevel(&p, subject, final))
	case settles:
		for _, id := range append([]network.NodeID{subject}, m.fedNodes()...) {
			if l, ok := m.handBalance(id); ok {
				h = append(h, l)
				break
			}
		}
	}
	if l := m.handSwing(subject); len(l) > 0 {
		return append(h, l...), nil
	}
	if m.inertial() { // the sums below are of resistances and capacitances
		return h, nil
	}
	if !fed && (p.forest || !m.hasStream()) {
		if l, ok := m.handSum(&p); ok {
			h = append(h, l)
		}
	}
	if l, ok := m.handMass(m.Net.Node(subject).Island); ok {
		h = append(h, l)
	}
	return h, nil
}

// fedNodes are the free nodes on which sources act.
func (m *Model) fedNodes() []network.NodeID {
	var ids []network.NodeID
	for _, in := range m.Net.Inputs() {
		if !in.Held && !m.Net.Node(in.Node).Held {
			ids = append(ids, in.Node)
		}
	}
	return ids
}

// subject is the node most asked about: that of the first limit, else the first
// shown in a table, else the first free node.
func (m *Model) subject() (network.NodeID, bool) {
	var names []string
	for _, l := range m.Case.Questions.Limits {
		for _, s := range l.Of {
			names = append(names, s.Node)
		}
	}
	for _, t := range m.Case.Questions.Tables {
		for _, s := range t.Show {
			names = append(names, s.Node)
		}
	}
	for _, n := range append(names, m.freeNames()...) {
		if id, ok := m.Case.Node(n); ok && n != "" && !m.Net.Node(id).Held {
			return id, true
		}
	}
	return 0, false
}

// finalOf is the level a node settles at.
func (m *Model) finalOf(id network.NodeID) (float64, bool) {
	w, err := m.wantNode(m.Net.Name(id))
	if err != nil {
		return 0, false
	}
	resp, err := m.response()
	if err != nil {
		return 0, false
	}
	return resp.Final(w.out)
}

// handLevel is the level from series resistances.
func (m *Model) handLevel(p *paths, subject network.NodeID, final float64) HandLine {
	heat := make([]float64, m.Net.NodeCount())
	for _, in := range m.Net.Inputs() {
		if v, ok := m.par.Wave[in.ID].Final(); ok && !in.Held {
			heat[in.Node] += in.Sign * v
		}
	}
	flow := p.flows(heat)
	i, level, units := subject, 0.0, m.at(subject)
	var terms []string
	var r float64
	for p.far[i] > 0 {
		e := p.next[i]
		level += flow[i] * e.r
		r += e.r
		if on := p.next[e.to]; p.far[e.to] == 0 || on.name != e.name || math.Abs(flow[e.to]-flow[i]) > 1e-12*math.Abs(flow[i]) {
			if flow[i] != 0 {
				terms = append(terms, fmt.Sprintf("%s·%s (%s)", m.Show.Value(flow[i], units.flow, ""), m.Show.Value(r, units.resistance, ""), e.name))
			}
			r = 0
		}
		i = e.to
	}
	held, _ := m.par.Wave[m.Net.Node(i).Input].Final()
	root := held - m.par.Datum[subject]
	level += root
	terms = append([]string{m.levelAt(i, held) + " (" + m.Net.Name(i) + ")"}, reversed(terms)...)
	if h := m.par.Datum[i] - m.par.Datum[subject]; h != 0 {
		terms = append(terms, m.Show.Value(h, units.level, kindDifference)+" (height)")
	}
	l := HandLine{
		What:    m.Net.Name(subject) + " for ever, by series resistances",
		Numbers: strings.Join(terms, " + "), Hand: level, Computed: &final, Unit: units.level,
	}
	l.off(level-root, final-root)
	l.Remark = "exact: there is one way out"
	return l
}

// oneAmbient reports whether all held nodes of a node's domain end at one level.
func (m *Model) oneAmbient(of network.NodeID) bool {
	domain := m.at(of).domain
	seen, first := false, 0.0
	for _, in := range m.Net.Inputs() {
		if !in.Held || m.at(in.Node).domain != domain {
			continue
		}
		v, ok := m.par.Wave[in.ID].Final()
		if !ok || seen && v != first {
			return false
		}
		seen, first = true, v
	}
	return seen
}

func reversed(s []string) []string {
	r := make([]string, len(s))
	for i, x := range s {
		r[len(s)-1-i] = x
	}
	return r
}

// handSum is the sum of R·C beside the sum of all time constants.
func (m *Model) handSum(p *paths) (HandLine, bool) {
	type term struct {
		c, r float64
		name string
		physics
	}
	var terms []term
	for id := range m.Net.NodeCount() {
		n := m.Net.Node(network.NodeID(id))
		if n.Held || n.Massless {
			continue
		}
		if math.IsInf(p.far[id], 1) {
			return HandLine{}, false
		}
		terms = append(terms, term{m.Net.CapacityOf(m.par, n.ID), p.drivingPoint(n.ID), n.Name, m.at(n.ID)})
	}
	if len(terms) == 0 {
		return HandLine{}, false
	}
	hand := 0.0
	for _, t := range terms {
		hand += t.c * t.r
	}
	sort.SliceStable(terms, func(i, j int) bool { return terms[i].c*terms[i].r > terms[j].c*terms[j].r })
	var words []string
	for i, t := range terms {
		if i == handTerms {
			words = append(words, fmt.Sprintf("%d smaller", len(terms)-i))
			break
		}
		words = append(words, fmt.Sprintf("%s·%s (%s)", m.Show.Value(t.c, t.capacity, ""), m.Show.Value(t.r, t.resistance, ""), t.name))
	}
	sum, slow, ok := m.timeConstants()
	if !ok {
		return HandLine{}, false
	}
	l := HandLine{What: "sum of all time constants, by Σ C·R", Numbers: strings.Join(words, " + "), Hand: hand, Computed: &sum, Unit: "s"}
	l.off(hand, sum)
	l.Remark = fmt.Sprintf("the slowest alone is %s, %s of it", m.Show.Time(slow), m.Show.Percent(slow/sum))
	if !p.forest {
		l.Remark = "at most that, since other ways out are left out; " + l.Remark
	}
	return l, true
}

// timeConstants sums −1/p over all poles; ok is false where one does not decay.
func (m *Model) timeConstants() (sum, slow float64, ok bool) {
	for _, p := range m.red.System.Poles() {
		re, im := real(p.P), imag(p.P)
		if re >= 0 {
			return 0, 0, false
		}
		tau := -re / (re*re + im*im)
		sum += tau * float64(p.Mult)
		slow = math.Max(slow, tau)
	}
	return sum, slow, sum > 0
}

// off notes how far the hand value is from the computed one.
func (l *HandLine) off(hand, computed float64) {
	if computed != 0 {
		x := (hand - computed) / math.Abs(computed)
		if math.Abs(x) < 1e-12 { // the rounding of two ways to one number
			x = 0
		}
		l.Off = &x
	}
}
