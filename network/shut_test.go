package network_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// A riser fills a tank from a main; the riser is shut and opened.
type riser struct {
	net  *network.Network
	p    *network.Params
	outs []network.Output
}

const riserL, riserR, tankC, drainG = 2.0, 0.3, 0.5, 0.8

// fedTank is a line with inertance from a held main (node 0) into a tank (node 1), and
// an outlet from there into a held drain; one of the two turns.
func fedTank(t *testing.T) *network.Network {
	t.Helper()
	b := network.NewBuilder()
	main, tank, drain := b.Node("main", network.NoRef), b.Node("tank", network.NoRef), b.Node("drain", network.NoRef)
	b.Hold(main, network.NoRef)
	b.Hold(drain, network.NoRef)
	b.Capacity(tank, network.NoRef)
	b.Inertance("line", main, tank, network.NoRef)
	b.Resistance("outlet", tank, drain, network.NoRef)
	b.Switch("turns", network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	return n
}

func newRiser(t *testing.T, wave laplace.Waveform) *riser {
	t.Helper()
	n := fedTank(t)
	p := n.NewParams()
	p.C[0], p.L[0], p.G[0], p.Switch[0] = tankC, riserL, drainG, wave
	p.Wave[0] = laplace.Constant(3)
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.Shut[0], c.LR[0] = now, now[0] == 0, riserR
		if now[0] > 0 {
			c.LR[0] = riserR / now[0]
		}
		return c, nil
	}
	first, err := p.Turn([]float64{wave.Before})
	if err != nil {
		t.Fatal(err)
	}
	return &riser{n, first, []network.Output{n.Level(1), n.InertanceFlowOf(0), n.FlowOf(0), n.SupplyOf(0)}}
}

func (r *riser) respond(t *testing.T, until float64) *laplace.Response {
	t.Helper()
	red, err := r.net.Reduce(r.p, r.outs)
	if err != nil {
		t.Fatal(err)
	}
	resp, err := red.Respond(r.p, until)
	if err != nil {
		t.Fatal(err)
	}
	return resp
}

// open is the exponential of the two equations with the riser open.
func open(x []float64, h float64) []float64 {
	a := mat.NewDense(3, 3, []float64{-drainG / tankC * h, h / tankC, 0, -h / riserL, -riserR / riserL * h, 3 * h / riserL, 0, 0, 0})
	var e mat.Dense
	e.Exp(a)
	return []float64{e.At(0, 0)*x[0] + e.At(0, 1)*x[1] + e.At(0, 2), e.At(1, 0)*x[0] + e.At(1, 1)*x[1] + e.At(1, 2)}
}

// By hand, from the steady state and from rest: while shut the tank drains by itself
// and nothing flows in the riser; open again, it begins from no flow.
func TestRiserShuts(t *testing.T) {
	pulse, err := laplace.Pulse(laplace.PulseTrain{Low: 1, High: 0, Width: 1.5, At: 2, Count: 1})
	if err != nil {
		t.Fatal(err)
	}
	for _, rest := range []bool{false, true} {
		r := newRiser(t, pulse)
		x := []float64{3 / (1 + riserR*drainG), 3 * drainG / (1 + riserR*drainG)}
		if rest {
			r.p.HasAllStart, x = true, []float64{0, 0}
		}
		resp := r.respond(t, 8)
		x = open(x, 2)
		near(t, "flow before", resp.Left(1, 2), x[1], 1e-13, 3)
		level := func(after float64) float64 { return x[0] * math.Exp(-drainG/tankC*after) }
		for _, after := range []float64{0, 0.4, 1.2} {
			near(t, "level shut", resp.At(0, 2+after), level(after), 1e-13, 3)
			near(t, "outlet shut", resp.At(2, 2+after), drainG*level(after), 1e-13, 3)
			if q, s := resp.At(1, 2+after), resp.At(3, 2+after); q != 0 || s != 0 {
				t.Errorf("%v flows in the riser, %v out of the main", q, s)
			}
		}
		y := []float64{level(1.5), 0}
		near(t, "begins again", resp.At(1, 3.5), 0, 1e-13, 3)
		y = open(y, 4)
		near(t, "level", resp.At(0, 7.5), y[0], 1e-13, 3)
		near(t, "flow", resp.At(1, 7.5), y[1], 1e-13, 3)
		near(t, "supply", resp.At(3, 7.5), y[1], 1e-13, 3)
	}
}

// Shut at the start, it opens: the start is the steady state without the riser.
func TestRiserOpens(t *testing.T) {
	r := newRiser(t, laplace.Step(0, 1, 1))
	resp := r.respond(t, 5)
	if l, q := resp.At(0, 0.7), resp.At(1, 0.7); l != 0 || q != 0 {
		t.Errorf("level %v, flow %v", l, q)
	}
	x := open([]float64{0, 0}, 3)
	near(t, "level", resp.At(0, 4), x[0], 1e-13, 3)
	near(t, "flow", resp.At(1, 4), x[1], 1e-13, 3)
	red, err := r.net.Reduce(r.p, r.outs)
	if err != nil {
		t.Fatal(err)
	}
	if n := red.System.Order(); n != 1 || len(red.Flows) != 0 {
		t.Errorf("order %d with %v while shut", n, red.Flows)
	}
	r.p.StartFlow[0], r.p.HasStartFlow[0] = 1, true
	var f *network.ParamFault
	if _, err := r.net.Start(r.p); !errors.As(err, &f) || !strings.Contains(err.Error(), "shut just before") {
		t.Error(err)
	}
}

// A riser that shuts and opens for ever: what the main gives on the mean the drain
// takes, and the cycle is what a long run comes to, the start of one, and the same
// however far the run has gone.
func TestRiserCycle(t *testing.T) {
	for _, at := range []float64{0, 0.7} {
		turn, err := laplace.Pulse(laplace.PulseTrain{Low: 1, High: 0, Width: 1.1, Period: 3, At: at})
		if err != nil {
			t.Fatal(err)
		}
		r := newRiser(t, turn)
		red, err := r.net.Reduce(r.p, r.outs)
		if err != nil {
			t.Fatal(err)
		}
		c, a, err := red.Cycle(r.p)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "mean", c.Mean(1), c.Mean(2), 1e-13, 3)
		brute := r.respond(t, 120)
		for k := range 30 {
			s := float64(k) / 10
			near(t, "level after 30", brute.At(0, 90+s), c.At(0, s), 1e-12, 3)
			near(t, "flow after 30", brute.At(1, 90+s), c.At(1, s), 1e-12, 3)
		}
		if n, ok, err := a.Cycles(0, 0.02); n < 1 || n > 20 || !ok || err != nil {
			t.Errorf("%v cycles, %v, %v", n, ok, err)
		}
		r.p.StartCycle = true
		in := r.respond(t, 9)
		for k := range 60 {
			s := float64(k) / 7
			near(t, "from the cycle", in.At(1, s), c.At(1, s), 1e-12, 3)
		}
	}
}

// A valve that is a resistance shuts behind a column with nothing to store between:
// the column stops, the junction takes the level behind it.
func TestColumnBeforeValve(t *testing.T) {
	b := network.NewBuilder()
	main, at, drain := b.Node("main", network.NoRef), b.Node("before valve", network.NoRef), b.Node("drain", network.NoRef)
	b.Hold(main, network.NoRef)
	b.Hold(drain, network.NoRef)
	line := b.Inertance("column", main, at, network.NoRef)
	valve := b.Resistance("valve", at, drain, network.NoRef)
	b.Switch("valve", network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.L[line], p.LR[line], p.G[valve], p.Wave[0] = 2, 1, 0.5, laplace.Constant(6)
	pulse, err := laplace.Pulse(laplace.PulseTrain{Low: 1, High: 0, Width: 1, At: 1, Count: 1})
	if err != nil {
		t.Fatal(err)
	}
	p.Switch[0] = pulse
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.G[valve] = now, 0.5*now[0]
		return c, nil
	}
	r, err := n.Reduce(p, []network.Output{n.InertanceFlowOf(line), n.Level(at)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 9)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "steady", resp.At(0, 0.5), 2, 1e-14, 2)
	if q, x := resp.At(0, 1.5), resp.At(1, 1.5); q != 0 || x != 6 {
		t.Errorf("flow %v, level %v while shut", q, x)
	}
	near(t, "again", resp.At(0, 3), -2*math.Expm1(-1.5), 1e-14, 2)
	shut, err := p.Turn([]float64{0})
	if err != nil {
		t.Fatal(err)
	}
	if list, err := n.Stopped(shut); err != nil || len(list) != 1 || list[0] != line {
		t.Errorf("%v, %v", list, err)
	}
}

// Three columns meet at a junction and one is shut: the two that are left keep the
// momentum that they have together, L₁i₁ + L₂i₂ along the line they make.
func TestMomentumAtJunction(t *testing.T) {
	b := network.NewBuilder()
	junction := b.Node("junction", network.NoRef)
	for _, name := range []string{"a", "b", "c"} {
		end := b.Node(name, network.NoRef)
		b.Hold(end, network.NoRef)
		b.Inertance(name, end, junction, network.NoRef)
	}
	b.Switch("c", network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	copy(p.L, []float64{1, 3, 2})
	copy(p.LR, []float64{0.5, 0.25, 1})
	copy(p.StartFlow, []float64{5, 1, -6})
	copy(p.HasStartFlow, []bool{true, true, true})
	p.Switch[0] = laplace.Step(1, 0, 0)
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.Shut[2] = now, now[0] == 0
		return c, nil
	}
	r, err := n.Reduce(p, []network.Output{n.InertanceFlowOf(0), n.InertanceFlowOf(1), n.InertanceFlowOf(2)})
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(p, 4)
	if err != nil {
		t.Fatal(err)
	}
	q := (1*5 - 3*1.0) / 4 // from a to b: L₁·5 with it, L₂·1 against it
	near(t, "just before", resp.Left(0, 0), 5, 1e-15, 5)
	for _, at := range []float64{0, 1, 3} {
		now := q * math.Exp(-0.75/4*at)
		near(t, "a", resp.At(0, at), now, 1e-14, 5)
		near(t, "b", resp.At(1, at), -now, 1e-14, 5)
		near(t, "c", resp.At(2, at), 0, 1e-15, 5)
	}
}

// A junction between a line and a valve that are both shut has no level.
func TestShutOnBothSides(t *testing.T) {
	b := network.NewBuilder()
	main, at, drain := b.Node("main", network.NoRef), b.Node("between", network.NoRef), b.Node("drain", network.NoRef)
	b.Hold(main, network.NoRef)
	b.Hold(drain, network.NoRef)
	b.Inertance("line", main, at, network.NoRef)
	b.Resistance("valve", at, drain, network.NoRef)
	b.Switch("both", network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.L[0], p.G[0], p.Switch[0] = 1, 1, laplace.Step(1, 0, 3)
	p.Turn = func(now []float64) (*network.Params, error) {
		c := p.Clone()
		c.Now, c.G[0], c.Shut[0] = now, now[0], now[0] == 0
		return c, nil
	}
	r, err := n.Reduce(p, []network.Output{n.InertanceFlowOf(0)})
	if err != nil {
		t.Fatal(err)
	}
	var f *network.ParamFault
	if _, err := r.Respond(p, 5); !errors.As(err, &f) || f.List[0].Code != network.Undetermined || !strings.Contains(err.Error(), `node "between"`) || !strings.Contains(err.Error(), "from 3 s on") {
		t.Error(err)
	}
}

// Any network with a tube that shuts and opens, against the march of the whole
// balances in which a resistance beyond all others stands for the shut tube: what is
// left of the flows is then the outcome of the march, not of a rule.
func TestShutMarchAgrees(t *testing.T) {
	const stopping, steps = 1e9, 300
	compared := 0
	for k := range 24 {
		s := rapid.Custom(anyTubes).Example(k)
		which := k % len(s.tubes)
		s.switches = 1
		m := s.build(t)
		for i := range m.p.Wave {
			m.p.Wave[i] = laplace.Waveform{Segments: []laplace.Segment{{B: float64(i + 1)}}}
		}
		pulse, err := laplace.Pulse(laplace.PulseTrain{Low: 1, High: 0, Width: 0.3, At: 0.5, Count: 1})
		if err != nil {
			t.Fatal(err)
		}
		m.p.Switch[0] = pulse
		m.p.Turn = func(now []float64) (*network.Params, error) {
			c := m.p.Clone()
			c.Now, c.Shut[which] = now, now[0] == 0
			return c, nil
		}
		var outs []network.Output
		var at []int
		for i, kind := range s.kinds {
			if kind == store {
				outs, at = append(outs, m.net.Level(m.nodes[i])), append(at, i)
			}
		}
		for i, id := range m.tubeID {
			outs, at = append(outs, m.net.InertanceFlowOf(id)), append(at, len(s.kinds)+i)
		}
		r, err := m.net.Reduce(m.p, outs)
		if err != nil {
			t.Fatal(err)
		}
		y, err := r.Respond(m.p, 1)
		if err != nil {
			var f *network.ParamFault
			if !errors.As(err, &f) || f.List[0].Code != network.Undetermined {
				t.Errorf("network %d: %v", k, err)
			}
			continue
		}
		run := func(steps int) (list [][]float64) {
			x := make([]float64, len(s.kinds)+len(s.tubes))
			for phase, end := range []float64{0.5, 0.8, 1} {
				R := s.tubes[which].R
				if phase == 1 {
					s.tubes[which].R = stopping
				}
				if x != nil {
					x = m.marchOn(x, []float64{0, 0.5, 0.8}[phase], end, steps)
				}
				s.tubes[which].R = R
				list = append(list, x)
			}
			return list
		}
		coarse, fine := run(steps/2), run(steps)
		for phase, end := range []float64{0.5, 0.8, 1} {
			if coarse[phase] == nil || fine[phase] == nil {
				continue
			}
			for o, i := range at {
				compared++
				x := fine[phase][i]
				if got, allowed := y.Left(o, end), 3*math.Abs(x-coarse[phase][i])+1e-6; math.Abs(got-x) > allowed {
					t.Errorf("network %d, output %d at %v: %v, marched %v ± %v", k, o, end, got, x, allowed)
				}
			}
		}
	}
	if compared < 100 {
		t.Errorf("%d numbers compared", compared)
	}
}
