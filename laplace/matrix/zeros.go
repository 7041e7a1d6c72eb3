package matrix

import (
	"errors"
	"math"
)

// ErrZeroTransfer is returned where no finite zero is defined because nothing
// passes from the input to the output.
var ErrZeroTransfer = errors.New("matrix: the transfer is identically zero")

// DenseZeros returns the zeros of x' = a x + b u, y = c x + d u, a n×n row-major. They
// include the decoupling zeros, equal to the poles that cancel. A zero at 0 is exactly
// 0. Slowest first.
//
// Their number is n less the relative degree, which is counted in the graph
// (StructuralDegree) and up to 64 states from the exact numerator, not judged by size:
// routes that cancel exactly leave fewer. It returns ErrShape, ErrValue,
// ErrZeroTransfer, ErrRange or ErrNoConvergence.
//
// Accuracy: simple zeros to a few 1e-16 relative for the numbers as given,
// stated in Radius; an m-fold zero of one strongly connected part to ε^(1/m), or where
// the exact numerator says that it is one, at its mean.
//
// Method: output-nulling reduction, a state at a time (A. Emami-Naeini, P. Van
// Dooren, Automatica 18 (1982) 415), in doubled precision; the eigenvalues of what is
// left as in BlockForm. Cost: 60 n³ for the part refined.
func DenseZeros(n int, a, b, c []float64, d float64) ([]Root, error) {
	s, err := plain(n, a)
	if err != nil {
		return nil, err
	}
	if len(b) != n || len(c) != n {
		return nil, ErrShape
	}
	if !allFinite(b) || !allFinite(c) || d-d != 0 {
		return nil, ErrValue
	}
	r, reachable := StructuralDegree(&Balance{N: n, F: a}, b, c, d)
	if !reachable {
		return nil, ErrZeroTransfer
	}
	return s.zeros(b, c, d, r)
}

// Zeros returns the zeros of the transfer from the flows in to the weights out,
// d passed on at once, of the stores that take part in it (Path): zeros equal to
// the poles of other stores are left out with those poles. It returns
// ErrZeroTransfer where nothing passes. At the store that is heated itself they
// are the poles with that store held, as accurate as poles.
func (b *Balance) Zeros(in, out []float64, d float64) ([]Root, error) {
	if err := b.checkTransfer(in, out, d); err != nil {
		return nil, err
	}
	r, reachable := StructuralDegree(b, in, out, d)
	if !reachable {
		return nil, ErrZeroTransfer
	}
	keep := b.Path(in, out)
	part := b.Restrict(keep)
	x, y := make([]float64, len(keep)), make([]float64, len(keep))
	for k, i := range keep {
		x[k], y[k] = in[i], out[i]
	}
	if k, ok := drivingPoint(x, y); ok && d == 0 {
		return part.heldPoles(k)
	}
	return part.system().zeros(x, y, d, r)
}

// drivingPoint reports the one store that both vectors single out.
func drivingPoint(in, out []float64) (k int, ok bool) {
	k = -1
	for i := range in {
		if in[i] == 0 && out[i] == 0 {
			continue
		}
		if k >= 0 || in[i] == 0 || out[i] == 0 {
			return 0, false
		}
		k = i
	}
	return k, k >= 0
}

// heldPoles returns the poles that are left with store k held at 0.
func (b *Balance) heldPoles(k int) ([]Root, error) {
	var rest []int
	for i := 0; i < b.N; i++ {
		if i != k {
			rest = append(rest, i)
		}
	}
	held := b.Restrict(rest)
	s := held.system()
	return s.poles()
}

// poles lists the eigenvalues part by part.
func (s *system) poles() ([]Root, error) {
	var list []Root
	var work BlockWork
	s.rootsOnly = true
	for _, states := range components(s.n, s.feels) {
		p, err := s.analyse(states, &work)
		if err != nil {
			return nil, err
		}
		for _, roots := range p.roots {
			list = append(list, roots...)
		}
	}
	sortRoots(list)
	return list, nil
}

// exactZeros is the number of states up to which degree and zeros at 0 are always decided
// exactly before the zeros are computed.
const exactZeros = 64

func (s *system) zeros(b, c []float64, d float64, r int) ([]Root, error) {
	origin := 0
	var num []residue
	if s.n <= exactZeros {
		num, _ = s.modularRatio(b, c, d)
		if len(num) == 0 {
			return nil, ErrZeroTransfer
		}
		r, origin = s.n-(len(num)-1), modOrder(num)
	}
	if r > s.n || r < 0 {
		return nil, ErrZeroTransfer
	}
	null, err := s.nulling(b, c, d, r)
	if err != nil {
		return nil, err
	}
	at0 := 0
	if rest := null.withoutOrigin(origin); rest != nil {
		null, at0 = rest, origin
	}
	roots, err := null.poles()
	if err != nil {
		return nil, err
	}
	roots = append(make([]Root, at0, at0+len(roots)), roots...)
	for k := 0; k < origin && k < len(roots); k++ {
		roots[k] = Root{}
	}
	if num != nil {
		list := make([]*Root, len(roots))
		for k := range roots {
			list[k] = &roots[k]
		}
		settleMultiple(list, func() int { return modRepeated(num) })
		sortRoots(roots)
	}
	return roots, nil
}

// nuller is x' = a x + b u, y = c x + d u in doubled precision while states are
// taken out of it. The matrices stay where they are; left says which states count.
type nuller struct {
	n       int
	left    []int // states not taken out, ascending
	a, b, c []dd
	d       dd
	noise   []float64 // of a: size of the numbers it was made from
	cNoise  []float64 // of c likewise; nil where c is as given

	m, row   []dd // of a step
	rowNoise []float64
}

// nulling returns the system whose poles are the zeros: what is left of x' = A x
// + b u when u keeps y at 0.
func (s *system) nulling(b, c []float64, d float64, r int) (*system, error) {
	n, in := s.n, s.rates(b)
	z := &nuller{n: n, left: make([]int, n), a: make([]dd, n*n), b: make([]dd, n), c: make([]dd, n), d: toDD(d),
		noise: make([]float64, n*n)}
	for i := 0; i < n; i++ {
		z.left[i] = i
		up := math.Ldexp(1, s.scale[i])
		z.b[i], z.c[i] = in[i].scale(up), toDD(c[i]).scale(1/up)
		for j := 0; j < n; j++ {
			k := math.Ldexp(1, s.scale[i]-s.scale[j])
			z.a[i*n+j] = quotient(s.element(i, j), s.c[i]).scale(k)
			z.noise[i*n+j] = s.uncertain(i, j) / s.c[i] * k
		}
	}
	for ; r > 0; r-- {
		if !z.step() {
			return nil, ErrZeroTransfer
		}
	}
	return z.close()
}

// step takes one state out: y = 0 for good gives the state of the largest weight
// in terms of the others, and y' takes the place of y. A row that neither the state
// nor the output touches stays as it is, so that a chain costs n² in all.
func (z *nuller) step() bool {
	if len(z.left) == 0 {
		return false
	}
	at := 0
	for k, i := range z.left {
		if math.Abs(z.c[i].hi) > math.Abs(z.c[z.left[at]].hi) {
			at = k
		}
	}
	j := z.left[at]
	if z.c[j].zero() {
		return false
	}
	z.solveFor(j)
	z.d = dd{}
	for _, i := range z.left {
		if !z.m[i].zero() && !z.b[i].zero() {
			z.d = z.d.add(z.m[i].mul(z.b[i]))
		}
		if !z.a[i*z.n+j].zero() || !z.m[i].zero() {
			z.replace(i, j)
		}
	}
	z.left = append(z.left[:at], z.left[at+1:]...)
	if z.cNoise == nil {
		z.cNoise = make([]float64, z.n)
	}
	for _, k := range z.left {
		z.c[k], z.cNoise[k] = z.row[k].orZero(z.rowNoise[k]), z.rowNoise[k]
	}
	return true
}

// solveFor writes y/c[j] = x[j] + Σ m[i] x[i].
func (z *nuller) solveFor(j int) {
	if z.m == nil {
		z.m, z.row, z.rowNoise = make([]dd, z.n), make([]dd, z.n), make([]float64, z.n)
	}
	for _, i := range z.left {
		z.row[i], z.rowNoise[i] = dd{}, 0
		if z.m[i] = z.c[i].div(z.c[j]); i == j {
			z.m[i] = toDD(1)
		}
	}
}

// replace puts the others for state j into the equation of state i, and that into y'.
func (z *nuller) replace(i, j int) {
	a, noise, m := z.a[i*z.n:(i+1)*z.n], z.noise[i*z.n:(i+1)*z.n], z.m[i]
	drop, dropNoise := a[j], noise[j]
	for _, k := range z.left {
		if k == j {
			continue
		}
		if !drop.zero() && !z.m[k].zero() {
			noise[k] += (dropNoise + 2*math.Abs(drop.hi)) * math.Abs(z.m[k].hi)
			a[k] = a[k].sub(drop.mul(z.m[k])).orZero(noise[k])
		}
		if !m.zero() {
			z.row[k] = z.row[k].add(m.mul(a[k]))
			z.rowNoise[k] += math.Abs(m.hi) * (noise[k] + 2*math.Abs(a[k].hi))
		}
	}
}

// noiseOf is the noise of c[j].
func (z *nuller) noiseOf(j int) float64 {
	if z.cNoise == nil {
		return math.Abs(z.c[j].hi)
	}
	return z.cNoise[j]
}

// close puts u = −c x/d into x' = a x + b u.
func (z *nuller) close() (*system, error) {
	n := len(z.left)
	s := &system{n: n, c: make([]float64, n), g: make([]float64, n*n), low: make([]float64, n*n),
		noise: make([]float64, n*n), diag: make([]dd, n), scale: make([]int, n)}
	if n > 0 && z.d.zero() {
		return nil, ErrZeroTransfer
	}
	for p, i := range z.left {
		s.c[p] = 1
		for q, j := range z.left {
			v, e := z.a[i*z.n+j], z.noise[i*z.n+j]
			if !z.b[i].zero() && !z.c[j].zero() {
				f := z.b[i].div(z.d)
				v = v.sub(f.mul(z.c[j]))
				e += math.Abs(f.hi) * (3*math.Abs(z.c[j].hi) + z.noiseOf(j))
				v = v.orZero(e)
			}
			s.g[p*n+q], s.low[p*n+q], s.noise[p*n+q] = v.hi, v.lo, e
			if p == q {
				s.diag[p] = v
			}
		}
	}
	return s, nil
}
