package matrix

import (
	"math"
	"math/big"
)

// Ratio is Balance.Ratio with direct + rate·s passed on at once.
func (s *Stores) Ratio(in, out []float64, direct, rate float64) (num, den []float64, err error) {
	n := s.N
	if n > MaxRatioOrder {
		return nil, nil, ErrOrder
	}
	if err := s.checkTransfer(in, out, direct+rate); err != nil {
		return nil, nil, err
	}
	e := newIntegers(s, in, out, direct, rate)
	last := n // degree of the numerator
	if rate != 0 {
		last++
	}
	var at, p, q []*big.Rat
	for x := int64(1); len(at) <= last; x++ {
		if dp, dq, ok := e.determinants(x); ok {
			at, p, q = append(at, new(big.Rat).SetInt64(x)), append(p, dp), append(q, dq)
		}
	}
	p, q = interpolate(at, p), interpolate(at, q)
	den, num = make([]float64, n+1), make([]float64, last+1)
	ok := true
	for k := range den {
		var good bool
		den[k], good = rounded(q[k], q[n], (n-k)*e.time)
		ok = ok && good
	}
	for k := range num {
		var good bool
		num[k], good = rounded(p[k], q[n], (n-k)*e.time-e.border)
		ok = ok && good
	}
	if !ok {
		return nil, nil, ErrRange
	}
	for len(num) > 0 && num[len(num)-1] == 0 {
		num = num[:len(num)-1]
	}
	return num, den, nil
}

// integers is sE − A with every row multiplied by a power of two, s in units of
// 2^time, bordered by −in on the right and out below.
type integers struct {
	n      int
	mass   []*big.Int // (n+1)×(n+1), the part with s; nil where 0
	a      []*big.Int // (n+1)×(n+1), the part without
	time   int
	border int // the numerator carries 2^border
}

func newIntegers(b *Stores, in, out []float64, direct, rate float64) *integers {
	n := b.N
	w := n + 1
	e := &integers{n: n, mass: make([]*big.Int, w*w), a: make([]*big.Int, w*w), time: timeExponent(b)}
	col, last := 0, 0
	row := make([]int, n)
	for i := range row {
		row[i] = -e.lowestOf(b, i)
		if m, k := odd(in[i]); m != 0 {
			col = max(col, -(k + row[i]))
		}
		last = -lowest(-last, out[i])
	}
	for k, v := range [2]float64{direct, rate} {
		if m, x := odd(v); m != 0 {
			last = max(last, -(x + col + k*e.time))
		}
	}
	e.border = col + last
	for i := range n {
		e.fillRow(b, i, row[i])
		x := integer(in[i], row[i]+col)
		e.a[i*w+n] = x.Neg(x)
		e.a[n*w+i] = integer(out[i], last)
	}
	e.a[n*w+n] = integer(direct, e.border)
	if rate != 0 {
		e.mass[n*w+n] = integer(rate, e.border+e.time)
	}
	return e
}

// massOf is the entry of E.
func (s *Stores) massOf(i, j int) float64 {
	switch {
	case s.Mass != nil:
		return s.Mass[i*s.N+j]
	case i == j:
		return s.C[i]
	}
	return 0
}

// lowestOf is the least exponent in row i of sE − A.
func (e *integers) lowestOf(b *Stores, i int) int {
	low := lowest(math.MaxInt32, b.Leak[i])
	for j := range b.N {
		if m, k := odd(b.massOf(i, j)); m != 0 {
			low = min(low, k+e.time)
		}
		if j != i {
			low = lowest(low, b.F[i*b.N+j])
		}
		low = lowest(low, b.coupling(i, j))
	}
	return low
}

// fillRow writes row i of sE − A times 2^scale.
func (e *integers) fillRow(b *Stores, i, scale int) {
	n, w := b.N, b.N+1
	sum := integer(b.Leak[i], scale)
	for j := range n {
		if m := b.massOf(i, j); m != 0 {
			e.mass[i*w+j] = integer(m, scale+e.time)
		}
		x := integer(b.coupling(i, j), scale)
		if j == i {
			sum.Sub(sum, x)
			continue
		}
		f := integer(b.F[i*n+j], scale)
		sum.Add(sum, f)
		x.Add(x, f)
		e.a[i*w+j] = x.Neg(x)
	}
	e.a[i*w+i] = sum
}

// determinants returns those of the bordered matrix and of the matrix at s; not ok
// where the latter is 0.
func (e *integers) determinants(s int64) (bordered, plain *big.Rat, ok bool) {
	n, w := e.n, e.n+1
	m := make([]*big.Int, w*w)
	x := big.NewInt(s)
	for k, v := range e.a {
		m[k] = new(big.Int).Set(v)
		if e.mass[k] != nil {
			m[k].Add(m[k], new(big.Int).Mul(e.mass[k], x))
		}
	}
	last, negative := big.NewInt(1), false
	t := new(big.Int)
	for k := 0; k < n; k++ {
		p := k
		for p < n && m[p*w+k].Sign() == 0 {
			p++
		}
		if p == n {
			return nil, nil, false
		}
		if p != k {
			for j := 0; j < w; j++ {
				m[p*w+j], m[k*w+j] = m[k*w+j], m[p*w+j]
			}
			negative = !negative
		}
		pivot := m[k*w+k]
		for i := k + 1; i < w; i++ {
			f := m[i*w+k]
			for j := k + 1; j < w; j++ {
				v := m[i*w+j]
				v.Mul(v, pivot)
				if f.Sign() != 0 && m[k*w+j].Sign() != 0 {
					v.Sub(v, t.Mul(f, m[k*w+j]))
				}
				if k > 0 && v.Sign() != 0 {
					v.Quo(v, last)
				}
			}
		}
		last = pivot
	}
	bordered, plain = new(big.Rat).SetInt(m[w*w-1]), new(big.Rat).SetInt(last)
	if negative {
		bordered.Neg(bordered)
		plain.Neg(plain)
	}
	return bordered, plain, true
}
