package laplace

import "math/cmplx"

// A forcing is one exponential Re(amp·exp(rate·τ)) that drives the modes through
// the vector in.
type forcing struct {
	rate, amp complex128
	in        *vector
	input     int
}

// A piece is the response between two neighbouring breaks: the state at its
// start, and inputs that are one polynomial plus exponentials.
type piece struct {
	m      *modal
	of     *Kind    // whose output it is; nil where no output is asked for
	t0     float64  // s
	length float64  // s
	z      vector   // state at t0
	a, b   vector   // what drives the modes: a + b·τ
	ramps  bool     // b is not zero
	bent   []vector // what drives them with τ², τ³, …; nil where inputs run straight
	forced []forcing
	blocks []pieceBlock
	u      []segmentNow // of each active input
}

// segmentNow is an input's segment as seen from the start of the piece.
type segmentNow struct {
	input int
	Segment
}

// newPiece prepares the piece that starts with the state z.
func newPiece(m *modal, t0, length float64, z vector, u []segmentNow) *piece {
	p := &piece{m: m, t0: t0, length: length, z: z, u: u, a: m.vector(), b: m.vector()}
	for i := range u {
		g := &u[i]
		in := &m.in[g.input]
		if g.A != 0 {
			p.a.add(g.A, in)
		}
		if g.B != 0 {
			p.b.add(g.B, in)
			p.ramps = true
		}
		if len(g.Poly) > 0 {
			p.bend(g, in)
		}
		for _, e := range g.Exp {
			if e.Amplitude != 0 {
				p.forced = append(p.forced, forcing{e.Rate, e.Amplitude, in, g.input})
			}
		}
	}
	for i := range m.block {
		p.blocks = append(p.blocks, newPieceBlock(p, &m.block[i]))
	}
	return p
}

// state puts the state τ after the start into z, which must not be p.z.
func (p *piece) state(tau float64, z *vector) {
	p.modes(tau, z)
	for i := range p.blocks {
		q := &p.blocks[i]
		q.state(tau, z.block[q.first:q.first+q.own])
	}
}

// modes is state for everything but the blocks.
func (p *piece) modes(tau float64, z *vector) {
	for k := range z.real {
		z.real[k] = p.realAt(k, tau)
	}
	for k := range z.pair {
		z.pair[k] = p.pairAt(k, tau)
	}
}

func (p *piece) realAt(k int, tau float64) float64 {
	pole := p.m.real[k]
	e, f1 := phi1(pole, tau)
	x := e*p.z.real[k] + f1*p.a.real[k]
	if p.ramps {
		x += phi2(pole, tau, f1) * p.b.real[k]
	}
	if p.bent != nil {
		x += p.bentReal(k, tau, f1)
	}
	for i := range p.forced {
		if f := &p.forced[i]; f.in.real[k] != 0 {
			x += f.in.real[k] * real(f.amp*divided(f.rate, complex(pole, 0), tau))
		}
	}
	return x
}

func (p *piece) pairAt(k int, tau float64) complex128 {
	pole := p.m.pair[k]
	e, f1 := cphi1(pole, tau)
	x := e*p.z.pair[k] + f1*p.a.pair[k]
	if p.ramps {
		x += cphi2(pole, tau, f1) * p.b.pair[k]
	}
	if p.bent != nil {
		x += p.bentPair(k, tau, f1)
	}
	for i := range p.forced {
		if f := &p.forced[i]; f.in.pair[k] != 0 {
			x += f.in.pair[k] / 2 * f.onPair(pole, tau)
		}
	}
	return x
}

// onPair is the response of ζ' = p ζ + 2·Re(amp·exp(rate·τ)) from rest.
func (f *forcing) onPair(p complex128, tau float64) complex128 {
	return f.amp*divided(f.rate, p, tau) + cmplx.Conj(f.amp)*divided(cmplx.Conj(f.rate), p, tau)
}

// A pieceBlock is a block together with what drives it in a piece. An exponential
// near a pole of the block joins it as a further mode, so that resonance is
// nothing special; any other is split off as its own steady answer.
type pieceBlock struct {
	first, own int // coordinates in vector.block
	n          int // own and the exponentials that joined
	t          []float64
	z, a, b    []float64
	bent       [][]float64 // of τ², τ³, …
	far        []steadyPart
}

// A steadyPart is Re(y·exp(rate·τ)), y over the block's own coordinates.
type steadyPart struct {
	rate complex128
	y    []complex128
}

func newPieceBlock(p *piece, q *block) pieceBlock {
	r := pieceBlock{first: q.first, own: q.n, n: q.n, t: q.t}
	part := func(v []float64) []float64 { return append([]float64(nil), v[q.first:q.first+q.n]...) }
	r.z, r.a, r.b = part(p.z.block), part(p.a.block), part(p.b.block)
	for k := range p.bent {
		r.bent = append(r.bent, part(p.bent[k].block))
	}
	for i := range p.forced {
		f := &p.forced[i]
		in := f.in.block[q.first : q.first+q.n]
		switch {
		case allZero(in):
		case q.near(f.rate):
			r.join(f, in)
		default:
			r.split(q, f, in)
		}
	}
	return r
}

// near reports that the rate lies near a pole of the block:
// closer than a tenth of the larger of the two.
func (q *block) near(s complex128) bool {
	for i := 0; i < q.n; i++ {
		p := complex(q.t[i*q.n+i], 0)
		if i+1 < q.n && q.t[(i+1)*q.n+i] != 0 {
			a, d := q.t[i*q.n+i], q.t[(i+1)*q.n+i+1]
			h := (a - d) / 2
			p = complex(a-h, 0) + cmplx.Sqrt(complex(h*h+q.t[i*q.n+i+1]*q.t[(i+1)*q.n+i], 0))
			if gap(s, p) || gap(s, cmplx.Conj(p)) {
				return true
			}
			i++
			continue
		}
		if gap(s, p) {
			return true
		}
	}
	return false
}

func gap(s, p complex128) bool { return cmplx.Abs(s-p) <= 0.1*max(cmplx.Abs(s), cmplx.Abs(p)) }

// join appends the generator of Re(amp·exp(rate·τ)) as one or two further states.
func (r *pieceBlock) join(f *forcing, in []float64) {
	extra := 2
	if imag(f.rate) == 0 {
		extra = 1
	}
	n := r.n + extra
	t := make([]float64, n*n)
	for i := range r.n {
		copy(t[i*n:], r.t[i*r.n:(i+1)*r.n])
	}
	for i, v := range in {
		t[i*n+r.n] = v
	}
	k := r.n
	t[k*n+k] = real(f.rate)
	r.z = append(r.z, real(f.amp))
	if extra == 2 { // u = Re w, w' = rate·w; the states are Re w and −Im w
		t[k*n+k+1], t[(k+1)*n+k], t[(k+1)*n+k+1] = imag(f.rate), -imag(f.rate), real(f.rate)
		r.z = append(r.z, -imag(f.amp))
	}
	for range extra {
		r.a, r.b = append(r.a, 0), append(r.b, 0)
		for k := range r.bent {
			r.bent[k] = append(r.bent[k], 0)
		}
	}
	r.n, r.t = n, t
}

// split takes the steady answer y = (rate·I − T)⁻¹ in·amp out of the state.
func (r *pieceBlock) split(q *block, f *forcing, in []float64) {
	y := make([]complex128, q.n)
	for i, v := range in {
		y[i] = complex(v, 0) * f.amp
	}
	q.resolve(f.rate, y)
	for i, v := range y {
		r.z[i] -= real(v)
	}
	r.far = append(r.far, steadyPart{f.rate, y})
}

// state puts the block's own coordinates at τ into z.
func (r *pieceBlock) state(tau float64, z []float64) {
	all := make([]float64, r.n)
	r.joint(newBlockWork(r.n), tau, all)
	copy(z, all)
	for i := range r.far {
		g := cexp(r.far[i].rate, tau)
		for j := range z {
			z[j] += real(r.far[i].y[j] * g)
		}
	}
}

// joint puts the coordinates at τ, joined exponentials included and steady answers
// left out, into z.
func (r *pieceBlock) joint(w *blockWork, tau float64, z []float64) {
	w.at(r.n, r.t, tau)
	for i := range z {
		var x float64
		for j := range r.n {
			x += w.e[i*r.n+j]*r.z[j] + tau*(w.p1[i*r.n+j]*r.a[j]+tau*w.p2[i*r.n+j]*r.b[j])
		}
		z[i] = x
	}
	if r.bent != nil {
		r.bend(r.bentPhis(tau, 0), tau, z)
	}
}
