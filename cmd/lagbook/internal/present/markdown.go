package present

import (
	"bytes"
	"io"
	"strings"

	"github.com/olekukonko/tablewriter/renderer"
)

// Markdown writes d in CommonMark with the tables of GitHub's extension. Each
// paragraph is one line.
func Markdown(w io.Writer, d Doc) error {
	var b bytes.Buffer
	if d.Title != "" {
		b.WriteString("# " + inMarkdown(d.Title) + "\n")
	}
	if line := byline(d, "**", "**", inMarkdown); line != "" {
		b.WriteString("\n" + line + "\n")
	}
	tables := drawer{renderer: renderer.NewMarkdown()}
	for _, p := range d.Parts {
		if b.Len() > 0 {
			b.WriteString("\n")
		}
		if err := markdownPart(&b, &tables, p); err != nil {
			return err
		}
	}
	_, err := w.Write(b.Bytes())
	return err
}

func markdownPart(b *bytes.Buffer, tables *drawer, p Part) error {
	switch p := p.(type) {
	case Heading:
		b.WriteString(strings.Repeat("#", min(max(1, p.Level)+1, 6)) + " " + inMarkdown(p.Text) + "\n")
	case Paragraph:
		b.WriteString(markdownStart(inMarkdown(p.Text)) + "\n")
	case List:
		for _, s := range p.Items { // * and not -: a list behind facts stays a list of its own
			b.WriteString("* " + markdownStart(inMarkdown(s)) + "\n")
		}
	case Facts:
		for _, f := range p.List {
			b.WriteString("- **" + inMarkdown(f.Name) + "**: " + inMarkdown(f.Value) + "\n")
		}
	case Table:
		return markdownTable(b, tables, p)
	case Warning:
		b.WriteString("> **Warning:** " + inMarkdown(p.Text) + "\n")
	case Formula:
		b.WriteString("> " + markdownStart(inMarkdown(p.Text)) + "\n")
	case Caution:
		b.WriteString("> **Caution:** " + inMarkdown(p.Text) + "\n")
	}
	return nil
}

func markdownTable(b *bytes.Buffer, tables *drawer, t Table) error {
	if t.Caption != "" {
		b.WriteString("**" + inMarkdown(t.Caption) + "**\n\n")
	}
	if len(t.Columns) == 0 {
		return nil
	}
	g := newGrid(t, remark)
	for k, h := range g.heads {
		g.heads[k] = escapeMarkdown(plainSpaces(h))
	}
	for _, r := range g.rows {
		for k, c := range r {
			r[k] = escapeMarkdown(plainSpaces(c))
		}
	}
	drawn, err := tables.draw(alignments(g.aligns), g.heads, g.rows)
	b.Write(drawn)
	return err
}

// inMarkdown makes s stand for itself, its numbers as a page sets them. Spaces
// that do not break are left to whoever sets the page.
func inMarkdown(s string) string { return escapeMarkdown(plainSpaces(polish(s))) }

// markdownSpecial are the characters that may start emphasis, code, links,
// cells, tags, entities or formulas within a line.
const markdownSpecial = "\\`*_[]<>|~&$"

// escapeMarkdown makes s stand for itself within a line or a cell.
func escapeMarkdown(s string) string {
	s = clean(s)
	if !strings.ContainsAny(s, markdownSpecial) {
		return s
	}
	var b strings.Builder
	for _, r := range s {
		if strings.ContainsRune(markdownSpecial, r) {
			b.WriteByte('\\')
		}
		b.WriteRune(r)
	}
	return b.String()
}

// markdownStart keeps what starts a line from starting a heading, a list, a
// quotation or a rule.
func markdownStart(s string) string {
	body := strings.TrimLeft(s, " ")
	if body == "" {
		return body
	}
	if strings.ContainsRune("#+-=", rune(body[0])) {
		return "\\" + body
	}
	if n := len(body) - len(strings.TrimLeft(body, "0123456789")); n > 0 && n < len(body) && (body[n] == '.' || body[n] == ')') {
		return body[:n] + "\\" + body[n:]
	}
	return body
}
