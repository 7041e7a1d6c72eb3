package network_test

import (
	"math"
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// stiffRC is anyRC with resistances over 24 decades.
func stiffRC(t *rapid.T) *spec {
	s := anyRC(t)
	for i := range s.wires {
		s.wires[i].value = math.Exp2(rapid.Float64Range(-40, 40).Draw(t, "stiff R"))
	}
	return s
}

// exactSteady solves the balances of all free nodes in rationals, from the doubles
// the package is given.
func (s *spec) exactSteady(u []float64) []*big.Rat {
	n := len(s.kinds)
	A := make([][]*big.Rat, n) // the last column is the right-hand side
	for i := range A {
		A[i] = make([]*big.Rat, n+1)
		for j := range A[i] {
			A[i][j] = new(big.Rat)
		}
		if s.kinds[i] == held {
			A[i][i].SetInt64(1)
			A[i][n].SetFloat64(u[i])
		}
	}
	for _, w := range s.wires {
		G := new(big.Rat).SetFloat64(1 / w.value)
		for _, end := range [][2]int{{w.from, w.to}, {w.to, w.from}} {
			if s.kinds[end[0]] != held {
				A[end[0]][end[0]].Add(A[end[0]][end[0]], G)
				A[end[0]][end[1]].Sub(A[end[0]][end[1]], G)
			}
		}
	}
	for _, i := range s.sources {
		A[i][n].Add(A[i][n], new(big.Rat).SetFloat64(u[i]))
	}
	return ratGauss(A)
}

func ratGauss(A [][]*big.Rat) []*big.Rat {
	n := len(A)
	for k := range n {
		p := k
		for A[p][k].Sign() == 0 {
			p++
		}
		A[k], A[p] = A[p], A[k]
		for i := range A {
			if i == k || A[i][k].Sign() == 0 {
				continue
			}
			f := new(big.Rat).Quo(A[i][k], A[k][k])
			for j := k; j <= n; j++ {
				A[i][j] = new(big.Rat).Sub(A[i][j], new(big.Rat).Mul(f, A[k][j]))
			}
		}
	}
	x := make([]*big.Rat, n)
	for i := range x {
		x[i] = new(big.Rat).Quo(A[i][n], A[i][i])
	}
	return x
}

// However stiff the network, every level of a steady state that inputs of one sign
// drive is right to a few roundings, relative to itself.
func TestSteadyStateAgainstRationals(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := stiffRC(t)
		m := s.build(t)
		u, in := make([]float64, len(s.kinds)), make([]float64, m.net.InputCount())
		for i := range u {
			u[i] = math.Exp2(rapid.Float64Range(-20, 20).Draw(t, "u"))
			if k, ok := m.hold[i]; ok {
				u[i] = 0 // the reference, so that levels keep their relative digits
				in[k] = u[i]
			}
		}
		for k, n := range s.sources {
			in[m.source[k]] = u[n]
		}
		got, err := m.net.SteadyState(m.p, in)
		if err != nil {
			t.Fatal(err)
		}
		for i, want := range s.exactSteady(u) {
			w, _ := want.Float64()
			near(t, "level", got[m.nodes[i]], w, 1e-14, math.Abs(w))
		}
	})
}

// So is every exchange between stores that the elimination of massless nodes leaves.
func TestExchangeAgainstRationals(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := stiffRC(t)
		m := s.build(t)
		r := m.reduce(t, nil)
		b := r.Realisation.Balance
		for j, source := range r.States {
			// Hold every store, one of them at 1: what flows into the others is the exchange.
			fixed := *s
			fixed.kinds = append([]kind(nil), s.kinds...)
			fixed.sources = nil
			u := make([]float64, len(s.kinds))
			for i, k := range s.kinds {
				if k == store {
					fixed.kinds[i] = held
				}
			}
			u[source] = 1
			x := fixed.exactSteady(u)
			for i, into := range r.States {
				if i == j {
					continue
				}
				flow := new(big.Rat)
				for _, w := range s.wires {
					from, to := w.from, w.to
					if from == int(into) {
						from, to = to, from
					}
					if to == int(into) {
						d := new(big.Rat).Sub(x[from], x[to])
						flow.Add(flow, d.Mul(d, new(big.Rat).SetFloat64(1/w.value)))
					}
				}
				want, _ := flow.Float64()
				near(t, "exchange", b.F[i*b.N+j], want, 1e-14, want)
			}
		}
	})
}
