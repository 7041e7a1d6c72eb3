package study

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// mostTimes is how many time constants of each case are compared.
const mostTimes = 5

// A figure is one number that comes out of a case.
type figure struct {
	what, name, scenario string
	unit, kind           string
	value                *float64
	text                 string
}

func (f *figure) key() [4]string { return [4]string{f.what, f.name, f.scenario, f.unit} }

// figures are the numbers that a case comes to: time constants, and under each scenario the
// levels at the start, the extremes of its tables, its limits, results and finds.
func (m *Model) figures(list []*casefile.Scenario) ([]figure, Evidence, error) {
	if err := m.wantAll(); err != nil {
		return nil, Evidence{}, err
	}
	poles, err := m.PolesUnder(list)
	if err != nil {
		return nil, Evidence{}, err
	}
	all := timesOf(poles.Modes)
	said, err := each(m, list, func() (Evidence, error) {
		own, warn, err := m.figuresNow()
		all = append(all, own...)
		if err != nil {
			return Evidence{}, err
		}
		return m.evidence(warn), nil
	})
	return all, together(namesOf(list), said), err
}

// timesOf are the slowest time constants, or what swings instead.
func timesOf(modes []Mode) (list []figure) {
	count := map[string]int{}
	for _, p := range modes {
		if p.Im < 0 || count[p.Scenario] == mostTimes {
			continue
		}
		count[p.Scenario]++
		f := figure{scenario: p.Scenario, unit: "s", name: fmt.Sprintf("number %d", count[p.Scenario])}
		switch {
		case p.TimeConstant != nil:
			f.what, f.value = "time constant", p.TimeConstant
		case p.NaturalFrequency != nil:
			period := 2 * math.Pi / math.Abs(p.Im)
			f.what, f.value = "period of a swing", &period
		default:
			continue // integrates
		}
		list = append(list, f)
	}
	return list
}

// figuresNow are those under the scenario in force.
func (m *Model) figuresNow() ([]figure, []Warning, error) {
	in := m.Scenario()
	resp, err := m.response()
	if err != nil {
		return nil, nil, err
	}
	var list []figure
	start, err := m.startSnapshot()
	if err != nil {
		return nil, nil, err
	}
	for _, name := range m.freeNames() {
		id, _ := m.Case.Node(name)
		level := start.shown(network.NodeID(id))
		list = append(list, figure{what: "start", name: name, scenario: in, unit: m.at(id).level, kind: kindLevel, value: &level})
	}
	seen := map[string]bool{}
	for _, t := range m.tables() {
		times, err := m.times(t)
		if err != nil {
			return nil, nil, err
		}
		t0, t1 := times[0], min(times[len(times)-1], m.reach())
		for _, s := range t.Show {
			w, err := m.want(s, t.Above)
			if err != nil {
				return nil, nil, err
			}
			if t.Above != "" {
				w.name += " above " + t.Above
			}
			if seen[w.name] || t1 < t0 || len(impulsesIn(resp, w.out, t0, t1)) > 0 {
				continue
			}
			seen[w.name] = true
			hi, lo := resp.Max(w.out, t0, t1).Y, resp.Min(w.out, t0, t1).Y
			list = append(list, figure{"highest", w.name, in, w.unit, w.kind, &hi, ""}, figure{"lowest", w.name, in, w.unit, w.kind, &lo, ""})
		}
	}
	limits, err := m.Limits()
	if err != nil {
		return nil, nil, err
	}
	for _, l := range limits.Limits {
		verdict := "not met"
		switch {
		case l.Met:
			verdict = "met"
		case l.NotJudged:
			verdict = "not judged"
		}
		value, unit, kind := l.Value, l.Unit, l.Kind
		if value == nil && l.At != nil {
			value, unit, kind = l.At, "s", ""
		}
		list = append(list, figure{"limit", l.Name, in, unit, kind, value, verdict})
		list = append(list, figure{"margin", l.Name, in, l.Unit, differenceOf(l.Kind), l.Margin, ""})
	}
	for _, r := range limits.Results {
		list = append(list, figure{"result", r.Name, in, r.Unit, r.Kind, &r.Value, ""})
	}
	for _, f := range limits.Finds {
		value := f.At
		if value == nil {
			value = f.Value
		}
		list = append(list, figure{"find", f.Name, in, f.Unit, f.Kind, value, ""})
	}
	return list, limits.Warnings, nil
}

// sideBySide puts the figures of two cases together: those of the first in their order, then
// what only the second has.
func sideBySide(a, b []figure) []Compared {
	list := []Compared{}
	other := map[[4]string]*figure{}
	for i := range b {
		other[b[i].key()] = &b[i]
	}
	row := func(f *figure) Compared {
		return Compared{What: f.what, Name: f.name, Scenario: f.scenario, Unit: f.unit, Kind: f.kind}
	}
	used := map[[4]string]bool{}
	for i := range a {
		x := row(&a[i])
		x.A, x.Text = a[i].value, a[i].text
		if o := other[a[i].key()]; o != nil {
			used[a[i].key()] = true
			x.B = o.value
			if x.Text != o.text {
				x.Text += ", then " + o.text
			}
			if x.A != nil && x.B != nil {
				d := *x.B - *x.A
				x.Difference = &d
			}
		} else if x.Text != "" {
			x.Text += ", then none"
		}
		list = append(list, x)
	}
	for i := range b {
		if used[b[i].key()] {
			continue
		}
		x := row(&b[i])
		if x.B = b[i].value; b[i].text != "" {
			x.Text = "none, then " + b[i].text
		}
		list = append(list, x)
	}
	return list
}
