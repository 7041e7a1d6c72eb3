package study

import "lagbook/network/casefile"

// TablesBothUnder answers table --both under each of some scenarios.
func (m *Model) TablesBothUnder(list []*casefile.Scenario) (*TablesBoth, error) {
	answers, err := each(m, list, m.TablesBoth)
	if err != nil {
		return nil, err
	}
	names, a := namesOf(list), &TablesBoth{Title: m.Case.Title, Tables: []Table{}, Linear: []Table{}}
	var said []Evidence
	var both []Both
	for i, x := range answers {
		a.Tables = append(a.Tables, tablesIn(names[i], x.Tables)...)
		a.Linear = append(a.Linear, tablesIn(names[i], x.Linear)...)
		both, said = append(both, x.Both), append(said, x.Evidence)
	}
	a.Both, a.Evidence = bothIn(names, both), together(names, said)
	return a, nil
}

// LimitsBothUnder answers limits --both under each of some scenarios.
func (m *Model) LimitsBothUnder(list []*casefile.Scenario) (*LimitsBoth, error) {
	answers, err := each(m, list, m.LimitsBoth)
	if err != nil {
		return nil, err
	}
	names, a := namesOf(list), &LimitsBoth{Title: m.Case.Title, Met: true}
	var said []Evidence
	var both []Both
	var marched, linear [][]Limit
	for _, x := range answers {
		marched, linear = append(marched, x.Limits), append(linear, x.Linear)
		both, said = append(both, x.Both), append(said, x.Evidence)
		a.Met = a.Met && x.Met
	}
	a.Limits, a.Linear = m.limitsIn(names, marched), m.limitsIn(names, linear)
	a.Both, a.Evidence = bothIn(names, both), together(names, said)
	return a, nil
}

// bothIn gathers how far the two answers are apart; over what change the linear one holds
// is said of a scenario alone.
func bothIn(names []string, list []Both) Both {
	if len(list) == 1 {
		for i := range list[0].Differences {
			list[0].Differences[i].Scenario = names[0]
		}
		return list[0]
	}
	b := Both{Differences: []Difference{}}
	for i, x := range list {
		for _, d := range x.Differences {
			d.Scenario = names[i]
			b.Differences = append(b.Differences, d)
		}
	}
	return b
}
