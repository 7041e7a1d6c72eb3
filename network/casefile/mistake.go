package casefile

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// ofHeader is about a header that is not closed, or without a name.
func (f *fault) ofHeader() (Diagnostic, span) {
	closing := "]"
	if strings.HasPrefix(f.full[f.stmt:], "[[") {
		closing = "]]"
	}
	if f.nameless() {
		return f.noName("a table")
	}
	if d, at, ok := f.bareName(int(f.parts[len(f.parts)-1].at), "]"); ok {
		return d, at
	}
	end := f.restOfLine(f.pos)
	d := Diagnostic{Text: `expected "` + closing + `" at the end of the table's name`}
	at := f.pos
	switch {
	case end <= f.pos || f.full[f.pos:end] == "]":
		at, d.Fix = f.stmt, strings.TrimRight(f.full[f.stmt:f.pos], " \t")+closing
	}
	return d, span{int32(at), int32(max(end, f.pos+1))}
}

// bareName is about a name that begins at a place and goes on to a mark, and
// needs quotes; ok is false where that is not what is there.
func (f *fault) bareName(from int, to string) (d Diagnostic, at span, ok bool) {
	line, _, _ := strings.Cut(f.full[from:min(len(f.full), from+longest)], "\n")
	word, _, found := strings.Cut(line, to)
	word = strings.TrimRight(word, " \t")
	if !found || bareStart(word) == word || strings.ContainsAny(word, "\"'.,:[]{}=#\\\r") {
		return d, at, false
	}
	return Diagnostic{Text: "a name with anything but a to z, 0 to 9, _ and - is written in quotes", Fix: basic(word)}, span{int32(from), int32(from + len(word))}, true
}

// nameless reports whether a part of a key is missing where the scanner sticks.
func (f *fault) nameless() bool {
	return len(f.parts) == 0 || strings.HasSuffix(strings.TrimRight(f.full[:f.pos], " \t"), ".")
}

// noName is about a part of a key that is not there, or begins with what must be
// in quotes.
func (f *fault) noName(of string) (Diagnostic, span) {
	if f.pos >= len(f.full) {
		return Diagnostic{Text: "the file ends where the name of " + of + " is expected"}, span{int32(f.pos - 1), int32(f.pos)}
	}
	_, n := utf8.DecodeRuneInString(f.full[f.pos:])
	at := span{int32(f.pos), int32(f.pos + n)}
	found := f.full[f.pos : f.pos+n]
	if strings.Contains("=].\n\r", found) {
		return Diagnostic{Text: "the name of " + of + " is missing"}, at
	}
	for _, to := range []string{"=", "]"} {
		if d, at, ok := f.bareName(f.pos, to); ok {
			return d, at
		}
	}
	return Diagnostic{Text: quoted(found) + " cannot stand in a name without quotes"}, at
}

// ofKey is about a key that no = follows, or that is none.
func (f *fault) ofKey() (Diagnostic, span) {
	if f.inBraces() && f.done > 0 && f.done+1 < len(f.full) && f.full[f.done] == ',' && digit(f.full[f.done-1]) && digit(f.full[f.done+1]) && f.isPlain() {
		return f.unquoted(f.val) // 0,9: a decimal comma
	}
	if f.nameless() {
		return f.noName("a key")
	}
	last := f.parts[len(f.parts)-1]
	if rest := f.full[last.at:]; strings.HasPrefix(rest, `"""`) || strings.HasPrefix(rest, "'''") {
		return Diagnostic{Text: "a name in triple quotes"}, span{last.at, last.at + 3}
	}
	d := Diagnostic{Text: "expected \"=\" after " + quoted(last.name)}
	if f.pos < len(f.full) && f.full[f.pos] == ':' {
		d.Fix = "="
		return d, span{int32(f.pos), int32(f.pos + 1)}
	}
	if name, at, ok := f.bareName(int(last.at), "="); ok {
		return name, at
	}
	return d, last.span
}

// inBraces reports whether the innermost bracket is that of a table.
func (f *fault) inBraces() bool { return f.depth > 0 && f.full[f.opens[f.depth-1]] == '{' }

// isPlain reports whether the last value is one without quotes.
func (f *fault) isPlain() bool {
	return f.val < len(f.full) && strings.IndexByte("\"'[{", f.full[f.val]) < 0
}

// noValue is about a value that is missing or is none.
func (f *fault) noValue() (Diagnostic, span) {
	if f.pos >= len(f.full) && f.depth > 0 {
		return f.neverClosed()
	}
	if f.pos >= len(f.full) {
		return Diagnostic{Text: "the file ends where a value is expected"}, span{int32(f.pos - 1), int32(f.pos)}
	}
	switch f.full[f.pos] {
	case '\n', '\r', '#':
		return Diagnostic{Text: "a value is missing"}, span{int32(f.pos - 1), int32(f.pos)}
	case ',', ']', '}':
		return Diagnostic{Text: "a value is missing before this"}, span{int32(f.pos), int32(f.pos + 1)}
	}
	return f.unquoted(f.pos)
}

// afterValue is about what follows a value, or about the value itself.
func (f *fault) afterValue() (Diagnostic, span) {
	switch sameLine := !strings.Contains(f.full[f.val:f.at], "\n"); {
	case f.depth > 0 && f.mentions("EOF", "end of file"):
		return f.neverClosed()
	case f.isPlain() && sameLine:
		return f.unquoted(f.val)
	case f.depth == 0:
		return f.unexpected("after the value")
	}
	return f.comma()
}

// bracket returns where the innermost bracket begins, and the words for it.
func (f *fault) bracket() (open int, what, closing string) {
	open = int(f.opens[f.depth-1])
	if f.full[open] == '{' {
		return open, "table", "}"
	}
	return open, "list", "]"
}

func (f *fault) neverClosed() (Diagnostic, span) {
	open, what, closing := f.bracket()
	return Diagnostic{Code: "open-bracket", Text: "the " + what + " begun here is never closed by " + closing}, span{int32(open), int32(open + 1)}
}

// comma is about a comma or a bracket that is missing.
func (f *fault) comma() (Diagnostic, span) {
	open, what, closing := f.bracket()
	if f.pos >= len(f.full) {
		return f.neverClosed()
	}
	if one := f.full[open:f.done]; !strings.Contains(one, "\n") && strings.Contains(f.full[f.done:f.pos], "\n") && begins(f.full[f.pos:]) {
		// what stands on the next line is not part of it: the bracket is missing here
		return Diagnostic{Code: "open-bracket", Text: "the " + what + " is not closed by " + closing, Fix: one + closing}, span{int32(open), int32(f.done)}
	}
	_, size := utf8.DecodeRuneInString(f.full[f.pos:])
	found := f.full[f.pos : f.pos+size]
	d := Diagnostic{Text: fmt.Sprintf(`expected "," or %q, found %s`, closing, quoted(found))}
	if strings.Contains(`"'[{`, found) || digit(found[0]) {
		d.Text = "a comma is missing before this"
	}
	if strings.Contains(f.full[open:f.pos], "\n") {
		d.Text += fmt.Sprintf(" in the %s begun on line %d", what, f.src.place(Diagnostic{}, span{int32(open), int32(open + 1)}).Line)
	}
	return d, span{int32(f.pos), int32(f.pos + size)}
}
