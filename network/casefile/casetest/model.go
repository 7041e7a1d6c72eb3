// Package casetest is what the tests of every domain need: a case read, built and
// answered or marched straight from its network, the published checks under testdata, and
// the fuzzing of whole cases. It is the way from text to response without package study.
//
// A test fails with the name of the case and what was said about it. Everything is
// in SI. Read is where to start.
package casetest

import (
	"strings"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/testdata/demo"
)

// A Model is a case with its network and numbers.
type Model struct {
	Case   *casefile.Case
	Net    *network.Network
	Set    []casefile.Setter
	Values casefile.Values
	Params *network.Params

	t testing.TB
}

// Read reads a case that must be free of errors.
func Read(t testing.TB, name, text string, words ...casefile.Vocabulary) *Model {
	t.Helper()
	c, diags := casefile.Read(name, []byte(text), nil, words...)
	if casefile.Failed(diags) {
		t.Fatalf("%s\n%s", name, casefile.Listing(diags))
	}
	m := &Model{t: t, Case: c}
	if m.Net, m.Set, diags = c.Build(); casefile.Failed(diags) {
		t.Fatalf("%s\n%s", name, casefile.Listing(diags))
	}
	if m.Values, diags = c.Eval(nil); casefile.Failed(diags) {
		t.Fatalf("%s\n%s", name, casefile.Listing(diags))
	}
	m.Params = m.Net.NewParams()
	m.Apply()
	return m
}

// Demo reads an embedded demo case.
func Demo(t testing.TB, name string, words ...casefile.Vocabulary) *Model {
	t.Helper()
	text, err := demo.Cases.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	return Read(t, name, string(text), words...)
}

// Apply runs the setters, and puts in the start that [run] states.
func (m *Model) Apply() {
	m.t.Helper()
	for _, set := range m.Set {
		if err := set(m.Values, m.Params); err != nil {
			m.t.Fatalf("%s: %v", m.Case.File, err)
		}
	}
	if m.Case.Questions.Start == casefile.StartLevel {
		m.Params.AllStart, m.Params.HasAllStart = m.Values.Num[m.Case.Questions.StartAt], true
	}
}

// Said reads a text and returns everything said about it, as one text, each with its
// code in front: "range: …". What casefile says of tables in general is known to the
// domains by its code, since its words are tested there.
func Said(text string, words ...casefile.Vocabulary) string {
	_, diags := casefile.Read("case.toml", []byte(text), nil, words...)
	var said strings.Builder
	for _, d := range diags {
		said.WriteString(d.Code + ": " + d.String() + "\n")
	}
	return said.String()
}

// output is a node, a difference "a - b", or a reading: "flow of main", "level of t1",
// "flow of main at vessel".
func (m *Model) output(name string) network.Output {
	m.t.Helper()
	if a, b, ok := strings.Cut(name, " - "); ok {
		return m.Net.Difference(m.node(a), m.node(b))
	}
	word, part, ok := strings.Cut(name, " of ")
	if !ok {
		return m.Net.Level(m.node(name))
	}
	out, ok := m.Case.Showing(part, word)
	if before, at, end := strings.Cut(part, " at "); !ok && end {
		out, ok = m.Case.Showing(before, word+" at "+at)
	}
	if !ok {
		m.t.Fatalf("%s: no %s of %q", m.Case.File, word, part)
	}
	return out
}

func (m *Model) node(name string) network.NodeID {
	m.t.Helper()
	id, ok := m.Case.Node(name)
	if !ok {
		m.t.Fatalf("%s: no node %q", m.Case.File, name)
	}
	return id
}

func (m *Model) outputs(names []string) []network.Output {
	m.t.Helper()
	list := make([]network.Output, len(names))
	for i, name := range names {
		list[i] = m.output(name)
	}
	return list
}

// Reduce reduces the network with the outputs named.
func (m *Model) Reduce(outputs ...string) *network.Reduction {
	m.t.Helper()
	r, err := m.Net.Reduce(m.Params, m.outputs(outputs))
	if err != nil {
		m.t.Fatalf("%s: %v", m.Case.File, err)
	}
	return r
}

// Respond answers the outputs named, up to a time.
func (m *Model) Respond(until float64, outputs ...string) *laplace.Response {
	m.t.Helper()
	r, err := m.Reduce(outputs...).Respond(m.Params, until)
	if err != nil {
		m.t.Fatalf("%s: %v", m.Case.File, err)
	}
	return r
}

// Derived returns the derivation that shows a quantity.
func (m *Model) Derived(quantity string) casefile.Derivation {
	m.t.Helper()
	for _, e := range m.Case.Elements {
		if e.Table.Derive == nil {
			continue
		}
		for _, d := range e.Table.Derive(e, m.Case, m.Values) {
			if d.Quantity == quantity {
				return d
			}
		}
	}
	m.t.Fatalf("%s: nothing derives %q", m.Case.File, quantity)
	return casefile.Derivation{}
}
