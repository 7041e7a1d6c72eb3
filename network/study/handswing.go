package study

import (
	"fmt"
	"math"

	"lagbook/network"
)

// handSwing reckons the natural frequency and the damping of a line that swings
// against a vessel, L i' = … − R i and C p' = i − p/R_n:
//
//	ω₀ = 1/√(L·C),  ζ = R/2·√(C/L) + √(L/C)/(2·R_n)
//
// with R_n the resistances that lead off from the vessel to held nodes, side by
// side. Where the line's other end is a vessel too, C is that of both in series.
// The first is what is left where R is small beside R_n: exactly, ω₀ is √(1 + R/R_n)
// times that and ζ as much smaller (the characteristic polynomial of the two
// equations). With other lines and vessels near it is rough, and says so.
func (m *Model) handSwing(subject network.NodeID) []HandLine {
	b, at, ok := m.swinging(subject)
	if !ok {
		return nil
	}
	l, r := m.par.L[b.Index], m.par.LR[b.Index]
	c := m.Net.CapacityOf(m.par, at)
	far := b.From
	if far == at {
		far = b.To
	}
	words := m.Show.Value(c, m.at(at).capacity, "")
	if n := m.Net.Node(far); !n.Held && !n.Massless {
		d := m.Net.CapacityOf(m.par, far)
		c *= d / (c + d)
		words = m.Show.Value(c, m.at(at).capacity, "") + " of both in series"
	}
	leak := m.leak(at)
	omega, zeta := 1/math.Sqrt(l*c), r/2*math.Sqrt(c/l)+leak/2*math.Sqrt(l/c)
	inert := m.Show.Value(l, m.at(at).inertance, "")
	lines := []HandLine{{
		What:    fmt.Sprintf("natural frequency of %s with %s, by 1/√(L·C)", m.partOf(b.Ref), m.Net.Name(at)),
		Numbers: fmt.Sprintf("1/√(%s · %s)", inert, words), Hand: omega, Unit: "rad/s",
		Remark: "a swing of " + m.Show.Time(2*math.Pi/omega),
	}, {
		What:    "damping ratio, by R/2·√(C/L) + √(L/C)/(2·Rn)",
		Numbers: fmt.Sprintf("%s + %s", m.Show.Number(r/2*math.Sqrt(c/l)), m.Show.Number(leak/2*math.Sqrt(l/c))), Hand: zeta, Unit: "1",
	}}
	if leak == 0 {
		lines[1].What = "damping ratio, by R/2·√(C/L)"
		lines[1].Numbers = m.Show.Number(zeta)
	}
	m.besideSwing(lines, omega)
	return lines
}

// swinging finds a line with inertia that ends at a store: at the subject where
// it is one, else the slowest.
func (m *Model) swinging(subject network.NodeID) (best network.BranchView, at network.NodeID, ok bool) {
	most := 0.0
	for _, b := range m.Net.Branches() {
		if b.Kind != network.InertanceBranch {
			continue
		}
		for _, end := range [2]network.NodeID{b.To, b.From} {
			n := m.Net.Node(end)
			if n.Held || n.Massless {
				continue
			}
			lc := m.par.L[b.Index] * m.Net.CapacityOf(m.par, end)
			if !ok || end == subject && at != subject || (end == subject || at != subject) && lc > most {
				best, at, ok, most = b, end, true, lc
			}
		}
	}
	return best, at, ok
}

// leak is the conductance from a node straight to held nodes.
func (m *Model) leak(id network.NodeID) float64 {
	sum := 0.0
	for _, b := range m.Net.Branches() {
		if b.Kind != network.ResistanceBranch {
			continue
		}
		if b.From == id && m.Net.Node(b.To).Held || b.To == id && m.Net.Node(b.From).Held {
			sum += m.par.G[b.Index]
		}
	}
	return sum
}

// besideSwing puts beside the hand values those of the computed pair of poles
// that is nearest in frequency.
func (m *Model) besideSwing(lines []HandLine, omega float64) {
	gap := math.Inf(1)
	for _, p := range m.red.System.Poles() {
		q := pole(p)
		if q.NaturalFrequency == nil || q.Im < 0 {
			continue
		}
		if g := math.Abs(math.Log(*q.NaturalFrequency / omega)); g < gap {
			gap = g
			lines[0].Computed, lines[1].Computed = q.NaturalFrequency, q.DampingRatio
		}
	}
	for i := range lines {
		if l := &lines[i]; l.Computed != nil {
			l.off(l.Hand, *l.Computed)
		}
	}
	switch {
	case lines[0].Computed == nil:
		lines[1].Remark = "above 1 nothing swings"
	case m.red.System.Order() > 2:
		lines[1].Remark = "rough: other lines and vessels swing along"
	}
}
