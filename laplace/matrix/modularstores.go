package matrix

// residues returns M⁻¹ G of the stores modulo the prime, N×N row-major: without
// error, the doubles taken as the rationals they are.
func (s *Stores) residues() []residue {
	n := s.N
	a := make([]residue, n*n)
	for i := range n {
		for j := range n {
			a[i*n+j] = modFloat(s.coupling(i, j))
			if i != j && s.F[i*n+j] != 0 {
				a[i*n+j] = modAdd(a[i*n+j], modFloat(s.F[i*n+j]))
			}
		}
		out := modFloat(s.Leak[i])
		for j := range n {
			if j != i && s.F[i*n+j] != 0 {
				out = modAdd(out, modFloat(s.F[i*n+j]))
			}
		}
		a[i*n+i] = modSub(a[i*n+i], out)
	}
	s.modSolve(n, a)
	return a
}

// modSolve replaces the n columns of a by M⁻¹ a.
func (s *Stores) modSolve(cols int, a []residue) {
	tied := make([]bool, s.N)
	for _, group := range s.tied() {
		for _, i := range group {
			tied[i] = true
		}
		s.modGroup(group, cols, a)
	}
	for i := range s.N {
		if tied[i] {
			continue
		}
		inv := modInv(modFloat(s.capacity(i)))
		for j := range cols {
			if v := &a[i*cols+j]; *v != 0 {
				*v = modMul(*v, inv)
			}
		}
	}
}

// modGroup solves one group by elimination. A pivot that is 0 modulo the prime and
// not in truth has a chance below 1e-15.
func (s *Stores) modGroup(group []int, cols int, a []residue) {
	m := len(group)
	w := make([]residue, m*m)
	for p, i := range group {
		for q, j := range group {
			w[p*m+q] = modFloat(s.Mass[i*s.N+j])
		}
	}
	for k := range m {
		inv := modInv(w[k*m+k])
		for p := range m {
			if p == k || w[p*m+k] == 0 {
				continue
			}
			f := modMul(w[p*m+k], inv)
			for q := range m {
				w[p*m+q] = modSub(w[p*m+q], modMul(f, w[k*m+q]))
			}
			for j := range cols {
				x, y := &a[group[p]*cols+j], a[group[k]*cols+j]
				*x = modSub(*x, modMul(f, y))
			}
		}
	}
	for p, i := range group {
		inv := modInv(w[p*m+p])
		for j := range cols {
			a[i*cols+j] = modMul(a[i*cols+j], inv)
		}
	}
}

// modularRates is rates modulo the prime.
func (s *system) modularRates(f []float64) []residue {
	x := make([]residue, s.n)
	if s.stores != nil {
		for i, v := range f {
			x[i] = modFloat(v)
		}
		s.stores.modSolve(1, x)
		return x
	}
	for i, v := range f {
		if v != 0 {
			x[i] = modMul(modFloat(v), modInv(modFloat(s.c[i])))
		}
	}
	return x
}

// modularPart picks the given states out of the whole matrix, made once.
func (s *system) modularPart(states []int) []residue {
	if s.residues == nil {
		s.residues = s.stores.residues()
	}
	var a []residue
	for _, i := range states {
		for _, j := range states {
			a = append(a, s.residues[i*s.n+j])
		}
	}
	return a
}
