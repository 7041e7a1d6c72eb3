package matrix

import (
	"math"
	"math/big"
)

// exactPolynomials are numerator and denominator of a transfer as functions of s in
// units of 2^time, without error.
func exactPolynomials(b *Balance, in, out []float64) (num, den []*big.Rat, time int) {
	e := newIntegers(&Stores{Balance: *b}, in, out, 0, 0)
	var at, p, q []*big.Rat
	for s := int64(1); len(at) <= b.N; s++ {
		if u, v, ok := e.determinants(s); ok {
			at, p, q = append(at, new(big.Rat).SetInt64(s)), append(p, u), append(q, v)
		}
	}
	return interpolate(at, p), interpolate(at, q), e.time
}

// exactDistance is the distance from p to the nearest root of the polynomial q by
// one exact Newton step, or a bound of it from a higher derivative where roots are
// close together.
func exactDistance(q []*big.Rat, time int, p Root) float64 {
	n := len(q) - 1
	re, im := new(big.Rat).SetFloat64(math.Ldexp(p.Re, -time)), new(big.Rat).SetFloat64(math.Ldexp(p.Im, -time))
	// Taylor coefficients about p by repeated division
	type pair struct{ re, im *big.Rat }
	c := make([]pair, n+1)
	for k := range c {
		c[k] = pair{new(big.Rat).Set(q[k]), new(big.Rat)}
	}
	for k := range c {
		for j := n - 1; j >= k; j-- {
			a, d := c[j+1].re, c[j+1].im
			c[j].re.Add(c[j].re, new(big.Rat).Sub(new(big.Rat).Mul(a, re), new(big.Rat).Mul(d, im)))
			c[j].im.Add(c[j].im, new(big.Rat).Add(new(big.Rat).Mul(a, im), new(big.Rat).Mul(d, re)))
		}
	}
	square := func(x pair) *big.Float {
		re, im := new(big.Float).SetPrec(100).SetRat(x.re), new(big.Float).SetPrec(100).SetRat(x.im)
		return re.Add(re.Mul(re, re), im.Mul(im, im))
	}
	zero := square(c[0])
	if zero.Sign() == 0 {
		return 0
	}
	best := math.Inf(1)
	binomial := 1.0
	for m := 1; m <= n; m++ {
		binomial *= float64(n-m+1) / float64(m)
		v := square(c[m])
		if v.Sign() == 0 {
			continue
		}
		ratio, _ := v.Quo(zero, v).Float64()
		if ratio = math.Sqrt(ratio); m == 1 {
			best = ratio
		} else { // some root lies within (C(n,m)·|c0/cm|)^(1/m)
			best = math.Min(best, math.Pow(binomial*ratio, 1/float64(m)))
		}
	}
	return math.Ldexp(best, time)
}
