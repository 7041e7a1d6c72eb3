package casefile

import (
	"errors"
	"fmt"
	"strings"
	"time"
	"unicode/utf8"

	"github.com/BurntSushi/toml"
)

// load reads the text: the scanner finds the places and holds the bounds, the
// TOML library decodes what it has gone through, and join brings both together.
// The tree is nil where there are faults. After a fault of syntax reading goes
// on at the next statement, so that all are reported at once, as long as the
// texts decoded are no longer together than one case may be.
func (s *source) load() (root *node, faults []Diagnostic) {
	if d, ok := s.bounded(); !ok {
		return nil, []Diagnostic{d}
	}
	from := 0
	if strings.HasPrefix(s.text, bom) {
		from = len(bom)
	}
	for room := maxBytes; from < len(s.text) || faults == nil; {
		sc := newScanner(s, from, len(s.text))
		whole := sc.run()
		if sc.bound != nil {
			return nil, append(faults, *sc.bound)
		}
		to := len(s.text)
		if !whole {
			to = s.justBehind(sc.pos)
		}
		values, err := decode(s.text[from:to])
		if whole && err == nil {
			s.keys = sc.keys
			faults = append(faults, s.stated(sc.twice)...)
			if faults == nil && !s.join(sc.root, values) {
				faults = append(faults, s.place(Diagnostic{Code: "syntax", Text: "this file cannot be read as TOML"}, span{0, 1}))
			}
			return sc.root, faults
		}
		found, next := s.syntax(sc, from, to, err)
		faults = append(faults, found...)
		if room -= to - from; len(faults) >= maxFaults || room < 0 {
			break
		}
		from = next
	}
	return nil, faults
}

// justBehind returns the end of the line at which the scanner sticks. The library
// is shown no more than that: it sticks there too, and beyond it no bound has
// been looked at.
func (s *source) justBehind(pos int) int {
	const most = 200 // of a long line
	end := min(len(s.text), pos+most)
	if k := strings.IndexByte(s.text[pos:end], '\n'); k >= 0 {
		return pos + k + 1
	}
	for end < len(s.text) && !utf8.RuneStart(s.text[end]) {
		end++
	}
	return end
}

// decode has the library read a text. It may panic where a text is no TOML.
func decode(text string) (values map[string]any, err error) {
	defer func() {
		if p := recover(); p != nil {
			values, err = nil, errors.New(fmt.Sprint(p))
		}
	}()
	_, err = toml.Decode(text, &values)
	return values, err
}

// quotedKey returns the name that a key in quotes stands for; where it is spelt
// with escapes, the library tells.
func quotedKey(text string, escapes bool) string {
	if escapes {
		values, err := decode(text + "=0")
		for name := range values {
			if err == nil && len(values) == 1 {
				return name
			}
		}
	}
	return text[1 : len(text)-1]
}

// join gives the values that the library has decoded to the nodes of the tree.
// It is false where they do not hold the same keys and items.
func (s *source) join(n *node, value any) bool {
	switch v := value.(type) {
	case map[string]any:
		return n.kind == kindTable && s.joinTable(n.table, v)
	case []map[string]any:
		ok := n.kind == kindArray && len(n.items) == len(v)
		for i := 0; ok && i < len(v); i++ {
			ok = n.items[i].kind == kindTable && s.joinTable(n.items[i].table, v[i])
		}
		return ok
	case []any:
		ok := n.kind == kindArray && len(n.items) == len(v)
		for i := 0; ok && i < len(v); i++ {
			ok = s.join(n.items[i], v[i])
		}
		return ok
	}
	if n.kind != kindString { // what the scanner takes for a list or a table
		return false
	}
	written := s.text[n.at:n.end]
	n.text = written
	switch v := value.(type) {
	case string:
		n.text, n.inner = v, n.at+1
		n.exact = len(written) == len(v)+2 && written[1:len(written)-1] == v
	case int64:
		n.kind, n.num = kindInteger, float64(v)
	case float64:
		n.kind, n.num = kindFloat, v
	case bool:
		n.kind = kindBoolean
	case time.Time:
		n.kind = kindDate
	default:
		return false
	}
	return true
}

func (s *source) joinTable(m *members, values map[string]any) bool {
	if len(m.keys) != len(values) {
		return false
	}
	for i := range m.keys {
		v, ok := values[m.keys[i].name]
		if !ok || !s.join(m.keys[i].value, v) {
			return false
		}
	}
	return true
}
