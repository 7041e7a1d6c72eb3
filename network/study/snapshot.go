package study

import (
	"lagbook/network"
)

// A snapshot is the state of the network at one instant: levels by NodeID, those of the
// network, and flows by InertanceID.
type snapshot struct {
	m      *Model
	at     float64
	before bool // just before t = 0: waves have the values they have before
	levels []float64
	flows  []float64
	lin    *network.Linear // of a case that is not linear
}

// startSnapshot is the state just before t = 0.
func (m *Model) startSnapshot() (*snapshot, error) {
	s := &snapshot{m: m, before: true}
	if m.Nonlinear() {
		k, err := m.moment(nil)
		if err != nil {
			return nil, err
		}
		s.levels, s.flows, s.lin = k.state.Levels, k.state.Flows, k.lin
		return s, nil
	}
	st, err := m.startState()
	if err != nil {
		return nil, err
	}
	s.levels, s.flows = st.Levels, st.Flows
	return s, nil
}

// endSnapshot is the state at the end of the run.
func (m *Model) endSnapshot() (*snapshot, error) {
	if m.marches() {
		if _, err := m.response(); err != nil {
			return nil, err
		}
		end := m.march.run.End()
		lin, err := m.Net.Linearise(m.par, end)
		if err != nil {
			return nil, err
		}
		return &snapshot{m: m, at: end.T, levels: end.Levels, flows: end.Flows, lin: lin}, nil
	}
	c := m.copied() // with every level and every flow that is a state among its outputs
	c.outs = c.outs[:0:0]
	for i := range c.Net.NodeCount() {
		c.outs = append(c.outs, c.Net.Level(network.NodeID(i)))
	}
	for _, b := range c.Net.Branches() {
		if b.Kind == network.InertanceBranch {
			c.outs = append(c.outs, c.Net.InertanceFlowOf(network.InertanceID(b.Index)))
		}
	}
	resp, err := c.response()
	if err != nil {
		return nil, err
	}
	s := &snapshot{m: m, at: c.until}
	for k := range c.outs {
		v := resp.At(k, c.until)
		if k < c.Net.NodeCount() {
			s.levels = append(s.levels, v+m.par.Datum[k])
		} else {
			s.flows = append(s.flows, v)
		}
	}
	return s, nil
}

// capacity is what a node stores for each unit of its level, at this state.
func (s *snapshot) capacity(id network.NodeID) float64 {
	if s.lin != nil && s.m.stores(id) {
		return s.lin.Net.CapacityOf(s.lin.Params, id)
	}
	return s.m.Net.CapacityOf(s.m.par, id)
}

// shown is the level of a node as it is shown.
func (s *snapshot) shown(id network.NodeID) float64 { return s.levels[id] - s.m.par.Datum[id] }

// branch is what a branch carries from its first end to its second; of a stream or a
// feedback, what it brings to its second.
func (s *snapshot) branch(b network.BranchView) float64 {
	gap := s.levels[b.From] - s.levels[b.To]
	p := s.m.numbersAt(s)
	switch b.Kind {
	case network.ResistanceBranch:
		return p.G[b.Index] * gap
	case network.InertanceBranch:
		return s.flows[b.Index]
	case network.OneWayBranch:
		return p.W[b.Index] * gap
	}
	return p.K[b.Index] * (s.levels[b.From] - p.About[b.Index])
}

// numbersAt are the numbers in force at an instant.
func (m *Model) numbersAt(s *snapshot) *network.Params {
	if s.before || !m.turns() {
		return m.par
	}
	if p, err := m.par.At(s.at); err == nil {
		return p
	}
	return m.par
}

// input is the value of an input.
func (s *snapshot) input(id network.InputID) float64 {
	if w := s.m.par.Wave[id]; !s.before {
		return w.At(s.at)
	}
	return s.m.par.Wave[id].Before
}

// port is what an element brings into one of its ports.
func (s *snapshot) port(e network.ElementID, port int) float64 {
	if s.lin == nil {
		return 0 // what leaves a network linear brings nothing
	}
	at := s.lin.Values([]network.Output{{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: e, Port: port, Sign: 1}}})
	return at[0]
}

// flowShown is what is shown as the flow of a part; false where it is not known here.
func (s *snapshot) flowShown(o network.Output) (float64, bool) {
	switch {
	case o.Flow != nil:
		return s.flow(o.Flow)
	case o.Reading != nil && s.lin != nil:
		return s.lin.Values([]network.Output{o})[0] + 0, true // no −0
	}
	return 0, false
}

// flow is a flow of the network; false for that into a held node, which is no state.
func (s *snapshot) flow(t *network.FlowTerm) (float64, bool) {
	switch t.Kind {
	case network.ResistanceFlow, network.InertanceFlow:
		for _, b := range s.m.Net.Branches() {
			if b.Kind == network.ResistanceBranch && t.Kind == network.ResistanceFlow && b.Index == int(t.Resistance) ||
				b.Kind == network.InertanceBranch && t.Kind == network.InertanceFlow && b.Index == int(t.Inertance) {
				return t.Sign * s.branch(b), true
			}
		}
	case network.SourceFlow:
		return t.Sign * s.input(t.Input), true
	case network.PortFlow:
		return t.Sign*s.port(t.Element, t.Port) + 0, true // no −0
	}
	return 0, false
}
