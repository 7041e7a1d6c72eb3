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
// scaled real Schur form (Householder; Francis 1961) refined in doubled precision:
// its poles always, its vectors where the condition asks for it. The parts and the
// groups of poles are uncoupled after Bavely and Stewart (1979). A pole of a part of
// one state is a quotient, and equal ones are equal bit for bit.
//
// Cost: 30 n³ operations and some 20 n² of storage for one part of n states; see
// BlockWork where there are many to do.
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
	return new(BlockWork).Dense(n, a, scale)
}

// scaledPlain is x' = a x with states of comparable sizes scale[i]·x[i].
func scaledPlain(n int, a, scale []float64) (*system, error) {
	if scale != nil && len(scale) != n {
		return nil, ErrShape
	}
	s, err := plain(n, a)
	if err != nil {
		return nil, err
	}
	for i, v := range scale {
		if !(v > 0) || v-v != 0 {
			return nil, ErrValue
		}
		s.scale[i] = int(math.Round(math.Log2(v)))
	}
	return s, nil
}

func (s *system) blockForm() (*BlockForm, error) { return s.blockFormBy(new(BlockWork)) }

func (s *system) blockFormBy(work *BlockWork) (*BlockForm, error) {
	f := &BlockForm{N: s.n, from: s}
	at := 0
	for _, states := range components(s.n, s.feels) {
		p, err := s.analyse(states, work)
		if err != nil {
			return nil, err
		}
		f.parts = append(f.parts, p)
		f.Coupling = max(f.Coupling, p.coupling)
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
	ld := stride(n)
	t := make([]float64, n*ld)
	var start []int
	var poles []complex128
	var level []float64
	var owner []int
	reach := f.reach(s)
	for k, p := range f.parts {
		m, at := len(p.states), f.first[k]
		for i := 0; i < m; i++ {
			copy(t[(at+i)*ld+at:(at+i)*ld+at+m], p.d[i*m:i*m+m])
		}
		for a, roots := range p.roots {
			start = append(start, at+p.start[a])
			level = append(level, p.level(a))
			owner = append(owner, k)
			for _, r := range roots {
				poles = append(poles, complex(r.Re, r.Im))
			}
		}
		for l := k + 1; l < len(f.parts); l++ {
			f.couple(s, t, ld, k, l)
		}
	}
	start = append(start, n)
	f.u = new(decoupling)
	f.u.limit = maxCoupling
	f.u.decouple(n, ld, t, start, poles, level, func(i, j int) bool { return reach[owner[j]][owner[i]] })
	f.Coupling = max(f.Coupling, f.u.size)
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
func (f *BlockForm) couple(s *system, t []float64, ld, k, l int) {
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
		row := t[(f.first[k]+i)*ld+f.first[l]:]
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
		}
		roots = append(roots, p.roots...)
	}
	start = append(start, f.N)
	for _, group := range f.u.clusters() {
		var c cluster
		for _, a := range group {
			c.roots = append(c.roots, roots[a]...)
			for i := start[a]; i < start[a+1]; i++ {
				c.inner = append(c.inner, i)
			}
		}
		c.t = appendBlock(nil, f.u.d, f.u.ld, c.inner)
		sortRoots(c.roots)
		list = append(list, c)
	}
	return list
}

// appendBlock appends the rows and columns of d named by states to t.
func appendBlock(t, d []float64, ld int, states []int) []float64 {
	for _, i := range states {
		for _, j := range states {
			t = append(t, d[i*ld+j])
		}
	}
	return t
}

// finish lays the clusters out as blocks, slowest first, and lists the poles.
func (f *BlockForm) finish() {
	f.Poles, f.order = make([]Root, 0, f.N), make([]int, 0, f.N)
	if f.u == nil {
		f.single()
	} else {
		list := f.clusters()
		slices.SortStableFunc(list, func(p, q cluster) int { return slower(p.roots[0], q.roots[0]) })
		for _, c := range list {
			f.add(c)
		}
	}
	sortRoots(f.Poles)
}

// add appends a block.
func (f *BlockForm) add(c cluster) {
	for _, r := range c.roots {
		r.Block = len(f.Blocks)
		f.Poles = append(f.Poles, r)
	}
	f.Blocks = append(f.Blocks, Block{First: len(f.order), N: len(c.inner), T: c.t})
	f.order = append(f.order, c.inner...)
}

// single lays out one part alone, every atom a block.
func (f *BlockForm) single() {
	if len(f.parts) == 0 {
		return
	}
	p := f.parts[0]
	room := make([]int, len(p.roots)+f.N)
	atoms, states := room[:len(p.roots)], room[len(p.roots):]
	for a := range atoms {
		atoms[a] = a
		sortRoots(p.roots[a])
	}
	for i := range states {
		states[i] = i
	}
	slices.SortStableFunc(atoms, func(a, b int) int { return slower(p.roots[a][0], p.roots[b][0]) })
	f.Blocks = make([]Block, 0, len(atoms))
	t := make([]float64, 0, 2*f.N)
	for _, a := range atoms {
		c := cluster{inner: states[p.start[a]:p.start[a+1]], roots: p.roots[a]}
		from := len(t)
		t = appendBlock(t, p.d, f.N, c.inner)
		c.t = t[from:len(t):len(t)]
		f.add(c)
	}
}

// slower orders roots: ascending modulus, then real part, then imaginary part.
func slower(p, q Root) int {
	if p.Re != q.Re || math.Abs(p.Im) != math.Abs(q.Im) {
		if c := cmp.Compare(math.Hypot(p.Re, p.Im), math.Hypot(q.Re, q.Im)); c != 0 {
			return c
		}
	}
	return cmp.Or(cmp.Compare(p.Re, q.Re), cmp.Compare(p.Im, q.Im))
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
					y[i] -= f.u.ut[j*f.u.ld+i] * y[j]
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
				y[j] += f.u.ut[j*f.u.ld+i] * y[i]
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
