package casefile

import (
	"fmt"
	"strings"
)

// header reads [a.b] or [[a]] and opens that table.
func (s *scanner) header() bool {
	from := s.pos
	s.pos++
	double := s.pos < len(s.text) && s.text[s.pos] == '['
	closing := "]"
	if double {
		s.pos++
		closing = "]]"
	}
	if !s.dotted(0) || !strings.HasPrefix(s.text[s.pos:], closing) {
		return false
	}
	s.pos += len(closing)
	s.path = pathOf(s.parts)
	s.open(double, span{int32(from), int32(s.pos)})
	return true
}

// dotted reads the parts of a key into s.parts, up to what stands after it; path
// is the length of the name of the table it stands in.
func (s *scanner) dotted(path int) bool {
	s.parts = s.parts[:0]
	from := s.pos
	for {
		s.blanks()
		if len(s.parts) == maxParts {
			return s.tooMany("too-many-parts", fmt.Sprintf("a key of more than %d parts", maxParts), from, s.pos)
		}
		if !s.part() {
			return false
		}
		s.blanks()
		if s.pos == len(s.text) || s.text[s.pos] != '.' {
			break
		}
		s.pos++
	}
	if s.keys += len(s.parts); s.keys > maxKeys {
		return s.tooMany("too-many", fmt.Sprintf("more than %d keys", maxKeys), from, from+1)
	}
	return s.weigh(path+pathOf(s.parts), len(s.parts))
}

// pathOf is what the parts of a key add to the length of a full name.
func pathOf(parts []key) int {
	const each = 8 // what a part costs however short it is
	n := 0
	for i := range parts {
		n += each + len(parts[i].name)
	}
	return n
}

// part reads one part of a key.
func (s *scanner) part() bool {
	from := s.pos
	if from == len(s.text) {
		return false
	}
	if c := s.text[from]; c == '"' || c == '\'' {
		if !s.quoted(c) {
			return false
		}
		escapes := c == '"' && strings.IndexByte(s.text[from:s.pos], '\\') >= 0
		if escapes {
			s.spelt++
		}
		if s.spelt > maxSpelt {
			return s.tooMany("too-many", fmt.Sprintf("more than %d keys with escapes", maxSpelt), from, s.pos)
		}
		s.parts = append(s.parts, key{span: span{int32(from), int32(s.pos)}, name: quotedKey(s.text[from:s.pos], escapes)})
		return true
	}
	for s.pos < len(s.text) && bare(s.text[s.pos]) {
		s.pos++
	}
	if s.pos == from {
		return false
	}
	s.parts = append(s.parts, key{span: span{int32(from), int32(s.pos)}, name: s.text[from:s.pos]})
	return true
}

// bare reports a character that needs no quotes in a key.
func bare(c byte) bool {
	return c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c >= '0' && c <= '9' || c == '_' || c == '-'
}

// open makes s.parts the table that the next keys belong to.
func (s *scanner) open(double bool, at span) {
	m := s.root.table
	last := len(s.parts) - 1
	for _, p := range s.parts[:last] {
		if m = s.into(m, p, byPath); m == nil {
			s.nowhere()
			return
		}
	}
	p := s.parts[last]
	k := m.find(p.name)
	if double {
		s.openItem(m, k, p, at)
		return
	}
	switch {
	case k == nil:
		s.cur = s.newTable(m, p, byHeader, at)
	case k.value.kind == kindTable && k.value.table.made == byPath:
		k.value.table.made = byHeader
		k.value.span, k.span = at, p.span // the header is where a user looks for the table
		s.cur = k.value.table
	default:
		s.again(p, k)
		s.nowhere()
	}
}

// nowhere lets the keys after a header at fault go to a table nobody reads.
func (s *scanner) nowhere() { s.cur = &members{made: byBraces} }

// openItem adds a table to an array of tables.
func (s *scanner) openItem(m *members, k *key, p key, at span) {
	if k == nil {
		p.value = s.newNode(kindArray, int(at.at))
		p.value.span, p.value.open = at, true
		m.add(p)
		k = m.find(p.name)
	} else if !k.value.open {
		s.again(p, k)
		s.nowhere()
		return
	}
	item := s.newNode(kindTable, int(at.at))
	item.span = at
	item.table = s.newMembers(byItem)
	k.value.items = append(k.value.items, item)
	s.cur = item.table
}

// into goes one table down, making it where it is not there; nil where the name
// stands for something else.
func (s *scanner) into(m *members, p key, made origin) *members {
	k := m.find(p.name)
	switch {
	case k == nil:
		return s.newTable(m, p, made, p.span)
	case k.value.open:
		return k.value.items[len(k.value.items)-1].table
	case k.value.kind == kindTable:
		return k.value.table
	}
	if n := len(s.twice); n == 0 || !s.twice[n-1].through || s.twice[n-1].first != k.span { // once for all keys below
		s.again(p, k)
		s.twice[len(s.twice)-1].through = true
	}
	return nil
}

func (s *scanner) newTable(m *members, p key, made origin, at span) *members {
	p.value = s.newNode(kindTable, int(at.at))
	p.value.span = at
	p.value.table = s.newMembers(made)
	m.add(p)
	return p.value.table
}

// again notes a name stated twice.
func (s *scanner) again(p key, first *key) {
	s.twice = append(s.twice, twice{name: p.name, at: p.span, first: first.span})
}

// pair reads key = value into m; path is the length of the name of that table.
func (s *scanner) pair(m *members, path int) bool {
	s.stage = inKey
	if !s.dotted(path) || s.pos == len(s.text) || s.text[s.pos] != '=' {
		return false
	}
	var few [maxParts]key // reading the value reuses s.parts
	n := copy(few[:], s.parts)
	s.stage = inValue
	s.pos++
	s.blanks()
	v := s.value(path + pathOf(few[:n]))
	if v == nil {
		return false
	}
	for _, p := range few[:n-1] {
		if m = s.into(m, p, byDots); m == nil {
			return true
		}
	}
	p := few[n-1]
	if k := m.find(p.name); k != nil {
		s.again(p, k)
		return true
	}
	p.value = v
	m.add(p)
	return true
}
