package matrix

import (
	"math"
	"slices"
)

// general uncouples a part of any kind: scaled real Schur form, grouping, and
// refinement of every block with the residual in doubled precision.
func (s *system) general(states []int, a *scaledMatrix, w *BlockWork) (*part, error) {
	m := len(states)
	if err := w.schur.schur(m, a.hi); err != nil {
		return nil, err
	}
	g := &w.g
	w.u.limit = maxCoupling
	if s.rootsOnly {
		w.u.limit = rootLimit
	}
	g.uncouple(w)
	if !g.refine(a, w) {
		if h := bothEnds(a, g, w); h != nil && h.refine(a, w) {
			g = h
		}
	}
	p := newPart(states)
	p.start = slices.Clone(g.start)
	g.unscale(p, a, s.c)
	p.coupling = g.coupling
	s.comparable(p)
	data := s.sensitivity(p, w)
	list := make([]Root, 0, m)
	p.roots = make([][]Root, 0, len(g.radius))
	for k := range g.radius {
		for l := range data[k] {
			data[k][l] = math.Ldexp(data[k][l], a.time) + g.radius[k]
		}
		from := len(list)
		list = g.roots(list, k, a.time, data[k])
		p.roots = append(p.roots, list[from:len(list):len(list)])
	}
	return p, nil
}

// unscale writes X, W and D in the units of the part.
func (g *eigenblocks) unscale(p *part, a *scaledMatrix, c []float64) {
	m := g.m
	for b := 0; b+1 < len(g.start); b++ {
		for k := g.start[b]; k < g.start[b+1]; k++ {
			for l := g.start[b]; l < g.start[b+1]; l++ {
				p.d[k*m+l] = math.Ldexp(g.d[k*m+l], -a.time)
			}
		}
	}
	for i, st := range p.states {
		f := math.Ldexp(1, -a.scale[i])
		for k, v := range g.x[i*m : i*m+m] {
			p.v[i*m+k] = v * f
		}
		h := math.Ldexp(1, a.scale[i])
		for k, v := range g.wt[i*m : i*m+m] {
			p.w[k*m+i] = v * h / c[st]
		}
	}
}

// eigenblocks is M X = X D, Wᵀ M = D Wᵀ, Wᵀ X = I, D block diagonal over atoms.
type eigenblocks struct {
	m        int
	x, wt    []float64 // m×m; the columns of wt are left vectors
	d        []float64
	start    []int
	coupling float64
	radius   []float64 // of the poles of each atom, or of their mean where it has several

	size []float64 // working space of conditions
}

// uncouple groups and uncouples the Schur form in w; blocks are made contiguous.
func (g *eigenblocks) uncouple(w *BlockWork) {
	s, u := &w.schur, &w.u
	m, ld := s.n, s.ld
	w.start = appendAtoms(w.start[:0], m, ld, s.h)
	w.poles = w.poles[:0]
	w.ones = resized(w.ones, len(w.start))
	for a := 0; a+1 < len(w.start); a++ {
		w.ones[a] = 1
		at := w.start[a]*ld + w.start[a]
		if w.start[a+1]-w.start[a] == 1 {
			w.poles = append(w.poles, complex(s.h[at], 0))
			continue
		}
		im := math.Sqrt(math.Abs(s.h[at+1])) * math.Sqrt(math.Abs(s.h[at+ld])) // equal on the diagonal
		w.poles = append(w.poles, complex(s.h[at], im), complex(s.h[at], -im))
	}
	u.decouple(m, ld, s.h, w.start, w.poles, w.ones, nil)
	s.vectorsBy(u)
	g.m, g.coupling = m, u.size
	g.x, g.wt, g.d = resized(g.x, m*m), resized(g.wt, m*m), resized(g.d, m*m)
	clear(g.d)
	w.order, g.start = u.layOut(w.start, w.order[:0], g.start[:0])
	turned(m, g.x, s.vectors, ld, w.order)
	turned(m, g.wt, s.qt, ld, w.order)
	for a := 0; a+1 < len(g.start); a++ {
		for k := g.start[a]; k < g.start[a+1]; k++ {
			for l := g.start[a]; l < g.start[a+1]; l++ {
				g.d[k*m+l] = u.d[w.order[k]*ld+w.order[l]]
			}
		}
	}
	g.estimate(norm2(s.h[:m*ld]))
}

// vectorsBy turns qt into U⁻¹Qᵀ and puts (Q U)ᵀ into vectors.
func (s *schurWork) vectorsBy(u *decoupling) {
	n, ld := s.n, s.ld
	w := (n + 3) &^ 3
	x := s.vectors
	copy(x, s.qt[:n*ld])
	for j := n - 1; j > 0; j-- {
		sumRows(x, ld, j, w, u.ut[j*ld:], x[j*ld:])
	}
	f := s.x
	for i := n - 2; i >= 0; i-- {
		for j := i + 1; j < n; j++ {
			f[j-i-1] = -u.ut[j*ld+i]
		}
		sumRows(s.qt[(i+1)*ld:], ld, n-1-i, w, f, s.qt[i*ld:])
	}
}

// layOut lists the rows cluster by cluster, and where the clusters begin.
func (u *decoupling) layOut(start, order, first []int) (rows, begins []int) {
	if len(u.cluster) == populated(u.members) { // every atom for itself
		for i := 0; i < u.n; i++ {
			order = append(order, i)
		}
		return order, append(first, start...)
	}
	for _, atoms := range u.clusters() {
		first = append(first, len(order))
		for _, a := range atoms {
			for k := start[a]; k < start[a+1]; k++ {
				order = append(order, k)
			}
		}
	}
	return order, append(first, u.n)
}

// populated counts the clusters that have members.
func populated(members []int) (n int) {
	for _, m := range members {
		if m > 0 {
			n++
		}
	}
	return n
}

// turned sets column k of x, m×m, to row order[k] of rows; in squares of eight, so
// that both sides stay in the cache.
func turned(m int, x, rows []float64, ld int, order []int) {
	for k0 := 0; k0 < m; k0 += 8 {
		for i0 := 0; i0 < m; i0 += 8 {
			for k := k0; k < min(k0+8, m); k++ {
				from := rows[order[k]*ld+i0 : order[k]*ld+min(i0+8, m)]
				at := i0*m + k
				for _, v := range from {
					x[at] = v
					at += m
				}
			}
		}
	}
}

// estimate sets the radius of every atom from its condition: rounding of the
// Schur form is a change of M by a few units of ε‖M‖.
func (g *eigenblocks) estimate(norm float64) {
	g.radius = g.conditions(g.radius)
	for a, c := range g.radius {
		g.radius[a] = 4 * eps * norm * c
	}
}

// conditions sets c to ‖X_a‖‖W_a‖ for every atom, the norm of the spectral projector
// or more.
func (g *eigenblocks) conditions(c []float64) []float64 {
	m := g.m
	g.size = resized(g.size, 2*m)
	clear(g.size)
	x, w := g.size[:m], g.size[m:]
	for i := 0; i < m; i++ {
		for k, v := range g.x[i*m : i*m+m] {
			x[k] += v * v
		}
		for k, v := range g.wt[i*m : i*m+m] {
			w[k] += v * v
		}
	}
	c = resized(c, len(g.start)-1)
	for a := range c {
		var sx, sw float64
		for k := g.start[a]; k < g.start[a+1]; k++ {
			sx, sw = sx+x[k], sw+w[k]
		}
		c[a] = math.Sqrt(sx) * math.Sqrt(sw)
	}
	return c
}

// block copies the diagonal block of atom a.
func (g *eigenblocks) block(a int) (p int, d []float64) {
	p = g.start[a+1] - g.start[a]
	return p, submatrix(g.d, g.m, g.start[a], p)
}

// roots appends the poles of atom a to list, the entries of its block uncertain by
// err, in time scaled by 2^−time.
func (g *eigenblocks) roots(list []Root, a, time int, err []float64) []Root {
	at, p := g.start[a]*(g.m+1), g.start[a+1]-g.start[a]
	from := len(list)
	switch p {
	case 1:
		list = append(list, Root{Re: g.d[at], Radius: err[0] + ulps(2, g.d[at])})
	case 2:
		list = appendPair(list, [4]float64{g.d[at], g.d[at+1], g.d[at+g.m], g.d[at+g.m+1]}, err)
	default:
		_, d := g.block(a)
		values := eigenvalues(p, d)
		radius := clusterRadius(p, d, values, norm2(err))
		for _, v := range values {
			list = append(list, Root{Re: real(v), Im: imag(v), Radius: radius + ulps(2, cabs(v))})
		}
	}
	mean := norm2(err)
	for k := from; k < len(list); k++ {
		list[k].mean = mean
	}
	scaleRoots(list[from:], time)
	return list
}

// clusterRadius bounds the error of each of the p poles of a block known to
// within eta in norm. Poles apart by more than the coupling between them move by
// about eta; a defective group of p moves by (eta·ν^(p−1))^(1/p), ν the size of the
// block about its mean.
func clusterRadius(p int, d []float64, values []complex128, eta float64) float64 {
	var mean float64
	for _, v := range values {
		mean += real(v) / float64(p)
	}
	about := cloned(d)
	for i := 0; i < p; i++ {
		about[i*p+i] -= mean
	}
	nu := norm2(about)
	if nu <= eta {
		return eta
	}
	return nu * math.Pow(eta/nu, 1/float64(p))
}
