package matrix

import (
	"math"

	lapackgonum "gonum.org/v1/gonum/lapack/gonum"
)

const (
	chaseLength  = 8  // reflectors gathered before they reach the rest of the matrix
	chaseWhole   = 16 // an active block up to this size is one window
	sweepsPerOne = 30 // allowed on average for each eigenvalue
	tiny         = 0x1p-1022 / eps
)

// francis brings the Hessenberg matrix h to quasi triangular form, qt following.
//
// Method: double-shift steps of J. G. F. Francis, Comput. J. 4 (1961) 265 and
// (1962) 332, with the deflation of M. Ahues, F. Tisseur (LAPACK Working Note 122,
// 1997) and exceptional shifts as in EISPACK hqr. The bulge is chased through a
// window of a few columns at a time; what the window does to the rest of the rows and
// columns follows in one pass each, while they are in registers (the idea of
// K. Braman, R. Byers, R. Mathias, SIAM J. Matrix Anal. Appl. 23 (2002) 929).
func (s *schurWork) francis() error {
	left := sweepsPerOne * max(10, s.n)
	for hi := s.n - 1; hi >= 0; {
		its := 0
		for {
			lo := s.deflate(hi)
			if lo >= hi-1 {
				if lo == hi-1 {
					s.standardise(lo)
				}
				hi = lo - 1
				break
			}
			if left--; left < 0 {
				return ErrNoConvergence
			}
			s.sweep(lo, hi, s.shifts(lo, hi, its))
			its++
		}
	}
	return nil
}

// deflate clears the lowest negligible subdiagonal entry above row hi and returns
// where the active block begins.
func (s *schurWork) deflate(hi int) int {
	h, ld := s.h, s.ld
	for k := hi; k > 0; k-- {
		at := k*ld + k
		sub := math.Abs(h[at-1])
		if sub <= tiny {
			h[at-1] = 0
			return k
		}
		up, here := h[at-ld-1], h[at]
		size := math.Abs(up) + math.Abs(here)
		if size == 0 {
			if k >= 2 {
				size += math.Abs(h[at-ld-2])
			}
			if k < hi {
				size += math.Abs(h[at+ld])
			}
		}
		if sub > eps/2*size {
			continue
		}
		sup := math.Abs(h[at-ld])
		ab, ba := math.Max(sub, sup), math.Min(sub, sup)
		aa, bb := math.Max(math.Abs(here), math.Abs(up-here)), math.Min(math.Abs(here), math.Abs(up-here))
		sum := aa + ab
		if ba*(ab/sum) <= math.Max(tiny+0x1p-300*sum, eps/2*(bb*(aa/sum))) { // bb may be 0 exactly: no spread of poles reaches 2^300
			h[at-1] = 0
			return k
		}
	}
	return 0
}

// shiftPair is a pair of shifts by sum and product, both real or conjugate.
type shiftPair struct{ re1, re2, im float64 }

func (s *schurWork) shifts(lo, hi, its int) shiftPair {
	h, ld := s.h, s.ld
	at := hi*ld + hi
	a, b, c, d := h[at-ld-1], h[at-ld], h[at-1], h[at]
	switch its % 20 { // a step that does not settle is thrown off its course
	case 10:
		f := math.Abs(h[(lo+1)*ld+lo]) + math.Abs(h[(lo+2)*ld+lo+1])
		a = 0.75*f + h[lo*ld+lo]
		b, c, d = -0.4375*f, f, a
	case 19:
		f := math.Abs(c) + math.Abs(h[at-ld-2])
		a = 0.75*f + d
		b, c, d = -0.4375*f, f, a
	}
	half, mean := (a-d)/2, (a+d)/2
	disc := half*half + b*c
	root := math.Sqrt(math.Abs(disc))
	if disc < 0 {
		return shiftPair{mean, mean, root}
	}
	near := mean + root
	if math.Abs(mean-root-d) < math.Abs(near-d) {
		near = mean - root
	}
	return shiftPair{near, near, 0}
}

// sweep chases one bulge from the top of the active block lo … hi to its end.
func (s *schurWork) sweep(lo, hi int, shift shiftPair) {
	m, v := s.begin(lo, hi, shift)
	length := chaseLength
	if hi-lo < chaseWhole {
		length = hi - m
	}
	n, ld, h := s.n, s.ld, s.h
	s.chain = s.chain[:0]
	for k0 := m; k0 < hi; {
		k1 := k0 + length
		if k1+2 > hi {
			k1 = hi
		}
		from := len(s.chain)
		s.window(lo, hi, m, k0, k1, &v)
		chain := s.chain[from:]
		last := min(k1+2, hi)
		if rest := n - 1 - last; rest > 0 {
			chaseRows(h[k0*ld+last+1:], ld, k1-k0, (rest+3)&^3, chain)
		}
		s.above(k0, k1-k0, chain)
		k0 = k1
	}
	chaseRows(s.qt[m*ld:], ld, hi-m, (n+3)&^3, s.chain)
}

// begin finds the row the bulge can start from, the lowest above which two
// subdiagonal entries in a row are small, and the first column of (H−σ₁)(H−σ₂).
func (s *schurWork) begin(lo, hi int, p shiftPair) (m int, v [3]float64) {
	h, ld := s.h, s.ld
	for m = hi - 2; ; m-- {
		at := m*ld + m
		d, below := h[at], h[at+ld]
		size := math.Abs(d-p.re2) + math.Abs(p.im) + math.Abs(below)
		f := below / size
		v[0] = f*h[at+1] + (d-p.re1)*((d-p.re2)/size) - p.im*(-p.im/size)
		v[1] = f * (d + h[at+ld+1] - p.re1 - p.re2)
		v[2] = f * h[at+2*ld+1]
		sum := math.Abs(v[0]) + math.Abs(v[1]) + math.Abs(v[2])
		if m == lo {
			return m, v
		}
		tail := (math.Abs(v[1]) + math.Abs(v[2])) * math.Abs(h[at-1])
		if tail <= eps/2*math.Abs(v[0])*(math.Abs(h[at-ld-1])+math.Abs(d)+math.Abs(h[at+ld+1])) && sum > 0 {
			return m, v
		}
	}
}

// window makes reflectors k0 to k1−1 and applies them within rows and columns k0 to
// k1+2; v is the first column of the first one of the sweep.
func (s *schurWork) window(lo, hi, m, k0, k1 int, v *[3]float64) {
	h, ld := s.h, s.ld
	last := min(k1+2, hi)
	for k := k0; k < k1; k++ {
		at := k*ld + k
		if k > m {
			v[0], v[1], v[2] = h[at-1], h[at+ld-1], 0
			if k+2 <= hi {
				v[2] = h[at+2*ld-1]
			}
		}
		t0, v1, v2, beta := reflector3(v)
		t1, t2 := t0*v1, t0*v2
		switch {
		case k > m:
			h[at-1], h[at+ld-1] = beta, 0
			if k+2 <= hi {
				h[at+2*ld-1] = 0
			}
		case m > lo:
			h[at-1] *= 1 - t0
		}
		s.chain = append(s.chain, t0, t1, t2, v1, v2)
		if k+2 > hi {
			s.turnLast(k0, k, t0, t1, v1)
			continue
		}
		p := h[at : at+last-k+1]
		q, r := h[at+ld:], h[at+2*ld:]
		q, r = q[:len(p)], r[:len(p)]
		for j, x := range p {
			f := t0*x + t1*q[j] + t2*r[j]
			p[j] = x - f
			q[j] -= v1 * f
			r[j] -= v2 * f
		}
		for i := k0*ld + k; i <= min(k+3, hi)*ld+k; i += ld {
			x := h[i : i+3 : i+3]
			f := t0*x[0] + t1*x[1] + t2*x[2]
			x[0] -= f
			x[1] -= v1 * f
			x[2] -= v2 * f
		}
	}
}

// turnLast applies the reflector of two entries that ends a sweep at k, k+1.
func (s *schurWork) turnLast(k0, k int, t0, t1, v1 float64) {
	h, ld := s.h, s.ld
	at := k*ld + k
	for j := at; j < at+2; j++ {
		f := t0*h[j] + t1*h[j+ld]
		h[j] -= f
		h[j+ld] -= v1 * f
	}
	for i := k0*ld + k; i <= (k+1)*ld+k; i += ld {
		f := t0*h[i] + t1*h[i+1]
		h[i] -= f
		h[i+1] -= v1 * f
	}
}

// above applies a chain that begins at column k0 to the rows above it.
func (s *schurWork) above(k0, k int, chain []float64) {
	if k0 == 0 {
		return
	}
	h, ld := s.h, s.ld
	whole := (k + 3) &^ 3
	c := append(s.padded[:0], chain...)
	c = c[:whole*reflectorSize]
	clear(c[len(chain):])
	rows := k0 &^ 3
	chaseColumns(h[k0:], ld, whole, rows, c)
	rest := k0 - rows
	if rest == 0 {
		return
	}
	// the last rows go through a buffer of four
	w := whole + 2
	for i := 0; i < rest; i++ {
		copy(s.four[i*w:i*w+w], h[(rows+i)*ld+k0:])
	}
	chaseColumns(s.four, w, whole, 4, c)
	for i := 0; i < rest; i++ {
		copy(h[(rows+i)*ld+k0:(rows+i)*ld+k0+w], s.four[i*w:])
	}
}

// reflector3 is reflector for three entries, without changing v.
func reflector3(v *[3]float64) (tau, v1, v2, beta float64) {
	alpha := v[0]
	tail := v[1]*v[1] + v[2]*v[2]
	if !(tail > smallSquare) || !(tail < 1/smallSquare) {
		x := *v
		tau, beta = reflector(x[:])
		return tau, x[1], x[2], beta
	}
	beta = -math.Copysign(math.Sqrt(alpha*alpha+tail), alpha)
	f := 1 / (alpha - beta)
	return (beta - alpha) / beta, v[1] * f, v[2] * f, beta
}

// standardise brings the 2×2 block at k, k+1 to canonical form: two real
// eigenvalues are split, a conjugate pair gets equal diagonal entries.
func (s *schurWork) standardise(k int) {
	var impl lapackgonum.Implementation
	h, ld, n := s.h, s.ld, s.n
	at := k*ld + k
	var cs, sn float64
	h[at], h[at+1], h[at+ld], h[at+ld+1], _, _, _, _, cs, sn = impl.Dlanv2(h[at], h[at+1], h[at+ld], h[at+ld+1])
	turn(h[at+2:k*ld+n], h[at+ld+2:(k+1)*ld+n], cs, sn)
	for i := k; i < at; i += ld {
		x, y := h[i], h[i+1]
		h[i], h[i+1] = cs*x+sn*y, cs*y-sn*x
	}
	turn(s.qt[k*ld:k*ld+n], s.qt[(k+1)*ld:(k+1)*ld+n], cs, sn)
}

// turn rotates two rows.
func turn(x, y []float64, cs, sn float64) {
	y = y[:len(x)]
	for j, p := range x {
		q := y[j]
		x[j], y[j] = cs*p+sn*q, cs*q-sn*p
	}
}
