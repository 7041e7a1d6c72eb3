package study

import (
	"fmt"

	"lagbook/network/casefile"
)

// A Find is the answer to a [find]: At (s) is when what it asks about crosses the level,
// absent where it never does; Value is that of a given value at which the steady state is
// lost, absent where it is not lost.
type Find struct {
	Name     string   `json:"name"`
	Scenario string   `json:"scenario,omitempty"`
	Of       string   `json:"of"` // what crosses, or the given value
	At       *float64 `json:"at,omitempty"`
	Value    *float64 `json:"value,omitempty"`
	Unit     string   `json:"unit"` // of At or Value
	Kind     string   `json:"kind,omitempty"`
	Text     string   `json:"text"` // the answer in a sentence
}

// Finds answers each [find].
func (m *Model) Finds() ([]Find, []Warning, error) {
	if err := m.wantFinds(); err != nil {
		return nil, nil, err
	}
	var list []Find
	var warn []Warning
	for _, ask := range m.Case.Questions.Finds {
		of := m.crossing
		if ask.NoSteady {
			of = m.steadyLost
		}
		f, w, err := of(ask)
		if err != nil {
			return nil, nil, fmt.Errorf("find %q: %w", ask.Name, err)
		}
		list, warn = append(list, f), append(warn, w...)
	}
	return list, warn, nil
}

// findsIn appends finds with the name of the scenario that they hold under.
func findsIn(all []Find, scenario string, list []Find) []Find {
	for _, f := range list {
		f.Scenario = scenario
		all = append(all, f)
	}
	return all
}

// wantFinds makes sure that what is to cross a level is among the outputs.
func (m *Model) wantFinds() error {
	for _, ask := range m.Case.Questions.Finds {
		if ask.NoSteady {
			continue
		}
		if _, err := m.want(ask.When, ""); err != nil {
			return err
		}
	}
	return nil
}

// wantNamed makes sure that all results and finds are among the outputs.
func (m *Model) wantNamed() error {
	if err := m.wantResults(); err != nil {
		return err
	}
	return m.wantFinds()
}

// named answers for the results and the finds that stand beside tables and limits.
func (m *Model) named(results *[]Result, finds *[]Find) (warn []Warning, err error) {
	var more []Warning
	if *results, warn, err = m.Results(); err != nil {
		return nil, err
	}
	if *finds, more, err = m.Finds(); err != nil {
		return nil, err
	}
	return append(warn, more...), nil
}

// crossing finds when an output first crosses a level.
func (m *Model) crossing(ask casefile.AskFind) (Find, []Warning, error) {
	w, err := m.want(ask.When, "")
	if err != nil {
		return Find{}, nil, err
	}
	resp, err := m.response()
	if err != nil {
		return Find{}, nil, err
	}
	level, end := m.val.Num[ask.Crosses], m.reach()
	f := Find{Name: ask.Name, Of: w.name, Unit: "s"}
	value := func(v float64) string { return m.Show.Value(v, w.unit, w.kind) }
	warning := func(code, text string) []Warning {
		return []Warning{{code, fmt.Sprintf("find %q: %s", ask.Name, text)}}
	}
	before, first := resp.Left(w.out, 0)-level, resp.At(w.out, 0)-level
	r, ok := resp.First(w.out, level, 0, end)
	switch slack := resp.Rounding(w.out); {
	case before < -slack && first > slack || before > slack && first < -slack:
		at := 0.0
		f.At, f.Text = &at, fmt.Sprintf("%s jumps over %s at t = 0", w.name, value(level))
		return f, nil, nil
	case ok && r.Capped:
		f.Text = fmt.Sprintf("not found: the search for when %s crosses %s was given up, the loads change too often", w.name, value(level))
		return f, warning("search-stopped", f.Text), nil
	case ok && r.T == 0:
		f.At, f.Text = &r.T, fmt.Sprintf("%s is at %s when the run begins", w.name, value(level))
		return f, warning("true-at-start", f.Text), nil
	case ok:
		f.At, f.Text = &r.T, fmt.Sprintf("%s crosses %s at %s", w.name, value(level), m.Show.Time(r.T))
		if r.Touch {
			f.Text = fmt.Sprintf("%s only just touches %s at %s", w.name, value(level), m.Show.Time(r.T))
			return f, warning("touch", f.Text+": it may pass it or not, within rounding"), nil
		}
		return f, nil, nil
	}
	e, word := resp.Max(w.out, 0, end), "highest"
	if first > 0 {
		e, word = resp.Min(w.out, 0, end), "lowest"
	}
	f.Text = fmt.Sprintf("%s never crosses %s in the run of %s; %s %s at %s", w.name, value(level), m.Show.Time(end), word, value(e.Y), m.Show.Time(e.T))
	if last, ok := resp.Final(w.out); ok && (last-level)*first < 0 && !m.cut() {
		f.Text += "; in the end " + value(last) + ", so later it does: let the run be longer"
		return f, warning("beyond-the-run", f.Text), nil
	}
	return f, nil, nil
}
