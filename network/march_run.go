package network

import (
	"errors"
	"math"

	"lagbook/laplace"
	"lagbook/network/internal/sparse"
	"lagbook/network/internal/stiff"
)

// marching is a march on its way.
type marching struct {
	n     *Network
	e     *equations
	run   Run
	tol   float64
	waves []laplace.Waveform
	swing []laplace.Waveform // those with exponentials
	list  []stretch

	sys    *shifted
	g      *stiff.Integrator
	span   *span
	rec    *recorder
	watch  *watch
	ledger *ledger

	t       float64
	x, rate []float64
	scale   []float64          // the integrator's
	first   map[uint64]float64 // the first step of each kind of stretch
	kind    uint64             // of the present stretch
	steps   int                // since the integrator began
	ended   bool               // by an event
	lo, hi  []float64          // by unknown: where it has been
	warned  map[warning]bool
}

// leastTolerance is as far as rounding lets the steps of a march be judged.
const leastTolerance = 1e-12

type warning struct {
	element ElementID
	code    string
}

func (n *Network) newMarch(p *Params, from *State, outs []Output, run Run) (*marching, error) {
	if math.IsNaN(run.Until) || math.IsInf(run.Until, 0) || !(run.RelTol >= 0) {
		panic("network: a march ends at a finite time and has a tolerance that is a number")
	}
	n.g.checkOutputs(outs)
	if run.RelTol == 0 {
		run.RelTol = DefaultTolerance
	}
	run.RelTol = max(run.RelTol, leastTolerance)
	e, err := n.newEquations(p)
	if err != nil {
		return nil, err
	}
	m := &marching{n: n, e: e, run: run, tol: run.RelTol, waves: p.waves(), t: from.T, first: map[uint64]float64{}, warned: map[warning]bool{}}
	m.swing = swinging(m.waves)
	list, err := bends(m.waves, from.T, run.Until)
	if err != nil {
		return nil, err
	}
	m.list = stretches(list, from.T, max(run.Until, from.T))
	size := e.size()
	sizes := make([]float64, size+e.balances())
	for k := range sizes {
		sizes[k] = math.Inf(1) // what comes in has no say in the length of steps
	}
	m.rate, m.scale, m.span = make([]float64, size), sizes[:size], newSpan(size)
	m.watch = newWatch(e, m.scale)
	m.rec = newRecorder(e, newLayout(&n.g), p.Datum, outs, from.T, m.tol)
	if err := m.lookBack(from, outs); err != nil {
		return nil, err
	}
	s := m.list[0]
	if err := e.enter(from, s.t0, s.t1); err != nil {
		return nil, err
	}
	m.x = e.vector(from)
	m.lo, m.hi = append([]float64(nil), m.x...), append([]float64(nil), m.x...)
	m.sys = newShifted(e)
	m.g = stiff.New(m.sys, stiff.Control{RelTol: m.tol, Scale: sizes}, len(sizes))
	return m, nil
}

// lookBack notes what the outputs were just before the start.
func (m *marching) lookBack(from *State, outs []Output) error {
	span := max(1, from.T) * 0x1p-40
	if from.T == 0 {
		span = 1 // before 0 waves are constant
	}
	if err := m.e.enter(from, from.T-span, from.T); err != nil {
		return err
	}
	x := m.e.vector(from)
	for i := range outs {
		m.rec.t.before[i] = m.e.value(&outs[i], from.T, x, nil)
	}
	return nil
}

// through marches to the end.
func (m *marching) through() (*Trajectory, error) {
	m.ledger = newLedger(m.e, m.x)
	for i, s := range m.list {
		if i > 0 {
			m.rec.bend(s.t0)
		}
		if err := m.stretch(s, i == 0); err != nil {
			return nil, err
		}
		if m.ended {
			break
		}
	}
	return m.finish(), nil
}

// stretch marches from one bend to the next.
func (m *marching) stretch(s stretch, entered bool) error {
	m.kind, m.watch.changed = s.kind, m.watch.changed[:0]
	if err := m.enter(s, entered); err != nil {
		return err
	}
	if err := m.settle(s); err != nil || m.ended {
		return err
	}
	m.e.cautions(m.t, m.x, m.warn)
	if s.t1 <= s.t0 {
		m.rest()
		return nil
	}
	limits := swings(m.swing, s.t0, s.t1, m.tol)
	m.begin(s)
	for m.t < s.t1 && !m.ended {
		if err := m.advance(s, limits); err != nil {
			return err
		}
	}
	return nil
}

// rest keeps an instant as a step of no length.
func (m *marching) rest() {
	m.sys.speeds(m.t, m.x, m.rate)
	m.rec.rest(m.t, m.x, m.rate)
}

// enter puts what holds from now on in force and makes the state agree with it.
func (m *marching) enter(s stretch, entered bool) error {
	s.t0 = m.t
	if !entered {
		if err := m.e.enter(m.e.state(m.t, m.x), m.t, s.t1); err != nil {
			return err
		}
	}
	if ref, ok := m.e.yields(m.t, m.x); ok {
		return m.act(s, ref, nil)
	}
	if err := m.e.project(m.t, m.x); err != nil {
		return noPoint(m.t, err)
	}
	m.sys.mass = m.e.mass()
	m.e.scale(m.x, m.scale)
	if !m.watch.none() {
		m.sys.speeds(m.t, m.x, m.rate)
	}
	return nil
}

// settle changes modes until no guard is violated.
func (m *marching) settle(s stretch) error {
	for !m.watch.none() {
		over := m.watch.enter(m.t, m.x, m.rate)
		if over < 0 {
			return nil
		}
		if err := m.fire(s, over); err != nil || m.ended {
			return err
		}
	}
	return nil
}

// fire does what follows when a guard passes through zero.
func (m *marching) fire(s stretch, k int) error {
	return m.act(s, m.watch.refs[k], m.rate)
}

// act puts the mode in force that follows on a guard; rate is nil where it is not known.
func (m *marching) act(s stretch, ref guardRef, rate []float64) error {
	what, last := m.e.next(m.t, m.x, rate, ref)
	m.rec.t.events = append(m.rec.t.events, Event{ref.Element, what, m.t, last})
	m.rec.bend(m.t)
	if m.ended = last; last {
		return nil
	}
	span := m.run.Until - m.list[0].t0
	if !m.watch.note(ref.Element, m.t, 1e-9*span) {
		return m.n.chatter(ref.Element, m.t, chatters)
	}
	m.kind = uint64(ref.Element)<<8 | uint64(ref.Index)&0xff
	return m.enter(s, false)
}

// begin starts the integrator at the present state.
func (m *marching) begin(s stretch) {
	m.g.Start(m.sys.masses(), m.t, m.sys.begins(m.x), s.t1, m.first[m.kind])
	m.steps = 0
}

// advance takes one step, up to an event where one falls within it.
func (m *marching) advance(s stretch, limits []swing) error {
	switch {
	case m.run.Stopped != nil && m.run.Stopped():
		return ErrStopped
	case m.rec.full():
		return tooLong(m.t, m.run.Until, m.g.Taken)
	}
	if err := m.g.Step(s.t1, longest(limits, m.t, m.tol)); err != nil {
		return m.stuck(err)
	}
	m.span.take(m.g)
	over, at := m.lookForEvent()
	if over >= 0 && at <= m.span.t0 { // the mode was over from the start
		copy(m.rate, m.span.rate[0])
		return m.change(s, over)
	}
	if over >= 0 {
		m.span.cut(at)
	}
	m.keep()
	if over >= 0 {
		return m.change(s, over)
	}
	return nil
}

func (m *marching) lookForEvent() (over int, at float64) {
	if m.watch.none() {
		return -1, 0
	}
	return m.watch.first(m.span)
}

// keep books the span and moves to its end.
func (m *marching) keep() {
	m.rec.add(m.span, m.g)
	m.ledger.add(m.span, m.g)
	if m.steps++; m.steps == 1 {
		m.first[m.kind] = m.g.T1 - m.g.T0
	}
	m.t = m.span.t1
	copy(m.x, m.span.end())
	copy(m.rate, m.span.rate[len(nodes)-1])
	for k, v := range m.x {
		m.lo[k], m.hi[k] = min(m.lo[k], v), max(m.hi[k], v)
	}
	m.e.cautions(m.t, m.x, m.warn)
	if m.steps&(m.steps-1) == 0 { // what began at rest has a size now
		m.e.scale(m.x, m.scale)
	}
}

func (m *marching) warn(id ElementID, code, text string) {
	if w := (warning{id, code}); !m.warned[w] {
		m.warned[w] = true
		m.rec.t.cautions = append(m.rec.t.cautions, Warned{id, code, text, m.t})
	}
}

// change does what an event asks for and goes on from there.
func (m *marching) change(s stretch, over int) error {
	if err := m.fire(s, over); err != nil || m.ended {
		return err
	}
	if err := m.settle(s); err != nil || m.ended {
		return err
	}
	if m.t < s.t1 {
		m.begin(s)
	}
	return nil
}

// stuck says where no step can be taken and what resists.

func (m *marching) stuck(err error) error {
	var s *stiff.Stuck
	if !errors.As(err, &s) {
		return err
	}
	f := &MarchFault{At: s.T, Err: err, Text: "the march comes to a halt at t = " + seconds(s.T) + ": no step is short enough"}
	if name := m.n.unknownName(s.Unknown); name != "" {
		f.Text += " for " + name
	}
	var open *sparse.Singular
	if errors.As(m.sys.fault, &open) {
		f.Text += ": nothing determines " + m.n.unknownName(open.Column)
	}
	return f
}

// finish closes the books.
func (m *marching) finish() *Trajectory {
	t := m.rec.t
	if len(t.times) == 1 { // an event ended it where it began
		m.rest()
	}
	t.taken, t.rejected = m.g.Taken, m.g.Missed
	t.end = m.e.state(m.t, m.x)
	t.balance = m.ledger.share(m.t, m.t-t.times[0], m.x)
	if !m.ended {
		m.settled(t)
	}
	return t
}
