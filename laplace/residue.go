package laplace

import (
	"math"
	"math/cmplx"
)

// residue returns the coefficients of 1/(s−p)^(k+1), k < mult, of pole i.
func (s *System) residue(i, mult int) []complex128 {
	r := make([]complex128, mult)
	b, c := &s.modal.in[0], &s.modal.out[0]
	p := s.poles[i].P
	done := make(map[int]bool)
	for _, at := range s.seats[i] {
		switch at.kind {
		case realSeat:
			r[0] += complex(b.real[at.index]*c.real[at.index], 0)
		case pairSeat:
			w := b.pair[at.index] * c.pair[at.index] / 2
			if imag(p) < 0 {
				w = cmplx.Conj(w)
			} else if imag(p) == 0 { // the pair was gathered into one real pole
				w = complex(real(w), 0)
			}
			r[0] += w
		case blockSeat:
			if !done[at.index] {
				done[at.index] = true
				s.blockResidue(i, at.index, r)
			}
		}
	}
	return r
}

// blockResidue adds what a block contributes to the coefficients of pole i. Where
// all of the block is that pole, T − p is nilpotent and c(T−p)^k b are the
// coefficients; otherwise they are means over a circle around the pole, which the
// trapezoidal rule gives to the last digit.
func (s *System) blockResidue(i, index int, r []complex128) {
	q := &s.modal.block[index]
	p := s.poles[i].P
	b, c := s.modal.in[0].block[q.first:q.first+q.n], s.modal.out[0].block[q.first:q.first+q.n]
	gap, size := s.isolation(i, index)
	if math.IsInf(gap, 1) && imag(p) == 0 {
		x := append([]float64(nil), b...)
		for k := range r {
			r[k] += complex(dot(c, x), 0)
			x = q.shifted(real(p), x)
		}
		return
	}
	if math.IsInf(gap, 1) {
		gap = size
	}
	const points = 64 // (1/2)^64: below rounding
	for k := range points {
		sin, cos := math.Sincos(2 * math.Pi * (float64(k) + 0.5) / points)
		delta := complex(gap/2*cos, gap/2*sin)
		x := make([]complex128, q.n)
		for j, v := range b {
			x[j] = complex(v, 0)
		}
		q.resolveNear(p, delta, x)
		var h complex128
		for j, v := range c {
			h += complex(v, 0) * x[j]
		}
		for j := range r {
			h *= delta
			r[j] += h / points
		}
	}
	if imag(p) == 0 {
		for k := range r {
			r[k] = complex(real(r[k]), 0)
		}
	}
}

// isolation returns the distance from pole i to the next pole of the block, +Inf
// where there is none, and the size of the block.
func (s *System) isolation(i, index int) (gap, size float64) {
	gap = math.Inf(1)
	for j, seats := range s.seats {
		for _, at := range seats {
			if j != i && at.kind == blockSeat && at.index == index {
				gap = min(gap, cmplx.Abs(s.poles[j].P-s.poles[i].P))
			}
		}
	}
	for _, v := range s.modal.block[index].t {
		size = max(size, math.Abs(v))
	}
	return gap, size
}

// shifted returns (T − p)x.
func (q *block) shifted(p float64, x []float64) []float64 {
	y := make([]float64, q.n)
	for i := range y {
		for j, v := range x {
			t := q.t[i*q.n+j]
			if i == j {
				t -= p
			}
			y[i] += t * v
		}
	}
	return y
}
