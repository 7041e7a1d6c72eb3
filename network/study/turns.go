package study

import (
	"math"
	"slices"

	"lagbook/network"
)

const (
	phasesKept   = 64   // instants of a period at which periods are compared
	closeToCycle = 1e-5 // what may be left of the way to the cycle, as a share of the swing
	restOfMarch  = 1e-6 // a change as small as this share of a value is the march's own error
)

// A turn is one period of a march: the outputs at instants spread over it, and the state
// at its end.
type turn struct {
	y  [][]float64 // by output, at phasesKept instants, then the highest and the lowest
	at *network.State
}

// takeTurn samples one period.
func takeTurn(run *network.Trajectory, at *network.State, outs int, t0, t1 float64) turn {
	times := make([]float64, phasesKept)
	for i := range times {
		times[i] = t0 + (t1-t0)*float64(i)/phasesKept
	}
	y := make([][]float64, outs)
	for k := range y {
		y[k] = make([]float64, phasesKept, phasesKept+2)
	}
	run.Table(times, y)
	for k := range y {
		y[k] = append(y[k], run.Max(k, t0, t1).Y, run.Min(k, t0, t1).Y)
	}
	return turn{y, at}
}

func swingOf(y []float64) float64 { return y[phasesKept] - y[phasesKept+1] }

// settledTurns reports whether every output, and every number of the state itself, has
// come to its cycle or moves on by the same in every period.
func settledTurns(outs []shown, turns []turn) bool {
	n := len(turns)
	if n < 4 {
		return false
	}
	for _, w := range outs {
		if drift(w, turns) != 0 {
			continue
		}
		y := turns[n-1].y[w.out]
		slack := closeToCycle*swingOf(y) + restOfMarch*largest(y) + 1e-3*speck(w.unit)
		if stillToGo(apart(y, turns[n-2].y[w.out]), apart(turns[n-2].y[w.out], turns[n-3].y[w.out])) > slack {
			return false
		}
	}
	return settledStates(turns)
}

// stillToGo is what is left of the way where the last changes were now and before.
func stillToGo(now, before float64) float64 {
	r := 0.0
	if before > 0 {
		r = now / before
	}
	if r > 0.9999 {
		return now * 1e4
	}
	return now / (1 - r)
}

// settledStates looks at the levels, flows and unknowns at the ends of the periods: one
// that nothing shown depends on for a while, such as what has melted, must have come to
// its cycle too. A sum that goes on growing by the same counts as settled.
func settledStates(turns []turn) bool {
	n := len(turns)
	a, b, c := numbersOf(turns[n-1].at), numbersOf(turns[n-2].at), numbersOf(turns[n-3].at)
	first, second := numbersOf(turns[0].at), numbersOf(turns[1].at)
	for i := range a {
		now, before := a[i]-b[i], b[i]-c[i]
		slack := closeToCycle*math.Abs(second[i]-first[i]) + restOfMarch*math.Abs(a[i])
		if math.Abs(now) > slack && math.Abs(now-before) > 1e-6*math.Abs(now) {
			return false
		}
	}
	return true
}

func numbersOf(s *network.State) []float64 {
	list := slices.Concat(s.Levels, s.Flows)
	for _, u := range s.Unknowns {
		list = append(list, u...)
	}
	return list
}

// apart is the largest distance of two turns of an output, largest that of one from 0.
func apart(a, b []float64) float64 {
	most := 0.0
	for i := range a {
		most = math.Max(most, math.Abs(a[i]-b[i]))
	}
	return most
}

func largest(a []float64) float64 {
	most := 0.0
	for _, v := range a {
		most = math.Max(most, math.Abs(v))
	}
	return most
}

// drift is what an output moves on by in every period alike, 0 where it does not.
func drift(w shown, turns []turn) float64 {
	n := len(turns)
	at := func(k int) []float64 { return turns[n-k].y[w.out] }
	by := at(1)[0] - at(2)[0]
	if by == 0 || math.Abs(by) < restOfMarch*largest(at(1)) {
		return 0
	}
	for k := 1; k <= 2; k++ {
		for i := range phasesKept {
			if math.Abs(at(k)[i]-at(k + 1)[i]-by) > 1e-6*math.Abs(by) {
				return 0
			}
		}
	}
	return by
}

// countTurns counts periods from the start until every later one is within nearCycle of
// the swing of the cycle; nil for an output that does not move. It is false where the last
// one is not.
func countTurns(w shown, turns []turn, cycle turn) (count *float64, ok bool) {
	last := cycle.y[w.out]
	band := nearCycle * swingOf(last)
	if band <= restOfMarch*largest(last)+1e-3*speck(w.unit) {
		return nil, true
	}
	k := len(turns)
	for k > 0 && apart(turns[k-1].y[w.out], last) <= band {
		k--
	}
	if k == len(turns) {
		return nil, false
	}
	n := float64(k)
	return &n, true
}

// cycleIn reads the cycle of an output off a period of a march.
func cycleIn(run *network.Trajectory, w shown, t0, period float64, count *float64) Cycle {
	hi, lo := run.Max(w.out, t0, t0+period), run.Min(w.out, t0, t0+period)
	mean := run.Integral(w.out, t0, t0+period) / period
	return Cycle{Output: w.name, Unit: w.unit, Kind: w.kind, Period: period, Max: hi.Y, MaxAt: hi.T - t0, Min: lo.Y, MinAt: lo.T - t0,
		Mean: min(max(mean, lo.Y), hi.Y), Cycles: count}
}

// differenceOf is the kind of a difference of two values of a kind.
func differenceOf(kind string) string {
	if kind == kindLevel || kind == kindGauge || kind == kindAbsolute {
		return kindDifference
	}
	return kind
}
