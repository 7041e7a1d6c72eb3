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
		end := r.until
		if k+1 < len(p.at) {
			end = min(end, p.at[k+1])
		}
		sum += rate[p.kind[k]] * max(end-at, 0)
	}
	return sum
}

// cross takes the state z of the system in force at t into the coordinates of the
// one in force at next: what the stores hold stays.
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

// A carrier holds the maps between the stores and the modes of a system.
type carrier struct {
	in, out []vector // of each store: the modes of a unit there, and what it sees of them
}

// NewCarrying is New for a system that takes turns with others in a Schedule: it
// also keeps the maps between the levels of the stores and the modes, which costs as
// much as N further inputs and outputs.
func NewCarrying(r Realisation) (*System, error) {
	n, inputs, outputs := r.Balance.N, len(r.B), len(r.Output)
	x := Realisation{Balance: r.Balance, K: r.K, Mass: r.Mass, D: grown(r.D, n, n), Rate: grown(r.Rate, n, n)}
	x.B = append(x.B, r.B...)
	x.Output = append(x.Output, r.Output...)
	for i := range n {
		flow, level := make([]float64, n), make([]float64, n)
		flow[i], level[i] = r.Balance.C[i], 1
		for j := range n {
			if r.Mass != nil {
				flow[j] = r.Mass[j*n+i]
			}
		}
		x.B, x.Output = append(x.B, flow), append(x.Output, level)
	}
	s, err := New(x)
	if err != nil {
		return nil, err
	}
	m := *s.modal
	s.carry = &carrier{in: m.in[inputs:], out: m.out[outputs:]}
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

// held returns the levels of the stores in the state z.
func (s *System) held(z *vector) []float64 {
	x := make([]float64, len(s.carry.out))
	for i := range x {
		x[i] = s.carry.out[i].sees(z)
	}
	return x
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

// hold returns the state in which the stores have the levels x.
func (s *System) hold(x []float64) vector {
	z := s.modal.vector()
	for i, v := range x {
		if v != 0 {
			z.add(v, &s.carry.in[i])
		}
	}
	return z
}
