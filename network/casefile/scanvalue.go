package casefile

import (
	"fmt"
	"strings"
)

// value skips over one value and notes its place; nil where the scanner sticks.
// path is the length of the full name of its key.
func (s *scanner) value(path int) *node {
	if s.values >= maxValues {
		s.tooMany("too-many", fmt.Sprintf("more than %d values", maxValues), s.pos, s.pos+1)
		return nil
	}
	s.val = s.pos
	if s.pos == len(s.text) {
		return nil
	}
	switch c := s.text[s.pos]; c {
	case '"', '\'':
		return s.str(c)
	case '[':
		return s.nested(s.array, path)
	case '{':
		return s.nested(s.inline, path)
	}
	return s.plain()
}

// nested reads a list or a table, counting how deep it lies.
func (s *scanner) nested(read func(path int) *node, path int) *node {
	if s.depth == maxDepth {
		s.tooMany("too-deep", fmt.Sprintf("lists and tables nested more than %d deep", maxDepth), s.pos, s.pos+1)
		return nil
	}
	if !s.weigh(path, 1) {
		return nil
	}
	s.opens[s.depth] = int32(s.pos)
	s.depth++
	n := read(path)
	if n == nil {
		return nil
	}
	s.depth--
	n.end = int32(s.pos)
	s.done = s.pos
	return n
}

// gap skips blanks, line ends and comments inside brackets.
func (s *scanner) gap() {
	for s.pos < len(s.text) {
		switch c := s.text[s.pos]; {
		case c == ' ' || c == '\t' || c == '\n':
			s.pos++
		case c == '\r' && strings.HasPrefix(s.text[s.pos:], "\r\n"):
			s.pos += 2
		case c == '#':
			s.skipLine()
		default:
			return
		}
	}
}

// array reads […].
func (s *scanner) array(path int) *node {
	n := s.newNode(kindArray, s.pos)
	s.pos++
	from := len(s.list)
	for {
		s.stage = inValue
		s.gap()
		if s.closes(']') {
			break
		}
		v := s.value(path)
		if v == nil {
			return nil
		}
		s.list = append(s.list, v)
		s.stage = afterValue
		s.gap()
		if s.closes(']') {
			break
		}
		if !s.closes(',') {
			return nil
		}
	}
	n.items = s.take(from)
	return n
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
	s.list = s.list[:from]
	return items
}

// inline reads {…}.
func (s *scanner) inline(path int) *node {
	n := s.newNode(kindTable, s.pos)
	n.table = s.newMembers(byBraces)
	s.pos++
	for {
		s.stage = inKey
		s.parts = s.parts[:0]
		s.gap()
		if s.closes('}') {
			return n
		}
		if !s.pair(n.table, path) {
			return nil
		}
		s.stage = afterValue
		s.gap()
		if s.closes('}') {
			return n
		}
		if !s.closes(',') {
			return nil
		}
	}
}

// closes reads a bracket or comma where it is next.
func (s *scanner) closes(c byte) bool {
	if s.pos == len(s.text) || s.text[s.pos] != c {
		return false
	}
	s.pos++
	return true
}

// plain skips over a value without quotes: a number, a word, a date.
func (s *scanner) plain() *node {
	from := s.pos
	s.word()
	if day := s.text[from:s.pos]; len(day) == 10 && day[4] == '-' && day[7] == '-' && s.pos+3 < len(s.text) &&
		s.text[s.pos] == ' ' && digit(s.text[s.pos+1]) && digit(s.text[s.pos+2]) && s.text[s.pos+3] == ':' {
		s.pos++ // a date and a time
		s.word()
	}
	if s.pos == from {
		return nil
	}
	return s.scalar(from)
}

// word skips over the characters of a number, a date, true, false, inf or nan,
// and of what was meant as a word.
func (s *scanner) word() {
	for s.pos < len(s.text) {
		c := s.text[s.pos]
		if !(bare(c) || c == '+' || c == '.' || c == ':') {
			return
		}
		s.pos++
	}
}

func digit(c byte) bool { return c >= '0' && c <= '9' }

// scalar makes the node of a value that has been skipped.
func (s *scanner) scalar(from int) *node {
	n := s.newNode(kindString, from)
	n.end = int32(s.pos)
	s.done = s.pos
	return n
}

// str skips over a string.
func (s *scanner) str(quote byte) *node {
	from := s.pos
	ok := false
	if strings.HasPrefix(s.text[from:], `"""`) || strings.HasPrefix(s.text[from:], "'''") {
		ok = s.long(quote)
	} else {
		ok = s.quoted(quote)
	}
	if !ok {
		return nil
	}
	return s.scalar(from)
}

// quoted skips over "…" or '…' on one line.
func (s *scanner) quoted(quote byte) bool {
	from := s.pos
	for i := from + 1; i < len(s.text); i++ {
		switch c := s.text[i]; {
		case c == quote:
			s.pos = i + 1
			return true
		case c == '\n':
			s.pos, s.quote = i, from
			return false
		case c == '\\' && quote == '"' && i+1 < len(s.text) && s.text[i+1] != '\n':
			i++
		}
	}
	s.pos, s.quote = len(s.text), from
	return false
}

// long skips over """…""" or ”'…”'.
func (s *scanner) long(quote byte) bool {
	from := s.pos
	marks := s.text[from : from+3]
	for i := from + 3; i < len(s.text); i++ {
		switch c := s.text[i]; {
		case c == '\\' && quote == '"':
			i++
		case c == quote && strings.HasPrefix(s.text[i:], marks):
			s.pos = i + 3
			for more := 0; more < 2 && s.pos < len(s.text) && s.text[s.pos] == quote; more++ {
				s.pos++ // one or two quotes may stand before the closing three
			}
			return true
		}
	}
	s.pos, s.quote = len(s.text), from
	return false
}
