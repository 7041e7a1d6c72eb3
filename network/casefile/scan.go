package casefile

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// What a case may hold at most. All is checked before memory is taken for it.
const (
	maxBytes  = 1 << 20 // of the file
	maxDepth  = 32      // of nested lists and tables
	maxParts  = 16      // of a dotted key
	maxKeys   = 50_000
	maxValues = 300_000
	maxFaults = 20 // of syntax, after which scanning ends
)

// A scanner reads TOML into a tree in which every key and value knows its
// place. It goes through the text once, looks ahead no further than the end of
// a line, and takes time and memory in proportion to the text.
//
// It reads TOML 1.0 with line breaks and a last comma allowed inside { }, as the
// TOML library does, with which the tests compare it. The library itself gives no
// place for a value, takes about as long as all of Read does here, and can be made
// to take minutes or to overflow the stack.
type scanner struct {
	src    *source
	text   string
	pos    int
	depth  int
	keys   int
	values int
	root   *node
	cur    *members // the table that the last header opened
	faults []Diagnostic
	braces bool // the value being read stands in { }, not in a list
	broken bool // a fault of syntax: the tree is not whole
	slab   []node
	list   []*node // the items of the arrays being read
	items  []*node // slabs, like slab, of what is kept
	tables []members
	room   []key
	parts  []key // the parts of the key being read
}

// scan reads src. The tree is nil where the text breaks the bounds; whole is
// false where something in it could not be read.
func scan(src *source) (root *node, faults []Diagnostic, whole bool) {
	s := &scanner{src: src, text: src.text}
	if d, ok := src.bounded(); !ok {
		return nil, []Diagnostic{d}, false
	}
	if strings.HasPrefix(s.text, bom) {
		s.pos = len(bom)
	}
	s.root = s.newNode(kindTable, 0)
	s.root.table = &members{made: byHeader}
	s.cur = s.root.table
	for s.pos < len(s.text) && len(s.faults) < maxFaults {
		from := s.pos
		if !s.statement() {
			s.recover(from)
		}
	}
	s.broken = s.broken || s.pos < len(s.text) // too many faults to read on
	src.keys = s.keys
	return s.root, s.faults, !s.broken
}

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

// fault notes a fault of syntax and returns false.
func (s *scanner) fault(d Diagnostic, from, to int) bool {
	s.broken = true
	s.note(d, span{int32(from), int32(to)})
	return false
}

// note adds a diagnostic that leaves the tree whole.
func (s *scanner) note(d Diagnostic, at span) {
	if d.Code == "" {
		d.Code = "syntax"
	}
	s.faults = append(s.faults, s.src.place(d, at))
}

// recover goes to the next line that may begin a statement: the line in which
// the fault was found, where the statement began before it, or the one after.
func (s *scanner) recover(from int) {
	at := min(s.pos, len(s.text))
	s.depth, s.braces = 0, false
	if k := strings.LastIndexByte(s.text[:at], '\n') + 1; k > from {
		s.pos = k
	} else {
		s.pos = at
		s.skipLine()
		return
	}
	for s.pos < len(s.text) { // inside a list, a line need not begin anything
		line := s.pos
		s.blanks()
		rest := s.text[s.pos:min(len(s.text), s.pos+200)]
		rest, _, _ = strings.Cut(rest, "\n")
		if s.begins() && (rest[0] == '[' || strings.Contains(rest, "=")) {
			s.pos = line
			return
		}
		s.skipLine()
	}
}

// skipLine goes behind the next line end.
func (s *scanner) skipLine() {
	if k := strings.IndexByte(s.text[s.pos:], '\n'); k >= 0 {
		s.pos += k + 1
	} else {
		s.pos = len(s.text)
	}
}

// statement reads one header, one key with its value, or an empty line. On a
// fault s.pos is where it was found.
func (s *scanner) statement() bool {
	s.blanks()
	if s.pos == len(s.text) {
		return true
	}
	switch s.text[s.pos] {
	case '#', '\n', '\r':
		return s.lineEnd("")
	case '[':
		return s.header() && s.lineEnd("after the header")
	}
	return s.pair(s.cur) && s.lineEnd("after the value")
}

// blanks skips spaces and tabs.
func (s *scanner) blanks() {
	for s.pos < len(s.text) && (s.text[s.pos] == ' ' || s.text[s.pos] == '\t') {
		s.pos++
	}
}

// lineEnd reads what may stand before the end of a line: a comment.
func (s *scanner) lineEnd(where string) bool {
	s.blanks()
	if s.pos == len(s.text) {
		return true
	}
	switch s.text[s.pos] {
	case '#':
		return s.comment()
	case '\n':
		s.pos++
		return true
	case '\r':
		if strings.HasPrefix(s.text[s.pos:], "\r\n") {
			s.pos += 2
			return true
		}
		return s.fault(Diagnostic{Text: "a carriage return that ends no line"}, s.pos, s.pos+1)
	}
	end := s.restOfLine(s.pos)
	return s.fault(Diagnostic{Text: "unexpected " + quoted(s.text[s.pos:end]) + " " + where}, s.pos, end)
}

// restOfLine returns where the line ends, without a comment and spaces before it.
func (s *scanner) restOfLine(from int) int {
	line := s.text[from:]
	if k := strings.IndexAny(line, "#\n"); k >= 0 {
		line = line[:k]
	}
	return from + len(strings.TrimRight(line, " \t\r"))
}

// comment reads a comment with its line end.
func (s *scanner) comment() bool {
	from := s.pos
	s.skipLine()
	for i := from; i < s.pos; i++ {
		if c := s.text[i]; control(c) && !(c == '\n' || c == '\r' && i+1 < s.pos && s.text[i+1] == '\n') {
			s.pos = i
			return s.fault(controlFault(c), i, i+1)
		}
	}
	return true
}

// control reports a character that TOML allows nowhere; line ends are looked at
// by whoever reads lines.
func control(c byte) bool { return c < ' ' && c != '\t' || c == 0x7f }

func controlFault(c byte) Diagnostic {
	return Diagnostic{Text: fmt.Sprintf("a control character, 0x%02x", c), Hint: "delete it"}
}

// tooMany ends the scan.
func (s *scanner) tooMany(what string, most, at int) bool {
	s.fault(Diagnostic{Code: "too-many", Text: fmt.Sprintf("more than %d %s", most, what)}, at, at+1)
	s.pos = len(s.text)
	return false
}

// newMembers makes a table with room for the keys most have.
func (s *scanner) newMembers(made origin) *members {
	const usual = 4
	if len(s.tables) == 0 {
		s.tables = make([]members, 64)
		s.room = make([]key, 64*usual)
	}
	m := &s.tables[0]
	s.tables = s.tables[1:]
	m.made, m.keys = made, s.room[:0:usual]
	s.room = s.room[usual:]
	return m
}

// newNode takes a node from the slab.
func (s *scanner) newNode(k kind, at int) *node {
	if len(s.slab) == 0 {
		s.slab = make([]node, min(256, 16+s.values))
	}
	n := &s.slab[0]
	s.slab = s.slab[1:]
	s.values++
	n.kind, n.at = k, int32(at)
	return n
}
