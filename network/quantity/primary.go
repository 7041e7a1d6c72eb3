package quantity

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

func (c *compiler) primary() *fault {
	from := c.pos
	d, p, ok, f := c.literal()
	switch {
	case f != nil:
		return f
	case ok:
		return c.constant(d, p, from)
	case c.take("("):
		return c.bracket(from)
	}
	name := identifier(c.src[c.pos:])
	if name == "" {
		return c.missing()
	}
	c.pos += len(name)
	code, isFunc := function(name)
	if isFunc && strings.HasPrefix(c.src[c.pos+spaces(c.src[c.pos:]):], "(") {
		return c.call(code, from)
	}
	if name == "pi" {
		c.e.consts = append(c.e.consts, pi)
		return c.emit(opConst, len(c.e.consts)-1, from)
	}
	slot, ok := c.known(name)
	if !ok {
		return c.noName(name, from, isFunc)
	}
	c.e.uses = append(c.e.uses, slot)
	return c.emit(opSlot, slot, from)
}

func (c *compiler) bracket(from int) *fault {
	if f := c.sum(); f != nil {
		return f
	}
	c.skip()
	if !c.take(")") {
		if c.pos == len(c.src) {
			return &fault{off: from, n: 1, found: "a ( that is not closed", want: ")"}
		}
		return c.surplus()
	}
	return nil
}

func (c *compiler) call(code opcode, from int) *fault {
	c.skip()
	open := c.pos
	c.pos++
	c.calls++
	defer func() { c.calls-- }()
	args := 0
	for {
		if f := c.sum(); f != nil {
			return f
		}
		args++
		c.skip()
		if c.take(",", ";") {
			continue
		}
		break
	}
	if !c.take(")") {
		if c.pos == len(c.src) {
			return &fault{off: open, n: 1, found: "a ( that is not closed", want: ")"}
		}
		return c.surplus()
	}
	several := code == opMin || code == opMax
	if args > 1 && !several || args > maxArgs {
		return &fault{off: from, n: c.pos - from, found: "too many arguments", want: "one, or up to 16 for min and max"}
	}
	return c.emit(code, args, from)
}

// literal reads a number with the unit that follows it, if any.
func (c *compiler) literal() (d decimal, p product, ok bool, f *fault) {
	d, n, f := scanNumber(c.src[c.pos:])
	if f == nil && n > 0 && !(c.calls > 0 && strings.HasPrefix(c.src[c.pos+n:], ",")) {
		f = afterNumber(c.src[c.pos:], n)
	}
	if f != nil {
		return d, p, true, f.at(c.pos)
	}
	if n == 0 {
		return d, p, false, nil
	}
	c.pos += n
	at := c.pos + spaces(c.src[c.pos:])
	if !startsUnit(c.src[at:]) {
		return d, p, true, nil
	}
	r := unitReader{src: c.src[at:], names: func(s string) bool { _, ok := c.known(s); return ok }}
	if p, f = r.list(); f != nil {
		return d, p, true, f.at(at)
	}
	if r.pos > maxUnitText {
		return d, p, true, (&fault{n: r.pos, found: "a unit of more than 120 bytes", want: "a shorter unit"}).at(at)
	}
	c.pos = at + r.pos
	return d, p.settle(), true, nil
}

func (c *compiler) constant(d decimal, p product, from int) *fault {
	v, f := measure(d, p)
	if f != nil {
		f.off, f.n = from, c.pos-from
		return f
	}
	c.e.consts = append(c.e.consts, number{si: v.SI, rat: v.Exact, dim: v.Dim, kind: v.Kind})
	return c.emit(opConst, len(c.e.consts)-1, from)
}

func (c *compiler) missing() *fault {
	if c.pos == len(c.src) {
		return &fault{off: c.pos, found: "the end", want: "a number, a name or ("}
	}
	_, w := utf8.DecodeRuneInString(c.src[c.pos:])
	return &fault{off: c.pos, n: w, found: quote(c.src[c.pos : c.pos+w]), want: "a number, a name or ("}
}

func (c *compiler) noName(name string, from int, isFunc bool) *fault {
	f := &fault{off: from, n: len(name), name: name, found: quote(name) + " is not defined", want: "a name given in the case"}
	if isFunc {
		f.found, f.want, f.name = quote(name)+" without its argument", name+"( … )", ""
		return f
	}
	sym, n := symbolAt(c.src[from:])
	if _, _, ok := lookup(sym); ok && n == len(name) {
		f.found, f.want, f.name = quote(name)+" is a unit", "a number before it", ""
		f.replace, f.fix = "1 "+name, true
	}
	return f
}

// surplus says what stands where an operator should.
func (c *compiler) surplus() *fault {
	rest := c.src[c.pos:]
	_, w := utf8.DecodeRuneInString(rest)
	f := &fault{off: c.pos, n: w, found: quote(rest[:w]), want: "an operator: + - * / ^"}
	switch name := identifier(rest); {
	case rest[0] == ')':
		f.found, f.want = "a ) that nothing opens", "an operator or the end"
	case name != "":
		f.n, f.found = len(name), quote(name)
		f.replace, f.fix = "* "+name, true
	case rest[0] == '(':
		f.found, f.replace, f.fix = "a (", "* (", true
	case digitsAt(rest, 0) > 0:
		f.found = "a number"
	}
	return f
}

// identifier returns the name s starts with: letters, digits, _, and dots
// inside.
func identifier(s string) string {
	for i, r := range s {
		switch {
		case r == utf8.RuneError:
			return s[:i]
		case unicode.IsLetter(r), r == '_':
		case i > 0 && unicode.IsDigit(r):
		case i > 0 && r == '.' && nameGoesOn(s[i+1:]):
		default:
			return s[:i]
		}
	}
	return s
}

func nameGoesOn(s string) bool {
	r, _ := utf8.DecodeRuneInString(s)
	return r != utf8.RuneError && (unicode.IsLetter(r) || unicode.IsDigit(r) || r == '_')
}

// IsName reports whether s can be used as a name in expressions.
func IsName(s string) bool { return s != "" && identifier(s) == s && !Reserved(s) }
