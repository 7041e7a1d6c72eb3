package casefile

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// bounded checks what must hold before anything is read.
func (s *source) bounded() (Diagnostic, bool) {
	if len(s.text) > maxBytes {
		d := Diagnostic{File: s.file, Code: "too-large",
			Text: fmt.Sprintf("the file has %d bytes, more than the %d a case may have", len(s.text), maxBytes)}
		return d, false
	}
	if strings.HasPrefix(s.text, "\xff\xfe") || strings.HasPrefix(s.text, "\xfe\xff") {
		d := Diagnostic{Code: "not-utf8", Text: "the file is UTF-16", Hint: "save it as UTF-8"}
		return s.place(d, span{0, 1}), false
	}
	if utf8.ValidString(s.text) {
		return Diagnostic{}, true
	}
	at := 0
	for at < len(s.text) {
		r, n := utf8.DecodeRuneInString(s.text[at:])
		if r == utf8.RuneError && n == 1 {
			break
		}
		at += n
	}
	d := Diagnostic{Code: "not-utf8", Text: fmt.Sprintf("byte 0x%02x is not UTF-8", s.text[at]), Hint: "save the file as UTF-8"}
	return s.place(d, span{int32(at), int32(at + 1)}), false
}
