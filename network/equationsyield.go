package network

import "math"

// A thrust is what drives the levels of nodes away without bound, for nothing open takes
// what flows in: how far each goes, as a share of the one that goes furthest.
type thrust struct {
	nodes []NodeID
	along []float64
}

// yields finds the guard that gives way first where something presses into what is shut: a
// source, a pump or the column of an inertance before a check valve, a relief valve, a
// pump that a pressure switches off. The levels of such nodes move at once until one is
// violated; x has them there then. Call next for it and enter again.
func (e *equations) yields(t float64, x []float64) (ref guardRef, ok bool) {
	for k := range e.top.kept {
		m := &e.top.kept[k]
		net, _ := e.presses(m, x)
		if net == 0 {
			continue
		}
		push := thrust{nodes: m.whole}
		for range m.whole {
			push.along = append(push.along, math.Copysign(1, net))
		}
		if ref, ok = e.giving(t, x, push); ok {
			return ref, true
		}
	}
	if e.rest || len(e.top.joints) == 0 {
		return ref, false
	}
	return e.giving(t, x, e.stopping(t, x))
}

// leastStop is the share of its size that a flow must have for its stop to open anything:
// less is what is left of one that has been stopped.
const leastStop = 1e-6

// stopping is the thrust of inertances whose flows do not fit one another any more.
func (e *equations) stopping(t float64, x []float64) (push thrust) {
	lambda, _ := e.missing(t, x)
	size := make([]float64, len(x))
	some := false
	for k := range lambda {
		if lambda[k] == 0 {
			continue
		}
		if !some {
			e.scale(x, size)
			e.fill(t, x)
		}
		most := 0.0
		for _, end := range e.top.joints[k].ends {
			most = max(most, size[e.l.flow[end.b]])
		}
		some = some || math.Abs(lambda[k]) > leastStop*most
	}
	if !some || e.impulses(lambda, nil) != nil {
		return push
	}
	most := 0.0
	for _, v := range lambda {
		most = max(most, math.Abs(v))
	}
	for k, v := range lambda {
		if most > 0 && math.Abs(v) > 1e-9*most {
			for _, n := range e.top.joints[k].nodes {
				push.nodes, push.along = append(push.nodes, n), append(push.along, v/most)
			}
		}
	}
	return push
}

// How far levels are driven, in the size of those around.
const (
	leastThrust = 1e-9
	mostThrust  = 1e9
)

// giving moves levels along a thrust until a guard at one of its nodes is violated.
func (e *equations) giving(t float64, x []float64, push thrust) (ref guardRef, ok bool) {
	some := e.yielders(push.nodes)
	if len(some) == 0 {
		return ref, false
	}
	span := 0.0
	e.fill(t, x)
	for i, at := range e.l.level {
		if e.part[i] == e.part[push.nodes[0]] {
			span = max(span, math.Abs(e.z[at]))
		}
	}
	if span == 0 {
		span = 1
	}
	from := make([]float64, len(push.nodes))
	for i, n := range push.nodes {
		from[i] = x[e.l.level[n]]
	}
	move := func(by float64) (guardRef, bool) {
		for i, n := range push.nodes {
			x[e.l.level[n]] = from[i] + by*push.along[i]
		}
		return e.violated(t, x, some)
	}
	if ref, ok = move(0); ok {
		return ref, true
	}
	low, high := 0.0, leastThrust*span
	for ref, ok = move(high); !ok && high < mostThrust*span; ref, ok = move(high) {
		low, high = high, 10*high
	}
	if !ok {
		move(0)
		return ref, false
	}
	high = halved(low, high, func(by float64) bool { _, is := move(by); return !is })
	if ref, ok = move(high); !ok {
		move(0)
	}
	return ref, ok
}

// yielders lists the elements with modes that touch some nodes and that no gate shuts.
func (e *equations) yielders(nodes []NodeID) (list []int) {
	near := make([]bool, len(e.g.nodes))
	for _, n := range nodes {
		near[n] = true
	}
	for k := range e.law {
		s := &e.law[k]
		if s.switching == nil || s.gate != none && e.courses[int(s.gate)-e.l.size].shuts() {
			continue
		}
		for _, n := range e.g.elements[k].Ports {
			if near[n] {
				list = append(list, k)
				break
			}
		}
	}
	return list
}

// shuts tells whether a drive with this course shuts a gate for all of the stretch.
func (c *course) shuts() bool { return c.constant() && c.a == 0 }

// violated returns the first guard among those of some elements that is violated at x.
func (e *equations) violated(t float64, x []float64, some []int) (guardRef, bool) {
	e.fill(t, x)
	e.slopes(t)
	var g [maxGuards]float64
	for _, k := range some {
		s := &e.law[k]
		count := s.switching.Guards(e.heed(s, nil), g[:])
		for i, v := range g[:count] {
			if v < 0 {
				return guardRef{ElementID(k), i}, true
			}
		}
	}
	return guardRef{}, false
}
