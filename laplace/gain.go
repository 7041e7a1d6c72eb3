package laplace

import "math/cmplx"

// Gain returns H(0), output for input at rest, and false where it does not exist
// (a pole at 0 that the input drives and the output sees). A network is eliminated
// without subtraction, so that the gain has full relative accuracy however small
// the slowest pole is.
func (s *System) Gain(in, out int) (float64, bool) {
	keep := s.plant.pattern().Path(s.b[in], s.c[out])
	if len(keep) == 0 {
		return s.d[out][in], true
	}
	p, b, c := s.along(keep, in, out)
	solve := s.atRest
	if len(keep) < s.plant.n {
		solve = p.solver
	}
	at := solve()
	if at == nil {
		return s.gainOfModes(in, out)
	}
	if p.stores == nil && s.poleAtZero(in, out) {
		return 0, false
	}
	g := s.d[out][in]
	for i, v := range at(b) {
		if c[i] != 0 {
			g += c[i] * v
		}
	}
	return g, isNumber(g)
}

// atRest is the plant's solver, made once.
func (s *System) atRest() func(b []float64) []float64 {
	s.once.Do(func() { s.solve = s.plant.solver() })
	return s.solve
}

// along returns the plant of the stores in keep with one input and one output.
func (s *System) along(keep []int, in, out int) (p plant, b, c []float64) {
	if len(keep) == s.plant.n {
		return s.plant, s.b[in], s.c[out]
	}
	b, c = make([]float64, len(keep)), make([]float64, len(keep))
	for i, k := range keep {
		b[i], c[i] = s.b[in][k], s.c[out][k]
	}
	return s.plant.restrict(keep), b, c
}

// gainOfModes is for a system with a pole at 0 that may still be out of this
// transfer's sight: then the gain is the sum over the other modes.
func (s *System) gainOfModes(in, out int) (float64, bool) {
	if s.poleAtZero(in, out) {
		return 0, false
	}
	g := s.d[out][in]
	b, c := &s.modal.in[in], &s.modal.out[out]
	for k, p := range s.modal.real {
		if w := b.real[k] * c.real[k]; p != 0 && w != 0 {
			g -= w / p
		}
	}
	for k, p := range s.modal.pair {
		g -= real(b.pair[k] * c.pair[k] / p)
	}
	for i := range s.modal.block {
		q := &s.modal.block[i]
		x := make([]complex128, q.n)
		for j := range x {
			x[j] = complex(b.block[q.first+j], 0)
		}
		q.resolve(0, x)
		for j := range x {
			g += c.block[q.first+j] * real(x[j])
		}
	}
	return g, isNumber(g)
}

// poleAtZero reports that a pole that cannot be told from 0 takes part in the
// transfer. A pole in a block is taken to take part.
func (s *System) poleAtZero(in, out int) bool {
	return s.takesPart(in, out, func(p Pole) bool { return cmplx.Abs(p.P) <= p.Radius })
}

// negligible is the share of all |residue| below which a mode counts as out of
// sight: some hundred roundings.
const negligible = 1e-13

// takesPart reports whether a pole for which is holds is driven by the input and
// seen by the output.
func (s *System) takesPart(in, out int, is func(Pole) bool) bool {
	b, c := &s.modal.in[in], &s.modal.out[out]
	var total float64
	for k, v := range b.real {
		total += abs1(complex(v*c.real[k], 0))
	}
	for k, v := range b.pair {
		total += abs1(v * c.pair[k])
	}
	for i := range s.modal.block {
		total += blockSize(&s.modal.block[i], b, c)
	}
	for i, p := range s.poles {
		if !is(p) {
			continue
		}
		var w float64
		for _, at := range s.seats[i] {
			switch at.kind {
			case realSeat:
				w += b.real[at.index] * c.real[at.index]
			case pairSeat:
				w += abs1(b.pair[at.index] * c.pair[at.index])
			case blockSeat:
				w += blockSize(&s.modal.block[at.index], b, c)
			}
		}
		if w > negligible*total || -w > negligible*total {
			return true
		}
	}
	return false
}

// blockSize returns |c|·|b| of a block.
func blockSize(q *block, b, c *vector) float64 {
	var x, y float64
	for j := q.first; j < q.first+q.n; j++ {
		x = max(x, b.block[j], -b.block[j])
		y = max(y, c.block[j], -c.block[j])
	}
	return x * y
}
