package network

import (
	"math"
	"testing"

	"lagbook/laplace"
)

// straight is a law that is linear already: what it comes to linearised is known.
type straight struct{ g float64 }

func (l straight) Flow(a, b float64) (q, da, db float64) { return l.g * (a - b), l.g, -l.g }

// leaning drops in proportion to the flow.
type leaning struct{ r float64 }

func (d leaning) Drop(q float64) (h, dh float64) { return d.r * q, d.r }

// A trial is a network with every kind of part: a driven level, a line with a drop, two
// stores and a junction without one, a scaled element, a resistance, a source.
type trial struct {
	net   *Network
	p     *Params
	outs  []Output
	scale ElementID
}

func newTrial(t *testing.T, flow Flow, drop Drop) *trial {
	t.Helper()
	b := NewBuilder()
	main, tank, join, far := b.Node("main", NoRef), b.Node("tank", NoRef), b.Node("join", NoRef), b.Node("far", NoRef)
	b.Hold(main, NoRef)
	b.Capacity(tank, NoRef)
	b.Capacity(far, NoRef)
	line := b.Inertance("line", main, tank, NoRef)
	b.Dropping(line)
	valve := b.Between("valve", tank, join, true, NoRef)
	wire := b.Resistance("wire", join, far, NoRef)
	b.Resistance("drain", far, main, NoRef)
	b.Source("feed", far, 1, NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	copy(p.C, []float64{2, 3})
	copy(p.G, []float64{0.7, 0.4})
	p.L[line], p.LR[line], p.Drop[line] = 0.5, 0.1, drop
	p.Law[valve] = &Through{Flow: flow}
	p.Drive[valve][0] = laplace.Constant(1)
	p.Wave[0], p.Wave[1] = laplace.Constant(5), laplace.Constant(0.3)
	m := &trial{net: n, p: p, scale: valve}
	for i := range n.NodeCount() {
		m.outs = append(m.outs, n.Level(NodeID(i)))
	}
	m.outs = append(m.outs, n.InertanceFlowOf(line), n.FlowOf(wire), n.PortFlowOf(valve, 0), n.PortFlowOf(valve, 1), n.SupplyOf(main), n.Difference(tank, far))
	return m
}

// answers returns the linear answer with the values at the beginning, and the march.
func (m *trial) answers(t *testing.T, until float64) (linear func(out int, at float64) float64, march *Trajectory) {
	t.Helper()
	from, err := m.net.Begin(m.p)
	if err != nil {
		t.Fatal(err)
	}
	l, err := m.net.Linearise(m.p, from)
	if err != nil {
		t.Fatal(err)
	}
	outs, base := l.Outputs(m.outs)
	r, err := l.Net.Reduce(l.Params, outs)
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(l.Params, until)
	if err != nil {
		t.Fatal(err)
	}
	march, err = m.net.March(m.p, from, m.outs, Run{Until: until, RelTol: 1e-9})
	if err != nil {
		t.Fatal(err)
	}
	return func(out int, at float64) float64 { return base[out] + resp.At(out, at) }, march
}

func (m *trial) compare(t *testing.T, until, within float64) {
	t.Helper()
	linear, march := m.answers(t, until)
	for out, o := range m.outs {
		for _, at := range []float64{0, 0.1, 0.7, 2, until} {
			if a, b := linear(out, at), march.At(out, at); !(math.Abs(a-b) <= within) {
				t.Errorf("output %d %s at %v: linear %v, march %v", out, o.Name, at, a, b)
			}
		}
	}
}

// Where every law is linear already, the answer about the start is the whole answer,
// whatever the start and however far the inputs go.
func TestLineariseOfLinearLaws(t *testing.T) {
	for _, c := range []struct {
		name string
		set  func(p *Params)
	}{
		{"steady", func(*Params) {}},
		{"levels stated, columns at rest", func(p *Params) { p.HasAllStart, p.AllStart = true, 2 }},
		{"all stated", func(p *Params) {
			for k, level := range map[int]float64{1: 1, 3: -4} {
				p.Start[k], p.HasStart[k] = level, true
			}
			p.StartFlow[0], p.HasStartFlow[0] = 2, true
		}},
	} {
		t.Run(c.name, func(t *testing.T) {
			m := newTrial(t, straight{0.9}, leaning{0.6})
			c.set(m.p)
			m.p.Wave[0] = laplace.Step(5, 9, 0.2)
			m.p.Wave[1], _ = laplace.Points([][2]float64{{0, 0.3}, {1, 2}})
			m.compare(t, 6, 2e-7) // what the march allows itself, some steps of 1e-9 of the levels
		})
	}
}

// For small changes of inputs and of the drive the linear answer is right to second order.
func TestLineariseIsRightForSmallChanges(t *testing.T) {
	for _, size := range []float64{1e-2, 1e-3} {
		m := newTrial(t, quadratic{0.8, 0.05}, pipeDrop{0.6, 0.05})
		m.p.Wave[0] = laplace.Step(5, 5+size, 0.2)
		m.p.Drive[m.scale][0] = laplace.Step(1, 1-size, 0.5)
		m.compare(t, 6, 2*size*size+1e-8)
	}
}

// What transfer functions see of a drive is the slope of the law.
func TestLineariseOfADrive(t *testing.T) {
	m := newTrial(t, quadratic{0.8, 0.05}, pipeDrop{0.6, 0.05})
	gain := func(open float64) (at float64) {
		m.p.Drive[m.scale][0] = laplace.Constant(open)
		s, err := m.net.Operate(m.p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		return s.Levels[1]
	}
	const h = 1e-4
	want := (gain(1+h) - gain(1-h)) / (2 * h)
	m.p.Drive[m.scale][0] = laplace.Constant(1)
	from, err := m.net.Begin(m.p)
	if err != nil {
		t.Fatal(err)
	}
	l, err := m.net.Linearise(m.p, from)
	if err != nil {
		t.Fatal(err)
	}
	outs, _ := l.Outputs(m.outs)
	r, err := l.Net.Reduce(l.Params, outs)
	if err != nil {
		t.Fatal(err)
	}
	got, err := r.System.Transfer(int(l.Input(m.scale, 0)), 1)
	if err != nil {
		t.Fatal(err)
	}
	if dc := real(got.Eval(0)); math.Abs(dc-want) > 1e-6*math.Abs(want) { // differences of second order in h
		t.Errorf("gain from the drive %v, by differences %v", dc, want)
	}
}

// An element that is shut is gone, and what only it touches stays where it is; its
// drive still opens it.
func TestLineariseOfAShutElement(t *testing.T) {
	b := NewBuilder()
	main, end, tank := b.Node("main", NoRef), b.Node("end", NoRef), b.Node("tank", NoRef)
	b.Hold(main, NoRef)
	b.Capacity(tank, NoRef)
	b.Resistance("leak", tank, main, NoRef)
	first := b.Between("first", main, end, true, NoRef)
	second := b.Between("second", end, tank, true, NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.C[0], p.G[0], p.Wave[0] = 2, 0.5, laplace.Constant(3)
	p.Law[first], p.Law[second] = &Through{Flow: straight{1}}, &Through{Flow: straight{1}}
	p.HasAllStart, p.AllStart = true, 1
	from, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	l, err := n.Linearise(p, from)
	if err != nil {
		t.Fatal(err)
	}
	outs, base := l.Outputs([]Output{n.Level(tank), n.PortFlowOf(second, 0)})
	if base[1] != 0 {
		t.Errorf("%v flows through what is shut", base[1])
	}
	r, err := l.Net.Reduce(l.Params, outs)
	if err != nil {
		t.Fatal(err)
	}
	poles := r.System.Poles()
	if len(poles) != 1 || math.Abs(real(poles[0].P)+0.25) > 1e-15 {
		t.Errorf("poles %v, only the leak of 0.5 into 2 is open: -0.25", poles)
	}
}

// A storing element acts by the slope of what it stores.
func TestLineariseOfAStore(t *testing.T) {
	b := NewBuilder()
	main, lump := b.Node("main", NoRef), b.Node("lump", NoRef)
	b.Hold(main, NoRef)
	id := b.Element(Shape{Name: "lump", Ports: []NodeID{lump}, Stores: true}, NoRef)
	b.Resistance("film", main, lump, NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.G[0], p.Law[id], p.Wave[0] = 0.5, melting{2, 10, 4, 1}, laplace.Constant(4)
	from, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	l, err := n.Linearise(p, from)
	if err != nil {
		t.Fatal(err)
	}
	r, err := l.Net.Reduce(l.Params, []Output{n.Level(lump)})
	if err != nil {
		t.Fatal(err)
	}
	if got, want := real(r.System.Poles()[0].P), -0.5/(2+10./2); math.Abs(got-want) > 1e-15 {
		t.Errorf("pole %v, by hand −G/(c + latent/(2·over)) = %v", got, want)
	}
}

// counting adds up what its port is at.
type counting struct{}

func (counting) Eval(s *Stamp) { s.F[1], s.DF[2] = s.X[0], 1 }

func (counting) Read(s *Stamp, _ int, grad []float64) float64 {
	if grad != nil {
		grad[1] = 1
	}
	return s.X[1]
}

// What only adds up is no pole of the network, unless an output reads it.
func TestLineariseLeavesOutWhatOnlyAddsUp(t *testing.T) {
	b := NewBuilder()
	main, lump := b.Node("main", NoRef), b.Node("lump", NoRef)
	b.Hold(main, NoRef)
	b.Capacity(lump, NoRef)
	b.Resistance("film", main, lump, NoRef)
	id := b.Element(Shape{Name: "meter", Ports: []NodeID{lump}, Unknowns: []Unknown{{Name: "sum", Scale: 1}}, Readings: []string{"sum"}}, NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.C[0], p.G[0], p.Law[id], p.Wave[0] = 2, 1, counting{}, laplace.Step(0, 3, 0)
	p.HasAllStart = true
	from, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	l, err := n.Linearise(p, from)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		outs  []Output
		order int
	}{{[]Output{n.Level(lump)}, 1}, {[]Output{n.ReadingOf(id, 0)}, 2}} {
		outs, at := l.Outputs(c.outs)
		r, err := l.Net.Reduce(l.Params, outs)
		if err != nil {
			t.Fatal(err)
		}
		if got := len(r.System.Poles()); got != c.order {
			t.Errorf("%s: %d poles, want %d", c.outs[0].Name, got, c.order)
		}
		if c.order < 2 {
			continue
		}
		resp, err := r.Respond(l.Params, 4)
		if err != nil {
			t.Fatal(err)
		}
		want := 3 * (4 - 2*(1-math.Exp(-2))) // ∫3(1 − exp(−t/2)) dt
		if got := at[0] + resp.At(0, 4); math.Abs(got-want) > 1e-13 {
			t.Errorf("sum %v, want %v", got, want)
		}
	}
}
