package study

import (
	"math"

	"lagbook/network"
)

// An edge is the branch by which heat leaves a node on its easiest way to a held node.
type edge struct {
	name   string
	to     network.NodeID
	r      float64 // 1/G of a resistance, that of an inertance, 1/W of a stream
	stream bool    // heat put in behind it does not pass through what lies before it
}

// paths is the forest of easiest ways out: of each free node one edge, and the
// sum of resistances up to a held node. Where the network itself is such a
// forest, sums along the ways are exact.
type paths struct {
	next   []edge
	order  []network.NodeID // free nodes that reach a held node, nearest first
	far    []float64        // sum of r to a held node; +Inf where none is reached
	forest bool
}

// findPaths walks outwards from the held nodes, always over the smallest sum of
// resistances (Dijkstra 1959); small networks, so the search is the plain one.
func (m *Model) findPaths() paths {
	n := m.Net.NodeCount()
	p := paths{next: make([]edge, n), far: make([]float64, n)}
	done := make([]bool, n)
	free := 0
	for i := range p.far {
		p.far[i] = math.Inf(1)
		if m.Net.Node(network.NodeID(i)).Held {
			p.far[i] = 0
		} else {
			free++
		}
	}
	branches := m.Net.Branches()
	for {
		at := nearestOpen(p.far, done)
		if at < 0 {
			break
		}
		done[at] = true
		if p.far[at] > 0 {
			p.order = append(p.order, network.NodeID(at))
		}
		for _, b := range branches {
			from, e, ok := m.edgeInto(b, network.NodeID(at))
			if ok && !done[from] && p.far[at]+e.r < p.far[from] {
				p.far[from], p.next[from] = p.far[at]+e.r, e
			}
		}
	}
	p.forest = m.edgeCount(branches) == free
	return p
}

// nearestOpen returns the node not yet done with the smallest finite sum, −1 for none.
func nearestOpen(far []float64, done []bool) int {
	at := -1
	for i, d := range far {
		if !done[i] && !math.IsInf(d, 1) && (at < 0 || d < far[at]) {
			at = i
		}
	}
	return at
}

// edgeInto returns the edge by which heat of another free node reaches `at` through b.
func (m *Model) edgeInto(b network.BranchView, at network.NodeID) (from network.NodeID, e edge, ok bool) {
	switch b.Kind {
	case network.ResistanceBranch:
		return m.edgeOver(b, at, 1/m.par.G[b.Index])
	case network.InertanceBranch: // in the end a resistance; one of 0 is not walked
		if r := m.par.LR[b.Index]; r > 0 {
			return m.edgeOver(b, at, r)
		}
	case network.OneWayBranch:
		w := m.par.W[b.Index]
		e = edge{name: m.partOf(b.Ref), to: at, r: 1 / w, stream: true}
		return b.To, e, b.From == at && w > 0 && !m.Net.Node(b.To).Held
	}
	return 0, e, false
}

// edgeOver is the edge over a branch that is passed both ways.
func (m *Model) edgeOver(b network.BranchView, at network.NodeID, r float64) (from network.NodeID, e edge, ok bool) {
	e = edge{name: m.partOf(b.Ref), to: at, r: r}
	if b.From == at {
		return b.To, e, !m.Net.Node(b.To).Held
	}
	return b.From, e, b.To == at && !m.Net.Node(b.From).Held
}

// edgeCount counts the branches with a free end that heat can take.
func (m *Model) edgeCount(branches []network.BranchView) int {
	n := 0
	for _, b := range branches {
		free := !m.Net.Node(b.To).Held || b.Kind != network.OneWayBranch && !m.Net.Node(b.From).Held
		if b.Kind != network.FeedbackBranch && free {
			n++
		}
	}
	return n
}

// hasStream reports whether a stream carries heat one way.
func (m *Model) hasStream() bool {
	for _, b := range m.Net.Branches() {
		if b.Kind == network.OneWayBranch {
			return true
		}
	}
	return false
}

// hasFeedback reports whether any source follows a temperature.
func (m *Model) hasFeedback() bool {
	for _, b := range m.Net.Branches() {
		if b.Kind == network.FeedbackBranch && m.par.K[b.Index] != 0 {
			return true
		}
	}
	return false
}

// drivingPoint is the resistance that heat put into node i meets on its way:
// up to the first stream, which carries it off.
func (p *paths) drivingPoint(i network.NodeID) float64 {
	sum := 0.0
	for p.far[i] > 0 && !math.IsInf(p.far[i], 1) {
		e := p.next[i]
		sum += e.r
		if e.stream {
			break
		}
		i = e.to
	}
	return sum
}

// flows adds up what each edge carries when each source gives its heat.
func (p *paths) flows(heat []float64) []float64 {
	flow := append([]float64(nil), heat...)
	for k := len(p.order) - 1; k >= 0; k-- {
		i := p.order[k]
		if e := p.next[i]; !e.stream {
			flow[e.to] += flow[i]
		}
	}
	return flow
}
