package network

import "lagbook/network/internal/sparse"

// shifted lends the equations to the integrator, with one unknown more for each group: what
// has come into it, integrated as everything else is. The sums that the equations keep are
// then kept to rounding, and what the ledger finds missing is a loss of the equations.
type shifted struct {
	e        *equations
	mass     []float64 // of the present stretch
	jac      *sparse.Matrix
	matrix   *sparse.Matrix // shift·M − jac
	diagonal []int          // places of the diagonal in Val
	lu       *sparse.LU
	fault    error // of the last factorisation
	drift    []float64
	brings   []bringing // at the last linearisation
	shift    float64
	extended []float64 // mass and that of what comes in
}

func newShifted(e *equations) *shifted {
	s := &shifted{e: e, jac: e.pattern().Like(), matrix: e.pattern().Like(), mass: e.mass()}
	for k := range e.size() {
		s.diagonal = append(s.diagonal, s.jac.Slot(k, k))
	}
	s.lu = sparse.Analyse(e.pattern())
	return s
}

// masses returns the diagonal of M in the present stretch, of what comes in too.
func (s *shifted) masses() []float64 {
	s.extended = append(s.extended[:0], s.mass...)
	for range s.e.balances() {
		s.extended = append(s.extended, 1)
	}
	return s.extended
}

// begins returns x with nothing come in yet.
func (s *shifted) begins(x []float64) []float64 {
	return append(append(make([]float64, 0, len(x)+s.e.balances()), x...), make([]float64, s.e.balances())...)
}

func (s *shifted) Rates(t float64, x, f []float64) {
	n := s.e.size()
	s.e.rates(t, x[:n], f[:n])
	s.e.inflow(f[n:], nil)
}

func (s *shifted) Linearise(t float64, x, f, ft []float64) {
	n := s.e.size()
	s.linearise(t, x[:n], f[:n], ft[:n])
	s.e.inflow(f[n:], nil)
	clear(ft[n:])
	s.brings = s.e.inflowSlopes(s.brings[:0])
	for _, b := range s.brings {
		if int(b.col) >= n {
			ft[n+int(b.group)] += b.v * s.e.dz[b.col]
		}
	}
}

// linearise does that for the unknowns of the equations alone.
func (s *shifted) linearise(t float64, x, f, ft []float64) { s.e.jacobian(t, x, f, ft, s.jac) }

func (s *shifted) Factor(shift float64) error {
	for k, v := range s.jac.Val {
		s.matrix.Val[k] = -v
	}
	for k, m := range s.mass {
		s.matrix.Val[s.diagonal[k]] += shift * m
	}
	s.shift = shift
	s.fault = s.lu.Factor(s.matrix)
	return s.fault
}

func (s *shifted) Solve(b []float64) {
	n := s.e.size()
	s.lu.Solve(b[:n])
	for _, v := range s.brings {
		if int(v.col) < n {
			b[n+int(v.group)] += v.v * b[v.col]
		}
	}
	for k := n; k < len(b); k++ {
		b[k] /= s.shift
	}
}

// Settle implements stiff.System.
func (s *shifted) Settle(t float64, x []float64) bool {
	was := append([]float64(nil), x...)
	if s.e.project(t, x[:s.e.size()]) != nil {
		copy(x, was)
		return false
	}
	return true
}

// speeds sets rate to dx/dt at a state that agrees with the algebraic rows: M x' = F in
// the others, and in these what keeps them satisfied, 0 = ∂F/∂x x' + ∂F/∂t. Where that leaves
// something open, unknowns without mass count as at rest.
func (s *shifted) speeds(t float64, x, rate []float64) {
	if s.drift == nil {
		s.drift = make([]float64, len(x))
	}
	s.linearise(t, x, rate, s.drift)
	copy(s.matrix.Val, s.jac.Val)
	for k, c := range s.mass {
		if c == 0 {
			rate[k] = -s.drift[k]
			continue
		}
		for _, slot := range s.e.rowAt[k] {
			s.matrix.Val[slot] = 0
		}
		s.matrix.Val[s.diagonal[k]] = c
	}
	if s.lu.Factor(s.matrix) == nil {
		s.lu.Solve(rate)
		return
	}
	for k, c := range s.mass {
		if c == 0 {
			rate[k] = 0
		} else {
			rate[k] /= c
		}
	}
}
