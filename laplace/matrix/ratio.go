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
// coefficient is rounded once, at the end. It returns ErrOrder above order 10,
// ErrShape and ErrValue.
//
// Method: the doubles are scaled to integers; sE − A bordered by in and out is
// eliminated without fractions (E. H. Bareiss, Math. Comp. 22 (1968) 565) at N + 1
// integers s, which gives both determinants at once, and Newton's divided
// differences give the coefficients.
func (b *Balance) Ratio(in, out []float64, d float64) (num, den []float64, err error) {
	n := b.N
	if n > MaxRatioOrder {
		return nil, nil, ErrOrder
	}
	if err := b.checkTransfer(in, out, d); err != nil {
		return nil, nil, err
	}
	e := newIntegerBalance(b, in, out, d)
	var at, p, q []*big.Rat
	for s := int64(1); len(at) <= n; s++ {
		if dp, dq, ok := e.determinants(s); ok {
			at, p, q = append(at, new(big.Rat).SetInt64(s)), append(p, dp), append(q, dq)
		}
	}
	p, q = interpolate(at, p), interpolate(at, q)
	den, num = make([]float64, n+1), make([]float64, n+1)
	for k := 0; k <= n; k++ {
		den[k] = rounded(q[k], q[n], (n-k)*e.time)
		num[k] = rounded(p[k], q[n], (n-k)*e.time-e.border)
	}
	for len(num) > 0 && num[len(num)-1] == 0 {
		num = num[:len(num)-1]
	}
	return num, den, nil
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

// rounded returns p/q·2^k.
func rounded(p, q *big.Rat, k int) float64 {
	v, _ := new(big.Rat).Quo(p, q).Float64()
	return math.Ldexp(v, k)
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

// integerBalance is sE − A with every row multiplied by a power of two, s in units
// of 2^time, bordered by −in on the right and out below.
type integerBalance struct {
	n      int
	c      []*big.Int
	a      []*big.Int // (n+1)×(n+1), without the part with s
	time   int
	border int // the numerator carries 2^border
}

func newIntegerBalance(b *Balance, in, out []float64, d float64) *integerBalance {
	n := b.N
	w := n + 1
	e := &integerBalance{n: n, c: make([]*big.Int, n), a: make([]*big.Int, w*w), time: timeExponent(b)}
	row := make([]int, n)
	col, last := 0, 0
	for i := range row {
		low := lowest(math.MaxInt32, b.Leak[i])
		if m, k := odd(b.C[i]); m != 0 {
			low = min(low, k+e.time)
		}
		for j := 0; j < n; j++ {
			if j != i {
				low = lowest(low, b.F[i*n+j])
			}
		}
		row[i] = -low
		if m, k := odd(in[i]); m != 0 {
			col = max(col, -(k + row[i]))
		}
		last = -lowest(-last, out[i])
	}
	if m, k := odd(d); m != 0 {
		last = max(last, -(k + col))
	}
	e.border = col + last
	for i := 0; i < n; i++ {
		e.c[i] = integer(b.C[i], row[i]+e.time)
		sum := integer(b.Leak[i], row[i])
		for j := 0; j < n; j++ {
			if j != i {
				f := integer(b.F[i*n+j], row[i])
				sum.Add(sum, f)
				e.a[i*w+j] = f.Neg(f)
			}
		}
		e.a[i*w+i] = sum
		x := integer(in[i], row[i]+col)
		e.a[i*w+n] = x.Neg(x)
		e.a[n*w+i] = integer(out[i], last)
	}
	e.a[n*w+n] = integer(d, last+col)
	return e
}

// timeExponent is a power of two near the rates of the balance, to keep the
// integers short.
func timeExponent(b *Balance) int {
	var sum, count int
	for i := 0; i < b.N; i++ {
		large := math.Abs(b.Leak[i])
		for j := 0; j < b.N; j++ {
			if j != i {
				large = math.Max(large, math.Abs(b.F[i*b.N+j]))
			}
		}
		if large > 0 {
			_, e := math.Frexp(large)
			_, f := math.Frexp(b.C[i])
			sum += e - f
			count++
		}
	}
	if count == 0 {
		return 0
	}
	return sum / count
}

// determinants returns those of the bordered matrix and of the matrix at s; not ok
// where the latter is 0.
func (e *integerBalance) determinants(s int64) (bordered, plain *big.Rat, ok bool) {
	n, w := e.n, e.n+1
	m := make([]*big.Int, w*w)
	for k, v := range e.a {
		m[k] = new(big.Int).Set(v)
	}
	x := big.NewInt(s)
	for i := 0; i < n; i++ {
		m[i*w+i].Add(m[i*w+i], new(big.Int).Mul(e.c[i], x))
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
