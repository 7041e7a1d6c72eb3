package thermal

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// impedanceTable is [thermal.impedance.NAME]: a transient thermal impedance
// between a hot end and a cool one, as data sheets give it.
func impedanceTable() casefile.Table {
	// of a list of pairs, Dim and Min are those of the first of each
	pairs := func(name string, first, second casefile.Field, help string) casefile.Field {
		first.Name, first.Type, first.Second, first.Help = name, casefile.Pairs, &second, help
		return first
	}
	return casefile.Table{
		Name:  "impedance",
		Stage: 1,
		Help:  "a transient thermal impedance; the first-named end is the hot one",
		OneOf: [][]string{{"foster", "cauer"}},
		Fields: []casefile.Field{
			casefile.Between(),
			pairs("foster", casefile.Positive("", resistance, ""), casefile.Positive("τ", duration, "τ"),
				"terms R·(1 − exp(−t/τ)) of the impedance at the first end, as [R, τ]; built as the ladder equal to them"),
			pairs("cauer", casefile.Positive("", capacitance, ""), casefile.Positive("R", resistance, "R"),
				"cells [C, R] of a ladder; the first C lies at the first end, the last R ends at the second"),
			scaleField(),
		},
		Build:  buildImpedance,
		Derive: deriveImpedance,
	}
}

func buildImpedance(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	if d := tooLong(e); d != nil {
		return nil, d
	}
	cells := ladderOf(e)
	hot, far, faults := e.Ends()
	scale, wrong := casefile.ScalingOf(e, c, b)
	if faults = append(faults, wrong...); faults != nil {
		return nil, faults
	}
	n := cells.count()
	inner, faults := innerNodes(e, c, b, n-1)
	if faults != nil {
		return nil, faults
	}
	nodes := append(append([]network.NodeID{hot}, inner...), far)
	capacities := make([]network.CapacityID, n)
	for i := range capacities {
		capacities[i] = b.Capacity(nodes[i], e.Ref)
	}
	resistances := chain(e, b, nodes)
	return func(v casefile.Values, p *network.Params) error {
		var l ladder
		cells.read(v, &l)
		if !l.within(1e-90, 1e90) {
			return e.Fault("foster", "time constants so close together that no ladder of double precision is equal to them", "", "")
		}
		factor := scale.Factor(v, p)
		for i := range l.n {
			p.C[capacities[i]] = l.c[i]
			p.G[resistances[i]] = factor / l.r[i]
		}
		return nil
	}, nil
}

func tooLong(e *casefile.Element) []casefile.Diagnostic {
	for _, key := range []string{"foster", "cauer"} {
		if n := e.Len(key); n > maxTerms {
			return []casefile.Diagnostic{e.Fault(key, fmt.Sprintf("%d pairs", n), fmt.Sprintf("at most %d", maxTerms), "")}
		}
	}
	return nil
}

// cells are the pairs of an impedance as the case states them.
type cells struct {
	pairs  []pair
	foster bool
	group  []int // of a Foster term: the cell it belongs to; terms of one time constant share a cell
}

type pair struct{ first, second casefile.Slot }

// ladderOf reads the form that stands in the case.
func ladderOf(e *casefile.Element) (s cells) {
	key := "cauer"
	if e.Has("foster") {
		key, s.foster = "foster", true
	}
	for i := range e.Len(key) {
		at := fmt.Sprintf("%s[%d]", key, i)
		s.pairs = append(s.pairs, pair{e.Num(at + ".first"), e.Num(at + ".second")})
	}
	if s.foster {
		s.group = sameTimes(e)
	}
	return s
}

// sameTimes numbers the terms so that those written with the same time constant
// share a number: they are one exponential, and one cell of the ladder.
func sameTimes(e *casefile.Element) []int {
	group := make([]int, e.Len("foster"))
	seen := map[string]int{}
	for i := range group {
		text := e.Text(fmt.Sprintf("foster[%d].second", i))
		if q, err := quantity.Parse(text); err == nil { // "2 ms" and "0.002 s" are the same time
			text = fmt.Sprint(q.SI)
		}
		k, ok := seen[text]
		if !ok {
			k = len(seen)
			seen[text] = k
		}
		group[i] = k
	}
	return group
}

// count is the number of cells of the ladder.
func (s *cells) count() int {
	if !s.foster {
		return len(s.pairs)
	}
	n := 0
	for _, k := range s.group {
		n = max(n, k+1)
	}
	return n
}

// read computes the ladder of the values.
func (s *cells) read(v casefile.Values, l *ladder) {
	if !s.foster {
		l.n = len(s.pairs)
		for i, p := range s.pairs {
			l.c[i], l.r[i] = v.Num[p.first], v.Num[p.second]
		}
		return
	}
	var terms [maxTerms]term
	for i, p := range s.pairs {
		t := &terms[s.group[i]]
		t.r += v.Num[p.first]
		t.tau = v.Num[p.second]
	}
	l.fromFoster(terms[:s.count()])
}

func deriveImpedance(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	s := ladderOf(e)
	var l ladder
	s.read(v, &l)
	var list []casefile.Derivation
	total := 0.0
	for i := range l.n {
		total += l.r[i]
		c := casefile.Derivation{Quantity: fmt.Sprintf("C%d of %s", i+1, e.Name), Formula: "C", Source: e.Source(), SI: l.c[i], Dim: capacitance}
		r := casefile.Derivation{Quantity: fmt.Sprintf("R%d of %s", i+1, e.Name), Formula: "R", Source: e.Source(), SI: l.r[i], Dim: resistance}
		if s.foster {
			c.Formula = fmt.Sprintf("ladder equal to the %d Foster terms", len(s.pairs))
			r.Formula = c.Formula
		} else {
			c.Numbers, r.Numbers = e.Text(fmt.Sprintf("cauer[%d].first", i)), e.Text(fmt.Sprintf("cauer[%d].second", i))
		}
		list = append(list, c, r)
	}
	return append(list, casefile.Derivation{Quantity: "resistance of " + e.Name, Formula: "ΣR", Source: e.Source(), SI: total, Dim: resistance})
}
