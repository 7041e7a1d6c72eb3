package draw

import (
	"fmt"
	"image/color"
	"math"

	"gonum.org/v1/plot/vg"

	"lagbook/network/study"
)

// Plane draws the poles and zeros of one transfer function.
func Plane(f Format, c *study.Plane, p study.Printer) ([]byte, error) {
	t := &c.Transfer
	w := windowOf(t)
	s, err := newSheet(f, heading(c.Title, t.Input+" → "+t.Output), sheetWidth, sheetHeight)
	if err != nil {
		return nil, err
	}
	top := s.headline(c.Title, fmt.Sprintf("%s → %s: poles × and zeros ○%s", t.Input, t.Output, w.words())) - 24
	a := &panel{sheet: s, left: 52, right: s.Max.X - 16, bottom: 34, top: top}
	a.x, a.y = w.scales(9, 7)
	s.fill(color.Gray{0xf2}, vg.Point{X: a.px(0), Y: a.bottom}, vg.Point{X: a.right, Y: a.top})
	a.rules("Im s / (rad/s)")
	a.floor("Re s / (1/s)", true)
	a.line(0.9, ink, nil, a.at(0, w.im0), a.at(0, w.im1))
	a.line(axisWidth, soft, nil, a.at(w.re0, 0), a.at(w.re1, 0))
	a.write(vg.Point{X: a.right - 4, Y: a.top - 4}, "grows", small, soft, 1, 1)
	a.write(vg.Point{X: a.left + 5, Y: a.top - 4}, "decays", small, soft, 0, 1)
	a.roots(t, p)
	return s.bytes()
}

// A window is the part of the s-plane that is drawn. knee > 0: both axes are
// logarithmic beyond ±knee.
type planeWindow struct {
	re0, re1, im0, im1, knee float64
}

// folding is the spread of moduli from which on the axes are logarithmic.
const folding = 30

// windowOf chooses the part of the plane that holds all poles and zeros.
func windowOf(t *study.Transfer) planeWindow {
	least, most := math.Inf(1), 0.0
	left, right, high := 0.0, 0.0, 0.0
	see := func(re, im float64) {
		if m := math.Hypot(re, im); m > 0 {
			least, most = min(least, m), max(most, m)
		}
		left, right, high = min(left, re), max(right, re), max(high, math.Abs(im))
	}
	for _, q := range t.Poles {
		see(q.Re, q.Im)
	}
	for _, q := range t.Zeros {
		see(q.Re, q.Im)
	}
	if most == 0 { // poles at 0 alone
		least, most = 1, 1
	}
	if most <= folding*least {
		return planeWindow{
			re0: min(1.25*left, -0.4*most), re1: max(1.25*right, 0.35*most),
			im0: -max(1.4*high, 0.6*most), im1: max(1.4*high, 0.6*most),
		}
	}
	knee := math.Pow(10, math.Floor(math.Log10(least)))
	w := planeWindow{re0: -4 * max(-left, knee), re1: 4 * max(right, knee), im1: 8 * max(high, most/8), knee: knee}
	if w.re1 < w.im1/100 && right <= 0 {
		w.re1 = 10 * knee
	}
	w.im0 = -w.im1
	return w
}

func (w planeWindow) words() string {
	if w.knee == 0 {
		return ""
	}
	return "; axes logarithmic beyond ±" + power(1, int(math.Round(math.Log10(w.knee))))
}

func (w planeWindow) scales(across, up int) (x, y scale) {
	if w.knee > 0 {
		return folded(w.re0, w.re1, w.knee, across), folded(w.im0, w.im1, w.knee, up)
	}
	return linear(w.re0, w.re1, across, ordinary), linear(w.im0, w.im1, up, ordinary)
}

// A box is a part of the sheet that is taken.
type box struct{ left, bottom, right, top vg.Length }

func (b box) meets(c box) bool {
	return b.left < c.right && c.left < b.right && b.bottom < c.top && c.bottom < b.top
}

const mark = vg.Length(3.6) // half the size of a pole or zero

// roots draws zeros, poles, and beside each pole what is read from it.
func (a *panel) roots(t *study.Transfer, p study.Printer) {
	var taken []box
	for _, q := range t.Zeros {
		taken = append(taken, a.zero(a.at(q.Re, q.Im)))
	}
	for _, q := range t.Poles {
		taken = append(taken, a.pole(a.at(q.Re, q.Im)))
	}
	for _, q := range t.Poles {
		if q.Im >= 0 {
			taken = a.name(a.at(q.Re, q.Im), poleName(q, p), taken, +1)
		}
	}
	for _, q := range t.Zeros {
		if q.Im >= 0 {
			taken = a.name(a.at(q.Re, q.Im), zeroName(q, p), taken, -1)
		}
	}
}

func poleName(q study.Pole, p study.Printer) string {
	words := "0"
	switch {
	case q.TimeConstant != nil:
		words = p.Time(math.Abs(*q.TimeConstant))
		if *q.TimeConstant < 0 {
			words = "e-fold in " + words
		}
	case q.NaturalFrequency != nil:
		words = p.Number(*q.NaturalFrequency) + " rad/s, ζ " + p.Number(*q.DampingRatio)
	}
	return words + times(q.Multiplicity)
}

func zeroName(q study.Zero, p study.Printer) string {
	words := "0"
	switch {
	case q.Im != 0:
		words = p.Number(math.Hypot(q.Re, q.Im)) + " rad/s"
	case q.Re != 0:
		words = p.Time(math.Abs(1 / q.Re))
	}
	return words + times(q.Multiplicity)
}

func times(n int) string {
	if n < 2 {
		return ""
	}
	return fmt.Sprintf(" (%d)", n)
}

// pole draws a cross on a patch of paper, so that it shows on a dark map too.
func (a *panel) pole(at vg.Point) box {
	for _, stroke := range []struct {
		width vg.Length
		color color.Color
	}{{3.4, paper}, {1.5, ink}} {
		a.line(stroke.width, stroke.color, nil, vg.Point{X: at.X - mark, Y: at.Y - mark}, vg.Point{X: at.X + mark, Y: at.Y + mark})
		a.line(stroke.width, stroke.color, nil, vg.Point{X: at.X - mark, Y: at.Y + mark}, vg.Point{X: at.X + mark, Y: at.Y - mark})
	}
	return box{at.X - mark, at.Y - mark, at.X + mark, at.Y + mark}
}

func (a *panel) zero(at vg.Point) box {
	a.ring(at, mark+0.9, paper)
	a.ring(at, mark-0.4, paper)
	a.ringLine(at, mark, 1.3)
	return box{at.X - mark, at.Y - mark, at.X + mark, at.Y + mark}
}

// ring fills a disc.
func (a *panel) ring(at vg.Point, r vg.Length, c color.Color) {
	var path vg.Path
	path.Move(vg.Point{X: at.X + r, Y: at.Y})
	path.Arc(at, r, 0, 2*math.Pi)
	path.Close()
	a.SetColor(c)
	a.Fill(path)
}

func (a *panel) ringLine(at vg.Point, r, width vg.Length) {
	var path vg.Path
	path.Move(vg.Point{X: at.X + r, Y: at.Y})
	path.Arc(at, r, 0, 2*math.Pi)
	path.Close()
	a.SetColor(ink)
	a.SetLineWidth(width)
	a.SetLineDash(nil, 0)
	a.Stroke(path)
}

// name writes words near a root where they meet nothing, above (side +1) or below
// first; a line leads to them. Where there is no room they are left out.
func (a *panel) name(at vg.Point, words string, taken []box, side vg.Length) []box {
	w := a.width(words, small)
	for _, s := range []vg.Length{side, -side} {
		for level := vg.Length(0); level < 12; level++ {
			y := at.Y + s*(mark+5+level*(small+2.5))
			low := y
			if s < 0 {
				low = y - small
			}
			for _, shift := range []vg.Length{-w / 2, -2, -w + 2} {
				b := box{at.X + shift - 1.5, low - 1, at.X + shift + w + 1.5, low + small + 1}
				if !a.holds(b) || a.occupied(b, taken) {
					continue
				}
				a.line(0.4, soft, nil, vg.Point{X: at.X, Y: at.Y + s*(mark+1)}, vg.Point{X: at.X, Y: y})
				a.note(vg.Point{X: b.left + 1.5, Y: low + 1}, words, ink, 0, 0)
				return append(taken, b)
			}
		}
	}
	return taken
}

// holds reports whether a box lies inside the panel, clear of the words at its top.
func (a *panel) holds(b box) bool {
	return b.left >= a.left+2 && b.right <= a.right && b.bottom >= a.bottom+2 && b.top <= a.top-small-6
}

func (a *panel) occupied(b box, taken []box) bool {
	for _, t := range taken {
		if b.meets(t) {
			return true
		}
	}
	return false
}
