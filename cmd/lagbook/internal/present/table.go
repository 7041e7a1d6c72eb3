package present

import (
	"io"
	"strings"

	"github.com/olekukonko/tablewriter"
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

// aligns returns one alignment a column, marks included.
func (t Table) aligns() []tw.Align {
	var list []tw.Align
	for _, c := range t.Columns {
		if c.Align == Left {
			list = append(list, tw.AlignLeft)
		} else {
			list = append(list, tw.AlignRight)
		}
	}
	if t.hasMarks() {
		list = append(list, tw.AlignLeft)
	}
	return list
}

// draw hands cells to the table writer with everything off that would change
// them: it would turn the head "ΔT / mK" into "ΔT / M K", fold long cells, and
// take the width of a letter from the locale.
func draw(w io.Writer, r tw.Renderer, aligns []tw.Align, heads []string, rows [][]string, more ...tablewriter.Option) error {
	align := tw.CellAlignment{PerColumn: aligns}
	options := append([]tablewriter.Option{
		tablewriter.WithRenderer(r),
		tablewriter.WithEastAsian(tw.Off),
		tablewriter.WithHeaderAutoFormat(tw.Off),
		tablewriter.WithRowAutoFormat(tw.Off),
		tablewriter.WithHeaderAutoWrap(tw.WrapNone),
		tablewriter.WithRowAutoWrap(tw.WrapNone),
		tablewriter.WithTrimSpace(tw.Off),
		tablewriter.WithTrimTab(tw.Off),
		tablewriter.WithTrimLine(tw.Off),
		tablewriter.WithHeaderAlignmentConfig(align),
		tablewriter.WithRowAlignmentConfig(align),
	}, more...)
	t := tablewriter.NewTable(w, options...)
	t.Header(heads)
	for _, r := range rows {
		if err := t.Append(r); err != nil {
			return err
		}
	}
	return t.Render()
}

// width is how many columns of a terminal s takes.
func width(s string) int {
	return twwidth.WidthWithOptions(s, twwidth.Options{})
}

// alignPoints pads the cells of column k so that their decimal points stand in
// one line when the cells are set flush right.
func alignPoints(rows [][]string, k int) {
	behind := 0
	for _, r := range rows {
		behind = max(behind, tail(r[k]))
	}
	for _, r := range rows {
		if r[k] != "" {
			r[k] += strings.Repeat(" ", behind-tail(r[k]))
		}
	}
}

// tail is the width of a number from its decimal point on, or from its
// exponent; 0 for a cell that holds no number.
func tail(s string) int {
	if !isNumber(s) {
		return 0
	}
	if i := strings.IndexAny(s, ".e"); i >= 0 {
		return len(s) - i
	}
	return 0
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
