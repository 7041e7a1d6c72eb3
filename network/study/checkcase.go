package study

import (
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A CheckProfile is one profile, its waveform in words. Bound is by how much it may be off
// since it is sampled; of one in closed form it is absent.
type CheckProfile struct {
	Name   string   `json:"name"`
	Unit   string   `json:"unit"`
	Kind   string   `json:"kind,omitempty"`
	Text   string   `json:"text"`
	Wave   string   `json:"wave"`
	Form   string   `json:"form"` // closed, sampled
	Bound  *float64 `json:"bound,omitempty"`
	Used   bool     `json:"used"`
	Source string   `json:"source,omitempty"`
}

// A CheckUse is one use of a part: its ports with the nodes they are joined to, and the
// given values in force in it.
type CheckUse struct {
	Name   string        `json:"name"`
	Part   string        `json:"part"`
	Join   [][2]string   `json:"join"`
	Set    []CheckUseSet `json:"set"`
	Source string        `json:"source,omitempty"`
}

// A CheckUseSet is a given value of a use; Own tells that it is as the part says.
type CheckUseSet struct {
	Name  string  `json:"name"`
	Value float64 `json:"value"`
	Unit  string  `json:"unit"`
	Kind  string  `json:"kind,omitempty"`
	Text  string  `json:"text"`
	Own   bool    `json:"own"`
}

// A CheckScenario is what one scenario changes of the case as written.
type CheckScenario struct {
	Name     string        `json:"name"`
	Title    string        `json:"title,omitempty"`
	Set      []CheckChange `json:"set"`
	Profiles [][2]string   `json:"profiles"`         // a profile and what stands in for it
	Tables   []string      `json:"tables,omitempty"` // those it is asked for, where not all
	Limits   []string      `json:"limits,omitempty"`
	Network  bool          `json:"changes_network"` // and with it the poles
	Source   string        `json:"source,omitempty"`
}

// A CheckChange is one given value that a scenario changes.
type CheckChange struct {
	Given string  `json:"given"`
	From  float64 `json:"from"`
	To    float64 `json:"to"`
	Unit  string  `json:"unit"`
	Kind  string  `json:"kind,omitempty"`
	Text  string  `json:"text"` // as the scenario writes it
}

// checkProfiles lists the profiles as stated.
func (m *Model) checkProfiles() (list []CheckProfile) {
	for _, p := range m.Case.Profiles() {
		kind := p.Kind
		if kind == quantity.Either {
			kind = quantity.Difference
		}
		c := CheckProfile{Name: p.Name, Unit: unitOf(p.Dim), Kind: kindOf(kind), Text: p.Text, Form: "closed", Used: p.Used, Source: p.Source}
		if p.Bound > 0 {
			c.Form, c.Bound = "sampled", &p.Bound
		}
		c.Wave = waveWords(m.val.Wave[p.Wave], func(v float64) string { return m.Show.Value(v, c.Unit, c.Kind) }, m.Show.Time)
		list = append(list, c)
	}
	return list
}

// checkUses lists the uses of parts.
func (m *Model) checkUses() (list []CheckUse) {
	values := m.Case.GivenValues()
	for _, u := range m.Case.Uses() {
		c := CheckUse{Name: u.Name, Part: u.Part, Join: u.Join, Set: []CheckUseSet{}, Source: u.Source}
		for _, s := range u.Set {
			v := values[s.Given]
			c.Set = append(c.Set, CheckUseSet{s.Name, v.SI, unitOf(v.Dim), kindOf(v.Kind), m.Case.Given[s.Given].Text, s.Own})
		}
		list = append(list, c)
	}
	return list
}

// checkScenarios lists what each scenario changes.
func (m *Model) checkScenarios() (list []CheckScenario, err error) {
	values := m.Case.GivenValues()
	for i := range m.Case.Questions.Scenarios {
		s := &m.Case.Questions.Scenarios[i]
		c := CheckScenario{Name: s.Name, Title: s.Title, Set: []CheckChange{}, Profiles: s.Profiles, Tables: s.Tables, Limits: s.Limits, Source: s.Source}
		if c.Profiles == nil {
			c.Profiles = [][2]string{}
		}
		under := m.copied()
		if ds := under.Use(s); casefile.Failed(ds) {
			return nil, &Refusal{ds}
		}
		c.Network = !sameNumbers(m.par, under.par)
		for _, x := range s.Set {
			at, ok := m.Case.GivenIndex(x.Given)
			if !ok {
				continue
			}
			v := values[at]
			c.Set = append(c.Set, CheckChange{x.Given, v.SI, under.val.Num[x.Slot], unitOf(v.Dim), kindOf(v.Kind), x.Text})
		}
		list = append(list, c)
	}
	return list, nil
}
