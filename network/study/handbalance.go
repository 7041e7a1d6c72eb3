package study

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network"
)

// handBalance adds up the flow into a node from its neighbours in the end, over
// each branch as typed, and from its sources: a check of the levels that does not
// use the solver's sums. ok is false where there is no end state.
func (m *Model) handBalance(id network.NodeID) (HandLine, bool) {
	inputs := m.Net.Inputs()
	u := make([]float64, len(inputs))
	for i, in := range inputs {
		v, ok := m.par.Wave[in.ID].Final()
		if !ok {
			return HandLine{}, false
		}
		u[i] = v
	}
	x, err := m.Net.SteadyState(m.par, u)
	if err != nil {
		return HandLine{}, false
	}
	b := balance{print: m.Show, units: m.at(id), here: m.levelAt(id, x[id])}
	for i, in := range inputs {
		if !in.Held && in.Node == id && u[i] != 0 {
			b.add(in.Sign*u[i], m.Show.Value(math.Abs(u[i]), b.units.flow, ""), in.Name)
		}
	}
	for _, br := range m.Net.Branches() {
		m.balanceBranch(&b, br, id, x)
	}
	if b.open || b.size < 1e-3*speck(b.units.flow) { // less is the rounding of levels
		return HandLine{}, false
	}
	zero := 0.0
	return HandLine{
		What:    fmt.Sprintf("%s into %s in the end, at %s", b.units.FlowWord, m.Net.Name(id), b.here),
		Numbers: strings.TrimPrefix(strings.Join(b.terms, " "), "+ "), Hand: b.sum, Computed: &zero, Unit: b.units.flow,
		Remark: "nothing, to " + m.Show.Percent(math.Abs(b.sum)/b.size) + " of the largest",
	}, true
}

// A balance collects the flows into one node.
type balance struct {
	print     Printer
	units     physics
	open      bool // a line without resistance, whose flow no level tells
	here      string
	terms     []string
	sum, size float64
}

func (b *balance) add(flow float64, words, name string) {
	sign := "+ "
	if flow < 0 {
		sign = "− "
	}
	b.terms = append(b.terms, sign+words+" ("+name+")")
	b.sum += flow
	b.size = math.Max(b.size, math.Abs(flow))
}

// balanceBranch adds what a branch brings to the node.
func (m *Model) balanceBranch(b *balance, br network.BranchView, id network.NodeID, x []float64) {
	name := m.partOf(br.Ref)
	quotient := func(from network.NodeID, r float64, words string) {
		gap := x[from] - x[id]
		b.add(gap*r, fmt.Sprintf("%s%s", m.Show.Value(math.Abs(gap), b.units.level, kindDifference), words), name)
	}
	switch br.Kind {
	case network.ResistanceBranch:
		m.balanceResistance(quotient, br, id, m.par.G[br.Index])
	case network.InertanceBranch:
		if r := m.par.LR[br.Index]; r > 0 {
			m.balanceResistance(quotient, br, id, 1/r)
		} else {
			b.open = b.open || br.From == id || br.To == id
		}
	case network.OneWayBranch:
		if w := m.par.W[br.Index]; br.To == id && w > 0 {
			quotient(br.From, w, "·"+m.Show.Value(w, b.units.conductance, ""))
		}
	case network.FeedbackBranch:
		if k := m.par.K[br.Index]; br.To == id && k != 0 {
			gap := x[br.From] - m.par.About[br.Index]
			b.add(k*gap, fmt.Sprintf("%s·%s", m.Show.Value(math.Abs(gap), b.units.level, kindDifference), m.Show.Value(math.Abs(k), b.units.conductance, "")), name)
		}
	}
}

// balanceResistance adds what a resistance brings, from whichever end.
func (m *Model) balanceResistance(add func(network.NodeID, float64, string), br network.BranchView, id network.NodeID, g float64) {
	words := "/(" + m.Show.Value(1/g, m.at(id).resistance, "") + ")"
	switch id {
	case br.From:
		add(br.To, g, words)
	case br.To:
		add(br.From, g, words)
	}
}
