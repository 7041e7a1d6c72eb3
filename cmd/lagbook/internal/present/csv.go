package present

import (
	"encoding/csv"
	"io"
	"strings"
)

// CSV writes the tables of d, and nothing else of it: heads, then rows, at full
// precision where the table carries it. Several tables are parted by an empty
// line, each under a record that holds its caption, and where there is a label a
// record of title and label stands first. A document without tables
// gives its facts, name and value.
func CSV(w io.Writer, d Doc) error {
	out := csv.NewWriter(w)
	tables := d.tables()
	if d.Label != "" && len(tables) != 1 { // one table alone stays a table
		if err := out.WriteAll([][]string{{escapeCSV(d.Title), escapeCSV(d.Label)}}); err != nil {
			return err
		}
		if _, err := io.WriteString(w, "\n"); err != nil {
			return err
		}
	}
	for i, t := range tables {
		if i > 0 {
			out.Flush()
			if _, err := io.WriteString(w, "\n"); err != nil {
				return err
			}
		}
		if len(tables) > 1 && t.Caption != "" {
			if err := out.Write([]string{escapeCSV(t.Caption)}); err != nil {
				return err
			}
		}
		if err := csvTable(out, t); err != nil {
			return err
		}
	}
	if len(tables) == 0 {
		if err := csvFacts(out, d); err != nil {
			return err
		}
	}
	out.Flush()
	return out.Error()
}

func (d Doc) tables() []Table {
	var list []Table
	for _, p := range d.Parts {
		if t, ok := p.(Table); ok && len(t.Columns) > 0 {
			list = append(list, t)
		}
	}
	return list
}

func csvTable(out *csv.Writer, t Table) error {
	if t.Full != nil {
		t.Rows = t.Full
	}
	if t.FullHead != nil {
		t.Columns = nil
		for _, h := range t.FullHead {
			t.Columns = append(t.Columns, Column{Head: h})
		}
	}
	heads, rows := t.cells(remark, escapeCSV)
	if err := out.Write(heads); err != nil {
		return err
	}
	return out.WriteAll(rows)
}

func csvFacts(out *csv.Writer, d Doc) error {
	for _, p := range d.Parts {
		f, ok := p.(Facts)
		if !ok {
			continue
		}
		for _, x := range f.List {
			if err := out.Write([]string{escapeCSV(x.Name), escapeCSV(x.Value)}); err != nil {
				return err
			}
		}
	}
	return nil
}

// escapeCSV keeps a spreadsheet from taking text for a formula: what starts
// with = + - or @ and is not a number gets an apostrophe before it, which the
// spreadsheet hides; so does what would be mistaken for having got one. Commas
// and quotes are encoding/csv's.
func escapeCSV(s string) string {
	s = clean(s)
	body := strings.TrimLeft(s, "'")
	if body != "" && strings.ContainsRune("=+-@", rune(body[0])) && !(body == s && isNumber(s)) {
		return "'" + s
	}
	return s
}
