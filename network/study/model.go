package study

import (
	"fmt"
	"math"
	"math/cmplx"

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

	parts map[network.Ref]*casefile.Element
	set   []casefile.Setter
	val   casefile.Values
	par   *network.Params

	outs  []network.Output
	shows []shown        // parallel to outs
	index map[string]int // by the name of what is shown, and what it is above

	ownStart, ownFlow []bool // which starts the parts state themselves, by NodeID and InertanceID

	start *network.StartState
	red   *network.Reduction
	resp  *laplace.Response
	until float64
}

// shown is one output of the reduced system.
type shown struct {
	out        int
	name       string
	unit, kind string
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
		set: set, par: net.NewParams(), index: map[string]int{},
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

// At sets other given values; nil: as written.
func (m *Model) At(given []quantity.Value) []casefile.Diagnostic {
	v, ds := m.Case.Eval(given)
	if casefile.Failed(ds) {
		return ds
	}
	m.val, m.red, m.resp, m.start = v, nil, nil, nil
	for _, set := range m.set {
		if err := set(v, m.par); err != nil {
			return append(ds, m.Case.Explain(err)...)
		}
	}
	if err := m.turn(v); err != nil {
		return append(ds, m.Case.Explain(err)...)
	}
	q := &m.Case.Questions
	m.par.StartCycle = q.Start == casefile.StartCycle
	if q.Start == casefile.StartLevel {
		m.startAt(v.Num[q.StartAt], q.StartDomain)
	}
	if q.Start == casefile.StartAtRest {
		ds = append(ds, m.startAtRest()...)
	}
	return ds
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
	out, unit, kind, err := m.output(s, above)
	if err != nil {
		return shown{}, err
	}
	w := shown{out: len(m.outs), name: s.Text, unit: unit, kind: kind}
	m.outs, m.shows, m.red, m.resp = append(m.outs, out), append(m.shows, w), nil, nil
	m.index[key] = w.out
	return w, nil
}

// wantNode makes sure that the level of a node is among the outputs.
func (m *Model) wantNode(name string) (shown, error) {
	return m.want(casefile.Shown{Text: name, Node: name}, "")
}

// output states what is shown as a sum of levels or a flow.
func (m *Model) output(s casefile.Shown, above string) (network.Output, string, string, error) {
	if s.FlowOf != "" {
		f, domain, err := m.flowOf(s.FlowOf)
		return network.Output{Name: s.Text, Flow: f}, m.physicsOf(domain).flow, "", err
	}
	o := network.Output{Name: s.Text}
	unit, kind := "", kindLevel
	for _, t := range []struct {
		name string
		coef float64
	}{{s.Node, 1}, {s.Minus, -1}, {above, -1}} {
		if t.name == "" {
			continue
		}
		id, ok := m.Case.Node(t.name)
		if !ok {
			return o, "", "", fmt.Errorf("node %q is not defined", t.name)
		}
		o.Terms = append(o.Terms, network.Term{Node: id, Coef: t.coef})
		unit = m.at(id).level
		if t.coef < 0 {
			kind = kindDifference
		}
	}
	return o, unit, kind, nil
}

// reduction returns the reduced system with every output wanted so far.
func (m *Model) reduction() (*network.Reduction, error) {
	if m.red == nil {
		r, err := m.Net.Reduce(m.par, m.outs)
		if err != nil {
			return nil, err
		}
		m.red, m.resp = r, nil
	}
	return m.red, nil
}

// startState returns the state at t = 0.
func (m *Model) startState() (*network.StartState, error) {
	if m.start == nil {
		s, err := m.Net.Start(m.par)
		if err != nil {
			return nil, err
		}
		m.start = s
	}
	return m.start, nil
}

// response returns the response of every output, over the run.
func (m *Model) response() (*laplace.Response, error) {
	red, err := m.reduction()
	if err != nil {
		return nil, err
	}
	if m.resp == nil {
		m.until = m.runEnd(red.System)
		if m.resp, err = red.Respond(m.par, m.until); err != nil {
			return nil, err
		}
	}
	return m.resp, nil
}

// runEnd is the end of the run in s: [run] to where it is said, else the latest
// time any question names, else five of the slowest time constants.
func (m *Model) runEnd(sys *laplace.System) float64 {
	q, num := &m.Case.Questions, m.val.Num
	if q.HasTo {
		return num[q.To]
	}
	end := 0.0
	for _, t := range q.Tables {
		for _, s := range t.Times {
			end = math.Max(end, num[s])
		}
		if t.HasTo {
			end = math.Max(end, num[t.To])
		}
	}
	for _, l := range q.Limits {
		after := 0.0
		if l.HasAfter {
			after = num[l.After]
		}
		if l.HasUntil {
			end = math.Max(end, num[l.Until])
		}
		if l.HasWithin {
			end = math.Max(end, after+num[l.Within])
		}
	}
	if end > 0 {
		return end
	}
	return settled(sys)
}

// settled is five of the slowest time constants, three doublings of the slowest
// growth or, where there is neither, five swings of the slowest undamped pair or 1 s.
func settled(sys *laplace.System) float64 {
	end := 1.0
	for _, p := range sys.Poles() {
		switch re := real(p.P); {
		case math.Abs(re) <= p.Radius: // at 0 or on the axis: no time constant
			if w := cmplx.Abs(p.P); w > p.Radius && end == 1 {
				end = 5 * 2 * math.Pi / w
			}
		case re < 0:
			return 5 / -re
		case re > 0:
			return 3 * math.Ln2 / re
		}
	}
	return end
}

// flowOf is the flow of a part from its first end, what a held node is supplied
// with, or what a source delivers. A part of several branches, such as a wall, is read at its first.
func (m *Model) flowOf(part string) (f *network.FlowTerm, domain string, err error) {
	for _, b := range m.Net.Branches() {
		if m.partOf(b.Ref) != part {
			continue
		}
		switch b.Kind {
		case network.ResistanceBranch:
			return &network.FlowTerm{Kind: network.ResistanceFlow, Resistance: network.ResistanceID(b.Index), Sign: 1}, m.domainOf(b.Ref), nil
		case network.InertanceBranch:
			return &network.FlowTerm{Kind: network.InertanceFlow, Inertance: network.InertanceID(b.Index), Sign: 1}, m.domainOf(b.Ref), nil
		}
	}
	if id, ok := m.Case.Node(part); ok && m.Net.Node(id).Held {
		return &network.FlowTerm{Kind: network.SupplyFlow, Node: id, Sign: 1}, m.at(id).domain, nil
	}
	for _, in := range m.Net.Inputs() {
		if !in.Held && in.Name == part {
			return &network.FlowTerm{Kind: network.SourceFlow, Input: in.ID, Sign: 1}, m.at(in.Node).domain, nil
		}
	}
	return nil, "", fmt.Errorf("%q has no flow of its own to show", part)
}
