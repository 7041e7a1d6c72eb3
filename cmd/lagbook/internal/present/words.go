package present

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// nbsp keeps what stands on its two sides on one line.
const (
	nbsp     = '\u00a0'
	nbspText = "\u00a0"
)

// polish is a string as pages for people set it, CSV apart: cleaned, the sign
// of a number a minus, its exponent a power of ten, and the space between a
// number and its unit one that no line is broken at.
func polish(s string) string {
	s = clean(s)
	if !strings.ContainsAny(s, " -e") {
		return s
	}
	return bindQuantities(setNumbers(s))
}

// polishHead is polish for the head of a column, which also keeps "/ °C" behind
// its name.
func polishHead(s string) string {
	return strings.ReplaceAll(polish(s), " / ", nbspText+"/"+nbspText)
}

// setNumbers turns -1.5e-7 into −1.5×10⁻⁷ where it stands as a number: not
// within a word, a date or a difference written without spaces.
func setNumbers(s string) string {
	if !strings.ContainsAny(s, "-e") {
		return s
	}
	var b strings.Builder
	before := ' '
	for s != "" {
		r, size := utf8.DecodeRuneInString(s)
		if opensNumber(before) {
			if n := numberLength(s); n > 0 {
				writeNumber(&b, s[:n])
				before, s = '0', s[n:]
				continue
			}
		}
		b.WriteRune(r)
		before, s = r, s[size:]
	}
	return b.String()
}

// opensNumber reports whether a number may start behind r.
func opensNumber(r rune) bool {
	return !unicode.IsLetter(r) && !unicode.IsNumber(r) && !strings.ContainsRune("_.-⁻:'\"`\\", r)
}

// numberLength is the length of the signed decimal number that s starts with, 0
// for none.
func numberLength(s string) int {
	n := 0
	if strings.HasPrefix(s, "-") {
		n = 1
	}
	start := n
	for n < len(s) && ('0' <= s[n] && s[n] <= '9' || s[n] == '.' && n+1 < len(s) && '0' <= s[n+1] && s[n+1] <= '9') {
		n++
	}
	if n == start {
		return 0
	}
	end := n
	if n < len(s) && s[n] == 'e' {
		n++
		if n < len(s) && (s[n] == '-' || s[n] == '+') {
			n++
		}
		power := n
		for n < len(s) && '0' <= s[n] && s[n] <= '9' {
			n++
		}
		if n > power {
			end = n
		}
	}
	after := strings.TrimPrefix(s[end:], "i") // of an imaginary part
	if r, _ := utf8.DecodeRuneInString(after); after != "" && (unicode.IsLetter(r) || unicode.IsDigit(r) || r == '_') {
		return 0 // "5e-7b": a name
	}
	if after = s[end:]; len(after) > 1 && after[0] == '.' && '0' <= after[1] && after[1] <= '9' {
		return 0 // "5e-7.2": no number
	}
	return end
}

// writeNumber writes a number with its minus and its power of ten.
func writeNumber(b *strings.Builder, s string) {
	if rest, negative := strings.CutPrefix(s, "-"); negative {
		b.WriteRune('−')
		s = rest
	}
	mantissa, power, scientific := strings.Cut(s, "e")
	b.WriteString(mantissa)
	if !scientific {
		return
	}
	b.WriteString(timesTen)
	power = strings.TrimPrefix(power, "+")
	if rest, negative := strings.CutPrefix(power, "-"); negative {
		b.WriteRune('⁻')
		power = rest
	}
	power = strings.TrimLeft(power[:len(power)-1], "0") + power[len(power)-1:]
	for i := range len(power) {
		b.WriteRune(raised[power[i]-'0'])
	}
}

const timesTen = "×10"

var raised = [10]rune{'⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'}

// bindQuantities makes the spaces within a quantity ones that do not break.
func bindQuantities(s string) string {
	if !strings.Contains(s, " ") {
		return s
	}
	words := strings.Split(s, " ")
	var b strings.Builder
	for i, w := range words {
		if i > 0 {
			if binds(words[i-1], w) {
				b.WriteRune(nbsp)
			} else {
				b.WriteByte(' ')
			}
		}
		b.WriteString(w)
	}
	return b.String()
}

// binds reports whether two words belong on one line: a number and what it
// counts, a sign and its number, an arrow and what it leads to.
func binds(first, second string) bool {
	r, _ := utf8.DecodeRuneInString(second)
	switch first {
	case "±", "<", ">", "≤", "≥", "≈", "=":
		return unicode.IsDigit(r) || r == '−'
	case "→", "·":
		return second != ""
	}
	return (unicode.IsLetter(r) || strings.ContainsRune("°%‰", r)) && endsInNumber(first)
}

// endsInNumber reports whether the end of a word is a number by itself.
func endsInNumber(w string) bool {
	if i := strings.LastIndex(w, timesTen); i >= 0 && strings.Trim(w[i+len(timesTen):], "⁻⁰¹²³⁴⁵⁶⁷⁸⁹") == "" {
		return true
	}
	rest := strings.TrimRight(w, "0123456789.")
	if rest == w || strings.HasSuffix(w, ".") { // "1." numbers a point or ends a sentence
		return false
	}
	r, _ := utf8.DecodeLastRuneInString(rest)
	return rest == "" || !unicode.IsLetter(r) && r != '_'
}

// plainSpaces undoes bindings, for a format that has no space to bind with.
func plainSpaces(s string) string { return strings.ReplaceAll(s, nbspText, " ") }
