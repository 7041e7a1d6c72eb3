package study

import (
	"fmt"
	"math"
	"slices"

	"lagbook/laplace"
	"lagbook/network"
)

// linearWithin is the error, as a share of what the linear answer moves, up to which it
// is said to hold; leastRange the smallest share of the change that is tried.
const (
	linearWithin = 0.05
	leastRange   = 1.0 / 1024
)

// A Range says over what change of the loads the linear answer stays within an error:
// found by marching the case with a share of every change.
type Range struct {
	Within float64 `json:"within"` // the error, as a share of what the linear answer moves
	Share  float64 `json:"share"`  // of the changes stated; 1: all of it
	Text   string  `json:"text"`
}

// linearRange looks for the share of all changes of the loads up to which no output of
// the linear answer is farther from the march than linearWithin of what it moves. nil
// where the case moves by itself from its start, so that no share of it can be taken, or
// where its numbers change in steps.
func (m *Model) linearRange(l *Model, times []float64) *Range {
	if !m.Nonlinear() || !m.steadyStart() || m.turns() || m.cut() || len(m.shows) == 0 || !m.changesAtAll() {
		return nil
	}
	bad := func(share float64) bool { return m.linearError(l, share, times) > linearWithin }
	lo, hi := 1.0, 1.0
	for bad(lo) {
		if hi, lo = lo, lo/2; lo < leastRange {
			return &Range{Within: linearWithin, Text: fmt.Sprintf("the linear answer is off by more than %s of what it moves even for %s of the changes stated",
				m.Show.Percent(linearWithin), m.Show.Percent(leastRange))}
		}
	}
	for range 5 {
		if lo == hi {
			break
		}
		if mid := math.Sqrt(lo * hi); bad(mid) {
			hi = mid
		} else {
			lo = mid
		}
	}
	return &Range{Within: linearWithin, Share: lo, Text: m.rangeWords(lo)}
}

// changesAtAll reports whether any load does anything after t = 0.
func (m *Model) changesAtAll() bool {
	moves := func(w laplace.Waveform) bool { return !w.Constant() }
	return slices.ContainsFunc(m.par.Wave, moves) ||
		slices.ContainsFunc(m.par.Drive, func(list []laplace.Waveform) bool { return slices.ContainsFunc(list, moves) })
}

// mostWork bounds the steps times nodes of a march that is repeated for a range nobody
// asked for: some tenths of a second in all.
const mostWork = 20_000

// rangeAboutStart is the range of the linear answer where transfer functions are about the
// start and marches are cheap, else nil.
func (m *Model) rangeAboutStart(pairs []pair) *Range {
	if !m.Nonlinear() || !slices.ContainsFunc(pairs, func(p pair) bool { return p.about == nil }) || !m.steadyStart() || m.turns() {
		return nil
	}
	c := m.copied()
	if _, err := c.response(); err != nil {
		return nil
	}
	if taken, _ := c.march.run.Steps(); taken*m.Net.NodeCount() > mostWork {
		return nil
	}
	l := c.Linear()
	if _, err := l.response(); err != nil {
		return nil
	}
	return c.linearRange(l, comparedAt(c.reach(), c.resp.Breaks(), l.resp.Breaks()))
}

// rangeWords says what a share of the changes comes to.
func (m *Model) rangeWords(share float64) string {
	within := m.Show.Percent(linearWithin)
	if share == 1 {
		return "the linear answer stays within " + within + " of what it moves for all of the changes stated, by marching them"
	}
	var loads []string
	for _, in := range m.Net.Inputs() {
		w := m.par.Wave[in.ID]
		if far := farthestOf(w, m.until); far != w.Before {
			loads = append(loads, fmt.Sprintf("%s from %s to %s", in.Name, m.inputValue(in, w.Before), m.inputValue(in, w.Before+share*(far-w.Before))))
		}
	}
	for _, e := range m.elements() {
		for _, k := range ownDrives(e) {
			w, name := m.par.Drive[e.ID][k], e.Drives[k]
			if far := farthestOf(w, m.until); far != w.Before {
				loads = append(loads, fmt.Sprintf("%s from %s to %s", name, m.driveValue(name, w.Before), m.driveValue(name, w.Before+share*(far-w.Before))))
			}
		}
	}
	text := fmt.Sprintf("the linear answer stays within %s of what it moves for changes up to %s of those stated", within, m.Show.Percent(share))
	if len(loads) > 0 && len(loads) <= wavePieces {
		text += " (" + join(loads) + ")"
	}
	return text + ", by marching them"
}

// farthestOf is the value of a wave that is farthest from what it was before t = 0, at
// the ends of its pieces.
func farthestOf(w laplace.Waveform, until float64) float64 {
	far := w.Before
	look := func(v float64) {
		if math.Abs(v-w.Before) > math.Abs(far-w.Before) {
			far = v
		}
	}
	for _, s := range w.Segments {
		if s.At <= until {
			look(w.At(s.At))
			look(w.Left(s.At))
		}
	}
	look(w.At(until))
	return far
}

// linearError is how far the linear answer is from the march for a share of every
// change, as a share of what it moves: of the worst output. +Inf where the march finds
// no way.
func (m *Model) linearError(l *Model, share float64, times []float64) float64 {
	from, err := m.begin()
	if err != nil {
		return math.Inf(1)
	}
	run := answers(m.march.run)
	if share != 1 {
		part, err := m.Net.March(m.partOfChange(share), from, m.outs, network.Run{Until: m.until})
		if err != nil || part.Until() < m.until*(1-1e-12) {
			return math.Inf(1)
		}
		run = part
	}
	worst := 0.0
	y, lin := rowsFor(len(m.outs), len(times)), rowsFor(len(l.outs), len(times))
	run.Table(times, y)
	l.resp.Table(times, lin)
	start, err := l.moment(nil)
	if err != nil {
		return math.Inf(1)
	}
	base := start.base
	for k := range m.shows {
		move, off := 0.0, 0.0
		for i := range times {
			d := share * (lin[k][i] - base[k])
			move = math.Max(move, math.Abs(d))
			off = math.Max(off, math.Abs(y[k][i]-base[k]-d))
		}
		if move > share*speck(m.shows[k].unit) {
			worst = math.Max(worst, off/move)
		}
	}
	return worst
}

func rowsFor(outs, times int) [][]float64 {
	y := make([][]float64, outs)
	for k := range y {
		y[k] = make([]float64, times)
	}
	return y
}

// partOfChange returns the parameters with a share of what every wave does after t = 0.
func (m *Model) partOfChange(share float64) *network.Params {
	p := *m.par
	shrink := func(w laplace.Waveform) laplace.Waveform {
		return w.Plus(-w.Before).Scaled(share).Plus(w.Before)
	}
	p.Wave = make([]laplace.Waveform, len(m.par.Wave))
	for i, w := range m.par.Wave {
		p.Wave[i] = shrink(w)
	}
	p.Drive = make([][]laplace.Waveform, len(m.par.Drive))
	for i, list := range m.par.Drive {
		for _, w := range list {
			p.Drive[i] = append(p.Drive[i], shrink(w))
		}
	}
	return &p
}
