package study

import (
	"math"
	"slices"
)

// Both says how far the linear answer about the start is from the march.
type Both struct {
	Differences []Difference `json:"differences"`
	Range       *Range       `json:"linear_range,omitempty"` // absent where the case moves by itself
}

// A Difference is the largest of one output between the two answers, and when.
type Difference struct {
	Output   string   `json:"output"`
	Scenario string   `json:"scenario,omitempty"`
	Unit     string   `json:"unit"`
	Kind     string   `json:"kind,omitempty"`
	Largest  float64  `json:"largest"`
	At       float64  `json:"at"`              // s
	Share    *float64 `json:"share,omitempty"` // of what the march moves over the run
}

// TablesBoth answers table --both: Tables are marched, Linear the same by the linear
// network about the start.
type TablesBoth struct {
	Title  string  `json:"title"`
	Tables []Table `json:"tables"`
	Linear []Table `json:"linear"`
	Both
	Evidence
}

// LimitsBoth answers limits --both.
type LimitsBoth struct {
	Title  string  `json:"title"`
	Limits []Limit `json:"limits"`
	Linear []Limit `json:"linear"`
	Met    bool    `json:"met"` // by the march
	Both
	Evidence
}

// TablesBoth answers for each [[table]] by a march and by the linear network about the
// start.
func (m *Model) TablesBoth() (*TablesBoth, error) {
	marched, err := m.Tables()
	if err != nil {
		return nil, err
	}
	l := m.Linear()
	linear, err := l.Tables()
	if err != nil {
		return nil, err
	}
	a := &TablesBoth{Title: marched.Title, Tables: marched.Tables, Linear: linear.Tables, Evidence: marched.Evidence}
	a.Both, err = m.compare(l)
	a.Warnings = append(a.Warnings, l.frozen()...)
	return a, err
}

// LimitsBoth judges each [limit] by a march and by the linear network about the start.
func (m *Model) LimitsBoth() (*LimitsBoth, error) {
	marched, err := m.Limits()
	if err != nil {
		return nil, err
	}
	l := m.Linear()
	linear, err := l.Limits()
	if err != nil {
		return nil, err
	}
	a := &LimitsBoth{Title: marched.Title, Limits: marched.Limits, Linear: linear.Limits, Met: marched.Met, Evidence: marched.Evidence}
	a.Both, err = m.compare(l)
	a.Warnings = append(a.Warnings, l.frozen()...)
	return a, err
}

// compare finds the largest difference of every output and the range in which the
// linear answer holds.
func (m *Model) compare(l *Model) (Both, error) {
	b := Both{Differences: []Difference{}}
	march, err := m.response()
	if err != nil {
		return b, err
	}
	line, err := l.response()
	if err != nil {
		return b, err
	}
	times := comparedAt(m.reach(), march.Breaks(), line.Breaks())
	for _, w := range m.shows { // which stand at the same places in l
		d := farthest(march, line, w.out, times)
		x := Difference{Output: w.name, Unit: w.unit, Kind: differenceOf(w.kind), Largest: d.y, At: d.t}
		if swing := march.Max(w.out, 0, m.reach()).Y - march.Min(w.out, 0, m.reach()).Y; swing > speck(w.unit) {
			share := math.Abs(d.y) / swing
			x.Share = &share
		}
		b.Differences = append(b.Differences, x)
	}
	b.Range = m.linearRange(l, times)
	return b, nil
}

const comparedTimes = 1000 // instants, evenly spread and again by decades

// comparedAt are the instants at which two answers are compared: a grid, a finer one
// after the start, and every break of either.
func comparedAt(end float64, breaks ...[]float64) []float64 {
	var list []float64
	for k := range comparedTimes + 1 {
		x := float64(k) / comparedTimes
		list = append(list, end*x, end*x*x*x)
	}
	for _, b := range breaks {
		for _, t := range b {
			if t <= end && len(list) < 10*comparedTimes {
				list = append(list, t)
			}
		}
	}
	slices.Sort(list)
	return slices.Compact(list)
}

// A gap is a difference of two answers at an instant.
type gap struct{ t, y float64 }

// farthest is where two answers differ most: the farthest of the instants, looked at
// more closely between its neighbours.
func farthest(a, b answers, out int, times []float64) gap {
	ya, yb := make([][]float64, out+1), make([][]float64, out+1)
	ya[out], yb[out] = make([]float64, len(times)), make([]float64, len(times))
	a.Table(times, ya)
	b.Table(times, yb)
	best, at := gap{}, 0
	for i, t := range times {
		if d := ya[out][i] - yb[out][i]; math.Abs(d) > math.Abs(best.y) {
			best, at = gap{t, d}, i
		}
	}
	lo, hi := times[max(at-1, 0)], times[min(at+1, len(times)-1)]
	for range 40 { // thirds, as on a single hump
		p, q := lo+(hi-lo)/3, hi-(hi-lo)/3
		dp, dq := a.At(out, p)-b.At(out, p), a.At(out, q)-b.At(out, q)
		for _, g := range []gap{{p, dp}, {q, dq}} {
			if math.Abs(g.y) > math.Abs(best.y) {
				best = g
			}
		}
		if math.Abs(dp) < math.Abs(dq) {
			lo = p
		} else {
			hi = q
		}
	}
	return best
}
