package laplace

import (
	"math"
	"math/cmplx"
)

// bentValue returns what powers of τ above the first add to the curve.
func (c *curve) bentValue(tau float64) float64 {
	y := tau * tau * powerSum(c.bent, tau)
	var g powers
	for i, bent := range c.realBent {
		p := c.real[i].p
		_, f1 := phi1(p, tau)
		g.fill(p, tau, f1, len(bent)+1)
		for k, v := range bent {
			y += g[k+2] * v
		}
	}
	var h cpowers
	for i, bent := range c.pairBent {
		p := c.pair[i].p
		_, f1 := cphi1(p, tau)
		h.fill(p, tau, f1, len(bent)+1)
		for k, v := range bent {
			y += real(h[k+2] * v)
		}
	}
	for i := range c.block {
		t := &c.block[i]
		if t.q.bent == nil {
			continue
		}
		phi := t.q.bentPhis(tau, 0)
		for k, v := range t.q.bent {
			y += ofPower(k+2, tau) * t.dot(phi[k+3], v)
		}
	}
	return y
}

// bentIntegral returns the integral of bentValue over the piece: that of the response
// to τ^k is a (k+1)th of that to τ^(k+1).
func (c *curve) bentIntegral() float64 {
	h, y := c.length, 0.0
	power := h * h
	for k, v := range c.bent {
		power *= h
		y += v * power / float64(k+3)
	}
	var g powers
	for i, bent := range c.realBent {
		p := c.real[i].p
		_, f1 := phi1(p, h)
		g.fill(p, h, f1, len(bent)+2)
		for k, v := range bent {
			y += g[k+3] * v / float64(k+3)
		}
	}
	var z cpowers
	for i, bent := range c.pairBent {
		p := c.pair[i].p
		_, f1 := cphi1(p, h)
		z.fill(p, h, f1, len(bent)+2)
		for k, v := range bent {
			y += real(z[k+3]*v) / float64(k+3)
		}
	}
	for i := range c.block {
		t := &c.block[i]
		if t.q.bent == nil {
			continue
		}
		phi := t.q.bentPhis(h, 1)
		for k, v := range t.q.bent {
			y += ofPower(k+2, h) * h * t.dot(phi[k+4], v)
		}
	}
	return y
}

// bentJet adds the single modes and the powers that reach the output at once.
//
// Of y = e^{pτ}h + Σ c_k g_k the derivative of order m is e^{pτ}E_m + Σ c_k k!/(k−m)! g_(k−m)
// over k ≥ m, with E_0 = h and E_(m+1) = p E_m + m! c_m: what remains of the highest is one
// exponential, but for powers of that order and above, whose g only grow.
func (c *curve) bentJet(j *jet) {
	for k, v := range c.bent {
		for m := range min(k+2, terms-1) + 1 {
			j.d[m] += v * falling(k+2, m) * math.Pow(j.t, float64(k+2-m))
		}
		j.rise += math.Abs(v) * boundOfPower(k+2, j.t)
	}
	for i := range c.real {
		if c.realBent == nil {
			c.real[i].addTo(j)
		} else {
			c.real[i].addBent(j, c.realBent[i])
		}
	}
	for i := range c.pair {
		if c.pairBent == nil {
			c.pair[i].addTo(j)
		} else {
			c.pair[i].addBent(j, c.pairBent[i])
		}
	}
}

func (t *realTerm) addBent(j *jet, bent []float64) {
	e, f1 := phi1(t.p, j.t)
	var g powers
	g.fill(t.p, j.t, f1, len(bent)+1)
	drive := append([]float64{t.a, t.b}, bent...)
	v := e * t.h
	for m := range terms {
		y, own := v, 0.0
		for k := m; k < len(drive); k++ {
			y += falling(k, m) * drive[k] * g[k-m]
		}
		if m < len(drive) {
			own = falling(m, m) * drive[m]
		}
		j.d[m] += y
		v = t.p*v + e*own
	}
	j.bound(t.p, math.Abs(v))
	for k := terms; k < len(drive); k++ {
		j.rise += falling(k, terms) * math.Abs(drive[k]) * g[k-terms]
	}
}

func (t *pairTerm) addBent(j *jet, bent []complex128) {
	e, f1 := cphi1(t.p, j.t)
	var g cpowers
	g.fill(t.p, j.t, f1, len(bent)+1)
	drive := append([]complex128{t.a, t.b}, bent...)
	v := e * t.h
	for m := range terms {
		y, own := v, complex(0, 0)
		for k := m; k < len(drive); k++ {
			y += complex(falling(k, m), 0) * drive[k] * g[k-m]
		}
		if m < len(drive) {
			own = complex(falling(m, m), 0) * drive[m]
		}
		j.d[m] += real(y)
		v = t.p*v + e*own
	}
	j.bound(real(t.p), cmplx.Abs(v))
	if len(drive) <= terms {
		return
	}
	_, slow := phi1(real(t.p), j.t)
	var grown powers // |g| of a pair is at most that of its real part
	grown.fill(real(t.p), j.t, slow, len(bent)+1)
	for k := terms; k < len(drive); k++ {
		j.rise += falling(k, terms) * cmplx.Abs(drive[k]) * grown[k-terms]
	}
}

// addBent adds what powers of τ above the first make of the block; o is the scaled norm
// of out.
func (t *blockTerm) addBent(j *jet, o float64) {
	phi := t.q.bentPhis(j.t, 0)
	for i, v := range t.q.bent {
		k := i + 2
		for m := range min(k, terms-1) + 1 {
			j.d[m] += falling(k, m) * ofPower(k-m, j.t) * t.dot(phi[k-m+1], v)
		}
		if k < terms {
			continue
		}
		size := 0.0
		for n, x := range v {
			size = math.Hypot(size, t.d[n]*x)
		}
		j.block += o * falling(k, terms) * ofPower(k-terms, j.t) * t.sizeOf(phi[k-terms+1], v)
		j.push += o * boundOfPower(k, j.t) * size
	}
}
