package casefile

import (
	"errors"
	"fmt"
	"strings"
	"unicode/utf8"

	"github.com/BurntSushi/toml"
)

// A fault is what the library says of a text that is no TOML, with what the
// scanner was reading at the place it names.
type fault struct {
	*scanner        // that has gone as far as the fault, and no further
	full     string // the whole text
	at, end  int    // the place the library names
	says     string // the library's message, "" where only the scanner sticks
}

// syntax turns an error of the library about the text between from and to, which
// sc has scanned, into diagnostics, and tells where to read on.
func (s *source) syntax(sc *scanner, from, to int, err error) (list []Diagnostic, next int) {
	f := fault{scanner: sc, full: s.text, at: min(sc.pos, len(s.text)-1)}
	f.end = f.at + 1
	var e toml.ParseError
	switch {
	case errors.As(err, &e):
		f.says = e.Message
		f.at = max(from, min(from+e.Position.Start, to-1))
		f.end = min(to, f.at+max(1, e.Position.Len))
		f.scanner = newScanner(s, from, f.end)
		f.run()
	case err != nil:
		f.says = "the file cannot be read as TOML"
	}
	if f.mentions("already", "is not a table") {
		if list = s.stated(sc.twice); list != nil {
			return list, len(s.text)
		}
	}
	d, at := f.diagnose()
	if d.Code == "" {
		d.Code = "syntax"
	}
	return []Diagnostic{s.place(d, at)}, f.resume(d.Code)
}

// stated reports names that stand twice. Where the library lets one pass, as it
// does in some cases, one of the two values would be lost.
func (s *source) stated(list []twice) []Diagnostic {
	var diags []Diagnostic
	for _, t := range list[:min(len(list), maxFaults)] {
		text := "%s is defined twice, first on line %d"
		if t.through {
			text = "%s is not a table: it has a value on line %d"
		}
		d := Diagnostic{Code: "defined-twice", Text: fmt.Sprintf(text, quoted(t.name), s.place(Diagnostic{}, t.first).Line)}
		diags = append(diags, s.place(d, t.at))
	}
	return diags
}

func (f *fault) mentions(words ...string) bool {
	for _, w := range words {
		if strings.Contains(f.says, w) {
			return true
		}
	}
	return false
}

// diagnose tells what is wrong, and where.
func (f *fault) diagnose() (Diagnostic, span) {
	switch {
	case f.mentions("control characters", "NULL"):
		return f.control()
	case f.mentions("escape", "hexadecimal", "Escaped"):
		if d, at, ok := f.escape(); ok {
			return d, at
		}
	case f.mentions("out of range"):
		at := span{int32(f.at), int32(f.end)}
		return Diagnostic{Code: "range", Text: quoted(f.full[f.at:f.end]) + " is beyond the range of numbers"}, at
	}
	if f.quote >= 0 {
		return f.openQuote()
	}
	switch f.stage {
	case inHeader:
		return f.ofHeader()
	case afterHeader:
		return f.unexpected("after the header")
	case inKey:
		return f.ofKey()
	case inValue:
		return f.noValue()
	case afterValue:
		return f.afterValue()
	}
	return f.other()
}

// other is a fault that has no better message than the library's.
func (f *fault) other() (Diagnostic, span) {
	text := f.says
	if text == "" {
		text = "this is not TOML"
	}
	_, n := utf8.DecodeRuneInString(text)
	return Diagnostic{Text: brief(strings.ToLower(text[:n]) + text[n:])}, span{int32(f.at), int32(f.end)}
}

// control is about a character that TOML allows nowhere. The library names the
// place before it.
func (f *fault) control() (Diagnostic, span) {
	at := f.at
	for at < len(f.full)-1 && !control(f.full[at]) {
		at++
	}
	d := Diagnostic{Text: fmt.Sprintf("a control character, 0x%02x", f.full[at]), Hint: "delete it"}
	if f.full[at] == '\r' {
		d = Diagnostic{Text: "a carriage return that ends no line"}
	}
	return d, span{int32(at), int32(at + 1)}
}

func control(c byte) bool { return c < ' ' && c != '\t' && c != '\n' || c == 0x7f }

// escape is about a backslash; the library names the string up to it.
func (f *fault) escape() (d Diagnostic, at span, ok bool) {
	text := f.full[f.at:f.end]
	i := strings.LastIndexByte(text, '\\')
	if _, code, found := strings.Cut(f.says, `character '\u`); found { // of all that follow
		code, _, _ = strings.Cut(code, "'")
		i = max(strings.Index(text, `\u`+code), strings.Index(text, `\U`+code))
	} else if f.mentions("invalid escape: ") {
		i = max(strings.Index(text, `\ `), strings.Index(text, "\\\t"))
	}
	if i < 0 || i+1 >= len(text) || text[i+1] == '\n' {
		return d, at, false
	}
	_, n := utf8.DecodeRuneInString(text[i+1:])
	for most := map[byte]int{'x': 2, 'u': 4, 'U': 8}[text[i+1]]; most > 0 && i+1+n < len(text) && hex(text[i+1+n]); most-- {
		n++
	}
	d = Diagnostic{Code: "bad-escape", Text: quoted(text[i:i+1+n]) + " is not an escape", Hint: `a backslash is written \\`}
	return d, span{int32(f.at + i), int32(f.at + i + 1 + n)}, true
}

func hex(c byte) bool { return digit(c) || c|0x20 >= 'a' && c|0x20 <= 'f' }

// openQuote is about a quote that is not closed.
func (f *fault) openQuote() (Diagnostic, span) {
	from := f.quote
	if strings.HasPrefix(f.full[from:], `"""`) || strings.HasPrefix(f.full[from:], "'''") {
		return Diagnostic{Code: "open-quote", Text: "the text begun here is never closed by " + f.full[from:from+3]}, span{int32(from), int32(from + 3)}
	}
	line, _, _ := strings.Cut(f.full[from:], "\n")
	line = strings.TrimRight(line, " \t\r")
	d := Diagnostic{Code: "open-quote", Text: "the quote is not closed on this line"}
	if body := line[1:]; body != "" && !strings.ContainsAny(body, "#,]}=\\") {
		d.Fix = line + line[:1]
	}
	return d, span{int32(from), int32(from + len(line))}
}

// unexpected is about what follows a header or a value on its line.
func (f *fault) unexpected(where string) (Diagnostic, span) {
	end := max(f.restOfLine(f.pos), f.pos+1)
	return Diagnostic{Text: "unexpected " + quoted(f.full[f.pos:end]) + " " + where}, span{int32(f.pos), int32(end)}
}

// restOfLine returns where the line ends, without a comment and spaces before it.
func (f *fault) restOfLine(from int) int {
	line := f.full[from:]
	if k := strings.IndexAny(line, "#\n"); k >= 0 {
		line = line[:k]
	}
	return from + len(strings.TrimRight(line, " \t\r"))
}

// resume returns where the next statement may begin: on the line after the fault,
// or, where the fault lies in brackets over several lines, behind them. Whether
// they are closed at all is not known: a header ends them too, and a key with its
// value ends a list.
func (f *fault) resume(code string) int {
	at := min(max(f.at, f.pos), len(f.full))
	line := strings.LastIndexByte(f.full[:at], '\n') + 1
	switch {
	case code == "open-bracket" && line > f.stmt:
		return line // the line after the statement
	case line <= f.stmt || f.depth == 0:
		return f.src.nextLine(at)
	case f.inBraces():
		line = f.src.nextLine(line)
	}
	for closed := false; line < len(f.full); line = f.src.nextLine(line) {
		rest := f.full[line:min(len(f.full), line+200)]
		rest, _, _ = strings.Cut(rest, "\n")
		rest = strings.TrimLeft(rest, " \t")
		closes := strings.HasPrefix(rest, "}") || strings.HasPrefix(rest, "]")
		if closed && !closes || begins(rest) && (rest[0] == '[' || !f.inBraces() && strings.Contains(rest, "=")) {
			return line
		}
		closed = closed || closes
	}
	return line
}

func (s *source) nextLine(at int) int {
	if k := strings.IndexByte(s.text[at:], '\n'); k >= 0 {
		return at + k + 1
	}
	return len(s.text)
}

// begins reports whether a text looks like a key or a header.
func begins(text string) bool {
	text = strings.TrimLeft(text, "[")
	return text != "" && bare(text[0]) && !digit(text[0])
}
