package network

import (
	"math"
	"slices"
)

// A watch looks after the guards of one march: which have been positive since the
// present modes began, and whether one passes through zero within a step.
//
// The state is known to some roundings of the size of its numbers, and so is a guard: what
// that lets it be off by is its doubt. (The tolerance would be too much: a guard that
// multiplies what is left to an edge by a large number would doubt all it says.) A guard is armed once it has been above its doubt; then its event is where it
// passes through zero. One that never was counts as violated only where it is below zero
// by more than its doubt: at once where a mode begins, or where the first step in a mode ends; the
// mode is then over from the start. So a flow that is zero but for rounding, behind a valve
// that is shut by another, does not open and shut its own for ever.
type watch struct {
	e     *equations
	scale []float64 // of the unknowns
	refs  []guardRef
	value [len(nodes)][]float64
	armed []bool
	doubt []float64
	now   []float64
	x     []float64
	rate  []float64
	fresh bool // the step to look at is the first in these modes

	changed []ElementID             // in this instant
	recent  map[ElementID][]float64 // the last instants of change
}

// chatters is how many changes of one element within a vanishing part of the run are
// too many.
const chatters = 300

func newWatch(e *equations, scale []float64) *watch {
	w := &watch{e: e, scale: scale, recent: map[ElementID][]float64{}}
	n := e.guardRoom()
	for k := range w.value {
		w.value[k] = make([]float64, n)
	}
	w.now, w.doubt = make([]float64, n), make([]float64, n)
	w.x, w.rate = make([]float64, e.size()), make([]float64, e.size())
	return w
}

// none reports that there is nothing to watch.
func (w *watch) none() bool { return len(w.now) == 0 }

// enter looks at the guards in force at a state from which a stretch begins. over is the
// first that is violated, −1 where none is; of an element that has changed its mode in
// this instant the first step tells.
func (w *watch) enter(t float64, x, rate []float64) (over int) {
	w.refs = append(w.refs[:0], w.e.guards(t, x, rate, w.now)...)
	w.weigh(t, x, rate)
	w.armed = w.armed[:0]
	over = -1
	for k, r := range w.refs {
		w.armed = append(w.armed, w.now[k] > w.doubt[k])
		if w.now[k] < -w.doubt[k] && over < 0 && !w.hasChanged(r.Element) {
			over = k
		}
	}
	w.fresh = true
	return over
}

// weigh sets the doubts.
func (w *watch) weigh(t float64, x, rate []float64) {
	for k, v := range x {
		w.x[k] = v + hair(k, w.scale[k])
	}
	w.e.guards(t, w.x, rate, w.doubt)
	for k := range w.refs {
		w.doubt[k] = math.Abs(w.doubt[k] - w.now[k])
	}
}

func (w *watch) hasChanged(id ElementID) bool {
	for _, c := range w.changed {
		if c == id {
			return true
		}
	}
	return false
}

// note records that an element changes its mode at t; false says that it chatters.
func (w *watch) note(id ElementID, t, vanishing float64) bool {
	w.changed = append(w.changed, id)
	list := append(w.recent[id], t)
	if len(list) > chatters {
		list = list[len(list)-chatters:]
	}
	w.recent[id] = list
	return len(list) < chatters || t-list[0] > vanishing
}

// first returns the guard that first passes through zero within a span and when, and −1
// where none does. Between the nodes, too: where the quartic through a guard's values
// dips below zero the guard is looked at there.
func (w *watch) first(s *span) (over int, at float64) {
	for j := range nodes {
		w.e.guards(s.node(j), s.x[j], s.rate[j], w.value[j])
	}
	over, at = -1, math.Inf(1)
	for k := range w.refs {
		if t, ok := w.passes(s, k); ok && t < at {
			over, at = k, t
		}
	}
	if over < 0 {
		for k := range w.refs {
			w.armed[k] = w.armed[k] || w.value[len(nodes)-1][k] > w.doubt[k]
		}
		w.fresh, w.changed = false, w.changed[:0]
	}
	return over, at
}

// lebesgue is more than the constant of Lebesgue of the nodes, 1.64: a quartic through values
// between lo and hi stays within lebesgue/2·(hi − lo) of their middle.
const lebesgue = 1.7

// passes returns when guard k passes through zero within a span.
func (w *watch) passes(s *span, k int) (float64, bool) {
	var y [len(nodes)]float64
	for j := range nodes {
		y[j] = w.value[j][k]
	}
	armed, below := w.armed[k], -w.doubt[k]
	if end := y[len(y)-1]; !armed && w.fresh && end < below {
		return s.t0, true
	}
	if lo, hi := slices.Min(y[:]), slices.Max(y[:]); lo+hi > lebesgue*(hi-lo) {
		return 0, false
	}
	for j := 0; j+1 < len(y); j++ {
		if armed = armed || y[j] > w.doubt[k]; armed {
			below = 0
		}
		end := s.node(j + 1)
		if !(y[j+1] < below) {
			if end = w.dip(s, k, &y, j); !(w.guard(s, k, end) < below) {
				continue
			}
		}
		return halved(s.node(j), end, func(t float64) bool { return !(w.guard(s, k, t) < below) }), true
	}
	return 0, false
}

// dip returns where between nodes j and j + 1 the quartic through the values y is lowest
// and below zero, else node j.
func (w *watch) dip(s *span, k int, y *[len(nodes)]float64, j int) float64 {
	c := through(y)
	var room [3]float64
	for _, theta := range c.stationary(room[:0]) {
		if theta > nodes[j] && theta < nodes[j+1] && c.at(theta) < 0 {
			return s.t0 + theta*(s.t1-s.t0)
		}
	}
	return s.node(j)
}

// guard returns guard k at t.
func (w *watch) guard(s *span, k int, t float64) float64 {
	s.at(t, w.x, w.rate)
	w.e.guards(t, w.x, w.rate, w.now)
	return w.now[k]
}
