package network

import "math"

// A part of a trajectory is a span of time within one step on which an output is
// monotone.
type part struct {
	c       *quartic
	t0, h   float64 // the step's
	a, b    float64 // s
	ya, yb  float64
	first   bool // nothing of the interval lies to the left
	last    bool // nothing of the interval lies to the right
	entered bool // the step begins at a
}

func (p *part) at(t float64) float64 {
	switch t { // the ends are what their neighbours think they are
	case p.a:
		return p.ya
	case p.b:
		return p.yb
	}
	return p.c.at((t - p.t0) / p.h)
}

// crossing returns the instant at which the output reaches level, which lies between its
// ends, and the numbers next to it between which it does.
func (p *part) crossing(level float64) (at, lo, hi float64) {
	below := p.ya < level
	hi = halved(p.a, p.b, func(t float64) bool { y := p.at(t); return y < level == below && y != level })
	lo = math.Nextafter(hi, p.a)
	if math.Abs(p.at(lo)-level) < math.Abs(p.at(hi)-level) {
		return lo, lo, hi
	}
	return hi, lo, hi
}

// parts calls visit for the parts of output out within [t0, t1], from the left or, with
// step −1, from the right, until visit returns false. At a jump two parts meet with
// different values.
func (t *Trajectory) parts(out int, t0, t1 float64, step int, visit func(p *part) bool) {
	t0, t1 = max(t0, t.times[0]), min(t1, t.Until())
	if !(t0 <= t1) {
		return
	}
	first, last := t.stepAt(t0, false), t.stepAt(t1, false)
	j, end := first, last+1
	if step < 0 {
		j, end = last, first-1
	}
	var room [4]part
	for ; j != end; j += step {
		list := t.split(out, j, max(t0, t.times[j]), min(t1, t.times[j+1]), room[:0])
		list[0].first = j == first
		list[len(list)-1].last = j == last
		for k := range list {
			if step < 0 {
				k = len(list) - 1 - k
			}
			if !visit(&list[k]) {
				return
			}
		}
	}
}

// split cuts the span [a, b] of step j where the output's slope changes its sign.
func (t *Trajectory) split(out, j int, a, b float64, list []part) []part {
	c, t0, h := &t.curves[out][j], t.times[j], t.times[j+1]-t.times[j]
	var room [3]float64
	p := part{c: c, t0: t0, h: h, a: a, ya: t.in(out, j, a), entered: a == t0}
	for _, theta := range c.stationary(room[:0]) {
		if at := t0 + theta*h; at > p.a && at < b {
			p.b, p.yb = at, c.at(theta)
			list = append(list, p)
			p.a, p.ya, p.entered = p.b, p.yb, false
		}
	}
	p.b, p.yb = b, t.in(out, j, b)
	return append(list, p)
}
