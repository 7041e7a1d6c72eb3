package study

import (
	"fmt"
	"math"

	"lagbook/network"
)

// handMass takes one island as one mass: all capacities, against what leads out
// of it less what sources that follow its own temperature add.
func (m *Model) handMass(island int) (HandLine, bool) {
	store, loss, gain, ok := m.oneMass(island)
	if !ok || store <= 0 {
		return HandLine{}, false
	}
	slow, ok := m.slowest()
	if !ok {
		return HandLine{}, false
	}
	u := m.islandUnits(island)
	c, g := m.Show.Value(store, u.capacity, ""), m.Show.Value(loss, u.conductance, "")
	net := loss - gain
	if net == 0 {
		return HandLine{}, false
	}
	l := HandLine{Unit: "s"}
	if net < 0 {
		l.What = "doubling time, all as one mass, by ln 2·ΣC/(gain − loss)"
		l.Hand = math.Ln2 * store / -net
		l.Numbers = fmt.Sprintf("0.6931·%s / (%s − %s)", c, m.Show.Value(gain, u.conductance, ""), g)
		l.Remark = fmt.Sprintf("%s made for each kelvin, %s carried off: it cannot hold itself; some part runs ahead of the mean, so in truth at most that", m.Show.Value(gain, u.conductance, ""), g)
		if slow < 0 {
			double := math.Ln2 * -slow
			l.Computed = &double
			l.off(l.Hand, double)
		}
		return l, true
	}
	l.What, l.Hand = "slowest time constant, all as one "+u.Lump+", by ΣC/ΣG", store/net
	l.Numbers = fmt.Sprintf("%s / (%s)", c, g)
	if gain != 0 {
		l.Numbers = fmt.Sprintf("%s / (%s %s)", c, g, less(gain, func(v float64) string { return m.Show.Value(v, u.conductance, "") }))
	}
	l.Remark = "at least that"
	if m.hasStream() {
		l.Remark = "rough: streams carry heat one way"
	}
	if slow > 0 {
		l.Computed = &slow
		l.off(l.Hand, slow)
		if math.Abs(*l.Off) > farFromOneMass {
			l.Remark += "; the parts are far from being one " + u.Lump
		}
	}
	return l, true
}

// less writes what is taken away: "− 2 W/K", or "+ 2 W/K" where that is negative.
func less(v float64, words func(float64) string) string {
	if v < 0 {
		return "+ " + words(-v)
	}
	return "− " + words(v)
}

// islandUnits are the units and words of an island.
func (m *Model) islandUnits(island int) physics {
	for i := range m.Net.NodeCount() {
		if n := m.Net.Node(network.NodeID(i)); !n.Held && n.Island == island {
			return m.at(n.ID)
		}
	}
	return physics{}
}

// farFromOneMass is how far off the sum may be before that is said.
const farFromOneMass = 0.3

// slowest is the time constant of the slowest mode, negative where a mode grows;
// the fastest growth then.
func (m *Model) slowest() (float64, bool) {
	tau, ok := 0.0, false
	for _, p := range m.red.System.Poles() {
		re := real(p.P)
		if imag(p.P) != 0 || re == 0 {
			return 0, false
		}
		switch t := -1 / re; {
		case re > 0 && (!ok || tau > 0 || t > tau):
			tau, ok = t, true
		case re < 0 && (!ok || tau > 0 && t > tau):
			tau, ok = t, true
		}
	}
	return tau, ok
}

// A star holds an island as seen from two terminals: 0 is all its stores at one
// level, 1 all held nodes; massless nodes follow. g[i][j] acts on x_j − x_i in
// the balance of i.
type star struct {
	place map[network.NodeID]int
	g     [][]float64
	store float64 // sum of the capacities, J/K
	gain  float64 // what sources that follow a store add to it, W/K
}

// oneMass sums the capacities of an island, the conductance from all its stores
// held at one level to the held nodes, and the feedback of its stores onto
// themselves. A stream from a held node carries off its rate. ok is false where a
// feedback elsewhere, or another island, spoils the sum.
func (m *Model) oneMass(island int) (store, loss, gain float64, ok bool) {
	s, ok := m.starOf(island)
	if !ok {
		return 0, 0, 0, false
	}
	for _, b := range m.Net.Branches() {
		if !s.add(m.par, b) {
			return 0, 0, 0, false
		}
	}
	s.eliminate()
	return s.store, s.g[0][1], s.gain, true
}

// starOf places the nodes; ok is false where they are too many for a check by
// hand or belong to several islands, which have time constants of their own.
func (m *Model) starOf(island int) (*star, bool) {
	s := &star{place: map[network.NodeID]int{}}
	n := 2
	for id := range m.Net.NodeCount() {
		v := m.Net.Node(network.NodeID(id))
		switch {
		case v.Held:
			s.place[v.ID] = 1
		case v.Island != island:
			return nil, false
		case v.Massless:
			s.place[v.ID] = n
			n++
		default:
			s.place[v.ID] = 0
			s.store += m.Net.CapacityOf(m.par, v.ID)
		}
	}
	s.g = make([][]float64, n)
	for i := range s.g {
		s.g[i] = make([]float64, n)
	}
	return s, n <= modeNodes
}

// add puts a branch between its terminals; false for a feedback that does not act
// on the store it watches.
func (s *star) add(p *network.Params, b network.BranchView) bool {
	i, j := s.place[b.From], s.place[b.To]
	switch {
	case b.Kind == network.FeedbackBranch && i == 1: // a held level, whatever the stores do
	case b.Kind == network.FeedbackBranch:
		if i != 0 || b.From != b.To {
			return false
		}
		s.gain += p.K[b.Index]
	case i == j:
	case b.Kind == network.OneWayBranch:
		s.g[j][i] += p.W[b.Index] // acts on the balance of its end alone
	default:
		s.g[i][j] += p.G[b.Index]
		s.g[j][i] += p.G[b.Index]
	}
	return true
}

// eliminate replaces each massless node by the mesh of its neighbours.
func (s *star) eliminate() {
	for k := len(s.g) - 1; k >= 2; k-- {
		sum := 0.0
		for i := range k {
			sum += s.g[k][i]
		}
		for i := range k {
			for j := range k {
				if i != j && sum > 0 {
					s.g[i][j] += s.g[i][k] * s.g[k][j] / sum
				}
			}
		}
	}
}
