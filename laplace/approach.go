package laplace

import (
	"math"
	"math/cmplx"
)

// An Approach is how a response comes to a steady cycle: the difference between
// the two. From the instant on at which every input does what it does for ever, the
// difference is a sum of the system's own modes and of what dies away of the inputs.
type Approach struct {
	cycle *Cycle
	r     *Response // the difference, up to where its last regime begins
	last  *piece    // its last regime

	switched *switchedApproach // in place of both where the system switches
}

// Approach returns the difference between r, a response of the same system to the
// inputs of the cycle from any start, and the cycle.
func (c *Cycle) Approach(r *Response) (*Approach, error) {
	if r.s.carried() != c.r.s.carried() || len(r.s.b) != len(c.r.s.b) {
		panic("laplace: a cycle and a response of different systems")
	}
	if c.Period == 0 {
		return &Approach{cycle: c}, nil
	}
	if c.schedule != nil {
		return c.approachSwitched(r)
	}
	first := r.s.modal.vector()
	if r.first != nil {
		first.add(1, r.first)
	}
	first.add(-1, &c.z)
	u := make([]Waveform, len(r.s.b))
	for i := range u {
		u[i] = Constant(0)
	}
	for k, i := range r.input {
		u[i] = c.waves[i].shortOf(r.wave[k])
	}
	d, err := r.s.respondFrom(&first, u, nil, c.from())
	if err != nil {
		return nil, err
	}
	a := &Approach{cycle: c, r: d}
	a.last = d.piece(len(d.times) - 1)
	return a, nil
}

// Cycles returns how many periods pass, from t = 0, until output out stays within
// share of the cycle's swing of the cycle for good: the last instant at which the
// difference exceeds that band, a guaranteed root, in periods, rounded up; 0 where
// it never does. ok is false where the cycle does not swing, or the search was given up.
func (a *Approach) Cycles(out int, share float64) (n float64, ok bool, err error) {
	c := a.cycle
	band := share * c.Swing(out)
	if c.Period == 0 || band == 0 {
		return 0, false, nil
	}
	if a.switched != nil {
		return a.switched.cycles(c, out, band)
	}
	d, err := a.r.upTo(a.r.until + a.horizon(out, band))
	if err != nil {
		return 0, false, err
	}
	x, outside := d.LastOutside(out, 0, band, 0, d.until)
	if !outside {
		return 0, true, nil
	}
	return math.Ceil(x.T/c.Period - 1e-9), !x.Capped, nil
}

// upTo returns the response continued or cut at another time.
func (r *Response) upTo(until float64) (*Response, error) {
	u := make([]Waveform, len(r.s.b))
	for k, i := range r.input {
		u[i] = *r.wave[k]
	}
	return r.s.respondFrom(r.first, u, r.base, until)
}

// horizon returns a time (s) after the start of the last regime from which on the
// difference of output out is within the band, by bounds that only shrink.
func (a *Approach) horizon(out int, band float64) float64 {
	o := &a.r.s.modal.out[out]
	t := a.cycle.Period
	for range 200 {
		if a.last.bound(o, a.r.s.d[out], t) < band/2 {
			return t
		}
		t *= 2
	}
	return t
}

// bound bounds the output at τ and after; modes at 0 hold rounding only and are
// left out.
func (p *piece) bound(o *vector, d []float64, tau float64) float64 {
	sum := 0.0
	for k, pole := range p.m.real {
		if pole < 0 && o.real[k] != 0 {
			driven := p.boundForced(complex(pole, 0), tau, func(in *vector) float64 { return math.Abs(in.real[k]) })
			sum += math.Abs(o.real[k]) * (math.Abs(p.z.real[k])*math.Exp(pole*tau) + driven)
		}
	}
	for k, pole := range p.m.pair {
		if real(pole) < 0 && o.pair[k] != 0 {
			driven := p.boundForced(pole, tau, func(in *vector) float64 { return cmplx.Abs(in.pair[k]) })
			sum += cmplx.Abs(o.pair[k]) * (cmplx.Abs(p.z.pair[k])*math.Exp(real(pole)*tau) + driven)
		}
	}
	for i := range p.blocks {
		sum += p.blocks[i].bound(o, tau)
	}
	for i := range p.forced {
		f := &p.forced[i]
		sum += math.Abs(d[f.input]) * cmplx.Abs(f.amp) * math.Exp(real(f.rate)*tau)
	}
	return sum
}

// boundForced bounds what the exponentials make of a mode at τ and after:
// |D(s, p, τ)| ≤ τ·e^{max(Re s, Re p)τ}, which falls from τ = −1/max on.
func (p *piece) boundForced(pole complex128, tau float64, in func(*vector) float64) float64 {
	sum := 0.0
	for i := range p.forced {
		f := &p.forced[i]
		slow := max(real(f.rate), real(pole))
		at := max(tau, -1/slow)
		sum += in(f.in) * cmplx.Abs(f.amp) * at * math.Exp(slow*at)
	}
	return sum
}

// bound bounds what the output sees of a block at τ and after. In the norm scaled by
// d the flow of the block grows by e^{μt} at most; once it has come down to a
// quarter in a time s, it comes down to a quarter of that in the next.
func (q *pieceBlock) bound(o *vector, tau float64) float64 {
	own := o.block[q.first : q.first+q.own]
	if allZero(own) {
		return 0
	}
	sum := 0.0
	for _, f := range q.far {
		for i, v := range own {
			sum += math.Abs(v) * cmplx.Abs(f.y[i]) * math.Exp(real(f.rate)*tau)
		}
	}
	d, mu := q.norm(0, 0)
	size, seen := 0.0, 0.0
	for i := range q.n {
		size = math.Hypot(size, d[i]*q.z[i])
		if i < q.own {
			seen = math.Hypot(seen, own[i]/d[i])
		}
	}
	s := q.quarter(d)
	if math.IsInf(s, 1) || math.Floor(tau/s) == 0 {
		return math.Inf(1)
	}
	return sum + seen*size*math.Exp(mu*s-math.Floor(tau/s)*math.Log(4))
}

// quarter returns a time in which the block's flow comes down to a quarter.
func (q *pieceBlock) quarter(d []float64) float64 {
	w, n := newBlockWork(q.n), q.n
	slow := math.Inf(1)
	for i := range n {
		slow = min(slow, -q.t[i*n+i])
	}
	if !(slow > 0) {
		return math.Inf(1)
	}
	for s := 1 / slow; s < 1e6/slow; s *= 2 {
		w.at(n, q.t, s)
		norm := 0.0
		for i := range n {
			for j := range n {
				norm = math.Hypot(norm, d[i]*w.e[i*n+j]/d[j])
			}
		}
		if norm <= 0.25 {
			return s
		}
	}
	return math.Inf(1)
}
