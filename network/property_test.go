package network_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

func drawInput(t *rapid.T, m *built) network.InputID {
	return network.InputID(rapid.IntRange(0, m.net.InputCount()-1).Draw(t, "input"))
}

// The response to two inputs together is the sum of the responses to each.
func TestSuperposition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		m, at := s.build(t), s.span(t)
		a, b := drawInput(t, m), drawInput(t, m)
		r := m.reduce(t, m.levels())
		run := func(onA, onB bool) *laplace.Response {
			for k := range m.p.Wave {
				m.p.Wave[k] = laplace.Constant(0)
			}
			if onA {
				m.p.Wave[a] = laplace.Step(0, 3, 0)
			}
			if onB && b != a {
				m.p.Wave[b] = laplace.Sine(0, 2, 1/at, 0).WithBefore(0)
			}
			resp, err := r.Respond(m.p, at)
			if err != nil {
				t.Fatal(err)
			}
			return resp
		}
		both, one, other := run(true, true), run(true, false), run(false, true)
		for o := range m.nodes {
			x, y := one.At(o, at), other.At(o, at)
			near(t, "sum", both.At(o, at), x+y, 1e-13, math.Abs(x)+math.Abs(y)+1)
		}
	})
}

// A source at a moves b as the same source at b moves a.
func TestReciprocity(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		m, at := s.build(t), s.span(t)
		i, j := rapid.IntRange(0, len(s.sources)-1).Draw(t, "i"), rapid.IntRange(0, len(s.sources)-1).Draw(t, "j")
		r := m.reduce(t, m.levels())
		run := func(i, j int) float64 {
			for k := range m.p.Wave {
				m.p.Wave[k] = laplace.Constant(0)
			}
			m.p.Wave[m.source[i]] = laplace.Step(0, 1, 0)
			resp, err := r.Respond(m.p, at)
			if err != nil {
				t.Fatal(err)
			}
			return resp.At(s.sources[j], at)
		}
		x, y := run(i, j), run(j, i)
		near(t, "transfer impedance", x, y, 1e-12, math.Abs(run(i, i))+math.Abs(run(j, j)))
	})
}

// What a source puts in is stored or has gone to the held nodes. The flow that has
// gone is the response of the flow to the integral of the source.
func TestEnergyBalance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		m, at := s.build(t), s.span(t)
		outs := m.levels()
		var outflows []int
		for k, w := range s.wires {
			if (s.kinds[w.from] == held) != (s.kinds[w.to] == held) {
				sign := 1.0
				if s.kinds[w.from] == held {
					sign = -1
				}
				outflows = append(outflows, len(outs))
				outs = append(outs, network.Output{Flow: &network.FlowTerm{Resistance: m.wires[k], Sign: sign}})
			}
		}
		in := m.source[rapid.IntRange(0, len(m.source)-1).Draw(t, "source")]
		m.p.Wave[in] = laplace.Step(0, 1, 0)
		step := m.respond(t, outs, at)
		m.p.Wave[in] = laplace.Waveform{Segments: []laplace.Segment{{B: 1}}}
		ramp := m.respond(t, outs, at)
		sum := 0.0
		for i, k := range s.kinds {
			if k == store {
				sum += s.C[i] * step.At(i, at)
			}
		}
		for _, o := range outflows {
			sum += ramp.At(o, at)
		}
		near(t, "stored + gone", sum, at, 1e-11, at)
	})
}

// Without sources no level leaves the interval of the start levels and held levels.
func TestMaximumPrinciple(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		m, at := s.build(t), s.span(t)
		level := rapid.Float64Range(280, 300)
		m.p.HasAllStart = false
		for i, k := range s.kinds {
			switch k {
			case held:
				m.p.Wave[m.hold[i]] = laplace.Step(level.Draw(t, "before"), level.Draw(t, "after"), 0)
			case store:
				m.p.Start[m.nodes[i]], m.p.HasStart[m.nodes[i]] = level.Draw(t, "start"), true
			}
		}
		resp := m.respond(t, m.levels(), at)
		for o := range m.nodes {
			for _, share := range []float64{0, 1e-6, 0.01, 0.3, 1} {
				if y := resp.At(o, share*at); !(y >= 280-1e-9 && y <= 300+1e-9) {
					t.Fatalf("node %d is at %v", o, y)
				}
			}
		}
	})
}

// The names and the order of nodes mean nothing.
func TestRelabelling(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		at := s.span(t)
		index := make([]int, len(s.kinds))
		for i := range index {
			index[i] = i
		}
		to := rapid.Permutation(index).Draw(t, "to")
		moved := &spec{kinds: make([]kind, len(to)), C: make([]float64, len(to))}
		for i, j := range to {
			moved.kinds[j], moved.C[j] = s.kinds[i], s.C[i]
		}
		for _, w := range s.wires {
			moved.wires = append(moved.wires, wire{to[w.to], to[w.from], w.value})
		}
		for _, n := range s.sources {
			moved.sources = append(moved.sources, to[n])
		}
		run := func(s *spec) *laplace.Response {
			m := s.build(t)
			m.p.Wave[m.source[0]] = laplace.Step(0, 1, 0)
			return m.respond(t, m.levels(), at)
		}
		x, y := run(s), run(moved)
		for i, j := range to {
			near(t, "level", y.At(j, at), x.At(i, at), 1e-12, math.Abs(x.At(s.sources[0], at)))
		}
	})
}

// sameResponse compares two networks at the nodes of the first.
func sameResponse(t *rapid.T, a, b *spec, at float64) {
	run := func(s *spec) *laplace.Response {
		m := s.build(t)
		m.p.Wave[m.hold[0]] = laplace.Step(0, 1, 0)
		m.p.Wave[m.source[0]] = laplace.Step(0, 1, 0)
		return m.respond(t, m.levels(), at)
	}
	x, y := run(a), run(b)
	scale := 0.0
	for i := range a.kinds {
		scale = max(scale, math.Abs(x.At(i, at)))
	}
	for i := range a.kinds {
		near(t, "level", y.At(i, at), x.At(i, at), 1e-12, scale)
	}
}

// A massless node within a resistance changes nothing, nor do two parallel
// resistances in place of one.
func TestSeriesAndParallel(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		at := s.span(t)
		k := rapid.IntRange(0, len(s.wires)-1).Draw(t, "wire")
		share := rapid.Float64Range(0.001, 0.999).Draw(t, "share")
		w := s.wires[k]

		series := *s
		series.kinds = append(append([]kind(nil), s.kinds...), massless)
		series.wires = append([]wire(nil), s.wires...)
		middle := len(s.kinds)
		series.wires[k] = wire{w.from, middle, share * w.value}
		series.wires = append(series.wires, wire{middle, w.to, (1 - share) * w.value})
		sameResponse(t, s, &series, at)

		parallel := *s
		parallel.wires = append([]wire(nil), s.wires...)
		parallel.wires[k].value = w.value / share
		parallel.wires = append(parallel.wires, wire{w.to, w.from, w.value / (1 - share)})
		sameResponse(t, s, &parallel, at)
	})
}

// A star of three resistances about a massless node is a triangle.
func TestStarTriangle(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		at := s.span(t)
		n := len(s.kinds)
		if n < 3 {
			return
		}
		index := make([]int, n)
		for i := range index {
			index[i] = i
		}
		end := rapid.Permutation(index).Draw(t, "ends")[:3]
		var R [3]float64
		for i := range R {
			R[i] = math.Exp2(rapid.Float64Range(-10, 10).Draw(t, "R"))
		}
		star, triangle := *s, *s
		star.kinds = append(append([]kind(nil), s.kinds...), massless)
		star.wires = append([]wire(nil), s.wires...)
		triangle.wires = append([]wire(nil), s.wires...)
		for i := range 3 {
			star.wires = append(star.wires, wire{n, end[i], R[i]})
			j, k := (i+1)%3, (i+2)%3
			triangle.wires = append(triangle.wires, wire{end[j], end[k], R[j] + R[k] + R[j]*R[k]/R[i]})
		}
		sameResponse(t, &triangle, &star, at)
	})
}

// Two copies have each pole twice.
func TestTwoCopies(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		n := len(s.kinds)
		twice := &spec{kinds: append(append([]kind(nil), s.kinds...), s.kinds...), C: append(append([]float64(nil), s.C...), s.C...)}
		twice.wires = append([]wire(nil), s.wires...)
		for _, w := range s.wires {
			twice.wires = append(twice.wires, wire{w.from + n, w.to + n, w.value})
		}
		one, two := poles(s.build(t).reduce(t, nil)), poles(twice.build(t).reduce(t, nil))
		if len(two) != 2*len(one) {
			t.Fatalf("%d poles, %d of two copies", len(one), len(two))
		}
		for i, p := range one {
			for _, q := range two[2*i : 2*i+2] {
				near(t, "pole", real(q), real(p), 1e-13, math.Abs(real(p)))
			}
		}
	})
}

func poles(r *network.Reduction) []complex128 {
	var all []complex128
	for _, p := range r.System.Poles() {
		for range p.Mult {
			all = append(all, p.P)
		}
	}
	return all
}

// All R times a power of two and all C divided by it leave the poles bit for bit
// where they were; so do levels where the source is divided by it too.
func TestScalingIsExact(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		at := s.span(t)
		k := math.Exp2(float64(rapid.IntRange(-20, 20).Draw(t, "k")))
		scaled := &spec{kinds: s.kinds, sources: s.sources}
		for _, c := range s.C {
			scaled.C = append(scaled.C, c/k)
		}
		for _, w := range s.wires {
			scaled.wires = append(scaled.wires, wire{w.from, w.to, w.value * k})
		}
		a, b := s.build(t), scaled.build(t)
		a.p.Wave[a.source[0]] = laplace.Step(0, 3, 0)
		b.p.Wave[b.source[0]] = laplace.Step(0, 3/k, 0)
		p, q := poles(a.reduce(t, nil)), poles(b.reduce(t, nil))
		for i := range p {
			if p[i] != q[i] {
				t.Fatalf("pole %v became %v", p[i], q[i])
			}
		}
		x, y := a.respond(t, a.levels(), at), b.respond(t, b.levels(), at)
		for o := range a.nodes {
			near(t, "level", y.At(o, at), x.At(o, at), 1e-13, math.Abs(x.At(s.sources[0], at)))
		}
	})
}

// Sources times a power of two give outputs times it, bit for bit.
func TestSourcesScaleExactly(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		m, at := s.build(t), s.span(t)
		k := math.Exp2(float64(rapid.IntRange(-40, 40).Draw(t, "k")))
		r := m.reduce(t, m.levels())
		run := func(k float64) *laplace.Response {
			for i := range m.p.Wave {
				m.p.Wave[i] = laplace.Step(0, k*float64(1+2*i), 0)
			}
			resp, err := r.Respond(m.p, at)
			if err != nil {
				t.Fatal(err)
			}
			return resp
		}
		x, y := run(1), run(k)
		for o := range m.nodes {
			for _, share := range []float64{0, 0.1, 1} {
				if got, want := y.At(o, share*at), k*x.At(o, share*at); got != want {
					t.Fatalf("level %v, want %v", got, want)
				}
			}
		}
	})
}

// A steady start stays: with constant inputs no level moves at all.
func TestSteadyStartStays(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := anyRC(t)
		m, at := s.build(t), s.span(t)
		m.p.HasAllStart = false
		for k := range m.p.Wave {
			m.p.Wave[k] = laplace.Constant(rapid.Float64Range(-10, 400).Draw(t, "u"))
		}
		r := m.reduce(t, m.levels())
		if r.HasImbalance {
			t.Fatal("a steady start has an imbalance")
		}
		start, err := r.Start(m.p)
		if err != nil {
			t.Fatal(err)
		}
		resp, err := r.Respond(m.p, at)
		if err != nil {
			t.Fatal(err)
		}
		for o, n := range m.nodes {
			if a, b := resp.At(o, 0), resp.At(o, at); a != b {
				t.Fatalf("node %d moves from %v to %v", o, a, b)
			}
			near(t, "start level", resp.At(o, 0), start.Levels[n], 1e-14, math.Abs(start.Levels[n])+400)
		}
	})
}
