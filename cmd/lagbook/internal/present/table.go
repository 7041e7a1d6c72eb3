package present

import (
	"bytes"
	"reflect"
	"strings"

	"github.com/olekukonko/tablewriter"
	"github.com/olekukonko/tablewriter/pkg/twcache"
	"github.com/olekukonko/tablewriter/pkg/twwidth"
	"github.com/olekukonko/tablewriter/tw"
)

// remark heads the column of marks where a format needs a head for it.
const remark = "remark"

// cells returns heads and rows of one width, each escaped, the marks as a last
// column under markHead.
func (t Table) cells(markHead string, escape func(string) string) (heads []string, rows [][]string) {
	for _, c := range t.Columns {
		heads = append(heads, escape(c.Head))
	}
	if t.hasMarks() {
		heads = append(heads, escape(markHead))
	}
	for i, r := range t.Rows {
		row := make([]string, len(heads))
		for k := range min(len(r), len(t.Columns)) {
			row[k] = escape(r[k])
		}
		if t.hasMarks() {
			row[len(heads)-1] = escape(t.mark(i))
		}
		rows = append(rows, row)
	}
	return heads, rows
}

func (t Table) hasMarks() bool {
	for _, m := range t.Marks {
		if m != "" {
			return true
		}
	}
	return false
}

func (t Table) mark(row int) string {
	if row < len(t.Marks) {
		return t.Marks[row]
	}
	return ""
}

// alignments are those of the table writer.
func alignments(list []Align) []tw.Align {
	out := make([]tw.Align, len(list))
	for i, a := range list {
		out[i] = tw.AlignRight
		if a == Left {
			out[i] = tw.AlignLeft
		}
	}
	return out
}

// A drawer draws the tables of a page with one table writer, which takes half a
// megabyte of caches to make.
type drawer struct {
	renderer tw.Renderer
	buffer   bytes.Buffer
	table    *tablewriter.Table
}

// draw returns cells as the table writer draws them, with everything off that
// would change them: it would turn the head "ΔT / mK" into "ΔT / M K", fold long
// cells, and take the width of a letter from the locale. What it returns is
// valid until the next call.
func (d *drawer) draw(aligns []tw.Align, heads []string, rows [][]string) ([]byte, error) {
	d.buffer.Reset()
	align := tw.CellAlignment{PerColumn: aligns}
	aligned := []tablewriter.Option{tablewriter.WithHeaderAlignmentConfig(align), tablewriter.WithRowAlignmentConfig(align)}
	if d.table == nil {
		d.table = tablewriter.NewTable(&d.buffer, append(aligned,
			tablewriter.WithRenderer(d.renderer),
			tablewriter.WithStringerCacheCustom(twcache.NewLRU[reflect.Type, reflect.Value](1)), // of no use to cells that are strings
			tablewriter.WithEastAsian(tw.Off),
			tablewriter.WithHeaderAutoFormat(tw.Off),
			tablewriter.WithRowAutoFormat(tw.Off),
			tablewriter.WithHeaderAutoWrap(tw.WrapNone),
			tablewriter.WithRowAutoWrap(tw.WrapNone),
			tablewriter.WithTrimSpace(tw.Off),
			tablewriter.WithTrimTab(tw.Off),
			tablewriter.WithTrimLine(tw.Off))...)
	} else {
		d.table.Reset()
		d.table.Options(aligned...)
	}
	d.table.Header(heads)
	for _, r := range rows {
		if err := d.table.Append(r); err != nil {
			return nil, err
		}
	}
	err := d.table.Render()
	return d.buffer.Bytes(), err
}

// width is how many columns of a terminal s takes.
func width(s string) int {
	return twwidth.WidthWithOptions(s, twwidth.Options{})
}

// isNumber reports whether s is a plain decimal number: no hexadecimal, no
// infinity, no unit.
func isNumber(s string) bool {
	s = strings.TrimPrefix(strings.TrimPrefix(s, "-"), "+")
	whole, power, scientific := strings.Cut(s, "e")
	if scientific && !digits(strings.TrimPrefix(strings.TrimPrefix(power, "-"), "+")) {
		return false
	}
	left, right, point := strings.Cut(whole, ".")
	if point && right == "" && left == "" {
		return false
	}
	return (left == "" && point || digits(left)) && (right == "" || digits(right))
}

func digits(s string) bool { return s != "" && strings.Trim(s, "0123456789") == "" }
