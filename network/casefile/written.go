package casefile

import (
	"strconv"
	"strings"
)

// A Statement is one value of a case file as it is written: "value" of
// "thermal.resistance.foot" is "0.15 K/W". The keys of tables in braces stand with dots
// between: "step.from". A [[table]] goes by its title, else by its number: "table.2".
type Statement struct {
	Table string // "" at the top of the file
	Key   string
	Text  string // a string without its quotes; a list on one line
}

// Statements lists what the case file states, in file order.
func (c *Case) Statements() []Statement {
	src := &source{file: c.File, text: c.src.text}
	root, faults := src.load()
	if faults != nil {
		return nil // not of a case that could be read
	}
	w := writing{src: src}
	w.table(nil, root, "")
	return w.list
}

type writing struct {
	src  *source
	list []Statement
}

// table goes through a table; in is its name, under the keys since braces began.
func (w *writing) table(in []string, n *node, under string) {
	for i := range n.table.keys {
		k := &n.table.keys[i]
		switch v := k.value; {
		case v.kind == kindTable && under == "" && v.table.made != byBraces:
			w.table(append(in[:len(in):len(in)], k.name), v, "")
		case v.kind == kindTable:
			w.table(in, v, under+k.name+".")
		case v.kind == kindArray && v.open:
			for j, item := range v.items {
				name := strconv.Itoa(j + 1)
				if t := item.get("title"); t != nil && t.kind == kindString && t.text != "" {
					name = t.text
				}
				w.table(append(in[:len(in):len(in)], k.name, name), item, "")
			}
		default:
			w.list = append(w.list, Statement{Table: strings.Join(in, "."), Key: under + k.name, Text: w.text(v)})
		}
	}
}

func (w *writing) text(n *node) string {
	if n.kind == kindArray {
		return oneLine(w.src.text[n.at:n.end])
	}
	return n.text
}
