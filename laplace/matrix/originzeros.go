package matrix

import "math"

// withoutOrigin takes count poles at exactly 0 out of x' = A x, capacities 1: with A v
// = 0 the states less their share of v, x[i] − v[i]/v[p]·x[p], follow a matrix of one
// row less. Defective zeros at 0 would otherwise be scattered over ε^(1/m) and take
// the accuracy of the others with them. It returns nil where no v is found.
func (s *system) withoutOrigin(count int) *system {
	for ; count > 0; count-- {
		v := s.nullVector()
		if v == nil {
			return nil
		}
		p := 0
		for i := range v {
			if math.Abs(v[i].hi) > math.Abs(v[p].hi) {
				p = i
			}
		}
		s = s.without(p, v)
	}
	return s
}

// without leaves out state p.
func (s *system) without(p int, v []dd) *system {
	n := s.n - 1
	r := &system{n: n, c: make([]float64, n), g: make([]float64, n*n), low: make([]float64, n*n),
		diag: make([]dd, n), noise: make([]float64, n*n), scale: make([]int, n)}
	at := func(i int) int { // the old place
		if i >= p {
			return i + 1
		}
		return i
	}
	for i := range n {
		r.c[i], r.scale[i] = 1, s.scale[at(i)]
		share := v[at(i)].div(v[p])
		for j := range n {
			a, size := s.element(at(i), at(j)), s.uncertain(at(i), at(j))
			if !share.zero() {
				b := s.element(p, at(j))
				a = a.sub(share.mul(b))
				size += math.Abs(share.hi) * (s.uncertain(p, at(j)) + 2*math.Abs(b.hi))
			}
			a = a.orZero(size)
			r.noise[i*n+j] = size
			if i == j {
				r.diag[i] = a
			} else {
				r.g[i*n+j], r.low[i*n+j] = a.hi, a.lo
			}
		}
	}
	return r
}

// nullVector returns v with A v = 0, nil where A is regular to doubled precision.
//
// Method: elimination with complete pivoting; the state left at the end is 1.
func (s *system) nullVector() []dd {
	n := s.n
	a, col := make([]dd, n*n), make([]int, n)
	for i := range n {
		col[i] = i
		for j := range n {
			a[i*n+j] = s.element(i, j)
		}
	}
	first, rank := 0.0, 0
	for ; rank < n; rank++ {
		p, q := rank, rank
		for i := rank; i < n; i++ {
			for j := rank; j < n; j++ {
				if math.Abs(a[i*n+j].hi) > math.Abs(a[p*n+q].hi) {
					p, q = i, j
				}
			}
		}
		size := math.Abs(a[p*n+q].hi)
		if first = max(first, size); size <= restTolerance*first {
			break
		}
		for k := range n {
			a[rank*n+k], a[p*n+k] = a[p*n+k], a[rank*n+k]
		}
		for k := range n {
			a[k*n+rank], a[k*n+q] = a[k*n+q], a[k*n+rank]
		}
		col[rank], col[q] = col[q], col[rank]
		for i := rank + 1; i < n; i++ {
			if f := a[i*n+rank].div(a[rank*n+rank]); !f.zero() {
				for k := rank; k < n; k++ {
					a[i*n+k] = a[i*n+k].sub(f.mul(a[rank*n+k]))
				}
			}
		}
	}
	if rank == n {
		return nil
	}
	v := make([]dd, n)
	v[col[rank]] = toDD(1)
	for i := rank - 1; i >= 0; i-- {
		var sum dd
		for k := i + 1; k < n; k++ {
			if x := v[col[k]]; !x.zero() {
				sum = sum.add(a[i*n+k].mul(x))
			}
		}
		v[col[i]] = sum.neg().div(a[i*n+i])
	}
	return cleaned(v)
}

// orZero is a, and exactly 0 where a is rounding of doubled precision of what it was
// made from, of the given size.
func (a dd) orZero(size float64) dd {
	if math.Abs(a.hi) <= restTolerance*size {
		return dd{}
	}
	return a
}

// cleaned makes entries that are rounding of doubled precision exactly 0: they would
// tie states together that have nothing to do with each other.
func cleaned(v []dd) []dd {
	large := 0.0
	for _, x := range v {
		large = max(large, math.Abs(x.hi))
	}
	for i := range v {
		v[i] = v[i].orZero(large)
	}
	return v
}
