package network_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// A pair is two lines in series with a rigid joint between a reservoir at 4 and a
// tank that drains through 1.
type pairOfLines struct {
	net                   *network.Network
	p                     *network.Params
	tank, joint           network.NodeID
	feed, inflow, atJoint network.InputID
	first, second         network.InertanceID
}

func newPair(t *testing.T) *pairOfLines {
	t.Helper()
	b, m := network.NewBuilder(), &pairOfLines{}
	reservoir, out := b.Node("reservoir", 1), b.Node("out", 2)
	m.joint, m.tank = b.Node("joint", 3), b.Node("tank", 4)
	m.feed = b.Hold(reservoir, 5)
	b.Hold(out, 6)
	b.Capacity(m.tank, 7)
	m.first, m.second = b.Inertance("first", reservoir, m.joint, 8), b.Inertance("second", m.joint, m.tank, 9)
	b.Resistance("drain", m.tank, out, 10)
	m.inflow = b.Source("rain", m.tank, 1, 11)
	m.atJoint = b.Source("tee", m.joint, 1, 12)
	var err error
	if m.net, err = b.Build(); err != nil {
		t.Fatal(err)
	}
	m.p = m.net.NewParams()
	m.p.C[0], m.p.G[0] = 2, 1
	m.p.L[0], m.p.L[1], m.p.LR[0], m.p.LR[1] = 3, 1, 0.5, 0.5
	m.p.Wave[m.feed] = laplace.Constant(4)
	return m
}

func (m *pairOfLines) start(t *testing.T) *network.StartState {
	t.Helper()
	s, err := m.net.Start(m.p)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// Steady: 4 over 0.5 + 0.5 + 1 in series is a flow of 2, with 3 at the joint.
func TestFlowStartSteady(t *testing.T) {
	m := newPair(t)
	s := m.start(t)
	if s.How != network.SteadyStart || s.Flows[0] != 2 || s.Flows[1] != 2 || s.Levels[m.joint] != 3 || s.Levels[m.tank] != 2 {
		t.Errorf("start %+v", s)
	}
}

// A stated flow takes the other line of the joint with it; stated on both they must
// agree; from rest the joint's source divides as the inertances let it.
func TestFlowStartGiven(t *testing.T) {
	m := newPair(t)
	m.p.StartFlow[m.second], m.p.HasStartFlow[m.second] = 5, true
	s := m.start(t)
	if s.Flows[0] != 5 || s.Flows[1] != 5 || s.How != network.MixedStart {
		t.Errorf("start %+v", s)
	}
	r, err := m.net.Reduce(m.p, []network.Output{m.net.InertanceFlowOf(m.first), m.net.Level(m.joint)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(m.p, 100)
	if err != nil {
		t.Fatal(err)
	}
	if y := resp.At(0, 0); y != 5 {
		t.Errorf("flow %v just after the start, want 5", y)
	}
	// 4 i' = 4 − 2 − 1·5, and the joint lies at 4 − 0.5·5 − 3 i'
	if y := resp.At(1, 0); math.Abs(y-3.75) > 1e-14 {
		t.Errorf("joint at %v, want 3.75", y)
	}
	m.p.StartFlow[m.first], m.p.HasStartFlow[m.first] = 4, true
	_, err = m.net.Start(m.p)
	var bad *network.ParamFault
	if !errors.As(err, &bad) || bad.List[0].Code != network.StartConflict || !strings.Contains(err.Error(), "joint") {
		t.Errorf("error %v", err)
	}

	rest := newPair(t)
	rest.p.HasAllStart = true
	rest.p.Wave[rest.atJoint] = laplace.Constant(4)
	if s := rest.start(t); s.Flows[rest.first] != -1 || s.Flows[rest.second] != 3 {
		t.Errorf("from rest with 4 into the joint: flows %v, want −1 and 3", s.Flows)
	}
}

// Two lines without resistance side by side: the steady flow divides as 1/L, what
// circulates is left out and said, and stated it goes on for ever.
func TestFlowCirculating(t *testing.T) {
	b := network.NewBuilder()
	a, out := b.Node("a", 0), b.Node("out", 0)
	b.Capacity(a, 0)
	b.Hold(out, 0)
	one, two := b.Inertance("one", a, out, 0), b.Inertance("two", a, out, 0)
	q := b.Source("q", a, 1, 0)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.C[0], p.L[one], p.L[two] = 1, 1, 3
	p.Wave[q] = laplace.Constant(8)
	s, err := n.Start(p)
	if err != nil {
		t.Fatal(err)
	}
	if s.Flows[one] != 6 || s.Flows[two] != 2 || len(s.Circulating) != 2 {
		t.Errorf("flows %v, circulating %v", s.Flows, s.Circulating)
	}
	p.StartFlow[one], p.StartFlow[two] = 1, 7
	p.HasStartFlow[one], p.HasStartFlow[two] = true, true
	r, err := n.Reduce(p, []network.Output{n.InertanceFlowOf(one), n.InertanceFlowOf(two), n.Level(a)})
	if err != nil {
		t.Fatal(err)
	}
	y, err := r.Respond(p, 1000)
	if err != nil {
		t.Fatal(err)
	}
	if y.At(0, 777) != 1 || y.At(1, 777) != 7 || y.At(2, 777) != 0 {
		t.Errorf("flows %v and %v, level %v after 777 s", y.At(0, 777), y.At(1, 777), y.At(2, 777))
	}
}

// Reservoirs at different levels with nothing to resist the flow between them have
// no steady state, unless a start is stated; a frictionless U-tube has any level.
func TestFlowNoSteady(t *testing.T) {
	b := network.NewBuilder()
	high, low, joint := b.Node("high", 0), b.Node("low", 0), b.Node("joint", 0)
	up := b.Hold(high, 0)
	b.Hold(low, 0)
	b.Inertance("one", high, joint, 0)
	b.Inertance("two", joint, low, 0)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.L[0], p.L[1] = 1, 1
	p.Wave[up] = laplace.Constant(2)
	_, err = n.Start(p)
	var none *network.NoSteady
	if !errors.As(err, &none) || none.List[0].Reason != network.Integrating || !strings.Contains(err.Error(), `"high" and "low"`) {
		t.Errorf("error %v", err)
	}
	p.HasAllStart = true
	r, err := n.Reduce(p, []network.Output{n.InertanceFlowOf(0), n.Level(joint)})
	if err != nil {
		t.Fatal(err)
	}
	y, err := r.Respond(p, 10)
	if err != nil {
		t.Fatal(err)
	}
	if y.At(0, 10) != 10 || y.At(1, 10) != 1 {
		t.Errorf("flow %v and joint %v after 10 s, want 10 and 1", y.At(0, 10), y.At(1, 10))
	}
}

// Two groups joined by inertances without resistance, the later ones after nodes that
// have been joined away: each keeps its own level at rest. (They once fell together.)
func TestJoinedGroupsStayApart(t *testing.T) {
	b := network.NewBuilder()
	var id []network.NodeID
	for _, name := range []string{"main", "main too", "tank", "drain", "second tank"} {
		id = append(id, b.Node(name, network.NoRef))
	}
	b.Hold(id[0], network.NoRef)
	b.Hold(id[3], network.NoRef)
	b.Capacity(id[2], network.NoRef)
	b.Capacity(id[4], network.NoRef)
	b.Inertance("a", id[0], id[1], network.NoRef)
	b.Inertance("b", id[2], id[4], network.NoRef)
	b.Resistance("in", id[1], id[2], network.NoRef)
	b.Resistance("out", id[4], id[3], network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	copy(p.C, []float64{1, 1})
	copy(p.L, []float64{1, 1})
	copy(p.G, []float64{1, 3})
	x, err := n.SteadyState(p, []float64{8, 0})
	if err != nil {
		t.Fatal(err)
	}
	for i, want := range []float64{8, 8, 2, 0, 2} {
		near(t, n.Name(id[i]), x[i], want, 1e-15, 8)
	}
	q, err := n.SteadyFlows(p, []float64{8, 0})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "a", q[0], 6, 1e-15, 8)
	near(t, "b", q[1], 6, 1e-15, 8)
}
