package quantity

import (
	"math/big"
	"strconv"
	"strings"
)

// Bounds of a number as written: beyond them a text is refused before any
// arithmetic, so that "1e999999999" costs nothing.
const (
	maxDigits   = 400
	maxExponent = 400
)

// A decimal is a number as written: digits·10^exp.
type decimal struct {
	neg    bool
	digits string // without point, sign or leading zeros
	exp    int
}

// rat is the decimal times 10^exp10 as a fraction.
func (d decimal) rat(exp10 int) *big.Rat {
	n := new(big.Int)
	if len(d.digits) <= 18 {
		k, _ := strconv.ParseInt("0"+d.digits, 10, 64)
		n.SetInt64(k)
	} else {
		n.SetString(d.digits, 10)
	}
	if d.neg {
		n.Neg(n)
	}
	if e := d.exp + exp10; e < 0 {
		return new(big.Rat).SetFrac(n, pow10(-e))
	} else if e > 0 {
		n.Mul(n, pow10(e))
	}
	return new(big.Rat).SetInt(n)
}

// scanNumber reads an unsigned decimal at the start of s and returns its length.
// n is 0 where s does not start with one.
func scanNumber(s string) (d decimal, n int, f *fault) {
	whole := digitsAt(s, 0)
	n = whole
	digits := s[:whole]
	if n < len(s) && s[n] == '.' {
		frac := digitsAt(s, n+1)
		if whole+frac == 0 {
			return d, 0, nil
		}
		digits += s[n+1 : n+1+frac]
		d.exp = -frac
		n += 1 + frac
	}
	if n == 0 {
		return d, 0, nil
	}
	if len(digits) > maxDigits {
		return d, n, &fault{off: 0, n: n, found: "a number of more than 400 digits", want: "a shorter number"}
	}
	d.digits = strings.TrimLeft(digits, "0")
	e, m := scanExponent(s[n:])
	n += m
	if e > maxExponent || e < -maxExponent {
		return d, n, &fault{off: 0, n: n, found: "a number with an exponent beyond ±400", want: "a number of ordinary size"}
	}
	d.exp += e
	return d, n, nil
}

// scanExponent reads "e-3". An e without digits is left alone.
func scanExponent(s string) (e, n int) {
	if s == "" || (s[0] != 'e' && s[0] != 'E') {
		return 0, 0
	}
	n = 1
	neg := false
	if n < len(s) && (s[n] == '+' || s[n] == '-') {
		neg = s[n] == '-'
		n++
	}
	k := digitsAt(s, n)
	if k == 0 {
		return 0, 0
	}
	for _, c := range []byte(s[n : n+k]) {
		e = min(e*10+int(c-'0'), maxExponent+1)
	}
	if neg {
		e = -e
	}
	return e, n + k
}

// afterNumber refuses what looks like more of the number: a second point, a
// decimal comma, digits in groups.
func afterNumber(s string, n int) *fault {
	if n >= len(s) {
		return nil
	}
	c := s[n]
	digits := digitsAt(s, min(n+1, len(s)))
	switch {
	case c == '.':
		return &fault{off: n, n: 1, found: "a second decimal point", want: "one number"}
	case c == ',' && digits > 0 && digits != 3:
		return &fault{off: n, n: 1, found: "a comma in a number", want: "a decimal point", replace: ".", fix: true}
	case c == ',' && digits == 3:
		return &fault{off: n, n: 1, found: "a comma in a number", want: "a decimal point, and no sign between thousands"}
	case c == '_' && digits > 0, c == '\'' && digits > 0:
		return &fault{off: n, n: 1, found: "a mark between digits", want: "the digits without it", fix: true}
	}
	return nil
}

func digitsAt(s string, i int) int {
	n := i
	for n < len(s) && '0' <= s[n] && s[n] <= '9' {
		n++
	}
	return n - i
}

// scanSign reads a sign, the typographic minus included.
func scanSign(s string) (neg bool, n int) {
	switch {
	case strings.HasPrefix(s, "-"):
		return true, 1
	case strings.HasPrefix(s, "+"):
		return false, 1
	case strings.HasPrefix(s, "−"):
		return true, len("−")
	}
	return false, 0
}

// spaces returns how many bytes of white space s starts with.
func spaces(s string) int {
	return len(s) - len(strings.TrimLeftFunc(s, isSpace))
}

// isSpace counts the fixed and thin spaces of typeset numbers in.
func isSpace(c rune) bool {
	switch c {
	case ' ', '\t', '\n', '\r', '\u00a0', '\u2009', '\u202f':
		return true
	}
	return false
}
