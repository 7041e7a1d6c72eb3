package network

import (
	"fmt"
	"math"
)

// A NoValue error says that what is traced has no value at an instant (s).
type NoValue struct{ At float64 }

func (e *NoValue) Error() string { return fmt.Sprintf("network: no value at %v s", e.At) }

const (
	traceDepth  = 30     // halvings of a stretch: a bend is then known to a thousand-millionth of it
	tracePieces = 40_000 // of all stretches together, beyond which none is halved
	leastPieces = 100    // of one stretch, whatever there are of them
)

// Trace returns one quantity that is known at every instant, output 0, as a Trajectory: as
// a polynomial of degree 4 on each part of the stretches between cuts (s, ascending, at
// least two) that is short enough for it to be within tol, as a share of the largest value
// met, of the quantity between the instants that it was taken from. at returns the quantity
// at an instant, left just before it; no cut may be missing at which it jumps. What
// moves only between those instants is missed: the stretches should be such that nothing does.
//
// Rounding of the Trajectory is four times the largest error found: what is not smooth
// anywhere, as noise, is not followed down to tol. The error is *NoValue, where y is not finite.
func Trace(cuts []float64, tol float64, at, left func(t float64) float64) (*Trajectory, error) {
	r := &tracer{tol: tol, at: at, left: left, t: &Trajectory{times: cuts[:1:1], curves: make([][]quartic, 1), breaks: cuts[:1:1],
		before: []float64{left(cuts[0])}, miss: make([]float64, 1), size: make([]float64, 1)}}
	for _, t := range cuts { // so that what begins with nothing is not followed further than all else
		r.t.size[0] = max(r.t.size[0], math.Abs(r.value(t)))
	}
	for k, b := range cuts[1:] {
		r.from, r.to = cuts[k], b
		if !(r.from < b) {
			continue
		}
		r.room = len(r.t.times) + max(leastPieces, tracePieces/len(cuts))
		if r.stretch(r.from, b, traceDepth); r.err != nil {
			return nil, r.err
		}
		r.t.breaks = append(r.t.breaks, b)
	}
	if n := len(r.t.times); n == 1 { // a run of no length
		v := r.value(cuts[0])
		r.t.curves[0], r.t.size[0] = []quartic{{v}}, math.Abs(v)
		r.t.times = append(r.t.times, cuts[0])
	}
	return r.t, r.err
}

type tracer struct {
	t        *Trajectory
	at, left func(t float64) float64
	from, to float64 // the stretch
	tol      float64
	room     int // pieces up to which the stretch is halved
	err      error
}

// value is the quantity within the stretch: after a jump at its start, before one at its end.
func (r *tracer) value(t float64) float64 {
	y := r.at
	if t >= r.to && r.to > r.from {
		y = r.left
	}
	v := y(t)
	if (math.IsNaN(v) || math.IsInf(v, 0)) && r.err == nil {
		r.err = &NoValue{At: t}
	}
	return v
}

// stretch keeps a part of the stretch, in halves where one polynomial does not do.
func (r *tracer) stretch(a, b float64, depth int) {
	var y [len(nodes)]float64
	for k, theta := range nodes {
		y[k] = r.value(min(a+theta*(b-a), b))
		r.t.size[0] = max(r.t.size[0], math.Abs(y[k]))
	}
	c := through(&y)
	off := 0.0
	for _, theta := range offNodes {
		off = max(off, math.Abs(r.value(a+theta*(b-a))-c.at(theta)))
	}
	if r.err != nil {
		return
	}
	if m := a + (b-a)/2; off > r.tol*r.t.size[0] && depth > 0 && len(r.t.times) < r.room && m > a && m < b {
		r.stretch(a, m, depth-1)
		r.stretch(m, b, depth-1)
		return
	}
	r.t.miss[0] = max(r.t.miss[0], off)
	r.t.curves[0], r.t.times = append(r.t.curves[0], c), append(r.t.times, b)
}
