package study

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A Model is a case ready to be asked: the network is built once, the numbers
// are set as often as wanted.
type Model struct {
	Case *casefile.Case
	Net  *network.Network
	Show Printer

	parts    map[network.Ref]*casefile.Element
	views    []network.ElementView
	set      []casefile.Setter
	val      casefile.Values
	par      *network.Params
	spare    *network.Params       // written by the next change of values, so that it can be compared with par
	prev     *network.Params       // the numbers before par
	borrowed bool                  // par is that of another model
	under    *casefile.Scenario    // in force; nil: the case as written
	given    []quantity.Value      // in force before what a scenario sets; nil: as written
	doubt    []casefile.Diagnostic // what the domains say of the values, once it was asked
	doubted  bool                  // that they were

	outs  []network.Output
	shows []shown        // parallel to outs
	index map[string]int // by the name of what is shown, and what it is above

	ownStart, ownFlow []bool // which starts the parts state themselves, by NodeID and InertanceID

	start  *network.StartState
	red    *network.Reduction
	resp   answers
	closed *laplace.Response // resp, where that is the closed form of the network itself
	until  float64

	linearly bool // answer a nonlinear case by its linear network about the start
	march    marched
}

// shown is one output of the reduced system.
type shown struct {
	out        int
	name       string
	unit, kind string
	domain     string
	from       *derivation // what it is worked out of; nil: an output of the network
}

// New builds the network of a case and sets the values as written. The
// diagnostics hold at least one error where the model is nil.
func New(c *casefile.Case) (*Model, []casefile.Diagnostic) {
	net, set, ds := c.Build()
	if net == nil {
		return nil, ds
	}
	m := &Model{
		Case: c, Net: net, Show: NewPrinter(c), parts: map[network.Ref]*casefile.Element{},
		set: set, index: map[string]int{},
	}
	for _, e := range c.Elements {
		m.parts[e.Ref] = e
	}
	more := m.At(nil)
	ds = append(ds, more...)
	if casefile.Failed(ds) {
		return nil, ds
	}
	return m, ds
}

// At sets other given values, under the scenario in force; nil: as written.
func (m *Model) At(given []quantity.Value) []casefile.Diagnostic { return m.put(m.under, given) }

// put sets the values of the case under a scenario. Where they leave the network itself as
// it is, what was worked out of it stays: the next answer costs its response.
func (m *Model) put(s *casefile.Scenario, given []quantity.Value) []casefile.Diagnostic {
	v, ds := m.Case.Under(s, given)
	if casefile.Failed(ds) {
		return ds
	}
	par := m.spare
	if par == nil {
		par = m.Net.NewParams()
	}
	before, red := m.par, m.red
	m.par, m.spare, m.prev = par, before, before
	if m.borrowed { // another model reads them
		m.spare, m.borrowed = nil, false
	}
	m.under, m.given, m.val, m.start, m.march = s, given, v, nil, marched{}
	m.doubt, m.doubted = nil, false
	m.forget()
	for _, set := range m.set {
		if err := set(v, par); err != nil {
			return append(ds, m.Case.Explain(err)...)
		}
	}
	if err := m.turn(v); err != nil {
		return append(ds, m.Case.Explain(err)...)
	}
	if same := m.weighResults(); same && red != nil && before != nil && sameNetwork(before, par) {
		m.red = red
	}
	return append(ds, m.setStart(v)...)
}

// setStart states the start of the run.
func (m *Model) setStart(v casefile.Values) []casefile.Diagnostic {
	q := &m.Case.Questions
	m.par.StartCycle = q.Start == casefile.StartCycle
	switch {
	case m.par.StartCycle && m.Nonlinear():
		return []casefile.Diagnostic{m.noCycleStart()}
	case q.Start == casefile.StartLevel:
		m.startAt(v.Num[q.StartAt], q.StartDomain)
	case q.Start == casefile.StartAtRest:
		return m.startAtRest()
	}
	return nil
}

// partOf is the name of the part that a reference stands for, "" for none.
func (m *Model) partOf(r network.Ref) string {
	if e := m.parts[r]; e != nil {
		return e.FullName()
	}
	return ""
}

// want makes sure that something is among the outputs; above is the node whose
// level is subtracted, "" for none.
func (m *Model) want(s casefile.Shown, above string) (shown, error) {
	key := s.Text + "\x00" + above
	if k, ok := m.index[key]; ok {
		return m.shows[k], nil
	}
	out, w, err := m.output(s, above)
	if err != nil {
		return shown{}, err
	}
	w.out, w.name = len(m.outs), s.Text
	m.outs, m.shows = append(m.outs, out), append(m.shows, w)
	m.forget()
	m.index[key] = w.out
	return w, nil
}

// forget drops what was worked out for other outputs or numbers.
func (m *Model) forget() { m.red, m.resp, m.closed, m.march.run = nil, nil, nil, nil }

// wantNode makes sure that the level of a node is among the outputs.
func (m *Model) wantNode(name string) (shown, error) {
	return m.want(casefile.Shown{Text: name, Node: name}, "")
}

// output states what is shown as a sum of levels, a flow or a reading.
func (m *Model) output(s casefile.Shown, above string) (network.Output, shown, error) {
	if s.Result != "" {
		return m.resultOutput(s)
	}
	if s.Word != "" {
		return m.reading(s)
	}
	o, w := network.Output{Name: s.Text}, shown{kind: kindLevel}
	for _, t := range []struct {
		name string
		coef float64
	}{{s.Node, 1}, {s.Minus, -1}, {above, -1}} {
		if t.name == "" {
			continue
		}
		id, ok := m.Case.Node(t.name)
		if !ok {
			return o, w, fmt.Errorf("node %q is not defined", t.name)
		}
		o.Terms = append(o.Terms, network.Term{Node: id, Coef: t.coef})
		u := m.at(id)
		w.unit, w.domain = u.level, u.domain
		if t.coef < 0 {
			w.kind = kindDifference
		}
	}
	return o, w, nil
}

// reduction returns the reduced system with every output wanted so far.
func (m *Model) reduction() (*network.Reduction, error) {
	if m.red == nil {
		r, err := m.Net.Reduce(m.par, m.outs)
		if err != nil {
			return nil, err
		}
		m.red, m.resp, m.closed = r, nil, nil
	}
	return m.red, nil
}

// startState returns the state at t = 0.
func (m *Model) startState() (s *network.StartState, err error) {
	if m.start != nil {
		return m.start, nil
	}
	if m.red != nil {
		s, err = m.red.Start(m.par)
	} else {
		s, err = m.Net.Start(m.par)
	}
	if err == nil {
		m.start = s
	}
	return s, err
}

// response returns the answer of every output, over the run: the closed form of a
// linear network, else a march or, where the case is to be answered so, the linear
// network about the start.
func (m *Model) response() (answers, error) {
	if m.resp != nil {
		return m.resp, nil
	}
	var err error
	switch {
	case !m.Nonlinear():
		err = m.respond()
	case m.linearly:
		err = m.respondLinearly()
	default:
		err = m.marchOn()
	}
	if err == nil {
		m.resp, err = m.withResults(m.resp, 0, m.reach())
	}
	if err != nil {
		m.resp = nil
		return nil, err
	}
	return m.resp, nil
}

// respond finds the closed form.
func (m *Model) respond() error {
	red, err := m.reduction()
	if err != nil {
		return err
	}
	end, ok := m.askedEnd()
	if !ok {
		end = settled(red.System)
	}
	m.until = end
	r, err := red.Respond(m.par, m.until)
	if err != nil {
		return err
	}
	m.resp, m.closed = r, r
	return nil
}

// reading is what is shown by a word of a part: "flow of main", "level of t1".
func (m *Model) reading(s casefile.Shown) (network.Output, shown, error) {
	out, ok := m.Case.Showing(s.Part, s.Word)
	if !ok {
		return out, shown{}, fmt.Errorf("%q has no %s of its own to show", s.Part, s.Word)
	}
	out.Name = s.Text
	w := shown{unit: unitOf(s.Dim), kind: kindOf(s.Kind)}
	if s.Dim == dims["1/s"] {
		w.unit = turning
	}
	if e, ok := m.Case.Part(s.Part); ok {
		w.domain = e.Domain()
	}
	return out, w, nil
}
