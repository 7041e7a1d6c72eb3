package matrix

import (
	"errors"
	"math"
	"math/big"
	"math/bits"
)

// MaxRatioOrder is the largest order for which Ratio answers.
const MaxRatioOrder = 10

// ErrOrder is returned where a ratio of polynomials is asked for above MaxRatioOrder.
var ErrOrder = errors.New("matrix: the order is too high for a ratio of polynomials")

// Ratio returns the transfer from the flows in to the weights out, d passed on at
// once, as num(s)/den(s): coefficients ascending, den monic of degree N, num without
// leading zeros and empty where the transfer is identically zero. Common factors
// are kept; take Restrict of Path first to be rid of those of other stores.
//
// Accuracy: the doubles are taken as the rational numbers they are and every
// coefficient is rounded once, at the end. It returns ErrOrder above order 10, ErrShape,
// ErrValue, and ErrRange where a coefficient is too large or too small for a double.
//
// Method: the doubles are scaled to integers; sE − A bordered by in and out is
// eliminated without fractions (E. H. Bareiss, Math. Comp. 22 (1968) 565) at N + 1
// integers s, which gives both determinants at once, and Newton's divided
// differences give the coefficients.
func (b *Balance) Ratio(in, out []float64, d float64) (num, den []float64, err error) {
	s := Stores{Balance: *b}
	return s.Ratio(in, out, d, 0)
}

// checkTransfer is check with the vectors of a transfer.
func (b *Balance) checkTransfer(in, out []float64, d float64) error {
	if len(in) != b.N || len(out) != b.N {
		return ErrShape
	}
	if !allFinite(in) || !allFinite(out) || d-d != 0 {
		return ErrValue
	}
	return b.check()
}

func allFinite(v []float64) bool {
	for _, x := range v {
		if x-x != 0 {
			return false
		}
	}
	return true
}

// rounded returns p/q·2^k; not ok where that is no number of its size.
func rounded(p, q *big.Rat, k int) (v float64, ok bool) {
	v, _ = new(big.Rat).Quo(p, q).Float64()
	v = math.Ldexp(v, k)
	return v, v-v == 0 && (v != 0 || p.Sign() == 0)
}

// odd returns v = m·2^e with m odd, or 0, 0.
func odd(v float64) (m int64, e int) {
	if v == 0 {
		return 0, 0
	}
	f, e := math.Frexp(v)
	m = int64(f * (1 << 53))
	z := bits.TrailingZeros64(uint64(m))
	return m >> z, e - 53 + z
}

// lowest is the least of e and the exponent of v, if v is not 0.
func lowest(e int, v float64) int {
	if m, k := odd(v); m != 0 && k < e {
		return k
	}
	return e
}

// integer returns v·2^k, which must be one.
func integer(v float64, k int) *big.Int {
	m, e := odd(v)
	if m == 0 {
		return new(big.Int)
	}
	return new(big.Int).Lsh(big.NewInt(m), uint(e+k))
}

// timeExponent is a power of two near the rates of the balance, to keep the
// integers short.
func timeExponent(b *Stores) int {
	var sum, count int
	for i := 0; i < b.N; i++ {
		large := math.Abs(b.Leak[i])
		for j := 0; j < b.N; j++ {
			if j != i {
				large = math.Max(large, math.Abs(b.F[i*b.N+j]))
			}
			large = math.Max(large, math.Abs(b.coupling(i, j)))
		}
		if large > 0 {
			_, e := math.Frexp(large)
			_, f := math.Frexp(b.capacity(i))
			sum += e - f
			count++
		}
	}
	if count == 0 {
		return 0
	}
	return sum / count
}

// interpolate returns the coefficients, ascending, of the polynomial with the
// values y at the points x.
func interpolate(x, y []*big.Rat) []*big.Rat {
	n := len(x)
	c := make([]*big.Rat, n)
	for i := range c {
		c[i] = new(big.Rat).Set(y[i])
	}
	t := new(big.Rat)
	for k := 1; k < n; k++ {
		for i := n - 1; i >= k; i-- {
			c[i].Sub(c[i], c[i-1])
			c[i].Quo(c[i], t.Sub(x[i], x[i-k]))
		}
	}
	for k := n - 2; k >= 0; k-- { // from Newton's form to powers
		for i := k; i < n-1; i++ {
			c[i].Sub(c[i], t.Mul(x[k], c[i+1]))
		}
	}
	return c
}
