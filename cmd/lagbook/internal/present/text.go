package present

import (
	"bytes"
	"io"
	"strings"

	"github.com/olekukonko/tablewriter"
	"github.com/olekukonko/tablewriter/renderer"
	"github.com/olekukonko/tablewriter/tw"
)

const (
	defaultWidth = 80
	narrowest    = 40
	indent       = "  "
)

// Text writes d for a terminal or a plain file: headings at the margin, what
// belongs to them indented, tables with a rule under their heads and numbers on
// their decimal points. No line ends in a space, and there are no escape codes.
func Text(w io.Writer, d Doc) error {
	t := page{w: w, width: d.Width}
	if t.width == 0 {
		t.width = defaultWidth
	}
	t.width = max(t.width, narrowest)
	if d.Title != "" {
		t.wrap("", "", clean(d.Title))
	}
	for _, p := range d.Parts {
		t.part(p)
	}
	return t.err
}

// A page is text under way.
type page struct {
	w      io.Writer
	width  int
	wrote  bool // something stands above
	margin string
	err    error
}

func (t *page) line(s string) {
	if t.err == nil {
		_, t.err = io.WriteString(t.w, strings.TrimRight(s, " ")+"\n")
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
		t.wrap(t.margin, "", clean(p.Text))
	case List:
		for _, s := range p.Items {
			t.wrap(t.margin, "- ", clean(s))
		}
	case Facts:
		t.facts(p)
	case Table:
		t.table(p)
	case Warning:
		t.wrap(t.margin, "Warning: ", clean(p.Text))
	case Formula:
		t.wrap(t.margin+indent, "", clean(p.Text))
	case Caution:
		t.wrap("", "Caution: ", clean(p.Text))
	}
}

func (t *page) heading(h Heading) {
	t.margin = ""
	if h.Level > 1 {
		t.margin = indent
	}
	t.wrap(t.margin, "", clean(h.Text))
	t.margin += indent
}

// facts writes name and value in two columns; a name too long for its column
// stands above its value.
func (t *page) facts(f Facts) {
	longest := 0
	for _, x := range f.List {
		if n := width(clean(x.Name)); n <= t.width/3 {
			longest = max(longest, n)
		}
	}
	for _, x := range f.List {
		name := clean(x.Name)
		lead := name + strings.Repeat(" ", max(0, longest-width(name))+2)
		if width(name) > longest {
			t.wrap(t.margin, "", name)
			lead = strings.Repeat(" ", longest+2)
		}
		t.wrap(t.margin, lead, clean(x.Value))
	}
}

// wrap breaks s at spaces. lead stands before the first line, and the others
// start below its end.
func (t *page) wrap(margin, lead, s string) {
	room := t.width - width(margin) - width(lead)
	first := true
	for _, line := range fold(s, max(room, narrowest/2)) {
		if first {
			t.line(margin + lead + line)
			lead = strings.Repeat(" ", width(lead))
			first = false
			continue
		}
		t.line(margin + lead + line)
	}
}

// fold breaks s into lines of at most room columns where there is a space; a
// longer word stays whole. There is at least one line.
func fold(s string, room int) []string {
	if width(s) <= room {
		return []string{s}
	}
	var lines []string
	line, used := "", 0
	for _, word := range strings.Split(s, " ") {
		n := width(word)
		if line != "" && used+1+n > room {
			lines = append(lines, line)
			line, used = word, n
			continue
		}
		if line != "" {
			line, used = line+" ", used+1
		}
		line, used = line+word, used+n
	}
	return append(lines, line)
}

func (t *page) table(tab Table) {
	if tab.Caption != "" {
		t.wrap(t.margin, "", clean(tab.Caption))
	}
	if len(tab.Columns) == 0 {
		return
	}
	heads, rows := tab.cells("", clean)
	for k, c := range tab.Columns {
		if c.Align == Point {
			alignPoints(rows, k)
		}
	}
	var b bytes.Buffer
	err := draw(&b, ruled(), tab.aligns(), heads, rows, tablewriter.WithPadding(tw.Padding{Right: "  ", Overwrite: true}))
	if err != nil {
		t.err = err
		return
	}
	t.lines(strings.Split(strings.TrimRight(b.String(), "\n"), "\n"))
}

// lines writes a table's lines, its rule no longer than the rest.
func (t *page) lines(table []string) {
	longest := 0
	for i, s := range table {
		table[i] = strings.TrimRight(s, " ")
		if i != ruleLine {
			longest = max(longest, width(table[i]))
		}
	}
	if len(table) > ruleLine {
		table[ruleLine] = strings.Repeat("─", longest)
	}
	for _, s := range table {
		t.line(t.margin + s)
	}
}

// ruleLine is the place of the rule, under the heads.
const ruleLine = 1

// ruled draws columns parted by blanks, with a rule under the heads alone.
func ruled() tw.Renderer {
	return renderer.NewBlueprint(tw.Rendition{
		Borders: tw.BorderNone,
		Symbols: tw.NewSymbolCustom("ruled").WithRow("─").WithColumn("").WithCenter("─"),
		Settings: tw.Settings{
			Separators: tw.Separators{BetweenColumns: tw.Off, BetweenRows: tw.Off},
			Lines:      tw.Lines{ShowHeaderLine: tw.On},
		},
	})
}
