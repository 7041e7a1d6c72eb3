package study

import (
	"fmt"
	"reflect"
	"slices"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// Use sets the values of the case with a scenario in force, nil for those as written. Where
// a scenario changes loads and limits alone, the reduction of the network with its poles
// and modes is kept, and only the response is made anew.
func (m *Model) Use(s *casefile.Scenario) []casefile.Diagnostic { return m.put(s, nil) }

// Scenario is the name of the scenario in force, "" for none.
func (m *Model) Scenario() string {
	if m.under == nil {
		return ""
	}
	return m.under.Name
}

// Scenarios returns those of the case that are named, in the order of the case; all of
// them where none is named. Of a case without scenarios it is one that is nil: the case as
// written.
func (m *Model) Scenarios(names []string) ([]*casefile.Scenario, error) {
	all := m.Case.Questions.Scenarios
	known := make([]string, len(all))
	for i := range all {
		known[i] = all[i].Name
	}
	for _, n := range names {
		if slices.Contains(known, n) {
			continue
		}
		switch near, ok := quantity.Nearest(n, known); {
		case ok:
			return nil, fmt.Errorf("%q is no scenario of the case; did you mean %q?", n, near)
		case len(known) == 0:
			return nil, fmt.Errorf("%q is no scenario: the case has none", n)
		}
		return nil, fmt.Errorf("%q is no scenario of the case, which has %s", n, join(known))
	}
	var list []*casefile.Scenario
	for i := range all {
		if len(names) == 0 || slices.Contains(names, all[i].Name) {
			list = append(list, &all[i])
		}
	}
	if list == nil {
		list = []*casefile.Scenario{nil}
	}
	return list, nil
}

// tableAsks are the tables that the case asks for under the scenario in force.
func (m *Model) tableAsks() []casefile.AskTable {
	asks := m.Case.Questions.Tables
	if m.under == nil || m.under.Tables == nil {
		return asks
	}
	var list []casefile.AskTable
	for _, t := range asks {
		if slices.Contains(m.under.Tables, t.Title) {
			list = append(list, t)
		}
	}
	return list
}

// limitAsks are the limits that hold under the scenario in force.
func (m *Model) limitAsks() []casefile.AskLimit {
	asks := m.Case.Questions.Limits
	if m.under == nil || m.under.Limits == nil {
		return asks
	}
	var list []casefile.AskLimit
	for _, l := range asks {
		if slices.Contains(m.under.Limits, l.Name) {
			list = append(list, l)
		}
	}
	return list
}

// sameNetwork reports whether two sets of numbers make the same network, which then is not
// looked at anew. One that switches while it runs is never taken to be.
func sameNetwork(a, b *network.Params) bool {
	return !a.Turns() && !b.Turns() && sameNumbers(a, b)
}

// sameNumbers reports whether two sets are equal but for waves and starts.
func sameNumbers(a, b *network.Params) bool {
	for _, pair := range [][2][]float64{{a.C, b.C}, {a.G, b.G}, {a.L, b.L}, {a.LR, b.LR}, {a.W, b.W}, {a.K, b.K}, {a.About, b.About}, {a.Now, b.Now}, {a.Datum, b.Datum}} {
		if !slices.Equal(pair[0], pair[1]) {
			return false
		}
	}
	return slices.Equal(a.Shut, b.Shut) && reflect.DeepEqual(a.Law, b.Law) && reflect.DeepEqual(a.Drop, b.Drop)
}
