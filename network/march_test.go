package network_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// march carries the levels of a spec through time by itself: no elimination of
// massless nodes, no poles. Held nodes and sources are constant at u. Every step is
// linearly implicit Euler with 1, 2, … 8 substeps, extrapolated to substeps of no
// length (Deuflhard, Hairer, Zugck 1987); a massless node is a row without capacity.
func (s *spec) march(x, u []float64, at float64, steps int) []float64 {
	n := len(s.kinds)
	x = append([]float64(nil), x...)
	h := at / float64(steps)
	const depth = 8
	for range steps {
		var table [depth][]float64
		for j := range depth {
			y := append([]float64(nil), x...)
			for range j + 1 {
				y = s.implicitEuler(y, u, h/float64(j+1))
			}
			next := y
			for k := range j {
				ratio := float64(j+1) / float64(j-k)
				better := make([]float64, n)
				for i := range better {
					better[i] = next[i] + (next[i]-table[k][i])/(ratio-1)
				}
				table[k], next = next, better
			}
			table[j] = next
		}
		x = table[depth-1]
	}
	return x
}

// implicitEuler solves C (y − x)/h = balance(y).
func (s *spec) implicitEuler(x, u []float64, h float64) []float64 {
	n := len(s.kinds)
	A, b := make([][]float64, n), make([]float64, n)
	for i, k := range s.kinds {
		A[i] = make([]float64, n)
		switch k {
		case store:
			A[i][i], b[i] = s.C[i]/h, s.C[i]/h*x[i]
		case held:
			A[i][i], b[i] = 1, u[i]
		}
	}
	add := func(into, on, self int, v float64) { // v·(x_on − x_self) into the balance of into
		if s.kinds[into] != held {
			A[into][on] -= v
			A[into][self] += v
		}
	}
	for _, w := range s.wires {
		add(w.to, w.from, w.to, 1/w.value)
		add(w.from, w.to, w.from, 1/w.value)
	}
	for _, w := range s.streams {
		add(w.to, w.from, w.to, w.value)
	}
	for _, w := range s.feedbacks {
		if s.kinds[w.to] != held {
			A[w.to][w.from] -= w.value
		}
	}
	for _, i := range s.sources {
		if s.kinds[i] != held {
			b[i] += u[i]
		}
	}
	return gauss(A, b)
}

// gauss solves A x = b by elimination with row scaling and pivoting.
func gauss(A [][]float64, b []float64) []float64 {
	n := len(b)
	for i, row := range A {
		most := 0.0
		for _, v := range row {
			most = max(most, math.Abs(v))
		}
		for j := range row {
			row[j] /= most
		}
		b[i] /= most
	}
	for k := range n {
		p := k
		for i := k + 1; i < n; i++ {
			if math.Abs(A[i][k]) > math.Abs(A[p][k]) {
				p = i
			}
		}
		A[k], A[p], b[k], b[p] = A[p], A[k], b[p], b[k]
		for i := k + 1; i < n; i++ {
			f := A[i][k] / A[k][k]
			for j := k; f != 0 && j < n; j++ {
				A[i][j] -= f * A[k][j]
			}
			b[i] -= f * b[k]
		}
	}
	for i := n - 1; i >= 0; i-- {
		for j := i + 1; j < n; j++ {
			b[i] -= A[i][j] * b[j]
		}
		b[i] /= A[i][i]
	}
	return b
}

// Given start levels, held levels and sources: the closed form agrees with the
// march, for networks with streams and stable feedbacks too.
func TestMarchAgrees(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		for i := range s.kinds { // streams in closed rounds, so that what enters a node leaves it
			if j := rapid.IntRange(0, len(s.kinds)-1).Draw(t, "round"); j != i && rapid.Bool().Draw(t, "stream") {
				rate := math.Exp2(rapid.Float64Range(-5, 5).Draw(t, "rate"))
				s.streams = append(s.streams, wire{i, j, rate}, wire{j, i, rate})
			}
		}
		for i, k := range s.kinds {
			switch {
			case rapid.IntRange(0, 3).Draw(t, "fed") != 0:
			case k == massless:
				s.feedbacks = append(s.feedbacks, wire{i, i, -float64(rapid.IntRange(0, 100).Draw(t, "loss")) / 16})
			case k == store:
				on := rapid.IntRange(0, len(s.kinds)-1).Draw(t, "on")
				s.feedbacks = append(s.feedbacks, wire{on, i, s.C[i] * float64(rapid.IntRange(-100, 10).Draw(t, "gain")) / 1000})
			}
		}
		m := s.build(t)
		at := s.fastSpan(t)
		x, u := s.stepped(t, m)
		resp := m.respond(t, m.levels(), at)
		want := s.march(x, u, at, 24)
		scale := 1.0
		for _, v := range want {
			scale = max(scale, math.Abs(v))
		}
		for o := range m.nodes {
			near(t, "level", resp.At(o, at), want[o], 1e-8, scale)
		}
	})
}

// fastSpan is a few of the fastest time constants, so that few steps resolve it.
func (s *spec) fastSpan(t *rapid.T) float64 {
	fastest := 1e-9
	for i, k := range s.kinds {
		if k != store {
			continue
		}
		G := 0.0
		for _, w := range append(append([]wire(nil), s.streams...), s.feedbacks...) {
			if w.to == i {
				G += math.Abs(w.value)
			}
		}
		for _, w := range s.wires {
			if w.to == i || w.from == i {
				G += 1 / w.value
			}
		}
		fastest = max(fastest, G/s.C[i])
	}
	return rapid.Float64Range(0.1, 20).Draw(t, "span") / fastest
}

// stepped draws a start for every store and a step at t = 0 for every input, and
// returns both by node.
func (s *spec) stepped(t *rapid.T, m *built) (x, u []float64) {
	x, u = make([]float64, len(s.kinds)), make([]float64, len(s.kinds))
	m.p.HasAllStart = false
	for i, k := range s.kinds {
		u[i] = rapid.Float64Range(-5, 5).Draw(t, "u")
		switch k {
		case held:
			m.p.Wave[m.hold[i]] = laplace.Step(0, u[i], 0)
		case store:
			x[i] = rapid.Float64Range(-5, 5).Draw(t, "start")
			m.p.Start[m.nodes[i]], m.p.HasStart[m.nodes[i]] = x[i], true
		}
	}
	for k, n := range s.sources {
		m.p.Wave[m.source[k]] = laplace.Step(0, u[n], 0)
	}
	return x, u
}
