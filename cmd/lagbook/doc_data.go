package main

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
)

// invented, estimated and measured are the words of a source that the pages
// recognise; an author may be invented too, and then all is.
const invented = "invented"

var sourceWords = []string{invented, "estimated", "measured"}

// newDoc opens a page: the title, what must be known of the data before any
// number is read, who wrote the case and when.
func newDoc(c *casefile.Case) present.Doc {
	d := present.Doc{Title: title(c.Title)}
	switch {
	case c.Author == invented:
		d.Label = "invented data"
	case len(stated(c)[invented]) > 0:
		d.Label = "some data invented"
	}
	for _, f := range []present.Fact{{Name: "author", Value: c.Author}, {Name: "date", Value: c.Date}, {Name: "revision", Value: c.Revision}} {
		if f.Value != "" && f.Value != invented {
			d.About = append(d.About, f)
		}
	}
	return d
}

// stated lists, for each recognised word, the given values, profiles, uses, logs and
// parts whose source it is, in file order.
func stated(c *casefile.Case) map[string][]string {
	of := map[string][]string{}
	note := func(word, name string) {
		if slices.Contains(sourceWords, word) && !slices.Contains(of[word], name) {
			of[word] = append(of[word], name)
		}
	}
	for _, g := range c.Given {
		note(g.Source, g.Name)
	}
	for _, p := range c.Profiles() {
		note(p.Source, p.Name)
	}
	for _, u := range c.Uses() {
		note(u.Source, u.Name)
	}
	for _, q := range c.Questions.Measured {
		note(q.Source, q.Name)
	}
	for _, e := range c.Elements {
		note(e.Source(), e.FullName())
		for _, f := range e.Table.Fields {
			if e.Has(f.Name) {
				note(e.SourceOf(f.Name), e.FullName())
			}
		}
	}
	return of
}

// dataWords says which data are invented, estimated or measured; "" where the
// case does not.
func dataWords(c *casefile.Case) string {
	of := stated(c)
	var words []string
	as := ""
	if c.Author == invented {
		words, as = append(words, "all invented"), "as if "
		delete(of, invented)
	}
	for _, w := range sourceWords {
		if names := of[w]; len(names) > 0 {
			words = append(words, as+w+": "+list(firstFew(names)))
		}
	}
	if len(words) == 0 {
		return ""
	}
	return "data: " + strings.Join(words, "; ")
}

// sourceNotes number the sources that are too long for a cell.
type sourceNotes struct{ list []string }

// shortSource is how long a source may be to stand in its cell.
const shortSource = 16

// cell is what stands for a source in a table.
func (n *sourceNotes) cell(source string) string {
	if len([]rune(source)) <= shortSource {
		return source
	}
	k := slices.Index(n.list, source)
	if k < 0 {
		k = len(n.list)
		n.list = append(n.list, source)
	}
	return fmt.Sprintf("[%d]", k+1)
}

// known stands for a source and how well it is known: what was not looked up is
// marked, and the note says why.
func (n *sourceNotes) known(status, source string) string {
	s := n.cell(status + ": " + source)
	if status != lookedUp {
		s += " check"
	}
	return s
}

// lookedUp is the status of a property that needs no remark.
const lookedUp = "looked up"

// behind puts the source of a number behind how it follows.
func (n *sourceNotes) behind(how, source string) string {
	s := n.cell(source)
	if s != "" && s == source {
		s = "(" + s + ")"
	}
	return strings.TrimSpace(how + " " + s)
}

// parts are the list of what the numbers stand for.
func (n *sourceNotes) parts() []present.Part {
	if len(n.list) == 0 {
		return nil
	}
	var facts []present.Fact
	for k, s := range n.list {
		facts = append(facts, present.Fact{Name: fmt.Sprintf("[%d]", k+1), Value: s})
	}
	return []present.Part{present.Heading{Level: 1, Text: "Sources"}, present.Facts{List: facts}}
}
