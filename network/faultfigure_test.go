package network

import (
	"errors"
	"math"
	"strings"
	"testing"

	"lagbook/laplace"
)

// hasFigure checks that the first fault of an error says where the flow stands in its text.
func hasFigure(t *testing.T, err error, flow float64) {
	t.Helper()
	var (
		f      Fault
		steady *NoSteady
		params *ParamFault
	)
	switch {
	case errors.As(err, &steady):
		f.Text, f.Figure = steady.List[0].Text, steady.List[0].Figure
	case errors.As(err, &params):
		f = params.List[0]
	default:
		t.Fatalf("%v has no faults", err)
	}
	if f.Flow != flow || f.Text[f.From:f.To] != number(flow) {
		t.Errorf("%+v, want the flow %v where it stands in the text", f.Figure, flow)
	}
	if got, want := f.In(f.Text, "15 L/min"), strings.Replace(f.Text, number(flow), "15 L/min", 1); got != want {
		t.Errorf("written anew: %q, want %q", got, want)
	}
}

// A pump before a shut valve is named, and the valve, where a store stands between them.
func TestDeadHeadedStore(t *testing.T) {
	r := newRig()
	sump, end := r.held("sump", 0), r.held("drain", 0)
	a := r.store("a", 1)
	r.pump("feed pump", sump, a, 0.25)
	r.valve("v1", a, end, laplace.Constant(0))
	n, p := r.build(t)
	_, err := n.Begin(p)
	says(t, err, `node "a"`, `takes in 0.25 from "feed pump"`, `shut: "v1"`)
	hasFigure(t, err, 0.25)
}

// A text without a figure, and a flow that is no number, have none.
func TestNoFigure(t *testing.T) {
	if got := (Figure{}).In("as it was", "1 W"); got != "as it was" {
		t.Errorf("%q", got)
	}
	g := graph{nodes: []node{{name: "a"}}}
	if text, f := g.figured(0, "brings ", math.Inf(1), "!"); f != (Figure{}) || text != "brings more than can be computed!" {
		t.Errorf("%q, %+v", text, f)
	}
}

// leaking brings e^x: the more the higher the level.
type leaking struct{ drive float64 }

func (l leaking) Eval(s *Stamp) {
	s.F[0] = l.drive * math.Exp(min(s.X[0], 50))
	s.DF[0] = s.F[0]
}

// Where what is brought rises with the level faster than what is carried off, that is said,
// the part that brings it comes first, and a part made of two is named once. x less than
// drive·e^x for any x: the least excess of e^x/2 over x is 1 − ln 2 at x = ln 2.
func TestOutrunsInWords(t *testing.T) {
	b := NewBuilder()
	ambient, j := b.Node("ambient", 1), b.Node("j", 2)
	h := b.Hold(ambient, 3)
	c := b.Capacity(j, 4)
	g := b.Resistance("r", j, ambient, 5)
	leak := b.Element(Shape{Name: "leak", Ports: []NodeID{j}}, 6)
	again := b.Element(Shape{Name: "leak", Ports: []NodeID{j}}, 6)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := n.NewParams()
	p.Wave[h], p.C[c], p.G[g] = laplace.Constant(0), 1, 1
	p.Law[leak], p.Law[again] = leaking{0.25}, leaking{0.25}
	_, err = n.Begin(p)
	says(t, err, `(joined to it: "r" and "leak")`, `what "leak" brings rises with the level and outruns what is carried off`)
	var steady *NoSteady
	if !errors.As(err, &steady) || steady.List[0].Refs[0] != 6 {
		t.Errorf("%+v, want the leak first", steady)
	} else if f := steady.List[0]; math.Abs(f.Flow-(1-math.Ln2)) > 1e-3 {
		t.Errorf("the least excess is %v, want %v", f.Flow, 1-math.Ln2)
	}
}
