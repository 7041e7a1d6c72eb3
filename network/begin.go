package network

import (
	"errors"
	"math"
	"slices"
	"strconv"

	"lagbook/laplace"
)

// Begin returns the state at t = 0⁻, with every wave at its value before. Stores without a
// stated level start at the steady state of the whole network; a stated level then takes
// the place of its own. Where every store of an island is stated it needs no steady state.
// A flow of an inertance that is not stated is the steady one, 0 where there is none, and
// 0 where HasAllStart is set. Modes are those that the guards ask for. Laws that must know
// the state are told it last (Beginning).
//
// It returns *NoSteady where a steady state is needed and there is none, *Nonlinear where
// a periodic start is asked for, and *ParamFault as Check does.
func (n *Network) Begin(p *Params) (*State, error) {
	if p.StartCycle {
		return nil, n.notLinear("a start in the periodic state")
	}
	e, err := n.newEquations(p)
	if err != nil {
		return nil, err
	}
	b := &beginning{e: e, p: p, r: &resting{e: e, now: p, value: func(w *laplace.Waveform) float64 { return w.Before }}}
	return b.find()
}

// A beginning is a search for the state at t = 0⁻.
type beginning struct {
	e      *equations
	p      *Params
	r      *resting
	given  []int  // stated stores of each island
	stores []int  // stores of each island
	steady []bool // by island: it is at its steady state
}

func (b *beginning) find() (*State, error) {
	s, err := b.r.cold()
	if err != nil {
		return nil, err
	}
	b.count()
	if !b.p.HasAllStart {
		if s, err = b.rest(s); err != nil {
			return nil, err
		}
	}
	b.state(s)
	x, err := b.agree(s)
	if err != nil {
		return nil, err
	}
	if err := b.tell(x); err != nil {
		return nil, err
	}
	s = b.e.state(0, x)
	s.Beginning, s.How = true, b.how()
	return s, b.e.pressed(x)
}

// count counts the stores of each island, and those whose level is stated.
func (b *beginning) count() {
	e := b.e
	b.given, b.stores, b.steady = make([]int, e.islands), make([]int, e.islands), make([]bool, e.islands)
	for _, n := range e.l.nodes {
		if e.g.isMassless(n) {
			continue
		}
		k := e.group[n]
		b.stores[k]++
		if _, ok := b.p.startOf(n); ok {
			b.given[k]++
		}
	}
}

// full tells whether all stores of an island are stated.
func (b *beginning) full(k int32) bool {
	return k != none && b.stores[k] > 0 && b.given[k] == b.stores[k]
}

// rest finds the steady state. Islands whose stores are all stated take part for the
// flows of their inertances alone: if there is no steady state with them there is still one
// in which they keep their levels.
func (b *beginning) rest(s *State) (*State, error) {
	e := b.e
	fixed, flows := make([]bool, len(e.g.nodes)), make([]bool, e.islands)
	for k, w := range e.g.inertances {
		if island := max(e.group[w.from], e.group[w.to]); island != none && !b.p.HasStartFlow[k] && !b.p.Shut[k] {
			flows[island] = true
		}
	}
	some := false
	for i := range fixed {
		if k := e.group[i]; b.full(k) {
			fixed[i] = !flows[k]
			some = some || flows[k]
		}
	}
	steady, err := b.r.settle(clone(s), fixed)
	if err != nil && some && errors.As(err, new(*NoSteady)) {
		for i := range fixed {
			fixed[i] = b.full(e.group[i])
		}
		steady, err = b.r.settle(clone(s), fixed)
	}
	if err != nil {
		return nil, err
	}
	for k := range b.steady {
		b.steady[k] = true
	}
	for i, yes := range fixed {
		if k := e.group[i]; yes && k != none {
			b.steady[k] = false
		}
	}
	return steady, nil
}

// clone returns a state of its own.
func clone(s *State) *State {
	c := *s
	c.Levels, c.Flows, c.Modes = slices.Clone(s.Levels), slices.Clone(s.Flows), slices.Clone(s.Modes)
	c.Unknowns, c.Mem = make([][]float64, len(s.Unknowns)), make([][]float64, len(s.Mem))
	for k := range s.Unknowns {
		c.Unknowns[k], c.Mem[k] = slices.Clone(s.Unknowns[k]), slices.Clone(s.Mem[k])
	}
	return &c
}

// state puts what is stated in the place of what was found.
func (b *beginning) state(s *State) {
	e := b.e
	moved := make([]bool, e.islands)
	for _, n := range e.l.nodes {
		if e.g.isMassless(n) {
			continue
		}
		if v, ok := b.p.startOf(n); ok {
			moved[e.group[n]] = moved[e.group[n]] || s.Levels[n] != v
			s.Levels[n] = v
		}
	}
	for k, w := range e.g.inertances {
		if !b.p.HasStartFlow[k] {
			continue
		}
		if island := max(e.group[w.from], e.group[w.to]); island != none && s.Flows[k] != b.p.StartFlow[k] {
			moved[island] = true
		}
		s.Flows[k] = b.p.StartFlow[k]
	}
	for k := range moved {
		b.steady[k] = b.steady[k] && !moved[k]
	}
	for k := range e.g.elements {
		if b.isSteady(k) {
			continue
		}
		for u := range e.g.elements[k].Unknowns {
			if !b.anySteady(k) {
				s.Unknowns[k][u] = e.g.elements[k].Unknowns[u].Start
			}
		}
	}
}

// isSteady tells whether every island that element k touches is at its steady state.
func (b *beginning) isSteady(k int) bool {
	for _, n := range b.e.g.elements[k].Ports {
		if g := b.e.group[n]; g != none && !b.steady[g] {
			return false
		}
	}
	return !b.p.HasAllStart
}

// anySteady tells whether the steady state was found where element k is, though a stated
// level may have moved a part of it.
func (b *beginning) anySteady(k int) bool {
	for _, n := range b.e.g.elements[k].Ports {
		if g := b.e.group[n]; g != none && b.given[g] < b.stores[g] {
			return !b.p.HasAllStart
		}
	}
	return false
}

// agree makes the state agree with itself: flows at joints, algebraic unknowns, modes.
func (b *beginning) agree(s *State) ([]float64, error) {
	e := b.e
	if err := e.freeze(s, b.p, b.r.value); err != nil {
		return nil, err
	}
	x := e.vector(s)
	return x, b.settle(x)
}

func (b *beginning) settle(x []float64) error {
	e, modes := b.e, newModeSearch(b.e)
	for {
		if !modes.yield(0, x) {
			if err := b.close(x); err != nil {
				return err
			}
			changed, err := modes.advance(0, x)
			if err != nil || !changed {
				return err
			}
		}
		if err := e.freeze(e.state(0, x), b.p, b.r.value); err != nil {
			return err
		}
		e.restore(0, x)
	}
}

// close makes flows and algebraic unknowns agree; flows that are stated stay, and must fit.
func (b *beginning) close(x []float64) error {
	e := b.e
	if err := e.projectKeeping(0, x, b.p.HasStartFlow); err != nil {
		return err
	}
	var faults []Fault
	for k, shut := range b.p.Shut {
		if shut && b.p.HasStartFlow[k] && b.p.StartFlow[k] != 0 {
			w := &e.g.inertances[k]
			text, figure := e.g.figured(w.from, "inertance "+strconv.Quote(w.name)+": start is ", b.p.StartFlow[k], ", and it is shut just before t = 0")
			faults = append(faults, Fault{Code: StartConflict, Nodes: []NodeID{w.from}, Refs: []Ref{w.ref}, Text: text, Figure: figure})
		}
	}
	if faults = append(faults, b.conflicts(x)...); len(faults) > 0 {
		return &ParamFault{List: faults}
	}
	return nil
}

// conflicts finds joints at which the flows that are stated do not fit.
func (b *beginning) conflicts(x []float64) (faults []Fault) {
	e := b.e
	e.fill(0, x)
	e.sum()
	for k := range e.top.joints {
		m := &e.top.joints[k]
		var refs []Ref
		stated := 0.0
		for _, end := range m.ends {
			refs = append(refs, e.g.inertances[end.b].ref)
			if b.p.HasStartFlow[end.b] {
				stated += math.Abs(b.p.StartFlow[end.b])
			}
		}
		if miss, size := e.arriving(m); stated > 0 && math.Abs(miss) > followTolerance*(size+stated) {
			text, figure := e.g.figured(m.nodes[0], e.g.named(m.nodes)+": the flows stated to start with do not fit one another: ", miss, " flows in and nowhere out")
			faults = append(faults, Fault{Code: StartConflict, Nodes: m.nodes, Refs: append(refs, e.g.refsOf(m.nodes)...), Text: text, Figure: figure})
		}
	}
	return faults
}

// tell lets the laws know that must, and makes the state agree with what they say.
func (b *beginning) tell(x []float64) error {
	e := b.e
	told := false
	for k := range e.law {
		s := &e.law[k]
		law, ok := s.law.(Beginning)
		if !ok {
			continue
		}
		told = true
		e.fill(0, x)
		e.gather(s)
		s.s.Mode = e.modes[k]
		law.Begin(&s.s, b.isSteady(k))
		e.modes[k] = s.s.Mode
		for u, at := range e.l.unknown[k] {
			x[at] = s.s.X[s.ports+u]
		}
	}
	if !told {
		return nil
	}
	if err := e.freeze(e.state(0, x), b.p, b.r.value); err != nil {
		return err
	}
	e.restore(0, x)
	return b.settle(x)
}

// how says how the state was found.
func (b *beginning) how() StartHow {
	h := how(b.given, b.stores)
	if b.p.HasAllStart {
		return h
	}
	for _, has := range b.p.HasStartFlow {
		if has && h == SteadyStart || !has && h == GivenStart {
			h = MixedStart
		}
	}
	return h
}

// nonlinear reports whether some part's law is not linear.
func (g *graph) nonlinear() bool {
	return len(g.dropping) > 0 || slices.ContainsFunc(g.elements, func(e element) bool { return !e.Passive })
}

// notLinear returns the error of an answer that only linear networks have.
func (n *Network) notLinear(asked string) error {
	err := &Nonlinear{Asked: asked}
	for i := range n.g.elements {
		if e := &n.g.elements[i]; !e.Passive {
			err.Parts = append(err.Parts, e.Name)
		}
	}
	for _, b := range n.g.dropping {
		err.Parts = append(err.Parts, n.g.inertances[b].name)
	}
	if len(err.Parts) > maxNamed {
		err.Parts = err.Parts[:maxNamed]
	}
	return err
}
