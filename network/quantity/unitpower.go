package quantity

import (
	"strings"
	"unicode/utf8"
)

// power reads ^2, ^-1, ^(-1), ², ⁻¹, or a digit that touches the symbol.
func (r *unitReader) power() (int, *fault) {
	start := r.pos
	text, n := superscript(r.src[r.pos:])
	if n == 0 {
		text, n = caret(r.src[r.pos:])
	}
	if n == 0 {
		if digitsAt(r.src, r.pos) == 1 {
			text, n = r.src[r.pos:r.pos+1], 1
		}
	}
	if n == 0 {
		if strings.HasPrefix(r.src[r.pos:], "^") {
			return 0, &fault{off: start, n: 1, found: "a power of a unit", want: "a whole number after ^"}
		}
		return 1, nil
	}
	r.pos += n
	e := 0
	for _, c := range strings.TrimLeft(text, "+-") {
		e = min(e*10+int(c-'0'), maxUnitPower+1)
	}
	if text[0] == '-' {
		e = -e
	}
	if e == 0 || e > maxUnitPower || e < -maxUnitPower {
		return 0, &fault{off: start, n: n, found: "a power of " + text, want: "a power from -100 to 100, not 0"}
	}
	return e, r.afterPower(start, text)
}

// afterPower refuses m2K, which is meant as m²·K.
func (r *unitReader) afterPower(start int, text string) *fault {
	plain := r.src[start:r.pos] == text && text[0] != '-'
	if !plain || !startsUnit(r.src[r.pos:]) {
		return nil
	}
	return &fault{off: start, n: r.pos - start, found: "a symbol that touches a power", want: "· between units", replace: "^" + text + "·", fix: true}
}

// superscript reads ⁻¹ and the like as plain text.
func superscript(s string) (text string, n int) {
	for _, c := range s {
		i := strings.IndexRune("⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺", c)
		if i < 0 {
			break
		}
		plain, _ := utf8.DecodeRuneInString(s[n:])
		text += string("0123456789-+"[runeIndex("⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺", plain)])
		n += utf8.RuneLen(c)
	}
	if strings.Trim(text, "-+") == "" || strings.LastIndexAny(text, "-+") > 0 {
		return "", 0
	}
	return text, n
}

func runeIndex(s string, c rune) int { return utf8.RuneCountInString(s[:strings.IndexRune(s, c)]) }

// caret reads ^-1 or ^(-1).
func caret(s string) (text string, n int) {
	if !strings.HasPrefix(s, "^") {
		return "", 0
	}
	n = 1
	open := strings.HasPrefix(s[n:], "(")
	if open {
		n++
	}
	neg, w := scanSign(s[n:])
	n += w
	k := digitsAt(s, n)
	if k == 0 || k > 3 {
		return "", 0
	}
	text = s[n : n+k]
	n += k
	if neg {
		text = "-" + text
	}
	if open {
		if !strings.HasPrefix(s[n:], ")") {
			return "", 0
		}
		n++
	}
	if n < len(s) && s[n] == '.' && digitsAt(s, n+1) > 0 {
		return "", 0
	}
	return text, n
}
