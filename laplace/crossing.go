package laplace

import "math"

// window is the part of one piece that a search looks at.
type window struct {
	c    *curve
	l, r jet  // jets at the ends, l.t ≤ r.t
	more bool // another window follows on the right
}

// windows calls visit for the parts of the pieces that overlap [t0, t1], from the
// left or, with step −1, from the right, until visit returns false. The right end
// of a window holds the value before the jump that may follow.
func (r *Response) windows(out int, t0, t1 float64, step int, left *int, visit func(w *window) bool) {
	t0, t1 = max(t0, 0), min(t1, r.until)
	if !(t0 <= t1) {
		return
	}
	first, last := r.pieceAt(t0, false), r.pieceAt(t1, false)
	j, end := first, last+1
	if step < 0 {
		j, end = last, first-1
	}
	for ; j != end; j += step {
		p := r.piece(j)
		c := r.curve(p, out)
		a, b := max(t0-p.t0, 0), min(t1-p.t0, p.length)
		w := &window{c: c, l: c.jet(a), more: j < last}
		w.r = w.l
		if b > a {
			w.r = c.jet(b)
		}
		*left -= 2
		if !visit(w) {
			return
		}
	}
}

// from moves a root from the piece's time to the response's.
func (c *curve) from(x Root) Root {
	x.T += c.t0
	x.Lo += c.t0
	x.Hi += c.t0
	return x
}

// First returns the first instant in [t0, t1] at which output out crosses or
// touches level, t0 itself where it starts there; a jump across the level counts
// at the instant of the jump. Crossings have full accuracy: the bracket closes to
// the last unit of the time. An output that only comes within rounding of the
// level, as one that tends towards it for ever does, is reported as a Touch.
func (r *Response) First(out int, level, t0, t1 float64) (Root, bool) {
	left, tol := MaxEvaluations, r.Rounding(out)
	var found Root
	var ok bool
	side := 0.0
	r.windows(out, t0, t1, +1, &left, func(w *window) bool {
		d := w.l.y() - level
		if d == 0 || opposite(side, d) {
			found, ok = w.c.from(Root{T: w.l.t, Lo: w.l.t, Hi: w.l.t}), true
			return false
		}
		side = d
		s := &scan{c: w.c, step: +1, sign: -math.Copysign(1, d), level: level, tol: tol, touches: true, left: &left}
		if found, ok = s.reach(&w.l, &w.r); ok {
			found = w.c.from(found)
			return false
		}
		return true
	})
	return found, ok
}

// FirstOutside returns the first instant in [t0, t1] at which output out leaves
// [lo, hi]; false where it never does. lo may be −Inf and hi +Inf. An excursion
// within rounding (Rounding) of the limit does not count.
func (r *Response) FirstOutside(out int, lo, hi, t0, t1 float64) (Root, bool) {
	return r.outside(out, lo, hi, t0, t1, +1)
}

// LastOutside returns the last instant in [t0, t1] at which |y − mid| > band for
// output out, which is when it comes back for good; false where it is never
// outside. Touch says that an extremum meets the edge of the band within rounding
// after T, at Hi: the truth may be either.
func (r *Response) LastOutside(out int, mid, band, t0, t1 float64) (Root, bool) {
	return r.outside(out, mid-band, mid+band, t0, t1, -1)
}

// outside finds the first point outside [lo, hi] from either end of [t0, t1].
func (r *Response) outside(out int, lo, hi, t0, t1 float64, step int) (Root, bool) {
	left, tol := MaxEvaluations, r.Rounding(out)
	var found Root
	var ok bool
	grazed := math.NaN()
	r.windows(out, t0, t1, step, &left, func(w *window) bool {
		near := &w.l
		if step < 0 {
			near = &w.r
		}
		if near.y() > hi+tol || near.y() < lo-tol {
			found, ok = w.c.from(Root{T: near.t, Lo: near.t, Hi: near.t}), true
			return false
		}
		for _, side := range [2]float64{+1, -1} {
			s := &scan{c: w.c, step: step, sign: side, level: hi + tol, tol: tol, left: &left, grazed: math.NaN()}
			if side < 0 {
				s.level = lo - tol
			}
			if math.IsInf(s.level, 0) {
				continue
			}
			x, hit := s.reach(&w.l, &w.r)
			if !math.IsNaN(s.grazed) && math.IsNaN(grazed) {
				grazed = s.grazed + w.c.t0
			}
			if x = w.c.from(x); hit && (!ok || float64(step)*(x.T-found.T) < 0) {
				found, ok = x, true
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
