package laplace

import (
	"math"
	"math/cmplx"
)

// A Crossing is a frequency in rad/s at which a gain passes a level; Lo and Hi enclose
// it. Touch says that a hump of the gain meets the level within rounding there, so
// that the truth may be either side. Capped says that the search stopped at
// some 20,000 intervals: above Omega the gain is below, nothing is said of the rest.
type Crossing struct {
	Omega, Lo, Hi float64
	Touch, Capped bool
}

// A GainPeak is the largest gain over all frequencies: at Omega, at rest where Omega
// is 0, only approached for ω → ∞ where it is +Inf. Gain is +Inf at a pole on the
// imaginary axis.
type GainPeak struct {
	Omega, Gain float64
	Capped      bool
}

// closest is the relative width at which an interval of frequency is not halved
// again, and near the distance in ln|H| that counts as touching: roundings of a
// product of many factors.
const (
	closest = 1e-13
	touches = 1e-13
	beyond  = 1e9 // times the last corner: there the gain is its asymptote to rounding

	maxGainParts = 20_000 // intervals of one search
)

// FallsBelow returns the frequency above which |H(iω)| < level for good, so that a
// ripple of amplitude 1 at the input stays below level at the output for every
// shorter period; Omega is 0 where it does at every frequency. It is false where
// there is none: the gain tends to level or more for ω → ∞.
//
// The crossing is guaranteed: every higher frequency has been excluded by a bound
// of |H| over an interval, or of its slope; none is picked from samples. Its
// accuracy is that of H.
func (r *FrequencyResponse) FallsBelow(level float64) (Crossing, bool) {
	if !(level > 0) {
		return Crossing{}, r.h.Zero && level >= 0
	}
	if r.h.rate != 0 { // it rises for ever
		return Crossing{}, false
	}
	if r.resolvent == nil {
		return Crossing{}, math.Abs(r.h.direct) < level
	}
	b := r.band()
	goal := math.Log(level)
	if r.h.RelativeDegree == 0 && r.lines.atTop >= goal {
		return Crossing{}, false
	}
	for r.lines.log(b.hi) >= goal { // beyond the corners: a straight line
		b.hi *= 1e3
	}
	s := &gainSearch{r: r, goal: goal, left: maxGainParts}
	for r.lines.log(b.lo) < goal && r.lines.slope(b.lo) < -0.5 && b.lo > 1e-290 { // a pole at 0: it rises for ever
		b.lo /= 1e3
	}
	c, ok := s.last(b.lo, b.hi)
	if !ok && r.lines.log(b.lo) >= goal {
		c = Crossing{Omega: b.lo, Lo: b.lo, Hi: b.lo, Touch: true}
	}
	return c, true
}

// A band encloses every corner, with room for the asymptotes on both sides.
type band struct{ lo, hi float64 }

func (r *FrequencyResponse) band() band {
	c := r.h.Corners()
	if len(c) == 0 {
		return band{1e-9, 1e9}
	}
	return band{c[0].Omega / beyond, c[len(c)-1].Omega * beyond}
}

// A gainSearch looks along u = ln ω by interval exclusion: an interval in which the
// bounds keep the gain away from the goal is dropped; one in which the slope cannot
// vanish is decided by its ends; any other is halved.
type gainSearch struct {
	r    *FrequencyResponse
	goal float64 // ln of the level
	left int
}

// last returns the highest frequency of [a, b] with a gain of the level or more.
func (s *gainSearch) last(a, b float64) (Crossing, bool) {
	if s.left <= 0 {
		return Crossing{Omega: b, Lo: a, Hi: b, Capped: true}, true
	}
	s.left--
	f, m := &s.r.lines, math.Sqrt(a)*math.Sqrt(b)
	low, high, down, up := f.logs(a, m, b)
	switch {
	case high < s.goal:
		return Crossing{}, false
	case high-low < touches+2*f.off: // flat to rounding
		return s.undecided(a, m, b)
	case up <= 0 || down >= 0:
		return s.ends(a, b)
	case b-a <= closest*b || !(m > a && m < b):
		return s.undecided(a, m, b)
	}
	if c, ok := s.last(m, b); ok {
		return c, ok
	}
	return s.last(a, m)
}

// ends decides an interval in which the gain only rises or only falls.
func (s *gainSearch) ends(a, b float64) (Crossing, bool) {
	switch atA, atB := s.reached(a), s.reached(b); {
	case atB:
		return Crossing{Omega: b, Lo: b, Hi: b}, true
	case atA:
		return s.bracket(a, b), true
	}
	return Crossing{}, false
}

// reached reports whether the gain is the level or more: from the product, or where
// that is too close, from the equations.
func (s *gainSearch) reached(omega float64) bool {
	v := s.r.lines.log(omega) - s.goal
	if math.Abs(v) <= touches+s.r.lines.off {
		v = math.Log(s.r.At(omega).Gain) - s.goal
	}
	return v >= 0
}

// undecided decides an interval too short to halve.
func (s *gainSearch) undecided(a, m, b float64) (Crossing, bool) {
	if s.r.lines.log(m) < s.goal-touches-s.r.lines.off {
		return Crossing{}, false
	}
	return Crossing{Omega: m, Lo: a, Hi: b, Touch: true}, true
}

// bracket closes in on the crossing between a, at the level or above, and b, below,
// with H from the equations.
func (s *gainSearch) bracket(a, b float64) Crossing {
	g := func(omega float64) float64 {
		v := s.r.At(omega).Gain
		if v == 0 {
			return math.Inf(-1)
		}
		return math.Log(v) - s.goal
	}
	at, lo, hi := descend(g, a, b)
	return Crossing{Omega: at, Lo: lo, Hi: hi}
}

// descend finds where g, ≥ 0 at a and < 0 at b, passes 0, to the last unit: the rule
// of false position with the weights of Illinois in ln ω, and halving where it
// does not close in.
//
// Source: Dowell, Jarratt, BIT 11 (1971) 168.
func descend(g func(float64) float64, a, b float64) (at, lo, hi float64) {
	ga, gb := g(a), g(b)
	for k := range 200 {
		m := math.Sqrt(a) * math.Sqrt(b)
		if k%3 != 2 && ga-gb > 0 && !math.IsInf(ga-gb, 0) {
			m = a * math.Exp(math.Log(b/a)*ga/(ga-gb))
		}
		if !(m > a && m < b) {
			m = a + (b-a)/2
		}
		if !(m > a && m < b) {
			break
		}
		if v := g(m); v >= 0 {
			a, ga, gb = m, v, gb/2
		} else {
			b, gb, ga = m, v, ga/2
		}
		if b-a <= 2*epsilon*b {
			break
		}
	}
	return a, a, b
}

// Peak returns the largest gain. It is guaranteed as FallsBelow is.
func (r *FrequencyResponse) Peak() GainPeak {
	if r.h.rate != 0 {
		return GainPeak{Omega: math.Inf(1), Gain: math.Inf(1)}
	}
	if r.resolvent == nil {
		return GainPeak{Gain: math.Abs(r.h.direct)}
	}
	for _, p := range r.h.Poles {
		if math.Abs(real(p.P)) <= p.Radius && imag(p.P) >= 0 {
			return GainPeak{Omega: imag(p.P), Gain: math.Inf(1)}
		}
	}
	b := r.band()
	best := &gainPeakSearch{f: &r.lines, left: maxGainParts, log: math.Inf(-1)}
	if r.h.HasGain && r.h.Gain != 0 {
		best.offer(0, math.Log(math.Abs(r.h.Gain)))
	}
	if r.h.RelativeDegree == 0 {
		best.offer(math.Inf(1), r.lines.atTop)
	}
	for _, omega := range FrequencyGrid(b.lo*beyond/100, b.hi/beyond*100, 10) { // a first guess: most of the rest is dropped at once
		best.offer(omega, r.lines.log(omega))
	}
	best.search(b.lo, b.hi)
	p := GainPeak{Omega: best.omega, Gain: math.Exp(best.log), Capped: best.left <= 0}
	switch {
	case p.Omega == 0:
		p.Gain = math.Abs(r.h.Gain)
	case math.IsInf(p.Omega, 1):
		p.Gain = cmplx.Abs(complex(r.h.direct, 0))
	default:
		p.Gain = r.At(p.Omega).Gain
	}
	return p
}

// gainPeakSearch looks for the highest point of ln|H| by branch and bound.
type gainPeakSearch struct {
	f     *factors
	left  int
	omega float64
	log   float64
}

// gainRounding is by how much ln|H| must be higher to count as a hump of its own.
const gainRounding = 1e-12

func (h *gainPeakSearch) offer(omega, log float64) {
	if log > h.log+gainRounding {
		h.omega, h.log = omega, log
	}
}

func (h *gainPeakSearch) search(a, b float64) {
	if h.left <= 0 {
		return
	}
	h.left--
	m := math.Sqrt(a) * math.Sqrt(b)
	low, high, down, up := h.f.logs(a, m, b)
	switch {
	case high <= h.log+gainRounding:
		return
	case high-low < touches+2*h.f.off:
		h.offer(m, h.f.log(m))
		return
	case down >= 0:
		h.offer(b, h.f.log(b))
		return
	case up <= 0:
		h.offer(a, h.f.log(a))
		return
	case b-a <= 1e-6*b || !(m > a && m < b):
		h.top(a, b)
		return
	}
	h.offer(m, h.f.log(m))
	if h.f.log(a) > h.f.log(b) {
		h.search(a, m)
		h.search(m, b)
	} else {
		h.search(m, b)
		h.search(a, m)
	}
}

// top offers the stationary point of a short interval, or its ends.
func (h *gainPeakSearch) top(a, b float64) {
	if h.f.slope(a) > 0 && h.f.slope(b) < 0 {
		m, _, _ := descend(h.f.slope, a, b)
		if v := h.f.log(m); v > h.log {
			h.omega, h.log = m, v
		}
		return
	}
	h.offer(a, h.f.log(a))
	h.offer(b, h.f.log(b))
}
