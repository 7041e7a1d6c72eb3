package laplace

import "math"

// A Root is an instant at which an output meets a level. Lo and Hi enclose it.
//
// Touch says that an extremum meets the level within rounding, so that the true
// output may pass it or stay short of it; T is then that instant, or lies between
// Lo and Hi. Capped says that the search stopped at MaxEvaluations: nothing was met
// between the end from which it started and T.
type Root struct {
	T, Lo, Hi float64
	Touch     bool
	Capped    bool
}

// MaxEvaluations bounds the evaluations of one search for a root or an extreme.
const MaxEvaluations = 200_000

// smallest is the share of the time below which an interval is not halved again.
const smallest = 1e-13

// A scan looks for the first point of one piece at which g = sign·(y − level)
// reaches 0, coming from the left (step +1) or from the right (step −1).
//
// Method: interval exclusion. An interval in which Taylor's formula keeps g below 0
// is dropped; one in which y′ cannot vanish is decided by its ends; one
// in which y″ cannot vanish by its only extremum; any other is halved, the near
// half first. So the root found is the first one, however narrow the excursion.
type scan struct {
	c       *curve
	step    int
	sign    float64
	level   float64
	tol     float64 // rounding error of y
	touches bool    // an extremum within tol of the level counts as reaching it
	left    *int    // evaluations left
	grazed  float64 // where an extremum last came within tol without counting; NaN none
}

func (s *scan) g(j *jet) float64 { return s.sign * (j.y() - s.level) }

func (s *scan) jet(tau float64) jet {
	*s.left--
	return s.c.jet(tau)
}

// reach finds the first point between the jets at which g ≥ 0, given that g < 0 at
// the near end. T, Lo and Hi are times τ of the piece.
func (s *scan) reach(l, r *jet) (Root, bool) {
	near, far := l, r
	if s.step < 0 {
		near, far = r, l
	}
	if s.touches && s.g(near) >= -s.tol {
		return Root{T: near.t, Lo: near.t, Hi: near.t, Touch: true}, true
	}
	if *s.left <= 0 {
		return Root{T: near.t, Lo: l.t, Hi: r.t, Capped: true}, true
	}
	m := s.jet(l.t + (r.t-l.t)/2)
	v := s.c.spread(l, &m, r)
	switch top := s.g(&m) + v[0]; {
	case top < -s.tol || !s.touches && top < 0:
		return Root{}, false
	case math.Abs(m.y1()) > v[1]:
		return s.monotone(near, far)
	case math.Abs(m.y2()) > v[2]:
		return s.bent(near, far, s.sign*m.y2() > 0)
	case s.c.tiny(l, r):
		return s.undecided(l, &m, r)
	}
	if s.step > 0 {
		if x, ok := s.reach(l, &m); ok {
			return x, ok
		}
		return s.reachFrom(&m, l, r)
	}
	if x, ok := s.reach(&m, r); ok {
		return x, ok
	}
	return s.reachFrom(&m, l, r)
}

// tiny reports that an interval is too short to halve: by its own times, or by the
// spacing of the numbers that hold the time since t = 0.
func (c *curve) tiny(l, r *jet) bool {
	return r.t-l.t <= smallest*r.t || r.t-l.t <= epsilon*c.t0
}

// reachFrom searches the far half. Where rounding has let g reach 0 at the middle
// although nothing was found before it, the middle is the root.
func (s *scan) reachFrom(m, l, r *jet) (Root, bool) {
	if s.g(m) >= 0 {
		return Root{T: m.t, Lo: m.t, Hi: m.t, Touch: s.g(m) <= s.tol}, true
	}
	if s.step > 0 {
		return s.reach(m, r)
	}
	return s.reach(l, m)
}

// monotone decides an interval in which y' has one sign.
func (s *scan) monotone(near, far *jet) (Root, bool) {
	if s.g(far) < 0 {
		return Root{}, false
	}
	return s.bracket(near, far), true
}

// bent decides an interval in which y″ has one sign: g is convex, with its highest
// points at the ends, or has one maximum.
func (s *scan) bent(near, far *jet, convex bool) (Root, bool) {
	if convex || !opposite(near.y1(), far.y1()) {
		return s.monotone(near, far)
	}
	top := s.stationary(near, far)
	switch g := s.g(&top); {
	case math.Abs(g) <= s.tol && s.touches:
		return Root{T: top.t, Lo: top.t, Hi: top.t, Touch: true}, true
	case g >= 0:
		return s.bracket(near, &top), true
	case g >= -2*s.tol:
		s.grazed = top.t
	}
	return Root{}, false
}

// opposite reports different signs, of numbers too small to be multiplied too.
func opposite(a, b float64) bool { return a < 0 && b > 0 || a > 0 && b < 0 }

// undecided ends the search in an interval too short to halve.
func (s *scan) undecided(l, m, r *jet) (Root, bool) {
	if s.touches {
		return Root{T: m.t, Lo: l.t, Hi: r.t, Touch: true}, true
	}
	s.grazed = m.t
	return Root{}, false
}

// bracket returns the root between a, where g < 0, and b, where g ≥ 0, by Newton's
// steps kept within the bracket, to the last unit.
func (s *scan) bracket(a, b *jet) Root {
	lo, hi := *a, *b
	f := func(j *jet) (float64, float64) { return s.g(j), s.sign * j.y1() }
	t := s.newton(&lo, &hi, f)
	return Root{T: t, Lo: min(lo.t, hi.t), Hi: max(lo.t, hi.t)}
}

// stationary returns the point between a and b at which y' vanishes.
func (s *scan) stationary(a, b *jet) jet {
	sign := 1.0
	if a.y1() > 0 {
		sign = -1
	}
	lo, hi := *a, *b
	t := s.newton(&lo, &hi, func(j *jet) (float64, float64) { return sign * j.y1(), sign * j.y2() })
	return s.jet(t)
}

// newton narrows lo (f < 0) and hi (f ≥ 0), in either order of time, around the
// root of f, and returns it. A step that leaves the bracket, or that does not
// shrink it to a half in two rounds, gives way to halving.
func (s *scan) newton(lo, hi *jet, f func(*jet) (value, slope float64)) float64 {
	best := hi.t
	x := *hi
	for range 200 {
		if *s.left <= 0 {
			return best
		}
		v, d := f(&x)
		t := x.t - v/d
		a, b := min(lo.t, hi.t), max(lo.t, hi.t)
		if !(t > a && t < b) {
			t = a + (b-a)/2
		}
		if t == a || t == b || t == x.t {
			return t
		}
		width := b - a
		x = s.jet(t)
		if v, _ = f(&x); v < 0 {
			*lo = x
		} else {
			*hi = x
		}
		best = t
		if v == 0 {
			return t
		}
		if now := math.Abs(hi.t - lo.t); now > width/2 {
			s.halve(lo, hi, &x, f)
		}
	}
	return best
}

// halve takes one step of bisection where Newton approaches from one side only:
// a neighbour a few units beyond the root usually closes the bracket at once.
func (s *scan) halve(lo, hi, x *jet, f func(*jet) (value, slope float64)) {
	a, b := min(lo.t, hi.t), max(lo.t, hi.t)
	t := a + (b-a)/2
	if v, d := f(x); d != 0 {
		beyond := x.t - v/d - math.Copysign(4*epsilon*max(math.Abs(a), math.Abs(b)), v/d)
		if beyond > a && beyond < b && math.Abs(v/d) < (b-a)/64 {
			t = beyond
		}
	}
	if !(t > a && t < b) {
		return
	}
	y := s.jet(t)
	if v, _ := f(&y); v < 0 {
		*lo = y
	} else {
		*hi = y
	}
}
