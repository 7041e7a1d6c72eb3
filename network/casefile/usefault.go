package casefile

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"lagbook/network"
)

// What is wrong in a part is found once with each use of it. It is said once: of the part
// where all uses have it, else of the part and the uses that do.

// A gathering is diagnostics of which those are one that only differ in the use.
type gathering struct {
	first map[sameness]int // by what all uses say: the place in the list
	of    map[int][]*use
}

// A sameness is what two diagnostics of one fault have in common.
type sameness struct {
	at, end             int32
	severity            Severity
	code, thing         string
	text, fix, hintText string
}

// repeats reports whether a diagnostic, which would come next in a list, has been
// gathered from another use.
func (g *gathering) repeats(d Diagnostic, u *use, next int) bool {
	if u == nil || d.Line == 0 {
		return false
	}
	key := sameness{d.at, int32(d.Len), d.Severity, d.Code, u.outside(d.Thing), u.outside(d.Text), d.Fix, u.outside(d.Hint)}
	if g.first == nil {
		g.first, g.of = map[sameness]int{}, map[int][]*use{}
	}
	i, again := g.first[key]
	if !again {
		g.first[key], i = next, next
	}
	if list := g.of[i]; len(list) == 0 || list[len(list)-1] != u {
		g.of[i] = append(list, u)
	}
	return again
}

// spell puts into words which uses have each fault of a list.
func (g *gathering) spell(c *Case, list []Diagnostic) {
	for i, uses := range g.of {
		if len(uses) < 2 {
			continue
		}
		d, u := &list[i], uses[0]
		said := strings.Contains(d.Thing, u.words)
		d.Thing, d.Text, d.Hint = u.outside(d.Thing), u.outside(d.Text), u.outside(d.Hint)
		if said && len(uses) < c.usesOf(u.part) {
			d.Thing = strings.Replace(d.Thing, u.part.words, u.part.words+", uses "+useNames(uses), 1)
		}
	}
}

// useNames lists the names of some uses.
func useNames(uses []*use) string {
	const most = 6
	var names []string
	for i, u := range uses {
		if i == most {
			return strings.Join(names, ", ") + " and " + strconv.Itoa(len(uses)-most) + " more"
		}
		names = append(names, quoted(u.name))
	}
	last := len(names) - 1
	return strings.Join(names[:last], ", ") + " and " + names[last]
}

// outside takes what is particular to a use out of a text: "c.can" becomes "can".
func (u *use) outside(text string) string {
	text = strings.ReplaceAll(text, u.words, u.part.words)
	prefix := u.name + "."
	var b strings.Builder
	for {
		i := strings.Index(text, prefix)
		if i < 0 {
			b.WriteString(text)
			return b.String()
		}
		before, _ := utf8.DecodeLastRuneInString(text[:i])
		b.WriteString(text[:i])
		if i > 0 && before != ' ' && nameRune(before) {
			b.WriteString(prefix)
		}
		text = text[i+len(prefix):]
	}
}

// usesOf counts the uses of a part.
func (c *Case) usesOf(p *part) int {
	n := 0
	for _, u := range c.uses {
		if u.part == p {
			n++
		}
	}
	return n
}

// useIn returns the use that a message says it is about, nil for none.
func (c *Case) useIn(thing string) *use {
	i := strings.LastIndex(thing, `part "`)
	if i < 0 {
		return nil
	}
	words, _, _ := strings.Cut(thing[i:], ")") // which no name holds
	return c.useWords[words]
}

// gathered says once what several uses have in common.
func (c *Case) gathered(list []Diagnostic) []Diagnostic {
	if len(c.uses) < 2 || len(list) < 2 {
		return list
	}
	var g gathering
	kept := make([]Diagnostic, 0, len(list))
	for _, d := range list {
		if !g.repeats(d, c.useIn(d.Thing), len(kept)) {
			kept = append(kept, d)
		}
	}
	g.spell(c, kept)
	return kept
}

// useFor returns the use that a diagnostic is about, nil for none.
func (r *reader) useFor(d Diagnostic) *use {
	if r.scope != nil {
		return r.scope
	}
	return r.c.useIn(d.Thing)
}

// inPart says in which part, and use, something stands that a ref is about; "" for none.
func (c *Case) inPart(ref network.Ref) string {
	if ref >= 0 && int(ref) < len(c.refs) {
		if u := c.refs[ref].e.inner(); u != nil {
			return u.words
		}
	}
	return ""
}

// reopen opens a data file, which a part does with each use: what is wrong with it is
// told to each in the same words.
func (r *reader) reopen(name string) (*csvFile, error) {
	data, err := r.open(name)
	switch first := r.unread[name]; {
	case r.scope == nil || err == nil:
	case first != nil:
		return nil, first
	default:
		if r.unread == nil {
			r.unread = map[string]error{}
		}
		r.unread[name] = err
	}
	return data, err
}
