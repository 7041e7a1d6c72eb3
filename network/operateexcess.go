package network

import (
	"math"
	"slices"
	"strconv"
)

// excess is the fault of a node whose balance stays open by net, at the levels nearest to a
// steady state, where the equations are now.
func (r *resting) excess(n NodeID, net float64) SteadyFault {
	e, ids := r.e, []NodeID{n}
	f := SteadyFault{Nodes: ids, Refs: append(e.refsAt(n), e.g.refsOf(ids)...), Reason: Unsolved, Net: net}
	if math.IsNaN(net) || math.IsInf(net, 0) {
		f.Net = 0
	}
	outrun, refs := "", []Ref(nil)
	if f.Net > 0 {
		outrun, refs = e.outrunning(n)
	}
	f.Refs = append(refs, f.Refs...)
	f.Text, f.Figure = e.g.figured(n, e.g.named(ids)+": no steady state was found; what flows in exceeds what flows out by ", net,
		" at the levels nearest to one"+e.partsNamed(n)+outrun+"; a start must be given")
	return f
}

// outrunning says in words what brings the more the higher the level is, at a node or at
// what hangs together with it: where there is no steady state and more flows in than out,
// that is why.
func (e *equations) outrunning(at NodeID) (text string, refs []Ref) {
	var names []string
	for n := range e.g.nodes {
		if e.group[n] != e.group[at] {
			continue
		}
		for _, p := range e.tied.pushes[n] {
			s, el := &e.law[p.element], &e.g.elements[p.element]
			if s.shut || !(s.s.F[p.port] > 0) || !(s.s.DF[p.port*len(s.at)+p.port] > 0) {
				continue
			}
			if name := strconv.Quote(el.Name); !slices.Contains(names, name) {
				names, refs = append(names, name), append(refs, el.ref)
			}
		}
	}
	if len(names) == 0 {
		return "", nil
	}
	verb := " brings"
	if len(names) > 1 {
		verb = " bring"
	}
	return ": what " + listed(few(names)) + verb + " rises with the level and outruns what is carried off", refs
}
