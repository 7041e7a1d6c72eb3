package draw

import (
	"fmt"
	"image"
	"image/color"
	"math"
	"slices"
	"strconv"

	"gonum.org/v1/plot/vg"

	"lagbook/network/study"
)

// mapAcross is how many dots the map has across.
const mapAcross = 720

// bands is about how many steps of grey a map has.
const bands = 10

// Surface draws |H(s)| over the s-plane as a map in steps of equal ratio, darker where
// it is larger, with poles and zeros.
func Surface(f Format, c *study.Plane, p study.Printer) ([]byte, error) {
	t := &c.Transfer
	w := windowOf(t)
	s, err := newSheet(f, heading(c.Title, "|H(s)| of "+t.Input+" → "+t.Output), sheetWidth, sheetHeight)
	if err != nil {
		return nil, err
	}
	top := s.headline(c.Title, fmt.Sprintf("%s → %s: |H(s)|, poles × and zeros ○%s", t.Input, t.Output, w.words())) - 24
	a := &panel{sheet: s, left: 52, right: s.Max.X - 70, bottom: 34, top: top}
	a.x, a.y = w.scales(8, 7)
	m := sampled(c, w, p, int(math.Round(mapAcross*float64((a.top-a.bottom)/(a.right-a.left))/2)))
	a.DrawImage(vg.Rectangle{Min: vg.Point{X: a.left, Y: a.bottom}, Max: vg.Point{X: a.right, Y: a.top}}, m.image())
	a.rulesOver("Im s / (rad/s)")
	a.floor("Re s / (1/s)", true)
	a.line(0.8, ink, []vg.Length{4, 2}, a.at(0, w.im0), a.at(0, w.im1))
	for _, q := range t.Zeros {
		a.zero(a.at(q.Re, q.Im))
	}
	for _, q := range t.Poles {
		a.pole(a.at(q.Re, q.Im))
	}
	a.key(m, p.Unit(t.Unit, "difference"))
	return s.bytes()
}

// rulesOver draws the vertical axis without a grid.
func (p *panel) rulesOver(title string) {
	for _, t := range p.y.ticks {
		y, long := p.py(t.at), tickLong
		if t.label == "" {
			long = tickShort
		}
		p.line(axisWidth, soft, nil, vg.Point{X: p.left - long, Y: y}, vg.Point{X: p.left, Y: y})
		p.write(vg.Point{X: p.left - tickLong - tickGap, Y: y}, t.label, small, soft, 1, 0.5)
	}
	p.line(axisWidth, soft, nil, vg.Point{X: p.left, Y: p.bottom}, vg.Point{X: p.left, Y: p.top})
	p.write(vg.Point{X: p.left - tickLong, Y: p.top + 5}, title, small, ink, 0, 0)
}

// A relief is log10 |H| on a grid, in steps.
type relief struct {
	rows        [][]float64 // from im = 0 upwards
	first, step float64     // band k holds first + k·step and on
	count       int
}

// sampled takes |H| over the upper half of the window, up dots high, which the lower
// half mirrors.
func sampled(c *study.Plane, w planeWindow, p study.Printer, up int) *relief {
	re, im := make([]float64, mapAcross), make([]float64, up)
	for i := range re {
		re[i] = w.number((float64(i)+0.5)/mapAcross, w.re0, w.re1)
	}
	for j := range im {
		im[j] = w.number(0.5+(float64(j)+0.5)/float64(2*up), w.im0, w.im1)
	}
	m := &relief{rows: c.Magnitude(re, im)}
	var all []float64
	for _, row := range m.rows {
		for i, v := range row {
			row[i] = math.Log10(p.In(v, c.Transfer.Unit, "difference"))
			if !math.IsInf(row[i], 0) && !math.IsNaN(row[i]) {
				all = append(all, row[i])
			}
		}
	}
	slices.Sort(all)
	if len(all) == 0 {
		all = []float64{0}
	}
	lo, hi := all[len(all)/200], all[len(all)-1-len(all)/200]
	m.step = reliefStep((hi - lo) / bands)
	m.first = m.step * math.Floor(lo/m.step)
	m.count = max(1, int(math.Ceil((hi-m.first)/m.step)))
	return m
}

func (w planeWindow) number(share, lo, hi float64) float64 {
	if w.knee > 0 {
		return unfold(share, lo, hi, w.knee)
	}
	return lo + share*(hi-lo)
}

// reliefStep is a round number of decades, or a round fraction of one.
func reliefStep(least float64) float64 {
	for _, s := range []float64{0.05, 0.1, 0.2, 0.25, 0.5, 1, 2, 3, 4, 5, 10, 20, 50} {
		if s >= least {
			return s
		}
	}
	return 100
}

func (m *relief) band(v float64) int {
	if math.IsNaN(v) {
		return 0
	}
	return int(max(0, min(float64(m.count-1), math.Floor((v-m.first)/m.step))))
}

// shade runs from pale to dark with falling lightness, so that it reads the same in
// grey.
func (m *relief) shade(k int) color.RGBA {
	x := (float64(k) + 0.5) / float64(m.count)
	stops := [][3]float64{{0xfb, 0xf8, 0xec}, {0xb9, 0xcf, 0xc4}, {0x55, 0x8b, 0x9c}, {0x12, 0x2b, 0x4a}}
	at := x * float64(len(stops)-1)
	i := min(int(at), len(stops)-2)
	var c [3]uint8
	for j := range c {
		c[j] = uint8(math.Round(stops[i][j] + (at-float64(i))*(stops[i+1][j]-stops[i][j])))
	}
	return color.RGBA{c[0], c[1], c[2], 0xff}
}

// image returns the map with its lower half, a fine line where a band ends.
func (m *relief) image() image.Image {
	palette := color.Palette{}
	for k := range m.count {
		palette = append(palette, m.shade(k))
	}
	for k := range m.count { // the line at the edge of band k
		s := m.shade(k)
		palette = append(palette, color.RGBA{darker(s.R), darker(s.G), darker(s.B), 0xff})
	}
	up := len(m.rows)
	img := image.NewPaletted(image.Rect(0, 0, mapAcross, 2*up), palette)
	for j, row := range m.rows {
		for i, v := range row {
			k := m.band(v)
			if i+1 < len(row) && m.band(row[i+1]) != k || j+1 < len(m.rows) && m.band(m.rows[j+1][i]) != k {
				k += m.count
			}
			img.SetColorIndex(i, up-1-j, uint8(k))
			img.SetColorIndex(i, up+j, uint8(k))
		}
	}
	return img
}

func darker(c uint8) uint8 { return uint8(int(c) * 3 / 4) }

// key draws the steps with their values.
func (a *panel) key(m *relief, unit string) {
	left, right := a.right+14, a.right+26
	each := (a.top - a.bottom) / vg.Length(m.count)
	title := "|H|"
	if unit != "1" {
		title += " / " + unit
	}
	a.write(vg.Point{X: left, Y: a.top + 5}, title, small, ink, 0, 0)
	for k := range m.count {
		y := a.bottom + vg.Length(k)*each
		a.fill(m.shade(k), vg.Point{X: left, Y: y}, vg.Point{X: right, Y: y + each})
		if k > 0 {
			a.line(axisWidth, soft, nil, vg.Point{X: right, Y: y}, vg.Point{X: right + tickShort, Y: y})
			a.write(vg.Point{X: right + tickLong + 1, Y: y}, reliefWords(m.first+float64(k)*m.step), small, soft, 0, 0.5)
		}
	}
}

// reliefWords writes 10^v.
func reliefWords(v float64) string {
	if e := math.Round(v); math.Abs(v-e) < 1e-9 {
		return power(1, int(e))
	}
	e := math.Floor(v)
	k := math.Pow(10, v-e)
	if e >= -3 && e <= 4 {
		return decimal(math.Pow(10, v), math.Pow(10, e-1))
	}
	return decimal(k, 0.1) + "e" + strconv.Itoa(int(e))
}
