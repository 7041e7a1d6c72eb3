package study

import (
	"math"
	"slices"
	"sort"

	"lagbook/laplace"
	"lagbook/network"
)

// An integral is the integral of an output over time, from a start on; before it is 0. Its
// value is the closed form of the output's integral, or that of a march's polynomials. It
// is monotone between the instants at which the output changes its sign, which are roots
// of the output: so its extremes are among its values there, and crossings are bracketed.
type integral struct {
	of     *resulting
	src    int
	from   float64
	times  []float64 // ascending; between two neighbours it is monotone and without a jump
	sums   []float64 // the integral at each, after what jumps there
	jumps  []float64 // at each: what an impulse of the output brings
	slack  float64
	capped bool // not all changes of sign were looked for
}

// mostSignChanges bounds the changes of sign that are looked for.
const mostSignChanges = 10_000

func newIntegral(r *resulting, src int, from, t0, t1 float64) *integral {
	x := &integral{of: r, src: src, from: from}
	x.times = []float64{t0, t1}
	if from > t0 && from < t1 {
		x.times = append(x.times, from)
	}
	for _, t := range r.Breaks() {
		if t > from && t < t1 {
			x.times = append(x.times, t)
		}
	}
	impulses := impulsesIn(r, src, from, t1)
	for _, p := range impulses {
		x.times = append(x.times, p.T)
	}
	var turns []float64
	turns, x.capped = changesOfSign(r, src, min(from, t1), t1)
	x.times = append(x.times, turns...)
	slices.Sort(x.times)
	x.times = slices.Compact(x.times)
	x.sums, x.jumps = make([]float64, len(x.times)), make([]float64, len(x.times))
	for _, p := range impulses {
		k, _ := slices.BinarySearch(x.times, p.T)
		x.jumps[k] += p.Weight
	}
	x.sums[0] = x.jumps[0]
	for k := 1; k < len(x.times); k++ {
		x.sums[k] = x.sums[k-1] + x.over(x.times[k-1], x.times[k]) + x.jumps[k]
	}
	x.slack = r.Rounding(src)*(t1-min(from, t1)) + 8*0x1p-52*largest(x.sums)
	return x
}

// changesOfSign are the instants in [t0, t1] at which an output becomes positive or
// negative after it was the other, or nothing.
func changesOfSign(of answers, out int, t0, t1 float64) (list []float64, capped bool) {
	none, side := math.Inf(1), 0
	for at := t0; ; {
		if len(list) >= mostSignChanges {
			return list, true
		}
		var up, down laplace.Root
		var rises, falls bool
		if side <= 0 {
			up, rises = of.FirstOutside(out, -none, 0, at, t1)
		}
		if side >= 0 {
			down, falls = of.FirstOutside(out, 0, none, at, t1)
		}
		if rises && up.Capped || falls && down.Capped {
			return list, true
		}
		switch {
		case rises && (!falls || up.T <= down.T):
			at, side = up.T, 1
		case falls:
			at, side = down.T, -1
		default:
			return list, false
		}
		list = append(list, at)
	}
}

// over integrates from a to b, of what lies after the start.
func (x *integral) over(a, b float64) float64 {
	if a = max(a, x.from); !(a < b) {
		return 0
	}
	return x.of.Integral(x.src, a, b)
}

func (x *integral) At(_ int, t float64) float64 {
	t = min(t, x.times[len(x.times)-1])
	k := sort.Search(len(x.times), func(i int) bool { return x.times[i] > t }) - 1
	if k < 0 {
		return 0
	}
	return x.sums[k] + x.over(x.times[k], t)
}

func (x *integral) Left(_ int, t float64) float64 {
	y := x.At(0, t)
	if k, ok := slices.BinarySearch(x.times, t); ok {
		y -= x.jumps[k]
	}
	return y
}

func (x *integral) Table(at []float64, y [][]float64) {
	for i, t := range at {
		y[0][i] = x.At(0, t)
	}
}

// A stretch is a part of an integral that is monotone.
type stretch struct{ a, b, ya, yb, next float64 } // next: after a jump at b

// stretches are those in [t0, t1], in order.
func (x *integral) stretches(t0, t1 float64) []stretch {
	t0, t1 = max(t0, x.times[0]), min(t1, x.times[len(x.times)-1])
	if t0 > t1 {
		return nil
	}
	list := []stretch{{a: t0, ya: x.At(0, t0)}}
	end := func(t, y, next float64) { s := &list[len(list)-1]; s.b, s.yb, s.next = t, y, next }
	for k, t := range x.times {
		if t > t0 && t < t1 {
			end(t, x.sums[k]-x.jumps[k], x.sums[k])
			list = append(list, stretch{a: t, ya: x.sums[k]})
		}
	}
	end(t1, x.Left(0, t1), x.At(0, t1))
	if t0 == t1 {
		list[0].yb = list[0].ya
	}
	return list
}

func (x *integral) Max(_ int, t0, t1 float64) laplace.Extreme { return x.extreme(t0, t1, +1) }
func (x *integral) Min(_ int, t0, t1 float64) laplace.Extreme { return x.extreme(t0, t1, -1) }

func (x *integral) extreme(t0, t1, sign float64) laplace.Extreme {
	best := laplace.Extreme{T: t0, Y: x.At(0, t0), Capped: x.capped}
	offer := func(t, y float64, left bool) {
		if sign*(y-best.Y) > x.slack/4 {
			best.T, best.Y, best.AtLeft = t, y, left
		}
	}
	for _, s := range x.stretches(t0, t1) {
		offer(s.b, s.yb, s.next != s.yb)
		offer(s.b, s.next, false)
	}
	return best
}

// where returns the first instant of (a, b] at which holds does, given that it does not at
// a and goes on to once it does.
func where(a, b float64, holds func(t float64) bool) laplace.Root {
	for {
		m := a + (b-a)/2
		if m == a || m == b {
			return laplace.Root{T: b, Lo: a, Hi: b}
		}
		if holds(m) {
			b = m
		} else {
			a = m
		}
	}
}

func (x *integral) First(_ int, level, t0, t1 float64) (laplace.Root, bool) {
	for _, s := range x.stretches(t0, t1) {
		below := s.ya < level
		switch {
		case s.ya == level:
			return laplace.Root{T: s.a, Lo: s.a, Hi: s.a}, true
		case s.yb == level || s.yb < level != below:
			return where(s.a, s.b, func(t float64) bool { y := x.Left(0, t); return y == level || y < level != below }), true
		case s.next == level || s.next < level != below:
			return laplace.Root{T: s.b, Lo: s.b, Hi: s.b}, true
		}
	}
	return laplace.Root{}, false
}

func (x *integral) FirstOutside(_ int, lo, hi, t0, t1 float64) (laplace.Root, bool) {
	beyond := func(y float64) bool { return y > hi+x.slack || y < lo-x.slack }
	for _, s := range x.stretches(t0, t1) {
		switch {
		case beyond(s.ya):
			return laplace.Root{T: s.a, Lo: s.a, Hi: s.a}, true
		case beyond(s.yb):
			return where(s.a, s.b, func(t float64) bool { return beyond(x.Left(0, t)) }), true
		case beyond(s.next):
			return laplace.Root{T: s.b, Lo: s.b, Hi: s.b}, true
		}
	}
	return laplace.Root{}, false
}

func (x *integral) LastOutside(_ int, mid, band, t0, t1 float64) (laplace.Root, bool) {
	beyond := func(y float64) bool { return math.Abs(y-mid) > band+x.slack }
	list := x.stretches(t0, t1)
	for k := len(list) - 1; k >= 0; k-- {
		switch s := list[k]; {
		case beyond(s.next), beyond(s.yb):
			return laplace.Root{T: s.b, Lo: s.b, Hi: s.b}, true
		case beyond(s.ya):
			return where(s.a, s.b, func(t float64) bool { return !beyond(x.Left(0, t)) }), true
		}
	}
	return laplace.Root{}, false
}

// MaxRate is the largest value of the output.
func (x *integral) MaxRate(_ int, t0, t1 float64) laplace.Extreme {
	return x.rate(x.of.Max, t0, t1, +1)
}

// MinRate is its smallest value.
func (x *integral) MinRate(_ int, t0, t1 float64) laplace.Extreme {
	return x.rate(x.of.Min, t0, t1, -1)
}

func (x *integral) rate(of func(out int, t0, t1 float64) laplace.Extreme, t0, t1, sign float64) laplace.Extreme {
	if t1 <= x.from {
		return laplace.Extreme{T: t0}
	}
	e := of(x.src, max(t0, x.from), t1)
	if t0 < x.from && sign*e.Y < 0 {
		return laplace.Extreme{T: t0} // before it begins it stands still
	}
	return e
}

// Integral is that of polynomials through its values: it has no closed form here.
func (x *integral) Integral(_ int, t0, t1 float64) float64 {
	cuts := []float64{min(t0, t1)}
	for _, t := range x.times {
		if t > cuts[0] && t < max(t0, t1) {
			cuts = append(cuts, t)
		}
	}
	cuts = append(cuts, max(t0, t1))
	r, err := network.Trace(cuts, expressionNoise, func(t float64) float64 { return x.At(0, t) }, func(t float64) float64 { return x.Left(0, t) })
	if err != nil {
		panic("study: an integral has a value at every instant")
	}
	return r.Integral(0, t0, t1)
}

// Final is unknown: what an output that comes to rest at 0 brings is not summed to the end.
func (x *integral) Final(int) (float64, bool) { return 0, false }

func (x *integral) Rounding(int) float64 { return x.slack }

func (x *integral) Breaks() []float64 { return x.of.Breaks() }
