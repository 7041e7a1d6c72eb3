package laplace

import (
	"math"
	"math/cmplx"
)

// terms is the number of Taylor coefficients in a jet. Few would do for a decay;
// the first moments of a long chain of stores, where many modes cancel to t^n, are
// flat to rounding and need a high order to be seen as such in few steps.
const terms = 8

// A jet is a curve at one instant: its value and derivatives, and what bounds the
// derivative of order terms in the neighbourhood. A contribution that decays is
// bounded on [l, r] by its size at l, one that grows by its size at r, and that of
// the blocks by its size at l times exp(mu·(r−l)), to which push, what drives them at r,
// adds its part.
type jet struct {
	t                 float64
	d                 [terms]float64 // y, y', y″ …
	fall, rise, block float64
	push              float64
}

func (j *jet) y() float64  { return j.d[0] }
func (j *jet) y1() float64 { return j.d[1] }
func (j *jet) y2() float64 { return j.d[2] }

// jet evaluates the curve at τ.
func (c *curve) jet(tau float64) jet {
	j := jet{t: tau}
	j.d[0], j.d[1] = c.base+c.slope*tau, c.slope
	if c.degree > 1 {
		c.bentJet(&j)
	} else {
		for i := range c.real {
			c.real[i].addTo(&j)
		}
		for i := range c.pair {
			c.pair[i].addTo(&j)
		}
	}
	for i := range c.forced {
		c.forced[i].addTo(&j, c.length)
	}
	for i := range c.direct {
		a, s := c.direct[i].Amplitude, c.direct[i].Rate
		v := a * cexp(s, tau)
		for k := range j.d {
			j.d[k] += real(v)
			v *= s
		}
		j.bound(real(s), cmplx.Abs(v))
	}
	for i := range c.block {
		c.block[i].addTo(&j)
	}
	return j
}

// bound adds a part that changes with the given rate.
func (j *jet) bound(rate, b float64) {
	if rate > 0 {
		j.rise += b
	} else {
		j.fall += b
	}
}

func (t *realTerm) addTo(j *jet) {
	e, f1 := phi1(t.p, j.t)
	h1 := t.p*t.h + t.a
	j.d[0] += e*t.h + f1*t.a
	j.d[1] += e * h1
	if t.b != 0 {
		j.d[0] += phi2(t.p, j.t, f1) * t.b
		j.d[1] += f1 * t.b
	}
	v := e * (t.p*h1 + t.b)
	for k := 2; k < terms; k++ {
		j.d[k] += v
		v *= t.p
	}
	j.bound(t.p, math.Abs(v))
}

func (t *pairTerm) addTo(j *jet) {
	e, f1 := cphi1(t.p, j.t)
	h1 := t.p*t.h + t.a
	j.d[0] += real(e*t.h + f1*t.a)
	j.d[1] += real(e * h1)
	if t.b != 0 {
		j.d[0] += real(cphi2(t.p, j.t, f1) * t.b)
		j.d[1] += real(f1 * t.b)
	}
	v := e * (t.p*h1 + t.b)
	for k := 2; k < terms; k++ {
		j.d[k] += real(v)
		v *= t.p
	}
	j.bound(real(t.p), cmplx.Abs(v))
}

// addTo adds k·D and its derivatives, D' = s·D + e^{pτ} and so on. In the bound,
// |D| ≤ G·(|e^{sτ}| + |e^{pτ}|) with G = min(length, 2/|s−p|).
func (t *forcedTerm) addTo(j *jet, length float64) {
	s, p := t.s, t.p
	d, ep := t.k*divided(s, p, j.t), t.k*cexp(p, j.t)
	g := length
	if gap := cmplx.Abs(s - p); gap*length > 2 {
		g = 2 / gap
	}
	ms, mp, me := cmplx.Abs(s), cmplx.Abs(p), cmplx.Abs(ep)
	own, power := 0.0, 1.0 // of e^{pτ} in the derivative; |p|^k
	for k := range j.d {
		j.d[k] += real(d)
		d = s*d + ep
		ep *= p
		own = ms*own + power
		power *= mp
	}
	g *= math.Pow(ms, terms)
	j.bound(real(s), cmplx.Abs(t.k)*g*math.Exp(real(s)*j.t))
	if me > 0 { // a dead mode of a large p would be 0·∞
		j.bound(real(p), (g+own)*me)
	}
}

func (t *blockTerm) addTo(j *jet) {
	q, w, tau := t.q, t.w, j.t
	w.at(q.n, q.t, tau)
	j.d[0] += t.dot(w.e, q.z) + tau*(t.dot(w.p1, q.a)+tau*t.dot(w.p2, q.b))
	j.d[1] += t.dot(w.e, t.z1) + tau*t.dot(w.p1, q.b)
	for k, x := range t.higher[:terms-2] {
		j.d[k+2] += t.dot(w.e, x)
	}
	var o float64
	for i, v := range t.out {
		o = math.Hypot(o, v/t.d[i])
	}
	j.block += o * t.size(t.higher[terms-2])
	if q.bent != nil {
		t.addBent(j, o)
	}
}

// size returns the scaled norm of e^{τT}x.
func (t *blockTerm) size(x []float64) float64 { return t.sizeOf(t.w.e, x) }

// sizeOf returns the scaled norm of m x.
func (t *blockTerm) sizeOf(m, x []float64) float64 {
	var s float64
	n := t.q.n
	for i := range n {
		var v float64
		for k, u := range x {
			v += m[i*n+k] * u
		}
		s = math.Hypot(s, t.d[i]*v)
	}
	return s
}

// spread returns by how much y, y' and y″ can differ between the jets l and r from
// what they are at their middle m: Taylor's formula with its remainder.
func (c *curve) spread(l, m, r *jet) (v [3]float64) {
	b := l.fall + r.rise
	if l.block > 0 || r.push > 0 {
		b += (l.block + (r.t-l.t)*r.push) * math.Exp(c.mu*(r.t-l.t))
	}
	h := (r.t - l.t) / 2
	for i := range v {
		s := b
		for k := terms; k > i+1; k-- { // h/(k−i)·(…): Horner from the remainder down
			s = s*h/float64(k-i) + math.Abs(m.d[k-1])
		}
		v[i] = s * h
	}
	return v
}
