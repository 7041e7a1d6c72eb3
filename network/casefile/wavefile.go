package casefile

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"math"
	"os"
	"strconv"
	"strings"

	"lagbook/network/quantity"
)

// A data file is a table of numbers as loggers and spreadsheets write it: a
// header, then rows. The header's cells name the columns with their units, as
// "time / s", "T [°C]" or "T (°C)"; a column without unit holds plain numbers.
// Cells are separated by the one of comma, semicolon and tab that the header has
// most of; where it is the semicolon or the tab, numbers may have decimal commas.
// Lines that begin with # are left out. Rows stand in order of time; a time given
// twice is a jump, and between points the value runs straight.

const (
	maxFileBytes = 16 << 20
	maxFileRows  = 200_000
	maxAllRows   = 400_000 // of all files of a case
)

// A csvFile is a data file read into columns; text cells are kept until a column
// is asked for.
type csvFile struct {
	heads []columnHead
	rows  [][]string
	comma bool // decimal commas
}

type columnHead struct{ full, name, unit string }

// errData is an error about a data file that a message can show as it is.
type errData struct{ text, hint string }

func (e *errData) Error() string { return e.text }

// file reads the points of a waveform from a data file.
func (f fielder) file(n *node, w *wave, name, timeName, valueName string) ([][2]float64, bool) {
	data, err := f.r.reopen(name)
	key := "file"
	var pts [][2]float64
	if err == nil {
		pts, key, err = data.points(f.r.c, name, timeName, valueName, w.field)
	}
	if err == nil {
		for _, p := range pts {
			x := slot{field: &f.r.formsOf(w.field).number, n: n.get("file"), owner: f.o}
			if d := f.r.c.inRange(&x, p[1]); d != nil {
				key, err = "file", &errData{text: fmt.Sprintf("%s holds %s, must be %s", quoted(name), f.r.c.show(p[1], w.field), d.Want)}
				break
			}
		}
	}
	if err == nil {
		return pts, true
	}
	f.dataFault(n, key, err)
	return nil, false
}

// dataFault reports what is wrong with a data file at the key of the case to blame.
func (f fielder) dataFault(n *node, key string, err error) {
	place := n.get("file").span
	if k := n.get(key); k != nil {
		place = k.span
	}
	d := Diagnostic{Code: "data-file", Thing: f.o.thing(), Text: err.Error()}
	var e *errData
	if errors.As(err, &e) {
		d.Hint = e.hint
	}
	f.r.at(place, d)
}

// open reads a data file once.
func (r *reader) open(name string) (*csvFile, error) {
	if known, ok := r.files[name]; ok {
		if known == nil {
			return nil, &errData{text: quoted(name) + " cannot be read, see above"}
		}
		return known, nil
	}
	r.files[name] = nil
	if r.fsys == nil {
		return nil, &errData{text: quoted(name) + " cannot be read: this case does not come from a directory", hint: "data files lie beside the case file"}
	}
	info, err := r.fsys.Stat(name)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return nil, &errData{text: quoted(name) + " does not exist", hint: "data files lie beside the case file"}
	case err != nil:
		return nil, &errData{text: quoted(name) + " cannot be read: " + reason(err), hint: "data files lie beside the case file"}
	case !info.Mode().IsRegular():
		return nil, &errData{text: quoted(name) + " is not a regular file"}
	case info.Size() > maxFileBytes:
		return nil, &errData{text: fmt.Sprintf("%s has %d bytes, more than the %d a data file may have", quoted(name), info.Size(), maxFileBytes)}
	}
	file, err := r.fsys.Open(name)
	if err != nil {
		return nil, &errData{text: quoted(name) + " cannot be read: " + reason(err)}
	}
	defer file.Close()
	text, err := io.ReadAll(io.LimitReader(file, maxFileBytes+1))
	if err != nil {
		return nil, &errData{text: quoted(name) + " cannot be read: " + reason(err)}
	}
	if len(text) > maxFileBytes { // it grew since
		return nil, &errData{text: fmt.Sprintf("%s has more than %d bytes", quoted(name), maxFileBytes)}
	}
	data, err := parseData(name, string(text))
	if err != nil {
		return nil, err
	}
	if r.rows += len(data.rows); r.rows > maxAllRows {
		return nil, &errData{text: fmt.Sprintf("the data files have more than %d rows together", maxAllRows)}
	}
	r.files[name] = data
	r.c.files = append(r.c.files, name)
	return data, nil
}

// reason is the cause of an error without the path it carries.
func reason(err error) string {
	var p *os.PathError
	if errors.As(err, &p) {
		return p.Err.Error()
	}
	return err.Error()
}

func parseData(name, text string) (*csvFile, error) {
	text = strings.TrimPrefix(text, bom)
	r := csv.NewReader(strings.NewReader(text))
	r.Comment, r.FieldsPerRecord, r.TrimLeadingSpace = '#', -1, true
	r.Comma = separator(text)
	head, err := r.Read()
	if err == io.EOF {
		return nil, &errData{text: quoted(name) + " is empty"}
	}
	if err != nil {
		return nil, &errData{text: quoted(name) + ": " + err.Error()}
	}
	data := &csvFile{comma: r.Comma != ','}
	for _, cell := range head {
		data.heads = append(data.heads, splitHead(strings.TrimSpace(cell)))
	}
	for {
		row, err := r.Read()
		if err == io.EOF {
			break
		}
		if err != nil {
			return nil, &errData{text: quoted(name) + ": " + err.Error()}
		}
		if len(row) != len(head) {
			line, _ := r.FieldPos(0)
			return nil, &errData{text: fmt.Sprintf("%s:%d: a row of %d cells under a header of %d", name, line, len(row), len(head))}
		}
		if len(data.rows) == maxFileRows {
			return nil, &errData{text: fmt.Sprintf("%s has more than %d rows", quoted(name), maxFileRows)}
		}
		data.rows = append(data.rows, row)
	}
	if len(data.rows) == 0 {
		return nil, &errData{text: quoted(name) + " has no rows below its header"}
	}
	return data, nil
}

// separator is the one of comma, semicolon and tab the header has most of.
func separator(text string) rune {
	for strings.HasPrefix(text, "#") {
		_, rest, ok := strings.Cut(text, "\n")
		if !ok {
			return ','
		}
		text = rest
	}
	head, _, _ := strings.Cut(text, "\n")
	best, most := ',', strings.Count(head, ",")
	for _, c := range ";\t" {
		if n := strings.Count(head, string(c)); n > most {
			best, most = c, n
		}
	}
	return best
}

// splitHead takes "T / °C", "T [°C]" or "T (°C)" apart.
func splitHead(cell string) columnHead {
	h := columnHead{full: cell, name: cell}
	for _, pair := range []string{"[]", "()"} {
		if open := strings.LastIndexByte(cell, pair[0]); open > 0 && cell[len(cell)-1] == pair[1] && cell[open-1] == ' ' {
			h.name, h.unit = strings.TrimSpace(cell[:open]), strings.TrimSpace(cell[open+1:len(cell)-1])
			return h
		}
	}
	if name, unit, ok := strings.Cut(cell, " / "); ok {
		h.name, h.unit = strings.TrimSpace(name), strings.TrimSpace(unit)
	}
	return h
}

// columns finds the columns of time and value; key is the key of the case to blame
// in an error.
func (d *csvFile) columns(file, timeName, valueName string) (t, v int, key string, err error) {
	t, err = d.column(file, timeName, 0)
	if err != nil {
		return t, v, "time", err
	}
	switch {
	case valueName != "":
		v, err = d.column(file, valueName, 0)
		return t, v, "column", err
	case len(d.heads) == 2:
		return t, 1 - t, "file", nil
	}
	return t, v, "file", &errData{text: fmt.Sprintf("%s has %d columns; column is missing", quoted(file), len(d.heads)), hint: "add column = " + basic(d.heads[len(d.heads)-1].name)}
}

// points returns time and value; key is the key of the case to blame in an error.
func (d *csvFile) points(c *Case, file, timeName, valueName string, field *Field) (pts [][2]float64, key string, err error) {
	t, v, key, err := d.columns(file, timeName, valueName)
	if err != nil {
		return nil, key, err
	}
	ft, err := d.scale(c, file, t, &Field{Dim: dimTime})
	if err != nil {
		return nil, "time", err
	}
	fv, err := d.scale(c, file, v, field)
	if err != nil {
		return nil, "column", err
	}
	pts = make([][2]float64, len(d.rows))
	for i, row := range d.rows {
		for k, c := range []struct {
			cell string
			s    linear
		}{{row[t], ft}, {row[v], fv}} {
			x, ok := d.number(c.cell)
			if !ok {
				return nil, "file", &errData{text: fmt.Sprintf("%s, row %d: %s is not a number", quoted(file), i+1, quoted(c.cell))}
			}
			pts[i][k] = c.s.add + c.s.times*x
		}
		switch {
		case i > 0 && pts[i][0] < pts[i-1][0]:
			return nil, "file", &errData{text: fmt.Sprintf("%s, row %d: the time goes back", quoted(file), i+1)}
		case i > 1 && pts[i][0] == pts[i-2][0]:
			return nil, "file", &errData{text: fmt.Sprintf("%s, row %d: the time stands three times; a jump takes two", quoted(file), i+1)}
		}
	}
	return pts, "file", nil
}

// number reads a cell.
func (d *csvFile) number(cell string) (float64, bool) {
	cell = strings.TrimSpace(cell)
	if d.comma {
		cell = strings.Replace(cell, ",", ".", 1)
	}
	x, err := strconv.ParseFloat(cell, 64)
	return x, err == nil && !math.IsNaN(x) && !math.IsInf(x, 0) && !strings.ContainsAny(cell, "_xX")
}

// column finds a column by its name or whole header; "" is the one at otherwise.
func (d *csvFile) column(file, name string, otherwise int) (int, error) {
	if name == "" {
		return otherwise, nil
	}
	found := -1
	for i, h := range d.heads {
		if h.name == name || h.full == name {
			if found >= 0 {
				return 0, &errData{text: fmt.Sprintf("%s has two columns %s", quoted(file), quoted(name)), hint: "name the column with its unit, as in the header"}
			}
			found = i
		}
	}
	if found >= 0 {
		return found, nil
	}
	var names []string
	for _, h := range d.heads {
		names = append(names, h.name)
	}
	e := &errData{text: fmt.Sprintf("%s has no column %s", quoted(file), quoted(name))}
	if near, ok := quantity.Nearest(name, names); ok {
		e.hint = "did you mean " + quoted(near) + "?"
	} else if len(names) <= 20 {
		e.hint = "its columns are " + printable(strings.Join(names, ", "))
	}
	return 0, e
}

// A linear turns a number of a column into SI: add + times·x.
type linear struct{ add, times float64 }

// scale finds how a column's numbers become SI.
func (d *csvFile) scale(c *Case, file string, i int, field *Field) (linear, error) {
	h := d.heads[i]
	at := func(x string) (float64, error) {
		v, err := quantity.Parse(strings.TrimSpace(x + " " + h.unit))
		if err != nil {
			return 0, err
		}
		si, _, err := c.want(v, field)
		return si, err
	}
	zero, err := at("0")
	one := 0.0
	if err == nil {
		one, err = at("1")
	}
	if err == nil {
		return linear{zero, one - zero}, nil
	}
	e := &errData{text: fmt.Sprintf("column %s of %s: ", quoted(h.full), quoted(file)), hint: fmt.Sprintf("write the unit into the header, like %q", h.name+" / "+unitOf(field))}
	if h.unit == "" {
		e.text += "no unit in the header; expected " + wanted(field)
		return linear{}, e
	}
	e.text += err.Error()
	return linear{}, e
}
