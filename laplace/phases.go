package laplace

import "sort"

// A Kind is a system with what its outputs show at a state of 0 and inputs of 0.
type Kind struct {
	System *System
	Base   []float64
}

// phases tell which of several systems is in force when.
type phases struct {
	at    []float64 // s; the start of each phase, at[0] = 0
	kind  []int     // of each phase: index into kinds
	kinds []Kind
	last  int // the kind in force for ever in the end; −1 where they go on taking turns
}

// always is the one phase of a system that nothing switches.
func always(k Kind) phases { return phases{at: []float64{0}, kind: []int{0}, kinds: []Kind{k}} }

// starts returns the starts up to until, for the caller to keep.
func (p *phases) starts(until float64) []float64 {
	n := sort.Search(len(p.at), func(i int) bool { return p.at[i] > until })
	return append([]float64(nil), p.at[:n]...)
}

// end returns where phase k ends, until at the latest.
func (p *phases) end(k int, until float64) float64 {
	if k+1 < len(p.at) {
		return min(until, p.at[k+1])
	}
	return until
}

// kindAt returns the kind in force at t, after a switch there.
func (p *phases) kindAt(t float64) int {
	if len(p.at) == 1 {
		return p.kind[0]
	}
	return p.kind[max(sort.Search(len(p.at), func(i int) bool { return p.at[i] > t })-1, 0)]
}

// growth bounds the logarithm of what the modes grow by in the whole response.
func (p *phases) growth(r *Response) float64 {
	rate := make([]float64, len(p.kinds))
	for k := range p.kinds {
		rate[k] = p.kinds[k].System.growth(r)
	}
	sum := 0.0
	for k, at := range p.at {
		sum += rate[p.kind[k]] * max(p.end(k, r.until)-at, 0)
	}
	return sum
}

// cross takes the state z of the system in force at t into the coordinates of the
// one in force at next: what is carried over stays, as far as that one holds it.
func (p *phases) cross(t, next float64, z vector) vector {
	a, b := p.kindAt(t), p.kindAt(next)
	if a == b {
		return z
	}
	return p.kinds[b].System.hold(p.kinds[a].System.held(&z))
}

// Systems returns the systems that are in force one after the other, each once.
func (r *Response) Systems() []*System {
	var list []*System
	seen := make([]bool, len(r.phases.kinds))
	for _, k := range r.phases.kind {
		if !seen[k] {
			seen[k] = true
			list = append(list, r.phases.kinds[k].System)
		}
	}
	return list
}

// A carrier holds the maps between what goes over a switch and the modes of a system.
type carrier struct {
	in, out []vector    // of each quantity: the modes of a unit of it, and what it sees of them
	onto    [][]float64 // as in Carry
	ref     []float64
}

// A Carry says what goes over a switch where that is not the levels of all stores:
// quantities that the systems of a Schedule share, and of which this one may hold
// fewer than another, a flow that it stops being lost on the way in. With the state
// x of the system a quantity is Out·x + Ref; on entering, C x is the sum of In times
// the quantities. Of Ref, what the quantities are in a state of 0, In takes nothing.
type Carry struct {
	In   [][]float64 // quantities × N, as B
	Out  [][]float64 // quantities × N
	Onto [][]float64 // quantities × quantities: what entering leaves of a unit of each, by row what comes out; nil: all
	Ref  []float64   // nil: 0
}

// NewCarrying is New for a system that takes turns with others in a Schedule: it
// also keeps the maps between the levels of the stores and the modes, which costs as
// much as N further inputs and outputs.
func NewCarrying(r Realisation) (*System, error) {
	n := r.Balance.N
	var all Carry
	for i := range n {
		flow, level := make([]float64, n), make([]float64, n)
		flow[i], level[i] = r.Balance.C[i], 1
		for j := range n {
			if r.Mass != nil {
				flow[j] = r.Mass[j*n+i]
			}
		}
		all.In, all.Out = append(all.In, flow), append(all.Out, level)
	}
	return NewCarryingOver(r, all)
}

// NewCarryingOver is NewCarrying for a system that hands over other quantities than
// the levels of its stores.
func NewCarryingOver(r Realisation, over Carry) (*System, error) {
	n, inputs, outputs := len(over.In), len(r.B), len(r.Output)
	if len(over.Out) != n || over.Onto != nil && len(over.Onto) != n || over.Ref != nil && len(over.Ref) != n {
		panic("laplace: a carry has not the same quantities throughout")
	}
	x := Realisation{Balance: r.Balance, K: r.K, Mass: r.Mass, D: grown(r.D, n, n), Rate: grown(r.Rate, n, n)}
	x.B = append(append(x.B, r.B...), over.In...)
	x.Output = append(append(x.Output, r.Output...), over.Out...)
	s, err := New(x)
	if err != nil {
		return nil, err
	}
	m := *s.modal
	s.carry = &carrier{in: m.in[inputs:], out: m.out[outputs:], onto: over.Onto, ref: over.Ref}
	m.in, m.out = m.in[:inputs:inputs], m.out[:outputs:outputs]
	s.modal, s.b, s.c, s.d = &m, s.b[:inputs:inputs], s.c[:outputs:outputs], s.d[:outputs:outputs]
	for k := range s.d {
		s.d[k] = s.d[k][:inputs:inputs]
	}
	if s.rate != nil {
		s.rate = s.rate[:outputs:outputs]
		for k := range s.rate {
			s.rate[k] = s.rate[k][:inputs:inputs]
		}
	}
	return s, nil
}

// grown returns m with rows and columns of 0 added; nil stays nil.
func grown(m [][]float64, rows, cols int) [][]float64 {
	if len(m) == 0 {
		return nil
	}
	var g [][]float64
	for _, row := range m {
		g = append(g, append(append([]float64(nil), row...), make([]float64, cols)...))
	}
	for range rows {
		g = append(g, make([]float64, len(m[0])+cols))
	}
	return g
}

// held returns what is carried over of the state z.
func (s *System) held(z *vector) []float64 {
	x := s.carry.seen(z)
	for i, v := range s.carry.ref {
		x[i] += v
	}
	return x
}

// carried counts the quantities that go over a switch, or the stores.
func (s *System) carried() int {
	if s.carry != nil {
		return len(s.carry.out)
	}
	return s.plant.n
}

// seen is held less what is there in a state of 0.
func (c *carrier) seen(z *vector) []float64 {
	x := make([]float64, len(c.out))
	for i := range x {
		x[i] = c.out[i].sees(z)
	}
	return x
}

// entered returns by how much x differs once it has entered the system, but for Ref;
// nil where it does not.
func (c *carrier) entered(x []float64) []float64 {
	if c.onto == nil {
		return nil
	}
	d := make([]float64, len(x))
	for i, row := range c.onto {
		d[i] = -x[i]
		for j, v := range row {
			d[i] += v * x[j]
		}
	}
	return d
}

// ofDifferences returns the system for the difference of two of its responses.
func (s *System) ofDifferences() *System {
	if s.carry.ref == nil {
		return s
	}
	return &System{plant: s.plant, b: s.b, c: s.c, d: s.d, rate: s.rate, rounded: s.rounded, modal: s.modal, poles: s.poles, seats: s.seats,
		carry: &carrier{in: s.carry.in, out: s.carry.out, onto: s.carry.onto}}
}

// sees returns the output that o makes of the state z.
func (o *vector) sees(z *vector) float64 {
	var y float64
	for k, v := range o.real {
		y += v * z.real[k]
	}
	for k, v := range o.pair {
		y += real(v)*real(z.pair[k]) - imag(v)*imag(z.pair[k])
	}
	for k, v := range o.block {
		y += v * z.block[k]
	}
	return y
}

// hold returns the state that x, carried over, makes.
func (s *System) hold(x []float64) vector {
	z := s.modal.vector()
	for i, v := range x {
		if v != 0 {
			z.add(v, &s.carry.in[i])
		}
	}
	return z
}
