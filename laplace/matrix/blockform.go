package matrix

import (
	"cmp"
	"math"
	"slices"
)

// A Block is one uncoupled part z' = T z of a BlockForm: the entries First to
// First+N−1 of z.
type Block struct {
	First, N int
	T        []float64 // 1/s; N×N row-major, quasi upper triangular, its 2×2 diagonal blocks of any form
}

// A Root is a pole or a zero, with an absolute bound of its error, rounding of the
// given numbers included.
type Root struct {
	Re, Im float64 // 1/s
	Radius float64 // 1/s
	Block  int     // the Block of a BlockForm it belongs to

	mean float64 // bound of the error of the mean of the roots it was computed together with
}

// A BlockForm is a system x' = A x uncoupled into blocks: x = X z, z' = diag(T) z.
//
// Poles closer than 1e-3 relative share a block, so that no residue of theirs
// has to be formed: a response taken through φ functions of the block (Phi) is
// accurate for repeated and nearly repeated poles. Every pole is listed, slowest
// first: ascending modulus, then real part, then imaginary part.
//
// Method: the strongly connected parts (Tarjan 1972) one by one. A part of
// resistances and capacitances goes through RCWork.Modes, any other through a
// scaled real Schur form refined in doubled precision; the parts and the groups
// of poles are uncoupled after Bavely and Stewart (1979). A pole of a part of
// one state is a quotient, and equal ones are equal bit for bit.
//
// Cost: 30 n³ operations and a few n² of storage for one part of n states.
type BlockForm struct {
	N        int
	Blocks   []Block
	Poles    []Root
	Coupling float64 // largest entry of the transformations that uncouple: digits lost in a response are at most its own

	parts []*part
	first []int       // of each part in the inner order of states
	u     *decoupling // between parts; nil for one part alone
	order []int       // inner index of each entry of z
	from  *system
}

// BlockForm uncouples b. It returns ErrShape, ErrValue, ErrRange, or ErrNoConvergence
// where the eigenvalue iteration gives up.
func (b *Balance) BlockForm() (*BlockForm, error) {
	if err := b.check(); err != nil {
		return nil, err
	}
	return b.system().blockForm()
}

// DenseBlockForm uncouples x' = a x, a n×n row-major. scale holds the square root
// of the capacity of each state, or any size that makes scale[i]·x[i] comparable;
// nil where they are so already.
func DenseBlockForm(n int, a, scale []float64) (*BlockForm, error) {
	if scale != nil && len(scale) != n {
		return nil, ErrShape
	}
	s, err := plain(n, nil, a)
	if err != nil {
		return nil, err
	}
	for i, v := range scale {
		if !(v > 0) || v-v != 0 {
			return nil, ErrValue
		}
		s.scale[i] = int(math.Round(math.Log2(v)))
	}
	return s.blockForm()
}

// StoreBlockForm uncouples capacity[i] x[i]' = Σ_j g[i,j] x[j]: pressures and flows
// with their compliances and inertances, g n×n row-major. In then takes inputs
// in the units of g·x.
func StoreBlockForm(n int, capacity, g []float64) (*BlockForm, error) {
	s, err := plain(n, capacity, g)
	if err != nil {
		return nil, err
	}
	return s.blockForm()
}

func (s *system) blockForm() (*BlockForm, error) {
	f := &BlockForm{N: s.n, from: s}
	var rc RCWork
	at := 0
	for _, states := range components(s.n, s.feels) {
		p, err := s.analyse(states, &rc)
		if err != nil {
			return nil, err
		}
		f.parts = append(f.parts, p)
		f.Coupling = math.Max(f.Coupling, p.coupling)
		f.first = append(f.first, at)
		at += len(states)
	}
	if len(f.parts) > 1 {
		f.uncouple(s)
	}
	f.finish()
	return f, nil
}

// uncouple assembles the parts, upper triangular by blocks since what is
// downstream comes first, and uncouples them.
func (f *BlockForm) uncouple(s *system) {
	n := f.N
	t := make([]float64, n*n)
	var start []int
	var poles [][]complex128
	var level []float64
	var owner []int
	reach := f.reach(s)
	for k, p := range f.parts {
		m, at := len(p.states), f.first[k]
		for i := 0; i < m; i++ {
			copy(t[(at+i)*n+at:(at+i)*n+at+m], p.d[i*m:i*m+m])
		}
		for a, roots := range p.roots {
			start = append(start, at+p.start[a])
			level = append(level, p.level(a))
			owner = append(owner, k)
			list := make([]complex128, len(roots))
			for i, r := range roots {
				list[i] = complex(r.Re, r.Im)
			}
			poles = append(poles, list)
		}
		for l := k + 1; l < len(f.parts); l++ {
			f.couple(s, t, k, l)
		}
	}
	start = append(start, n)
	f.u = decouple(n, t, start, poles, level, func(i, j int) bool { return reach[owner[j]][owner[i]] })
	f.Coupling = math.Max(f.Coupling, f.u.size)
}

// reach tells which parts each part feels, directly or through others.
func (f *BlockForm) reach(s *system) [][]bool {
	n := len(f.parts)
	owner := make([]int, s.n)
	for k, p := range f.parts {
		for _, i := range p.states {
			owner[i] = k
		}
	}
	reach := make([][]bool, n)
	for k := n - 1; k >= 0; k-- { // what a part feels comes after it
		reach[k] = make([]bool, n)
		for _, i := range f.parts[k].states {
			for j := 0; j < s.n; j++ {
				l := owner[j]
				if l == k || reach[k][l] || !s.feels(i, j) {
					continue
				}
				reach[k][l] = true
				for m, r := range reach[l] {
					reach[k][m] = reach[k][m] || r
				}
			}
		}
	}
	return reach
}

// couple writes W·G·V, what part k feels of part l, into t.
func (f *BlockForm) couple(s *system, t []float64, k, l int) {
	p, q := f.parts[k], f.parts[l]
	m, w := len(p.states), len(q.states)
	var g []float64 // G·V
	for i, si := range p.states {
		for j, sj := range q.states {
			if v := s.g[si*s.n+sj]; v != 0 {
				if g == nil {
					g = make([]float64, m*w)
				}
				for c := 0; c < w; c++ {
					g[i*w+c] += v * q.v[j*w+c]
				}
			}
		}
	}
	if g == nil {
		return
	}
	for i := 0; i < m; i++ {
		row := t[(f.first[k]+i)*s.n+f.first[l]:]
		for r := 0; r < m; r++ {
			for c := 0; c < w; c++ {
				row[c] += p.w[i*m+r] * g[r*w+c]
			}
		}
	}
}

// cluster is a block in the making.
type cluster struct {
	inner []int // states, in the inner order
	roots []Root
	t     []float64
}

// clusters lists the groups of atoms with their blocks.
func (f *BlockForm) clusters() (list []cluster) {
	var start []int
	var roots [][]Root
	for k, p := range f.parts {
		for a := range p.roots {
			start = append(start, f.first[k]+p.start[a])
			roots = append(roots, p.roots[a])
		}
	}
	start = append(start, f.N)
	add := func(d []float64, atoms ...int) {
		var c cluster
		for _, a := range atoms {
			c.roots = append(c.roots, roots[a]...)
			for i := start[a]; i < start[a+1]; i++ {
				c.inner = append(c.inner, i)
			}
		}
		for _, i := range c.inner {
			for _, j := range c.inner {
				c.t = append(c.t, d[i*f.N+j])
			}
		}
		sortRoots(c.roots)
		list = append(list, c)
	}
	if f.u != nil {
		for _, atoms := range f.u.members() {
			add(f.u.d, atoms...)
		}
		return list
	}
	for _, p := range f.parts { // one at most
		for a := range p.roots {
			add(p.d, a)
		}
	}
	return list
}

// finish lays the clusters out as blocks, slowest first, and lists the poles.
func (f *BlockForm) finish() {
	list := f.clusters()
	slices.SortStableFunc(list, func(p, q cluster) int { return slower(p.roots[0], q.roots[0]) })
	for k, c := range list {
		f.Blocks = append(f.Blocks, Block{First: len(f.order), N: len(c.inner), T: c.t})
		f.order = append(f.order, c.inner...)
		for _, r := range c.roots {
			r.Block = k
			f.Poles = append(f.Poles, r)
		}
	}
	sortRoots(f.Poles)
}

// slower orders roots: ascending modulus, then real part, then imaginary part.
func slower(p, q Root) int {
	return cmp.Or(
		cmp.Compare(math.Hypot(p.Re, p.Im), math.Hypot(q.Re, q.Im)),
		cmp.Compare(p.Re, q.Re),
		cmp.Compare(p.Im, q.Im),
	)
}

func sortRoots(r []Root) { slices.SortStableFunc(r, slower) }

// In returns X⁻¹ (b/C): what an input with the flow b[i] into each store feeds
// into each entry of z. For a plain matrix it is X⁻¹ b.
func (f *BlockForm) In(b []float64) []float64 {
	b = f.from.forces(b)
	y := make([]float64, f.N)
	for k, p := range f.parts {
		m := len(p.states)
		for i := 0; i < m; i++ {
			var v float64
			for j, s := range p.states {
				v += p.w[i*m+j] * b[s]
			}
			y[f.first[k]+i] = v
		}
	}
	if f.u != nil { // U z = y
		n := f.N
		for j := n - 1; j >= 0; j-- {
			if y[j] != 0 {
				for i := 0; i < j; i++ {
					y[i] -= f.u.ut[j*n+i] * y[j]
				}
			}
		}
	}
	return f.outward(y)
}

// Out returns Xᵀ c: the weight of each entry of z in an output with the weight
// c[i] of each store.
func (f *BlockForm) Out(c []float64) []float64 {
	y := make([]float64, f.N)
	for k, p := range f.parts {
		m := len(p.states)
		for j, s := range p.states {
			if c[s] != 0 {
				for i := 0; i < m; i++ {
					y[f.first[k]+i] += p.v[j*m+i] * c[s]
				}
			}
		}
	}
	if f.u != nil { // Uᵀ y
		n := f.N
		for j := n - 1; j >= 0; j-- {
			for i := 0; i < j; i++ {
				y[j] += f.u.ut[j*n+i] * y[i]
			}
		}
	}
	return f.outward(y)
}

// outward brings an inner vector into the order of z.
func (f *BlockForm) outward(y []float64) []float64 {
	z := make([]float64, f.N)
	for k, i := range f.order {
		z[k] = y[i]
	}
	return z
}
