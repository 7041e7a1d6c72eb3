package study

import (
	"fmt"
	"math"
	"slices"
)

// A Measured sets a prediction beside what was measured, at the times of the log that lie
// in the run. Rows are [time, predicted, measured]. Differences are what is predicted less
// what is measured: RMS the root of the mean of their squares, Worst the largest in size,
// at At, Offset their mean; each row of the log counts once.
type Measured struct {
	Name     string       `json:"name"`
	Scenario string       `json:"scenario,omitempty"`
	Of       string       `json:"of"`
	Unit     string       `json:"unit"`
	Kind     string       `json:"kind,omitempty"`
	Rows     [][3]float64 `json:"rows"`
	RMS      float64      `json:"rms"`
	Worst    float64      `json:"worst"`
	At       float64      `json:"at"` // s
	Offset   float64      `json:"offset"`

	File, Column, Source string `json:"-"`
}

// wantMeasured makes outputs of what is measured.
func (m *Model) wantMeasured() error {
	for _, q := range m.Case.Questions.Measured {
		if _, err := m.want(q.Of, ""); err != nil {
			return err
		}
	}
	return nil
}

// measured sets each log beside the prediction.
func (m *Model) measured(resp answers) ([]Measured, []Warning, error) {
	var list []Measured
	var warn []Warning
	for _, q := range m.Case.Questions.Measured {
		w, err := m.want(q.Of, "")
		if err != nil {
			return nil, nil, err
		}
		a := Measured{Name: q.Name, Of: w.name, Unit: w.unit, Kind: w.kind, File: q.File, Column: q.Column, Source: q.Source}
		outside := 0
		for i, t := range q.Times {
			if t < 0 || t > m.reach() {
				outside++
				continue
			}
			y := resp.At(w.out, t)
			if i+1 < len(q.Times) && q.Times[i+1] == t { // the first of two is before the jump
				y = resp.Left(w.out, t)
			}
			a.Rows = append(a.Rows, [3]float64{t, y, q.Values[i]})
		}
		if outside > 0 {
			warn = append(warn, Warning{"beyond-the-run", fmt.Sprintf("measured %q: %d of %d rows of %s lie outside the run and are left out", q.Name, outside, len(q.Times), q.File)})
		}
		if len(a.Rows) > 0 {
			a.judge()
			list = append(list, a)
		}
	}
	return list, warn, nil
}

// judge works out how far the prediction is off.
func (a *Measured) judge() {
	n := float64(len(a.Rows))
	worst := -1.0
	for _, r := range a.Rows {
		d := r[1] - r[2]
		a.Offset += d / n
		a.RMS += d * d / n
		if math.Abs(d) > worst {
			worst, a.Worst, a.At = math.Abs(d), d, r[0]
		}
	}
	a.RMS = math.Sqrt(a.RMS)
}

// measuredIn are comparisons with the name of the scenario they hold under.
func measuredIn(scenario string, list []Measured) []Measured {
	list = slices.Clone(list)
	for i := range list {
		list[i].Scenario = scenario
	}
	return list
}
