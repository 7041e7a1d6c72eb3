package study

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
)

// startAt gives every store of a domain without a start of its own one level;
// nothing flows where a flow is a state. Where the file has one domain that is
// the start of the whole network.
func (m *Model) startAt(level float64, domain string) {
	if len(m.Case.Domains()) < 2 {
		m.par.HasAllStart, m.par.AllStart = true, level
		return
	}
	m.fillStart(domain, func(id network.NodeID) (float64, bool) { return level + m.par.Datum[id], true })
}

// fillStart gives every store of a domain ("": of all) that has no start of its
// own the level that of returns, and every flow that is a state and has no start
// of its own 0.
func (m *Model) fillStart(domain string, of func(network.NodeID) (float64, bool)) {
	if m.ownStart == nil { // what the setters stated, and nobody else
		m.ownStart = append([]bool{}, m.par.HasStart...)
		m.ownFlow = append([]bool{}, m.par.HasStartFlow...)
	}
	for i := range m.Net.NodeCount() {
		v := m.Net.Node(network.NodeID(i))
		if !m.stores(v.ID) || m.ownStart[i] || domain != "" && m.at(v.ID).domain != domain {
			continue
		}
		if level, ok := of(v.ID); ok {
			m.par.Start[i], m.par.HasStart[i] = level, true
		}
	}
	for _, b := range m.Net.Branches() {
		if b.Kind == network.InertanceBranch && !m.ownFlow[b.Index] && (domain == "" || m.domainOf(b.Ref) == domain) {
			m.par.StartFlow[b.Index], m.par.HasStartFlow[b.Index] = 0, true
		}
	}
}

// startAtRest starts every store at the level of the held nodes it is joined to,
// just before t = 0: nothing flows, and sources set in at t = 0. Held nodes that
// are joined must then stand at one level, and every store must be joined to one.
func (m *Model) startAtRest() []casefile.Diagnostic {
	group, holder, apart := m.restGroups()
	ref := m.Case.Questions.StartRef
	if apart != nil {
		a, b := m.Net.Node(apart[0]), m.Net.Node(apart[1])
		return []casefile.Diagnostic{m.Case.Diagnose(ref, "not-at-rest", fmt.Sprintf("nothing is at rest: %s is held at %s and %s at %s, and what lies between flows",
			a.Name, m.levelAt(a.ID, m.before(a)), b.Name, m.levelAt(b.ID, m.before(b))), `let them begin at one level, or start = "steady"`)}
	}
	var loose []string
	m.fillStart("", func(id network.NodeID) (float64, bool) {
		h, ok := holder[group[id]]
		if !ok {
			loose = append(loose, m.Net.Name(id))
			return 0, false
		}
		return m.before(m.Net.Node(h)), true
	})
	if loose != nil {
		return []casefile.Diagnostic{m.Case.Diagnose(ref, "not-at-rest", "no held node says at which level "+join(firstNames(loose))+" stands at rest", "state start at one of them, or a level in [run] start")}
	}
	return nil
}

// noCycleStart refuses a start in the periodic state of a case that is marched.
func (m *Model) noCycleStart() casefile.Diagnostic {
	return m.Case.Diagnose(m.Case.Questions.StartRef, "not-built", `start = "cycle" is found in closed form, and the case is not linear: `+
		join(firstNames(m.nonlinearParts()))+": this version does not build it", `start = "steady", and the verb cycle marches to the periodic state`)
}

// before is the level of a held node just before t = 0.
func (m *Model) before(n network.NodeView) float64 { return m.par.Wave[n.Input].Before }

// restGroups joins nodes by branches that are open, held ones too, and finds a held node of
// each group; apart are two of one group at different levels.
func (m *Model) restGroups() (group []int, holder map[int]network.NodeID, apart []network.NodeID) {
	group = make([]int, m.Net.NodeCount())
	for i := range group {
		group[i] = i
	}
	root := func(i int) int {
		for group[i] != i {
			group[i] = group[group[i]]
			i = group[i]
		}
		return i
	}
	tie := func(a, b network.NodeID) {
		p, q := root(int(a)), root(int(b))
		group[max(p, q)] = min(p, q)
	}
	for _, b := range m.Net.Branches() {
		if b.Kind == network.ResistanceBranch && m.par.G[b.Index] == 0 || b.Kind == network.InertanceBranch && m.par.Shut[b.Index] {
			continue // shut at the start
		}
		tie(b.From, b.To)
	}
	m.tieElements(tie)
	holder = map[int]network.NodeID{}
	for i := range group {
		group[i] = root(i)
		n := m.Net.Node(network.NodeID(i))
		if !n.Held {
			continue
		}
		first, ok := holder[group[i]]
		switch {
		case !ok:
			holder[group[i]] = n.ID
		case apart == nil && m.before(m.Net.Node(first)) != m.before(n):
			apart = []network.NodeID{first, n.ID}
		}
	}
	return group, holder, apart
}

// tieElements joins the ends of elements that are open at the start. One that may shut
// by itself, such as a check valve, may stand between two levels at rest.
func (m *Model) tieElements(tie func(a, b network.NodeID)) {
	for _, e := range m.elements() {
		if _, shuts := m.par.Law[e.ID].(network.Switching); !e.Joins || shuts {
			continue
		}
		if e.Gate > 0 && m.par.Drive[e.ID][e.Gate-1].Before == 0 {
			continue
		}
		for _, p := range e.Ports[1:] {
			tie(e.Ports[0], p)
		}
	}
}

// firstNames keeps a list of names short.
func firstNames(names []string) []string {
	if len(names) > wavePieces {
		return append(names[:wavePieces:wavePieces], fmt.Sprintf("%d more", len(names)-wavePieces))
	}
	return names
}
