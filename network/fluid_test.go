package network_test

import (
	"encoding/json"
	"math"
	"math/cmplx"
	"os"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// fluid.json: surge tanks, U-tubes, instrument lines, tanks in a row, with published
// values or closed forms; its note says how to read it.
type (
	fluidCase struct {
		ID, Title, Source           string
		Nodes, Held, Lines, Sources []tuple
		Checks                      []fluidCheck
	}
	fluidCheck struct {
		What, Of      string
		Want, At, Tol float64
		Published     []float64
	}
	fluid struct {
		*fluidCase
		net  *network.Network
		red  *network.Reduction
		resp *laplace.Response
		out  map[string]int // also of "supply of …"
		in   int            // the first input that moves
	}
)

func readFluid(t *testing.T) []fluidCase {
	t.Helper()
	src, err := os.ReadFile("testdata/fluid.json")
	if err != nil {
		t.Fatal(err)
	}
	var all struct{ Cases []fluidCase }
	if err := json.Unmarshal(src, &all); err != nil {
		t.Fatal(err)
	}
	return all.Cases
}

func (t tuple) number(i int) float64 { return t[i].(float64) }

func (c *fluidCase) build(t *testing.T) *fluid {
	t.Helper()
	b, f := network.NewBuilder(), &fluid{fluidCase: c, out: map[string]int{}, in: -1}
	node := map[string]network.NodeID{}
	var set []func(p *network.Params)
	var outs []func(n *network.Network) network.Output
	show := func(name string, o func(n *network.Network) network.Output) {
		f.out[name] = len(outs)
		outs = append(outs, o)
	}
	drive := func(id network.InputID, v float64) {
		if v != 0 && f.in < 0 {
			f.in = int(id)
		}
		set = append(set, func(p *network.Params) { p.Wave[id] = laplace.Step(0, v, 0) })
	}
	for _, n := range c.Nodes {
		id := b.Node(n.name(0), network.NoRef)
		node[n.name(0)] = id
		show(n.name(0), func(net *network.Network) network.Output { return net.Level(id) })
		if n.number(1) > 0 {
			k := b.Capacity(id, network.NoRef)
			set = append(set, func(p *network.Params) { p.C[k], p.Start[id], p.HasStart[id] = n.number(1), n.number(2), true })
		}
	}
	for _, h := range c.Held {
		id := b.Node(h.name(0), network.NoRef)
		node[h.name(0)] = id
		drive(b.Hold(id, network.NoRef), h.number(1))
		show("supply of "+h.name(0), func(net *network.Network) network.Output { return net.SupplyOf(id) })
	}
	for _, l := range c.Lines {
		from, to := node[l.name(1)], node[l.name(2)]
		if l.number(4) == 0 {
			id := b.Resistance(l.name(0), from, to, network.NoRef)
			set = append(set, func(p *network.Params) { p.G[id] = 1 / l.number(3) })
			show(l.name(0), func(net *network.Network) network.Output { return net.FlowOf(id) })
			continue
		}
		id := b.Inertance(l.name(0), from, to, network.NoRef)
		set = append(set, func(p *network.Params) {
			p.L[id], p.LR[id], p.StartFlow[id], p.HasStartFlow[id] = l.number(4), l.number(3), l.number(5), true
		})
		show(l.name(0), func(net *network.Network) network.Output { return net.InertanceFlowOf(id) })
	}
	for _, s := range c.Sources {
		drive(b.Source(s.name(0), node[s.name(1)], 1, network.NoRef), s.number(2))
	}
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	for _, s := range set {
		s(p)
	}
	list := make([]network.Output, len(outs))
	for k, o := range outs {
		list[k] = o(n)
	}
	f.net = n
	if f.red, err = n.Reduce(p, list); err != nil {
		t.Fatal(err)
	}
	if f.resp, err = f.red.Respond(p, 2000); err != nil {
		t.Fatal(err)
	}
	return f
}

// pole returns the k-th pole, of a pair the upper one.
func (f *fluid) pole(k float64) complex128 {
	for _, p := range f.red.System.Poles() {
		if imag(p.P) < 0 || p.P == 0 {
			continue
		}
		if k == 0 {
			return p.P
		}
		k--
	}
	return cmplx.NaN()
}

func (f *fluid) measure(t *testing.T, c *fluidCheck) float64 {
	t.Helper()
	out := f.out[c.Of]
	value := func(v *float64) float64 {
		if v == nil {
			t.Fatalf("no %s", c.What)
		}
		return *v
	}
	step := func() *laplace.Measures {
		m, err := f.red.System.Step(f.in, out)
		if err != nil {
			t.Fatal(err)
		}
		return m
	}
	transfer := func(out int) *laplace.Transfer {
		h, err := f.red.System.Transfer(f.in, out)
		if err != nil {
			t.Fatal(err)
		}
		return h
	}
	switch c.What {
	case "rate":
		return cmplx.Abs(f.pole(c.At))
	case "damping":
		return -real(f.pole(c.At)) / cmplx.Abs(f.pole(c.At))
	case "period":
		return 2 * math.Pi / imag(f.pole(0))
	case "level":
		return f.resp.At(out, c.At)
	case "supply":
		return f.resp.At(f.out["supply of "+c.Of], c.At)
	case "highest":
		return f.resp.Max(out, 0, c.At).Y
	case "final":
		y, _ := f.resp.Final(out)
		return y
	case "first":
		r, _ := f.resp.First(out, c.At, 0, 2000)
		return r.T
	case "overshoot":
		return value(step().Overshoot)
	case "peak time":
		return value(step().PeakTime)
	case "settling 2":
		return value(step().Settling2)
	case "zero":
		return real(transfer(out).Zeros[int(c.At)].P)
	case "gain":
		return cmplx.Abs(transfer(out).Eval(complex(0, c.At)))
	case "phase":
		return 180 / math.Pi * cmplx.Phase(transfer(out).Eval(complex(0, c.At)))
	case "impedance":
		return 1 / cmplx.Abs(transfer(f.out["supply of "+c.Of]).Eval(complex(0, c.At)))
	}
	t.Fatalf("no way to measure %q", c.What)
	return 0
}

// Every check to its tolerance, and within half a unit of the last printed digit
// where there is a printed value.
func TestFluid(t *testing.T) {
	for _, c := range readFluid(t) {
		t.Run(c.ID, func(t *testing.T) {
			f := c.build(t)
			for i := range c.Checks {
				k := &c.Checks[i]
				got := f.measure(t, k)
				if !(math.Abs(got-k.Want) <= k.Tol*math.Abs(k.Want)) {
					t.Errorf("%s of %s at %v: %v, want %v", k.What, k.Of, k.At, got, k.Want)
				}
				if k.Published != nil && math.Abs(got-k.Published[0]) > k.Published[1] {
					t.Errorf("%s of %s: %v, published %v", k.What, k.Of, got, k.Published[0])
				}
			}
		})
	}
}
