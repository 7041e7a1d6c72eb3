package quantity

import (
	"math"
	"math/big"
)

// maxBits bounds the fractions carried beside the doubles: a sum of ordinary
// decimals stays far below it, a power tower is cut off and goes on as a
// double alone.
const maxBits = 4096

// A number is a value under way through an expression.
type number struct {
	si   float64
	rat  *big.Rat // nil: not rational, or not asked for
	dim  Dim
	kind Kind
}

// A clash says why two numbers cannot be joined.
type clash struct{ found, want string }

func isLevel(k Kind) bool { return k == Level || k == Gauge || k == Absolute }

// add returns a + b, or a − b where sign is −1.
func add(a, b number, sign int) (number, *clash) {
	if a.dim != b.dim {
		return a, &clash{Describe(a.dim, a.kind) + verb(sign) + Describe(b.dim, b.kind), "two quantities of one dimension"}
	}
	kind, c := sumKind(a.kind, b.kind, sign)
	if c != nil {
		return a, c
	}
	r := number{si: a.si + float64(sign)*b.si, dim: a.dim, kind: kind}
	if a.rat != nil && b.rat != nil {
		if sign < 0 {
			r.rat = new(big.Rat).Sub(a.rat, b.rat)
		} else {
			r.rat = new(big.Rat).Add(a.rat, b.rat)
		}
	}
	return r.round(), nil
}

func verb(sign int) string {
	if sign < 0 {
		return " minus "
	}
	return " plus "
}

// sumKind: level ± difference is a level, level − level of one kind a
// difference, and nothing else holds a level.
func sumKind(a, b Kind, sign int) (Kind, *clash) {
	switch {
	case isLevel(a) && isLevel(b):
		if sign > 0 {
			return a, &clash{"a level plus a level", "a level plus a difference (5 K, not 5 °C)"}
		}
		if a != b {
			return a, &clash{"a gauge and an absolute pressure", "two pressures of one kind"}
		}
		return Difference, nil
	case isLevel(a):
		return a, nil
	case isLevel(b) && sign > 0:
		return b, nil
	case isLevel(b) && a == Either:
		return Difference, nil
	case isLevel(b):
		return a, &clash{"a difference minus a level", "a level first"}
	case a == Difference && b == Difference, a == Difference && sign < 0:
		return Difference, nil
	case a == Either || b == Either:
		return Either, nil
	case a == Difference || b == Difference:
		return Difference, nil
	}
	return a, nil
}

// multiply returns a·b, or a/b where sign is −1. It does not divide by zero.
func multiply(a, b number, sign int) (number, *clash) {
	if isLevel(a.kind) || isLevel(b.kind) {
		return a, &clash{"a part or a multiple of a level", "a difference: level − level, or 5 K"}
	}
	dim, ok := a.dim.plus(b.dim, sign)
	if !ok {
		return a, &clash{"a power beyond ±100 of a unit", "ordinary powers"}
	}
	r := number{dim: dim, kind: productKind(dim, a, b)}
	if sign < 0 {
		r.si = a.si / b.si
	} else {
		r.si = a.si * b.si
	}
	if a.rat != nil && b.rat != nil {
		if sign < 0 {
			r.rat = new(big.Rat).Quo(a.rat, b.rat)
		} else {
			r.rat = new(big.Rat).Mul(a.rat, b.rat)
		}
	}
	return r.round(), nil
}

func productKind(dim Dim, a, b number) Kind {
	switch {
	case dim == dimKelvin:
		return Difference
	case dim == dimPressure && (a.kind == Difference || b.kind == Difference):
		return Difference
	}
	return Plain
}

// raise returns a^b for a plain b.
func raise(a, b number) (number, *clash) {
	if b.dim != dimNone {
		return a, &clash{"a power that is " + Describe(b.dim, b.kind), "a plain number"}
	}
	if isLevel(a.kind) {
		return a, &clash{"a power of a level", "a difference: level − level, or 5 K"}
	}
	dim, ok := a.dim.power(b.si)
	if !ok {
		return a, &clash{"a power that leaves a unit in fractions", "a power that gives whole powers of " + UnitOf(a.dim)}
	}
	r := number{si: math.Pow(a.si, b.si), dim: dim}
	if dim == dimKelvin {
		r.kind = Difference
	}
	if n := int(b.si); a.rat != nil && b.rat != nil && b.rat.IsInt() && float64(n) == b.si && bits(a.rat)*max(n, -n) <= maxBits {
		r.rat = ratPower(a.rat, n)
	}
	return r.round(), nil
}

func ratPower(x *big.Rat, n int) *big.Rat {
	e := big.NewInt(int64(max(n, -n)))
	num := new(big.Int).Exp(x.Num(), e, nil)
	den := new(big.Int).Exp(x.Denom(), e, nil)
	if n < 0 {
		if num.Sign() == 0 {
			return nil
		}
		num, den = den, num
	}
	return new(big.Rat).SetFrac(num, den)
}

// negate returns −a.
func negate(a number) (number, *clash) {
	if isLevel(a.kind) {
		return a, &clash{"the negative of a level", "a difference"}
	}
	if a.kind == Either {
		a.kind = Difference
	}
	a.si = -a.si
	if a.rat != nil {
		a.rat = new(big.Rat).Neg(a.rat)
	}
	return a, nil
}

// lesser returns the smaller of a and b, or the larger where sign is −1.
func lesser(a, b number, sign int) (number, *clash) {
	if a.dim != b.dim {
		return a, &clash{Describe(a.dim, a.kind) + " beside " + Describe(b.dim, b.kind), "quantities of one dimension"}
	}
	kind := a.kind
	switch {
	case a.kind == b.kind:
	case a.kind == Either || a.kind == Plain:
		kind = b.kind
	case b.kind == Either || b.kind == Plain:
	default:
		return a, &clash{"a level beside a difference, or two kinds of level", "levels of one kind, or differences"}
	}
	if float64(sign)*b.si < float64(sign)*a.si {
		a = b
	}
	a.kind = kind
	return a, nil
}

// round makes si the double next to the fraction, where there is one of
// reasonable size.
func (n number) round() number {
	if n.rat == nil {
		return n
	}
	if bits(n.rat) > maxBits {
		n.rat = nil
		return n
	}
	n.si, _ = n.rat.Float64()
	return n
}

func bits(r *big.Rat) int { return r.Num().BitLen() + r.Denom().BitLen() }
