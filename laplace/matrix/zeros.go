package matrix

import (
	"errors"
	"math"
)

// ErrZeroTransfer is returned where no finite zero is defined because nothing
// passes from the input to the output.
var ErrZeroTransfer = errors.New("matrix: the transfer is identically zero")

// Zeros returns the zeros of x' = a x + b u, y = c x + d u, a n×n row-major, r the
// structural relative degree (StructuralDegree; 0 where d ≠ 0): n − r of them,
// fewer where routes cancel exactly. They include the decoupling zeros, equal to
// the poles that cancel. A zero at 0 is exactly 0. Slowest first.
//
// Accuracy: simple zeros to a few 1e-16 relative for the numbers as given,
// stated in Radius; an m-fold zero of one strongly connected part to ε^(1/m).
//
// Method: output-nulling reduction, a state at a time (A. Emami-Naeini, P. Van
// Dooren, Automatica 18 (1982) 415), r counted and not judged by size, in
// doubled precision; the eigenvalues of what is left as in BlockForm. Cost: 60 n³
// for the part refined.
func Zeros(n int, a, b, c []float64, d float64, r int) ([]Root, error) {
	s, err := plain(n, nil, a)
	if err != nil {
		return nil, err
	}
	if len(b) != n || len(c) != n {
		return nil, ErrShape
	}
	if !allFinite(b) || !allFinite(c) || d-d != 0 {
		return nil, ErrValue
	}
	return s.zeros(b, c, d, r)
}

// StoreZeros is Zeros for capacity[i] x[i]' = Σ_j g[i,j] x[j] + b[i] u, y = c x + d u,
// the relative degree counted here: the numbers are taken as given, before any
// division by a capacity.
func StoreZeros(n int, capacity, g, b, c []float64, d float64) ([]Root, error) {
	s, err := plain(n, capacity, g)
	if err != nil {
		return nil, err
	}
	if len(b) != n || len(c) != n {
		return nil, ErrShape
	}
	if !allFinite(b) || !allFinite(c) || d-d != 0 {
		return nil, ErrValue
	}
	r, reachable := StructuralDegree(&Balance{N: n, F: g}, b, c, d)
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

// exactZeros is the number up to which degree and zeros at 0 are always decided
// exactly before the zeros are computed.
const exactZeros = 64

func (s *system) zeros(b, c []float64, d float64, r int) ([]Root, error) {
	origin := 0
	var num []residue
	if s.n <= exactZeros {
		num = s.modularNumerator(b, c, d)
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

func (s *system) modularNumerator(b, c []float64, d float64) []residue {
	states, x, y := make([]int, s.n), s.exactRates(b), make([]residue, s.n)
	for i := range states {
		states[i] = i
		y[i] = modFloat(c[i])
	}
	num, _ := modNumerator(s.n, s.modular(states), x, y, modFloat(d))
	return num
}

// nuller is x' = a x + b u, y = c x + d u in doubled precision while states are
// taken out of it.
type nuller struct {
	n       int
	a, b, c []dd
	d       dd
	scale   []int
	noise   []float64 // of a: size of the numbers it was made from
	cNoise  []float64 // of c likewise; nil where c is as given
}

// nulling returns the system whose poles are the zeros: what is left of x' = A x
// + b u when u keeps y at 0.
func (s *system) nulling(b, c []float64, d float64, r int) (*system, error) {
	n, in := s.n, s.rates(b)
	z := &nuller{n: n, a: make([]dd, n*n), b: make([]dd, n), c: make([]dd, n), d: toDD(d), scale: append([]int(nil), s.scale...), noise: make([]float64, n*n)}
	for i := 0; i < n; i++ {
		up := math.Ldexp(1, s.scale[i])
		z.b[i], z.c[i] = in[i].scale(up), toDD(c[i]).scale(1/up)
		for j := 0; j < n; j++ {
			v := s.diag[i]
			if i != j {
				v = s.entry(i, j)
			}
			k := math.Ldexp(1, s.scale[i]-s.scale[j])
			z.a[i*n+j] = over(v, s.c[i]).scale(k)
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
// in terms of the others, and y' takes the place of y.
func (z *nuller) step() bool {
	n, j := z.n, 0
	for i := range z.c {
		if math.Abs(z.c[i].hi) > math.Abs(z.c[j].hi) {
			j = i
		}
	}
	if n == 0 || z.c[j].zero() {
		return false
	}
	m := make([]dd, n) // y/c[j] = x[j] + Σ m[i] x[i]
	for i := range m {
		if m[i] = z.c[i].div(z.c[j]); i == j {
			m[i] = toDD(1)
		}
	}
	next := &nuller{n: n - 1}
	next.c = make([]dd, 0, n-1)
	row := make([]dd, n)
	next.cNoise = make([]float64, 0, n-1)
	rowNoise := make([]float64, n)
	for i := 0; i < n; i++ {
		var drop dd
		if drop = z.a[i*n+j]; i != j {
			next.b = append(next.b, z.b[i])
			next.scale = append(next.scale, z.scale[i])
		}
		if !m[i].zero() && !z.b[i].zero() {
			next.d = next.d.add(m[i].mul(z.b[i]))
		}
		for k := 0; k < n; k++ {
			if k == j {
				continue
			}
			v, e := z.a[i*n+k], z.noise[i*n+k]
			if !drop.zero() && !m[k].zero() {
				v = v.sub(drop.mul(m[k]))
				e += (z.noise[i*n+j] + 2*math.Abs(drop.hi)) * math.Abs(m[k].hi)
				v = v.orZero(e)
			}
			if i != j {
				next.a = append(next.a, v)
				next.noise = append(next.noise, e)
			}
			if !m[i].zero() {
				row[k] = row[k].add(m[i].mul(v))
				rowNoise[k] += math.Abs(m[i].hi) * (e + 2*math.Abs(v.hi))
			}
		}
	}
	for k, v := range row {
		if k != j {
			next.c = append(next.c, v.orZero(rowNoise[k]))
			next.cNoise = append(next.cNoise, rowNoise[k])
		}
	}
	*z = *next
	return true
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
	n := z.n
	s := &system{n: n, c: make([]float64, n), g: make([]float64, n*n), low: make([]float64, n*n), noise: z.noise, diag: make([]dd, n), scale: make([]int, n)}
	if n > 0 && z.d.zero() {
		return nil, ErrZeroTransfer
	}
	for i := 0; i < n; i++ {
		s.c[i] = 1
		for j := 0; j < n; j++ {
			v := z.a[i*n+j]
			if !z.b[i].zero() && !z.c[j].zero() {
				f := z.b[i].div(z.d)
				v = v.sub(f.mul(z.c[j]))
				s.noise[i*n+j] += math.Abs(f.hi) * (3*math.Abs(z.c[j].hi) + z.noiseOf(j))
				v = v.orZero(s.noise[i*n+j])
			}
			s.g[i*n+j], s.low[i*n+j] = v.hi, v.lo
			if i == j {
				s.diag[i] = v
			}
		}
	}
	return s, nil
}
