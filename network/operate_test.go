package network

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"lagbook/laplace"
)

// loops is a looped network on a grid of massless nodes, fed from one held corner and drawn
// on at every node; join adds a branch and returns what sets it. scale multiplies levels by
// its square and flows by itself.
func loops(nx, ny int, r *rand.Rand, scale float64, join func(b *Builder, name string, i, j NodeID, v, scale float64) func(*Params)) (*Network, *Params) {
	b := NewBuilder()
	id := make([]NodeID, nx*ny)
	for i := range id {
		id[i] = b.Node(fmt.Sprint("n", i), NoRef)
	}
	hold := b.Hold(id[0], NoRef)
	set := []func(p *Params){func(p *Params) { p.Wave[hold] = laplace.Constant(5e5 * scale * scale) }}
	for i := range id {
		if i%nx+1 < nx {
			set = append(set, join(b, fmt.Sprint("p", i, "-", i+1), id[i], id[i+1], math.Exp(r.NormFloat64()), scale))
		}
		if i+nx < len(id) {
			set = append(set, join(b, fmt.Sprint("p", i, "-", i+nx), id[i], id[i+nx], math.Exp(r.NormFloat64()), scale))
		}
		if i > 0 {
			s, q := b.Source(fmt.Sprint("draw", i), id[i], -1, NoRef), 1e-3*r.Float64()/float64(len(id))
			set = append(set, func(p *Params) { p.Wave[s] = laplace.Constant(q * scale) })
		}
	}
	n, err := b.Build()
	if err != nil {
		panic(err)
	}
	p := n.NewParams()
	for _, f := range set {
		f(p)
	}
	return n, p
}

// pipe has an inertance and a q|q| law with a laminar core.
func pipe(b *Builder, name string, i, j NodeID, v, scale float64) func(p *Params) {
	k := b.Inertance(name, i, j, NoRef)
	b.Dropping(k)
	return func(p *Params) { p.L[k], p.Drop[k] = 1e6, pipeDrop{1e8 * v, 1e-5 * scale} }
}

// orifice has a flow that goes with the root of the difference.
func orifice(b *Builder, name string, i, j NodeID, v, scale float64) func(p *Params) {
	k := b.Between(name, i, j, false, NoRef)
	return func(p *Params) { p.Law[k] = &Through{quadratic{1e-5 * v, 100 * scale * scale}} }
}

var branchings = []struct {
	name string
	join func(*Builder, string, NodeID, NodeID, float64, float64) func(*Params)
}{{"pipes", pipe}, {"orifices", orifice}}

var grids = []struct{ nx, ny, pipes int }{{3, 3, 12}, {7, 8, 97}, {22, 24, 1010}}

func looped(k, size int, scale float64) (*Network, *Params) {
	g := grids[size]
	return loops(g.nx, g.ny, rand.New(rand.NewPCG(1, uint64(g.nx))), scale, branchings[k].join)
}

// Looped networks are solved from a guess that knows nothing, and what is drawn arrives.
func TestOperateLoopedPipes(t *testing.T) {
	for k := range branchings {
		for size, g := range grids {
			n, p := looped(k, size, 1)
			s, err := n.Operate(p, 0, nil)
			if err != nil {
				t.Fatalf("%d %s: %v", g.pipes, branchings[k].name, err)
			}
			for i, v := range leftOver(t, n, p, s) {
				if math.Abs(v) > 1e-14 { // of 1e-3 drawn in all
					t.Fatalf("%d %s, row %d: %g left over", g.pipes, branchings[k].name, i, v)
				}
			}
		}
	}
}

// leftOver returns the balances of massless nodes at a steady state.
func leftOver(t *testing.T, n *Network, p *Params, s *State) []float64 {
	e, err := n.newEquations(p)
	if err != nil {
		t.Fatal(err)
	}
	if err := e.hold(s, p, func(w *laplace.Waveform) float64 { return w.At(0) }, asRest); err != nil {
		t.Fatal(err)
	}
	x := e.vector(s)
	f := make([]float64, len(x))
	e.rates(0, x, f)
	return f[:len(e.l.nodes)]
}

// With levels 4^k and flows 2^k times as large the answer is too, bit for bit.
func TestOperateScales(t *testing.T) {
	for k := range branchings {
		n, p := looped(k, 1, 1)
		s, err := n.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		n, p = looped(k, 1, 32)
		big, err := n.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		for i, v := range s.Levels {
			if big.Levels[i] != 1024*v {
				t.Fatalf("%s, level %d: %v and %v", branchings[k].name, i, v, big.Levels[i])
			}
		}
		for i, v := range s.Flows {
			if big.Flows[i] != 32*v {
				t.Fatalf("%s, flow %d: %v and %v", branchings[k].name, i, v, big.Flows[i])
			}
		}
	}
}

func BenchmarkOperate(b *testing.B) {
	for k := range branchings {
		for size, g := range grids {
			n, p := looped(k, size, 1)
			b.Run(fmt.Sprintf("%s=%d", branchings[k].name, g.pipes), func(b *testing.B) {
				for b.Loop() {
					if _, err := n.Operate(p, 0, nil); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}

// Where the flows are flat at the beginning, pseudo-time leads to where they are not.
func TestOperateFromWhereAllIsFlat(t *testing.T) {
	r := newRig()
	out, hot := r.held("out", 0), r.store("hot", 1)
	r.element(Shape{Name: "film", Ports: []NodeID{hot, out}, Joins: true}, &Through{bounded{}})
	r.source("burner", hot, 0.5)
	n, p := r.build(t)
	for _, from := range []float64{-500, -3, 0, 3, 500} {
		s, err := n.Operate(p, 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		s.Levels[hot] = from
		if s, err = n.Operate(p, 0, s); err != nil {
			t.Fatalf("from %v: %v", from, err)
		}
		if want := math.Atanh(0.5); math.Abs(s.Levels[hot]-want) > 1e-9 {
			t.Errorf("from %v: %v, want %v", from, s.Levels[hot], want)
		}
	}
}

// A plate that radiates to its surroundings at 0 K, where the law is flat, and conducts:
// in all it gives off what comes in.
func TestOperateRadiatingPlate(t *testing.T) {
	r := newRig()
	sky := r.held("sky", 0)
	const nx, ny = 40, 25
	var id [nx * ny]NodeID
	for i := range id {
		id[i] = r.store(fmt.Sprint("n", i), 1)
		r.element(Shape{Name: fmt.Sprint("rad", i), Ports: []NodeID{id[i], sky}, Joins: true}, &Through{radiating{5.67e-11}})
		for _, j := range [2]int{i - 1, i - nx} {
			if j >= 0 && (j == i-nx || i%nx > 0) {
				g := r.Resistance("g", id[i], id[j], NoRef)
				r.set = append(r.set, func(p *Params) { p.G[g] = 0.2 })
			}
		}
	}
	r.source("heat", id[0], 200)
	n, p := r.build(t)
	s, err := n.Operate(p, 0, nil)
	if err != nil {
		t.Fatal(err)
	}
	out := 0.0
	for _, k := range id {
		out += 5.67e-11 * math.Pow(s.Levels[k], 4)
	}
	if math.Abs(out-200) > 1e-9*200 {
		t.Errorf("%v given off, want 200", out)
	}
}

// A pipe whose law is all but flat where the search begins carries what is drawn all the
// same.
func TestOperateThroughAlmostNoLaminarCore(t *testing.T) {
	r := newRig()
	lake, surge := r.held("lake", 1.5e5), r.store("surge", 0.03)
	k := r.Inertance("tunnel", lake, surge, NoRef)
	r.Dropping(k)
	r.set = append(r.set, func(p *Params) { p.L[k], p.Drop[k] = 5e5, pipeDrop{40, 1e-10} })
	r.source("turbine", surge, -30)
	n, p := r.build(t)
	s, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	if want := 1.5e5 - 40*900; s.Flows[k] != 30 || math.Abs(s.Levels[surge]-want) > 1e-6 {
		t.Errorf("flow %v, level %v, want 30 and %v", s.Flows[k], s.Levels[surge], want)
	}
}
