package quantity

import (
	"strconv"
	"unicode/utf8"
)

// maxQuoted bounds how much of a text a message repeats.
const maxQuoted = 40

// quote shows a piece of the text in a message.
func quote(s string) string {
	if utf8.RuneCountInString(s) > maxQuoted {
		s = string([]rune(s)[:maxQuoted]) + "…"
	}
	return strconv.Quote(s)
}
