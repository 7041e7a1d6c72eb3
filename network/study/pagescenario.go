package study

import "lagbook/network/casefile"

// PageUnder answers the verb demo over some scenarios: tables and limits under each, the
// poles once where no scenario changes the network, what is done by hand and the network as
// understood under the first.
func (m *Model) PageUnder(list []*casefile.Scenario) (*Page, error) {
	names := namesOf(list)
	if len(list) == 1 {
		pages, err := each(m, list, m.Page)
		if err != nil {
			return nil, err
		}
		a := pages[0]
		a.Tables, a.Measured = tablesIn(names[0], a.Tables), measuredIn(names[0], a.Measured)
		a.Results, a.Finds = resultsIn(nil, names[0], a.Results), findsIn(nil, names[0], a.Finds)
		for i := range a.Limits {
			a.Limits[i].Scenario = names[0]
		}
		a.Evidence = a.Evidence.named(names[0])
		return a, nil
	}
	if err := m.wantAll(); err != nil {
		return nil, err
	}
	poles, err := m.PolesUnder(list)
	if err != nil {
		return nil, err
	}
	a := &Page{Title: m.Case.Title, About: poles.About, Transfers: poles.Transfers, Modes: poles.Modes, Range: poles.Range, Tables: []Table{}, Met: true, Each: poles.Each}
	var verdicts [][]Limit
	var said []Evidence
	ask := func() (e Evidence, err error) {
		tables, err := m.Tables()
		if err != nil {
			return e, err
		}
		limits, err := m.Limits()
		if err != nil {
			return e, err
		}
		a.Tables = append(a.Tables, tablesIn(m.Scenario(), tables.Tables)...)
		a.Measured = append(a.Measured, measuredIn(m.Scenario(), tables.Measured)...)
		a.Results, a.Finds = resultsIn(a.Results, m.Scenario(), tables.Results), findsIn(a.Finds, m.Scenario(), tables.Finds)
		verdicts, a.Met = append(verdicts, limits.Limits), a.Met && limits.Met
		return m.evidence(noted(tables.Warnings, limits.Warnings)), nil
	}
	if said, err = each(m, list, ask); err != nil {
		return nil, err
	}
	a.Limits, a.Evidence = m.limitsIn(names, verdicts), together(names, said)
	a.Warnings = noted(poles.Warnings, a.Warnings)
	_, err = each(m, list[:1], func() (bool, error) {
		if a.Hand, err = m.Hand(); err != nil {
			return false, err
		}
		check, err := m.Check()
		if err == nil {
			a.Understood = check.Understood
		}
		return true, err
	})
	return a, err
}

// noted gathers warnings, each once, but that a page of everything has no limits, which is
// no fault.
func noted(lists ...[]Warning) []Warning {
	all := []Warning{}
	seen := map[Warning]bool{}
	for _, list := range lists {
		for _, w := range list {
			if w.Code != noLimits && !seen[w] {
				seen[w] = true
				all = append(all, w)
			}
		}
	}
	return all
}
