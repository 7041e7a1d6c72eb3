package casefile

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// value reads one value; nil after a fault.
func (s *scanner) value() *node {
	if s.values >= maxValues {
		s.tooMany("values", maxValues, s.pos)
		return nil
	}
	from := s.pos
	if from == len(s.text) {
		s.fault(Diagnostic{Text: "the file ends where a value is expected"}, max(0, from-1), from)
		return nil
	}
	switch c := s.text[from]; c {
	case '"', '\'':
		if strings.HasPrefix(s.text[from:], `"""`) || strings.HasPrefix(s.text[from:], "'''") {
			return s.longString(c)
		}
		return s.quotedString(c)
	case '[':
		return s.nested(s.array)
	case '{':
		return s.nested(s.inline)
	case '\n', '\r', '#':
		s.fault(Diagnostic{Text: "a value is missing"}, max(0, from-1), from)
		return nil
	}
	return s.plain()
}

// nested reads a list or a table, counting how deep it lies.
func (s *scanner) nested(read func() *node) *node {
	if s.depth == maxDepth {
		s.fault(Diagnostic{Code: "too-deep", Text: fmt.Sprintf("lists and tables nested more than %d deep", maxDepth)}, s.pos, s.pos+1)
		s.skipLine() // what nests deeper on this line would be reported again and again
		return nil
	}
	s.depth++
	n := read()
	s.depth--
	return n
}

// gap skips blanks, line ends and comments inside brackets.
func (s *scanner) gap() bool {
	for s.pos < len(s.text) {
		switch c := s.text[s.pos]; {
		case c == ' ' || c == '\t' || c == '\n':
			s.pos++
		case c == '\r' && strings.HasPrefix(s.text[s.pos:], "\r\n"):
			s.pos += 2
		case c == '#':
			if !s.comment() {
				return false
			}
		default:
			return true
		}
	}
	return true
}

// take makes the items of an array of what has been gathered in s.list.
func (s *scanner) take(from int) []*node {
	n := len(s.list) - from
	if n == 0 {
		return nil
	}
	if len(s.items) < n {
		s.items = make([]*node, max(n, 128))
	}
	items := s.items[:n:n]
	s.items = s.items[n:]
	copy(items, s.list[from:])
	return items
}

// array reads […].
func (s *scanner) array() *node {
	n := s.newNode(kindArray, s.pos)
	s.pos++
	outer, from := s.braces, len(s.list)
	s.braces = false
	defer func() { s.braces, s.list = outer, s.list[:from] }()
	for {
		if !s.gap() {
			return nil
		}
		if s.closes(n, ']') {
			n.items = s.take(from)
			return n
		}
		v := s.value()
		if v == nil {
			return nil
		}
		s.list = append(s.list, v)
		end := s.pos
		if !s.gap() {
			return nil
		}
		if s.closes(n, ']') {
			n.items = s.take(from)
			return n
		}
		if !s.comma(n, end, "list", "]") {
			return nil
		}
	}
}

// inline reads {…}.
func (s *scanner) inline() *node {
	n := s.newNode(kindTable, s.pos)
	n.table = s.newMembers(byHeader)
	outer := s.braces
	defer func() { s.braces = outer }()
	s.pos++
	for {
		if !s.gap() {
			return nil
		}
		if s.closes(n, '}') {
			break
		}
		s.braces = true
		if !s.pair(n.table) {
			return nil
		}
		end := s.pos
		if !s.gap() {
			return nil
		}
		if s.closes(n, '}') {
			break
		}
		if !s.comma(n, end, "table", "}") {
			return nil
		}
	}
	n.table.made = byBraces
	return n
}

// closes reads the closing bracket where it is next.
func (s *scanner) closes(n *node, bracket byte) bool {
	if s.pos == len(s.text) || s.text[s.pos] != bracket {
		return false
	}
	s.pos++
	n.end = int32(s.pos)
	return true
}

// comma reads the comma between items; end is where the last item ends.
func (s *scanner) comma(n *node, end int, what, closing string) bool {
	if s.pos < len(s.text) && s.text[s.pos] == ',' {
		s.pos++
		return true
	}
	if one := s.text[n.at:end]; !strings.Contains(one, "\n") && strings.Contains(s.text[end:s.pos], "\n") && s.begins() {
		// what stands on the next line is not part of it: the bracket is missing here
		return s.fault(Diagnostic{Code: "open-bracket", Text: "the " + what + " is not closed by " + closing, Fix: one + closing}, int(n.at), end)
	}
	begun := s.src.place(Diagnostic{}, span{n.at, n.at + 1}).Line
	if s.pos == len(s.text) {
		return s.fault(Diagnostic{Code: "open-bracket", Text: "the " + what + " begun here is never closed by " + closing}, int(n.at), int(n.at)+1)
	}
	_, size := utf8.DecodeRuneInString(s.text[s.pos:])
	found := s.text[s.pos : s.pos+size]
	d := Diagnostic{Text: fmt.Sprintf(`expected "," or %q, found %s`, closing, quoted(found))}
	if strings.Contains(`"'[{`, found) || digit(found[0]) {
		d.Text = "a comma is missing before this"
	}
	if here := s.src.place(Diagnostic{}, span{int32(s.pos), int32(s.pos + 1)}).Line; here != begun {
		d.Text += fmt.Sprintf(" in the %s begun on line %d", what, begun)
	}
	return s.fault(d, s.pos, s.pos+size)
}
