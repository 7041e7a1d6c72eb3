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
		b.WriteString("<h1>" + escapeHTML(d.Title) + "</h1>\n")
	}
	for _, p := range d.Parts {
		if err := htmlPart(&b, p); err != nil {
			return err
		}
	}
	b.WriteString("</main>\n</body>\n</html>\n")
	_, err := w.Write(b.Bytes())
	return err
}

func htmlPart(b *bytes.Buffer, p Part) error {
	switch p := p.(type) {
	case Heading:
		tag := "h" + strconv.Itoa(min(max(1, p.Level)+1, 6))
		b.WriteString("<" + tag + ">" + escapeHTML(p.Text) + "</" + tag + ">\n")
	case Paragraph:
		b.WriteString("<p>" + escapeHTML(p.Text) + "</p>\n")
	case List:
		b.WriteString("<ul>\n")
		for _, s := range p.Items {
			b.WriteString("<li>" + escapeHTML(s) + "</li>\n")
		}
		b.WriteString("</ul>\n")
	case Facts:
		b.WriteString("<dl>\n")
		for _, f := range p.List {
			b.WriteString("<dt>" + escapeHTML(f.Name) + "</dt><dd>" + escapeHTML(f.Value) + "</dd>\n")
		}
		b.WriteString("</dl>\n")
	case Table:
		return htmlTable(b, p)
	case Warning:
		b.WriteString("<p class=\"warning\" role=\"note\"><strong>Warning:</strong> " + escapeHTML(p.Text) + "</p>\n")
	case Formula:
		b.WriteString("<p class=\"formula\">" + escapeHTML(p.Text) + "</p>\n")
	case Caution:
		b.WriteString("<p class=\"caution\"><strong>Caution:</strong> " + escapeHTML(p.Text) + "</p>\n")
	}
	return nil
}

// htmlTable lets the table writer draw and then adds what it does not know: the
// caption, the scope of the heads, and classes in place of a style on each
// cell. The cells are escaped, so none of the replaced texts can be theirs.
func htmlTable(b *bytes.Buffer, t Table) error {
	if len(t.Columns) == 0 {
		return nil
	}
	heads, rows := t.cells(remark, escapeHTML)
	var raw bytes.Buffer
	if err := draw(&raw, renderer.NewHTML(renderer.HTMLConfig{EscapeContent: false}), t.aligns(), heads, rows); err != nil {
		return err
	}
	caption := "<table>"
	if t.Caption != "" {
		caption += "\n<caption>" + escapeHTML(t.Caption) + "</caption>"
	}
	b.WriteString("<div class=\"table\">\n")
	_, err := strings.NewReplacer(
		"<table>", caption,
		`<th style="text-align: right;">`, `<th scope="col" class="n">`,
		`<th style="text-align: left;">`, `<th scope="col">`,
		`<td style="text-align: right;">`, `<td class="n">`,
		`<td style="text-align: left;">`, `<td>`,
	).WriteString(b, raw.String())
	b.WriteString("</div>\n")
	return err
}

// escapeHTML makes s stand for itself between tags and in a quoted attribute.
func escapeHTML(s string) string { return html.EscapeString(clean(s)) }
