package study

import (
	"lagbook/network"
	"lagbook/network/casefile"
)

// A Result is a [result] at the end of the run, or where the march had to stop.
type Result struct {
	Name     string  `json:"name"`
	Scenario string  `json:"scenario,omitempty"`
	Value    float64 `json:"value"`
	Unit     string  `json:"unit"`
	Kind     string  `json:"kind,omitempty"`
}

// A derivation says of an output of which others it is made, by number. One that is a
// weighted sum of outputs of the network is an output of the network itself; of any other,
// an integral or an expression, the place among those of the network is empty.
type derivation struct {
	ask  *casefile.AskResult
	of   []int // the outputs that it is made of
	sums bool  // it is such a weighted sum
}

// Results are the values of all results at the end of the run.
func (m *Model) Results() ([]Result, []Warning, error) {
	if err := m.wantResults(); err != nil || len(m.Case.Questions.Results) == 0 {
		return nil, nil, err
	}
	resp, err := m.response()
	if err != nil {
		return nil, nil, err
	}
	var list []Result
	for i := range m.Case.Questions.Results {
		w, err := m.want(resultShown(&m.Case.Questions.Results[i]), "")
		if err != nil {
			return nil, nil, err
		}
		list = append(list, Result{Name: w.name, Value: resp.At(w.out, m.reach()), Unit: w.unit, Kind: w.kind})
	}
	return list, m.sampledWarnings(resp), nil
}

// resultsIn appends results with the name of the scenario that they hold under.
func resultsIn(all []Result, scenario string, list []Result) []Result {
	for _, r := range list {
		r.Scenario = scenario
		all = append(all, r)
	}
	return all
}

// wantResults makes sure that every result is among the outputs.
func (m *Model) wantResults() error {
	for i := range m.Case.Questions.Results {
		if _, err := m.want(resultShown(&m.Case.Questions.Results[i]), ""); err != nil {
			return err
		}
	}
	return nil
}

// resultShown names a result as what is to be shown.
func resultShown(r *casefile.AskResult) casefile.Shown {
	return casefile.Shown{Text: r.Name, Result: r.Name, Dim: r.Dim, Kind: r.Kind, Ref: r.Ref}
}

// resultOutput makes sure that what a result is made of is among the outputs, and states it
// as a sum of them where it is one.
func (m *Model) resultOutput(s casefile.Shown) (network.Output, shown, error) {
	ask, ok := m.Case.ResultNamed(s.Result)
	if !ok {
		panic("study: a result that the case does not have")
	}
	d := &derivation{ask: ask}
	w := shown{unit: unitOf(ask.Dim), kind: kindOf(ask.Kind), from: d}
	for _, operand := range operandsOf(ask) {
		o, err := m.want(operand, "")
		if err != nil {
			return network.Output{}, w, err
		}
		d.of = append(d.of, o.out)
		if w.domain == "" {
			w.domain = o.domain
		}
	}
	var out network.Output
	out, d.sums = m.weighed(d)
	out.Name = s.Text
	return out, w, nil
}

// derived reports whether an output is none of the network's.
func (w *shown) derived() bool { return w.from != nil && !w.from.sums }

// operandsOf lists what a result is made of.
func operandsOf(ask *casefile.AskResult) []casefile.Shown {
	switch {
	case ask.IntegralOf != nil:
		return []casefile.Shown{*ask.IntegralOf}
	case ask.Expr != nil:
		return ask.Expr.Operands
	}
	var list []casefile.Shown
	for _, t := range ask.Mean {
		list = append(list, t.Shown)
	}
	return list
}

// weighed returns a result as the sum of outputs of the network, and false where it is not
// one. Levels make one list of nodes, so that what is a difference is formed as such.
func (m *Model) weighed(d *derivation) (out network.Output, ok bool) {
	if d.ask.IntegralOf != nil {
		return out, false
	}
	for _, k := range d.of {
		if m.shows[k].derived() {
			return out, false
		}
	}
	coef := make([]float64, len(d.ask.Mean))
	for i, t := range d.ask.Mean {
		coef[i] = m.val.Num[t.Weight]
	}
	if d.ask.Expr != nil {
		if coef, out.Constant, ok = d.ask.Expr.Affine(m.val); !ok {
			return network.Output{}, false
		}
	}
	levels := true
	for _, k := range d.of {
		o := &m.outs[k]
		levels = levels && o.Flow == nil && o.Reading == nil && o.Parts == nil
	}
	for i, k := range d.of {
		if !levels {
			out.Parts = append(out.Parts, network.Part{Coef: coef[i], Output: m.outs[k]})
			continue
		}
		out.Constant += coef[i] * m.outs[k].Constant
		for _, t := range m.outs[k].Terms {
			out.Terms = withTerm(out.Terms, network.Term{Node: t.Node, Coef: coef[i] * t.Coef})
		}
	}
	return out, true
}

// withTerm adds a term to a sum of levels, each node once.
func withTerm(list []network.Term, t network.Term) []network.Term {
	for i := range list {
		if list[i].Node == t.Node {
			list[i].Coef += t.Coef
			return list
		}
	}
	return append(list, t)
}

// weighResults works the sums out again for the values in force, each after those it is
// made of, and reports whether they are what they were: weights may be given values.
func (m *Model) weighResults() (same bool) {
	same = true
	for k := range m.shows {
		d := m.shows[k].from
		if d == nil {
			continue
		}
		now := *d
		out, ok := m.weighed(d)
		out.Name, now.sums = m.outs[k].Name, ok
		same = same && ok == d.sums && sameOutput(&out, &m.outs[k])
		m.outs[k], m.shows[k].from = out, &now
	}
	return same
}

// sameOutput compares two sums of the same outputs.
func sameOutput(a, b *network.Output) bool {
	if a.Constant != b.Constant || len(a.Terms) != len(b.Terms) || len(a.Parts) != len(b.Parts) {
		return false
	}
	for i := range a.Terms {
		if a.Terms[i] != b.Terms[i] {
			return false
		}
	}
	for i := range a.Parts {
		if a.Parts[i].Coef != b.Parts[i].Coef || !sameOutput(&a.Parts[i].Output, &b.Parts[i].Output) {
			return false
		}
	}
	return true
}
