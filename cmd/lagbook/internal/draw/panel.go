package draw

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// A panel is one pair of axes on a sheet.
type panel struct {
	*sheet
	left, right, bottom, top vg.Length
	x, y                     scale
	drawn                    []vg.Point // of the curves, a point in each column at least
	used                     []box      // taken by words
	raise                    vg.Length  // of the title above the vertical axis
}

func (p *panel) at(x, y float64) vg.Point {
	return vg.Point{X: p.px(x), Y: p.py(y)}
}

func (p *panel) px(x float64) vg.Length {
	return p.left + vg.Length(p.x.share(x))*(p.right-p.left)
}

func (p *panel) py(y float64) vg.Length {
	return p.bottom + vg.Length(p.y.share(y))*(p.top-p.bottom)
}

const (
	axisWidth = vg.Length(0.6)
	gridWidth = vg.Length(0.4)
	tickLong  = vg.Length(3.5)
	tickShort = vg.Length(2)
	tickGap   = vg.Length(2)
)

// rules draws the grid and the vertical axis with its title above it.
func (p *panel) rules(title string) {
	for _, t := range p.y.ticks {
		y := p.py(t.at)
		if t.label == "" {
			p.line(axisWidth, soft, nil, vg.Point{X: p.left - tickShort, Y: y}, vg.Point{X: p.left, Y: y})
			continue
		}
		p.line(gridWidth, faint, nil, vg.Point{X: p.left, Y: y}, vg.Point{X: p.right, Y: y})
		p.line(axisWidth, soft, nil, vg.Point{X: p.left - tickLong, Y: y}, vg.Point{X: p.left, Y: y})
		p.write(vg.Point{X: p.left - tickLong - tickGap, Y: y}, t.label, small, soft, 1, 0.5)
	}
	p.line(axisWidth, soft, nil, vg.Point{X: p.left, Y: p.bottom}, vg.Point{X: p.left, Y: p.top})
	if title != "" {
		p.write(vg.Point{X: p.left - tickLong, Y: p.top + 5 + p.raise}, title, small, ink, 0, 0)
	}
}

// floor draws the horizontal axis; its title stands at the right end below the labels.
func (p *panel) floor(title string, labels bool) {
	p.line(axisWidth, soft, nil, vg.Point{X: p.left, Y: p.bottom}, vg.Point{X: p.right, Y: p.bottom})
	end := vg.Length(-1000) // of the label before
	for _, t := range p.x.ticks {
		x, long := p.px(t.at), tickLong
		if t.label == "" {
			long = tickShort
		}
		p.line(axisWidth, soft, nil, vg.Point{X: x, Y: p.bottom}, vg.Point{X: x, Y: p.bottom - long})
		if w := p.width(t.label, small); labels && t.label != "" && x-w/2 > end+2 {
			p.write(vg.Point{X: x, Y: p.bottom - tickLong - tickGap}, t.label, small, soft, 0.5, 1)
			end = x + w/2
		}
	}
	if title != "" {
		p.write(vg.Point{X: p.right, Y: p.bottom - tickLong - tickGap - small - 4}, title, small, ink, 1, 1)
	}
}

// clip keeps the parts of a line that lie inside the panel.
func (p *panel) clip(pts []vg.Point) [][]vg.Point {
	inner := p.Canvas
	inner.Min, inner.Max = vg.Point{X: p.left, Y: p.bottom}, vg.Point{X: p.right, Y: p.top}
	return inner.ClipLinesXY(pts)
}

// padded widens a range so that a curve does not lie on the edge of its panel.
func padded(lo, hi float64) (float64, float64) {
	if span := hi - lo; span > 1e-9*math.Max(math.Abs(lo), math.Abs(hi)) {
		return lo - 0.06*span, hi + 0.06*span
	}
	room := math.Max(0.05*math.Abs(lo), 1e-6) // nothing changes
	if math.Abs(lo) > 1 {
		room = max(0.5, 0.01*math.Abs(lo))
	}
	return lo - room, hi + room
}
