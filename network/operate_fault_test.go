package network

import (
	"errors"
	"math"
	"strings"
	"testing"

	"lagbook/laplace"
)

// A rig is a small network for tests of messages.
type rig struct {
	*Builder
	set []func(p *Params)
}

func newRig() *rig { return &rig{Builder: NewBuilder()} }

func (r *rig) held(name string, v float64) NodeID {
	id := r.Node(name, NoRef)
	h := r.Hold(id, NoRef)
	r.set = append(r.set, func(p *Params) { p.Wave[h] = laplace.Constant(v) })
	return id
}

func (r *rig) store(name string, c float64) NodeID {
	id := r.Node(name, NoRef)
	k := r.Capacity(id, NoRef)
	r.set = append(r.set, func(p *Params) { p.C[k] = c })
	return id
}

func (r *rig) source(name string, into NodeID, v float64) {
	s := r.Source(name, into, 1, NoRef)
	r.set = append(r.set, func(p *Params) { p.Wave[s] = laplace.Constant(v) })
}

// valve is an orifice whose drive is its opening.
func (r *rig) valve(name string, a, b NodeID, opening laplace.Waveform) ElementID {
	k := r.Between(name, a, b, true, NoRef)
	r.set = append(r.set, func(p *Params) { p.Law[k], p.Drive[k][0] = &Through{quadratic{1, 1e-3}}, opening })
	return k
}

func (r *rig) column(name string, a, b NodeID, l, lr float64) InertanceID {
	k := r.Inertance(name, a, b, NoRef)
	r.set = append(r.set, func(p *Params) { p.L[k], p.LR[k] = l, lr })
	return k
}

func (r *rig) element(s Shape, law Law, drives ...float64) ElementID {
	k := r.Element(s, NoRef)
	r.set = append(r.set, func(p *Params) {
		p.Law[k] = law
		for i, v := range drives {
			p.Drive[k][i] = laplace.Constant(v)
		}
	})
	return k
}

func (r *rig) pump(name string, from, to NodeID, q float64) {
	r.element(Shape{Name: name, Ports: []NodeID{from, to}, Drives: []string{"speed of " + name}}, displacing{}, q)
}

func (r *rig) build(t *testing.T) (*Network, *Params) {
	t.Helper()
	n, err := r.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	for _, f := range r.set {
		f(p)
	}
	return n, p
}

func says(t *testing.T, err error, words ...string) {
	t.Helper()
	if err == nil {
		t.Fatalf("no error, want one with %q", words)
	}
	for _, w := range words {
		if !strings.Contains(err.Error(), w) {
			t.Errorf("%v\ndoes not say %q", err, w)
		}
	}
}

func TestShutValveBehindPressure(t *testing.T) {
	r := newRig()
	main, end := r.held("main", 5), r.held("drain", 0)
	a, b := r.Node("a", NoRef), r.Node("b", NoRef)
	q := r.column("pipe", main, a, 2, 0.5)
	r.valve("v1", a, b, laplace.Constant(0))
	q2 := r.column("tail", b, end, 2, 0)
	n, p := r.build(t)
	s, err := n.Operate(p, 0, nil)
	if err != nil {
		t.Fatal(err)
	}
	if s.Levels[a] != 5 || s.Levels[b] != 0 || s.Flows[q] != 0 || s.Flows[q2] != 0 {
		t.Errorf("levels %v, flows %v, want 5 before the valve, 0 behind, no flow", s.Levels, s.Flows)
	}
}

// Dead-headed: nothing takes away what a pump or a source brings.
func TestDeadHeaded(t *testing.T) {
	r := newRig()
	sump, end := r.held("sump", 0), r.held("drain", 0)
	a, b := r.Node("a", NoRef), r.Node("b", NoRef)
	r.pump("feed pump", sump, a, 0.25)
	r.valve("v1", a, b, laplace.Constant(0))
	r.valve("v2", b, end, laplace.Constant(1))
	n, p := r.build(t)
	_, err := n.Operate(p, 0, nil)
	says(t, err, `node "a"`, `"feed pump" brings 0.25`, "nothing is open", `shut: "v1"`)
	_, err = n.Begin(p)
	says(t, err, `"feed pump" brings 0.25`)
	hasFigure(t, err, 0.25)

	r = newRig()
	end = r.held("drain", 0)
	a, b = r.Node("a", NoRef), r.Node("b", NoRef)
	r.source("inflow", a, 0.5)
	r.valve("v1", a, b, laplace.Constant(0))
	r.column("tail", b, end, 1, 1)
	n, p = r.build(t)
	_, err = n.Operate(p, 0, nil)
	says(t, err, `"inflow" brings 0.5`, `shut: "v1"`)
}

func TestOpenIslandWords(t *testing.T) {
	r := newRig()
	r.held("far", 1)
	far := NodeID(0)
	near := r.Node("near", NoRef)
	r.valve("v0", far, near, laplace.Constant(1))
	a, b := r.store("a", 1), r.store("b", 1)
	r.element(Shape{Name: "rad", Ports: []NodeID{a, b}, Joins: true}, &Through{radiating{1}})
	n, p := r.build(t)
	_, err := n.Begin(p)
	says(t, err, `nodes "a" and "b": have no path to a held node, so that any level is steady; a start must be given`)
	p.Start[a], p.HasStart[a], p.Start[b], p.HasStart[b] = 3, true, 4, true
	s, err := n.Begin(p)
	if err != nil {
		t.Fatal(err)
	}
	if s.Levels[a] != 3 || s.Levels[b] != 4 || !s.Beginning {
		t.Errorf("%+v", s)
	}
	r.source("heat", a, 2)
	n, p = r.build(t)
	_, err = n.Begin(p)
	says(t, err, `take in 2 from "heat" before t = 0, so that the level never settles`)
}

// bounded is a flow that cannot exceed 1.
type bounded struct{}

func (bounded) Flow(a, b float64) (q, da, db float64) {
	c := math.Cosh(max(min(a-b, 300), -300))
	return math.Tanh(a - b), 1 / (c * c), -1 / (c * c)
}

func TestNoBalanceNamesParts(t *testing.T) {
	r := newRig()
	out, hot := r.held("out", 0), r.store("hot", 1)
	r.element(Shape{Name: "film", Ports: []NodeID{hot, out}, Joins: true}, &Through{bounded{}})
	r.source("burner", hot, 2)
	n, p := r.build(t)
	_, err := n.Operate(p, 0, nil)
	var none *NoSteady
	if !errors.As(err, &none) || none.List[0].Reason != Unsolved && none.List[0].Reason != LevelOpen {
		t.Fatalf("%v", err)
	}
	says(t, err, `node "hot"`, `"film"`, `"burner"`)
}

func TestThermostatHasNoRest(t *testing.T) {
	r := newRig()
	out, room := r.held("out", 0), r.store("room", 1)
	wall := r.Resistance("wall", room, out, NoRef)
	r.set = append(r.set, func(p *Params) { p.G[wall] = 1 })
	heater := r.element(Shape{Name: "heater", Ports: []NodeID{room, room}}, thermostat{30, 19, 21})
	n, p := r.build(t)
	_, err := n.Operate(p, 0, nil)
	says(t, err, `"heater" switches to and fro`)
	p.Law[heater] = thermostat{20, 19, 21} // on for good
	s, err := n.Operate(p, 0, nil)
	if err != nil || math.Abs(s.Levels[room]-20) > 1e-9 {
		t.Errorf("%v, %v, want 20", s, err)
	}
	p.Law[heater] = thermostat{30, 19, 21}
	p.Start[room], p.HasStart[room] = 25, true
	s, err = n.Begin(p)
	if err != nil || s.Levels[room] != 25 || s.Modes[heater] != 1 {
		t.Errorf("%+v, %v, want 25, off", s, err)
	}
}

// What is answered for linear networks alone is refused by name for others.
func TestNonlinearIsRefused(t *testing.T) {
	r := newRig()
	a, b := r.held("a", 0), r.store("b", 1)
	r.element(Shape{Name: "rad", Ports: []NodeID{a, b}, Joins: true}, &Through{radiating{1}})
	n, p := r.build(t)
	_, reduce := n.Reduce(p, nil)
	_, start := n.Start(p)
	_, steady := n.SteadyState(p, []float64{0})
	p.StartCycle = true
	_, cycle := n.Begin(p)
	for _, err := range []error{reduce, start, steady, cycle} {
		var not *Nonlinear
		if !errors.As(err, &not) || not.Parts[0] != "rad" {
			t.Errorf("%v", err)
		}
	}
}

// A law that must know the start is told last, and what it then says is stored is.
func TestBeginTellsLaws(t *testing.T) {
	r := newRig()
	main, v := r.held("main", 5), r.Node("vessel", NoRef)
	gas := r.element(Shape{Name: "gas", Ports: []NodeID{v}, Stores: true, Memory: 2}, charged{0.5})
	r.valve("v1", main, v, laplace.Constant(1))
	n, p := r.build(t)
	for _, c := range []struct {
		stated        bool
		level, stored float64
	}{{false, 5, 8}, {true, 3, 7}} {
		p.Start[v], p.HasStart[v] = 3, c.stated
		s, err := n.Begin(p)
		if err != nil {
			t.Fatal(err)
		}
		e, err := n.newEquations(p)
		if err != nil {
			t.Fatal(err)
		}
		if err := e.enter(s, 0, 1); err != nil {
			t.Fatal(err)
		}
		x := e.vector(s)
		if math.Abs(s.Levels[v]-c.level) > 1e-9 || math.Abs(s.Mem[gas][0]-c.level) > 1e-9 || x[e.l.stored[v]] != c.stored {
			t.Errorf("%+v: level %v, memory %v, stored %v", c, s.Levels[v], s.Mem[gas], x[e.l.stored[v]])
		}
		flow := Output{Flow: &FlowTerm{Kind: PortFlow, Element: 1, Port: 1, Sign: 1}}
		supply := n.SupplyOf(main)
		if a, b := e.value(&flow, 0, x, nil), e.value(&supply, 0, x, nil); a != b || (a > 0) != c.stated {
			t.Errorf("%+v: %v flows in, %v is delivered", c, a, b)
		}
	}
}
