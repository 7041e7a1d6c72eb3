package laplace

import "math"

// An Extreme is the largest or smallest value of an output and when it is taken.
// AtLeft says that it is only approached from before a jump at T. Capped says that
// the search stopped at MaxEvaluations: Y is the best value met.
type Extreme struct {
	T, Y   float64
	AtLeft bool
	Capped bool
}

// Max returns the largest value of output out in [t0, t1], of equal ones the
// first. It is no sample: every part of the interval is excluded by a bound of the
// derivatives or searched, so that no narrow peak is missed. T of a smooth
// maximum is a root of y'.
func (r *Response) Max(out int, t0, t1 float64) Extreme { return r.extreme(out, t0, t1, +1) }

// Min returns the smallest value of output out in [t0, t1], as Max does.
func (r *Response) Min(out int, t0, t1 float64) Extreme { return r.extreme(out, t0, t1, -1) }

func (r *Response) extreme(out int, t0, t1 float64, sign float64) Extreme {
	left, tol := MaxEvaluations, r.Rounding(out)
	best := Extreme{Y: math.Inf(-1)}
	before := 0.0 // what the window to the left ended with
	r.windows(out, t0, t1, +1, &left, func(w *window) bool {
		h := &peakSearch{scan: scan{c: w.c, step: +1, sign: sign, tol: tol, left: &left}, best: &best}
		if best.AtLeft && best.T == w.c.t0+w.l.t && math.Abs(w.l.y()-before) <= tol {
			best.AtLeft = false // a bend, no jump
		}
		h.offer(&w.l)
		h.offer(&w.r)
		h.search(&w.l, &w.r)
		if w.more && w.r.t > 0 && best.T == w.c.t0+w.r.t && best.Y == sign*w.r.y() {
			best.AtLeft = true
		}
		before = w.r.y()
		return true
	})
	if math.IsInf(best.Y, 0) { // [t0, t1] lies outside the response
		return Extreme{T: t0, Y: r.At(out, t0)}
	}
	best.Y *= sign
	return best
}

// peakSearch looks for the highest point of sign·y in one piece by branch and bound.
type peakSearch struct {
	scan
	best *Extreme
}

// offer keeps the jet if it is higher than what is known, or as high and earlier.
func (h *peakSearch) offer(j *jet) {
	y, t := h.sign*j.y(), h.c.t0+j.t
	if y > h.best.Y+h.tol/4 || y > h.best.Y && t <= h.best.T || y >= h.best.Y-h.tol/4 && t < h.best.T {
		*h.best = Extreme{T: t, Y: y, Capped: h.best.Capped}
	}
}

// search drops, decides or halves the interval between two jets already offered.
func (h *peakSearch) search(l, r *jet) {
	if !(r.t > l.t) {
		return
	}
	if *h.left <= 0 {
		h.best.Capped = true
		return
	}
	m := h.jet(l.t + (r.t-l.t)/2)
	v := h.c.spread(l, &m, r)
	switch top := h.sign*m.y() + v[0]; {
	case top <= h.best.Y+h.tol/4:
		return
	case math.Abs(m.y1()) > v[1]:
		return // the ends decide
	case math.Abs(m.y2()) > v[2]:
		if h.sign*m.y2() < 0 && opposite(l.y1(), r.y1()) {
			top := h.stationary(l, r)
			h.offer(&top)
		}
		return
	case h.c.tiny(l, r):
		h.offer(&m)
		return
	}
	h.offer(&m)
	if h.sign*(l.y()-r.y()) >= 0 {
		h.search(l, &m)
		h.search(&m, r)
	} else {
		h.search(&m, r)
		h.search(l, &m)
	}
}
