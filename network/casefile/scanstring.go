package casefile

import (
	"strconv"
	"strings"
	"unicode/utf8"
)

// quotedString reads "…" or '…' on one line.
func (s *scanner) quotedString(quote byte) *node {
	from := s.pos
	end := from + 1
	escaped := false
	for {
		if end == len(s.text) || s.text[end] == '\n' || s.text[end] == '\r' {
			s.pos = end
			s.unclosed(from, end, quote)
			return nil
		}
		c := s.text[end]
		if c == quote {
			break
		}
		if c == '\\' && quote == '"' {
			escaped = true
			if end++; end == len(s.text) || s.text[end] == '\n' {
				continue
			}
		} else if control(c) {
			s.pos = end
			s.fault(controlFault(c), end, end+1)
			return nil
		}
		end++
	}
	s.pos = end + 1
	n := s.newNode(kindString, from)
	n.end, n.inner = int32(end+1), int32(from+1)
	n.text, n.exact = s.text[from+1:end], true
	if escaped {
		n.exact = false
		return s.unescape(n)
	}
	return n
}

// unclosed reports a quote that is not closed on its line.
func (s *scanner) unclosed(from, end int, quote byte) {
	end = from + len(strings.TrimRight(s.text[from:end], " \t\r"))
	d := Diagnostic{Code: "open-quote", Text: "the quote is not closed on this line"}
	if body := s.text[from+1 : end]; body != "" && !strings.ContainsAny(body, "#,]}=\\") {
		d.Fix = s.text[from:end] + string(quote)
	}
	s.fault(d, from, end)
}

// longString reads """…""" or ”'…”'.
func (s *scanner) longString(quote byte) *node {
	from := s.pos
	marks := s.text[from : from+3]
	body := from + 3
	end, escaped := body, false
	for ; ; end++ {
		if end == len(s.text) {
			s.pos = end
			s.fault(Diagnostic{Code: "open-quote", Text: "the text begun here is never closed by " + marks}, from, from+3)
			return nil
		}
		switch c := s.text[end]; {
		case c == '\\' && quote == '"':
			escaped = true
			end++
			if end == len(s.text) {
				end--
			}
			continue
		case c == '\r' && !strings.HasPrefix(s.text[end:], "\r\n"), control(c) && c != '\n' && c != '\r':
			s.pos = end
			s.fault(controlFault(c), end, end+1)
			return nil
		}
		if strings.HasPrefix(s.text[end:], marks) {
			break
		}
	}
	for more := 0; more < 2 && end+3 < len(s.text) && s.text[end+3] == quote; more++ {
		end++ // one or two quotes may stand before the closing three
	}
	s.pos = end + 3
	n := s.newNode(kindString, from)
	n.end, n.inner = int32(s.pos), int32(body)
	n.text = s.text[body:end]
	switch {
	case strings.HasPrefix(n.text, "\n"):
		n.text = n.text[1:]
	case strings.HasPrefix(n.text, "\r\n"):
		n.text = n.text[2:]
	}
	if escaped {
		return s.unescape(n)
	}
	return n
}

// unescape replaces the escapes in a string.
func (s *scanner) unescape(n *node) *node {
	long := strings.HasPrefix(s.text[n.at:], `"""`)
	// Where the text begins in the file: a line break after """ is not part of it.
	off := int(n.end) - 1 - len(n.text)
	if long {
		off -= 2
	}
	var b strings.Builder
	b.Grow(len(n.text))
	t := n.text
	for i := 0; i < len(t); {
		if t[i] != '\\' {
			b.WriteByte(t[i])
			i++
			continue
		}
		size, r := escape(t[i:], long)
		if size == 0 {
			to := min(len(t), i+2)
			for to < len(t) && !utf8.RuneStart(t[to]) {
				to++
			}
			d := Diagnostic{Code: "bad-escape", Text: quoted(t[i:to]) + " is not an escape", Hint: `a backslash is written \\`}
			s.fault(d, off+i, off+to)
			return nil
		}
		if r >= 0 {
			b.WriteRune(r)
		}
		i += size
	}
	n.text = b.String()
	return n
}

// escape reads the escape that t begins with: its length, 0 where it is none,
// and the character, -1 for a line break that is not part of the text.
func escape(t string, long bool) (size int, r rune) {
	if len(t) < 2 {
		return 0, 0
	}
	if i := strings.IndexByte("btnfre\"\\", t[1]); i >= 0 {
		return 2, rune("\b\t\n\f\r\x1b\"\\"[i])
	}
	digits := 0
	switch t[1] {
	case 'x':
		digits = 2
	case 'u':
		digits = 4
	case 'U':
		digits = 8
	case ' ', '\t', '\n', '\r':
		rest := strings.TrimLeft(t[1:], " \t\r\n")
		gap := t[1 : len(t)-len(rest)]
		if !long || !strings.Contains(gap, "\n") {
			return 0, 0
		}
		return 1 + len(gap), -1
	default:
		return 0, 0
	}
	if len(t) < 2+digits {
		return 0, 0
	}
	for _, c := range []byte(t[2 : 2+digits]) {
		if !(c >= '0' && c <= '9' || c|0x20 >= 'a' && c|0x20 <= 'f') {
			return 0, 0
		}
	}
	v, err := strconv.ParseUint(t[2:2+digits], 16, 32)
	if err != nil || !utf8.ValidRune(rune(v)) {
		return 0, 0
	}
	return 2 + digits, rune(v)
}
