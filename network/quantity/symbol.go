package quantity

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

func isSymbol(c rune) bool {
	return unicode.IsLetter(c) || c == '_' || c == '°' || c == '℃' || c == '℉' || c == '‰' || c == '%' || c == 'Δ'
}

func startsUnit(s string) bool {
	c, _ := utf8.DecodeRuneInString(s)
	return c != utf8.RuneError && isSymbol(c)
}

// symbolAt returns the symbol s starts with and the bytes it takes: letters,
// or a symbol with digits or a space in it, such as inH2O or "US gal".
func symbolAt(s string) (string, int) {
	n := letters(s)
	if n == 0 {
		return "", 0
	}
	word := s[:n]
	if word == "US" || word == "imp" || word == "°" {
		if two, k := twoWords(word, s[n:]); k > 0 {
			return two, n + k
		}
	}
	if d := digitsAt(s, n); d > 0 {
		if k := n + d + letters(s[n+d:]); k > n+d && isUnit(s[:k]) {
			return s[:k], k
		}
	}
	return word, n
}

// twoWords completes "US gal", "US fl oz" and "° C".
func twoWords(first, rest string) (sym string, n int) {
	gap := spaces(rest)
	k := letters(rest[gap:])
	if k == 0 {
		return "", 0
	}
	second := rest[gap : gap+k]
	if first == "°" {
		sym = first + second
	} else {
		sym = first + " " + second
	}
	if isUnit(sym) {
		return sym, gap + k
	}
	if sym += " oz"; isUnit(sym) && strings.HasPrefix(rest[gap+k:], " oz") {
		return sym, gap + k + len(" oz")
	}
	return "", 0
}

func isUnit(sym string) bool {
	_, ok := plainUnit(sym)
	return ok
}

func letters(s string) int {
	for i, c := range s {
		if !isSymbol(c) || c == utf8.RuneError || (i > 0 && (c == '%' || c == '‰')) {
			return i
		}
		if c == '%' || c == '‰' {
			return i + utf8.RuneLen(c)
		}
	}
	return len(s)
}
