package laplace

import (
	"math"
	"math/cmplx"
)

// A curve is one output over one piece, as a function of τ from its start:
//
//	y = base + slope·τ + Σ e h + f1 a + f2 b + Σ Re(k D(s,p)) + Σ Re(amp·exp(rate·τ)) + blocks,
//
// and where inputs are bent, what their powers of τ add to each of these.
type curve struct {
	base, slope float64
	degree      int            // of the inputs; up to 1 they are not bent
	bent        []float64      // of τ², τ³, … that reach the output at once
	realBent    [][]float64    // of each realTerm what drives it with τ², τ³, …; nil: nothing
	pairBent    [][]complex128 // of each pairTerm
	t0, length  float64
	real        []realTerm
	pair        []pairTerm
	forced      []forcedTerm
	direct      []Exponential
	block       []blockTerm
	mu          float64 // the fastest growth, in norm, of any block: 1/s, ≥ 0
}

type realTerm struct{ p, h, a, b float64 }

type pairTerm struct{ p, h, a, b complex128 }

// A forcedTerm is Re(k·D(s, p, τ)).
type forcedTerm struct{ s, p, k complex128 }

// A blockTerm is out·z of one block.
type blockTerm struct {
	q   *pieceBlock
	out []float64 // over q.n coordinates
	w   *blockWork
	z1  []float64 // z' at the start

	higher [][]float64 // z″ at the start and on, terms−1 of them
	d      []float64   // scaling of the norm
}

// curve returns output out over the piece. It is for one goroutine.
func (r *Response) curve(p *piece, out int) *curve {
	o := &p.of.System.modal.out[out]
	c := &curve{base: p.of.Base[out], t0: p.t0, length: p.length}
	c.addDirect(p, p.of.System.d[out])
	c.degree = 1 + max(len(p.bent), len(c.bent))
	c.real = make([]realTerm, 0, len(o.real))
	c.pair = make([]pairTerm, 0, len(o.pair))
	for k, v := range o.real {
		if v == 0 {
			continue
		}
		t := realTerm{p.m.real[k], v * p.z.real[k], v * p.a.real[k], v * p.b.real[k]}
		switch {
		case p.bent != nil:
			c.real, c.realBent = append(c.real, t), append(c.realBent, p.bentSeen(v, k))
		case t.h != 0 || t.a != 0 || t.b != 0:
			c.real = append(c.real, t)
		}
		for i := range p.forced {
			f := &p.forced[i]
			if w := v * f.in.real[k]; w != 0 {
				c.forced = append(c.forced, forcedTerm{f.rate, complex(t.p, 0), complex(w, 0) * f.amp})
			}
		}
	}
	for k, v := range o.pair {
		if v == 0 {
			continue
		}
		pole := p.m.pair[k]
		c.pair = append(c.pair, pairTerm{pole, v * p.z.pair[k], v * p.a.pair[k], v * p.b.pair[k]})
		if p.bent != nil {
			c.pairBent = append(c.pairBent, p.bentSeenPair(v, k))
		}
		for i := range p.forced {
			f := &p.forced[i]
			if w := v * f.in.pair[k] / 2; w != 0 {
				c.forced = append(c.forced, forcedTerm{f.rate, pole, w * f.amp},
					forcedTerm{cmplx.Conj(f.rate), pole, w * cmplx.Conj(f.amp)})
			}
		}
	}
	for i := range p.blocks {
		c.addBlock(&p.blocks[i], o)
	}
	return c
}

// addDirect adds what reaches the output at once.
func (c *curve) addDirect(p *piece, d []float64) {
	for i := range p.u {
		g := d[p.u[i].input]
		if g == 0 {
			continue
		}
		c.base += g * p.u[i].A
		c.slope += g * p.u[i].B
		for k, v := range p.u[i].Poly {
			if k == len(c.bent) {
				c.bent = append(c.bent, 0)
			}
			c.bent[k] += g * v
		}
		for _, e := range p.u[i].Exp {
			c.direct = append(c.direct, Exponential{complex(g, 0) * e.Amplitude, e.Rate})
		}
	}
}

func (c *curve) addBlock(q *pieceBlock, o *vector) {
	own := o.block[q.first : q.first+q.own]
	if allZero(own) {
		return
	}
	t := blockTerm{q: q, out: make([]float64, q.n), w: newBlockWork(q.n)}
	copy(t.out, own)
	t.z1 = q.apply(q.z, q.a)
	x := q.apply(t.z1, q.b)
	for k := range terms - 1 {
		t.higher = append(t.higher, x)
		x = q.apply(x, q.bentRate(k))
	}
	little := 0.0
	if q.bent != nil {
		little = 1 / c.length
	}
	t.d, c.mu = q.norm(c.mu, little)
	c.block = append(c.block, t)
	for _, f := range q.far {
		var y complex128
		for i, v := range own {
			y += complex(v, 0) * f.y[i]
		}
		c.direct = append(c.direct, Exponential{y, f.rate})
	}
}

// apply returns T x + add.
func (q *pieceBlock) apply(x, add []float64) []float64 {
	y := make([]float64, q.n)
	for i := range y {
		if add != nil {
			y[i] = add[i]
		}
		for j, v := range x {
			y[i] += q.t[i*q.n+j] * v
		}
	}
	return y
}

// value returns y at τ.
func (c *curve) value(tau float64) float64 {
	y := c.base + c.slope*tau
	for i := range c.real {
		t := &c.real[i]
		e, f1 := phi1(t.p, tau)
		y += e*t.h + f1*t.a
		if t.b != 0 {
			y += phi2(t.p, tau, f1) * t.b
		}
	}
	for i := range c.pair {
		t := &c.pair[i]
		e, f1 := cphi1(t.p, tau)
		y += real(e*t.h + f1*t.a)
		if t.b != 0 {
			y += real(cphi2(t.p, tau, f1) * t.b)
		}
	}
	for i := range c.forced {
		t := &c.forced[i]
		y += real(t.k * divided(t.s, t.p, tau))
	}
	for i := range c.direct {
		y += real(c.direct[i].Amplitude * cexp(c.direct[i].Rate, tau))
	}
	for i := range c.block {
		t := &c.block[i]
		t.w.at(t.q.n, t.q.t, tau)
		y += t.dot(t.w.e, t.q.z) + tau*(t.dot(t.w.p1, t.q.a)+tau*t.dot(t.w.p2, t.q.b))
	}
	if c.degree > 1 {
		y += c.bentValue(tau)
	}
	return y
}

// dot returns out·(M x).
func (t *blockTerm) dot(m, x []float64) float64 {
	var y float64
	n := t.q.n
	for i, o := range t.out {
		if o == 0 {
			continue
		}
		var s float64
		for j, v := range x {
			s += m[i*n+j] * v
		}
		y += o * s
	}
	return y
}

// norm returns the scaling d, |x| = |d x|, that keeps the block's growth in norm
// small, and the larger of that growth and mu. The coupling within a block may be
// far larger than its poles; d = θ^−i weakens it, and θ is halved until the growth
// (largest row sum of the symmetric part) is no more than a share of the poles, or little:
// what drives a chain far down its end is large in a norm scaled by more.
func (q *pieceBlock) norm(mu, little float64) (d []float64, grown float64) {
	d = make([]float64, q.n)
	best, theta := math.Inf(1), 1.0
	for math.Pow(theta, float64(q.n)) > 1e-100 {
		if g, slow := q.growth(theta); g < best {
			best = g
			for i := range d {
				d[i] = math.Pow(theta, -float64(i))
			}
			if g <= slow/4 || g <= little {
				break
			}
		}
		theta /= 2
	}
	return d, max(mu, best)
}

// growth returns the growth in the norm scaled by θ, at least 0, and the modulus
// of the block's slowest diagonal entry.
func (q *pieceBlock) growth(theta float64) (g, slow float64) {
	n := q.n
	slow = math.Inf(1)
	for i := range n {
		row := q.t[i*n+i]
		slow = min(slow, math.Abs(row))
		for j := range n {
			if j != i {
				f := math.Pow(theta, float64(j-i))
				row += math.Abs(q.t[i*n+j]*f+q.t[j*n+i]/f) / 2
			}
		}
		g = max(g, row)
	}
	return g, slow
}
