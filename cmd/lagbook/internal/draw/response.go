package draw

import (
	"errors"
	"math"

	"gonum.org/v1/plot/vg"

	"lagbook/network/study"
)

// A group is what shares one panel: curves of one unit and kind.
type group struct {
	unit, kind string
	lines      []int // of study.Curves.Lines
}

// Response draws curves against time, a panel for each unit, with limits, and the
// changes of the loads.
func Response(f Format, c *study.Curves, p study.Printer) ([]byte, error) {
	if len(c.Lines) == 0 {
		return nil, errors.New("the table shows nothing to draw")
	}
	groups := grouped(c)
	height := sheetHeight + vg.Length(len(groups)-1)*55*vg.Millimeter
	s, err := newSheet(f, heading(c.Title, c.Table), sheetWidth, height)
	if err != nil {
		return nil, err
	}
	top := s.headline(c.Title, c.Table) - 14
	right := s.nameRoom(c)
	unit, factor := p.TimeUnit([]float64{c.From, c.To})
	x := timeScale(c, unit, factor)
	each := (top - 30) / vg.Length(len(groups))
	for k, g := range groups {
		a := &panel{sheet: s, left: 48, right: s.Max.X - right, x: x}
		a.top = top - vg.Length(k)*each - 8
		a.bottom = top - vg.Length(k+1)*each + 12
		if k == 0 && len(c.Changes) > 0 {
			a.raise = small + 2 // a row for the words of the changes
			a.top -= a.raise
		}
		last := k == len(groups)-1
		if last {
			a.bottom = 30
		}
		a.response(c, g, p, right)
		title := ""
		if last {
			title = "t / " + unit
		}
		a.floor(title, last)
		a.changes(c, k == 0)
	}
	return s.bytes()
}

func heading(title, table string) string {
	if title == "" {
		title = "Case without a title"
	}
	if table != "" && table != title {
		title += ": " + table
	}
	return title
}

// headline writes the title of the case and what the picture is of, and returns the
// height left below.
func (s *sheet) headline(title, what string) vg.Length {
	y := s.Max.Y - 7
	s.write(vg.Point{X: 14, Y: y}, s.fit(heading(title, ""), normal, s.Max.X-28), normal, ink, 0, 1)
	if what != "" {
		y -= normal + 3
		s.write(vg.Point{X: 14, Y: y}, s.fit(what, small, s.Max.X-28), small, soft, 0, 1)
	}
	return y - small
}

// nameRoom is the margin that the names of the curves take.
func (s *sheet) nameRoom(c *study.Curves) vg.Length {
	most := vg.Length(0)
	for _, l := range c.Lines {
		most = max(most, s.width(l.Name, small))
	}
	return min(max(most, 20), 110) + labelGap + 8
}

func grouped(c *study.Curves) []group {
	var list []group
next:
	for i, l := range c.Lines {
		for k := range list {
			if list[k].unit == l.Unit && list[k].kind == l.Kind {
				list[k].lines = append(list[k].lines, i)
				continue next
			}
		}
		list = append(list, group{l.Unit, l.Kind, []int{i}})
	}
	return list
}

// timeScale takes times in s and labels them in the unit.
func timeScale(c *study.Curves, unit string, factor float64) scale {
	lo, hi := c.From/factor, c.To/factor
	if hi <= lo {
		hi = lo + 1
	}
	s := linear(lo, hi, 8, timeSteps(unit))
	if c.Log {
		s = logarithmic(lo, hi, 8)
	}
	in := s.share
	s.share = func(t float64) float64 { return in(t / factor) }
	for i := range s.ticks {
		s.ticks[i].at *= factor
	}
	return s
}

// quantityWord says what a panel shows.
func quantityWord(unit, kind string) string {
	switch {
	case unit == "K" && kind == "difference":
		return "temperature difference"
	case unit == "K":
		return "temperature"
	case unit == "W":
		return "heat flow"
	case unit == "Pa" && kind == "difference":
		return "pressure difference"
	case unit == "Pa":
		return "pressure"
	}
	if word, ok := quantities[unit]; ok {
		return word
	}
	return "value"
}

// quantities are what other units measure.
var quantities = map[string]string{
	"m³/s": "flow", "m³": "volume", "J": "energy", "m": "length", "m/s": "velocity", "rev/s": "speed", "1": "share", "W/(m²·K)": "film coefficient",
}

// response fills a panel.
func (a *panel) response(c *study.Curves, g group, p study.Printer, room vg.Length) {
	in := func(v float64) float64 { return p.In(v, g.unit, g.kind) }
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, i := range g.lines {
		for _, v := range c.Lines[i].Y {
			lo, hi = min(lo, in(v)), max(hi, in(v))
		}
	}
	lo, hi, far := withLimits(c, g, in, lo, hi)
	lo, hi = padded(lo, hi)
	a.y = linear(lo, hi, int(max(2, (a.top-a.bottom)/26)), ordinary)
	a.rules(quantityWord(g.unit, g.kind) + " / " + p.Unit(g.unit, g.kind))
	for _, l := range c.Limits {
		if l.Unit == g.unit && l.Kind == g.kind && !far[l.Name] {
			a.limit(l, in(l.Level))
		}
	}
	var names []label
	for _, i := range g.lines {
		l := c.Lines[i]
		y := make([]float64, len(l.Y))
		for k, v := range l.Y {
			y[k] = in(v)
		}
		if end, ok := a.curve(l.T, y, penOf(i)); ok {
			names = append(names, label{text: l.Name, from: end, pen: penOf(i)})
		}
	}
	a.labels(names, room)
	for _, l := range c.Limits {
		if l.Unit == g.unit && l.Kind == g.kind && !far[l.Name] {
			a.limitName(l, in(l.Level), limitWords(l, p))
		}
	}
	a.farLimits(c, far, p)
}

// widest is how many times the span of the curves a panel may grow for a limit.
const widest = 4

// withLimits widens a range by the limits of a panel, but for those far away.
func withLimits(c *study.Curves, g group, in func(float64) float64, lo, hi float64) (low, high float64, far map[string]bool) {
	far = map[string]bool{}
	low, high = lo, hi
	for _, l := range c.Limits {
		if l.Unit != g.unit || l.Kind != g.kind {
			continue
		}
		v := in(l.Level)
		if max(hi, v)-min(lo, v) > widest*(hi-lo) {
			far[l.Name] = true
			continue
		}
		low, high = min(low, v), max(high, v)
	}
	return low, high, far
}

// limitWords names a limit.
func limitWords(l study.CurveLimit, p study.Printer) string {
	what := map[int]string{+1: " below ", -1: " above ", 0: " reaches "}[l.Side]
	return "limit " + l.Name + ":" + what + p.Value(l.Level, l.Unit, l.Kind)
}

const (
	hatchPitch = vg.Length(9)
	hatchSize  = vg.Length(4)
)

// limit draws a level, hatched on the side that is forbidden.
func (a *panel) limit(l study.CurveLimit, level float64) {
	from, to := max(a.px(l.From), a.left), min(a.px(l.To), a.right)
	y := a.py(level)
	var rule []vg.Length
	if l.Side == 0 {
		rule = []vg.Length{2, 2}
	}
	a.line(0.9, ink, rule, vg.Point{X: from, Y: y}, vg.Point{X: to, Y: y})
	a.used = append(a.used, box{from, y - 1, to, y + 1})
	if l.Side != 0 {
		rise := hatchSize * vg.Length(l.Side)
		for x := from; x+hatchSize <= to; x += hatchPitch {
			a.line(0.5, ink, nil, vg.Point{X: x, Y: y}, vg.Point{X: x + hatchSize, Y: y + rise})
		}
		a.used = append(a.used, box{from, y + min(0, rise), to, y + max(0, rise)})
	}
}

// limitName writes what a level is where its words cross the fewest curves: along
// the line, first on the side that is allowed.
func (a *panel) limitName(l study.CurveLimit, level float64, words string) {
	from, to := max(a.px(l.From), a.left), min(a.px(l.To), a.right)
	w, y := a.width(words, small), a.py(level)
	below, above := y-3-small, y+hatchSize+2.5
	if l.Side < 0 {
		below, above = y-hatchSize-3-small, y+3
	}
	sides := []vg.Length{below, above}
	if l.Side < 0 {
		sides = []vg.Length{above, below}
	}
	best, least := box{}, -1
	for _, low := range sides {
		for x := from + 4; x <= max(from+4, to-w-2); x += 12 {
			b := box{x - 1, low - 1, x + w + 1, low + small + 1}
			if n := a.crossings(b); (least < 0 || n < least) && b.bottom > a.bottom && b.top < a.top+2 {
				best, least = b, n
			}
		}
	}
	if least < 0 {
		return
	}
	a.used = append(a.used, best)
	a.write(vg.Point{X: best.left + 1, Y: best.bottom + 2}, words, small, ink, 0, 0)
}

// crossings counts what lies in a box.
func (a *panel) crossings(b box) int {
	n := 0
	for _, p := range a.drawn {
		if p.X > b.left && p.X < b.right && p.Y > b.bottom-1 && p.Y < b.top+1 {
			n++
		}
	}
	for _, u := range a.used {
		if b.meets(u) {
			n += 1000
		}
	}
	return n
}

// farLimits says where limits lie that would leave the curves no room.
func (a *panel) farLimits(c *study.Curves, far map[string]bool, p study.Printer) {
	high, low := a.top-1, a.bottom+3
	for _, l := range c.Limits {
		if !far[l.Name] {
			continue
		}
		if p.In(l.Level, l.Unit, l.Kind) > a.y.ticks[len(a.y.ticks)-1].at {
			a.note(vg.Point{X: a.left + 5, Y: high}, limitWords(l, p)+", above this picture", soft, 0, 1)
			high -= small + 3
			continue
		}
		a.note(vg.Point{X: a.left + 5, Y: low}, limitWords(l, p)+", below this picture", soft, 0, 0)
		low += small + 3
	}
}

// changes marks the jumps of the inputs; over the top panel stand their words where
// there is room.
func (a *panel) changes(c *study.Curves, words bool) {
	end := vg.Length(-1000)
	for _, ch := range c.Changes {
		x := max(a.px(max(ch.At, c.From)), a.left)
		if ch.At > c.From && x <= a.right {
			a.line(0.5, soft, []vg.Length{1, 2}, vg.Point{X: x, Y: a.bottom}, vg.Point{X: x, Y: a.top})
		}
		w := a.width(ch.Text, small-1)
		if words && x >= end+4 && x+w <= a.right+50 {
			a.write(vg.Point{X: x, Y: a.top + 4}, ch.Text, small-1, soft, 0, 0)
			end = x + w
		}
	}
}
