package network_test

import (
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// flowOf makes a Flow of a function of both levels and its derivatives.
type flowOf func(a, b float64) (q, da, db float64)

func (f flowOf) Flow(a, b float64) (q, da, db float64) { return f(a, b) }

// proportional is a conductance as an element.
func proportional(g float64) flowOf {
	return func(a, b float64) (q, da, db float64) { return g * (a - b), g, -g }
}

// outlet is flow as the root of the difference, straight within a small core.
func outlet(k, core float64) flowOf {
	return func(a, b float64) (q, da, db float64) {
		d := a - b
		if math.Abs(d) < core {
			s := k / math.Sqrt(core)
			return s * d, s, -s
		}
		r := math.Sqrt(math.Abs(d))
		s := k / (2 * r)
		return math.Copysign(k*r, d), s, -s
	}
}

// one is a network of one store between which and a held node one Flow runs.
type one struct {
	net  *network.Network
	p    *network.Params
	node network.NodeID
	held network.NodeID
	loss network.ElementID
}

func newOne(tb tester, c, start, around float64, f network.Flow) *one {
	b, w := network.NewBuilder(), &one{}
	w.held = b.Node("around", network.NoRef)
	b.Hold(w.held, network.NoRef)
	w.node = b.Node("body", network.NoRef)
	b.Capacity(w.node, network.NoRef)
	w.loss = b.Between("loss", w.node, w.held, false, network.NoRef)
	w.net, w.p = finished(tb, b)
	w.p.C[0], w.p.Wave[0] = c, laplace.Constant(around)
	w.p.Law[w.loss] = &network.Through{Flow: f}
	w.p.Start[w.node], w.p.HasStart[w.node] = start, true
	return w
}

// tester is a *testing.T or a *rapid.T.
type tester interface {
	Helper()
	Fatal(...any)
}

func finished(tb tester, b *network.Builder) (*network.Network, *network.Params) {
	tb.Helper()
	net, err := b.Build()
	if err != nil {
		tb.Fatal(err)
	}
	return net, net.NewParams()
}

// marched begins and marches.
func marched(tb tester, net *network.Network, p *network.Params, outs []network.Output, run network.Run) *network.Trajectory {
	tb.Helper()
	from, err := net.Begin(p)
	if err != nil {
		tb.Fatal(err)
	}
	r, err := net.March(p, from, outs, run)
	if err != nil {
		tb.Fatal(err)
	}
	return r
}

// worst returns the largest error of an output over many times, relative to scale.
func worst(r *network.Trajectory, out int, until, scale float64, exact func(t float64) float64) float64 {
	e := 0.0
	for k := range 1001 {
		t := until * float64(k) / 1000
		e = max(e, math.Abs(r.At(out, t)-exact(t))/scale)
	}
	return e
}

// Torricelli's draining: √x falls in proportion to time.
func TestTorricelli(t *testing.T) {
	const k, c, x0 = 3e-3, 2.0, 4e4
	w := newOne(t, c, x0, 0, outlet(k, 10))
	empty := 2 * c * math.Sqrt(x0) / k
	until := empty * (1 - math.Sqrt(10/x0)) // down to the core
	r := marched(t, w.net, w.p, []network.Output{w.net.Level(w.node)}, network.Run{Until: until})
	e := worst(r, 0, until, x0, func(t float64) float64 {
		s := math.Sqrt(x0) - k*t/(2*c)
		return s * s
	})
	taken, back := r.Steps()
	t.Logf("error %.1e of the first level, %d steps, %d back, balance %.1e, rounding %.1e", e, taken, back, r.Balance(), r.Rounding(0))
	if e > 5e-7 || r.Balance() > 1e-9 {
		t.Errorf("error %.2e of the first level, balance %.2e", e, r.Balance())
	}
}

// A body that only radiates into the dark: 1/T³ rises in proportion to time.
func TestRadiationAlone(t *testing.T) {
	const s, c, T0 = 5.670374419e-8 * 0.02, 12.0, 900.0
	w := newOne(t, c, T0, 0, flowOf(func(a, b float64) (q, da, db float64) {
		return s * (a*a*a*a - b*b*b*b), 4 * s * a * a * a, -4 * s * b * b * b
	}))
	exact := func(t float64) float64 { return math.Pow(1/(T0*T0*T0)+3*s*t/c, -1./3) }
	for _, until := range []float64{100, 1e4, 1e6} {
		r := marched(t, w.net, w.p, []network.Output{w.net.Level(w.node)}, network.Run{Until: until})
		e := worst(r, 0, until, T0, exact)
		taken, back := r.Steps()
		t.Logf("until %g s: error %.1e, %d steps, %d back, balance %.1e, rounding %.1e", until, e, taken, back, r.Balance(), r.Rounding(0))
		if e > 1e-7 || r.Balance() > 1e-9 {
			t.Errorf("until %g s: error %.2e, balance %.2e", until, e, r.Balance())
		}
	}
}

// The balance closes as the tolerance does: to 1e-9 and better where that is asked for.
func TestBalanceCloses(t *testing.T) {
	for _, c := range []struct {
		name string
		w    *one
		end  float64
	}{
		{"outlet", newOne(t, 2, 4e4, 0, outlet(3e-3, 10)), 2e5},
		{"straight", newOne(t, 2, 900, 300, proportional(0.1)), 50},
		{"radiation", newOne(t, 12, 900, 290, &cooling{1e-9, 0.1}), 1e5},
	} {
		for _, tol := range []float64{1e-7, 1e-10, 1e-11} {
			r := marched(t, c.w.net, c.w.p, []network.Output{c.w.net.Level(c.w.node)}, network.Run{Until: c.end, RelTol: tol})
			taken, _ := r.Steps()
			t.Logf("%s at %g: balance %.1e, %d steps", c.name, tol, r.Balance(), taken)
			if b := r.Balance(); b > 1e-9 {
				t.Errorf("%s at %g: balance %.2e", c.name, tol, b)
			}
		}
	}
}

// Where nothing moves but what rounding makes of it, the balance closes.
func TestBalanceAtRest(t *testing.T) {
	b := network.NewBuilder()
	left, mid, right := b.Node("left", network.NoRef), b.Node("mid", network.NoRef), b.Node("right", network.NoRef)
	b.Hold(left, network.NoRef)
	b.Hold(right, network.NoRef)
	a, c := b.Between("a", left, mid, false, network.NoRef), b.Between("c", mid, right, false, network.NoRef)
	net, p := finished(t, b)
	p.Law[a], p.Law[c] = &network.Through{Flow: outlet(3e-3, 10)}, &network.Through{Flow: outlet(1e-2, 10)}
	for _, v := range []float64{2e5, 1e5 / 3} {
		p.Wave[0], p.Wave[1] = laplace.Constant(v), laplace.Constant(v)
		r := marched(t, net, p, []network.Output{net.Level(mid)}, network.Run{Until: 60})
		if r.Balance() > 1e-9 {
			t.Errorf("balance %.2e", r.Balance())
		}
	}
}

// grower brings r·x·(1 − x) into its node.
type grower struct{ r float64 }

func (g *grower) Eval(s *network.Stamp) {
	x := s.X[0]
	s.F[0], s.DF[0] = g.r*x*(1-x), g.r*(1-2*x)
}

// Logistic growth, and the integral of it.
func TestLogistic(t *testing.T) {
	b := network.NewBuilder()
	n := b.Node("stock", network.NoRef)
	b.Capacity(n, network.NoRef)
	id := b.Element(network.Shape{Name: "growth", Ports: []network.NodeID{n}}, network.NoRef)
	net, p := finished(t, b)
	p.C[0], p.Law[id] = 1, &grower{2}
	p.Start[n], p.HasStart[n] = 0.01, true
	r := marched(t, net, p, []network.Output{net.Level(n)}, network.Run{Until: 10})
	exact := func(t float64) float64 { return 1 / (1 + 99*math.Exp(-2*t)) }
	if e := worst(r, 0, 10, 1, exact); e > 2e-6 {
		t.Errorf("error %.2e", e)
	}
	integral := (math.Log(99+math.Exp(20)) - math.Log(100)) / 2 // ∫ e²ᵗ/(e²ᵗ + 99) dt
	near(t, "integral", r.Integral(0, 0, 10), integral, 1e-6, 10)
	x, ok := r.First(0, 0.5, 0, 10)
	if !ok {
		t.Fatal("half is never crossed")
	}
	near(t, "time of half", x.T, math.Log(99)/2, 2e-6, 1)
	if v, ok := r.Final(0); !ok || math.Abs(v-1) > 1e-6 {
		t.Errorf("settles to %v, %v", v, ok)
	}
	half := marched(t, net, p, []network.Output{net.Level(n)}, network.Run{Until: 3})
	if v, ok := half.Final(0); ok {
		t.Errorf("still growing, yet settles to %v", v)
	}
}

// The order of the whole march: the error falls with the tolerance, as the step's does.
func TestMarchOrder(t *testing.T) {
	const s, c, T0 = 5.670374419e-8 * 0.02, 12.0, 900.0
	w := newOne(t, c, T0, 0, flowOf(func(a, b float64) (q, da, db float64) {
		return s * (a*a*a*a - b*b*b*b), 4 * s * a * a * a, -4 * s * b * b * b
	}))
	exact := func(t float64) float64 { return math.Pow(1/(T0*T0*T0)+3*s*t/c, -1./3) }
	var steps, errs []float64
	for _, tol := range []float64{1e-5, 1e-7, 1e-9} {
		r := marched(t, w.net, w.p, []network.Output{w.net.Level(w.node)}, network.Run{Until: 1e4, RelTol: tol})
		taken, _ := r.Steps()
		steps, errs = append(steps, float64(taken)), append(errs, worst(r, 0, 1e4, T0, exact))
	}
	for k := range 2 {
		order := math.Log(errs[k]/errs[k+1]) / math.Log(steps[k+1]/steps[k])
		t.Logf("%.0f steps %.1e, %.0f steps %.1e: order %.2f", steps[k], errs[k], steps[k+1], errs[k+1], order)
		if order < 4.5 {
			t.Errorf("order %.2f, want 5 but for the start", order)
		}
	}
}

// A network that stores nothing follows its inputs at once, between the steps too: the
// level between two throttles with k² as 1 to 3 divides the difference as 3 to 1.
func TestNothingStored(t *testing.T) {
	b := network.NewBuilder()
	left, mid, right := b.Node("left", network.NoRef), b.Node("mid", network.NoRef), b.Node("right", network.NoRef)
	b.Hold(left, network.NoRef)
	b.Hold(right, network.NoRef)
	a, c := b.Between("a", left, mid, false, network.NoRef), b.Between("c", mid, right, false, network.NoRef)
	net, p := finished(t, b)
	p.Law[a], p.Law[c] = &network.Through{Flow: outlet(1, 1)}, &network.Through{Flow: outlet(math.Sqrt(3), 1)}
	p.Wave[0], p.Wave[1] = laplace.Sine(3e5, 1e5, 2, 0), laplace.Constant(1e5)
	flow := network.Output{Name: "flow", Flow: &network.FlowTerm{Kind: network.PortFlow, Element: c, Port: 1, Sign: 1}}
	r := marched(t, net, p, []network.Output{net.Level(mid), flow}, network.Run{Until: 10})
	drop := func(t float64) float64 { return 0.25 * (2e5 + 1e5*math.Sin(2*t)) }
	taken, _ := r.Steps()
	e, q := worst(r, 0, 10, 1e5, func(t float64) float64 { return 1e5 + drop(t) }), worst(r, 1, 10, 400, func(t float64) float64 { return math.Sqrt(3 * drop(t)) })
	t.Logf("%d steps, level wrong by %.1e, flow by %.1e", taken, e, q)
	if e > 1e-6 || q > 1e-6 {
		t.Errorf("level wrong by %.2e, flow by %.2e", e, q)
	}
}
