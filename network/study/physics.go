package study

import (
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A physics holds the SI units and the words of one domain.
type physics struct {
	casefile.Measures
	domain      string
	level, flow string // K and W, Pa and m³/s
	resistance  string // K/W
	conductance string // W/K
	capacity    string // J/K
	inertance   string // Pa·s²/m³
}

// physicsOf returns the units and words of a domain.
func (m *Model) physicsOf(domain string) physics {
	w := m.Case.Measures(domain)
	second := quantity.Dim{0, 0, 1, 0, 0}
	r, g := over(w.Level, w.Flow), over(w.Flow, w.Level)
	return physics{
		Measures: w, domain: domain, level: unitOf(w.Level), flow: unitOf(w.Flow), resistance: unitOf(r), conductance: unitOf(g),
		capacity: unitOf(over(g, over(quantity.Dim{}, second))), inertance: unitOf(over(r, over(quantity.Dim{}, second))),
	}
}

// over is the dimension of a quotient.
func over(a, b quantity.Dim) quantity.Dim {
	for i := range a {
		a[i] -= b[i]
	}
	return a
}

// at returns the units and words of the domain a node belongs to.
func (m *Model) at(id network.NodeID) physics { return m.physicsOf(m.domainOf(m.Net.Node(id).Ref)) }

// domainOf is the domain of the part that a reference stands for.
func (m *Model) domainOf(r network.Ref) string {
	if e := m.parts[r]; e != nil {
		return e.Domain()
	}
	return ""
}

// levelAt prints a level of the network at a node, less what its height makes of it.
func (m *Model) levelAt(id network.NodeID, v float64) string {
	return m.Show.Value(v-m.par.Datum[id], m.at(id).level, kindLevel)
}

// swingUnit is the SI unit in which an input swings.
func (m *Model) swingUnit(in network.InputView) string {
	if in.Held {
		return m.at(in.Node).level
	}
	return m.at(in.Node).flow
}

// speck is an amount of a unit below which nobody looks: a millionth of a kelvin, a
// watt or a metre, of a bar, of a litre in ten seconds or at all; a thousandth of a joule.
func speck(unit string) float64 {
	switch unit {
	case "Pa":
		return 0.1
	case "m³/s":
		return 1e-10
	case "m³":
		return 1e-9
	case "J":
		return 1e-3
	}
	return 1e-6
}

// inertial reports whether the network has branches whose flow is a state.
func (m *Model) inertial() bool {
	for _, b := range m.Net.Branches() {
		if b.Kind == network.InertanceBranch {
			return true
		}
	}
	return false
}
