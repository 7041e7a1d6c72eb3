package draw

import (
	"bytes"
	"fmt"
	"html"
	"image/color"
	"strings"

	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"golang.org/x/image/font/opentype"
	"golang.org/x/image/font/sfnt"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/text"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
	"gonum.org/v1/plot/vg/vgimg"
	"gonum.org/v1/plot/vg/vgsvg"
)

// A Format is a format of pictures.
type Format uint8

const (
	SVG Format = iota
	PNG
)

const (
	sheetWidth  = 160 * vg.Millimeter
	sheetHeight = 100 * vg.Millimeter
	dotsPerInch = 200 // of a PNG: 1260 dots across

	small  = vg.Length(8) // text of axes and labels
	normal = vg.Length(9.5)
)

var (
	ink    = color.Gray{0x18}
	soft   = color.Gray{0x60} // axes
	faint  = color.Gray{0xdc} // grid
	paper  = color.Gray{0xff}
	typing = font.Font{Typeface: "Liberation", Variant: "Sans"}
)

// A sheet is a picture under way. Lengths are points from the lower left corner.
type sheet struct {
	draw.Canvas
	format Format
	title  string
	out    vg.CanvasWriterTo
	fonts  text.Plain
	face   *opentype.Font
	buf    sfnt.Buffer
}

func newSheet(f Format, title string, w, h vg.Length) (*sheet, error) {
	face, err := opentype.Parse(liberationsansregular.TTF)
	if err != nil {
		return nil, fmt.Errorf("the typeface: %w", err)
	}
	s := &sheet{format: f, title: title, face: face}
	s.fonts = text.Plain{Fonts: font.NewCache(font.Collection{{Font: typing, Face: face}})}
	switch f {
	case PNG:
		c := vgimg.PngCanvas{Canvas: vgimg.NewWith(vgimg.UseWH(w, h), vgimg.UseDPI(dotsPerInch))}
		s.out, s.Canvas = c, draw.New(c)
	default:
		c := vgsvg.New(w, h)
		s.out, s.Canvas = c, draw.New(c)
		s.fill(paper, vg.Point{}, vg.Point{X: w, Y: h})
	}
	return s, nil
}

// bytes closes the sheet.
func (s *sheet) bytes() ([]byte, error) {
	var b bytes.Buffer
	if _, err := s.out.WriteTo(&b); err != nil {
		return nil, err
	}
	if s.format != SVG {
		return b.Bytes(), nil
	}
	svg := b.String()
	svg = strings.ReplaceAll(svg, "font-family:Liberation Sans;", "font-family:'Liberation Sans',Arial,Helvetica,sans-serif;")
	if head := strings.Index(svg, "<svg"); head >= 0 {
		if end := strings.Index(svg[head:], ">"); end >= 0 {
			end += head + 1
			svg = `<?xml version="1.0" encoding="UTF-8"?>` + "\n" + svg[head:end] + "\n<title>" + html.EscapeString(s.printable(s.title)) + "</title>" + svg[end:]
		}
	}
	return []byte(svg), nil
}

func (s *sheet) fill(c color.Color, from, to vg.Point) {
	s.FillPolygon(c, []vg.Point{from, {X: to.X, Y: from.Y}, to, {X: from.X, Y: to.Y}})
}

// write puts one line of text at p: ax and ay say which part of it lies there, from 0
// (left, bottom) to 1 (right, top).
func (s *sheet) write(p vg.Point, words string, size vg.Length, c color.Color, ax, ay float64) {
	if ay == 0.5 {
		p.Y += 0.07 * size // the middle of figures and capitals, not of the line
	}
	s.FillText(s.style(size, c, ax, ay), p, s.printable(words))
}

func (s *sheet) style(size vg.Length, c color.Color, ax, ay float64) draw.TextStyle {
	return draw.TextStyle{
		Color: c, Font: font.From(typing, size), Handler: s.fonts,
		XAlign: text.XAlignment(-ax), YAlign: text.YAlignment(-ay),
	}
}

// width returns the length of a line of text.
func (s *sheet) width(words string, size vg.Length) vg.Length {
	return s.style(size, ink, 0, 0).Width(s.printable(words))
}

// fit shortens words to a length.
func (s *sheet) fit(words string, size, room vg.Length) string {
	if s.width(words, size) <= room {
		return words
	}
	r := []rune(words)
	for len(r) > 1 && s.width(string(r)+"…", size) > room {
		r = r[:len(r)-1]
	}
	return string(r) + "…"
}

// printable keeps a text on one line and free of what XML does not hold. What the
// typeface lacks shows as a box in a PNG; an SVG leaves it to the viewer's typefaces.
func (s *sheet) printable(words string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r < 0x20, 0x7f <= r && r <= 0x9f:
			return ' '
		case r == 0xfffe, r == 0xffff, 0x202a <= r && r <= 0x202e, 0x2066 <= r && r <= 0x2069:
			r = 0xfffd
		}
		if i, err := s.face.GlyphIndex(&s.buf, r); s.format == PNG && (err != nil || i == 0) {
			return '□'
		}
		return r
	}, strings.ToValidUTF8(words, "\ufffd"))
}

func (s *sheet) line(width vg.Length, c color.Color, dashes []vg.Length, pts ...vg.Point) {
	s.StrokeLines(draw.LineStyle{Color: c, Width: width, Dashes: dashes}, pts)
}

// note writes words over a patch of paper, so that a line behind does not cross them.
func (s *sheet) note(p vg.Point, words string, c color.Color, ax, ay float64) {
	w := s.width(words, small)
	x, y := p.X-vg.Length(ax)*w, p.Y-vg.Length(ay)*small
	s.fill(paper, vg.Point{X: x - 1.5, Y: y - 1.5}, vg.Point{X: x + w + 1.5, Y: y + small})
	s.write(p, words, small, c, ax, ay)
}
