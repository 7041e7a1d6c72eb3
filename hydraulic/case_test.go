package hydraulic

import (
	"math/cmplx"
	"strings"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
)

// A model is a case with its network and numbers, as a study would hold it.
type model struct {
	t      *testing.T
	c      *casefile.Case
	v      casefile.Values
	net    *network.Network
	set    []casefile.Setter
	params *network.Params
}

// read reads a case that must be free of errors.
func read(t *testing.T, name, text string) *model {
	t.Helper()
	c, diags := casefile.Read(name, []byte(text), nil, Vocabulary()...)
	if casefile.Failed(diags) {
		t.Fatalf("%s\n%s", name, casefile.Listing(diags))
	}
	m := &model{t: t, c: c}
	if m.net, m.set, diags = c.Build(); casefile.Failed(diags) {
		t.Fatalf("%s\n%s", name, casefile.Listing(diags))
	}
	if m.v, diags = c.Eval(nil); casefile.Failed(diags) {
		t.Fatalf("%s\n%s", name, casefile.Listing(diags))
	}
	m.params = m.net.NewParams()
	for _, set := range m.set {
		if err := set(m.v, m.params); err != nil {
			t.Fatalf("%s: %v", name, err)
		}
	}
	if c.Questions.Start == casefile.StartLevel {
		m.params.AllStart, m.params.HasAllStart = m.v.Num[c.Questions.StartAt], true
	}
	return m
}

// faults reads a case and returns everything said about it, as one text, each
// with its code in front: "range: …".
func faults(t *testing.T, text string) string {
	t.Helper()
	_, diags := casefile.Read("case.toml", []byte(text), nil, Vocabulary()...)
	var said strings.Builder
	for _, d := range diags {
		said.WriteString(d.Code + ": " + d.String() + "\n")
	}
	return said.String()
}

// output is a node, a difference "a - b", or "flow of X" of a line or a held node.
func (m *model) output(name string) network.Output {
	m.t.Helper()
	if part, ok := strings.CutPrefix(name, "flow of "); ok {
		return m.flow(part)
	}
	if a, b, ok := strings.Cut(name, " - "); ok {
		return m.net.Difference(m.node(a), m.node(b))
	}
	return m.net.Level(m.node(name))
}

func (m *model) flow(part string) network.Output {
	m.t.Helper()
	for _, b := range m.net.Branches() {
		switch {
		case b.Name != part:
		case b.Kind == network.ResistanceBranch:
			return m.net.FlowOf(network.ResistanceID(b.Index))
		case b.Kind == network.InertanceBranch:
			return m.net.InertanceFlowOf(network.InertanceID(b.Index))
		}
	}
	return m.net.SupplyOf(m.node(part))
}

func (m *model) node(name string) network.NodeID {
	m.t.Helper()
	id, ok := m.c.Node(name)
	if !ok {
		m.t.Fatalf("%s: no node %q", m.c.File, name)
	}
	return id
}

func (m *model) reduce(outputs ...string) *network.Reduction {
	m.t.Helper()
	list := make([]network.Output, len(outputs))
	for i, name := range outputs {
		list[i] = m.output(name)
	}
	r, err := m.net.Reduce(m.params, list)
	if err != nil {
		m.t.Fatalf("%s: %v", m.c.File, err)
	}
	return r
}

// respond answers the outputs named up to a time.
func (m *model) respond(until float64, outputs ...string) *laplace.Response {
	m.t.Helper()
	r, err := m.reduce(outputs...).Respond(m.params, until)
	if err != nil {
		m.t.Fatalf("%s: %v", m.c.File, err)
	}
	return r
}

// lags are the time constants of the real poles, slowest first; swings those of
// each pair with positive imaginary part.
func (m *model) lags() (lags []float64, swings []complex128) {
	m.t.Helper()
	for _, p := range m.reduce().System.Poles() {
		for range p.Mult {
			switch {
			case imag(p.P) > 0:
				swings = append(swings, p.P)
			case imag(p.P) == 0 && cmplx.Abs(p.P) > p.Radius:
				lags = append(lags, -1/real(p.P))
			}
		}
	}
	return lags, swings
}

// derived returns the value that the derivation of that name shows.
func (m *model) derived(quantity string) casefile.Derivation {
	m.t.Helper()
	for _, e := range m.c.Elements {
		if e.Table.Derive == nil {
			continue
		}
		for _, d := range e.Table.Derive(e, m.c, m.v) {
			if d.Quantity == quantity {
				return d
			}
		}
	}
	m.t.Fatalf("%s: nothing derives %q", m.c.File, quantity)
	return casefile.Derivation{}
}
