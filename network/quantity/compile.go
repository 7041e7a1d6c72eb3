package quantity

import (
	"slices"
	"strings"
)

// Bounds of an expression.
const (
	maxDepth = 60 // parentheses, signs and powers within each other
	maxStack = 64
	maxArgs  = 16
)

// An Expr is an expression compiled to postfix: no name is looked up when it
// is evaluated. It may be evaluated by several goroutines at once.
type Expr struct {
	src    string
	ops    []op
	consts []number
	uses   []int
}

type opcode uint8

const (
	opConst opcode = iota // n: index of consts
	opSlot                // n: slot
	opAdd
	opSub
	opMul
	opDiv
	opPow
	opNeg
	opSqrt
	opExp
	opLn
	opAbs
	opMin // n: arguments
	opMax
)

// An op is one step; off and len are the text it covers.
type op struct {
	code     opcode
	n        int32
	off, len int32
}

var functions = []struct {
	name string
	code opcode
}{
	{"sqrt", opSqrt}, {"exp", opExp}, {"ln", opLn}, {"abs", opAbs}, {"min", opMin}, {"max", opMax},
}

// Reserved reports whether a name has a meaning of its own in expressions, and
// so cannot be given another.
func Reserved(name string) bool {
	_, ok := function(name)
	return ok || name == "pi"
}

func function(name string) (opcode, bool) {
	for _, f := range functions {
		if f.name == name {
			return f.code, true
		}
	}
	return 0, false
}

// Compile reads an expression: numbers with units, names, + - * / ^,
// parentheses, sqrt exp ln abs min max, and pi. A leading "=" is skipped.
// known tells which names there are and the slot of each in Eval's argument.
//
// Errors are *SyntaxError with the place in s; one for a name that is not known
// carries it in Name, for the caller to suggest a better one. Dimensions are
// checked by Eval, since names bring theirs.
func Compile(s string, known func(name string) (slot int, ok bool)) (*Expr, error) {
	e, f := compile(s, known)
	if f != nil {
		return nil, f.syntax(s, func(t string) *fault { _, f := compile(t, known); return f })
	}
	return e, nil
}

func compile(s string, known func(string) (int, bool)) (*Expr, *fault) {
	if len(s) > maxText {
		return nil, &fault{n: len(s), found: "a text of more than 2000 bytes", want: "a shorter expression"}
	}
	c := compiler{src: s, known: known, e: &Expr{src: s}}
	c.skip()
	if c.has("=") {
		c.pos++
	}
	if f := c.sum(); f != nil {
		return nil, f
	}
	c.skip()
	if c.pos < len(s) {
		return nil, c.surplus()
	}
	slices.Sort(c.e.uses)
	c.e.uses = slices.Compact(c.e.uses)
	return c.e, nil
}

// Uses lists the slots the expression refers to, ascending, each once.
func (e *Expr) Uses() []int { return slices.Clone(e.uses) }

// String is the text the expression was made from.
func (e *Expr) String() string { return e.src }

type compiler struct {
	src   string
	pos   int
	known func(string) (int, bool)
	e     *Expr
	depth int
	calls int // open argument lists, in which a comma parts numbers
	stack int
}

func (c *compiler) skip()             { c.pos += spaces(c.src[c.pos:]) }
func (c *compiler) has(s string) bool { return strings.HasPrefix(c.src[c.pos:], s) }

// take skips one of the signs in list, which are parted by spaces.
func (c *compiler) take(list ...string) bool {
	for _, s := range list {
		if c.has(s) {
			c.pos += len(s)
			return true
		}
	}
	return false
}

func (c *compiler) emit(code opcode, n, from int) *fault {
	switch code {
	case opConst, opSlot:
		c.stack++
	case opAdd, opSub, opMul, opDiv, opPow:
		c.stack--
	case opMin, opMax:
		c.stack -= n - 1
	}
	if c.stack > maxStack {
		return c.tooDeep()
	}
	text := strings.TrimRightFunc(c.src[from:c.pos], isSpace)
	c.e.ops = append(c.e.ops, op{code, int32(n), int32(from), int32(len(text))})
	return nil
}

func (c *compiler) tooDeep() *fault {
	return &fault{off: c.pos, n: min(1, len(c.src)-c.pos), found: "an expression nested more than 60 deep", want: "a plainer one, in parts under names of their own"}
}

// deeper guards the recursion; the caller lowers depth again.
func (c *compiler) deeper() *fault {
	if c.depth++; c.depth > maxDepth {
		return c.tooDeep()
	}
	return nil
}

func (c *compiler) sum() *fault {
	c.skip()
	from := c.pos
	if f := c.term(); f != nil {
		return f
	}
	for {
		c.skip()
		code := opAdd
		switch {
		case c.take("+"):
		case c.take("-", "−"):
			code = opSub
		default:
			return nil
		}
		if f := c.term(); f != nil {
			return f
		}
		if f := c.emit(code, 0, from); f != nil {
			return f
		}
	}
}

func (c *compiler) term() *fault {
	c.skip()
	from := c.pos
	if f := c.signed(); f != nil {
		return f
	}
	for {
		c.skip()
		code := opMul
		switch {
		case c.has("**"):
			return &fault{off: c.pos, n: 2, found: `"**"`, want: "^ for a power", replace: "^", fix: true}
		case c.take("*", "·", "×", "⋅"):
		case c.take("/", "÷", "∕"):
			code = opDiv
		default:
			return nil
		}
		if f := c.signed(); f != nil {
			return f
		}
		if f := c.emit(code, 0, from); f != nil {
			return f
		}
	}
}

// signed reads a power with signs before it. A sign before the number of a
// level belongs to the number: −20 °C is a level, −(20 °C) nothing.
func (c *compiler) signed() *fault {
	if f := c.deeper(); f != nil {
		return f
	}
	defer func() { c.depth-- }()
	c.skip()
	from := c.pos
	neg, n := scanSign(c.src[c.pos:])
	if n == 0 {
		return c.power()
	}
	c.pos += n
	if neg {
		if done, f := c.levelBelowZero(from); done || f != nil {
			return f
		}
	}
	if f := c.signed(); f != nil || !neg {
		return f
	}
	return c.emit(opNeg, 0, from)
}

func (c *compiler) levelBelowZero(from int) (done bool, f *fault) {
	after := c.pos
	c.skip()
	if d, p, ok, f := c.literal(); ok && f == nil && isLevel(p.kind) {
		d.neg = true
		return true, c.constant(d, p, from)
	}
	c.pos = after
	return false, nil
}

// power reads a^b, a^-b, and a² for a name or a bracket.
func (c *compiler) power() *fault {
	from := c.pos
	if f := c.primary(); f != nil {
		return f
	}
	if text, n := superscript(c.src[c.pos:]); n > 0 {
		at := c.pos
		c.pos += n
		d, _, _ := scanNumber(strings.TrimLeft(text, "+-"))
		d.neg = text[0] == '-'
		if f := c.constant(d, product{}, at); f != nil {
			return f
		}
		return c.emit(opPow, 0, from)
	}
	c.skip()
	if !c.take("^") {
		return nil
	}
	if f := c.signed(); f != nil {
		return f
	}
	return c.emit(opPow, 0, from)
}
