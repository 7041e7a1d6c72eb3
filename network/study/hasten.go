package study

import (
	"math"

	"lagbook/network"

	"gonum.org/v1/gonum/mat"
)

const (
	hastenAfter = 100 // periods of plain marching before the search is hastened
	mostTries   = 60  // periods marched in a hastened search
	remembered  = 6   // residuals that Anderson's method combines
	closeEnough = 1e-7
)

// hasten looks for a state that one period brings back to itself, from one that plain
// marching has come to: where slow modes would take thousands of periods. It returns
// false where it does not come to one, as where something switches in a rhythm of its own.
//
// Method: Anderson's acceleration of the map x → F(x) of one period (D. G. Anderson,
// J. ACM 12, 1965, 547; in the form of Walker and Ni, SIAM J. Numer. Anal. 49, 2011,
// 1715): the next x is the combination of the last F that makes the combination of their
// residuals F − x least. What nothing depends on, such as an energy counted, takes no part.
func (m *Model) hasten(from *network.State, period float64) (*network.State, bool) {
	places := m.periodic()
	x := places.read(from)
	at := from
	var scale []float64
	var gs, rs [][]float64
	first := math.Inf(1)
	for range mostTries {
		run, err := m.Net.March(m.par, at, nil, network.Run{Until: from.T + period})
		if err != nil || run.Until() < (from.T+period)*(1-1e-12) {
			return nil, false
		}
		end := run.End()
		g := places.read(end)
		if scale == nil {
			scale = scalesOf(x, g)
		}
		r := make([]float64, len(x))
		size := 0.0
		for i := range r {
			r[i] = (g[i] - x[i]) / scale[i]
			size = math.Max(size, math.Abs(r[i]))
		}
		if first == math.Inf(1) {
			first = size
		}
		if size <= closeEnough*first {
			back := *end
			back.T = from.T
			return &back, true
		}
		gs, rs = append(gs, g), append(rs, r)
		if len(gs) > remembered {
			gs, rs = gs[1:], rs[1:]
		}
		x = combined(gs, rs)
		next := *end
		next.T = from.T
		at = places.write(&next, x)
	}
	return nil, false
}

// scalesOf is the size by which each number of a state is judged: its first change.
func scalesOf(x, g []float64) []float64 {
	s := make([]float64, len(x))
	for i := range s {
		s[i] = math.Max(math.Abs(g[i]-x[i]), 1e-9*math.Abs(g[i])) + 1e-30
	}
	return s
}

// combined is the combination of the last g whose residuals combine to the least.
func combined(gs, rs [][]float64) []float64 {
	k := len(gs) - 1
	x := append([]float64(nil), gs[k]...)
	if k == 0 || len(x) == 0 {
		return x
	}
	k = min(k, len(x))
	last := len(gs) - 1
	d := mat.NewDense(len(x), k, nil)
	for j := range k {
		for i := range x {
			d.Set(i, j, rs[last-j][i]-rs[last-j-1][i])
		}
	}
	var gamma mat.VecDense
	if err := gamma.SolveVec(d, mat.NewVecDense(len(x), rs[last])); err != nil {
		if _, poor := err.(mat.Condition); !poor {
			return x
		}
	}
	for j := range k {
		c := gamma.AtVec(j)
		if math.IsNaN(c) || math.IsInf(c, 0) {
			return append([]float64(nil), gs[last]...)
		}
		for i := range x {
			x[i] -= c * (gs[last-j][i] - gs[last-j-1][i])
		}
	}
	return x
}

// places are the numbers of a state that a cycle brings back.
type places struct {
	levels   []network.NodeID
	flows    int
	unknowns [][2]int // element, unknown
}

// periodic finds them: levels of what stores, flows of columns, and unknowns that have a
// rate and on which something depends at the start; the others follow by themselves.
func (m *Model) periodic() places {
	p := places{flows: len(m.par.L)}
	for i := range m.Net.NodeCount() {
		if m.stores(network.NodeID(i)) {
			p.levels = append(p.levels, network.NodeID(i))
		}
	}
	acting := map[string]bool{} // those that the linear network about the start has as nodes of its own
	if start, err := m.moment(nil); err == nil {
		for _, name := range start.lin.Net.Nodes()[m.Net.NodeCount():] {
			acting[name] = true
		}
	}
	for _, e := range m.elements() {
		for j, u := range e.Unknowns {
			if !u.Algebraic && acting[u.Name+" of "+e.Name] {
				p.unknowns = append(p.unknowns, [2]int{int(e.ID), j})
			}
		}
	}
	return p
}

func (p *places) read(s *network.State) []float64 {
	var x []float64
	for _, id := range p.levels {
		x = append(x, s.Levels[id])
	}
	x = append(x, s.Flows[:min(p.flows, len(s.Flows))]...)
	for _, u := range p.unknowns {
		x = append(x, s.Unknowns[u[0]][u[1]])
	}
	return x
}

// write returns a state with other numbers in those places.
func (p *places) write(s *network.State, x []float64) *network.State {
	c := *s
	c.Levels, c.Flows = append([]float64(nil), s.Levels...), append([]float64(nil), s.Flows...)
	c.Unknowns = make([][]float64, len(s.Unknowns))
	for i, u := range s.Unknowns {
		c.Unknowns[i] = append([]float64(nil), u...)
	}
	for _, id := range p.levels {
		c.Levels[id], x = x[0], x[1:]
	}
	n := copy(c.Flows[:min(p.flows, len(c.Flows))], x)
	x = x[n:]
	for k, u := range p.unknowns {
		c.Unknowns[u[0]][u[1]] = x[k]
	}
	return &c
}
