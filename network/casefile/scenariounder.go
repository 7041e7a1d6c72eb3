package casefile

import (
	"slices"

	"lagbook/network/quantity"
)

// Under computes every value of the case with a scenario in force: the given values that
// it sets and the profiles that stand in for others. A given value that it sets is as it
// says also where the case states an expression. given is as for Eval; expressions that
// the scenario sets are of those. s nil, or a scenario that changes nothing: as Eval.
// What is wrong says in which scenario.
func (c *Case) Under(s *Scenario, given []quantity.Value) (Values, []Diagnostic) {
	switch {
	case s == nil:
		return c.Eval(given)
	case len(s.Set) == 0:
		v, diags := c.evalWith(given, s.Profiles)
		return v, s.says(diags)
	}
	base := given
	if base == nil {
		base = c.GivenValues()
	}
	known, diags := c.derive(base, nil)
	if diags != nil {
		return Values{}, s.says(inFileOrder(diags))
	}
	set := make([]float64, len(s.Set))
	fixed := make([]bool, len(base))
	base = slices.Clone(known)
	for i := range s.Set {
		x := &s.Set[i]
		v, si, d := c.settle(&x.x, known)
		if d != nil {
			diags = append(diags, *d)
			continue
		}
		base[x.index], set[i], fixed[x.index] = v, si, true
	}
	if diags != nil {
		return Values{}, s.says(inFileOrder(diags))
	}
	v, diags := c.evalWith(base, s.Profiles, fixed...)
	for i := range s.Set {
		v.Num[s.Set[i].Slot] = set[i]
	}
	return v, s.says(diags)
}

// settle computes a value that a scenario sets.
func (c *Case) settle(x *settled, known []quantity.Value) (quantity.Value, float64, *Diagnostic) {
	v := x.value
	if x.expr != nil {
		var err error
		if v, err = x.expr.Eval(known); err != nil {
			d := c.dimension(x.owner, x.n, x.field, err)
			return v, 0, &d
		}
	}
	si, _, err := c.want(v, x.field)
	if err != nil {
		d := c.dimension(x.owner, x.n, x.field, err)
		return v, 0, &d
	}
	if v.Kind == quantity.Either {
		v.Kind = x.field.Kind
	}
	return v, si, nil
}

// says adds to diagnostics which scenario they are about.
func (s *Scenario) says(diags []Diagnostic) []Diagnostic {
	about := "scenario " + quoted(s.Name)
	for i := range diags {
		if diags[i].Thing != about {
			diags[i].Text += ", in " + about
		}
	}
	return diags
}

// trialScenarios computes the case once under each scenario and sets the network, which
// shows what only numbers can.
func (r *reader) trialScenarios() {
	for i := range r.c.Questions.Scenarios {
		s := &r.c.Questions.Scenarios[i]
		v, diags := r.c.Under(s, nil)
		r.reportAll(diags)
		r.c.warn(diags)
		if Failed(diags) || r.c.net == nil || len(s.Set) == 0 || r.reshapes(s, v) {
			continue
		}
		r.beyond(s, v)
		p := r.c.net.NewParams()
		var err error
		for _, set := range r.c.setters {
			if err = set(v, p); err != nil {
				break
			}
		}
		if err == nil {
			err = r.c.net.Check(p)
		}
		if err != nil {
			r.reportAll(s.says(r.c.Explain(err)))
		}
	}
}

// reshapes reports numbers that shape the network and are others under a scenario: it is
// built once.
func (r *reader) reshapes(s *Scenario, v Values) bool {
	found := false
	for _, slot := range r.c.moving {
		if x := &r.c.slots[slot]; x.field.Structural && v.Num[slot] != x.si {
			d := r.src.place(Diagnostic{Code: "structural", Thing: x.owner.thing(), Text: label(x.field) + "it shapes the network, which all scenarios share, and would change"}, x.n.span)
			r.reportAll(s.says([]Diagnostic{d}))
			found = true
		}
	}
	return found
}
