package network

import (
	"math"

	"lagbook/laplace"
)

func rootAt(t float64, touch bool) laplace.Root {
	return laplace.Root{T: t, Lo: t, Hi: t, Touch: touch}
}

// between reports that a level lies between two values or is one of them.
func between(level, a, b float64) bool { return a <= level && level <= b || b <= level && level <= a }

// First returns the first instant in [t0, t1] (s) at which output out crosses or touches
// level, t0 itself where it starts there; a jump across the level counts at the instant
// of the jump. The bracket closes to the last unit of the time. An extremum within
// Rounding of the level that does not reach it, or that passes it by less, is a Touch.
func (t *Trajectory) First(out int, level, t0, t1 float64) (laplace.Root, bool) {
	var found laplace.Root
	var ok bool
	tol, side := t.Rounding(out), 0.0
	var turned part // the part before, where an extremum may follow
	t.parts(out, t0, t1, +1, func(p *part) bool {
		d := p.ya - level
		switch {
		case d == 0 || side*d < 0:
			found, ok = rootAt(p.a, false), true
		case between(level, p.ya, p.yb):
			at, lo, hi := p.crossing(level)
			found, ok = laplace.Root{T: at, Lo: lo, Hi: hi}, true
		case p.first && math.Abs(d) <= min(tol, 1e-10*t.size[out]):
			found, ok = rootAt(p.a, true), true
		case turned.c != nil && math.Abs(d) <= tol && turns(&turned, p, level):
			found, ok = rootAt(p.a, true), true
		case p.last && math.Abs(p.yb-level) <= tol && math.Abs(p.yb-level) <= math.Abs(d):
			found, ok = rootAt(p.b, true), true
		}
		side, turned = math.Copysign(1, p.yb-level), *p
		return !ok
	})
	return found, ok
}

// turns reports that between two parts the output has an extremum towards a level.
func turns(before, after *part, level float64) bool {
	towards := math.Copysign(1, level-after.ya)
	return towards*(before.yb-before.ya) > 0 && towards*(after.yb-after.ya) <= 0
}

// FirstOutside returns the first instant in [t0, t1] (s) at which output out leaves
// [lo, hi]; false where it never does. lo may be −Inf and hi +Inf. An excursion within
// Rounding of the limit does not count.
func (t *Trajectory) FirstOutside(out int, lo, hi, t0, t1 float64) (laplace.Root, bool) {
	return t.outside(out, lo, hi, t0, t1, +1)
}

// LastOutside returns the last instant in [t0, t1] (s) at which |y − mid| > band for
// output out, which is when it comes back for good; false where it is never outside.
// Touch says that an extremum meets the edge of the band within Rounding after T, at Hi:
// the truth may be either.
func (t *Trajectory) LastOutside(out int, mid, band, t0, t1 float64) (laplace.Root, bool) {
	return t.outside(out, mid-band, mid+band, t0, t1, -1)
}

// outside finds the first point outside [lo, hi] from either end of [t0, t1].
func (t *Trajectory) outside(out int, lo, hi, t0, t1 float64, step int) (laplace.Root, bool) {
	var found laplace.Root
	var ok bool
	tol, grazed := t.Rounding(out), math.NaN()
	beyond := func(y float64) bool { return y > hi+tol || y < lo-tol }
	t.parts(out, t0, t1, step, func(p *part) bool {
		near, far, yn, yf := p.a, p.b, p.ya, p.yb
		if step < 0 {
			near, far, yn, yf = p.b, p.a, p.yb, p.ya
		}
		switch {
		case beyond(yn):
			found, ok = rootAt(near, false), true
		case beyond(yf):
			top, bottom := max(hi, yn), min(lo, yn) // it may start outside by less than tol
			out := halved(near, far, func(t float64) bool { y := p.at(t); return bottom <= y && y <= top })
			in := math.Nextafter(out, near)
			found, ok = laplace.Root{T: out, Lo: min(in, out), Hi: max(in, out)}, true
		default:
			if math.IsNaN(grazed) && (math.Abs(yf-hi) <= tol || math.Abs(yf-lo) <= tol) {
				grazed = far
			}
		}
		return !ok
	})
	if ok && float64(step)*(grazed-found.T) < 0 {
		found.Touch = true
		found.Lo, found.Hi = min(found.Lo, grazed), max(found.Hi, grazed)
	}
	return found, ok
}
