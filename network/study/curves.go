package study

import (
	"fmt"
	"math"
	"slices"

	"lagbook/laplace"
	"lagbook/network/casefile"
)

// Curves are what one table shows, as lines to be drawn: SI, and at a jump both the
// value before it and the one after.
type Curves struct {
	Title   string        `json:"title"`
	Table   string        `json:"table"`
	From    float64       `json:"from"` // s
	To      float64       `json:"to"`
	Log     bool          `json:"log"` // the instants asked for are spread over decades
	Lines   []Curve       `json:"lines"`
	Limits  []CurveLimit  `json:"limits"`
	Changes []CurveChange `json:"changes"`
	Evidence
}

// A Curve is one column against time.
type Curve struct {
	Name string    `json:"name"`
	Unit string    `json:"unit"`
	Kind string    `json:"kind,omitempty"`
	T    []float64 `json:"t"` // ascending; twice at a jump
	Y    []float64 `json:"y"`
}

// A CurveLimit is a level that some curve of the picture is not to pass, in [From,
// To]. Side is +1 where what lies above is forbidden, −1 below, 0 where the level is
// to be reached.
type CurveLimit struct {
	Name  string  `json:"name"`
	Unit  string  `json:"unit"`
	Kind  string  `json:"kind,omitempty"`
	Level float64 `json:"level"`
	From  float64 `json:"from"`
	To    float64 `json:"to"`
	Side  int     `json:"side"`
}

// A CurveChange is a jump of an input.
type CurveChange struct {
	At   float64 `json:"at"`
	Text string  `json:"text"`
}

const (
	curveSamples = 1500 // of one curve, more than a page resolves
	mostLines    = 12   // of one picture
	mostMarked   = 40   // changes of the loads, beyond which none is marked
)

// Curves samples what table number pick shows, counted from 1.
func (m *Model) Curves(pick int) (*Curves, error) {
	asks := m.tables()
	if pick < 1 || pick > len(asks) {
		return nil, fmt.Errorf("there is no table %d: the case has %d", pick, len(asks))
	}
	ask := asks[pick-1]
	var cols []shown
	for _, s := range ask.Show {
		w, err := m.want(s, ask.Above)
		if err != nil {
			return nil, err
		}
		cols = append(cols, w)
	}
	for _, l := range m.limitAsks() {
		for _, s := range l.Of {
			if _, err := m.want(s, l.Above); err != nil {
				return nil, err
			}
		}
	}
	resp, err := m.response()
	if err != nil {
		return nil, err
	}
	times, err := m.times(ask)
	if err != nil {
		return nil, err
	}
	if m.cut() {
		times = endingAt(times, m.reach())
	}
	var warn []Warning
	if len(cols) > mostLines {
		warn = append(warn, Warning{"curves-left-out", fmt.Sprintf("only the first %d of %d columns are drawn", mostLines, len(cols))})
		cols = cols[:mostLines]
	}
	a := &Curves{Title: m.Case.Title, Table: ask.Title, Lines: []Curve{}, Limits: []CurveLimit{}, Changes: []CurveChange{}}
	a.From, a.To, a.Log = window(times)
	grid, jumps := m.samples(a)
	for _, c := range cols {
		a.Lines = append(a.Lines, sample(resp, c, grid, jumps))
		warn = append(warn, m.impulseWarning(c, impulsesIn(resp, c.out, a.From, a.To))...)
	}
	a.Limits = m.curveLimits(ask, cols, a)
	before := a.From
	if a.Log {
		before = 0 // what lies before the first decade
	}
	if list, cut := m.changes(before, a.To, mostMarked); !cut {
		for _, c := range list {
			a.Changes = append(a.Changes, CurveChange{c.at, c.text})
		}
	}
	a.Evidence = m.evidence(append(warn, m.grows()...))
	return a, nil
}

// window returns the time between the first and the last row, and whether the rows
// are spread over decades: then it begins at the first that is not 0.
func window(times []float64) (from, to float64, log bool) {
	from, to = times[0], times[len(times)-1]
	positive := slices.IndexFunc(times, func(t float64) bool { return t > 0 })
	if positive >= 0 && len(times) > 4 && to > 500*times[positive] {
		return times[positive], to, true
	}
	if from == to {
		from = 0
	}
	return from, to, false
}

// samples are the instants at which all curves are taken, and the jumps among them.
func (m *Model) samples(a *Curves) (grid, jumps []float64) {
	if a.Log {
		grid = laplace.FrequencyGrid(a.From, a.To, int(curveSamples/math.Log10(a.To/a.From))+1)
	} else {
		for k := range curveSamples + 1 {
			grid = append(grid, a.From+(a.To-a.From)*float64(k)/curveSamples)
		}
	}
	jumps, _ = m.jumps(a.From, a.To)
	return grid, jumps
}

// sample takes one curve.
func sample(resp answers, c shown, grid, jumps []float64) Curve {
	y := make([][]float64, c.out+1)
	y[c.out] = make([]float64, len(grid))
	resp.Table(grid, y)
	line := Curve{Name: c.name, Unit: c.unit, Kind: c.kind}
	k := 0
	add := func(t, v float64) { line.T, line.Y = append(line.T, t), append(line.Y, v) }
	for i, t := range grid {
		for ; k < len(jumps) && jumps[k] <= t; k++ {
			if jumps[k] > grid[0] {
				add(jumps[k], resp.Left(c.out, jumps[k]))
			}
			add(jumps[k], resp.At(c.out, jumps[k]))
		}
		if k == 0 || jumps[k-1] != t {
			add(t, y[c.out][i])
		}
	}
	return line
}

// curveLimits are the limits on what the picture shows.
func (m *Model) curveLimits(ask casefile.AskTable, cols []shown, a *Curves) []CurveLimit {
	list := []CurveLimit{}
	for _, l := range m.limitAsks() {
		for _, s := range l.Of {
			w, err := m.want(s, l.Above)
			drawn := slices.ContainsFunc(cols, func(c shown) bool { return c.out == w.out })
			if err != nil || !drawn {
				continue
			}
			if c, ok := m.curveLimit(l, w, a); ok {
				list = append(list, c)
			}
			break
		}
	}
	return list
}

// curveLimit states one limit; false for one that is no level of its own.
func (m *Model) curveLimit(l casefile.AskLimit, w shown, a *Curves) (CurveLimit, bool) {
	num := m.val.Num
	c := CurveLimit{Name: l.Name, Unit: w.unit, Kind: w.kind, Level: num[l.Level], From: a.From, To: a.To}
	if l.HasAfter {
		c.From = max(c.From, num[l.After])
	}
	if l.HasUntil {
		c.To = min(c.To, num[l.Until])
	}
	switch l.Kind {
	case casefile.StayBelow:
		c.Side = +1
	case casefile.StayAbove:
		c.Side = -1
	case casefile.Reach:
		if l.Percent {
			return c, false
		}
	default:
		return c, false
	}
	return c, c.From < c.To
}
