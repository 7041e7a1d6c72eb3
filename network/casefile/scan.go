package casefile

import (
	"fmt"
	"strings"
)

// What a case may hold at most. All is checked before the TOML library sees it,
// which takes minutes, gigabytes or the whole stack for texts made to that end.
const (
	maxBytes  = 1 << 20  // of the file
	maxDepth  = 32       // of nested lists and tables
	maxParts  = 16       // of a dotted key
	maxKeys   = 50_000   // parts of keys and headers
	maxValues = 300_000  // of all kinds
	maxSpelt  = 1000     // keys with escapes, each decoded by itself
	maxPaths  = 16 << 20 // bytes of all full names: the library spells out each
	maxFaults = 20       // of syntax, after which reading ends
)

// A scanner goes through the text once and notes where every key and value
// stands: a tree without values, which the TOML library fills (decode.go). It
// knows as much of TOML as it takes to skip over strings, comments and brackets;
// what it skips it does not judge. It holds the bounds above, and takes time and
// memory in proportion to the text.
//
// Where the text is no TOML the scanner sticks. What it was reading then is in
// stage, stmt, val and opens, from which syntax.go tells what was meant.
type scanner struct {
	src   *source
	text  string // up to where to scan
	pos   int
	bound *Diagnostic // a bound that is broken
	root  *node
	cur   *members // the table that the last header opened
	twice []twice

	stage stage
	stmt  int             // where the statement begins
	val   int             // where the last value begins
	done  int             // where the last value that is complete ends
	quote int             // where the string begins that is not closed, or -1
	opens [maxDepth]int32 // where the brackets begin that are not closed
	depth int             // how many they are

	keys   int
	spelt  int // keys with escapes
	values int
	paths  int
	path   int // bytes of the full name of the table being read
	slab   []node
	list   []*node // the items of the arrays being read
	items  []*node // slabs, like slab, of what is kept
	tables []members
	room   []key
	parts  []key // the parts of the key being read
}

// stage is what a scanner is reading.
type stage uint8

const (
	inNothing stage = iota
	inHeader
	inKey
	inValue
	afterHeader
	afterValue
)

// A twice is a name stated again: where, and where it was first.
type twice struct {
	name    string
	at      span
	first   span
	through bool // a table is meant where the first is none
}

func newScanner(src *source, from, to int) *scanner {
	s := &scanner{src: src, text: src.text[:to], pos: from, stmt: from, quote: -1}
	s.root = s.newNode(kindTable, from)
	s.root.table = &members{made: byHeader}
	s.cur = s.root.table
	return s
}

// run scans to the end; false where the scanner sticks or breaks a bound.
func (s *scanner) run() bool {
	for s.pos < len(s.text) {
		if !s.statement() {
			return false
		}
	}
	return true
}

// statement reads one header, one key with its value, or an empty line.
func (s *scanner) statement() bool {
	s.stage = inNothing
	s.blanks()
	if s.pos == len(s.text) {
		return true
	}
	s.stmt = s.pos
	switch s.text[s.pos] {
	case '#', '\n', '\r':
		return s.lineEnd()
	case '[':
		s.stage = inHeader
		if !s.header() {
			return false
		}
		s.stage = afterHeader
		return s.lineEnd()
	}
	if !s.pair(s.cur, s.path) {
		return false
	}
	s.stage = afterValue
	return s.lineEnd()
}

// blanks skips spaces and tabs.
func (s *scanner) blanks() {
	for s.pos < len(s.text) && (s.text[s.pos] == ' ' || s.text[s.pos] == '\t') {
		s.pos++
	}
}

// lineEnd skips what may stand before the end of a line: a comment.
func (s *scanner) lineEnd() bool {
	s.blanks()
	if s.pos == len(s.text) {
		return true
	}
	switch s.text[s.pos] {
	case '#':
		s.skipLine()
		return true
	case '\n':
		s.pos++
		return true
	case '\r':
		if strings.HasPrefix(s.text[s.pos:], "\r\n") {
			s.pos += 2
			return true
		}
	}
	return false
}

// skipLine goes behind the next line end.
func (s *scanner) skipLine() {
	if k := strings.IndexByte(s.text[s.pos:], '\n'); k >= 0 {
		s.pos += k + 1
	} else {
		s.pos = len(s.text)
	}
}

// tooMany notes a bound that is broken and ends the scan.
func (s *scanner) tooMany(code, text string, at, end int) bool {
	d := s.src.place(Diagnostic{Code: code, Text: text}, span{int32(at), int32(end)})
	s.bound = &d
	return false
}

// weigh adds up what the library spells out in full for a key of some parts.
func (s *scanner) weigh(path, parts int) bool {
	if s.paths += path * parts; s.paths > maxPaths {
		return s.tooMany("too-many", fmt.Sprintf("the full names of all keys have more than %d bytes together", maxPaths), s.stmt, s.stmt+1)
	}
	return true
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
