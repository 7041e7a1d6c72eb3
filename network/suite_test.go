package network_test

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// linear.json: networks with answers of 30 digits, computed with mpmath at 280
// digits from exact decimals; element values invented.
type (
	suite struct {
		Source   string
		Networks []suiteNetwork
	}
	tuple        []any // name, …, number
	suiteNetwork struct {
		ID, Title   string
		Nodes       []tuple // name, capacity
		Held        []string
		Driven      []tuple // held node, capacity
		Resistances []tuple // name, from, to, R
		Inertances  []tuple // name, from, to, L, R
		Streams     []tuple // name, from, to, rate
		Feedbacks   []tuple // name, on, into, gain
		Inputs      []struct {
			Name, Held string
			Into       []tuple // node, gain
		}
		Outputs []struct {
			Name         string
			Terms, Flows []tuple // node or resistance, coefficient
			Columns      []tuple // inertance, coefficient
			Supplies     []tuple // held node, coefficient
		}
		Poles   [][3]float64 // re, im, multiplicity
		Pairs   []suitePair
		Refused bool
	}
	suitePair struct {
		In, Out          string
		Zero             bool
		Degree           int
		Zeros, Cancelled [][3]float64
		Gain             *float64
		Num, Den         []float64
		Y0plus           float64
		Residues         []tuple // re, im, coefficients
		Step, Ramp       samples
		Pulse, PWL, Sin  samples
		Threshold        []float64
		Metrics          map[string]any
		Poly, Impulse    []float64
		Freq             [][3]float64
	}
	samples struct {
		T, Y         []float64
		Width, Omega float64
		Breaks       [][2]float64
	}
)

func (t tuple) name(i int) string { return t[i].(string) }
func (t tuple) value() float64    { return t[len(t)-1].(float64) }

func loadSuite(t *testing.T) []suiteNetwork {
	t.Helper()
	src, err := os.ReadFile("testdata/linear.json")
	if err != nil {
		t.Fatal(err)
	}
	var s suite
	if err := json.Unmarshal(src, &s); err != nil {
		t.Fatal(err)
	}
	return s.Networks
}

// A model is a network of the suite, built.
type model struct {
	*suiteNetwork
	net   *network.Network
	p     *network.Params
	node  map[string]network.NodeID
	res   map[string]network.ResistanceID
	inert map[string]network.InertanceID
	input map[string][]network.InputID // several for a source into several nodes
	gain  map[string][]float64
	outs  []network.Output
}

func build(s *suiteNetwork) (*model, error) {
	m := &model{suiteNetwork: s, node: map[string]network.NodeID{}, res: map[string]network.ResistanceID{}, inert: map[string]network.InertanceID{},
		input: map[string][]network.InputID{}, gain: map[string][]float64{}}
	b := network.NewBuilder()
	var C, G, W, K, L, LR []float64
	for i, n := range s.Nodes {
		id := b.Node(n.name(0), network.Ref(i))
		m.node[n.name(0)] = id
		if c := n.value(); c != 0 {
			b.Capacity(id, network.Ref(100+i))
			C = append(C, c)
		}
	}
	for i, name := range s.Held {
		m.node[name] = b.Node(name, network.Ref(200+i))
		m.input[name] = []network.InputID{b.Hold(m.node[name], network.NoRef)}
	}
	for i, h := range s.Driven {
		b.Capacity(m.node[h.name(0)], network.Ref(250+i))
		C = append(C, h.value())
	}
	for i, r := range s.Inertances {
		m.inert[r.name(0)] = b.Inertance(r.name(0), m.node[r.name(1)], m.node[r.name(2)], network.Ref(350+i))
		L, LR = append(L, r[3].(float64)), append(LR, r[4].(float64))
	}
	for i, r := range s.Resistances {
		m.res[r.name(0)] = b.Resistance(r.name(0), m.node[r.name(1)], m.node[r.name(2)], network.Ref(300+i))
		G = append(G, 1/r.value())
	}
	for i, r := range s.Streams {
		b.OneWay(r.name(0), m.node[r.name(1)], m.node[r.name(2)], network.Ref(400+i))
		W = append(W, r.value())
	}
	for i, r := range s.Feedbacks {
		b.Feedback(r.name(0), m.node[r.name(2)], m.node[r.name(1)], network.Ref(500+i))
		K = append(K, r.value())
	}
	for i, in := range s.Inputs {
		if in.Held != "" {
			m.input[in.Name], m.gain[in.Name] = m.input[in.Held], []float64{1}
			continue
		}
		for _, at := range in.Into {
			m.input[in.Name] = append(m.input[in.Name], b.Source(in.Name, m.node[at.name(0)], math.Copysign(1, at.value()), network.Ref(600+i)))
			m.gain[in.Name] = append(m.gain[in.Name], math.Abs(at.value()))
		}
	}
	for _, o := range s.Outputs {
		switch {
		case o.Columns != nil:
			m.outs = append(m.outs, network.Output{Name: o.Name, Flow: &network.FlowTerm{
				Kind: network.InertanceFlow, Inertance: m.inert[o.Columns[0].name(0)], Sign: o.Columns[0].value()}})
		case o.Supplies != nil:
			m.outs = append(m.outs, network.Output{Name: o.Name, Flow: &network.FlowTerm{
				Kind: network.SupplyFlow, Node: m.node[o.Supplies[0].name(0)], Sign: o.Supplies[0].value()}})
		default:
			m.outs = append(m.outs, m.output(o.Name, o.Terms, o.Flows))
		}
	}
	var err error
	if m.net, err = b.Build(); err != nil {
		return m, err
	}
	m.p = m.net.NewParams()
	copy(m.p.C, C)
	copy(m.p.G, G)
	copy(m.p.W, W)
	copy(m.p.L, L)
	copy(m.p.LR, LR)
	copy(m.p.K, K)
	m.p.HasAllStart = true // from rest
	return m, nil
}

// output states one output of the suite; a sum of flows as a sum of levels.
func (m *model) output(name string, terms, flows []tuple) network.Output {
	o := network.Output{Name: name}
	if len(flows) == 1 && len(terms) == 0 {
		o.Flow = &network.FlowTerm{Resistance: m.res[flows[0].name(0)], Sign: flows[0].value()}
		return o
	}
	for _, t := range terms {
		o.Terms = append(o.Terms, network.Term{Node: m.node[t.name(0)], Coef: t.value()})
	}
	for _, f := range flows {
		r := m.Resistances[m.res[f.name(0)]]
		G := f.value() / r.value()
		o.Terms = append(o.Terms, network.Term{Node: m.node[r.name(1)], Coef: G}, network.Term{Node: m.node[r.name(2)], Coef: -G})
	}
	return o
}

func (m *model) out(name string) int {
	for i, o := range m.Outputs {
		if o.Name == name {
			return i
		}
	}
	panic("no output " + name)
}

// each runs a test on every network of the suite that has an answer.
func each(t *testing.T, run func(t *testing.T, m *model)) {
	for _, s := range loadSuite(t) {
		if s.Refused {
			continue
		}
		t.Run(s.ID, func(t *testing.T) {
			m, err := build(&s)
			if err != nil {
				t.Fatal(err)
			}
			run(t, m)
		})
	}
}

func (m *model) reduce(t *testing.T) *network.Reduction {
	t.Helper()
	r, err := m.net.Reduce(m.p, m.outs)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// waves of the suite by name, all zero before t = 0.
func (p *suitePair) waves(t *testing.T) map[string]struct {
	u laplace.Waveform
	s samples
} {
	t.Helper()
	points := func(pts [][2]float64) laplace.Waveform {
		w, err := laplace.Points(pts)
		if err != nil {
			t.Fatal(err)
		}
		return w.WithBefore(0)
	}
	type wave = struct {
		u laplace.Waveform
		s samples
	}
	w := map[string]wave{
		"step":  {laplace.Constant(1).WithBefore(0), p.Step},
		"ramp":  {laplace.Waveform{Segments: []laplace.Segment{{B: 1}}}, p.Ramp},
		"pulse": {points([][2]float64{{0, 1}, {p.Pulse.Width, 1}, {p.Pulse.Width, 0}}), p.Pulse},
		"sin":   {laplace.Sine(0, 1, p.Sin.Omega, 0).WithBefore(0), p.Sin},
	}
	w["pwl"] = wave{points(p.PWL.Breaks), p.PWL}
	return w
}

func relative(got, want float64) float64 {
	if got == want {
		return 0
	}
	return math.Abs(got-want) / math.Abs(want)
}

func describe(f network.Fault, names []string) string {
	s := fmt.Sprint(f.Code)
	for _, n := range f.Nodes {
		s += " " + names[n]
	}
	return s
}
