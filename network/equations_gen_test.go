package network

import (
	"errors"
	"fmt"
	"math"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// anyNonlinear draws a connected network of all kinds of parts: node 0 is held, and every
// other hangs on an earlier one.
func anyNonlinear(t *rapid.T) (*Network, *Params) {
	d := &drawing{t: t, b: NewBuilder()}
	n := rapid.IntRange(2, 7).Draw(t, "nodes")
	for i := range n {
		d.node(i)
		if i > 0 {
			d.join(rapid.IntRange(0, i-1).Draw(t, "to"), i)
		}
	}
	for range rapid.IntRange(0, 4).Draw(t, "more") {
		if a, b := rapid.IntRange(0, n-1).Draw(t, "a"), rapid.IntRange(0, n-1).Draw(t, "b"); a != b {
			d.join(a, b)
		}
	}
	for range rapid.IntRange(0, 2).Draw(t, "sources") {
		s, w := d.b.Source("s", d.nodes[rapid.IntRange(0, n-1).Draw(t, "at")], 1, NoRef), d.wave()
		d.set = append(d.set, func(p *Params) { p.Wave[s] = w })
	}
	net, err := d.b.Build()
	if errors.As(err, new(*Faults)) {
		t.Skip(err.Error()) // drawn so that the graph is refused: no draw
	}
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	for _, f := range d.set {
		f(p)
	}
	return net, p
}

type drawing struct {
	t     *rapid.T
	b     *Builder
	nodes []NodeID
	set   []func(p *Params)
}

func (d *drawing) number(label string) float64 {
	return float64(rapid.IntRange(1, 32).Draw(d.t, label)) / 16
}

// wave draws a constant, a ramp, a swing that decays or a cubic.
func (d *drawing) wave() laplace.Waveform {
	g := laplace.Segment{A: d.number("a")}
	switch rapid.IntRange(0, 3).Draw(d.t, "wave") {
	case 1:
		g.B = d.number("b")
	case 3:
		g.B, g.Poly = d.number("b"), []float64{d.number("c"), -d.number("d")}
	case 2:
		g.Exp = []laplace.Exponential{{Amplitude: complex(d.number("e"), 0.25), Rate: complex(-d.number("r"), 1)}}
	}
	return laplace.Waveform{Before: g.A, Segments: []laplace.Segment{g}}
}

func (d *drawing) node(i int) {
	id := d.b.Node(fmt.Sprint("n", i), NoRef)
	d.nodes = append(d.nodes, id)
	kind := rapid.IntRange(0, 4).Draw(d.t, "kind")
	if i == 0 {
		kind = 0
	}
	switch kind {
	case 0:
		h, w := d.b.Hold(id, NoRef), d.wave()
		d.set = append(d.set, func(p *Params) { p.Wave[h] = w })
	case 1:
		d.capacity(id)
	case 2:
		m := melting{d.number("c"), d.number("latent"), d.number("at"), d.number("over")}
		e := d.b.Element(Shape{Name: fmt.Sprint("m", i), Ports: []NodeID{id}, Stores: true}, NoRef)
		d.set = append(d.set, func(p *Params) { p.Law[e] = m })
		if rapid.Bool().Draw(d.t, "two stores") {
			d.capacity(id)
		}
	}
}

func (d *drawing) capacity(id NodeID) {
	c, v := d.b.Capacity(id, NoRef), d.number("C")
	d.set = append(d.set, func(p *Params) { p.C[c] = v })
}

func (d *drawing) join(i, j int) {
	a, b := d.nodes[i], d.nodes[j]
	if rapid.Bool().Draw(d.t, "turned") {
		a, b = b, a
	}
	name := fmt.Sprintf("%d-%d", i, j)
	v, w := d.number("v"), d.number("w")
	switch kind := rapid.IntRange(0, 9).Draw(d.t, "branch"); kind {
	case 0:
		k := d.b.Resistance(name, a, b, NoRef)
		d.set = append(d.set, func(p *Params) { p.G[k] = v })
	case 1, 2, 3:
		k := d.b.Inertance(name, a, b, NoRef)
		d.set = append(d.set, func(p *Params) { p.L[k] = v })
		if kind > 1 {
			d.set = append(d.set, func(p *Params) { p.LR[k] = w })
		}
		if kind > 2 {
			d.b.Dropping(k)
			d.set = append(d.set, func(p *Params) { p.Drop[k] = pipeDrop{v, 0.25} })
		}
	case 4, 5:
		k := d.b.Between(name, a, b, kind == 5, NoRef)
		d.set = append(d.set, func(p *Params) { p.Law[k] = &Through{quadratic{v, 0.25}} })
		if kind == 5 {
			wave := d.wave()
			d.set = append(d.set, func(p *Params) { p.Drive[k][0] = wave })
		}
	case 6:
		k := d.b.Element(Shape{Name: name, Ports: []NodeID{a, b}, Joins: true}, NoRef)
		d.set = append(d.set, func(p *Params) { p.Law[k] = checking{quadratic{v, 0.25}} })
	case 7:
		k, wave := d.b.Element(Shape{Name: name, Ports: []NodeID{a, b}, Drives: []string{"speed of " + name}}, NoRef), d.wave()
		d.set = append(d.set, func(p *Params) { p.Law[k], p.Drive[k][0] = displacing{}, wave })
	case 8:
		k := d.b.Element(Shape{Name: name, Ports: []NodeID{a, b}, Unknowns: []Unknown{{Name: "flow", Scale: 1}}}, NoRef)
		d.set = append(d.set, func(p *Params) { p.Law[k] = filling{v, w, 0.25} })
	case 9:
		k := d.b.Element(Shape{Name: name, Ports: []NodeID{a, b}, Joins: true, Unknowns: []Unknown{{Name: "flow", Scale: 1, Algebraic: true}}}, NoRef)
		d.set = append(d.set, func(p *Params) { p.Law[k] = sluggish{filling{v, w, 0.25}} })
	}
}

// anyVector draws values for all unknowns, off the kinks.
func anyVector(t *rapid.T, n int) []float64 {
	x := make([]float64, n)
	for i := range x {
		x[i] = float64(rapid.IntRange(-64, 64).Draw(t, "x"))/16 + 1.0/128
	}
	return x
}

// differs tells whether two values differ by more than tol of size.
func differs(a, b, tol, size float64) bool { return !(math.Abs(a-b) <= tol*size) }
