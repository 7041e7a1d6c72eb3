package network

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// A column whose valve shuts stops, and its end takes the level that keeps it at rest.
func TestShutColumnStops(t *testing.T) {
	r := newRig()
	main, end := r.held("main", 5), r.held("drain", 0)
	a, b := r.Node("a", NoRef), r.Node("b", NoRef)
	first, second := r.column("pipe", main, a, 2, 0.5), r.column("more", a, b, 1, 0.5)
	shutAt1, err := laplace.Points([][2]float64{{0, 1}, {1, 1}, {1, 0}})
	if err != nil {
		t.Fatal(err)
	}
	r.valve("v1", b, end, shutAt1)
	n, p := r.build(t)
	s, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	q := s.Flows[first]
	if math.Abs(q*q-s.Levels[b]) > 1e-3 || math.Abs(5-q-s.Levels[b]) > 1e-9 || s.Flows[second] != q {
		t.Fatalf("flows %v, levels %v", s.Flows, s.Levels)
	}
	e, err := n.newEquations(p)
	if err != nil {
		t.Fatal(err)
	}
	if err := e.enter(s, 1, 2); err != nil {
		t.Fatal(err)
	}
	x := e.vector(s)
	if err := e.project(1, x); err != nil {
		t.Fatal(err)
	}
	s = e.state(1, x)
	if s.Flows[first] != 0 || s.Flows[second] != 0 || s.Levels[a] != 5 || s.Levels[b] != 5 {
		t.Errorf("flows %v, levels %v, want no flow and 5 all along", s.Flows, s.Levels)
	}
}

// Where one of three columns that meet is shut the others go on with the momentum that they
// have together: with inertances 1 and 3 and flows 3 and 1 into and out of what is left,
// (1·3 + 3·1)/(1 + 3) = 1.5.
func TestJointKeepsMomentum(t *testing.T) {
	r := newRig()
	in, out, side := r.held("in", 0), r.held("out", 0), r.held("side", 0)
	m := r.Node("m", NoRef)
	a, b, c := r.column("a", in, m, 1, 0), r.column("b", m, out, 3, 0), r.column("c", m, side, 1, 0)
	n, p := r.build(t)
	for id, q := range map[InertanceID]float64{a: 3, b: 1, c: 2} {
		p.StartFlow[id], p.HasStartFlow[id] = q, true
	}
	s, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	p.Shut[c] = true
	e, err := n.newEquations(p)
	if err != nil {
		t.Fatal(err)
	}
	if err := e.enter(s, 0, 1); err != nil {
		t.Fatal(err)
	}
	x := e.vector(s)
	if err := e.project(0, x); err != nil {
		t.Fatal(err)
	}
	s = e.state(0, x)
	if math.Abs(s.Flows[a]-1.5) > 1e-14 || math.Abs(s.Flows[b]-1.5) > 1e-14 || s.Flows[c] != 0 {
		t.Errorf("flows %v, want 1.5, 1.5, 0", s.Flows)
	}
	p.Shut[c] = false
	p.StartFlow[b] = 2
	_, err = n.Begin(p)
	says(t, err, `node "m"`, "do not fit one another", "-1 flows in")
}

// The rows of joints keep the sums of flows: along the direction in which the rates point,
// with what sources change, nothing comes in that does not go out.
func TestJointRowsKeepSums(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		e := anyEquations(t)
		n := e.size()
		x, f := anyVector(t, n), make([]float64, n)
		e.restore(0, x)
		if e.project(0, x) != nil || len(e.top.joints) == 0 {
			return
		}
		e.rates(0, x, f)
		const h = 1e-6
		for i := range x {
			if e.m[i] != 0 {
				x[i] += h * f[i] / e.m[i]
			}
		}
		e.fill(h, x)
		e.sum()
		for k := range e.top.joints {
			m := &e.top.joints[k]
			sum, size := 0.0, 0.0
			for _, end := range m.ends {
				sum += end.sign * x[e.l.flow[end.b]]
				size += math.Abs(f[e.l.flow[end.b]])
			}
			for _, node := range m.nodes {
				for _, s := range e.tied.sources[node] {
					sum += e.g.inputs[s].sign * e.z[e.l.source[s]]
				}
				for _, p := range e.tied.pushes[node] {
					if !e.law[p.element].shut {
						sum += e.law[p.element].s.F[p.port]
					}
				}
			}
			if math.Abs(sum) > 1e-8*(1+size) {
				t.Fatalf("joint %d: %v flows in after %v s", k, sum, h)
			}
		}
	})
}

// Nothing flows in what is shut and in what leads to nothing else.
func TestStoppedBesideElements(t *testing.T) {
	r := newRig()
	in, out := r.held("in", 0), r.held("out", 0)
	a, b, c := r.Node("a", NoRef), r.Node("b", NoRef), r.Node("c", NoRef)
	first, second := r.column("first", in, a, 1, 0), r.column("second", a, b, 1, 0)
	third, other := r.column("third", b, out, 1, 0), r.column("other", in, c, 1, 0)
	r.valve("v", c, out, laplace.Constant(1))
	n, p := r.build(t)
	if list, err := n.Stopped(p); err != nil || len(list) != 0 {
		t.Errorf("%v, %v, want none", list, err)
	}
	p.Shut[third] = true
	list, err := n.Stopped(p)
	if err != nil || len(list) != 3 || list[0] != first || list[1] != second || list[2] != third {
		t.Errorf("%v, %v, want all but %d", list, err, other)
	}
}
