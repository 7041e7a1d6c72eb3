package network

import (
	"errors"
	"math"
	"slices"
	"strconv"
	"strings"

	"lagbook/network/internal/sparse"
)

// project changes x as little as it takes to agree with the algebraic rows at t: first
// the flows of inertances that meet at joints (they keep the momentum they have
// together, and what is shut stops), then the algebraic unknowns. Call it after enter.
// It returns *ParamFault where something presses into what is shut.
func (e *equations) project(t float64, x []float64) error {
	if err := e.projectKeeping(t, x, nil); err != nil {
		return err
	}
	return e.pressed(x)
}

// projectKeeping is project; flows that are stated stay as they are.
func (e *equations) projectKeeping(t float64, x []float64, stated []bool) error {
	for b, shut := range e.now.Shut {
		if shut {
			x[e.l.flow[b]] = 0
		}
	}
	if err := e.meetFlows(t, x, stated); err != nil {
		return err
	}
	var pins []pin
	for row, m := range e.m {
		if m != 0 {
			pins = append(pins, pin{int32(row), e.slot(int32(row), int32(row)), int32(row)})
		}
	}
	if len(pins) == e.l.size {
		return nil
	}
	err := e.solver().solve(t, x, pins)
	var open *sparse.Singular
	switch {
	case errors.As(err, &open):
		return &ParamFault{List: []Fault{e.undetermined(open.Column)}}
	case err != nil:
		return &ParamFault{List: []Fault{e.unsolved(t, x)}}
	}
	return nil
}

// undetermined is the fault of an unknown that the algebraic rows leave open.
func (e *equations) undetermined(column int) Fault {
	if n, ok := e.nodeAt(column); ok {
		id := []NodeID{n}
		return Fault{Code: Undetermined, Nodes: id, Refs: append(e.refsAt(n), e.g.refsOf(id)...), Text: e.g.named(id) + ": has no capacity, and " +
			"as its parts stand nothing determines its level"}
	}
	name, refs := e.unknownAt(column)
	return Fault{Code: Undetermined, Nodes: nil, Refs: refs, Text: name + ": nothing determines it"}
}

// unsolved is the fault of algebraic rows without a solution, about the row that is
// furthest from one.
func (e *equations) unsolved(t float64, x []float64) Fault {
	s := e.solver()
	e.jacobian(t, x, s.f, nil, s.jac)
	s.pinRows()
	s.weigh()
	worst, most := 0, -1.0
	for row, v := range s.f {
		if r := math.Abs(v) / max(s.weight[row], math.SmallestNonzeroFloat64); e.m[row] == 0 && r > most && !math.IsInf(r, 0) {
			worst, most = row, r
		}
	}
	f := e.undetermined(worst)
	f.Text = "no level was found at which all that flows in and out sums to zero: " + f.Text
	if n, ok := e.nodeAt(worst); ok {
		f.Text = e.g.named([]NodeID{n}) + ": no level was found at which what flows in and out sums to zero" + e.partsNamed(n)
	}
	return f
}

// nodeAt tells which node's level or balance stands at a place.
func (e *equations) nodeAt(place int) (NodeID, bool) {
	for i := range e.l.level {
		if !e.g.isHeld(NodeID(i)) && (int(e.l.level[i]) == place || int(e.l.balance[i]) == place) {
			return NodeID(i), true
		}
	}
	return 0, false
}

// unknownAt names a flow or an unknown of an element.
func (e *equations) unknownAt(place int) (string, []Ref) {
	for b, at := range e.l.flow {
		if int(at) == place {
			return "inertance " + strconv.Quote(e.g.inertances[b].name), []Ref{e.g.inertances[b].ref}
		}
	}
	for k, places := range e.l.unknown {
		for u, at := range places {
			if int(at) == place {
				el := &e.g.elements[k]
				return el.Unknowns[u].Name + " of " + strconv.Quote(el.Name), []Ref{el.ref}
			}
		}
	}
	return "", nil
}

// pressed finds what brings a flow into nodes that nothing leads out of: a source or a
// pump before what is shut.
func (e *equations) pressed(x []float64) error {
	var faults []Fault
	for k := range e.top.kept {
		m := &e.top.kept[k]
		if net, t := e.presses(m, x); net != 0 {
			faults = append(faults, e.pressing(m, t, x))
		}
	}
	if len(faults) > 0 {
		return &ParamFault{List: faults}
	}
	return nil
}

// looks are the shares of a stretch at which it is seen whether anything presses.
var looks = [...]float64{0, 1e-6, 1e-3, 0.11, 0.37, 0.5, 0.73, 1}

// presses returns the first flow in the stretch into a group that nothing leads out of, and
// when; 0 where there is none but rounding.
func (e *equations) presses(m *meeting, x []float64) (net, t float64) {
	var nets [len(looks)]float64
	most := 0.0
	for i, share := range looks {
		size := 0.0
		e.bringing(m, e.t0+share*(e.t1-e.t0), x, func(v float64, _ string, _ Ref) {
			nets[i], size = nets[i]+v, size+math.Abs(v)
		})
		most = max(most, size)
	}
	for i, v := range nets {
		if math.Abs(v) > 1e-12*most {
			return v, e.t0 + looks[i]*(e.t1-e.t0)
		}
	}
	return 0, 0
}

// bringing visits the sources and elements that bring a flow into a group at t.
func (e *equations) bringing(m *meeting, t float64, x []float64, visit func(v float64, name string, ref Ref)) {
	e.fill(t, x)
	e.sum()
	for _, n := range m.whole {
		for _, k := range e.tied.sources[n] {
			in := &e.g.inputs[k]
			visit(in.sign*e.z[e.l.source[k]], in.name, in.ref)
		}
		for _, p := range e.tied.pushes[n] {
			if s, el := &e.law[p.element], &e.g.elements[p.element]; !s.shut && len(s.rows) > 0 && !s.passive {
				visit(s.s.F[p.port], el.Name, el.ref)
			}
		}
	}
}

// pressing is the fault of what flows into a group that nothing leads out of at t.
func (e *equations) pressing(m *meeting, t float64, x []float64) Fault {
	net := 0.0
	var names []string
	var refs []Ref
	e.bringing(m, t, x, func(v float64, name string, ref Ref) {
		if net += v; v != 0 {
			names, refs = append(names, strconv.Quote(name)), append(refs, ref)
		}
	})
	verb := " brings "
	if len(names) > 1 {
		verb = " bring "
	}
	what := ", and nothing is open to take it away"
	if net < 0 {
		verb, what = strings.Replace(verb, "bring", "take", 1), ", and nothing is open to bring it"
	}
	text, figure := e.g.figured(m.whole[0], e.g.named(m.whole)+": "+listed(names)+verb, math.Abs(net), what+e.shutNamed(m.whole))
	return Fault{Code: NoWayOut, Nodes: slices.Clone(m.whole), Refs: append(refs, e.g.refsOf(m.whole)...), Text: text, Figure: figure}
}

// listed writes "a, b and c".
func listed(names []string) string {
	switch n := len(names); n {
	case 0:
		return ""
	case 1:
		return names[0]
	default:
		s := names[0]
		for _, name := range names[1 : n-1] {
			s += ", " + name
		}
		return s + " and " + names[n-1]
	}
}
