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
		b.WriteString("# " + escapeMarkdown(d.Title) + "\n")
	}
	for _, p := range d.Parts {
		if b.Len() > 0 {
			b.WriteString("\n")
		}
		if err := markdownPart(&b, p); err != nil {
			return err
		}
	}
	_, err := w.Write(b.Bytes())
	return err
}

func markdownPart(b *bytes.Buffer, p Part) error {
	switch p := p.(type) {
	case Heading:
		b.WriteString(strings.Repeat("#", min(max(1, p.Level)+1, 6)) + " " + escapeMarkdown(p.Text) + "\n")
	case Paragraph:
		b.WriteString(markdownStart(escapeMarkdown(p.Text)) + "\n")
	case List:
		for _, s := range p.Items { // * and not -: a list behind facts stays a list of its own
			b.WriteString("* " + markdownStart(escapeMarkdown(s)) + "\n")
		}
	case Facts:
		for _, f := range p.List {
			b.WriteString("- **" + escapeMarkdown(f.Name) + "**: " + escapeMarkdown(f.Value) + "\n")
		}
	case Table:
		return markdownTable(b, p)
	case Warning:
		b.WriteString("> **Warning:** " + escapeMarkdown(p.Text) + "\n")
	case Formula:
		b.WriteString("> " + markdownStart(escapeMarkdown(p.Text)) + "\n")
	case Caution:
		b.WriteString("> **Caution:** " + escapeMarkdown(p.Text) + "\n")
	}
	return nil
}

func markdownTable(b *bytes.Buffer, t Table) error {
	if t.Caption != "" {
		b.WriteString("**" + escapeMarkdown(t.Caption) + "**\n\n")
	}
	if len(t.Columns) == 0 {
		return nil
	}
	heads, rows := t.cells(remark, escapeMarkdown)
	return draw(b, renderer.NewMarkdown(), t.aligns(), heads, rows)
}

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
