package laplace

import (
	"fmt"
	"math"
)

// fewTimes is up to how many times of a window are all checked.
const fewTimes = 6

// window answers ascending times that share a contour. last is the last time of
// all, up to which a check need not reach farther.
func (v *inversion) window(order []int, last float64) {
	lo, hi := v.times[order[0]], v.times[order[len(order)-1]]
	few := len(order) <= chebyshevPoints || hi <= lo*(1+1e-6)
	sample := make([]float64, 0, chebyshevPoints)
	if few {
		for _, i := range order {
			sample = append(sample, v.times[i])
		}
	} else {
		sample = chebyshevTimes(lo, hi)
	}
	tr := v.trace(lo, hi, sample)
	gap, size := v.gap(sample, tr, last)
	missed, fast := v.unresolved(lo, hi, shortReach)
	if fast != "" || !(2*gap+tr.own <= v.o.Tolerance*v.rangeWith(size)) {
		v.arbitrate(order, hi, tr)
		return
	}
	v.span = max(v.span, size)
	v.settle(order, sample, tr, 2*gap+tr.own+missed)
}

// gap compares the contour with the series at some of the sample times: at all
// where they are few. The error of a contour and its failure at a delay both are
// largest at the ends of a window.
func (v *inversion) gap(sample []float64, tr traced, last float64) (gap, size float64) {
	if math.IsInf(tr.own, 1) {
		return tr.own, 0
	}
	step := 1
	if len(sample) > fewTimes {
		step = (len(sample) + 4) / 5
	}
	hi := max(sample[0], sample[len(sample)-1])
	f := v.series(min(sample[0], sample[len(sample)-1]), hi, last)
	for i := range sample {
		if i%step == 0 || i == len(sample)-1 {
			gap = worse(gap, math.Abs(tr.y[i]-f.at(sample[i])))
		}
		size = max(size, math.Abs(tr.y[i]))
	}
	return gap, size
}

// series returns the check for times of [lo, hi], kept while it serves.
func (v *inversion) series(lo, hi, last float64) *fourierSeries {
	if f := v.check; f != nil && hi <= f.until && lo*checkRatio >= f.until {
		return f
	}
	v.check = newFourierSeries(v.g, v.o.Abscissa, max(hi, min(last, lo*checkRatio)), checkShape)
	return v.check
}

// settle fills in the answers of a window in which the methods agree.
func (v *inversion) settle(order []int, sample []float64, tr traced, err float64) {
	lo, hi := v.times[order[0]], v.times[order[len(order)-1]]
	e := Estimate{Error: err, Trusted: true}
	if len(order) == len(sample) {
		for k, i := range order {
			e.Y = tr.y[k]
			v.out[i] = e
		}
		return
	}
	c, tail := chebyshevSeries(tr.y)
	if tail <= v.goal(0) {
		e.Error += tail
		for _, i := range order {
			e.Y = clenshaw(c, (2*v.times[i]-lo-hi)/(hi-lo))
			v.out[i] = e
		}
		return
	}
	for _, i := range order {
		e.Y, _ = tr.s.at(v.times[i])
		v.out[i] = e
	}
}

// Radians at the time beyond which an oscillation is missed by both of a contour of
// few points and the check (40 terms over 8.8 of the time), and by each of the methods
// that arbitrate weighs: 120 terms over 2.4 of the time, 200 over 1.7, 34 over 2.
const (
	shortReach   = 20
	contourReach = 20
	seriesReach  = 250
	eulerReach   = 90
)

// candidate is a value of one method, its own estimate of the error, and how many
// radians at the time the method follows.
type candidate struct {
	y, own, reach float64
	least         float64 // part of the range: aliasing and rounding, which two orders may share
}

// soloFactor widens the disagreement of two orders of one method where it stands for
// the error: with it every error was covered at 4349 random times of six waves with
// jumps where the series stood alone.
const soloFactor = 100

// arbitrate answers the times of a window one by one, where contour and check do not
// agree on all of it or may both miss an oscillation.
func (v *inversion) arbitrate(order []int, hi float64, tr traced) {
	a := newFourierSeries(v.g, v.o.Abscissa, hi, longShapes[0])
	b := newFourierSeries(v.g, v.o.Abscissa, hi, longShapes[1])
	for _, i := range order {
		v.out[i] = v.weigh(v.times[i], a, b, tr)
	}
}

// weigh weighs three methods at one time.
func (v *inversion) weigh(t float64, a, b *fourierSeries, tr traced) Estimate {
	three := [3]candidate{v.contourCandidate(t, tr), seriesCandidate(a, b, t, v.rangeWith(0)), v.eulerCandidate(t)}
	e, reach := agree(three, v.rangeWith(0))
	own, alone := soloFactor*three[1].own+three[1].least*v.rangeWith(0), false
	if own < e.Error && e.Error > v.o.Tolerance*v.rangeWith(math.Abs(e.Y)) {
		e, reach, alone = Estimate{Y: three[1].y, Error: own}, seriesReach, true
	}
	if e.Error <= 1e-3*math.Abs(e.Y) {
		v.span = max(v.span, math.Abs(e.Y))
	}
	if e.Trusted = !alone; alone {
		e.Note = "only the accelerated Fourier series converges here; the error is its own estimate"
	}
	missed, note := v.unresolved(t, t, reach)
	if e.Error += missed; note != "" {
		e.Trusted, e.Note = false, note
	}
	if jump, size := jumps(b, t, v.o.Tolerance*v.rangeWith(math.Abs(e.Y))); jump {
		e.Error, e.Trusted = e.Error+size, false
		e.Note = fmt.Sprintf("the response seems to jump by about %.3g near this instant", size)
	}
	if math.IsInf(e.Error, 1) && e.Note == "" {
		e.Trusted, e.Note = false, "no two methods find a value"
	}
	return e
}

func (v *inversion) contourCandidate(t float64, tr traced) candidate {
	if math.IsInf(tr.own, 1) {
		return candidate{own: tr.own}
	}
	y, _ := tr.s.at(t)
	return candidate{y, tr.own, contourReach, 0}
}

// seriesCandidate takes the longer series, but once both have converged the one with
// the smaller aliasing.
func seriesCandidate(a, b *fourierSeries, t, span float64) candidate {
	y, z := a.at(t), b.at(t)
	d := worse(0, math.Abs(y-z))
	if d <= 3*longShapes[1].alias*span {
		z = y
	}
	return candidate{z, d, seriesReach, longShapes[1].alias}
}

func (v *inversion) eulerCandidate(t float64) candidate {
	var y [len(eulerOrders)]float64
	for i, m := range eulerOrders {
		if v.euler[i] == nil {
			v.euler[i] = newEulerSum(m)
		}
		y[i] = v.euler[i].at(v.g, v.o.Abscissa, t)
	}
	return candidate{y[1], worse(0, math.Abs(y[1]-y[0])), eulerReach, eulerRounding}
}

// agree returns the value of the two methods that agree best, of these the one
// with the smaller error of its own, and how far the two of them reach.
func agree(o [3]candidate, span float64) (best Estimate, reach float64) {
	best.Error = math.Inf(1)
	for i, a := range o {
		for _, b := range o[i+1:] {
			if a.own > b.own {
				a, b = b, a
			}
			if err := 2*math.Abs(a.y-b.y) + a.own + a.least*span; err < best.Error {
				best, reach = Estimate{Y: a.y, Error: err}, max(a.reach, b.reach)
			}
		}
	}
	return best, reach
}

// jumps tells whether the series rises by more than tol across t and the rise does
// not shrink with the distance, as that of a smooth response would.
func jumps(f *fourierSeries, t, tol float64) (bool, float64) {
	wide := math.Abs(f.at(1.04*t) - f.at(0.96*t))
	small := math.Abs(f.at(1.01*t) - f.at(0.99*t))
	return small > 10*tol && small > 0.6*wide, small
}
