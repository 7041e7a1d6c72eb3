package matrix

import "math"

// Zeros returns the zeros of the transfer from the flows in to the weights out with
// direct + rate·s passed on at once, of the stores that take part in it, see
// Balance.Zeros. With rate ≠ 0 the transfer is improper and has one zero more than
// poles: they are the poles of the stores and of one more, the input that keeps the
// output at 0, rate·u' = −out·x − direct·u.
func (s *Stores) Zeros(in, out []float64, direct, rate float64) ([]Root, error) {
	if err := s.checkTransfer(in, out, direct+rate); err != nil {
		return nil, err
	}
	if rate != 0 {
		return s.improperZeros(in, out, direct, rate)
	}
	if s.uncoupled() {
		return s.Balance.Zeros(in, out, direct)
	}
	keep := s.Path(in, out)
	if len(keep) == 0 && direct == 0 {
		return nil, ErrZeroTransfer
	}
	part := s.Restrict(keep)
	x, y := make([]float64, len(keep)), make([]float64, len(keep))
	for k, i := range keep {
		x[k], y[k] = in[i], out[i]
	}
	w, err := part.system()
	if err != nil {
		return nil, err
	}
	r, reachable := StructuralDegree(part.Pattern(), x, y, direct)
	if !reachable {
		return nil, ErrZeroTransfer
	}
	return w.zeros(x, y, direct, r)
}

func (s *Stores) improperZeros(in, out []float64, direct, rate float64) ([]Root, error) {
	with := s.withInput(in, out, direct, rate)
	w, err := with.system()
	if err != nil {
		return nil, err
	}
	return w.poles()
}

// withInput adds the input as a store of its own.
func (s *Stores) withInput(in, out []float64, direct, rate float64) *Stores {
	n, w := s.N, s.N+1
	more := func(v []float64, x float64) []float64 { return append(append([]float64(nil), v...), x) }
	b := Balance{N: w, C: more(s.C, math.Abs(rate)), F: widened(n, s.F), Leak: more(s.Leak, 0)}
	e := &Stores{Balance: b, K: make([]float64, w*w)}
	if s.K != nil {
		e.K = widened(n, s.K)
	}
	if s.Mass != nil {
		e.Mass = widened(n, s.Mass)
		e.Mass[n*w+n] = b.C[n]
	}
	sign := 1.0
	if rate < 0 {
		sign = -1
	}
	for i := range n {
		e.K[i*w+n] = in[i]
		e.K[n*w+i] = -sign * out[i]
	}
	e.K[n*w+n] = -sign * direct
	return e
}

// widened is an n×n matrix with a row and a column of zeros added.
func widened(n int, a []float64) []float64 {
	b := make([]float64, (n+1)*(n+1))
	for i := range n {
		copy(b[i*(n+1):], a[i*n:(i+1)*n])
	}
	return b
}

// Exact decides what Balance.Exact does, for direct + rate·s passed on at once.
func (s *Stores) Exact(in, out []float64, direct, rate float64) (Exact, error) {
	if err := s.checkTransfer(in, out, direct+rate); err != nil {
		return Exact{}, err
	}
	w, err := s.system()
	if err != nil {
		return Exact{}, err
	}
	return w.exact(in, out, direct, rate), nil
}

func (s *Stores) checkTransfer(in, out []float64, direct float64) error {
	if err := s.check(); err != nil {
		return err
	}
	return s.Balance.checkTransfer(in, out, direct)
}
