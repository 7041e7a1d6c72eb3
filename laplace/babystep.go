package laplace

// babySteps holds, for each time δ = j·h, what does not depend on the output: how
// each mode carries on, and what it gathers from rest while the inputs go on.
type babySteps struct {
	g          *grid
	delta      []float64
	e, set     []float64    // real modes × times: e^{pδ}; f1·a + f2·b
	slope      []float64    // real modes × times: f1·b, only where there are ramps or bends
	pe, ps, pr []complex128 // the same of the pairs
	block      [][]*blockWork

	bent     [][]float64     // of τ², τ³, …: real modes × times, as set of 1 and slope of τ
	pairBent [][]complex128  // the same of the pairs
	phis     [][][][]float64 // of each block and time: φ₀, φ₁, …
}

func (g *grid) steps(h float64) *babySteps {
	p, n := g.p, g.baby
	k, c := len(p.m.real), len(p.m.pair)
	s := &babySteps{g: g, delta: make([]float64, n), e: make([]float64, n*k), set: make([]float64, n*k)}
	s.pe, s.ps, s.pr = make([]complex128, n*c), make([]complex128, n*c), make([]complex128, n*c)
	if p.ramps || p.bent != nil {
		s.slope = make([]float64, n*k)
	}
	for j := range s.delta {
		s.delta[j] = float64(j) * h
	}
	for i := range p.m.real {
		s.addReal(i)
	}
	for i, pole := range p.m.pair {
		for j, delta := range s.delta {
			e, f1 := cphi1(pole, delta)
			s.pe[i*n+j] = e
			s.ps[i*n+j] = f1*p.a.pair[i] + cphi2(pole, delta, f1)*p.b.pair[i]
			s.pr[i*n+j] = f1 * p.b.pair[i]
		}
	}
	for i := range p.blocks {
		b := &p.blocks[i]
		list := make([]*blockWork, n)
		for j, delta := range s.delta {
			list[j] = newBlockWork(b.n)
			list[j].at(b.n, b.t, delta)
		}
		s.block = append(s.block, list)
	}
	if p.bent != nil {
		s.bend()
	}
	return s
}

// addReal fills the rows of one real mode; once it has died out no exponential is
// needed.
func (s *babySteps) addReal(i int) {
	n := s.g.baby
	pole, a, b := s.g.p.m.real[i], s.g.p.a.real[i], s.g.p.b.real[i]
	e, set := s.e[i*n:(i+1)*n], s.set[i*n:(i+1)*n]
	for j, delta := range s.delta {
		v, f1 := 0.0, -1/pole
		if pole*delta >= -dead {
			v, f1 = phi1(pole, delta)
		}
		e[j], set[j] = v, f1*a
		if s.slope != nil {
			set[j] += phi2(pole, delta, f1) * b
			s.slope[i*n+j] = f1 * b
		}
	}
}

// gather adds what an output with the weight w sees of real mode k's response to
// the inputs.
func (s *babySteps) gather(k int, w float64, constant, ramp []float64) {
	n := len(s.delta)
	for j, v := range s.set[k*n : (k+1)*n] {
		constant[j] += w * v
	}
	if s.slope != nil {
		for j, v := range s.slope[k*n : (k+1)*n] {
			ramp[j] += w * v
		}
	}
}
