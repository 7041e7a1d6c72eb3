package casefile

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// header reads [a.b] or [[a]] and opens that table.
func (s *scanner) header() bool {
	from := s.pos
	s.pos++
	double := s.pos < len(s.text) && s.text[s.pos] == '['
	if double {
		s.pos++
	}
	if !s.dotted("a table") {
		return s.nowhere()
	}
	closing := "]"
	if double {
		closing = "]]"
	}
	if !strings.HasPrefix(s.text[s.pos:], closing) {
		end := s.restOfLine(s.pos)
		d := Diagnostic{Text: `expected "` + closing + `" at the end of the table's name`}
		at := s.pos
		switch {
		case s.bareWords(s.pos, end):
			d.Hint = "a name with a space is written in quotes"
		case end <= s.pos || s.text[s.pos:end] == "]":
			at, d.Fix = from, strings.TrimRight(s.text[from:s.pos], " \t")+closing
		}
		s.fault(d, at, max(end, s.pos+1))
		return s.nowhere()
	}
	s.pos += len(closing)
	s.open(double, span{int32(from), int32(s.pos)})
	return true
}

// nowhere lets the keys after a header at fault go to a table nobody reads.
func (s *scanner) nowhere() bool {
	s.cur = &members{made: byBraces}
	return false
}

// bareWords reports whether the text between holds characters of a name.
func (s *scanner) bareWords(from, to int) bool { return from < to && bare(s.text[from]) }

// dotted reads the parts of a key into s.parts, up to what stands after it.
func (s *scanner) dotted(what string) bool {
	s.parts = s.parts[:0]
	from := s.pos
	for {
		s.blanks()
		if len(s.parts) == maxParts {
			return s.fault(Diagnostic{Code: "too-many-parts", Text: fmt.Sprintf("a key of more than %d parts", maxParts)}, from, s.pos)
		}
		if !s.part(what) {
			return false
		}
		s.blanks()
		if s.pos == len(s.text) || s.text[s.pos] != '.' {
			break
		}
		s.pos++
	}
	if s.keys += len(s.parts); s.keys > maxKeys {
		return s.tooMany("keys", maxKeys, from)
	}
	return true
}

// part reads one part of a key.
func (s *scanner) part(what string) bool {
	from := s.pos
	if from == len(s.text) {
		return s.fault(Diagnostic{Text: "the file ends where the name of " + what + " is expected"}, max(0, from-1), from)
	}
	switch c := s.text[from]; {
	case c == '"' || c == '\'':
		if strings.HasPrefix(s.text[from:], `"""`) || strings.HasPrefix(s.text[from:], "'''") {
			return s.fault(Diagnostic{Text: "a name in triple quotes"}, from, from+3)
		}
		n := s.quotedString(c)
		if n == nil {
			return false
		}
		s.parts = append(s.parts, key{span: n.span, name: n.text})
		return true
	case bare(c):
		for s.pos < len(s.text) && bare(s.text[s.pos]) {
			s.pos++
		}
		s.parts = append(s.parts, key{span: span{int32(from), int32(s.pos)}, name: s.text[from:s.pos]})
		return true
	}
	_, n := utf8.DecodeRuneInString(s.text[from:])
	switch found := s.text[from : from+n]; found {
	case "=", "]", ".", "\n", "\r":
		return s.fault(Diagnostic{Text: "the name of " + what + " is missing"}, from, from+n)
	default:
		d := Diagnostic{Text: quoted(found) + " cannot stand in a name without quotes"}
		return s.fault(d, from, from+n)
	}
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
		s.twice(p, k)
		s.nowhere()
	}
}

// openItem adds a table to an array of tables.
func (s *scanner) openItem(m *members, k *key, p key, at span) {
	if k == nil {
		p.value = s.newNode(kindArray, int(at.at))
		p.value.span, p.value.open = at, true
		m.add(p)
		k = m.find(p.name)
	} else if !k.value.open {
		s.twice(p, k)
		s.nowhere()
		return
	}
	item := s.newNode(kindTable, int(at.at))
	item.span = at
	item.table = s.newMembers(byItem)
	k.value.items = append(k.value.items, item)
	s.cur = item.table
}

// into goes one table down, making it where it is not there; nil after a fault.
func (s *scanner) into(m *members, p key, made origin) *members {
	k := m.find(p.name)
	if k == nil {
		return s.newTable(m, p, made, p.span)
	}
	switch v := k.value; {
	case v.open:
		return v.items[len(v.items)-1].table
	case v.kind == kindTable && v.table.made != byBraces && (made == byPath || v.table.made == byDots || v.table.made == byPath):
		return v.table
	case v.kind == kindTable:
		s.note(Diagnostic{Code: "defined-twice", Text: fmt.Sprintf("table %s is complete on line %d; nothing can be added to it here",
			quoted(p.name), s.src.place(Diagnostic{}, k.span).Line)}, p.span)
	default:
		s.note(Diagnostic{Code: "defined-twice", Text: fmt.Sprintf("%s is %s on line %d, not a table",
			quoted(p.name), v.kind.a(), s.src.place(Diagnostic{}, k.span).Line)}, p.span)
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

// twice reports a name given again; what follows it goes nowhere.
func (s *scanner) twice(p key, first *key) {
	s.note(Diagnostic{Code: "defined-twice", Text: fmt.Sprintf("%s is defined twice, first on line %d",
		quoted(p.name), s.src.place(Diagnostic{}, first.span).Line)}, p.span)
}

// pair reads key = value into m.
func (s *scanner) pair(m *members) bool {
	if !s.dotted("a key") {
		return false
	}
	if s.pos == len(s.text) || s.text[s.pos] != '=' {
		return s.noEquals()
	}
	var few [maxParts]key // reading the value reuses s.parts
	n := copy(few[:], s.parts)
	s.pos++
	s.blanks()
	v := s.value()
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
		s.twice(p, k)
		return true
	}
	p.value = v
	m.add(p)
	return true
}

// noEquals reports a key that no = follows.
func (s *scanner) noEquals() bool {
	last := s.parts[len(s.parts)-1]
	d := Diagnostic{Text: "expected \"=\" after " + quoted(last.name)}
	if s.pos < len(s.text) && s.text[s.pos] == ':' {
		d.Fix = "="
		return s.fault(d, s.pos, s.pos+1)
	}
	if end := s.restOfLine(s.pos); s.bareWords(s.pos, end) {
		d.Hint = "a name with a space is written in quotes"
	}
	return s.fault(d, int(last.at), int(last.end))
}
