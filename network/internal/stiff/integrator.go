package stiff

import (
	"math"
	"slices"
)

// A System is M x′ = F(t, x) with what an implicit step needs of it.
type System interface {
	// Rates sets f to F(t, x).
	Rates(t float64, x, f []float64)
	// Linearise sets f to F and ft to ∂F/∂t at (t, x), and works out ∂F/∂x for Factor.
	Linearise(t float64, x, f, ft []float64)
	// Factor factorises shift·M − ∂F/∂x; an error says that it is singular.
	Factor(shift float64) error
	// Solve replaces b by the solution x of (shift·M − ∂F/∂x) x = b.
	Solve(b []float64)
	// Settle changes the algebraic unknowns of x so that their rows hold at t, and reports
	// whether it could; if not, x is as it was.
	Settle(t float64, x []float64) bool
}

// Control says how well to integrate.
type Control struct {
	RelTol float64   // error of a step allowed, as a share of |x_i| at either end or of Scale_i, whichever is largest
	Scale  []float64 // by unknown, > 0; may be changed between steps
}

// An Integrator goes step by step through a System. After each Step it holds the state
// at both ends of the step and the polynomial between.
type Integrator struct {
	sys     System
	mass    []float64
	control Control

	T0, T1 float64 // the last step taken
	X0, X1 []float64
	Taken  int // steps
	Missed int // steps tried and taken back

	h        float64 // to try next
	known    bool    // rate, drift and the derivatives are those at (T1, X1)
	drifting bool
	lenient  bool // the errors of algebraic unknowns are judged so
	rate     []float64
	drift    []float64
	at, f    []float64
	middle   []float64         // error in the middle of the step, where it drifts
	u        [][stages]float64 // by unknown, by stage
	pace     pace
}

// New returns an Integrator of a system of n unknowns.
func New(sys System, c Control, n int) *Integrator {
	room := make([]float64, 7*n)
	part := func(k int) []float64 { return room[k*n : (k+1)*n : (k+1)*n] }
	return &Integrator{sys: sys, control: c, X0: part(0), X1: part(1), rate: part(2), drift: part(3),
		at: part(4), f: part(5), middle: part(6), u: make([][stages]float64, n)}
}

// Start begins with the diagonal mass of M at (t, x), where x satisfies the algebraic
// rows, on the way to end. step is the first step to try, 0 for one chosen from the data.
func (g *Integrator) Start(mass []float64, t float64, x []float64, end, step float64) {
	g.mass = mass
	g.T0, g.T1 = t, t
	copy(g.X0, x)
	copy(g.X1, x)
	g.known, g.lenient, g.pace = false, false, pace{}
	if g.h = step; !(step > 0) {
		g.h = g.first(end - t)
	}
	g.h = max(g.h, 16*shortest(t, end))
}

// first chooses a first step: one in which neither the rate at the start nor its change
// by time alone moves any unknown by more than a small share of its size. What begins at
// zero has none, so that the step is no smaller than some share of the way; if that is too
// long it is taken back.
func (g *Integrator) first(length float64) float64 {
	const share, least = 0.02, 1e-6
	g.evaluate()
	fastest, bending := 0.0, 0.0
	for i, m := range g.mass {
		if m == 0 {
			continue
		}
		size := m * max(math.Abs(g.X1[i]), g.control.Scale[i])
		fastest = max(fastest, math.Abs(g.rate[i])/size)
		if g.drifting {
			bending = max(bending, math.Abs(g.drift[i])/size)
		}
	}
	h := length
	allowed := share * math.Pow(g.control.RelTol/1e-7, 1./falls)
	if fastest > 0 {
		h = min(h, allowed/fastest)
	}
	if bending > 0 {
		h = min(h, math.Sqrt(allowed/bending))
	}
	return max(h, least*length)
}

// evaluate works out all that a step needs at its start.
func (g *Integrator) evaluate() {
	if g.known {
		return
	}
	g.sys.Linearise(g.T1, g.X1, g.rate, g.drift)
	g.drifting = slices.ContainsFunc(g.drift, func(v float64) bool { return v != 0 })
	g.known = true
}
