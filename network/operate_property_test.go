package network

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// A monotone is a network of massless and held nodes with parts through which flow rises
// with the difference; of a one-way part nothing flows back.
type monotone struct {
	held  []float64 // NaN: free
	draw  []float64
	parts []passage
}

type passage struct {
	a, b   int
	law    quadratic
	oneWay bool
}

func anyMonotone(t *rapid.T, oneWay bool) *monotone {
	n := rapid.IntRange(2, 7).Draw(t, "nodes")
	number := func(label string) float64 { return float64(rapid.IntRange(1, 64).Draw(t, label)) / 16 }
	m := &monotone{}
	join := func(a, b int) {
		p := passage{a, b, quadratic{number("k"), number("core") / 64}, oneWay && rapid.Bool().Draw(t, "one way")}
		if rapid.Bool().Draw(t, "turned") {
			p.a, p.b = b, a
		}
		m.parts = append(m.parts, p)
	}
	for i := range n {
		m.held, m.draw = append(m.held, math.NaN()), append(m.draw, 0)
		switch {
		case i == 0 || rapid.IntRange(0, 4).Draw(t, "held") == 0:
			m.held[i] = number("level")
		case !oneWay:
			m.draw[i] = float64(rapid.IntRange(-16, 16).Draw(t, "draw")) / 16
		}
		if i > 0 {
			join(rapid.IntRange(0, i-1).Draw(t, "to"), i)
		}
	}
	for range rapid.IntRange(0, 5).Draw(t, "more") {
		if a, b := rapid.IntRange(0, n-1).Draw(t, "a"), rapid.IntRange(0, n-1).Draw(t, "b"); a != b {
			join(a, b)
		}
	}
	return m
}

// build names node i of m by its place in order.
func (m *monotone) build(t *rapid.T, order []int) (*Network, *Params, []NodeID) {
	b := NewBuilder()
	id := make([]NodeID, len(order))
	for _, i := range order {
		id[i] = b.Node(fmt.Sprint("n", i), NoRef)
	}
	var set []func(p *Params)
	for _, i := range order {
		if v := m.held[i]; !math.IsNaN(v) {
			h := b.Hold(id[i], NoRef)
			set = append(set, func(p *Params) { p.Wave[h] = laplace.Constant(v) })
		} else if v := m.draw[i]; v != 0 {
			s := b.Source("draw", id[i], -1, NoRef)
			set = append(set, func(p *Params) { p.Wave[s] = laplace.Constant(v) })
		}
	}
	for i, v := range m.parts {
		if v.oneWay {
			k := b.Element(Shape{Name: fmt.Sprint("check", i), Ports: []NodeID{id[v.a], id[v.b]}, Joins: true}, NoRef)
			set = append(set, func(p *Params) { p.Law[k] = checking{v.law} })
		} else {
			k := b.Between(fmt.Sprint("part", i), id[v.a], id[v.b], false, NoRef)
			set = append(set, func(p *Params) { p.Law[k] = &Through{v.law} })
		}
	}
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	for _, f := range set {
		f(p)
	}
	return n, p, id
}

// net is what flows into node i of m at the levels x.
func (m *monotone) net(i int, x []float64) float64 {
	sum := -m.draw[i]
	for k := range m.parts {
		q := m.flow(k, x)
		if m.parts[k].a == i {
			sum -= q
		}
		if m.parts[k].b == i {
			sum += q
		}
	}
	return sum
}

func (m *monotone) flow(k int, x []float64) float64 {
	v := &m.parts[k]
	if q, _, _ := v.law.Flow(x[v.a], x[v.b]); !v.oneWay || q > 0 {
		return q
	}
	return 0
}

// balances checks every balance with flows computed here, where a one-way part lets nothing
// back whatever its mode. Flows rise with differences, so that no other levels can do that
// (Ortega, Rheinboldt 1970, § 4.4).
func (m *monotone) balances(t *rapid.T, s *State, id []NodeID) {
	x := make([]float64, len(id))
	for i, n := range id {
		x[i] = s.Levels[n]
	}
	for i, v := range m.held {
		if !math.IsNaN(v) {
			continue
		}
		if net := m.net(i, x); math.Abs(net) > 1e-9*(1+math.Abs(x[i])) {
			t.Fatalf("node %d: %v flows in and nowhere out, at %v", i, net, x)
		}
	}
}

// Networks whose flows rise with the differences are solved, wherever they begin.
func TestOperateMonotone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyMonotone(t, false)
		n, p, id := m.build(t, upTo(len(m.held)))
		from, err := n.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		m.balances(t, from, id)
		for i := range from.Levels {
			from.Levels[i] = float64(rapid.IntRange(-1000, 1000).Draw(t, "from"))
		}
		s, err := n.Operate(p, 0, from)
		if err != nil {
			t.Fatal(err)
		}
		m.balances(t, s, id)
	})
}

// Check valves come to rest open or shut so that nothing flows back.
func TestOperateCheckValves(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyMonotone(t, true)
		n, p, id := m.build(t, upTo(len(m.held)))
		s, err := n.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		m.balances(t, s, id)
	})
}

// A node among held ones lies where bisection of its balance finds it.
func TestOperateAgainstBisection(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := &monotone{held: []float64{math.NaN()}, draw: []float64{float64(rapid.IntRange(-16, 16).Draw(t, "draw")) / 16}}
		for i := range rapid.IntRange(1, 5).Draw(t, "others") {
			m.held, m.draw = append(m.held, float64(rapid.IntRange(0, 64).Draw(t, "level"))/16), append(m.draw, 0)
			m.parts = append(m.parts, passage{0, i + 1, quadratic{float64(rapid.IntRange(1, 64).Draw(t, "k")) / 16, 0.125}, false})
		}
		n, p, id := m.build(t, upTo(len(m.held)))
		s, err := n.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		x, lo, hi := slices.Clone(m.held), -1e4, 1e4
		for range 100 {
			if x[0] = (lo + hi) / 2; m.net(0, x) > 0 {
				lo = x[0]
			} else {
				hi = x[0]
			}
		}
		if differs(s.Levels[id[0]], x[0], 1e-10, 1+math.Abs(x[0])) {
			t.Fatalf("%v, bisection gives %v", s.Levels[id[0]], x[0])
		}
	})
}

// The order in which nodes are named changes nothing.
func TestOperateRenumbering(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyMonotone(t, false)
		order := rapid.Permutation(upTo(len(m.held))).Draw(t, "order")
		a, p, id := m.build(t, upTo(len(m.held)))
		b, q, moved := m.build(t, order)
		x, err := a.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		y, err := b.Operate(q, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		for i := range id {
			if differs(x.Levels[id[i]], y.Levels[moved[i]], 1e-9, 1+math.Abs(x.Levels[id[i]])) {
				t.Fatalf("node %d: %v and %v", i, x.Levels[id[i]], y.Levels[moved[i]])
			}
		}
	})
}

// A part named from its other end is the same part.
func TestOperateTurned(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyMonotone(t, false)
		turned := *m
		turned.parts = slices.Clone(m.parts)
		for k := range turned.parts {
			turned.parts[k].a, turned.parts[k].b = m.parts[k].b, m.parts[k].a
		}
		a, p, id := m.build(t, upTo(len(m.held)))
		b, q, _ := turned.build(t, upTo(len(m.held)))
		x, err := a.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		y, err := b.Operate(q, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		for i := range id {
			if differs(x.Levels[id[i]], y.Levels[id[i]], 1e-9, 1+math.Abs(x.Levels[id[i]])) {
				t.Fatalf("node %d: %v and %v", i, x.Levels[id[i]], y.Levels[id[i]])
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

// Whatever the parts, a steady state is one, or its absence is said; and a start found as
// steady does not move.
func TestOperateAnything(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n, p := anyNonlinear(t)
		for k := range p.Wave {
			p.Wave[k] = laplace.Constant(p.Wave[k].Before)
		}
		for k := range p.Drive {
			for d := range p.Drive[k] {
				p.Drive[k][d] = laplace.Constant(p.Drive[k][d].Before)
			}
		}
		s, err := n.Begin(p)
		if err != nil {
			if !errors.As(err, new(*NoSteady)) && !errors.As(err, new(*ParamFault)) {
				t.Fatal(err)
			}
			return
		}
		e, err := n.newEquations(p)
		if err != nil {
			t.Fatal(err)
		}
		if err := e.enter(s, 0, 1); err != nil {
			t.Fatal(err)
		}
		x := e.vector(s)
		f, sizes := make([]float64, len(x)), make([]float64, len(x))
		e.rates(0, x, f)
		e.scale(x, sizes)
		most := 1.0
		for _, v := range s.Levels {
			most = max(most, math.Abs(v))
		}
		for i, v := range f {
			if math.Abs(v) > 1e-7*most {
				t.Fatalf("row %d: %v left over at %v", i, v, x)
			}
			if !(sizes[i] > 0) || math.IsInf(sizes[i], 0) {
				t.Fatalf("unknown %d: size %v", i, sizes[i])
			}
		}
		op, err := n.Operate(p, 0, s)
		if err != nil {
			t.Fatalf("from the steady start: %v", err)
		}
		for i, v := range op.Levels {
			if differs(v, s.Levels[i], 1e-6, most) {
				t.Fatalf("level %d: %v from the start, %v at rest", i, s.Levels[i], v)
			}
		}
	})
}
