package study

import (
	"math"
	"slices"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A Comparison sets two cases side by side: what they state differently, and what comes
// out of each.
type Comparison struct {
	Title   string            `json:"title"`
	Inputs  []InputDifference `json:"inputs"`
	Results []Compared        `json:"results"`
	Evidence

	Files, Titles [2]string `json:"-"`
}

// An InputDifference is one value that the two cases state differently, or that only one
// states. Where the whole of a table stands in one case alone, Key is "" and the text is
// all it says.
type InputDifference struct {
	Table  string `json:"table,omitempty"` // "thermal.resistance.foot"; "" at the top of the file
	Key    string `json:"key,omitempty"`
	Change string `json:"change"` // changed, added, removed
	A      string `json:"a,omitempty"`
	B      string `json:"b,omitempty"`
}

// A Compared is one number that comes out of both cases; A or B is absent where that case
// does not have it. Difference is B − A.
type Compared struct {
	What       string   `json:"what"` // start, time constant, swing, highest, lowest, limit, margin, result, find
	Name       string   `json:"name"`
	Scenario   string   `json:"scenario,omitempty"`
	Unit       string   `json:"unit"`
	Kind       string   `json:"kind,omitempty"`
	A          *float64 `json:"a,omitempty"`
	B          *float64 `json:"b,omitempty"`
	Difference *float64 `json:"difference,omitempty"`
	Text       string   `json:"text,omitempty"` // of limits: how the verdicts stand
}

// Compare sets two cases side by side, each under all of its scenarios.
func Compare(a, b *Model) (*Comparison, error) {
	c := &Comparison{Inputs: inputsApart(a.Case.Statements(), b.Case.Statements()), Results: []Compared{}}
	c.Files = [2]string{a.Case.File, b.Case.File}
	c.Titles = [2]string{a.Case.Title, b.Case.Title}
	c.Title = a.Case.Title
	if b.Case.Title != a.Case.Title {
		c.Title += " | " + b.Case.Title
	}
	var found [2][]figure
	var said [2]Evidence
	for i, m := range []*Model{a, b} {
		list, err := m.Scenarios(nil)
		if err != nil {
			return nil, err
		}
		if found[i], said[i], err = m.figures(list); err != nil {
			return nil, &Side{i, err}
		}
	}
	c.Results = sideBySide(found[0], found[1])
	c.Evidence = together([]string{"A", "B"}, said[:])
	return c, nil
}

// A Side is what went wrong with one of two cases.
type Side struct {
	Case int // 0 or 1
	Err  error
}

func (s *Side) Error() string { return s.Err.Error() }
func (s *Side) Unwrap() error { return s.Err }

// inputsApart lists what two cases state differently: changed or removed in the order of
// the first, then what only the second states. Two ways to write one quantity are the same.
func inputsApart(a, b []casefile.Statement) []InputDifference {
	list := []InputDifference{}
	inA, inB := written(a), written(b)
	tablesA, tablesB := tablesOf(a), tablesOf(b)
	whole := func(table string, of []casefile.Statement) string {
		var words []string
		for _, s := range of {
			if s.Table == table {
				words = append(words, s.Key+" = "+s.Text)
			}
		}
		return strings.Join(words, ", ")
	}
	told := map[string]bool{}
	for _, s := range a {
		switch other, ok := inB[[2]string{s.Table, s.Key}]; {
		case ok && !sameText(s.Text, other):
			list = append(list, InputDifference{s.Table, s.Key, "changed", s.Text, other})
		case ok || told[s.Table]:
		case s.Table != "" && !slices.Contains(tablesB, s.Table):
			told[s.Table] = true
			list = append(list, InputDifference{Table: s.Table, Change: "removed", A: whole(s.Table, a)})
		default:
			list = append(list, InputDifference{Table: s.Table, Key: s.Key, Change: "removed", A: s.Text})
		}
	}
	for _, s := range b {
		switch _, ok := inA[[2]string{s.Table, s.Key}]; {
		case ok || told[s.Table]:
		case s.Table != "" && !slices.Contains(tablesA, s.Table):
			told[s.Table] = true
			list = append(list, InputDifference{Table: s.Table, Change: "added", B: whole(s.Table, b)})
		default:
			list = append(list, InputDifference{Table: s.Table, Key: s.Key, Change: "added", B: s.Text})
		}
	}
	return list
}

func written(list []casefile.Statement) map[[2]string]string {
	m := map[[2]string]string{}
	for _, s := range list {
		m[[2]string{s.Table, s.Key}] = s.Text
	}
	return m
}

func tablesOf(list []casefile.Statement) []string {
	var names []string
	for _, s := range list {
		if !slices.Contains(names, s.Table) {
			names = append(names, s.Table)
		}
	}
	return names
}

// sameText reports whether two texts say the same: letter for letter, or one quantity in
// other units.
func sameText(a, b string) bool {
	if a == b {
		return true
	}
	x, err := quantity.Parse(a)
	y, err2 := quantity.Parse(b)
	return err == nil && err2 == nil && x.Dim == y.Dim && x.Kind == y.Kind && math.Abs(x.SI-y.SI) <= 1e-15*math.Abs(x.SI)
}
