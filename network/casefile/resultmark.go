package casefile

import (
	"errors"
	"maps"
	"slices"
	"strings"
	"unicode/utf8"

	"lagbook/network/quantity"
)

// A marked is the text of an expression in which what stands between backquotes has been
// put into words of the same length, so that places stay what they are.
type marked struct {
	text  string
	names map[string]markedName // by the word that has taken its place
	open  int                   // where a backquote is not closed; -1
	empty int                   // where nothing stands between two; -1
}

type markedName struct {
	name string
	off  int    // of the name in the text
	raw  string // as it stands there, with the backquotes
}

// markNames puts words in the place of what stands between backquotes.
func markNames(n *node) marked {
	m := marked{text: n.text, names: map[string]markedName{}, open: -1, empty: -1}
	if len(n.text) > maxMarked {
		return m // longer than an expression may be, which is reported where it is compiled
	}
	var b strings.Builder
	rest := 0
	for count := 0; ; {
		from := strings.IndexByte(n.text[rest:], '`')
		if from < 0 {
			break
		}
		from += rest
		length := strings.IndexByte(n.text[from+1:], '`')
		if length < 0 {
			m.open = from
			break
		}
		name := strings.TrimSpace(n.text[from+1 : from+1+length])
		if name == "" {
			m.empty = from
			break
		}
		word := m.wordFor(n.text, name, length+2, &count)
		m.names[word] = markedName{name, from + 1 + strings.Index(n.text[from+1:], name), n.text[from : from+length+2]}
		b.WriteString(n.text[rest:from])
		b.WriteString(word)
		rest = from + length + 2
	}
	b.WriteString(n.text[rest:])
	m.text = b.String()
	return m
}

// maxMarked is how many bytes an expression may have. Of words of any length there are
// more than names in so many.
const maxMarked = 2000

// wordFor finds a word of a length that the text does not hold; the same name of the same
// length has the same word. It is of letters alone, so that behind a number it is taken
// for a name as any other is.
func (m *marked) wordFor(text, name string, length int, count *int) string {
	for word, known := range m.names {
		if known.name == name && len(word) == length {
			return word
		}
	}
	for {
		word := []byte("Q" + strings.Repeat("a", length-1))
		for i, left := length-1, *count; i > 0 && left > 0; i, left = i-1, left/26 {
			word[i] += byte(left % 26)
		}
		*count++
		if word := string(word); !strings.Contains(text, word) && m.names[word].name == "" {
			return word
		}
	}
}

// find returns a node for a name in an expression, and how a better one is written in its
// place. shown tells that it stands between backquotes.
func (m *marked) find(n *node, name string) (at *node, write func(string) string, shown bool) {
	off, length, text := -1, len(name), name
	if k, ok := m.names[name]; ok {
		off, length, text, shown = k.off, len(k.name), k.name, true
	} else {
		off = wordIn(m.text, name)
	}
	at = &node{span: n.part(off, length), kind: kindString, text: text}
	if at.span != n.span {
		at.exact, at.inner = true, at.at
	}
	write = func(better string) string {
		switch {
		case at.span == n.span:
			return ""
		case shown:
			return better
		}
		return operandText(better)
	}
	return at, write, shown
}

// wordIn finds a name in a text where it stands by itself, -1 if it does not.
func wordIn(text, name string) int {
	for from := 0; ; {
		i := strings.Index(text[from:], name)
		if i < 0 {
			return -1
		}
		i += from
		before, _ := utf8.DecodeLastRuneInString(text[:i])
		after, _ := utf8.DecodeRuneInString(text[i+len(name):])
		if !partOfName(before) && !partOfName(after) {
			return i
		}
		from = i + len(name)
	}
}

// partOfName reports whether a character goes on with a name in an expression.
func partOfName(c rune) bool {
	return c != ' ' && c != '-' && c != utf8.RuneError && nameRune(c)
}

// spelled puts back what stands between backquotes into an error about the marked text.
func (m *marked) spelled(err error) error {
	if len(m.names) == 0 {
		return err
	}
	back := m.back()
	var s *quantity.SyntaxError
	var d *quantity.DimensionError
	var v *quantity.ValueError
	switch {
	case errors.As(err, &s):
		other := *s
		other.Found, other.Want, other.Suggest = back.Replace(s.Found), back.Replace(s.Want), back.Replace(s.Suggest)
		return &other
	case errors.As(err, &d):
		other := *d
		other.Found, other.Expected, other.Suggest = back.Replace(d.Found), back.Replace(d.Expected), back.Replace(d.Suggest)
		return &other
	case errors.As(err, &v):
		other := *v
		other.Found, other.Expected = back.Replace(v.Found), back.Replace(v.Expected)
		return &other
	}
	return err
}

// back puts the words back into a text. Where it has been cut short within one, which
// one is not known.
func (m *marked) back() *strings.Replacer {
	const cut = "…"
	pairs, parts := []string{}, []string{}
	for _, word := range slices.Sorted(maps.Keys(m.names)) {
		raw := m.names[word].raw
		pairs = append(pairs, word, raw)
		for k := len(word) - 1; k > 0; k-- {
			parts = append(parts, word[:k]+cut, "`"+cut)
		}
	}
	return strings.NewReplacer(append(pairs, parts...)...)
}
