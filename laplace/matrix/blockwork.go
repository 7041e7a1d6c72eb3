package matrix

// BlockWork is a workspace for uncoupling systems one after another: it gives what
// Balance.BlockForm, Stores.BlockForm and DenseBlockForm give, bit for bit, and allocates no more than
// the result where no system is larger than those before. The zero value is ready;
// two goroutines must not share one. A BlockForm keeps nothing of it.
type BlockWork struct {
	rc    RCWork
	a     scaledMatrix
	schur schurWork
	u     decoupling
	rows  sparseRows
	cols  sparseRows

	g, inverse, kept eigenblocks

	start, order []int
	poles        []complex128
	ones         []float64
	low          []float64
	data         [][]float64 // of sensitivity
	noise        []float64
}

// BlockForm is Balance.BlockForm.
func (w *BlockWork) BlockForm(b *Balance) (*BlockForm, error) {
	if err := b.check(); err != nil {
		return nil, err
	}
	return b.system().blockFormBy(w)
}

// Stores is Stores.BlockForm.
func (w *BlockWork) Stores(s *Stores) (*BlockForm, error) {
	y, err := s.system()
	if err != nil {
		return nil, err
	}
	return y.blockFormBy(w)
}

// Dense is DenseBlockForm.
func (w *BlockWork) Dense(n int, a, scale []float64) (*BlockForm, error) {
	s, err := scaledPlain(n, a, scale)
	if err != nil {
		return nil, err
	}
	return s.blockFormBy(w)
}

// room makes place for a part of m states in one piece, where there is none yet.
func (w *BlockWork) room(m int) {
	if cap(w.a.hi) >= m*m && cap(w.schur.h) >= (m+2)*schurStride(m) {
		return
	}
	ld := schurStride(m)
	longest := max(chaseLength+2, chaseWhole) + 3
	s, u, g := &w.schur, &w.u, &w.g
	all := make([]float64, 2*(m+2)*ld+m*ld+m+5*ld+m*reflectorSize+longest*reflectorSize+4*(longest+2)+2*m*ld+6*m*m+15*m+1)
	take := func(n int) []float64 {
		v := all[:n:n]
		all = all[n:]
		return v
	}
	s.h, s.qt, s.vectors, s.tau = take((m+2)*ld), take((m+2)*ld), take(m*ld), take(m)
	s.x, s.y, s.sum, s.scratch, s.zero = take(ld), take(ld), take(ld), take(ld), take(ld)
	s.chain, s.padded, s.four = take(m * reflectorSize)[:0], take(longest*reflectorSize), take(4*(longest+2))
	u.ut, u.d = take(m*ld), take(m*ld)
	g.x, g.wt, g.d = take(m*m), take(m*m), take(m*m)
	w.a.hi, w.a.lo, w.a.noise = take(m*m), take(m*m), take(m*m)
	w.low, w.ones, g.radius, g.size, w.noise = take(m), take(m+1), take(m), take(2*m), take(2 * m)[:0]
	ints := make([]int, 7*(m+1)+4*m)
	cut := func(n int) []int {
		v := ints[:0:n]
		ints = ints[n:]
		return v
	}
	w.start, w.order, u.cluster, u.members = cut(m+1), cut(m+1), cut(m+1), cut(m+1)
	g.start, w.a.scale, w.rows.ptr, w.rows.col = cut(m+1), cut(m+1), cut(m+1), cut(4*m)
	w.poles, w.data = make([]complex128, 0, m), make([][]float64, 0, m)
	w.rows.hi, w.rows.lo = take(4 * m)[:0], take(4 * m)[:0]
}

// free returns three m×m matrices for refinement: what uncoupling needed before it.
func (w *BlockWork) free(m int) (r, e, res []float64) {
	return w.schur.qt[:m*m], w.u.ut[:m*m], w.schur.vectors[:m*m]
}
