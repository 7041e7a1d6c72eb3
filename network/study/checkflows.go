package study

import (
	"slices"

	"lagbook/network"
)

// Flows say where the heat, or the liquid, goes at one instant: what each part carries,
// its share of all that is brought in, and the stack of levels from where most is
// brought in to a held node. Flows are in Unit, levels in LevelUnit.
type Flows struct {
	Domain    string      `json:"domain"`
	When      string      `json:"when"` // start, end
	At        float64     `json:"at"`   // s
	Unit      string      `json:"unit"`
	LevelUnit string      `json:"level_unit"`
	In        float64     `json:"in"` // what sources and held nodes bring in, to held nodes as well
	Lines     []FlowLine  `json:"flows"`
	Stack     []StackLine `json:"stack"`
}

// A FlowLine is what one part carries from one node to another, largest first; From or
// To is "" where it leads out of the network.
type FlowLine struct {
	Part  string   `json:"part"`
	From  string   `json:"from,omitempty"`
	To    string   `json:"to,omitempty"`
	Flow  float64  `json:"flow"`
	Share *float64 `json:"share,omitempty"` // of all that is brought in; of what goes round in a ring, and is more than that, none
}

// A StackLine is one step down from the source to the surroundings: along the part that
// carries most away from a node.
type StackLine struct {
	From  string  `json:"from"`
	To    string  `json:"to"`
	Part  string  `json:"part"`
	Drop  float64 `json:"drop"`
	Flow  float64 `json:"flow"`
	Level float64 `json:"level"` // of From
}

// Flows answers check --flows: at the start and at the end of the run, for each domain.
func (m *Model) Flows() ([]Flows, error) {
	start, err := m.startSnapshot()
	if err != nil {
		return nil, err
	}
	end, err := m.endSnapshot()
	if err != nil {
		return nil, err
	}
	list := []Flows{}
	for _, d := range m.Case.Domains() {
		for _, s := range []*snapshot{start, end} {
			list = append(list, s.tell(d))
		}
	}
	return list, nil
}

// A running is what one part carries from one node to another, flow ≥ 0. It leaves the
// balance of `out` and enters that of `in`: the same two nodes, but that of a stream only
// what it brings counts, w·(T_up − T_down) at its lower end, and nothing is taken from its
// upper one. nowhere stands for no node.
type running struct {
	part     string
	ref      network.Ref
	law      network.ElementID // the element one of whose ports this is, else noLaw
	from, to network.NodeID
	out, in  network.NodeID
	flow     float64
}

const (
	nowhere network.NodeID    = -1
	noLaw   network.ElementID = -1
)

// running lists what every part of a domain carries.
func (s *snapshot) running(domain string) []running {
	m := s.m
	var list []running
	put := func(ref network.Ref, r running) {
		if m.domainOf(ref) != domain {
			return
		}
		if part := m.partOf(ref); part != "" {
			r.part = part
		}
		r.ref = ref
		list = append(list, r.forward())
	}
	add := func(ref network.Ref, name string, from, to network.NodeID, q float64) {
		put(ref, running{part: name, law: noLaw, from: from, to: to, out: from, in: to, flow: q})
	}
	for _, b := range m.Net.Branches() {
		switch q := s.branch(b); b.Kind {
		case network.FeedbackBranch:
			add(b.Ref, b.Name, nowhere, b.To, q)
		case network.OneWayBranch:
			put(b.Ref, running{part: b.Name, law: noLaw, from: b.From, to: b.To, out: nowhere, in: b.To, flow: q})
		default:
			add(b.Ref, b.Name, b.From, b.To, q)
		}
	}
	for _, in := range m.Net.Inputs() {
		if !in.Held {
			add(in.Ref, in.Name, nowhere, in.Node, in.Sign*s.input(in.ID))
		}
	}
	for _, e := range m.elements() {
		if e.Joins && len(e.Ports) == 2 {
			add(e.Ref, e.Name, e.Ports[0], e.Ports[1], -s.port(e.ID, 0))
			continue
		}
		for k, p := range e.Ports {
			if q := s.port(e.ID, k); q != 0 {
				put(e.Ref, running{part: e.Name, law: e.ID, from: nowhere, to: p, out: nowhere, in: p, flow: q})
			}
		}
	}
	return list
}

// tell puts what runs in a domain in an answer.
func (s *snapshot) tell(domain string) Flows {
	m := s.m
	units := m.physicsOf(domain)
	a := Flows{Domain: domain, When: "start", At: s.at, Unit: units.flow, LevelUnit: units.level, Lines: []FlowLine{}, Stack: []StackLine{}}
	if !s.before {
		a.When = "end"
	}
	list := summed(across(s.running(domain)))
	name := func(id network.NodeID) string {
		if id == nowhere {
			return ""
		}
		return m.Net.Name(id)
	}
	a.In = s.brought(list)
	for _, r := range list {
		l := FlowLine{Part: r.part, From: name(r.from), To: name(r.to), Flow: r.flow}
		if share := r.flow / a.In; a.In > 1e-3*speck(a.Unit) && share <= 1+sameFlow {
			l.Share = &share
		}
		a.Lines = append(a.Lines, l)
	}
	slices.SortStableFunc(a.Lines, func(x, y FlowLine) int {
		switch {
		case x.Flow > y.Flow:
			return -1
		case x.Flow < y.Flow:
			return 1
		}
		return 0
	})
	a.Stack = s.stack(list)
	return a
}

// brought is what comes into the nodes from outside: from sources, and from held nodes.
func (s *snapshot) brought(list []running) float64 {
	outside := func(id network.NodeID) bool { return id == nowhere || s.m.Net.Node(id).Held }
	sum := 0.0
	for _, r := range list {
		if outside(r.out) && r.in != nowhere {
			sum += r.flow
		}
	}
	return sum
}

// stack walks from where most is brought in, along what carries most away, to a held
// node.
func (s *snapshot) stack(list []running) []StackLine {
	at, most := nowhere, 0.0
	for _, r := range list {
		if r.from == nowhere && r.to != nowhere && r.flow > most {
			at, most = r.to, r.flow
		}
	}
	steps := []StackLine{}
	seen := map[network.NodeID]bool{}
	for at != nowhere && !s.m.Net.Node(at).Held && !seen[at] {
		seen[at] = true
		best := -1
		for i, r := range list {
			if r.from == at && r.to != nowhere && !seen[r.to] && r.flow > 0 && (best < 0 || r.flow > list[best].flow) {
				best = i
			}
		}
		if best < 0 {
			break
		}
		r := list[best]
		steps = append(steps, StackLine{From: s.m.Net.Name(at), To: s.m.Net.Name(r.to), Part: r.part, Flow: r.flow,
			Drop: s.shown(at) - s.shown(r.to), Level: s.shown(at)})
		at = r.to
	}
	return steps
}
