package laplace

import (
	"errors"
	"math/big"

	"lagbook/laplace/matrix"
)

// ratio returns numerator and denominator from input flows b to the output c in
// exact arithmetic, ascending, the denominator monic.
func (p *plant) ratio(b, c []float64, d, rate float64) (num, den []float64, err error) {
	if p.balance != nil {
		s := matrix.Stores{Balance: *p.balance}
		return s.Ratio(b, c, d, rate)
	}
	if p.stores != nil {
		return p.stores.Ratio(b, c, d, rate)
	}
	if p.n > MaxRatioOrder {
		return nil, nil, errors.New("laplace: the order is too high for coefficients")
	}
	num, den = denseRatio(p.n, p.dense, b, c, d)
	return num, den, nil
}

// denseRatio expands det(sI − a) and its numerator by the recurrence of Faddeev
// and Le Verrier in rational numbers, in which the doubles given are exact:
// M₁ = I, q_{n−k} = −tr(a M_k)/k, M_{k+1} = a M_k + q_{n−k} I, and the numerator
// has the coefficient c M_k b at s^(n−k).
func denseRatio(n int, a, b, c []float64, d float64) (num, den []float64) {
	x := make([]*big.Rat, n*n)
	for i, v := range a {
		x[i] = new(big.Rat).SetFloat64(v)
	}
	m := identity(n)
	q, p := make([]*big.Rat, n+1), make([]*big.Rat, n+1)
	q[n], p[n] = big.NewRat(1, 1), new(big.Rat)
	for k := 1; k <= n; k++ {
		p[n-k] = bilinear(n, c, m, b)
		m = multiply(n, x, m)
		trace := new(big.Rat)
		for i := range n {
			trace.Add(trace, m[i*n+i])
		}
		q[n-k] = trace.Mul(trace, big.NewRat(-1, int64(k)))
		for i := range n {
			m[i*n+i].Add(m[i*n+i], q[n-k])
		}
	}
	num, den = make([]float64, n+1), make([]float64, n+1)
	direct := new(big.Rat).SetFloat64(d)
	for k := range q {
		p[k].Add(p[k], new(big.Rat).Mul(direct, q[k]))
		num[k], _ = p[k].Float64()
		den[k], _ = q[k].Float64()
	}
	return num, den
}

func identity(n int) []*big.Rat {
	m := make([]*big.Rat, n*n)
	for i := range m {
		m[i] = new(big.Rat)
		if i%(n+1) == 0 {
			m[i].SetInt64(1)
		}
	}
	return m
}

// bilinear returns c·M·b.
func bilinear(n int, c []float64, m []*big.Rat, b []float64) *big.Rat {
	sum := new(big.Rat)
	for i := range n {
		for j := range n {
			if c[i] == 0 || b[j] == 0 {
				continue
			}
			t := new(big.Rat).SetFloat64(c[i])
			t.Mul(t, new(big.Rat).SetFloat64(b[j]))
			sum.Add(sum, t.Mul(t, m[i*n+j]))
		}
	}
	return sum
}

// multiply returns x·m.
func multiply(n int, x, m []*big.Rat) []*big.Rat {
	y := make([]*big.Rat, n*n)
	t := new(big.Rat)
	for i := range n {
		for j := range n {
			s := new(big.Rat)
			for k := range n {
				s.Add(s, t.Mul(x[i*n+k], m[k*n+j]))
			}
			y[i*n+j] = s
		}
	}
	return y
}
