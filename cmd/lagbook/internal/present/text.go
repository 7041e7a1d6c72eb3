package present

import (
	"io"
	"strings"

	"github.com/olekukonko/ll"
	"github.com/olekukonko/tablewriter/renderer"
	"github.com/olekukonko/tablewriter/tw"
)

const (
	defaultWidth = 100
	narrowest    = 40
	widestText   = 80 // longer lines of running text are hard to read; tables may be wider
	indent       = "  "
)

// Text writes d for a terminal or a plain file: headings at the margin, what
// belongs to them indented, tables with a rule under their heads and numbers on
// their decimal points. No line ends in a space, and there are no escape codes.
func Text(w io.Writer, d Doc) error {
	t := page{w: w, tables: d.Width, ruled: columns()}
	if t.tables == 0 {
		t.tables = defaultWidth
	}
	t.tables = max(t.tables, narrowest)
	t.width = min(t.tables, widestText)
	if d.Title != "" {
		t.wrap("", "", polish(d.Title))
	}
	if line := byline(d, "[", "]", clean); line != "" {
		t.wrap("", "", line)
	}
	for _, p := range d.Parts {
		t.part(p)
	}
	return t.err
}

// A page is text under way.
type page struct {
	w      io.Writer
	width  int  // of running text
	tables int  // of tables
	wrote  bool // something stands above
	margin string
	err    error
	ruled  tw.Renderer
}

func (t *page) line(s string) {
	if t.err == nil {
		s = strings.TrimRight(plainSpaces(s), " ")
		_, t.err = io.WriteString(t.w, s+"\n")
		t.wrote = true
	}
}

func (t *page) gap() {
	if t.wrote {
		t.line("")
	}
}

func (t *page) part(p Part) {
	t.gap()
	switch p := p.(type) {
	case Heading:
		t.heading(p)
	case Paragraph:
		t.wrap(t.margin, "", polish(p.Text))
	case List:
		for _, s := range p.Items {
			t.wrap(t.margin, "- ", polish(s))
		}
	case Facts:
		t.facts(p)
	case Table:
		t.table(p)
	case Warning:
		t.wrap(t.margin, "Warning: ", polish(p.Text))
	case Formula:
		t.wrap(t.margin+indent, "", polish(p.Text))
	case Caution:
		t.wrap("", "Caution: ", polish(p.Text))
	}
}

func (t *page) heading(h Heading) {
	t.margin = ""
	if h.Level > 1 {
		t.margin = indent
	}
	t.wrap(t.margin, "", polish(h.Text))
	t.margin += indent
}

// facts writes name and value in two columns; a name too long for its column
// stands above its value.
func (t *page) facts(f Facts) {
	longest := 0
	for _, x := range f.List {
		if n := width(polish(x.Name)); n <= t.width/3 {
			longest = max(longest, n)
		}
	}
	for _, x := range f.List {
		name := polish(x.Name)
		lead := name + strings.Repeat(" ", max(0, longest-width(name))+2)
		if width(name) > longest {
			t.wrap(t.margin, "", name)
			lead = strings.Repeat(" ", longest+2)
		}
		t.wrap(t.margin, lead, polish(x.Value))
	}
}

// wrap breaks s at spaces. lead stands before the first line, and the others
// start below its end.
func (t *page) wrap(margin, lead, s string) {
	room := t.width - width(margin) - width(lead)
	first := true
	for _, line := range fold(s, max(room, narrowest/2), width) {
		if first {
			t.line(margin + lead + line)
			lead = strings.Repeat(" ", width(lead))
			first = false
			continue
		}
		t.line(margin + lead + line)
	}
}

// table writes a table within the page: words are broken to fit, and what has
// too many columns is drawn in pieces below one another.
func (t *page) table(tab Table) {
	if tab.Caption != "" {
		t.wrap(t.margin, "", polish(tab.Caption))
	}
	if len(tab.Columns) == 0 {
		return
	}
	g := newGrid(tab, "")
	g.pointColumns(func(cell, lacks string) string { return cell + strings.Repeat(nbspText, width(lacks)) })
	for i, piece := range g.fit(width, gutter, t.tables-width(t.margin)) {
		if i > 0 {
			t.line("")
		}
		t.piece(piece)
	}
}

// gutter is the number of blanks between columns.
const gutter = 2

func (t *page) piece(g grid) {
	heads := g.foldHeads(width)
	lines := new(lineWriter)
	if t.err = t.ruled.Start(lines); t.err != nil {
		return
	}
	row := rendered(g)
	for i := range heads[0] {
		t.drawLine(row, g, func(k int) string { return heads[k][i] })
	}
	above := len(lines.list)
	cells := make([][]string, len(g.heads))
	for _, r := range g.rows {
		most := 1
		for k, s := range r {
			cells[k] = fold(s, g.widths[k], width)
			most = max(most, len(cells[k]))
		}
		for i := range most {
			t.drawLine(row, g, func(k int) string {
				if i < len(cells[k]) {
					return cells[k][i]
				}
				return ""
			})
		}
	}
	if t.err = t.ruled.Close(); t.err == nil {
		t.lines(lines.list, above)
	}
}

// rendered is a line as the renderer of the table writer takes it, without its
// cells.
func rendered(g grid) tw.Formatting {
	f := tw.Formatting{Row: tw.RowContext{Position: tw.Row, Current: make(map[int]tw.CellContext, len(g.widths)), Widths: tw.NewMapper[int, int]()}}
	for k, w := range g.widths {
		f.Row.Widths.Set(k, w+gutter)
	}
	return f
}

// drawLine draws one line of a table. The renderer is called without the table
// writer around it: the lines are laid out already, and to do so again takes it
// half a megabyte of caches and two and a half times as long, which a short
// command feels.
func (t *page) drawLine(row tw.Formatting, g grid, cell func(k int) string) {
	for k, a := range alignments(g.aligns) {
		row.Row.Current[k] = tw.CellContext{Data: cell(k), Align: a, Padding: tw.Padding{Right: blanks, Overwrite: true}}
	}
	t.ruled.Row(nil, row)
}

// blanks are what parts two columns.
var blanks = strings.Repeat(" ", gutter)

// A lineWriter collects the lines that the renderer writes, one a call.
type lineWriter struct{ list []string }

func (w *lineWriter) Write(b []byte) (int, error) {
	w.list = append(w.list, strings.TrimSuffix(string(b), "\n"))
	return len(b), nil
}

// lines writes the lines of a table, under the heads a rule as long as the
// longest.
func (t *page) lines(table []string, above int) {
	longest := 0
	for i, s := range table {
		table[i] = strings.TrimRight(s, " "+nbspText)
		longest = max(longest, width(table[i]))
	}
	for i, s := range table {
		if i == above {
			t.line(t.margin + strings.Repeat("─", longest))
		}
		t.line(t.margin + s)
	}
	if len(table) == above {
		t.line(t.margin + strings.Repeat("─", longest))
	}
}

// columns is the renderer: it sets cells side by side, with blanks between them
// and no borders.
func columns() tw.Renderer {
	r := renderer.NewBlueprint(tw.Rendition{
		Borders:  tw.BorderNone,
		Symbols:  tw.NewSymbolCustom("blank"),
		Settings: tw.Settings{Separators: tw.Separators{BetweenColumns: tw.Off}},
	})
	r.Logger(ll.New("").Suspend()) // only off, it would still write each of its remarks before it drops it
	return r
}
