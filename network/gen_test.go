package network_test

import (
	"fmt"
	"math"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

type kind int

const (
	store kind = iota
	massless
	held
)

// A spec is a network as plain numbers, from which tests build it, transform it
// and march it by themselves.
type spec struct {
	kinds     []kind
	C         []float64 // of stores
	wires     []wire    // resistances
	streams   []wire    // value: rate
	feedbacks []wire    // from: on, to: into; value: gain
	sources   []int     // nodes
	switches  int
}

type wire struct {
	from, to int
	value    float64
}

type built struct {
	net    *network.Network
	p      *network.Params
	nodes  []network.NodeID
	hold   map[int]network.InputID // by node
	source []network.InputID
	wires  []network.ResistanceID
}

func (s *spec) build(t interface{ Fatal(...any) }) *built {
	b, m := network.NewBuilder(), &built{hold: map[int]network.InputID{}}
	for i, k := range s.kinds {
		id := b.Node(fmt.Sprint("n", i), network.NoRef)
		m.nodes = append(m.nodes, id)
		switch k {
		case store:
			b.Capacity(id, network.NoRef)
		case held:
			m.hold[i] = b.Hold(id, network.NoRef)
		}
	}
	for _, w := range s.wires {
		m.wires = append(m.wires, b.Resistance("", m.nodes[w.from], m.nodes[w.to], network.NoRef))
	}
	for _, w := range s.streams {
		b.OneWay("", m.nodes[w.from], m.nodes[w.to], network.NoRef)
	}
	for _, w := range s.feedbacks {
		b.Feedback("", m.nodes[w.to], m.nodes[w.from], network.NoRef)
	}
	for _, n := range s.sources {
		m.source = append(m.source, b.Source("", m.nodes[n], 1, network.NoRef))
	}
	for range s.switches {
		b.Switch("", network.NoRef)
	}
	var err error
	if m.net, err = b.Build(); err != nil {
		t.Fatal(err)
	}
	m.p = m.net.NewParams()
	c := 0
	for i, k := range s.kinds {
		if k == store {
			m.p.C[c] = s.C[i]
			c++
		}
	}
	for i, w := range s.wires {
		m.p.G[i] = 1 / w.value
	}
	for i, w := range s.streams {
		m.p.W[i] = w.value
	}
	for i, w := range s.feedbacks {
		m.p.K[i] = w.value
	}
	m.p.HasAllStart = true
	return m
}

func (m *built) levels() []network.Output {
	outs := make([]network.Output, len(m.nodes))
	for i, n := range m.nodes {
		outs[i] = m.net.Level(n)
	}
	return outs
}

func (m *built) reduce(t interface{ Fatal(...any) }, outs []network.Output) *network.Reduction {
	r, err := m.net.Reduce(m.p, outs)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func (m *built) respond(t interface{ Fatal(...any) }, outs []network.Output, until float64) *laplace.Response {
	resp, err := m.reduce(t, outs).Respond(m.p, until)
	if err != nil {
		t.Fatal(err)
	}
	return resp
}

// anyRC draws a connected network of resistances, capacitances, massless and held
// nodes; node 0 is held, node 1 a store, and a source leads into every free node.
func anyRC(t *rapid.T) *spec {
	n := rapid.IntRange(2, 9).Draw(t, "nodes")
	s := &spec{kinds: []kind{held, store}}
	for i := 2; i < n; i++ {
		s.kinds = append(s.kinds, rapid.SampledFrom([]kind{store, store, massless, massless, held}).Draw(t, "kind"))
	}
	value := func(label string) float64 {
		return math.Exp2(rapid.Float64Range(-10, 10).Draw(t, label))
	}
	for i, k := range s.kinds {
		s.C = append(s.C, value("C"))
		if i > 0 {
			s.wires = append(s.wires, wire{rapid.IntRange(0, i-1).Draw(t, "to"), i, value("R")})
		}
		if k != held {
			s.sources = append(s.sources, i)
		}
	}
	for range rapid.IntRange(0, 6).Draw(t, "chords") {
		a, b := rapid.IntRange(0, n-1).Draw(t, "a"), rapid.IntRange(0, n-1).Draw(t, "b")
		if a != b {
			s.wires = append(s.wires, wire{a, b, value("R")})
		}
	}
	return s
}

// span is a time in which a network moves: the sum of all R times the sum of all C
// is beyond its slowest pole, so some share of it.
func (s *spec) span(t *rapid.T) float64 {
	R, C := 0.0, 0.0
	for _, w := range s.wires {
		R += w.value
	}
	for i, c := range s.C {
		if s.kinds[i] == store {
			C += c
		}
	}
	return R * C * math.Exp2(rapid.Float64Range(-12, 1).Draw(t, "share"))
}

// near fails unless got and want agree within tol·scale.
func near(t interface{ Fatalf(string, ...any) }, what string, got, want, tol, scale float64) {
	if !(math.Abs(got-want) <= tol*scale) {
		t.Fatalf("%s: %v, want %v (difference %.2e, allowed %.2e)", what, got, want, got-want, tol*scale)
	}
}
