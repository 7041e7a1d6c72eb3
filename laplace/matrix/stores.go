package matrix

import "math"

// Stores are stores of every kind, levels with their capacities and flows with
// their inertances: a Balance with plain couplings K and, where inertances move
// together, a mass matrix in the place of C,
//
//	Σ_j Mass[i,j] x[j]' = Σ_j F[i,j] (x[j] − x[i]) − Leak[i] x[i] + Σ_j K[i,j] x[j] + f[i].
//
// Of a flow, C is the inertance and Leak the resistance in series; K holds +1 and −1
// where the flow enters and leaves a store and, in the row of the flow, their
// opposites.
type Stores struct {
	Balance
	K    []float64 // N×N row-major, its diagonal included; nil: none
	Mass []float64 // N×N row-major, symmetric and positive definite; nil: diag(C). Its diagonal counts, not C
}

// check reports what Balance.check does, of K and Mass too.
func (s *Stores) check() error {
	if err := s.Balance.check(); err != nil {
		return err
	}
	for _, m := range [][]float64{s.K, s.Mass} {
		if m != nil && len(m) != s.N*s.N {
			return ErrShape
		}
		if !allFinite(m) {
			return ErrValue
		}
	}
	for i := range s.N {
		if s.Mass != nil && !(s.Mass[i*s.N+i] > 0) {
			return ErrValue
		}
	}
	return nil
}

// coupling is K[i,j].
func (s *Stores) coupling(i, j int) float64 {
	if s.K == nil {
		return 0
	}
	return s.K[i*s.N+j]
}

// capacity is C[i], or the diagonal of Mass.
func (s *Stores) capacity(i int) float64 {
	if s.Mass == nil {
		return s.C[i]
	}
	return s.Mass[i*s.N+i]
}

// uncoupled reports stores that are a Balance and nothing more.
func (s *Stores) uncoupled() bool { return s.K == nil && s.Mass == nil }

// system assembles the stores; those that a mass matrix ties to others are solved
// for x' in doubled precision.
func (s *Stores) system() (*system, error) {
	n := s.N
	if err := s.check(); err != nil {
		return nil, err
	}
	if s.uncoupled() {
		return s.Balance.system(), nil
	}
	y := &system{n: n, c: make([]float64, n), g: make([]float64, n*n), low: make([]float64, n*n),
		diag: make([]dd, n), noise: make([]float64, n*n), scale: make([]int, n), stores: s}
	for i := range n {
		y.c[i] = s.capacity(i)
		y.scale[i] = halfExponent(y.c[i])
		for j := range n {
			v, size := s.entry(i, j)
			y.noise[i*n+j] = size
			if i == j {
				y.diag[i] = v
			} else {
				y.g[i*n+j], y.low[i*n+j] = v.hi, v.lo
			}
		}
	}
	for _, states := range s.tied() {
		h, err := newMassGroup(s, states)
		if err != nil {
			return nil, err
		}
		h.solve(y)
		y.massGroups = append(y.massGroups, h)
	}
	return y, nil
}

// entry is what x[j] brings into the balance of i, and the sum of the sizes it is
// made of.
func (s *Stores) entry(i, j int) (v dd, size float64) {
	v = toDD(s.coupling(i, j))
	size = math.Abs(v.hi)
	add := func(x float64) {
		if x != 0 {
			v, size = v.addFloat(x), size+math.Abs(x)
		}
	}
	if i != j {
		add(s.F[i*s.N+j])
		return v, size
	}
	add(-s.Leak[i])
	for k := range s.N {
		if k != i {
			add(-s.F[i*s.N+k])
		}
	}
	return v, size
}

// tied lists the groups of two and more stores that Mass ties together, each
// ascending.
func (s *Stores) tied() (groups [][]int) {
	if s.Mass == nil {
		return nil
	}
	seen := make([]bool, s.N)
	for i := range s.N {
		if seen[i] {
			continue
		}
		group := []int{i}
		seen[i] = true
		for k := 0; k < len(group); k++ {
			for j := range s.N {
				if !seen[j] && (s.Mass[group[k]*s.N+j] != 0 || s.Mass[j*s.N+group[k]] != 0) {
					seen[j] = true
					group = append(group, j)
				}
			}
		}
		if len(group) > 1 {
			groups = append(groups, ascending(group))
		}
	}
	return groups
}

// BlockForm uncouples the stores, see Balance.BlockForm. In takes flows f.
func (s *Stores) BlockForm() (*BlockForm, error) {
	return new(BlockWork).Stores(s)
}

// Dense returns x' = a x + rates for the flows f into the stores, a in 1/s, N×N
// row-major, every number formed in doubled precision and rounded once. As with
// Balance.Dense a slow pole of a stiff network is lost in it. It returns ErrShape or
// ErrValue.
func (s *Stores) Dense(f []float64) (a, rates []float64, err error) {
	if len(f) != s.N {
		return nil, nil, ErrShape
	}
	y, err := s.system()
	if err != nil {
		return nil, nil, err
	}
	a, rates = make([]float64, s.N*s.N), make([]float64, s.N)
	for i, r := range y.rates(f) {
		rates[i] = r.float()
		for j := range s.N {
			a[i*s.N+j] = quotient(y.element(i, j), y.c[i]).float()
		}
	}
	return a, rates, nil
}

// Pattern returns a balance that has an exchange wherever one store acts on another,
// for questions of structure. Stores tied by Mass act on each other.
func (s *Stores) Pattern() *Balance {
	n := s.N
	p := &Balance{N: n, C: s.C, F: make([]float64, n*n), Leak: make([]float64, n)}
	for i := range n {
		for j := range n {
			if s.F[i*n+j] != 0 || s.coupling(i, j) != 0 {
				p.F[i*n+j] = 1
			}
		}
	}
	for _, group := range s.tied() {
		for _, i := range group {
			for _, j := range group {
				p.F[i*n+j] = 1
			}
		}
	}
	return p
}

// Path returns the stores that matter to the transfer from in to out, see
// Balance.Path. Stores tied by Mass are kept together.
func (s *Stores) Path(in, out []float64) []int { return s.Pattern().Path(in, out) }

// Restrict returns the stores in keep alone with every other held at 0, see
// Balance.Restrict. keep must hold all of a group tied by Mass or none.
func (s *Stores) Restrict(keep []int) Stores {
	r := Stores{Balance: s.Balance.Restrict(keep)}
	part := func(a []float64) (b []float64) {
		if a == nil {
			return nil
		}
		for _, i := range keep {
			for _, j := range keep {
				b = append(b, a[i*s.N+j])
			}
		}
		return b
	}
	r.K, r.Mass = part(s.K), part(s.Mass)
	if len(keep) == 0 {
		r.K, r.Mass = nil, nil
	}
	return r
}

// rcWithin returns a strongly connected part as a Balance of its own if it is one
// of resistances and capacitances without couplings.
func (s *Stores) rcWithin(states []int) (*Balance, bool) {
	for _, i := range states {
		for _, j := range states {
			if s.coupling(i, j) != 0 {
				return nil, false
			}
		}
		for j := range s.N {
			if j != i && s.Mass != nil && (s.Mass[i*s.N+j] != 0 || s.Mass[j*s.N+i] != 0) {
				return nil, false
			}
		}
	}
	b := s.Balance.Restrict(states)
	for k, i := range states {
		b.C[k] = s.capacity(i)
	}
	return &b, b.IsRC()
}
