package draw

import (
	"image/color"
	"math"
	"slices"

	"gonum.org/v1/plot/vg"
)

// A pen tells curves apart: by dashes in grey print, by hue on a screen. The hues have
// about one lightness, dark enough for thin lines.
type pen struct {
	color  color.Color
	width  vg.Length
	dashes []vg.Length
}

var hues = []color.Color{
	color.Gray{0x18},
	color.RGBA{0x0b, 0x4f, 0x8a, 0xff},
	color.RGBA{0xa8, 0x3f, 0x10, 0xff},
	color.RGBA{0x1c, 0x6b, 0x3c, 0xff},
	color.RGBA{0x6a, 0x2c, 0x86, 0xff},
	color.RGBA{0x7a, 0x5b, 0x00, 0xff},
}

var dashes = [][]vg.Length{
	nil,
	{7, 2.5},
	{1.6, 2},
	{8, 2, 1.6, 2},
	{3.5, 2},
	{8, 2, 1.6, 2, 1.6, 2},
}

// penOf returns the pen of curve number k; the seventh is like the first, and thin.
func penOf(k int) pen {
	return pen{hues[k%len(hues)], []vg.Length{1.5, 0.8}[k/len(hues)%2], dashes[k%len(dashes)]}
}

// column is the width in which a curve is reduced to its entry, its extremes and its
// exit: below what print resolves.
const column = vg.Length(0.36)

// decimate leaves of a line, whose points go from left to right, at most four points
// in each column, so that nothing seen is lost.
func decimate(pts []vg.Point) []vg.Point {
	var out []vg.Point
	for i := 0; i < len(pts); {
		j, lo, hi := i, i, i
		for ; j < len(pts) && math.Floor(float64(pts[j].X/column)) == math.Floor(float64(pts[i].X/column)); j++ {
			if pts[j].Y < pts[lo].Y {
				lo = j
			}
			if pts[j].Y > pts[hi].Y {
				hi = j
			}
		}
		keep := []int{i, lo, hi, j - 1}
		slices.Sort(keep)
		for _, k := range slices.Compact(keep) {
			out = append(out, pts[k])
		}
		i = j
	}
	return out
}

// straight is how far a point may lie off the line between its neighbours to be left
// out.
const straight = 0.02

// straightened drops points that lie on the way from the last one kept to the next.
func straightened(pts []vg.Point) []vg.Point {
	if len(pts) < 3 {
		return pts
	}
	out := pts[:1:1]
	for i, start := 1, 0; i < len(pts)-1; i++ {
		if !between(pts, start, i+1) {
			out = append(out, pts[i])
			start = i
		}
	}
	return append(out, pts[len(pts)-1])
}

// between reports whether the points from a to b lie on the line between those.
func between(pts []vg.Point, a, b int) bool {
	if b-a > 64 {
		return false
	}
	d := vg.Point{X: pts[b].X - pts[a].X, Y: pts[b].Y - pts[a].Y}
	length := math.Hypot(float64(d.X), float64(d.Y))
	if length == 0 {
		return true
	}
	for _, p := range pts[a+1 : b] {
		off := float64((p.X-pts[a].X)*d.Y-(p.Y-pts[a].Y)*d.X) / length
		along := float64((p.X-pts[a].X)*d.X+(p.Y-pts[a].Y)*d.Y) / length
		if math.Abs(off) > straight || along < -straight || along > length+straight {
			return false
		}
	}
	return true
}

// curve draws one line and returns the height at which it ends.
func (p *panel) curve(x, y []float64, with pen) (end vg.Length, ok bool) {
	pts := make([]vg.Point, len(x))
	for i := range x {
		pts[i] = p.at(x[i], y[i])
	}
	pts = decimate(pts)
	p.drawn = append(p.drawn, pts...)
	for _, part := range p.clip(straightened(pts)) {
		if len(part) > 1 {
			p.line(with.width, with.color, with.dashes, part...)
		}
	}
	if len(pts) == 0 {
		return 0, false
	}
	return min(max(pts[len(pts)-1].Y, p.bottom), p.top), true
}

// A label names a curve at its right end.
type label struct {
	text string
	from vg.Length // the height of the curve's end
	at   vg.Length // that of the text
	pen  pen
}

const (
	labelPitch = small + 1.5
	labelGap   = vg.Length(9)
)

// labels writes the names of curves beside their ends, moved apart where those are
// close, with a short line from each end to its name.
func (p *panel) labels(list []label, room vg.Length) {
	slices.SortStableFunc(list, func(a, b label) int {
		switch {
		case a.from < b.from:
			return -1
		case a.from > b.from:
			return 1
		}
		return 0
	})
	spread(list, p.bottom, p.top)
	for _, l := range list {
		p.line(0.5, l.pen.color, nil, vg.Point{X: p.right + 1, Y: l.from}, vg.Point{X: p.right + labelGap - 2, Y: l.at})
		p.write(vg.Point{X: p.right + labelGap, Y: l.at}, p.fit(l.text, small, room-labelGap), small, l.pen.color, 0, 0.5)
	}
}

// spread moves labels, sorted by height, apart: each group that would overlap is
// centred on the ends it belongs to and kept between lo and hi.
func spread(list []label, lo, hi vg.Length) {
	type group struct {
		first, n int
		middle   vg.Length
	}
	var groups []group
	place := func(g *group) {
		half := labelPitch * vg.Length(g.n-1) / 2
		g.middle = 0
		for _, l := range list[g.first : g.first+g.n] {
			g.middle += l.from / vg.Length(g.n)
		}
		g.middle = max(min(g.middle, hi-half), lo+half)
	}
	for i := range list {
		g := group{first: i, n: 1}
		place(&g)
		for len(groups) > 0 {
			below := groups[len(groups)-1]
			if below.middle+labelPitch*vg.Length(below.n-1)/2+labelPitch <= g.middle-labelPitch*vg.Length(g.n-1)/2 {
				break
			}
			g = group{first: below.first, n: below.n + g.n}
			place(&g)
			groups = groups[:len(groups)-1]
		}
		groups = append(groups, g)
	}
	for _, g := range groups {
		for k := range g.n {
			list[g.first+k].at = g.middle + labelPitch*(vg.Length(k)-vg.Length(g.n-1)/2)
		}
	}
}
