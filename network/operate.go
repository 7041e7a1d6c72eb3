package network

import (
	"errors"
	"math"
	"slices"
	"strconv"

	"lagbook/laplace"
	"lagbook/network/internal/sparse"
)

// Operate returns the steady state with every wave at its value at t, and modes of
// elements as they come to be there: from says where to begin, and in which modes; nil is
// a network that nothing is known of. It returns *NoSteady where there is no steady state
// or none was found, naming what stands against it, and *ParamFault as Check does.
func (n *Network) Operate(p *Params, t float64, from *State) (*State, error) {
	e, err := n.newEquations(p)
	if err != nil {
		return nil, err
	}
	now, err := e.numbers(t)
	if err != nil {
		return nil, err
	}
	r := &resting{e: e, t: t, now: now, value: func(w *laplace.Waveform) float64 { return w.At(t) }}
	s := from
	if s == nil {
		if s, err = r.cold(); err != nil {
			return nil, err
		}
	}
	s, err = r.settle(clone(s), nil)
	if err != nil {
		return nil, err
	}
	s.T, s.How = t, SteadyStart
	return s, nil
}

// A resting is a search for a steady state: every wave is held at one value.
type resting struct {
	e     *equations
	t     float64
	now   *Params
	value func(w *laplace.Waveform) float64
	pins  []pin
	loose []int32 // flows that turned out to be open: nothing determines what circulates
}

// cold returns a state to begin from: levels in the middle of the held ones they hang
// together with, stated ones as stated, no flow.
func (r *resting) cold() (*State, error) {
	e := r.e
	s := e.blank()
	if err := e.hold(s, r.now, r.value, asRest); err != nil {
		return nil, err
	}
	sum, count := make([]float64, e.parts), make([]float64, e.parts)
	for i := range e.g.nodes {
		v, known := e.p.startOf(NodeID(i))
		if e.g.isHeld(NodeID(i)) {
			v, known = e.z[e.l.level[i]], true
		}
		if known {
			sum[e.part[i]] += v
			count[e.part[i]]++
		}
	}
	for i := range s.Levels {
		if k := e.part[i]; count[k] > 0 {
			s.Levels[i] = sum[k] / count[k]
		}
		if v, known := e.p.startOf(NodeID(i)); known && !e.g.isMassless(NodeID(i)) {
			s.Levels[i] = v
		}
	}
	return s, nil
}

// blank returns a state of the right shape: modes 0, unknowns where runs begin.
func (e *equations) blank() *State {
	s := &State{Levels: make([]float64, len(e.g.nodes)), Flows: make([]float64, len(e.g.inertances)),
		Unknowns: make([][]float64, len(e.g.elements)), Mem: make([][]float64, len(e.g.elements)), Modes: make([]int, len(e.g.elements))}
	for k := range e.g.elements {
		s.Mem[k] = make([]float64, e.g.elements[k].Memory)
		for _, u := range e.g.elements[k].Unknowns {
			s.Unknowns[k] = append(s.Unknowns[k], u.Start)
		}
	}
	return s
}

// settle solves again and again until every element is in the mode that its guards ask
// for. fixed marks the free nodes of islands that take no part: they stay as they are.
func (r *resting) settle(s *State, fixed []bool) (*State, error) {
	e := r.e
	modes, opened := newModeSearch(e), false
	for {
		if err := e.hold(s, r.now, r.value, asRest); err != nil {
			return nil, err
		}
		x := e.vector(s)
		stays, cut, faults := r.open(fixed)
		if len(cut) > 0 && !opened {
			opened = true
			for _, id := range cut {
				s.Modes[id] = 0
			}
			continue
		}
		if len(faults) > 0 {
			return nil, &NoSteady{List: faults}
		}
		if err := r.solve(x, stays); err != nil {
			return nil, err
		}
		changed, err := modes.advance(r.t, x)
		if err != nil {
			return nil, err
		}
		if changed = changed || modes.yield(r.t, x); !changed {
			return e.state(r.t, x), e.pressed(x)
		}
		s = e.state(r.t, x)
	}
}

// solve finds the steady state in the modes at hand.
func (r *resting) solve(x []float64, fixed []bool) error {
	e := r.e
	r.loose = e.circulating()
	for {
		r.pin(x, fixed)
		err := e.solver().solve(r.t, x, r.pins)
		var open *sparse.Singular
		switch {
		case errors.As(err, &open):
			if kept := r.keep(open.Column, fixed); kept != nil {
				fixed = kept
			} else if !r.loosen(open.Column) {
				return &NoSteady{List: []SteadyFault{r.undetermined(open.Column)}}
			}
		case err != nil:
			return &NoSteady{List: r.unbalanced(x)}
		default:
			return r.circulates(x)
		}
	}
}

// pin lists the rows whose unknown stays: what is cut off, what is shut, what is fixed
// and what nothing depends on.
func (r *resting) pin(x []float64, fixed []bool) {
	e := r.e
	r.pins = r.pins[:0]
	own := func(row int32) { r.pins = append(r.pins, pin{row, e.slot(row, row), row}) }
	for _, m := range e.top.kept {
		own(m.row)
	}
	for b, at := range e.l.flow {
		if w := &e.g.inertances[b]; e.now.Shut[b] || fixed != nil && (fixed[w.from] || fixed[w.to]) {
			own(at)
		}
	}
	for i := range fixed {
		if row := e.l.balance[i]; fixed[i] {
			r.pins = append(r.pins, pin{row, e.slot(row, e.l.level[i]), e.l.level[i]})
		}
	}
	for _, at := range r.loose {
		own(at)
	}
	e.fill(r.t, x)
	e.sum()
	for k := range e.law {
		for u, at := range e.l.unknown[k] {
			if e.m[at] != 0 && e.law[k].ignores(u) || fixed != nil && e.anyFixed(k, fixed) {
				own(at)
			}
		}
	}
}

// anyFixed tells whether an element touches a node of an island that stays as it is.
func (e *equations) anyFixed(k int, fixed []bool) bool {
	return slices.ContainsFunc(e.g.elements[k].Ports, func(n NodeID) bool { return fixed[n] })
}

// ignores tells whether nothing depends on an unknown of an element: it integrates what
// is only read.
func (s *stamped) ignores(u int) bool {
	for row := range s.rows {
		if s.s.DF[row*len(s.at)+s.ports+u] != 0 {
			return false
		}
	}
	return s.s.DStoredBy[u] == 0
}

// circulating lists the flows of inertances without any resistance that close a loop of
// such, held nodes counting as one: what goes round it is steady whatever it is.
func (e *equations) circulating() (loose []int32) {
	parent := make([]int, len(e.g.nodes)+1) // the last: all that is held
	for i := range parent {
		parent[i] = i
	}
	root := func(n NodeID) int {
		i := int(n)
		if e.g.isHeld(n) {
			i = len(parent) - 1
		}
		for parent[i] != i {
			parent[i] = parent[parent[i]]
			i = parent[i]
		}
		return i
	}
	for b, w := range e.g.inertances {
		if e.now.Shut[b] || e.now.LR[b] != 0 || e.p.Drop[b] != nil {
			continue
		}
		if p, q := root(w.from), root(w.to); p != q {
			parent[min(p, q)] = max(p, q)
		} else {
			loose = append(loose, e.l.flow[b])
		}
	}
	return loose
}

// loosen leaves a flow as it is that nothing determines.
func (r *resting) loosen(column int) bool {
	for _, at := range r.e.l.flow {
		if int(at) == column && !slices.Contains(r.loose, at) {
			r.loose = append(r.loose, at)
			return true
		}
	}
	return false
}

// circulates checks the rows that were left out for flows that nothing determines: they
// hold where both ends are at one level.
func (r *resting) circulates(x []float64) error {
	e := r.e
	if len(r.loose) == 0 {
		return nil
	}
	f := make([]float64, e.l.size)
	e.rates(r.t, x, f)
	span := e.solver().spans(e.z)
	var faults []SteadyFault
	for _, at := range r.loose {
		b := slices.Index(e.l.flow, at)
		w := e.g.inertances[b]
		if math.Abs(f[at]) > 1e-9*span[e.part[w.from]] {
			ids := []NodeID{w.from, w.to}
			faults = append(faults, SteadyFault{Nodes: ids, Refs: append([]Ref{w.ref}, e.g.refsOf(ids)...), Reason: Integrating, Text: e.g.named(ids) +
				": are held at different levels and joined by inertances without resistance, so that the flow grows for ever; a start must be given"})
		}
	}
	if len(faults) > 0 {
		return &NoSteady{List: faults}
	}
	return nil
}

// A modeSearch changes modes until the guards are content.
type modeSearch struct {
	e       *equations
	g       []float64
	largest []float64 // of each guard met, by element: what is beside it is rounding
	seen    map[string]bool
	rounds  int
	yielded int
}

// allAtOnce is for how many rounds all guards that are not content act together; then the
// first alone does, which cannot chase itself round through others.
const allAtOnce = 8

// quiet is the share of the largest value a guard has had below which it counts as 0.
const quiet = 1e-9

func newModeSearch(e *equations) *modeSearch {
	return &modeSearch{e: e, g: make([]float64, e.guardRoom()), largest: make([]float64, len(e.law)), seen: map[string]bool{}}
}

// advance puts the modes in force that the guards ask for at x, and tells whether any was
// changed. It returns *NoSteady where they go round in a circle.
func (m *modeSearch) advance(t float64, x []float64) (changed bool, err error) {
	if len(m.g) == 0 {
		return false, nil
	}
	refs := m.e.guards(t, x, nil, m.g)
	for i, ref := range refs {
		m.largest[ref.Element] = max(m.largest[ref.Element], math.Abs(m.g[i]))
	}
	var act []guardRef
	for i, ref := range slices.Clone(refs) {
		if m.g[i] < 0 && (m.rounds == 0 || -m.g[i] > quiet*m.largest[ref.Element]) {
			act = append(act, ref)
		}
	}
	if len(act) == 0 {
		return false, nil
	}
	m.rounds++
	if m.rounds > allAtOnce {
		act = act[:1]
		state := m.fingerprint()
		if m.seen[state] {
			return false, &NoSteady{List: []SteadyFault{m.circling(act[0].Element)}}
		}
		m.seen[state] = true
	}
	last := ElementID(-1)
	for _, ref := range act {
		if ref.Element != last { // one way out of a mode at a time
			m.e.next(t, x, nil, ref)
		}
		last = ref.Element
	}
	return true, nil
}

// mostYields is how often elements may give way in one search.
const mostYields = 20

// yield changes the mode of an element that gives way to what presses on it.
func (m *modeSearch) yield(t float64, x []float64) bool {
	if len(m.g) == 0 || m.yielded >= mostYields {
		return false
	}
	ref, ok := m.e.yields(t, x)
	if ok {
		m.yielded++
		m.e.next(t, x, nil, ref)
	}
	return ok
}

func (m *modeSearch) fingerprint() string {
	text := make([]byte, 0, 2*len(m.e.modes))
	for _, mode := range m.e.modes {
		text = append(strconv.AppendInt(text, int64(mode), 10), ' ')
	}
	return string(text)
}

func (m *modeSearch) circling(id ElementID) SteadyFault {
	el := &m.e.g.elements[id]
	return SteadyFault{Nodes: el.Ports, Refs: append([]Ref{el.ref}, m.e.g.refsOf(el.Ports)...), Reason: Cycling,
		Text: strconv.Quote(el.Name) + " switches to and fro without coming to rest, so that there is no steady state; a start must be given"}
}
