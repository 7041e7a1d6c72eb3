package quantity

import (
	"math"
	"math/big"
)

var pi = number{si: math.Pi}

func one() *big.Rat { return big.NewRat(1, 1) }

// Eval computes the expression for the values given, indexed by slot.
//
// Where every value used carries its fraction, sums, products and whole powers
// are reckoned in fractions and rounded once, so that 0.1 + 0.2 is 0.3; where
// one does not, everything is float64 and nothing is allocated. Errors are
// *DimensionError and *ValueError with the place in the text.
func (e *Expr) Eval(given []Value) (Value, error) {
	exact := true
	for _, slot := range e.uses {
		exact = exact && given[slot].Exact != nil
	}
	var stack [maxStack]number
	top := 0
	for i := range e.ops {
		o := &e.ops[i]
		n := o.operands()
		r, err := e.step(o, stack[top-n:top], given, exact)
		if err != nil {
			return Value{}, err
		}
		top -= n
		stack[top] = r
		top++
	}
	r := stack[0]
	return Value{SI: r.si, Dim: r.dim, Kind: r.kind, Exact: r.rat, Text: e.src}, nil
}

func (o *op) operands() int {
	switch o.code {
	case opConst, opSlot:
		return 0
	case opAdd, opSub, opMul, opDiv, opPow:
		return 2
	case opMin, opMax:
		return int(o.n)
	}
	return 1
}

func (e *Expr) step(o *op, a []number, given []Value, exact bool) (number, error) {
	var r number
	var c *clash
	switch o.code {
	case opConst:
		r = e.consts[o.n]
	case opSlot:
		v := &given[o.n]
		r = number{si: v.SI, rat: v.Exact, dim: v.Dim, kind: v.Kind}
		if r.kind == Plain && r.dim == dimKelvin {
			r.kind = Either // a caller's own value
		}
	case opAdd:
		r, c = add(a[0], a[1], 1)
	case opSub:
		r, c = add(a[0], a[1], -1)
	case opMul:
		r, c = multiply(a[0], a[1], 1)
	case opDiv:
		if a[1].si == 0 || (a[1].rat != nil && a[1].rat.Sign() == 0) {
			return r, e.noValue(o, "a division by zero", "a divisor that is not zero")
		}
		r, c = multiply(a[0], a[1], -1)
	case opPow:
		r, c = raise(a[0], a[1])
	case opNeg:
		r, c = negate(a[0])
	case opMin, opMax:
		sign := 1
		if o.code == opMax {
			sign = -1
		}
		r = a[0]
		for _, b := range a[1:] {
			if r, c = lesser(r, b, sign); c != nil {
				break
			}
		}
	default:
		return e.apply(o, a[0])
	}
	if c != nil {
		return r, e.clashes(o, c)
	}
	if !exact {
		r.rat = nil
	}
	return r, e.finite(o, r)
}

// apply computes a function of one argument.
func (e *Expr) apply(o *op, a number) (number, error) {
	if o.code == opAbs {
		if isLevel(a.kind) {
			return a, e.clashes(o, &clash{"the magnitude of a level", "a difference"})
		}
		if a.si < 0 {
			a, _ = negate(a)
		}
		return a, nil
	}
	if o.code == opSqrt {
		if a.si < 0 {
			return a, e.noValue(o, "the square root of a negative number", "0 or more")
		}
		r, c := raise(a, number{si: 0.5})
		if c != nil {
			return r, e.clashes(o, c)
		}
		r.si = math.Sqrt(a.si)
		return r, nil
	}
	if a.dim != dimNone {
		return a, e.clashes(o, &clash{"a function of " + Describe(a.dim, a.kind), "a plain number"})
	}
	if o.code == opExp {
		r := number{si: math.Exp(a.si)}
		return r, e.finite(o, r)
	}
	if a.si <= 0 {
		return a, e.noValue(o, "the logarithm of a number that is not positive", "more than 0")
	}
	return number{si: math.Log(a.si)}, nil
}

func (e *Expr) finite(o *op, r number) error {
	if math.IsInf(r.si, 0) || math.IsNaN(r.si) {
		return e.noValue(o, "a result that is not a finite number", "one below 1.8e308 in SI")
	}
	return nil
}

func (e *Expr) noValue(o *op, found, want string) error {
	return &ValueError{Off: int(o.off), Len: int(o.len), Found: e.piece(o) + " is " + found, Expected: want}
}

func (e *Expr) clashes(o *op, c *clash) error {
	return &DimensionError{Off: int(o.off), Len: int(o.len), Found: e.piece(o) + " is " + c.found, Expected: c.want}
}

func (e *Expr) piece(o *op) string { return quote(e.src[o.off : o.off+o.len]) }

// Constant reports whether the expression refers to no name.
func (e *Expr) Constant() bool { return len(e.uses) == 0 }
