package matrix

import (
	"math"

	blaslib "gonum.org/v1/gonum/blas"
)

// general uncouples a part of any kind: scaled real Schur form, grouping, and
// refinement of every block with the residual in doubled precision.
func (s *system) general(states []int, a *scaledMatrix) (*part, error) {
	m := len(states)
	t, q, err := schur(m, cloned(a.hi))
	if err != nil {
		return nil, err
	}
	g := newEigenblocks(m, t, q)
	if !g.refine(a) {
		if h := bothEnds(a, g); h != nil && h.refine(a) {
			g = h
		}
	}
	p := newPart(states)
	p.start = g.start
	for k, v := range g.d {
		p.d[k] = math.Ldexp(v, -a.time)
	}
	for i, st := range states {
		f, h := math.Ldexp(1, -a.scale[i]), math.Ldexp(1, a.scale[i])
		for k := 0; k < m; k++ {
			p.v[i*m+k] = g.x[i*m+k] * f
			p.w[k*m+i] = g.wt[i*m+k] * h / s.c[st]
		}
	}
	p.coupling = g.coupling
	s.comparable(p)
	data := s.sensitivity(p)
	for k := range g.radius {
		for l := range data[k] {
			data[k][l] = math.Ldexp(data[k][l], a.time) + g.radius[k]
		}
		p.roots = append(p.roots, g.roots(k, a.time, data[k]))
	}
	return p, nil
}

// eigenblocks is M X = X D, Wᵀ M = D Wᵀ, Wᵀ X = I, D block diagonal over atoms.
type eigenblocks struct {
	m        int
	x, wt    []float64 // m×m; the columns of wt are left vectors
	d        []float64
	start    []int
	coupling float64
	radius   []float64 // of the poles of each atom, or of their mean where it has several
}

// newEigenblocks groups and uncouples a Schur form; blocks are made contiguous.
func newEigenblocks(m int, t, q []float64) *eigenblocks {
	start := atomsOf(m, t)
	poles := make([][]complex128, len(start)-1)
	level := make([]float64, len(poles))
	for k := range poles {
		w := start[k+1] - start[k]
		poles[k], level[k] = eigenvalues(w, submatrix(t, m, start[k], w)), 1
	}
	u := decouple(m, t, start, poles, level, func(i, j int) bool { return true })
	x := append([]float64(nil), q...)
	blas.Dtrmm(blaslib.Right, blaslib.Lower, blaslib.Trans, blaslib.Unit, m, m, 1, u.ut, m, x, m)
	wt := append([]float64(nil), q...)
	blas.Dtrsm(blaslib.Right, blaslib.Lower, blaslib.NoTrans, blaslib.Unit, m, m, 1, u.ut, m, wt, m)
	g := &eigenblocks{m: m, x: make([]float64, m*m), wt: make([]float64, m*m), d: make([]float64, m*m)}
	var order []int
	for _, atoms := range u.members() {
		g.start = append(g.start, len(order))
		for _, a := range atoms {
			for k := start[a]; k < start[a+1]; k++ {
				order = append(order, k)
			}
		}
	}
	g.start = append(g.start, m)
	for k, from := range order {
		for i := 0; i < m; i++ {
			g.x[i*m+k], g.wt[i*m+k] = x[i*m+from], wt[i*m+from]
		}
	}
	for a := 0; a+1 < len(g.start); a++ {
		for k := g.start[a]; k < g.start[a+1]; k++ {
			for l := g.start[a]; l < g.start[a+1]; l++ {
				g.d[k*m+l] = u.d[order[k]*m+order[l]]
			}
		}
	}
	g.coupling = u.size
	g.radius = make([]float64, len(g.start)-1)
	g.estimate(t)
	return g
}

// estimate sets the radius of every atom from its condition: rounding of the
// Schur form is a change of M by a few units of ε‖M‖.
func (g *eigenblocks) estimate(t []float64) {
	norm := norm2(t)
	for a := range g.radius {
		g.radius[a] = 4 * eps * norm * g.condition(a)
	}
}

// condition is ‖X_a‖‖W_a‖, the norm of the spectral projector or more.
func (g *eigenblocks) condition(a int) float64 {
	var x, w float64
	for i := 0; i < g.m; i++ {
		for k := g.start[a]; k < g.start[a+1]; k++ {
			x += g.x[i*g.m+k] * g.x[i*g.m+k]
			w += g.wt[i*g.m+k] * g.wt[i*g.m+k]
		}
	}
	return math.Sqrt(x) * math.Sqrt(w)
}

// block copies the diagonal block of atom a.
func (g *eigenblocks) block(a int) (p int, d []float64) {
	p = g.start[a+1] - g.start[a]
	return p, submatrix(g.d, g.m, g.start[a], p)
}

// roots returns the poles of atom a, the entries of its block uncertain by err,
// in time scaled by 2^−time.
func (g *eigenblocks) roots(a, time int, err []float64) []Root {
	p, d := g.block(a)
	var list []Root
	switch p {
	case 1:
		list = []Root{{Re: d[0], Radius: err[0] + ulps(2, d[0])}}
	case 2:
		list = blockRoots(d, err)
	default:
		values := eigenvalues(p, d)
		radius := clusterRadius(p, d, values, norm2(err))
		for _, v := range values {
			list = append(list, Root{Re: real(v), Im: imag(v), Radius: radius + ulps(2, cabs(v))})
		}
	}
	for k := range list {
		list[k].mean = norm2(err)
	}
	return scaleRoots(list, time)
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
