package network_test

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// Every transfer function, at a point off the axis, from the modes and from the
// reduced equations, is what the whole set of balances gives; joints, loops and
// improper outputs included.
func TestFlowEquations(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyTubes(t).build(t)
		r := m.reduce(t)
		at := complex(rapid.Float64Range(0.01, 3).Draw(t, "re"), rapid.Float64Range(0, 3).Draw(t, "im"))
		for in := range m.inputs {
			want, ok := m.equations(in, at)
			if !ok {
				t.Skip("too close to a pole")
			}
			size := 0.0
			for _, v := range want {
				size = max(size, cmplx.Abs(v))
			}
			for out, w := range want {
				h, err := r.System.Transfer(int(m.inputs[in]), out)
				if err != nil {
					t.Fatal(err)
				}
				if got := h.Eval(at); cmplx.Abs(got-w) > 1e-10*size {
					t.Fatalf("input %d, output %d: H(%v) = %v, want %v", in, out, at, got, w)
				}
				checkFactors(t, h, at, w, size)
			}
		}
	})
}

// checkFactors compares with the leading coefficient, zeros and poles.
func checkFactors(t *rapid.T, h *laplace.Transfer, at, want complex128, size float64) {
	if h.Numerator == nil {
		return
	}
	v := complex(h.Numerator[len(h.Numerator)-1], 0)
	for _, z := range h.Zeros {
		if z.Radius > cmplx.Abs(z.P) {
			return // said to be unknown
		}
		v *= cmplx.Pow(at-z.P, complex(float64(z.Mult), 0))
	}
	for _, p := range h.Poles {
		v /= cmplx.Pow(at-p.P, complex(float64(p.Mult), 0))
	}
	if cmplx.Abs(v-want) > 1e-7*size {
		t.Fatalf("from factors %v, want %v: zeros %v, poles %v, form %s", v, want, h.Zeros, h.Poles, h.Form)
	}
}

// No pole of a network without feedback lies right of the axis, and what stores and
// inertances hold never grows while all inputs are 0, whatever the start.
func TestFlowEnergy(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyTubes(t)
		m := s.build(t)
		for _, p := range m.reduce(t).System.Poles() {
			if real(p.P) > max(p.Radius, 1e-13) {
				t.Fatalf("pole %v with radius %v", p.P, p.Radius)
			}
		}
		for i, k := range s.kinds {
			if k == store {
				m.p.Start[i], m.p.HasStart[i] = float64(rapid.IntRange(-8, 8).Draw(t, "x")), true
			}
		}
		y := m.respond(t, 40)
		energy := func(at float64) (e float64) {
			for i, k := range s.kinds {
				if k == store {
					e += s.C[i] * math.Pow(y.At(i, at), 2) / 2
				}
			}
			for k, w := range s.tubes {
				e += w.L * math.Pow(y.At(len(s.kinds)+k, at), 2) / 2
			}
			return e
		}
		last, first := energy(0), energy(0)
		for k := 1; k <= 40; k++ {
			now := energy(float64(k))
			if now > last+1e-12*first {
				t.Fatalf("energy %v at %d s, %v before", now, k, last)
			}
			last = now
		}
	})
}

// Without held nodes and sources the volume in the stores stays as it is.
func TestFlowVolume(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyTubes(t)
		for i, k := range s.kinds {
			if k == held {
				s.kinds[i] = store
			}
		}
		s.sources = nil
		m := s.build(t)
		start, size := 0.0, 0.0
		for i, k := range s.kinds {
			if k == store {
				m.p.Start[i], m.p.HasStart[i] = float64(rapid.IntRange(-8, 8).Draw(t, "x")), true
				start += s.C[i] * m.p.Start[i]
				size += s.C[i] * math.Abs(m.p.Start[i])
			}
		}
		y := m.respond(t, 30)
		for k := range 10 {
			now := 0.0
			for i, kind := range s.kinds {
				if kind == store {
					now += s.C[i] * y.At(i, 3*float64(k))
				}
			}
			if math.Abs(now-start) > 1e-12*size*float64(1+k) {
				t.Fatalf("volume %v at %d s, %v at the start", now, 3*k, start)
			}
		}
	})
}

// With every capacity and inertance 4^k times as large all is 4^k times as slow.
func TestFlowTimeScale(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyTubes(t).build(t)
		f := math.Ldexp(1, 2*rapid.IntRange(-15, 15).Draw(t, "k"))
		before := m.reduce(t).System.Poles()
		for i := range m.p.C {
			m.p.C[i] *= f
		}
		for i := range m.p.L {
			m.p.L[i] *= f
		}
		for k, p := range m.reduce(t).System.Poles() {
			if want := before[k].P / complex(f, 0); cmplx.Abs(p.P-want) > 1e-14*cmplx.Abs(want)+p.Radius {
				t.Fatalf("pole %v, want %v", p.P, want)
			}
		}
	})
}

// At rest an inertance is its resistance: H(0) from the poles' side is the steady
// state of the network of resistances.
func TestFlowSteady(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyTubes(t)
		for k := range s.tubes {
			s.tubes[k].R = max(s.tubes[k].R, 0.25)
		}
		m := s.build(t)
		r := m.reduce(t)
		for in, id := range m.inputs {
			u := make([]float64, len(m.inputs))
			u[id] = 1
			levels, err := m.net.SteadyState(m.p, u)
			if err != nil {
				t.Fatal(err)
			}
			flows, err := m.net.SteadyFlows(m.p, u)
			if err != nil {
				t.Fatal(err)
			}
			for out, want := range append(levels, flows...) {
				g, ok := r.System.Gain(int(id), out)
				if !ok || math.Abs(g-want) > 1e-12*(1+math.Abs(want)) {
					t.Fatalf("input %d, output %d: gain %v (%v), at rest %v", in, out, g, ok, want)
				}
			}
		}
	})
}

// A steady start does not move, circulating flows and joints included.
func TestFlowStaysSteady(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyTubes(t).build(t)
		m.p.HasAllStart = false
		for k := range m.p.Wave {
			m.p.Wave[k] = laplace.Constant(float64(rapid.IntRange(-3, 3).Draw(t, "u")))
		}
		start, err := m.net.Start(m.p)
		if err != nil {
			return // no steady state: a message of its own
		}
		for _, v := range start.Imbalance {
			if v != 0 {
				t.Fatalf("imbalance %v", start.Imbalance)
			}
		}
		y := m.respond(t, 10)
		for out := range m.outputs() {
			if a, b := y.At(out, 0), y.At(out, 9.7); a != b {
				t.Fatalf("output %d moves from %v to %v", out, a, b)
			}
		}
		for i, v := range start.Levels {
			near(t, "level", y.At(i, 0), v, 1e-11, 10)
		}
		for k, v := range start.Flows {
			near(t, "flow", y.At(len(m.nodes)+k, 0), v, 1e-11, 10)
		}
	})
}

// A line cut in two at a rigid joint is the same line, and the joint's pressure
// divides the drop as the cut does.
func TestFlowSplitLine(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyTubes(t)
		k := rapid.IntRange(0, len(s.tubes)-1).Draw(t, "line")
		whole := s.tubes[k]
		cut := &tubes{spec: s.spec, tubes: append([]tube(nil), s.tubes...)}
		joint := len(s.kinds)
		cut.kinds, cut.C = append(append([]kind(nil), s.kinds...), massless), append(append([]float64(nil), s.C...), 0)
		cut.tubes[k] = tube{whole.from, joint, whole.L / 4, whole.R / 4}
		cut.tubes = append(cut.tubes, tube{joint, whole.to, whole.L * 0.75, whole.R * 0.75})
		a, b := s.build(t), cut.build(t)
		for _, m := range []*flowing{a, b} {
			for i := range m.p.Wave {
				m.p.Wave[i], _ = laplace.Points([][2]float64{{0, 0}, {1, 1}, {3, 1}, {4, -2}})
			}
		}
		x, y := a.respond(t, 8), b.respond(t, 8)
		for _, at := range []float64{0.5, 2, 3.3, 7.9} {
			for i := range s.kinds {
				near(t, "level", y.At(i, at), x.At(i, at), 1e-10, 10)
			}
			want := 0.75*x.At(whole.from, at) + 0.25*x.At(whole.to, at)
			near(t, "joint", y.At(joint, at), want, 1e-10, 10)
		}
	})
}

// The order in which nodes and branches are named changes nothing.
func TestFlowRenumbering(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyTubes(t)
		n := len(s.kinds)
		move := rapid.Permutation(upTo(n)).Draw(t, "order")
		order := rapid.Permutation(upTo(len(s.tubes))).Draw(t, "tubes")
		c := &tubes{}
		c.kinds, c.C = make([]kind, n), make([]float64, n)
		for i := range n {
			c.kinds[move[i]], c.C[move[i]] = s.kinds[i], s.C[i]
		}
		for _, w := range s.wires {
			c.wires = append(c.wires, wire{move[w.to], move[w.from], w.value})
		}
		for _, k := range order {
			w := s.tubes[k]
			c.tubes = append(c.tubes, tube{move[w.from], move[w.to], w.L, w.R})
		}
		for _, at := range s.sources {
			c.sources = append(c.sources, move[at])
		}
		a, b := s.build(t), c.build(t)
		start := func(m *flowing, name func(int) int) *laplace.Response {
			for i, k := range s.kinds {
				if k == store {
					m.p.Start[name(i)], m.p.HasStart[name(i)] = float64(i+1), true
				}
			}
			return m.respond(t, 8)
		}
		x := start(a, func(i int) int { return i })
		y := start(b, func(i int) int { return move[i] })
		for _, at := range []float64{0, 0.7, 2, 7} {
			for i := range n {
				near(t, "level", y.At(move[i], at), x.At(i, at), 1e-10, 10)
			}
			for place, k := range order {
				near(t, "flow", y.At(n+place, at), x.At(n+k, at), 1e-10, 10)
			}
		}
	})
}

func upTo(n int) []int {
	list := make([]int, n)
	for i := range list {
		list[i] = i
	}
	return list
}
