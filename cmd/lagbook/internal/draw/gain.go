package draw

import (
	"math"
	"slices"

	"gonum.org/v1/plot/vg"

	"lagbook/network/study"
)

// Gain draws gain and phase of transfer functions of one unit, over the period below
// and the frequency above.
func Gain(f Format, c *study.FrequencyCurves, p study.Printer) ([]byte, error) {
	unit := p.Unit(c.Lines[0].Unit, "difference")
	s, err := newSheet(f, heading(c.Title, "gain and phase"), sheetWidth, 125*vg.Millimeter)
	if err != nil {
		return nil, err
	}
	top := s.headline(c.Title, "Gain and phase of a steady swing") - 26
	names, room := make([]string, len(c.Lines)), vg.Length(20)
	for i, l := range c.Lines {
		names[i] = l.Input + " → " + l.Output
		room = max(room, s.width(names[i], small))
	}
	room = min(room, 120) + labelGap + 8

	lo, hi := math.Inf(1), 0.0
	for _, l := range c.Lines {
		lo, hi = min(lo, l.Omega[0]), max(hi, l.Omega[len(l.Omega)-1])
	}
	upper := &panel{sheet: s, left: 52, right: s.Max.X - room, top: top, bottom: top - (top-42)*0.56, x: periods(lo, hi, p)}
	lower := &panel{sheet: s, left: 52, right: s.Max.X - room, top: upper.bottom - 26, bottom: 34, x: upper.x}

	low, high := math.Inf(1), 0.0
	for _, l := range c.Lines {
		for _, g := range l.Gain {
			g = p.In(g, l.Unit, "difference")
			low, high = min(low, g), max(high, g)
		}
	}
	low = max(low, high*1e-8) // below there is nothing to read
	upper.y = logarithmic(low/1.3, high*2, 7)
	title := "gain"
	if unit != "1" {
		title += " / " + unit
	}
	upper.rules(title)
	upper.hertz(lo, hi)
	upper.floor("", false)
	down, up := math.Inf(1), math.Inf(-1)
	for _, l := range c.Lines {
		for _, v := range l.Phase {
			down, up = min(down, v), max(up, v)
		}
	}
	down, up = min(-90, 45*math.Floor(down/45)), max(0, 45*math.Ceil(up/45))
	lower.y = linear(down, up, int(max(2, min(8, (up-down)/45))), []float64{45, 90, 180, 360, 720, 1440})
	lower.rules("phase / °")
	lower.floor("period", true)

	var ends, turns []label
	for i, l := range c.Lines {
		gain := make([]float64, len(l.Gain))
		for k, g := range l.Gain {
			gain[k] = max(p.In(g, l.Unit, "difference"), low/10)
		}
		switch end, ok := upper.curve(l.Omega, gain, penOf(i)); {
		case ok && gain[len(gain)-1] < low:
			upper.leaves(l.Omega, gain, low, names[i], penOf(i))
		case ok:
			ends = append(ends, label{text: names[i], from: end, pen: penOf(i)})
		}
		if end, ok := lower.curve(l.Omega, l.Phase, penOf(i)); ok {
			turns = append(turns, label{text: names[i], from: end, pen: penOf(i)})
		}
	}
	upper.labels(ends, room)
	lower.labels(turns, room)
	return s.bytes()
}

// leaves names a curve where it falls out of the panel.
func (a *panel) leaves(omega, gain []float64, low float64, name string, with pen) {
	for k, g := range gain {
		if g < low {
			a.note(vg.Point{X: min(a.px(omega[k])+6, a.right-a.width(name, small)-4), Y: a.bottom + 7}, name, with.color, 0, 0)
			return
		}
	}
}

// spoken are periods in s that people name, longest first, besides the powers of ten
// below a second; between lie those that a short axis has too.
var (
	spoken = []float64{3650 * 86400, 365 * 86400, 100 * 86400, 10 * 86400, 86400, 6 * 3600, 3600, 600, 60, 10, 1}
	filler = []float64{50 * 86400, 20 * 86400, 5 * 86400, 2 * 86400, 12 * 3600, 3 * 3600, 2 * 3600, 1800, 1200, 300, 120, 30, 20, 5, 2}
)

// periods is a scale of ω, rising to the right, with its ticks at named periods.
func periods(lo, hi float64, p study.Printer) scale {
	s := logarithmic(lo, hi, 8)
	s.ticks = nil
	list := slices.Clone(spoken)
	for e := -1; e >= -12; e-- {
		list = append(list, math.Pow(10, float64(e)))
	}
	if hi < 300*lo {
		list = append(list, filler...)
		for e := -1; e >= -12; e-- {
			list = append(list, 2*math.Pow(10, float64(e)), 5*math.Pow(10, float64(e)))
		}
	}
	slices.Sort(list)
	for _, t := range slices.Backward(list) {
		if w := 2 * math.Pi / t; w >= lo*(1-1e-9) && w <= hi*(1+1e-9) {
			s.ticks = append(s.ticks, tick{w, p.Time(t)})
		}
	}
	return s
}

// hertz draws the axis of frequency along the top.
func (a *panel) hertz(lo, hi float64) {
	a.line(axisWidth, soft, nil, vg.Point{X: a.left, Y: a.top}, vg.Point{X: a.right, Y: a.top})
	end := vg.Length(-1000)
	first := int(math.Ceil(math.Log10(lo/(2*math.Pi)) - 1e-9))
	for e := first; ; e++ {
		f := math.Pow(10, float64(e))
		if 2*math.Pi*f > hi*(1+1e-9) {
			return
		}
		x := a.px(2 * math.Pi * f)
		a.line(axisWidth, soft, nil, vg.Point{X: x, Y: a.top}, vg.Point{X: x, Y: a.top + tickLong})
		words := hertzWords(e)
		if w := a.width(words, small); x-w/2 > end+3 && x-w/2 > a.left+40 {
			a.write(vg.Point{X: x, Y: a.top + tickLong + tickGap}, words, small, soft, 0.5, 0)
			end = x + w/2
		}
	}
}

// hertzWords writes 10^e Hz.
func hertzWords(e int) string {
	third := int(math.Floor(float64(e) / 3))
	if third < -3 || third > 4 {
		return power(1, e) + " Hz"
	}
	return []string{"1", "10", "100"}[e-3*third] + " " + []string{"n", "µ", "m", "", "k", "M", "G", "T"}[third+3] + "Hz"
}
