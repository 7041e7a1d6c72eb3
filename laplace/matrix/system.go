package matrix

import "math"

// system is c[i] x[i]' = Σ_{j≠i} g[i,j] x[j] + diag[i] x[i] + f[i]: what Balance
// and a plain matrix have in common. The diagonal is held in doubled precision,
// so that a sum over many exchanges is not rounded.
type system struct {
	n     int
	c     []float64 // positive
	g     []float64 // n×n row-major, diagonal ignored
	low   []float64 // added to g where that was computed in doubled precision; nil otherwise
	diag  []dd
	noise []float64 // n×n, size of the numbers each entry of g and diag was made from; nil: that of the entries
	leak  []float64 // of a Balance; nil for a plain matrix
	scale []int     // x[i]·2^scale[i] are comparable states

	rootsOnly  bool         // no response is asked for, so that close poles may stay apart
	stores     *Stores      // what it was made from, where that has couplings of its own
	massGroups []*massGroup // the groups tied by a mass matrix
	residues   []residue    // of modularPart
}

func (b *Balance) system() *system {
	s := &system{n: b.N, c: b.C, g: b.F, leak: b.Leak, diag: make([]dd, b.N), scale: make([]int, b.N)}
	for i := range s.diag {
		sum := toDD(b.Leak[i])
		for j := 0; j < b.N; j++ {
			if j != i {
				sum = sum.addFloat(b.F[i*b.N+j])
			}
		}
		s.diag[i] = sum.neg()
		s.scale[i] = halfExponent(b.C[i])
	}
	return s
}

// halfExponent returns k with 2^k nearest to √c.
func halfExponent(c float64) int {
	return int(math.Round(math.Log2(c) / 2))
}

// plain is x' = a x, a n×n row-major, as a system.
func plain(n int, a []float64) (*system, error) {
	if n < 0 || n*n != len(a) {
		return nil, ErrShape
	}
	if !allFinite(a) {
		return nil, ErrValue
	}
	s := &system{n: n, c: make([]float64, n), g: a, diag: make([]dd, n), scale: make([]int, n)}
	for i := range s.c {
		s.c[i] = 1
		s.diag[i] = toDD(a[i*n+i])
	}
	return s, nil
}

// entry is g[i,j] off the diagonal.
func (s *system) entry(i, j int) dd {
	v := toDD(s.g[i*s.n+j])
	if s.low != nil {
		v.lo = s.low[i*s.n+j]
	}
	return v
}

// element is entry i, j of g with the diagonal.
func (s *system) element(i, j int) dd {
	if i == j {
		return s.diag[i]
	}
	return s.entry(i, j)
}

// feels is the exact pattern of g.
func (s *system) feels(i, j int) bool { return s.g[i*s.n+j] != 0 }

// quotient returns a/c in doubled precision.
func quotient(a dd, c float64) dd {
	if c == 1 {
		return a
	}
	return a.div(dd{hi: c})
}

// rate is the pole of state i alone.
func (s *system) rate(i int) float64 { return quotient(s.diag[i], s.c[i]).float() }

// scaledMatrix is the matrix A of m states in scaled form: hi + lo holds
// A[i,j]·2^(scale[i]−scale[j]+time), where z = 2^scale·x are comparable states and
// 2^time brings the largest entry near 1. Powers of two lose nothing.
type scaledMatrix struct {
	m      int
	hi, lo []float64
	noise  []float64 // ε·noise bounds what rounding of the given numbers makes uncertain
	scale  []int
	time   int
}

// matrix fills a with the given states.
func (s *system) matrix(states []int, a *scaledMatrix) {
	m := len(states)
	a.m, a.time, a.scale = m, 0, resized(a.scale, m)
	a.hi, a.lo, a.noise = resized(a.hi, m*m), resized(a.lo, m*m), resized(a.noise, m*m)
	clear(a.hi)
	clear(a.lo)
	clear(a.noise)
	for p, i := range states {
		a.scale[p] = s.scale[i]
		for q, j := range states {
			v := s.element(i, j)
			if v.zero() && s.noise == nil {
				continue
			}
			v = quotient(v, s.c[i])
			k := 1.0
			if d := s.scale[i] - s.scale[j]; d != 0 {
				k = math.Ldexp(1, d)
			}
			a.hi[p*m+q], a.lo[p*m+q] = v.hi*k, v.lo*k
			a.noise[p*m+q] = s.uncertain(i, j) / s.c[i] * k
		}
	}
	a.balance()
	a.normalise()
}

// uncertain is the size of the numbers that entry i, j was made from.
func (s *system) uncertain(i, j int) float64 {
	switch {
	case s.noise != nil:
		return s.noise[i*s.n+j]
	case i != j:
		return math.Abs(s.g[i*s.n+j])
	case s.leak == nil:
		return math.Abs(s.diag[i].hi)
	}
	sum := math.Abs(s.leak[i])
	for k := 0; k < s.n; k++ {
		if k != i {
			sum += math.Abs(s.g[i*s.n+k])
		}
	}
	return sum
}

// normalise brings the largest entry near 1.
func (a *scaledMatrix) normalise() {
	var large float64
	for _, v := range a.hi {
		large = max(large, math.Abs(v))
	}
	if large == 0 {
		return
	}
	_, e := math.Frexp(large)
	a.time = -e
	f, g := math.Ldexp(1, -e/2), math.Ldexp(1, -e+e/2) // each within range where 2^−e may not be
	for _, x := range [3][]float64{a.hi, a.lo, a.noise} {
		for k, v := range x {
			x[k] = v * f * g
		}
	}
}

// balance scales rows and columns by powers of two until their norms agree, and
// adds the exponents to scale.
//
// Method: B. N. Parlett, C. Reinsch, Numer. Math. 13 (1969) 293.
func (a *scaledMatrix) balance() {
	m := a.m
	for sweep := 0; sweep < 16; sweep++ {
		done := true
		for i := 0; i < m; i++ {
			r, c := a.offDiagonal(i)
			if r == 0 || c == 0 || r < 2*c && c < 2*r {
				continue // k would be 0
			}
			k := int(math.Round(math.Log2(r/c) / 2))
			f := math.Ldexp(1, k)
			if k == 0 || c*f+r/f >= 0.95*(c+r) {
				continue
			}
			done = false
			a.scale[i] -= k // z = 2^scale x: the column grows by 2^k, the row shrinks
			for j := 0; j < m; j++ {
				if j != i {
					for _, x := range [3][]float64{a.hi, a.lo, a.noise} {
						x[j*m+i] *= f
						x[i*m+j] /= f
					}
				}
			}
		}
		if done {
			return
		}
	}
}

// offDiagonal returns the sums of moduli of row and column i.
func (a *scaledMatrix) offDiagonal(i int) (r, c float64) {
	for j := 0; j < a.m; j++ {
		if j != i {
			r += math.Abs(a.hi[i*a.m+j])
			c += math.Abs(a.hi[j*a.m+i])
		}
	}
	return r, c
}
