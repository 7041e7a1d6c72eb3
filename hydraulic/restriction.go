package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// restrictionTable is [hydraulic.restriction.NAME]: what throttles a flow without storing
// anything or having any inertia.
func restrictionTable() casefile.Table {
	rated := casefile.Field{Name: "rated", Type: casefile.Group, Help: "a drop known at one flow: drop·(q/flow)^power",
		Fields: []casefile.Field{
			needed(casefile.Positive("flow", flow, "the flow")),
			needed(casefile.Positive("drop", pressure, "what is lost at it")),
			{Name: "power", Type: casefile.Number, HasMin: true, Min: 1, HasMax: true, Max: 2, Help: "of the flow: 1 creeping, 2 turbulent; 2 unless stated"},
		}}
	return casefile.Table{
		Name:  "restriction",
		Stage: 1,
		Help:  "what throttles a flow between two nodes: an orifice, a fitting, a valve",
		OneOf: [][]string{{"resistance", "rated", "orifice", "fitting", "valve"}},
		Fields: []casefile.Field{
			casefile.Between(),
			casefile.Positive("resistance", resistance, "R, pressure lost for each m³/s"),
			rated, orificeField(), fittingField(), valveField(),
			{Name: "scale", Type: casefile.Wave, HasMin: true, Help: "multiplies the flow that it passes; 0 shuts it"},
		},
		Build:  buildRestriction,
		Derive: deriveRestriction,
	}
}

// needed makes a field one that must be stated.
func needed(f casefile.Field) casefile.Field {
	f.Required = true
	return f
}

// A passage is a part with two ends while it is built.
type passage struct {
	e        *casefile.Element
	c        *casefile.Case
	b        *network.Builder
	from, to network.NodeID
	liquid   liquidSlots
}

func buildRestriction(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.Ends()
	if faults != nil {
		return nil, faults
	}
	r := &passage{e, c, b, from, to, liquidOf(c)}
	switch {
	case e.Has("resistance"):
		return r.buildResistance()
	case e.Has("rated"):
		return r.buildRated()
	case e.Has("orifice.pipe_bore"):
		return r.buildPlate()
	case e.Has("orifice"):
		return r.buildOrifice()
	case e.Has("fitting"):
		return r.buildFitting()
	}
	return r.buildValve()
}

// buildResistance adds one that is proportional: a branch of the network, which stays
// linear with it, unless its scale slides.
func (r *passage) buildResistance() (casefile.Setter, []casefile.Diagnostic) {
	slot := r.e.Num("resistance")
	if r.e.Has("scale") && casefile.NotInSteps(r.e, r.c, "scale", "") != nil {
		return r.between(func(v casefile.Values, _ *liquid, to *powerFlow) error {
			*to = straight(v.Num[slot])
			return nil
		}), nil
	}
	scale, faults := casefile.ScalingOf(r.e, r.c, r.b)
	if faults != nil {
		return nil, faults
	}
	id := r.b.Resistance(r.e.FullName(), r.from, r.to, r.e.Ref)
	return func(v casefile.Values, p *network.Params) error {
		p.G[id] = scale.Factor(v, p) / v.Num[slot]
		return nil
	}, nil
}

// between adds an element whose flow is a powerFlow.
func (r *passage) between(set func(v casefile.Values, l *liquid, to *powerFlow) error) casefile.Setter {
	return through(r, set)
}

// through adds an element of a network.Through whose Flow is an F, which set fills in.
func through[F any, P interface {
	*F
	network.Flow
}](r *passage, set func(v casefile.Values, l *liquid, to *F) error) casefile.Setter {
	e, liquid := r.e, r.liquid
	id := r.b.Between(e.FullName(), r.from, r.to, e.Has("scale"), e.Ref)
	return func(v casefile.Values, p *network.Params) error {
		l, err := liquid.liquid(v)
		if err != nil {
			return err
		}
		law, ok := p.Law[id].(*network.Through)
		if !ok {
			law = &network.Through{Flow: P(new(F))}
			p.Law[id] = law
		}
		if e.Has("scale") {
			p.Drive[id][0] = v.Wave[e.Wave("scale")]
		}
		return set(v, &l, law.Flow.(P))
	}
}

// buildRated adds one by a drop at a flow.
func (r *passage) buildRated() (casefile.Setter, []casefile.Diagnostic) {
	e := r.e
	at, lost, power := e.Num("rated.flow"), e.Num("rated.drop"), e.NumOr("rated.power", 2)
	return r.between(func(v casefile.Values, _ *liquid, to *powerFlow) error {
		n := v.Num[power]
		*to = powerFlow{v.Num[at] * math.Pow(v.Num[lost], -1/n), leastCore, n}
		return nil
	}), nil
}

// deriveRestriction shows what a restriction comes to.
func deriveRestriction(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	s := liquidOf(c)
	l, err := s.liquid(v)
	if err != nil {
		return nil
	}
	switch {
	case e.Has("resistance"):
		return []casefile.Derivation{stated(e, "resistance", "R", resistance, v)}
	case e.Has("valve"):
		return deriveValve(e, &s, &l, v)
	case e.Has("rated"):
		return nil
	case l.density == 0:
		return nil
	case e.Has("orifice.pipe_bore"):
		return derivePlate(e, &l, v)
	case e.Has("orifice"):
		k := v.Num[e.Num("orifice.coefficient")] * circle(v.Num[e.Num("orifice.bore")]) * math.Sqrt(2/l.density)
		return []casefile.Derivation{flowAtOneBar(e, "C·A·√(2Δp/ρ)", fmt.Sprintf("%s · π/4·(%s)² · √(2 bar/(%.6g kg/m³))", e.Text("orifice.coefficient"), e.Text("orifice.bore"), l.density), k)}
	}
	return deriveFitting(e, &l, v)
}

// flowAtOneBar is how a law of the square root of the drop is shown: what it passes at
// one bar.
func flowAtOneBar(e *casefile.Element, formula, numbers string, k float64) casefile.Derivation {
	const bar = 1e5
	return casefile.Derivation{Quantity: "flow of " + e.Name + " at 1 bar", Formula: formula, Numbers: numbers, Source: e.Source(), SI: k * math.Sqrt(bar), Dim: flow}
}

// millimetres puts a bore into words.
func millimetres(d float64) string { return fmt.Sprintf("%.6g mm", d*1e3) }
