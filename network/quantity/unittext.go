package quantity

import (
	"math/big"
	"slices"
	"strings"
	"unicode/utf8"
)

// A product is a unit as written, resolved: rat·10^exp10·π^pi in SI.
type product struct {
	rat   *big.Rat // nil: 1, as in most units
	exp10 int
	pi    int
	dim   Dim
	kind  Kind
	zero  *big.Rat // where the scale of a level starts, in K; nil at 0
	n     int      // factors
}

// A unitReader reads one unit. In a text of its own (names nil) the unit is
// everything up to the end. In an expression it ends where an operator starts;
// see the package comment for the rule.
type unitReader struct {
	src   string
	pos   int
	names func(string) bool // given names of the expression
	depth int
	over  bool // starts with its denominator: "0.004 /K"
}

// Bounds of a unit as written.
const (
	maxUnitText  = 120
	maxUnitDepth = 8
	maxUnitPower = maxPower
	maxUnitBits  = 10000 // of the factor: nested powers of a percentage grow without a dimension to stop them
)

// parseUnit reads all of s as a unit.
func parseUnit(s string) (product, *fault) {
	r := unitReader{src: s, over: strings.HasPrefix(s, "/")}
	if len(s) > maxUnitText {
		return product{}, &fault{n: len(s), found: "a unit of more than 120 bytes", want: "a shorter unit"}
	}
	p, f := r.list()
	if f != nil {
		return p, f
	}
	if r.pos < len(s) {
		return p, r.stray()
	}
	return p.settle(), nil
}

// settle decides what a lone unit is, and that a compound one is a difference.
func (p product) settle() product {
	if p.n > 1 || p.kind == Plain {
		p.zero = nil
		p.kind = Plain
		if p.dim == dimKelvin {
			p.kind = Difference
		}
	}
	return p
}

// list reads factors up to a closing parenthesis or the end.
func (r *unitReader) list() (product, *fault) {
	p, f := r.first()
	if f != nil {
		return p, f
	}
	var below []string // the factors below the line
	at := 0            // where they start
	for {
		start := r.pos
		op, f := r.operator()
		if f != nil {
			return p, f
		}
		if op == 0 {
			r.pos = start
			return p, nil
		}
		from := r.pos + spaces(r.src[r.pos:])
		q, f := r.factor()
		if f != nil {
			return p, f
		}
		if below != nil {
			return p, r.unclear(at, append(below, r.src[from:r.pos]))
		}
		if op == '/' {
			at, below = from, []string{r.src[from:r.pos]}
		}
		if f := p.times(q, op == '/'); f != nil {
			return p, f.at(start)
		}
	}
}

func (r *unitReader) first() (product, *fault) {
	if r.over && r.pos == 0 {
		return product{n: 1}, nil
	}
	return r.factor()
}

func (p *product) times(q product, under bool) *fault {
	sign := 1
	if under {
		sign = -1
	}
	if q.rat != nil {
		if p.rat == nil {
			p.rat = one()
		}
		if under {
			p.rat.Quo(p.rat, q.rat)
		} else {
			p.rat.Mul(p.rat, q.rat)
		}
	}
	p.exp10 += sign * q.exp10
	p.pi += sign * q.pi
	p.n += q.n
	var ok bool
	if p.dim, ok = p.dim.plus(q.dim, sign); !ok {
		return &fault{n: 1, found: "a unit with a power beyond ±100", want: "a unit of ordinary powers"}
	}
	return nil
}

// operator reads what joins the next factor: '*' or '/', or 0 where the unit
// ends here.
func (r *unitReader) operator() (byte, *fault) {
	gap := spaces(r.src[r.pos:])
	r.pos += gap
	rest := r.src[r.pos:]
	c, w := utf8.DecodeRuneInString(rest)
	switch c {
	case '·', '⋅':
		if r.names != nil {
			if _, ok := unitAhead(rest[w+spaces(rest[w:]):]); !ok {
				return 0, nil // the product of an expression
			}
		}
		r.pos += w
		return '*', nil
	case '*', '/', '∕':
		return r.sign(c, w, gap)
	case '-', '.':
		if r.names == nil && startsUnit(rest[w:]) {
			return 0, &fault{off: r.pos, n: w, found: "a " + string(c) + " between units", want: "· between units", replace: "·", fix: true}
		}
		return 0, nil
	case '(':
		if r.names == nil && gap == 0 {
			return 0, &fault{off: r.pos, n: w, found: "a ( with nothing before it", want: "· or / before it"}
		}
		return 0, nil
	}
	if startsUnit(rest) {
		return '*', nil
	}
	return 0, nil
}

// sign decides whether * or / goes on with the unit or belongs to the
// expression around it: it goes on where it touches both neighbours and what
// follows is a unit.
func (r *unitReader) sign(c rune, w, gap int) (byte, *fault) {
	op := byte('/')
	if c == '*' {
		op = '*'
	}
	if r.names == nil {
		r.pos += w
		return op, nil
	}
	next := r.src[r.pos+w:]
	if r.depth == 0 && (gap > 0 || spaces(next) > 0) {
		return 0, nil
	}
	words, ok := unitAhead(next)
	if !ok {
		return 0, nil
	}
	if !slices.ContainsFunc(words, func(s string) bool { return !r.names(s) }) {
		return 0, &fault{off: r.pos + w, n: len(words[0]),
			found: words[0] + " is both a unit and a name here",
			want:  "spaces around the " + string(c) + " for the name, · instead of it for the unit",
		}
	}
	r.pos += w
	return op, nil
}

// unitAhead reports whether s starts with one unit factor, and the symbols in
// it.
func unitAhead(s string) (words []string, ok bool) {
	if strings.HasPrefix(s, "(") {
		r := unitReader{src: s}
		if _, f := r.group(); f != nil {
			return nil, false
		}
		words = strings.FieldsFunc(s[:r.pos], func(c rune) bool { return !isSymbol(c) })
		return words, len(words) > 0 // (1) is no unit
	}
	sym, _ := symbolAt(s)
	if _, _, ok := lookup(sym); !ok {
		return nil, false
	}
	return []string{sym}, true
}

// unclear says that W/m·K may mean two things and offers W/(m·K).
func (r *unitReader) unclear(at int, below []string) *fault {
	end := r.pos
	for {
		op, f := r.operator()
		if f != nil || op == 0 {
			break
		}
		from := r.pos + spaces(r.src[r.pos:])
		if _, f := r.factor(); f != nil {
			break
		}
		end = r.pos
		below = append(below, r.src[from:end])
	}
	return &fault{off: at, n: end - at,
		found: "how much of " + quote(r.src[:end]) + " is below the line is not clear", want: "parentheses around what is",
		replace: "(" + strings.Join(below, "·") + ")", fix: true,
	}
}

// factor reads a symbol, 1, or a list in parentheses, with its power.
func (r *unitReader) factor() (product, *fault) {
	r.pos += spaces(r.src[r.pos:])
	start := r.pos
	rest := r.src[r.pos:]
	switch {
	case strings.HasPrefix(rest, "("):
		return r.group()
	case strings.HasPrefix(rest, "1") && digitsAt(rest, 0) == 1:
		r.pos++
		return product{n: 1}, nil
	}
	sym, n := symbolAt(rest)
	if n == 0 {
		return product{}, r.stray()
	}
	u, pre, ok := lookup(sym)
	if !ok {
		return product{}, r.unknown(sym, n)
	}
	r.pos += n
	p := product{rat: u.ratio(), exp10: int(u.exp10) + int(pre), pi: int(u.pi), dim: u.dim, kind: u.kind, zero: u.zero(), n: 1}
	r.suffix(&p)
	e, f := r.power()
	if f != nil {
		return p, f
	}
	if e == 1 {
		return p, nil
	}
	if u.degree && e != -1 {
		return p, &fault{off: start, n: n, found: "a power of " + sym, want: "K, which takes one", replace: "K", fix: u.num == 1}
	}
	p.kind, p.zero = Plain, nil
	return p, p.raise(e, start)
}

// group reads a list in parentheses.
func (r *unitReader) group() (product, *fault) {
	start := r.pos
	if r.depth++; r.depth > maxUnitDepth {
		return product{}, &fault{off: start, n: 1, found: "parentheses more than 8 deep", want: "a plainer unit"}
	}
	r.pos++
	names := r.names
	r.names = nil // inside, everything is unit
	p, f := r.list()
	r.names = names
	if f != nil {
		return p, f
	}
	r.pos += spaces(r.src[r.pos:])
	if !strings.HasPrefix(r.src[r.pos:], ")") {
		if r.pos < len(r.src) {
			return p, r.stray()
		}
		return p, &fault{off: start, n: 1, found: "a ( that is not closed", want: ")"}
	}
	r.pos++
	r.depth--
	e, f := r.power()
	if f != nil || e == 1 {
		return p, f
	}
	p.kind, p.zero = Plain, nil
	return p, p.raise(e, start)
}

// suffix reads the (g) or (a) of a pressure.
func (r *unitReader) suffix(p *product) {
	if p.dim != dimPressure || p.kind != Plain {
		return
	}
	at := r.pos + spaces(r.src[r.pos:])
	switch {
	case strings.HasPrefix(r.src[at:], "(g)"):
		p.kind = Gauge
	case strings.HasPrefix(r.src[at:], "(a)"):
		p.kind = Absolute
	default:
		return
	}
	r.pos = at + len("(g)")
}

func (p *product) raise(e, off int) *fault {
	if p.size()*max(e, -e) > maxUnitBits {
		return &fault{off: off, n: 1, found: "a unit with a factor beyond all bounds", want: "a unit of ordinary powers"}
	}
	if p.rat != nil {
		p.rat = ratPower(p.rat, e)
	}
	p.exp10 *= e
	p.pi *= e
	p.n++ // no longer a lone unit
	var ok bool
	if p.dim, ok = p.dim.times(e); !ok {
		return &fault{off: off, n: 1, found: "a unit with a power beyond ±100", want: "a unit of ordinary powers"}
	}
	return nil
}

// size is about how many bits the factor takes.
func (p *product) size() int {
	n := 4 * max(p.exp10, -p.exp10)
	if p.rat != nil {
		n += bits(p.rat)
	}
	return n
}

// factor is the whole factor but for π.
func (p *product) factor() *big.Rat {
	r := one()
	if p.rat != nil {
		r.Set(p.rat)
	}
	return scale10(r, p.exp10)
}

// stray says what stands where a unit should.
func (r *unitReader) stray() *fault {
	r.pos += spaces(r.src[r.pos:])
	rest := r.src[r.pos:]
	if rest == "" {
		return &fault{off: len(r.src), found: "the end", want: "a unit"}
	}
	c, w := utf8.DecodeRuneInString(rest)
	if c == ')' {
		return &fault{off: r.pos, n: 1, found: "a ) that nothing opens", want: "a unit", replace: "", fix: r.pos == len(r.src)-1 && r.pos > 0}
	}
	if n := digitsAt(rest, 0); n > 0 {
		return &fault{off: r.pos, n: n, found: "a number inside a unit", want: "a unit"}
	}
	return &fault{off: r.pos, n: w, found: quote(rest[:w]), want: "a unit"}
}
