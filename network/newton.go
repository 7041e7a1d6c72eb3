package network

import (
	"errors"
	"math"
	"slices"

	"lagbook/network/internal/sparse"
)

// A newton solves F(x) = 0 of the equations as they stand, with some rows pinned: their
// unknown stays as it is.
//
// Method: Newton's with the natural level function ‖J⁻¹F‖ and the damping of Deuflhard,
// Newton Methods for Nonlinear Problems, Springer 2004, algorithm NLEQ-ERR: what is
// judged are steps of the unknowns in their own sizes, so that rows need none. Where that
// stops, pseudo-transient continuation (W/h − J) δ = F follows, with W the size of each
// row and h growing as the residual falls (Kelley, Keyes, Convergence analysis of
// pseudo-transient continuation, SIAM J. Numer. Anal. 35, 1998), and Newton's again.
type newton struct {
	e       *equations
	t       float64
	jac     *sparse.Matrix
	lu      *sparse.LU
	pins    []pin
	f       []float64
	dx, bar []float64
	trial   []float64
	size    []float64 // of the unknowns; 0: not judged
	span    []float64 // of the levels of each part
	soft    []int32   // by row: slot at which pseudo-time acts; −1: none
	acts    []int32   // by row: the unknown it acts on
	weight  []float64 // W
	before  []float64 // residual of the step before in pseudo-time
	push    []float64 // of each part: the largest flow that anything of its size brings
	partOf  []int32   // by row: of whose part it is a balance; −1
}

// A pin is a row whose unknown stays: slot is that unknown's place in the row.
type pin struct{ row, slot, unknown int32 }

// What a solution has to meet. A step below stepTolerance of the sizes of the unknowns is
// taken and is the last: the next would be its square. Below roundingFloor steps that do
// not fall any more are rounding.
const (
	stepTolerance = 1e-10
	roundingFloor = 1e-8
	leastDamping  = 1e-5
	newtonSteps   = 80
	pseudoSteps   = 400
	longestPseudo = 3 // sizes of the unknowns
)

var errNotSolved = errors.New("network: no solution was found")

func (e *equations) solver() *newton {
	if e.newton != nil {
		return e.newton
	}
	n := e.l.size
	s := &newton{e: e, jac: e.pat.Like(), lu: sparse.Analyse(e.pat), f: make([]float64, n), dx: make([]float64, n), bar: make([]float64, n),
		trial: make([]float64, n), size: make([]float64, n), span: make([]float64, e.parts), soft: make([]int32, n), acts: make([]int32, n), weight: make([]float64, n), before: make([]float64, n), push: make([]float64, e.parts), partOf: make([]int32, n)}
	s.pseudo()
	e.newton = s
	return s
}

// solve finds x with the pins at t. It returns *sparse.Singular where the equations leave
// an unknown open, errNotSolved where no way led to a solution: x is then where the method
// of Newton stopped.
func (s *newton) solve(t float64, x []float64, pins []pin) error {
	s.t, s.pins = t, pins
	clear(s.size)
	clear(s.span)
	s.measure(x)
	err := s.descend(x)
	if err == nil {
		return nil
	}
	begin := slices.Clone(x)
	if s.continuation(x) {
		if err = s.descend(x); err == nil {
			return nil
		}
	}
	copy(x, begin)
	return err
}

// linearise sets f, the Jacobian and its factors at x.
func (s *newton) linearise(x []float64) error {
	s.e.jacobian(s.t, x, s.f, nil, s.jac)
	s.pinRows()
	return s.lu.Factor(s.jac)
}

func (s *newton) pinRows() {
	for _, p := range s.pins {
		for _, slot := range s.e.rowAt[p.row] {
			s.jac.Val[slot] = 0
		}
		s.jac.Val[p.slot] = 1
		s.f[p.row] = 0
	}
}

// residual sets into to −J⁻¹F(x) with the factors at hand.
func (s *newton) residual(x, into []float64) {
	s.e.rates(s.t, x, into)
	for _, p := range s.pins {
		into[p.row] = 0
	}
	for i, v := range into {
		into[i] = -v
	}
	s.solvePinned(into)
}

// solvePinned replaces v by J⁻¹v; what is pinned does not move, not even by rounding.
func (s *newton) solvePinned(v []float64) {
	s.lu.Solve(v)
	for _, p := range s.pins {
		v[p.unknown] = 0
	}
}

// norm is the root of the mean square in the sizes of the unknowns.
func (s *newton) norm(v []float64) float64 {
	sum, count := 0.0, 0
	for i, d := range s.size {
		if d > 0 {
			r := v[i] / d
			sum += r * r
			count++
		}
	}
	if count == 0 {
		return 0
	}
	return math.Sqrt(sum / float64(count))
}

// greatest is the largest step in the sizes of the unknowns, less what rounding of the
// unknown itself allows.
func (s *newton) greatest(v, x []float64) float64 {
	most := 0.0
	for i, d := range s.size {
		if d > 0 {
			most = max(most, (math.Abs(v[i])-4*0x1p-52*math.Abs(x[i]))/d)
		}
	}
	return most
}

// descend is the damped method.
func (s *newton) descend(x []float64) error {
	lambda, before, last := 1.0, 0.0, 0.0
	for range newtonSteps {
		if err := s.linearise(x); err != nil {
			return err
		}
		for i, v := range s.f {
			s.dx[i] = -v
		}
		s.solvePinned(s.dx)
		s.widen(x)
		now := s.norm(s.dx)
		if math.IsNaN(now) || math.IsInf(now, 0) {
			return errNotSolved
		}
		if s.greatest(s.dx, x) <= stepTolerance {
			s.take(x, 1)
			return nil
		}
		if before > 0 { // how far the last linearisation was trusted says how far this one may be
			for i := range s.bar {
				s.bar[i] -= s.dx[i]
			}
			if miss := s.norm(s.bar) * now; miss > 0 {
				lambda = min(1, max(before*last/miss*lambda, leastDamping))
			} else {
				lambda = 1
			}
		}
		var ok bool
		if lambda, last, ok = s.damp(x, lambda, now); !ok {
			if now <= roundingFloor {
				return nil
			}
			return errNotSolved
		}
		before = now
		s.take(x, lambda)
	}
	return errNotSolved
}

// take makes the step.
func (s *newton) take(x []float64, lambda float64) {
	for i, d := range s.dx {
		x[i] += lambda * d
	}
}

// damp finds a share of the step after which the next simplified step is shorter. last is
// the size of that one.
func (s *newton) damp(x []float64, lambda, now float64) (taken, last float64, ok bool) {
	grown := false
	for {
		for i, d := range s.dx {
			s.trial[i] = x[i] + lambda*d
		}
		s.residual(s.trial, s.bar)
		last = s.norm(s.bar)
		miss := 0.0
		for i, d := range s.size {
			if d > 0 {
				r := (s.bar[i] - (1-lambda)*s.dx[i]) / d
				miss += r * r
			}
		}
		miss = math.Sqrt(miss / float64(max(1, s.judged())))
		fit := 1.0
		if miss > 0 {
			fit = 0.5 * now * lambda * lambda / miss
		}
		if !(last < now*(1-lambda/4)) {
			if lambda = min(fit, lambda/2); !(lambda >= leastDamping) {
				return lambda, last, false
			}
			grown = true
			continue
		}
		if next := min(1, fit); next >= 4*lambda && !grown {
			lambda, grown = next, true
			continue
		}
		return lambda, last, true
	}
}

func (s *newton) judged() (count int) {
	for _, d := range s.size {
		if d > 0 {
			count++
		}
	}
	return count
}

// continuation follows pseudo-time until a Newton step is short. It reports whether x
// stayed within what can be computed.
func (s *newton) continuation(x []float64) bool {
	h, last := 0.1, 0.0
	clear(s.before)
	for k := range pseudoSteps {
		s.e.jacobian(s.t, x, s.f, nil, s.jac)
		s.pinRows()
		now, turned := s.weigh(), s.turned()
		switch {
		case now == 0:
			return true
		case k > 0 && turned:
			h = max(0.2*h, 1e-10)
		case k > 0:
			h = max(h*min(max(1.2*last/now, 0.3), 3), 1e-10)
		}
		last = now
		for row, slot := range s.soft {
			if slot != none {
				s.jac.Val[slot] -= s.weight[row] / h
			}
		}
		if err := s.lu.Factor(s.jac); err != nil {
			return false
		}
		for i, v := range s.f {
			s.dx[i] = -v
		}
		s.solvePinned(s.dx)
		s.widen(x)
		step := s.norm(s.dx)
		if math.IsNaN(step) || math.IsInf(step, 0) {
			return false
		}
		s.take(x, min(1, longestPseudo/step))
		if h > 1e8 && step < roundingFloor {
			return true
		}
	}
	return true
}

// turned tells whether the residual points against the one of the step before, both in
// their sizes: the step went beyond what is sought. It keeps the present one.
func (s *newton) turned() bool {
	dot := 0.0
	for i, v := range s.f {
		r := 0.0
		if w := s.weight[i]; w > 0 {
			r = v / (w * max(s.size[s.acts[i]], math.SmallestNonzeroFloat64))
		}
		dot += r * s.before[i]
		s.before[i] = r
	}
	return dot < 0
}

// weigh sets W, the size of each row: that of its entries or, where they are too flat to
// meet it, of its residual. It returns the residual in it.
func (s *newton) weigh() float64 {
	clear(s.weight)
	for j := range s.jac.N {
		for p := s.jac.Start[j]; p < s.jac.Start[j+1]; p++ {
			if d := s.size[j]; d > 0 {
				i := s.jac.Row[p]
				s.weight[i] = max(s.weight[i], math.Abs(s.jac.Val[p])*d)
			}
		}
	}
	sum, count := 0.0, 0
	for i, w := range s.weight {
		if w = max(w, math.Abs(s.f[i])); w > 0 {
			r := s.f[i] / w
			sum += r * r
			count++
		}
		s.weight[i] = w
		if d := s.size[s.acts[i]]; d > 0 {
			s.weight[i] = w / d
		}
	}
	for _, p := range s.pins {
		s.weight[p.row] = 0
	}
	return math.Sqrt(sum / float64(max(1, count)))
}
