package study

import (
	"fmt"
	"slices"

	"lagbook/network/casefile"
)

// CurvesUnder draws what one table shows under each of some scenarios into one picture:
// lines named for their scenarios; changes of loads, which differ, are not marked then.
func (m *Model) CurvesUnder(list []*casefile.Scenario, pick int) (*Curves, error) {
	if len(list) > 1 {
		if err := m.wantAll(); err != nil {
			return nil, err
		}
	}
	answers, err := each(m, list, func() (*Curves, error) { return m.Curves(pick) })
	if err != nil {
		return nil, err
	}
	names, a := namesOf(list), answers[0]
	if len(answers) == 1 {
		a.Evidence = together(names, []Evidence{a.Evidence})
		return a, nil
	}
	sum := &Curves{Title: a.Title, Table: a.Table, From: a.From, To: a.To, Log: a.Log, Lines: []Curve{}, Limits: []CurveLimit{}, Changes: []CurveChange{}}
	var said []Evidence
	for i, x := range answers {
		sum.From, sum.To = min(sum.From, x.From), max(sum.To, x.To)
		for _, l := range x.Lines {
			l.Name += ", " + names[i]
			sum.Lines = append(sum.Lines, l)
		}
		for _, l := range x.Limits {
			if !slices.Contains(sum.Limits, l) {
				sum.Limits = append(sum.Limits, l)
			}
		}
		said = append(said, x.Evidence)
	}
	sum.Evidence = together(names, said)
	if n := len(sum.Lines); n > mostLines {
		sum.Lines = sum.Lines[:mostLines]
		sum.Warnings = append(sum.Warnings, Warning{"curves-left-out", fmt.Sprintf("only the first %d of %d curves are drawn: --scenario picks some", mostLines, n)})
	}
	return sum, nil
}
