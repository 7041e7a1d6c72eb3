package present

import (
	"strings"
	"unicode/utf8"
)

// clean is a string as every format shows it: on one line, and without
// characters that act on a page or a terminal instead of standing on it. Line
// breaks and tabs become spaces, other controls their pictures (␛), what turns
// the direction of writing and what is not UTF-8 becomes �.
func clean(s string) string {
	if isClean(s) {
		return s
	}
	return strings.Map(cleanRune, strings.ToValidUTF8(s, "\ufffd"))
}

func isClean(s string) bool {
	for _, r := range s {
		if r == utf8.RuneError || cleanRune(r) != r {
			return false
		}
	}
	return true
}

func cleanRune(r rune) rune {
	switch {
	case r == '\n' || r == '\t' || r == '\r' || r == '\u2028' || r == '\u2029' || r == '\u0085':
		return ' '
	case r < 0x20:
		return 0x2400 + r
	case r == 0x7f:
		return 0x2421
	case 0x80 <= r && r <= 0x9f, 0x202a <= r && r <= 0x202e, 0x2066 <= r && r <= 0x2069, r == 0x200e || r == 0x200f, r == 0xfeff:
		return 0xfffd
	}
	return r
}
