package present

import (
	"bytes"
	_ "embed"
	"html"
	"io"
	"strconv"
	"strings"

	"github.com/olekukonko/tablewriter/renderer"
)

//go:embed page.css
var style string

// HTML writes d as one page that asks for nothing else: no script, no picture,
// no font, no style sheet beside it. It reads in light and dark and on paper.
func HTML(w io.Writer, d Doc) error {
	var b bytes.Buffer
	lang := d.Lang
	if lang == "" {
		lang = "en"
	}
	b.WriteString("<!DOCTYPE html>\n<html lang=\"" + escapeHTML(lang) + "\">\n<head>\n<meta charset=\"utf-8\">\n" +
		"<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'\">\n" +
		"<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n" +
		"<title>" + escapeHTML(d.Title) + "</title>\n<style>\n" + style + "</style>\n</head>\n<body>\n<main>\n")
	if d.Title != "" {
		b.WriteString("<h1>" + inHTML(d.Title) + "</h1>\n")
	}
	if line := byline(d, `<strong class="label">`, "</strong>", escapeHTML); line != "" {
		b.WriteString("<p class=\"byline\">" + line + "</p>\n")
	}
	tables := drawer{renderer: renderer.NewHTML(renderer.HTMLConfig{EscapeContent: false})}
	for _, p := range d.Parts {
		if err := htmlPart(&b, &tables, p); err != nil {
			return err
		}
	}
	b.WriteString("</main>\n</body>\n</html>\n")
	_, err := w.Write(b.Bytes())
	return err
}

func htmlPart(b *bytes.Buffer, tables *drawer, p Part) error {
	switch p := p.(type) {
	case Heading:
		tag := "h" + strconv.Itoa(min(max(1, p.Level)+1, 6))
		b.WriteString("<" + tag + ">" + inHTML(p.Text) + "</" + tag + ">\n")
	case Paragraph:
		b.WriteString("<p>" + inHTML(p.Text) + "</p>\n")
	case List:
		b.WriteString("<ul>\n")
		for _, s := range p.Items {
			b.WriteString("<li>" + inHTML(s) + "</li>\n")
		}
		b.WriteString("</ul>\n")
	case Facts:
		b.WriteString("<dl>\n")
		for _, f := range p.List {
			b.WriteString("<dt>" + inHTML(f.Name) + "</dt><dd>" + inHTML(f.Value) + "</dd>\n")
		}
		b.WriteString("</dl>\n")
	case Table:
		return htmlTable(b, tables, p)
	case Warning:
		b.WriteString("<p class=\"warning\" role=\"note\"><strong>Warning:</strong> " + inHTML(p.Text) + "</p>\n")
	case Formula:
		b.WriteString("<p class=\"formula\">" + inHTML(p.Text) + "</p>\n")
	case Caution:
		b.WriteString("<p class=\"caution\"><strong>Caution:</strong> " + inHTML(p.Text) + "</p>\n")
	}
	return nil
}

// htmlTable lets the table writer draw and then adds what it does not know: the
// caption, the scope of the heads, and classes in place of a style on each
// cell. The cells are escaped, so none of the replaced texts can be theirs.
func htmlTable(b *bytes.Buffer, tables *drawer, t Table) error {
	if len(t.Columns) == 0 {
		return nil
	}
	g := newGrid(t, remark)
	g.pointColumns(func(cell, lacks string) string { return cell + figureSpaces(lacks) })
	for k, h := range g.heads {
		g.heads[k] = escapeHTML(h)
	}
	for _, r := range g.rows {
		for k, c := range r {
			r[k] = escapeHTML(c)
		}
	}
	raw, err := tables.draw(alignments(g.aligns), g.heads, g.rows)
	if err != nil {
		return err
	}
	caption := "<table>"
	if t.Caption != "" {
		caption += "\n<caption>" + inHTML(t.Caption) + "</caption>"
	}
	b.WriteString("<div class=\"table\">\n")
	_, err = strings.NewReplacer(
		"<table>", caption,
		`<th style="text-align: right;">`, `<th scope="col" class="n">`,
		`<th style="text-align: left;">`, `<th scope="col">`,
		`<td style="text-align: right;">`, `<td class="n">`,
		`<td style="text-align: left;">`, `<td>`,
	).WriteString(b, string(raw))
	b.WriteString("</div>\n")
	return err
}

// figureSpaces take the room of the digits, and of the point, that a number
// lacks behind its own: so that points stand in one line.
func figureSpaces(lacks string) string {
	var b strings.Builder
	for _, r := range lacks {
		if r == '.' {
			b.WriteRune('\u2008') // as wide as a point
		} else {
			b.WriteRune('\u2007') // as wide as a digit
		}
	}
	return b.String()
}

// inHTML makes s stand for itself, its numbers as a page sets them.
func inHTML(s string) string { return escapeHTML(polish(s)) }

// escapeHTML makes s stand for itself between tags and in a quoted attribute.
func escapeHTML(s string) string {
	return strings.ReplaceAll(html.EscapeString(clean(s)), nbspText, "&nbsp;")
}
