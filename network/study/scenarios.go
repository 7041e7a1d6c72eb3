package study

import (
	"reflect"
	"slices"

	"lagbook/network/casefile"
)

// TablesUnder answers the verb table under each of some scenarios.
func (m *Model) TablesUnder(list []*casefile.Scenario) (*Tables, error) {
	if len(list) > 1 {
		if err := m.wantTables(); err != nil {
			return nil, err
		}
		if err := m.wantNamed(); err != nil {
			return nil, err
		}
	}
	answers, err := each(m, list, m.Tables)
	if err != nil {
		return nil, err
	}
	names, a := namesOf(list), &Tables{Title: m.Case.Title, Tables: []Table{}}
	var said []Evidence
	for i, x := range answers {
		a.Tables = append(a.Tables, tablesIn(names[i], x.Tables)...)
		a.Results, a.Finds = resultsIn(a.Results, names[i], x.Results), findsIn(a.Finds, names[i], x.Finds)
		a.Measured = append(a.Measured, measuredIn(names[i], x.Measured)...)
		said = append(said, x.Evidence)
	}
	a.Evidence = together(names, said)
	return a, nil
}

// tablesIn are tables with the name of the scenario they hold under.
func tablesIn(scenario string, list []Table) []Table {
	list = slices.Clone(list)
	for i := range list {
		list[i].Scenario = scenario
	}
	return list
}

// LimitsUnder judges each limit under each of some scenarios: limit by limit, the worst
// scenario of each marked, and the one that governs of all.
func (m *Model) LimitsUnder(list []*casefile.Scenario) (*Limits, error) {
	if len(list) > 1 {
		if err := m.wantLimits(); err != nil {
			return nil, err
		}
		if err := m.wantNamed(); err != nil {
			return nil, err
		}
	}
	answers, err := each(m, list, m.Limits)
	if err != nil {
		return nil, err
	}
	names, a := namesOf(list), &Limits{Title: m.Case.Title, Met: true}
	var said []Evidence
	var verdicts [][]Limit
	for i, x := range answers {
		a.Results, a.Finds = resultsIn(a.Results, names[i], x.Results), findsIn(a.Finds, names[i], x.Finds)
		verdicts, said = append(verdicts, x.Limits), append(said, x.Evidence)
		a.Met = a.Met && x.Met
	}
	a.Limits = m.limitsIn(names, verdicts)
	a.Evidence = together(names, said)
	return a, nil
}

// limitsIn puts the verdicts under scenarios in the order of the limits.
func (m *Model) limitsIn(names []string, verdicts [][]Limit) []Limit {
	all := []Limit{}
	for _, ask := range m.Case.Questions.Limits {
		first := len(all)
		for i, list := range verdicts {
			for _, v := range list {
				if v.Name == ask.Name {
					v.Scenario, v.Governs = names[i], false
					all = append(all, v)
				}
			}
		}
		if own := all[first:]; len(own) > 1 {
			own[worstOf(own)].Worst = true
		}
	}
	govern(all)
	return all
}

// worstOf is the place of the worst verdict.
func worstOf(list []Limit) int {
	w := 0
	for i := range list {
		if worse(list[i], list[w]) {
			w = i
		}
	}
	return w
}

// CyclesUnder answers the verb cycle under each of some scenarios.
func (m *Model) CyclesUnder(list []*casefile.Scenario) (*Cycles, error) {
	if len(list) > 1 {
		if _, err := m.cycled(); err != nil {
			return nil, err
		}
	}
	answers, err := each(m, list, m.Cycle)
	if err != nil {
		return nil, err
	}
	names := namesOf(list)
	var said []Evidence
	for i, x := range answers {
		for k := range x.Cycles {
			x.Cycles[k].Scenario = names[i]
		}
		said = append(said, x.Evidence)
	}
	if len(answers) == 1 {
		answers[0].Evidence = together(names, said)
		return answers[0], nil
	}
	a := &Cycles{Title: m.Case.Title, Cycles: []Cycle{}, Each: answers}
	for _, x := range answers {
		a.Cycles = append(a.Cycles, x.Cycles...)
		a.Periods += x.Periods
	}
	a.Evidence = together(names, said)
	return a, nil
}

// PolesUnder answers the verb poles: once where the scenarios leave the network as it is,
// else under each.
func (m *Model) PolesUnder(list []*casefile.Scenario) (*Poles, error) {
	names, list, err := m.networks(list)
	if err != nil {
		return nil, err
	}
	answers, err := each(m, list, m.Poles)
	if err != nil {
		return nil, err
	}
	var said []Evidence
	for i, x := range answers {
		for k := range x.Transfers {
			x.Transfers[k].Scenario = names[i]
		}
		for k := range x.Modes {
			x.Modes[k].Scenario = names[i]
		}
		said = append(said, x.Evidence)
	}
	if len(answers) == 1 {
		answers[0].Evidence = together(names, said)
		return answers[0], nil
	}
	a := &Poles{Title: m.Case.Title, About: answers[0].About, Transfers: []Transfer{}, Each: answers}
	for _, x := range answers {
		a.Transfers, a.Modes = append(a.Transfers, x.Transfers...), append(a.Modes, x.Modes...)
	}
	a.Evidence = together(names, said)
	return a, nil
}

// FrequencyUnder answers the verb frequency as PolesUnder does poles.
func (m *Model) FrequencyUnder(list []*casefile.Scenario, q FrequencyQuestion) (*Frequency, error) {
	names, list, err := m.networks(list)
	if err != nil {
		return nil, err
	}
	answers, err := each(m, list, func() (*Frequency, error) { return m.Frequency(q) })
	if err != nil {
		return nil, err
	}
	a := &Frequency{Title: m.Case.Title, Transfers: []FrequencyTransfer{}}
	var said []Evidence
	for i, x := range answers {
		for _, t := range x.Transfers {
			t.Scenario = names[i]
			a.Transfers = append(a.Transfers, t)
		}
		said = append(said, x.Evidence)
	}
	a.Evidence = together(names, said)
	return a, nil
}

// networks are the scenarios under which the network is to be looked at: the first alone,
// and without its name, where all of them leave it the same.
func (m *Model) networks(list []*casefile.Scenario) (names []string, of []*casefile.Scenario, err error) {
	if len(list) == 1 {
		return namesOf(list), list, nil
	}
	if _, _, err := m.pairs(); err != nil { // makes outputs of what any scenario shows
		return nil, nil, err
	}
	first := true
	same, err := each(m, list, func() (bool, error) {
		if first {
			first = false
			return true, nil
		}
		return m.sameAsBefore(), nil
	})
	switch {
	case err != nil:
		return nil, nil, err
	case slices.Contains(same, false):
		return namesOf(list), list, nil
	}
	return []string{""}, list[:1], nil
}

// sameAsBefore reports whether the values in force leave the network as those before did,
// also in what it switches to. About what state a network is that is not linear changes
// with every load.
func (m *Model) sameAsBefore() bool {
	if m.Nonlinear() || m.prev == nil {
		return !m.Nonlinear()
	}
	return sameNumbers(m.prev, m.par) && reflect.DeepEqual(m.prev.Switch, m.par.Switch)
}

// wantTables makes outputs of what the tables of any scenario show, and of what is measured.
func (m *Model) wantTables() error {
	if err := m.wantMeasured(); err != nil {
		return err
	}
	for _, t := range m.Case.Questions.Tables {
		for _, s := range t.Show {
			if _, err := m.want(s, t.Above); err != nil {
				return err
			}
		}
	}
	return nil
}

// wantLimits makes outputs of what the limits of any scenario are on.
func (m *Model) wantLimits() error {
	for _, l := range m.Case.Questions.Limits {
		for _, s := range l.Of {
			if _, err := m.want(s, l.Above); err != nil {
				return err
			}
		}
	}
	return nil
}
