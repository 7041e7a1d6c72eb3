package quantity

// A Term is an operand of an expression in which some names stand for quantities
// that change: a number, or where Curve is not nil what that quantity is to the
// caller, with its dimension and kind in Value; SI means nothing then.
type Term struct {
	Value Value
	Curve any
}

// A Step is one operation of an expression of which some operand changes. Function
// computes it for the operands' numbers at one instant, as many as there are terms;
// it is NaN or infinite where the operation has no value there.
type Step struct {
	Operation Operation
	Terms     []Term
	Function  func(x []float64) float64
}

// An Operation is what a Step does.
type Operation string

// The operations. Negate, Sqrt, Exp, Ln and Abs have one operand, Min and Max up to
// 16, the others two. All but Add, Subtract, Negate, Multiply, Divide and Power are
// left to Step.Function.
const (
	Add      Operation = "+"
	Subtract Operation = "-"
	Multiply Operation = "*"
	Divide   Operation = "/"
	Power    Operation = "^"
	Negate   Operation = "negate"
	Sqrt     Operation = "sqrt"
	Exp      Operation = "exp"
	Ln       Operation = "ln"
	Abs      Operation = "abs"
	Min      Operation = "min"
	Max      Operation = "max"
)

var operations = map[opcode]Operation{
	opAdd: Add, opSub: Subtract, opMul: Multiply, opDiv: Divide, opPow: Power, opNeg: Negate,
	opSqrt: Sqrt, opExp: Exp, opLn: Ln, opAbs: Abs, opMin: Min, opMax: Max,
}

// A NoValue is what a caller of Curves says of a step that it cannot take.
type NoValue struct {
	Found string // "the square root of a negative number"
	Want  string // "0 or more"; "" where nothing helps
}

func (e *NoValue) Error() string { return sentence(e.Found, e.Want, "") }

// Curves computes an expression in which names may stand for quantities that change.
// look says what a slot holds; join takes a step of which an operand is a curve and
// returns the curve that comes out; it may keep its step. Dimensions and kinds follow
// the rules of numbers: level ± difference is a level, level − level a difference. Steps
// between numbers are Eval's own, in fractions where the numbers carry them.
//
// Errors are *DimensionError and *ValueError with the place in the text; join returns
// *NoValue for what has no value, and any other error is passed on.
func (e *Expr) Curves(look func(slot int) Term, join func(Step) (any, error)) (Term, error) {
	var stack [maxStack]Term
	top := 0
	for i := range e.ops {
		o := &e.ops[i]
		n := o.operands()
		var r Term
		var err error
		switch args := stack[top-n : top]; {
		case o.code == opSlot:
			r = look(int(o.n))
			if r.Value.Kind == Plain && r.Value.Dim == dimKelvin {
				r.Value.Kind = Either // as in Eval
			}
		case moves(args):
			r, err = e.curve(o, args, join)
		default:
			r, err = e.still(o, args)
		}
		if err != nil {
			return Term{}, err
		}
		top -= n
		stack[top] = r
		top++
	}
	r := stack[0]
	r.Value.Text = e.src
	return r, nil
}

func moves(args []Term) bool {
	for i := range args {
		if args[i].Curve != nil {
			return true
		}
	}
	return false
}

// still takes a step between numbers.
func (e *Expr) still(o *op, args []Term) (Term, error) {
	r, err := e.step(o, numbers(args), nil, true)
	return Term{Value: Value{SI: r.si, Dim: r.dim, Kind: r.kind, Exact: r.rat}}, err
}

func numbers(args []Term) []number {
	list := make([]number, len(args))
	for i, a := range args {
		list[i] = number{si: a.Value.SI, rat: a.Value.Exact, dim: a.Value.Dim, kind: a.Value.Kind}
		if a.Curve != nil {
			list[i].si, list[i].rat = 1, nil // a value with which every operation is defined
		}
	}
	return list
}

// curve takes a step of which an operand changes.
func (e *Expr) curve(o *op, args []Term, join func(Step) (any, error)) (Term, error) {
	list := numbers(args)
	if o.code == opDiv && args[1].Curve == nil && args[1].Value.SI == 0 {
		return Term{}, e.noValue(o, "a division by zero", "a divisor that is not zero")
	}
	if o.code == opPow && args[1].Curve != nil && list[0].dim != dimNone {
		return Term{}, e.clashes(o, &clash{"a power that changes, of " + Describe(list[0].dim, list[0].kind), "a plain number under it, or a power that does not change"})
	}
	r, c := shapeOf(o, list)
	if c != nil {
		return Term{}, e.clashes(o, c)
	}
	kept := append([]Term(nil), args...)
	made, err := join(Step{operations[o.code], kept, func(x []float64) float64 { return o.at(x) }})
	if no, ok := err.(*NoValue); ok {
		return Term{}, e.noValue(o, no.Found, no.Want)
	}
	return Term{Value: Value{Dim: r.dim, Kind: r.kind}, Curve: made}, err
}

// shapeOf finds the dimension and kind that come out of an operation.
func shapeOf(o *op, a []number) (r number, c *clash) {
	switch o.code {
	case opAdd:
		return add(a[0], a[1], 1)
	case opSub:
		return add(a[0], a[1], -1)
	case opMul:
		return multiply(a[0], a[1], 1)
	case opDiv:
		return multiply(a[0], a[1], -1)
	case opPow:
		return raise(a[0], a[1])
	case opNeg:
		return negate(a[0])
	case opSqrt:
		return raise(a[0], number{si: 0.5})
	case opAbs:
		if isLevel(a[0].kind) {
			return a[0], &clash{"the magnitude of a level", "a difference"}
		}
		return a[0], nil
	case opMin, opMax:
		r = a[0]
		for _, b := range a[1:] {
			if r, c = lesser(r, b, 1); c != nil {
				break
			}
		}
		return r, c
	}
	if a[0].dim != dimNone {
		return a[0], &clash{"a function of " + Describe(a[0].dim, a[0].kind), "a plain number"}
	}
	return number{}, nil
}
