package study

import (
	"slices"
	"strings"

	"lagbook/network/casefile"
)

// A Refusal is a scenario, or a set of given values, under which the case cannot be
// computed: the diagnostics name the places.
type Refusal struct{ Diagnostics []casefile.Diagnostic }

func (r *Refusal) Error() string { return casefile.Listing(r.Diagnostics) }

// An Under is what went wrong under a scenario.
type Under struct {
	Scenario string
	Err      error
}

func (u *Under) Error() string {
	return "scenario \"" + u.Scenario + "\": " + strings.TrimPrefix(u.Err.Error(), "network: ")
}
func (u *Under) Unwrap() error { return u.Err }

// each asks a question under each of some scenarios; the last stays in force.
func each[T any](m *Model, list []*casefile.Scenario, ask func() (T, error)) ([]T, error) {
	var answers []T
	for _, s := range list {
		if s != m.under {
			if ds := m.Use(s); casefile.Failed(ds) {
				return nil, &Refusal{ds}
			}
		}
		a, err := ask()
		if err != nil {
			if s != nil {
				err = &Under{s.Name, err}
			}
			return nil, err
		}
		answers = append(answers, a)
	}
	return answers, nil
}

// namesOf are the names of scenarios, "" for the case as written.
func namesOf(list []*casefile.Scenario) []string {
	names := make([]string, len(list))
	for i, s := range list {
		if s != nil {
			names[i] = s.Name
		}
	}
	return names
}

// together is the evidence of one question under several scenarios. What is not the same
// under all says under which it is so.
func together(names []string, list []Evidence) Evidence {
	if len(list) == 1 {
		return list[0].named(names[0])
	}
	e := Evidence{Warnings: sharedWarnings(names, list), Caution: Caution}
	pick := func(of func(Evidence) string) string {
		texts := make([]string, len(list))
		for i := range list {
			texts[i] = of(list[i])
		}
		return shared(names, texts)
	}
	e.Start = pick(func(e Evidence) string { return e.Start })
	e.Linear = pick(func(e Evidence) string { return e.Linear })
	for i := range list {
		if m := list[i].named(names[i]).Marched; m != nil {
			e.Marched = e.Marched.and(m, names[i])
		}
	}
	return e
}

// named puts the name of a scenario on the events.
func (e Evidence) named(scenario string) Evidence {
	if e.Marched == nil {
		return e
	}
	m := *e.Marched
	m.Events = slices.Clone(m.Events)
	for i := range m.Events {
		m.Events[i].Scenario = scenario
	}
	e.Marched = &m
	return e
}

// and adds another march, under the scenario named: all events, the worse balance, and the
// earlier end.
func (m *Marched) and(o *Marched, scenario string) *Marched {
	sum := &Marched{Events: []Event{}}
	if m != nil {
		*sum = *m
	}
	sum.Events = append(sum.Events, o.Events...)
	sum.Balance.Error = max(sum.Balance.Error, o.Balance.Error)
	sum.Steps, sum.Rejected = sum.Steps+o.Steps, sum.Rejected+o.Rejected
	if o.ValidUntil != nil && (sum.ValidUntil == nil || *o.ValidUntil < *sum.ValidUntil) {
		sum.ValidUntil = o.ValidUntil
	}
	if o.Stopped != "" {
		if sum.Stopped != "" {
			sum.Stopped += "; "
		}
		sum.Stopped += scenario + ": " + o.Stopped
	}
	return sum
}

// sharedWarnings lists each warning once, in the order in which they first come, with the
// scenarios it is given under where those are not all.
func sharedWarnings(names []string, list []Evidence) []Warning {
	var order []Warning
	under := map[Warning][]string{}
	for i, e := range list {
		for _, w := range e.Warnings {
			if under[w] == nil {
				order = append(order, w)
			}
			under[w] = append(under[w], names[i])
		}
	}
	all := []Warning{}
	for _, w := range order {
		text := w.Text
		if len(under[w]) < len(list) {
			text = strings.Join(under[w], ", ") + ": " + text
		}
		all = append(all, Warning{w.Code, text})
	}
	return all
}

// shared joins what is said under scenarios: once where it is the same under all.
func shared(names, texts []string) string {
	var order []string
	under := map[string][]string{}
	for i, t := range texts {
		if under[t] == nil {
			order = append(order, t)
		}
		under[t] = append(under[t], names[i])
	}
	if len(order) == 1 {
		return order[0]
	}
	for i, t := range order {
		order[i] = strings.Join(under[t], ", ") + ": " + t
	}
	return strings.Join(order, "; ")
}
