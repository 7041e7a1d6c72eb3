package network_test

import (
	"fmt"
	"math/cmplx"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// A tubes is a network with inertances as plain numbers. Node 0 is held, and
// everything hangs together.
type tubes struct {
	spec
	tubes []tube
}

type tube struct {
	from, to int
	L, R     float64
}

type flowing struct {
	*tubes
	net    *network.Network
	p      *network.Params
	nodes  []network.NodeID
	inputs []network.InputID // held nodes ascending, then sources
	tubeID []network.InertanceID
}

func anyTubes(t *rapid.T) *tubes {
	s := &tubes{}
	n := rapid.IntRange(2, 9).Draw(t, "nodes")
	value := rapid.Custom(func(t *rapid.T) float64 { return float64(rapid.IntRange(1, 64).Draw(t, "v")) / 16 })
	for i := range n {
		k := kind(rapid.IntRange(0, 5).Draw(t, "kind"))
		switch {
		case i == 0:
			k = held
		case k > 3:
			k = store
		case k > 2 || k == held && i > 3:
			k = massless
		}
		s.kinds, s.C = append(s.kinds, k), append(s.C, value.Draw(t, "C"))
		if i > 0 {
			s.join(t, rapid.IntRange(0, i-1).Draw(t, "to"), i, value)
		}
	}
	for range rapid.IntRange(0, 4).Draw(t, "more") {
		a, b := rapid.IntRange(0, n-1).Draw(t, "a"), rapid.IntRange(0, n-1).Draw(t, "b")
		if a != b {
			s.join(t, a, b, value)
		}
	}
	if len(s.tubes) == 0 {
		s.tubes = append(s.tubes, tube{0, n - 1, value.Draw(t, "L"), value.Draw(t, "R")})
	}
	for range rapid.IntRange(0, 2).Draw(t, "sources") {
		s.sources = append(s.sources, rapid.IntRange(0, n-1).Draw(t, "at"))
	}
	return s
}

func (s *tubes) join(t *rapid.T, a, b int, value *rapid.Generator[float64]) {
	switch rapid.IntRange(0, 3).Draw(t, "branch") {
	case 0:
		s.wires = append(s.wires, wire{a, b, value.Draw(t, "r")})
	case 1:
		s.tubes = append(s.tubes, tube{a, b, value.Draw(t, "L"), 0})
	default:
		s.tubes = append(s.tubes, tube{a, b, value.Draw(t, "L"), value.Draw(t, "R")})
	}
}

func (s *tubes) build(t interface{ Fatal(...any) }) *flowing {
	b, m := network.NewBuilder(), &flowing{tubes: s}
	var set []func(p *network.Params)
	for i, k := range s.kinds {
		id := b.Node(fmt.Sprint("n", i), network.NoRef)
		m.nodes = append(m.nodes, id)
		if k == held {
			m.inputs = append(m.inputs, b.Hold(id, network.NoRef))
		}
		if k == store {
			c := b.Capacity(id, network.NoRef)
			set = append(set, func(p *network.Params) { p.C[c] = s.C[i] })
		}
	}
	for _, w := range s.wires {
		id := b.Resistance("", m.nodes[w.from], m.nodes[w.to], network.NoRef)
		set = append(set, func(p *network.Params) { p.G[id] = 1 / w.value })
	}
	for k, w := range s.tubes {
		id := b.Inertance(fmt.Sprint("t", k), m.nodes[w.from], m.nodes[w.to], network.NoRef)
		m.tubeID = append(m.tubeID, id)
		set = append(set, func(p *network.Params) { p.L[id], p.LR[id] = w.L, w.R })
	}
	for k, n := range s.sources {
		m.inputs = append(m.inputs, b.Source(fmt.Sprint("q", k), m.nodes[n], 1, network.NoRef))
	}
	for range s.switches {
		b.Switch("switch", network.NoRef)
	}
	var err error
	if m.net, err = b.Build(); err != nil {
		t.Fatal(err)
	}
	m.p = m.net.NewParams()
	m.p.HasAllStart = true
	for _, f := range set {
		f(m.p)
	}
	return m
}

// outputs shows every node, every tube and the supply of every held node.
func (m *flowing) outputs() (outs []network.Output) {
	for _, id := range m.nodes {
		outs = append(outs, m.net.Level(id))
	}
	for _, id := range m.tubeID {
		outs = append(outs, m.net.InertanceFlowOf(id))
	}
	for i, k := range m.kinds {
		if k == held {
			outs = append(outs, m.net.SupplyOf(m.nodes[i]))
		}
	}
	return outs
}

func (m *flowing) reduce(t interface{ Fatal(...any) }) *network.Reduction {
	r, err := m.net.Reduce(m.p, m.outputs())
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func (m *flowing) respond(t interface{ Fatal(...any) }, until float64) *laplace.Response {
	resp, err := m.reduce(t).Respond(m.p, until)
	if err != nil {
		t.Fatal(err)
	}
	return resp
}

// equations solves all balances as they stand, with levels of nodes and flows of
// tubes as unknowns, for the input in of 1 at s: nothing is eliminated, reduced or
// chosen. It returns the outputs in the order of outputs.
func (m *flowing) equations(in int, s complex128) ([]complex128, bool) {
	n := len(m.kinds)
	N := n + len(m.tubes.tubes)
	a, x := make([]complex128, N*N), make([]complex128, N)
	fixed := m.fillNodes(a, x, in, s)
	for k, w := range m.tubes.tubes {
		row := a[(n+k)*N:]
		row[n+k] = s*complex(w.L, 0) + complex(w.R, 0)
		row[w.from]--
		row[w.to]++
	}
	if !complexGauss(N, a, x) {
		return nil, false
	}
	y := append([]complex128(nil), x...)
	for _, i := range fixed {
		y = append(y, m.supplied(i, in, x))
	}
	return y, true
}

func (m *flowing) fillNodes(a, x []complex128, in int, s complex128) (fixed []int) {
	n := len(m.kinds)
	N := n + len(m.tubes.tubes)
	add := func(i, j int, v complex128) {
		if m.kinds[i] != held {
			a[i*N+j] += v
		}
	}
	for i, k := range m.kinds {
		switch k {
		case store:
			a[i*N+i] = s * complex(m.C[i], 0)
		case held:
			a[i*N+i] = 1
			if len(fixed) == in {
				x[i] = 1
			}
			fixed = append(fixed, i)
		}
	}
	for _, w := range m.wires {
		g := complex(1/w.value, 0)
		add(w.from, w.from, g)
		add(w.from, w.to, -g)
		add(w.to, w.to, g)
		add(w.to, w.from, -g)
	}
	for k, w := range m.tubes.tubes {
		add(w.from, n+k, 1)
		add(w.to, n+k, -1)
	}
	for k, at := range m.sources {
		if len(fixed)+k == in && m.kinds[at] != held {
			x[at]++
		}
	}
	return fixed
}

// supplied is what the driver of held node i delivers.
func (m *flowing) supplied(i, in int, x []complex128) (y complex128) {
	for _, w := range m.wires {
		g := complex(1/w.value, 0)
		if w.from == i {
			y += g * (x[w.from] - x[w.to])
		}
		if w.to == i {
			y += g * (x[w.to] - x[w.from])
		}
	}
	for k, w := range m.tubes.tubes {
		if w.from == i {
			y += x[len(m.kinds)+k]
		}
		if w.to == i {
			y -= x[len(m.kinds)+k]
		}
	}
	first := len(m.inputs) - len(m.sources)
	for k, at := range m.sources {
		if at == i && first+k == in {
			y--
		}
	}
	return y
}

// complexGauss solves a x = b in place, with row exchanges.
func complexGauss(n int, a, b []complex128) bool {
	for k := range n {
		p := k
		for i := k; i < n; i++ {
			if cmplx.Abs(a[i*n+k]) > cmplx.Abs(a[p*n+k]) {
				p = i
			}
		}
		if cmplx.Abs(a[p*n+k]) < 1e-13 {
			return false
		}
		for j := range n {
			a[k*n+j], a[p*n+j] = a[p*n+j], a[k*n+j]
		}
		b[k], b[p] = b[p], b[k]
		for i := k + 1; i < n; i++ {
			f := a[i*n+k] / a[k*n+k]
			for j := k; j < n; j++ {
				a[i*n+j] -= f * a[k*n+j]
			}
			b[i] -= f * b[k]
		}
	}
	for k := n - 1; k >= 0; k-- {
		for j := k + 1; j < n; j++ {
			b[k] -= a[k*n+j] * b[j]
		}
		b[k] /= a[k*n+k]
	}
	return true
}
