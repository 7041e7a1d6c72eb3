package network

import (
	"math"

	"lagbook/network/internal/stiff"
)

// A ledger keeps, for each island, what came in by the outputs of the march against
// what is stored.
type ledger struct {
	e           *equations
	begin, size []float64
	in, moved   []float64
	now, gross  []float64
}

func newLedger(e *equations, x []float64) *ledger {
	n := e.balances()
	l := &ledger{e: e}
	for _, v := range []*[]float64{&l.begin, &l.size, &l.in, &l.moved, &l.now, &l.gross} {
		*v = make([]float64, n)
	}
	e.content(x, l.begin, l.size)
	return l
}

// add books what came in during a span, which the integrator g holds behind the unknowns.
func (l *ledger) add(s *span, g *stiff.Integrator) {
	theta := 1.0
	if s.t1 != g.T1 {
		theta = (s.t1 - g.T0) / (g.T1 - g.T0)
	}
	l.e.netInflow(s.t1, s.end(), l.now, l.gross)
	first := len(s.end())
	for k, v := range l.gross {
		l.moved[k] += (s.t1 - s.t0) * v
		if theta == 1 {
			l.in[k] += g.X1[first+k] - g.X0[first+k]
			continue
		}
		c := quartic(g.Polynomial(first + k))
		l.in[k] += c.at(theta) - c.at(0)
	}
}

// Where next to nothing moved in an island, what is missing is judged by more than that: by
// a share of what is stored there, by the same share of what moved in what it hangs together
// with, and by what flows would move that are some size above the rounding of the levels
// that drive them.
const (
	still     = 1e-4
	trickling = 1e6 // times what the rounding of the state brings
)

// share returns the largest imbalance as a share of what moved up to t, from a time long
// before; x is the state at t.
func (l *ledger) share(t, long float64, x []float64) float64 {
	n := len(l.in)
	stored, size := make([]float64, n), make([]float64, n)
	l.e.content(x, stored, size)
	unsure := l.unsure(t, x)
	around := make([]float64, l.e.parts)
	for k, p := range l.parts() {
		around[p] = max(around[p], l.moved[k])
	}
	worst := 0.0
	for k, p := range l.parts() {
		missing := math.Abs(stored[k] - l.begin[k] - l.in[k])
		moved := max(l.moved[k], math.Abs(stored[k]-l.begin[k]), still*(l.size[k]+size[k]), still*around[p], trickling*long*unsure[k])
		if missing > 0 && moved > 0 {
			worst = max(worst, missing/moved)
		}
	}
	return worst
}

// parts tells what each island hangs together with, held nodes included.
func (l *ledger) parts() []int32 {
	of := make([]int32, len(l.in))
	for _, n := range l.e.l.nodes {
		of[l.e.group[n]] = l.e.part[n]
	}
	return of
}

// unsure returns what the rounding of the state lets the flows be off by.
func (l *ledger) unsure(t float64, x []float64) []float64 {
	off := make([]float64, len(l.now))
	l.e.netInflow(t, x, off, l.gross)
	l.e.netInflow(t, shaken(x), l.now, l.gross)
	for k, v := range l.now {
		off[k] = math.Abs(v - off[k])
	}
	return off
}

// shaken returns the state with every number moved by some hundred roundings, neighbours
// not together.
func shaken(x []float64) []float64 {
	y := make([]float64, len(x))
	for k, v := range x {
		y[k] = v + hair(k, v)
	}
	return y
}

// hair is some hundred roundings of the number v at place k, up or down.
func hair(k int, v float64) float64 {
	const scatter, bit = 0x9E3779B1, 0x10000
	if k*scatter&bit != 0 {
		return -0x1p-43 * v
	}
	return 0x1p-43 * v
}
