package casefile

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// maxCatalogue is how many parts a catalogue may have: each may have to be computed.
const maxCatalogue = 10_000

// catalogue reads the parts of a data file: a column for each given value that a part sets,
// with the unit in its head, one that names the parts, and one of which less is better.
func (r *reader) catalogue(f fielder, n *node, at map[string]*node, vary int) (*Catalogue, bool) {
	name := at["catalogue"].text
	fail := func(key string, err error) (*Catalogue, bool) {
		d := Diagnostic{Code: "data-file", Thing: f.o.thing(), Text: err.Error()}
		if e, ok := err.(*errData); ok {
			d.Hint = e.hint
		}
		r.at(at[key].span, d)
		return nil, false
	}
	data, err := r.open(name)
	if err != nil {
		return fail("catalogue", err)
	}
	if len(data.rows) > maxCatalogue {
		return fail("catalogue", &errData{text: fmt.Sprintf("%s has %d parts, more than the %d a catalogue may have", quoted(name), len(data.rows), maxCatalogue), hint: "keep those that come into question"})
	}
	if _, err := data.column(name, r.c.Given[vary].Name, 0); err != nil {
		return fail("vary", err)
	}
	c := &Catalogue{File: name}
	least := -1
	if at["least"] != nil {
		if least, err = data.column(name, at["least"].text, 0); err == nil {
			c.Least, c.Unit = data.heads[least].name, data.heads[least].unit
			c.Cost, err = data.numbers(name, least, linear{0, 1})
		}
		if err != nil {
			return fail("least", err)
		}
	}
	label := -1
	for i, h := range data.heads {
		g, given := r.c.GivenIndex(h.name)
		switch {
		case given:
			if !r.partSets(f.o, at["catalogue"], h, g) {
				return nil, false
			}
			s, err := data.scale(r.c, name, i, r.likeGiven(h.name, g))
			if err != nil {
				return fail("catalogue", err)
			}
			values, err := data.numbers(name, i, s)
			if err != nil {
				return fail("catalogue", err)
			}
			c.Columns = append(c.Columns, CatalogueColumn{Given: h.name, Values: values})
		case i == least:
		case label < 0 && h.unit == "":
			label = i
		case h.unit != "":
			r.at(at["catalogue"].span, Diagnostic{Severity: Warning, Code: "unused", Thing: f.o.thing(), Text: fmt.Sprintf("column %s of %s is not used: no given value has that name", quoted(h.full), quoted(name)), Hint: r.nearGiven(h.name)})
		}
	}
	for i, row := range data.rows {
		part := fmt.Sprintf("row %d", i+1)
		if label >= 0 && strings.TrimSpace(row[label]) != "" {
			part = printable(strings.TrimSpace(row[label]))
		}
		c.Parts = append(c.Parts, part)
	}
	return c, true
}

// partSets checks that a column may set a given value: a number of its own that does not
// shape the network.
func (r *reader) partSets(o owner, n *node, h columnHead, given int) bool {
	if r.c.Given[given].Derived {
		r.at(n.span, Diagnostic{Code: "derived", Thing: o.thing(), Text: fmt.Sprintf("column %s would set %s, which is an expression, %s: it follows from others", quoted(h.full), quoted(h.name), quoted(r.c.Given[given].Text)),
			Hint: "give the column the name of a given value that is a number"})
		return false
	}
	return !r.c.givens[given].bad && r.variable(o, n, given)
}

// nearGiven asks whether another given value was meant.
func (r *reader) nearGiven(name string) string {
	if near, ok := quantity.Nearest(name, r.c.givenNames()); ok {
		return "did you mean " + quoted(near) + "?"
	}
	return ""
}

// numbers reads a column of numbers.
func (d *csvFile) numbers(file string, column int, s linear) ([]float64, error) {
	list := make([]float64, len(d.rows))
	for i, row := range d.rows {
		x, ok := d.number(row[column])
		if !ok {
			return nil, &errData{text: fmt.Sprintf("%s, row %d: %s is not a number", quoted(file), i+1, quoted(row[column]))}
		}
		list[i] = s.add + s.times*x
	}
	return list, nil
}
