package matrix

import "math"

// hessenberg reduces h (n rows of stride ld, zeros beyond column n) to upper
// Hessenberg form and writes the transposed orthogonal factor to qt: with
// Q = qtᵀ the given matrix is Q H Qᵀ.
//
// Method: one Householder reflector for each column, both sides in one update
// of rank two (G. H. Golub, C. F. Van Loan, Matrix Computations, 4th ed., 7.4.3).
func (s *schurWork) hessenberg() {
	n, ld, h := s.n, s.ld, s.h
	for k := 0; k+2 < n; k++ {
		v := s.vectors[k*ld : k*ld+ld] // of reflector k, from entry k+1 on
		clear(v)
		at := k + 1
		m := n - at
		for i := 0; i < m; i++ {
			v[i] = h[(at+i)*ld+k]
		}
		tau, beta := reflector(v[:m])
		s.tau[k] = tau
		h[at*ld+k] = beta
		for i := 1; i < m; i++ {
			h[(at+i)*ld+k] = 0
		}
		if tau != 0 {
			s.reflectBoth(k, v, tau)
		}
	}
	s.orthogonal()
}

// reflectBoth applies I − τ v vᵀ to the rows and columns from k+1 on: with
// x = A v, y = Aᵀ v it is A − v (τ y − τ² (vᵀx) v)ᵀ − (τ x) vᵀ.
func (s *schurWork) reflectBoth(k int, v []float64, tau float64) {
	n, ld, h := s.n, s.ld, s.h
	at := k + 1
	m, w := n-at, (n-at+3)&^3
	x, y := s.x, s.y
	dotRows(h[at:], ld, n, w, v, x)
	clear(y[:w])
	sumRows(h[at*ld+at:], ld, m, w, v, y)
	var vx float64
	for i, f := range v[:m] {
		vx += f * x[at+i]
	}
	vx *= tau
	for i := 0; i < m; i++ {
		y[i] = tau * (y[i] - vx*v[i])
	}
	for i := 0; i < n; i++ {
		x[i] *= tau
	}
	for i := 0; i < at; i++ { // the rows above change by (τ x) vᵀ alone
		addRow(-x[i], v[:w], h[i*ld+at:i*ld+at+w])
	}
	updateRows(h[at*ld+at:], ld, m, w, v, y, x[at:], v, s.zero, s.sum)
}

// orthogonal forms qt from the reflectors, two at a time, last first: each
// pair multiplies it from the right.
func (s *schurWork) orthogonal() {
	n, ld, q := s.n, s.ld, s.qt
	clear(q)
	for i := 0; i < n; i++ {
		q[i*ld+i] = 1
	}
	for k := n - 3; k >= 0; k -= 2 {
		first := max(k-1, 0)
		at := first + 1
		m, w := n-at, (n-at+3)&^3
		block := q[at*ld+at:]
		v, u := s.vectors[first*ld:first*ld+w], s.sum[:w]
		dotRows(block, ld, m, w, v, s.y)
		clear(s.x[:m])
		clear(u)
		if k > first { // the later of the two acts first
			copy(u[1:], s.vectors[k*ld:k*ld+w-1])
			dotRows(block, ld, m, w, u, s.x)
			var vu float64
			for i := range u {
				vu += v[i] * u[i]
			}
			vu *= s.tau[k]
			for i := 0; i < m; i++ {
				s.y[i] -= vu * s.x[i]
				s.x[i] *= s.tau[k]
			}
		}
		for i := 0; i < m; i++ {
			s.y[i] *= s.tau[first]
		}
		updateRows(block, ld, m, w, s.x, u, s.y, v, s.zero, s.scratch)
	}
}

// reflector overwrites v by the Householder vector, its first entry 1, that
// turns v into (beta, 0, …, 0); tau is 0 where v is that already.
func reflector(v []float64) (tau, beta float64) {
	var tail float64
	for _, f := range v[1:] {
		tail += f * f
	}
	alpha := v[0]
	if !(tail > smallSquare) || !(tail < 1/smallSquare) {
		if norm := norm2(v[1:]); norm != 0 {
			return reflectorScaled(v, math.Max(norm, math.Abs(alpha)))
		}
		return 0, alpha
	}
	beta = -math.Copysign(math.Sqrt(alpha*alpha+tail), alpha)
	f := 1 / (alpha - beta)
	v[0] = 1
	for i := 1; i < len(v); i++ {
		v[i] *= f
	}
	return (beta - alpha) / beta, beta
}

// smallSquare is a sum of squares below which digits may be lost to underflow.
const smallSquare = 0x1p-900

// reflectorScaled is reflector for a vector too small or too large to be squared.
func reflectorScaled(v []float64, size float64) (tau, beta float64) {
	_, e := math.Frexp(size)
	for i := range v {
		v[i] = math.Ldexp(v[i], -e)
	}
	var tail float64
	for _, f := range v[1:] {
		tail += f * f
	}
	alpha := v[0]
	if tail == 0 { // nothing beside alpha, within its rounding
		return 0, math.Ldexp(alpha, e)
	}
	beta = -math.Copysign(math.Sqrt(alpha*alpha+tail), alpha)
	for i := 1; i < len(v); i++ {
		v[i] /= alpha - beta
	}
	v[0] = 1
	return (beta - alpha) / beta, math.Ldexp(beta, e)
}
