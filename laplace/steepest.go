package laplace

import "math"

// MaxRate returns the largest derivative y' of output out in [t0, t1] (s), Y in the
// output's unit per second, and when it is first taken. Of a jump nothing is said: it has
// no rate. AtLeft says that the rate at T is that just before T, as at a bend.
//
// Like Max it is no sample: every part of the interval is excluded by a bound of the
// derivatives or halved, to a relative 1e-12 of the rate.
func (r *Response) MaxRate(out int, t0, t1 float64) Extreme { return r.steepest(out, t0, t1, +1) }

// MinRate returns the smallest derivative, as MaxRate does.
func (r *Response) MinRate(out int, t0, t1 float64) Extreme { return r.steepest(out, t0, t1, -1) }

// rateNoise is the share of the largest rate within which rates count as equal.
const rateNoise = 1e-12

func (r *Response) steepest(out int, t0, t1 float64, sign float64) Extreme {
	left := MaxEvaluations
	s := &steepestSearch{sign: sign, left: &left, best: Extreme{Y: math.Inf(-1)}}
	r.windows(out, t0, t1, +1, &left, func(w *window) bool {
		s.c = w.c
		s.offer(&w.l, false)
		s.offer(&w.r, w.more && w.r.t > w.l.t)
		s.search(&w.l, &w.r)
		return true
	})
	if math.IsInf(s.best.Y, 0) { // [t0, t1] lies outside the response
		return Extreme{T: t0}
	}
	s.best.Y *= sign
	return s.best
}

// steepestSearch looks for the largest sign·y' by branch and bound.
type steepestSearch struct {
	c    *curve
	sign float64
	size float64 // the largest |y'| met
	left *int    // evaluations left
	best Extreme
}

// offer keeps the rate of a jet if it is higher than what is known.
func (s *steepestSearch) offer(j *jet, atLeft bool) {
	s.size = max(s.size, math.Abs(j.y1()))
	if y := s.sign * j.y1(); y > s.best.Y+rateNoise*s.size || math.IsInf(s.best.Y, -1) {
		s.best = Extreme{T: s.c.t0 + j.t, Y: y, AtLeft: atLeft, Capped: s.best.Capped}
	}
}

// search drops or halves the interval between two jets already offered.
func (s *steepestSearch) search(l, r *jet) {
	if !(r.t > l.t) || s.c.tiny(l, r) {
		return
	}
	if *s.left <= 0 {
		s.best.Capped = true
		return
	}
	*s.left--
	m := s.c.jet(l.t + (r.t-l.t)/2)
	v := s.c.spread(l, &m, r)
	if s.sign*m.y1()+v[1] <= s.best.Y+rateNoise*s.size || math.Abs(m.y2()) > v[2] {
		return // it stays below, or the ends decide
	}
	s.offer(&m, false)
	if s.sign*(l.y1()-r.y1()) >= 0 {
		s.search(l, &m)
		s.search(&m, r)
	} else {
		s.search(&m, r)
		s.search(l, &m)
	}
}
