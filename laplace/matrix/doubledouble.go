package matrix

import "math"

// dd is an unevaluated sum hi + lo of two doubles, |lo| ≤ ulp(hi)/2: about 106
// bits. Sources: T. J. Dekker, Numer. Math. 18 (1971) 224; D. E. Knuth, TAOCP 2,
// 4.2.2, theorem B; products by fused multiply–add.
type dd struct{ hi, lo float64 }

const eps = 0x1p-52 // spacing of doubles at 1

func toDD(a float64) dd     { return dd{hi: a} }
func (a dd) float() float64 { return a.hi + a.lo }
func (a dd) neg() dd        { return dd{-a.hi, -a.lo} }
func (a dd) zero() bool     { return a.hi == 0 }

func (a dd) abs() dd {
	if a.hi < 0 {
		return a.neg()
	}
	return a
}

// scale multiplies by k, exactly where k is a power of two.
func (a dd) scale(k float64) dd { return dd{a.hi * k, a.lo * k} }

// twoSum returns s + e = a + b without error, s the rounded sum.
func twoSum(a, b float64) (s, e float64) {
	s = a + b
	v := s - a
	return s, (a - (s - v)) + (b - v)
}

// twoProd returns p + e = a·b without error, p the rounded product.
func twoProd(a, b float64) (p, e float64) {
	p = a * b
	return p, math.FMA(a, b, -p)
}

func (a dd) add(b dd) dd {
	s, e := twoSum(a.hi, b.hi)
	t, f := twoSum(a.lo, b.lo)
	s, e = twoSum(s, e+t)
	s, e = twoSum(s, e+f)
	return dd{s, e}
}

func (a dd) addFloat(b float64) dd {
	s, e := twoSum(a.hi, b)
	s, e = twoSum(s, e+a.lo)
	return dd{s, e}
}

func (a dd) sub(b dd) dd { return a.add(b.neg()) }

func (a dd) mul(b dd) dd {
	p, e := twoProd(a.hi, b.hi)
	s, f := twoSum(p, e+(a.hi*b.lo+a.lo*b.hi))
	return dd{s, f}
}

func (a dd) div(b dd) dd {
	q := a.hi / b.hi
	if q == 0 || math.IsInf(q, 0) {
		return dd{hi: q}
	}
	r := a.sub(b.mul(dd{hi: q}))
	q2 := r.hi / b.hi
	r = r.sub(b.mul(dd{hi: q2}))
	s, e := twoSum(q, q2)
	s, e = twoSum(s, e+r.hi/b.hi)
	return dd{s, e}
}

// sqrt of a number ≥ 0, by one Newton step from the rounded root.
func (a dd) sqrt() dd {
	if a.hi <= 0 {
		return dd{}
	}
	x := math.Sqrt(a.hi)
	r := a.sub(dd{hi: x}.mul(dd{hi: x}))
	s, e := twoSum(x, r.hi/(2*x))
	return dd{s, e}
}
