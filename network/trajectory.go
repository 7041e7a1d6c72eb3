package network

import (
	"sort"
)

// A Trajectory is what a march came to: every output as a polynomial of degree 4 in
// each step, with the values on both sides of a jump. Its methods answer as those of
// laplace.Response do. It is never changed after March and may be used from several
// goroutines.
type Trajectory struct {
	times   []float64   // the start of every step, and the end of the last; one more than steps
	curves  [][]quartic // by output, by step
	before  []float64   // the outputs before the start
	breaks  []float64
	miss    []float64 // by output: the largest error that a step was judged to make
	size    []float64 // by output: the largest value
	final   []float64 // by output; nil where the end is not steady
	settled []bool    // by output: whether it is at rest with the rest

	events          []Event
	cautions        []Warned
	balance         float64
	end             *State
	taken, rejected int
}

// Until returns the end of the run: what was asked for, or the instant of an event that
// ended it before, which is then the last of Events.
func (t *Trajectory) Until() float64 { return t.times[len(t.times)-1] }

// Breaks returns the start and every instant after it at which an input jumps, bends or
// begins another law, or at which a part changes its mode, ascending.
func (t *Trajectory) Breaks() []float64 { return append([]float64(nil), t.breaks...) }

// Events returns the changes of mode, in order of time.
func (t *Trajectory) Events() []Event { return append([]Event(nil), t.events...) }

// Cautions returns the first caution of each code of each element.
func (t *Trajectory) Cautions() []Warned { return append([]Warned(nil), t.cautions...) }

// Balance returns by how much the balance of what is stored does not close: the change of
// what an island of the network stores, less the integral of what came in, as a share of
// what moved, for the island where that is largest. The integral is taken over the
// polynomials between the steps, not by the integrator, which keeps its own books exactly:
// so the number tells how good the flows that are shown are. It falls as the tolerance
// does, and is larger where a large conductance makes a flow of a small difference.
func (t *Trajectory) Balance() float64 { return t.balance }

// End returns the state at the end, from which another march can go on.
func (t *Trajectory) End() *State { return t.end }

// Steps returns how many steps were taken, and how many were tried and taken back.
func (t *Trajectory) Steps() (taken, rejected int) { return t.taken, t.rejected }

// Rounding returns an estimate of the error of output out: four times the largest that
// the step control saw one step make in it, and some units in the last place of the
// value. It follows the tolerance. Against closed forms of random linear networks the
// error was a fifteenth of it in the middle, a third in 99 of 100, five times at worst. It
// is no bound: errors of earlier steps die out in a network that settles, and add up in
// one that swings without loss or runs away.
func (t *Trajectory) Rounding(out int) float64 {
	return 4*t.miss[out] + 16*0x1p-52*t.size[out]
}

// Final returns the value to which output out has settled, and false where the run does
// not end at rest: where waves still move, or where rates at the end are such that
// the state could yet go as far as a ten-thousandth of its way.
func (t *Trajectory) Final(out int) (float64, bool) {
	if t.final == nil || !t.settled[out] {
		return 0, false
	}
	return t.final[out], true
}

// stepAt returns the index of the step in force at a time: the last that starts at or
// before it, strictly before it where left is asked for.
func (t *Trajectory) stepAt(at float64, left bool) int {
	n := len(t.times) - 1
	j := sort.Search(n, func(i int) bool { return t.times[i] > at || left && t.times[i] == at }) - 1
	return max(j, 0)
}

// share returns how much of step j has gone by at a time.
func (t *Trajectory) share(j int, at float64) float64 {
	a, b := t.times[j], t.times[j+1]
	switch {
	case at <= a:
		return 0
	case at >= b:
		return 1
	}
	return (at - a) / (b - a)
}

// in returns output out at a time within step j.
func (t *Trajectory) in(out, j int, at float64) float64 {
	return t.curves[out][j].at(t.share(j, at))
}

// At returns output out at a time (s), after a jump where there is one. Before the start
// it is what the output was then; a time beyond the end counts as the end.
func (t *Trajectory) At(out int, at float64) float64 {
	if at < t.times[0] {
		return t.before[out]
	}
	return t.in(out, t.stepAt(at, false), at)
}

// Left returns output out just before a time (s).
func (t *Trajectory) Left(out int, at float64) float64 {
	if at <= t.times[0] {
		return t.before[out]
	}
	return t.in(out, t.stepAt(at, true), at)
}

// Table fills y[m][i] with output m at the times at[i] (s), which ascend, for the first
// len(y) outputs; at a jump the value after it counts. A y[m] that is nil is left out.
// Every y[m] has the length of at.
func (t *Trajectory) Table(at []float64, y [][]float64) {
	if len(y) > len(t.curves) {
		panic("network: a table has more rows than there are outputs")
	}
	for m := range y {
		if y[m] != nil && len(y[m]) != len(at) {
			panic("network: a table takes one value for each time")
		}
	}
	j, last := 0, len(t.times)-2
	for i, when := range at {
		if i > 0 && when < at[i-1] {
			panic("network: the times of a table do not ascend")
		}
		for j < last && t.times[j+1] <= when {
			j++
		}
		for m := range y {
			switch {
			case y[m] == nil:
			case when < t.times[0]:
				y[m][i] = t.before[m]
			default:
				y[m][i] = t.in(m, j, when)
			}
		}
	}
}

// Integral returns ∫ y dt of output out from t0 to t1 (s), exactly that of its
// polynomials. What lies outside the run counts as it does for At.
func (t *Trajectory) Integral(out int, t0, t1 float64) float64 {
	if t1 < t0 {
		return -t.Integral(out, t1, t0)
	}
	sum := 0.0
	first, end := t.times[0], t.Until()
	if t0 < first {
		sum += t.before[out] * (min(t1, first) - t0)
	}
	if t1 > end {
		sum += t.At(out, end) * (t1 - max(t0, end))
	}
	t0, t1 = max(t0, first), min(t1, end)
	if !(t0 < t1) {
		return sum
	}
	for j := t.stepAt(t0, false); j < len(t.times)-1 && t.times[j] < t1; j++ {
		a, b := max(t0, t.times[j]), min(t1, t.times[j+1])
		sum += (t.times[j+1] - t.times[j]) * t.curves[out][j].integral(t.share(j, a), t.share(j, b))
	}
	return sum
}
