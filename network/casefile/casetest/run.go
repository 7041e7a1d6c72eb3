package casetest

import (
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// A Run is what a case comes to: the closed form of a linear one, the march of any.
type Run interface {
	At(out int, t float64) float64
	Final(out int) (float64, bool)
	Max(out int, t0, t1 float64) laplace.Extreme
	Min(out int, t0, t1 float64) laplace.Extreme
	First(out int, level, t0, t1 float64) (laplace.Root, bool)
	LastOutside(out int, mid, band, t0, t1 float64) (laplace.Root, bool)
}

// Run answers the outputs named, up to a time: in closed form where the network is
// linear, else by a march.
func (m *Model) Run(until float64, outputs ...string) Run {
	m.t.Helper()
	if m.Net.Nonlinear() {
		return m.March(until, outputs...)
	}
	return m.Respond(until, outputs...)
}

// March marches the network, linear or not, from the start that the case states.
func (m *Model) March(until float64, outputs ...string) *network.Trajectory {
	m.t.Helper()
	tr, err := m.Net.March(m.Params, m.Begin(), m.outputs(outputs), network.Run{Until: until})
	if err != nil {
		m.t.Fatalf("%s: %v", m.Case.File, err)
	}
	return tr
}

// Begin returns the state at t = 0⁻.
func (m *Model) Begin() *network.State {
	m.t.Helper()
	s, err := m.Net.Begin(m.Params)
	if err != nil {
		m.t.Fatalf("%s: %v", m.Case.File, err)
	}
	return s
}

// Operate returns the steady state with every wave at its value at t.
func (m *Model) Operate(t float64) *network.State {
	m.t.Helper()
	s, err := m.Net.Operate(m.Params, t, nil)
	if err != nil {
		m.t.Fatalf("%s: %v", m.Case.File, err)
	}
	return s
}

// At returns what the outputs named show in a state: the first instant of a march
// from there.
func (m *Model) At(s *network.State, outputs ...string) []float64 {
	m.t.Helper()
	outs := m.outputs(outputs)
	tr, err := m.Net.March(m.Params, s, outs, network.Run{Until: s.T})
	if err != nil {
		m.t.Fatalf("%s: %v", m.Case.File, err)
	}
	values := make([]float64, len(outs))
	for i := range outs {
		values[i] = tr.At(i, s.T)
	}
	return values
}

// Final is what an output of a run comes to, which must exist.
func Final(t testing.TB, r Run, out int) float64 {
	t.Helper()
	v, ok := r.Final(out)
	if !ok {
		t.Fatalf("output %d has no final value", out)
	}
	return v
}
