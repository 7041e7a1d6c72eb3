package study

import (
	"fmt"
	"math"
	"slices"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// sizing is one question of size on its way to an answer.
type sizing struct {
	m         *Model // a copy: set to each value in turn, never read anew
	ask       casefile.AskSize
	base      []quantity.Value // the given values as written
	vary      int
	unit      string
	kind      string
	scenarios []*casefile.Scenario
	scales    map[[2]string]float64 // by limit and scenario: what margins are counted in
	margin    float64               // asked for
	tried     int
	warnings  []Warning // of the last value tried
	notes     []Warning // on the search
	refused   *Refusal
}

// A sized is how the limits stand at one value: least is the margin of the limit that
// decides, less the margin asked for, in its own scale; −∞ where it cannot be judged.
type sized struct {
	v        float64
	least    float64
	limit    Limit
	need     float64
	scenario string
	why      string           // what could not be computed
	given    []quantity.Value // where more than v is set: by a part
}

// newSizing prepares a question.
func (m *Model) newSizing(ask casefile.AskSize) (*sizing, error) {
	z := &sizing{m: m.copied(), ask: ask, base: m.Case.GivenValues(), scales: map[[2]string]float64{}}
	z.vary, _ = m.Case.GivenIndex(ask.Vary)
	own := z.base[z.vary]
	z.unit, z.kind = unitOf(own.Dim), kindOf(own.Kind)
	if own.Dim == dims["Pa"] && own.Kind != quantity.Plain && own.Kind != quantity.Difference {
		z.kind = kindLevel
	}
	if ask.HasMargin {
		z.margin = m.val.Num[ask.Margin]
	}
	z.m.par = nil // that of m stays as it is
	if ds := z.m.put(nil, nil); casefile.Failed(ds) {
		return nil, &Refusal{ds}
	}
	z.m.outs, z.m.shows, z.m.index = nil, nil, map[string]int{} // those of the limits it is to meet alone
	for _, l := range m.Case.Questions.Limits {
		if !z.toMeet(l.Name) {
			continue
		}
		for _, s := range l.Of {
			if _, err := z.m.want(s, l.Above); err != nil {
				return nil, err
			}
		}
	}
	var err error
	if z.scenarios, err = m.Scenarios(nil); err != nil {
		return nil, err
	}
	return z, z.limited()
}

// limited refuses a size none of whose limits holds under any scenario.
func (z *sizing) limited() error {
	for _, s := range z.scenarios {
		for _, l := range z.m.Case.Questions.Limits {
			if z.toMeet(l.Name) && (s == nil || s.Limits == nil || slices.Contains(s.Limits, l.Name)) {
				return nil
			}
		}
	}
	return &Refusal{[]casefile.Diagnostic{z.m.Case.Diagnose(z.ask.Ref, "no-limits", "no scenario asks for a limit that it is to meet", "name such limits in to_meet, or in the limits of a scenario")}}
}

// toMeet reports whether a limit is among those to be met.
func (z *sizing) toMeet(name string) bool {
	return z.ask.ToMeet == nil || slices.Contains(z.ask.ToMeet, name)
}

// with are the given values with the one that is sized set to v.
func (z *sizing) with(v float64) []quantity.Value {
	list := slices.Clone(z.base)
	z.set(list, z.vary, v)
	return list
}

// set sets one given value, in SI; of a pressure level as the case states levels.
func (z *sizing) set(list []quantity.Value, i int, v float64) {
	x := &list[i]
	x.SI, x.Exact, x.Text = v, nil, ""
	if x.Dim == dims["Pa"] && x.Kind != quantity.Plain && x.Kind != quantity.Difference {
		x.Kind = quantity.Level
	}
}

// at judges the limits with the given value at v.
func (z *sizing) at(v float64) sized {
	p := z.judge(z.with(v))
	p.v = v
	return p
}

// judge judges the limits under each scenario; the least margin decides.
func (z *sizing) judge(given []quantity.Value) sized {
	z.tried++
	worst := sized{least: math.Inf(1)}
	for _, s := range z.scenarios {
		p := z.under(s, given)
		if s != nil {
			p.scenario = s.Name
		}
		if p.least < worst.least {
			worst = p
		}
		if math.IsInf(worst.least, -1) {
			break
		}
	}
	return worst
}

// under judges the limits that hold under one scenario.
func (z *sizing) under(s *casefile.Scenario, given []quantity.Value) sized {
	m, worst := z.m, sized{least: math.Inf(1)}
	if ds := m.put(s, given); casefile.Failed(ds) {
		if z.refused == nil {
			z.refused = &Refusal{ds}
		}
		return sized{least: math.Inf(-1), why: firstFault(ds)}
	}
	resp, err := m.response()
	if err != nil {
		return sized{least: math.Inf(-1), why: err.Error()}
	}
	cycle := &periodic{m: m}
	for _, ask := range m.limitAsks() {
		if !z.toMeet(ask.Name) {
			continue
		}
		v, warn, err := m.limit(resp, cycle, ask)
		if err != nil {
			return sized{least: math.Inf(-1), limit: Limit{Name: ask.Name}, why: err.Error()}
		}
		z.warnings = append(z.warnings, warn...)
		if p := z.weigh(v, ask); p.least < worst.least {
			worst = p
		}
	}
	return worst
}

// firstFault is what the first error among diagnostics says.
func firstFault(ds []casefile.Diagnostic) string {
	for _, d := range ds {
		if d.Severity == casefile.Error {
			return d.Thing + ": " + d.Text
		}
	}
	return ""
}

// weigh counts the margin of a verdict, less the one asked for, in the scale of the limit.
func (z *sizing) weigh(v Limit, ask casefile.AskLimit) sized {
	p := sized{limit: v}
	if v.MarginAsked != nil {
		p.need = *v.MarginAsked
	}
	own := p.need
	if z.ask.HasMargin {
		asked := z.margin
		if z.ask.MarginShare {
			asked *= z.whole(v, ask)
		}
		p.need = max(p.need, asked)
	}
	switch {
	case v.Margin == nil && v.Met:
		p.least = math.Inf(1)
	case v.Margin == nil || !v.Met && *v.Margin >= own: // not reached, or not to be judged
		p.least = math.Inf(-1)
	default:
		p.least = (*v.Margin - p.need) / z.scale(v, ask)
	}
	return p
}

// whole is what a share of the margin is a share of, in the unit of the margin.
func (z *sizing) whole(v Limit, ask casefile.AskLimit) float64 {
	num := z.m.val.Num
	switch ask.Kind {
	case casefile.Reach, casefile.Settle:
		return num[ask.Within]
	case casefile.TimeAbove:
		return num[ask.LessThan]
	}
	return math.Abs(num[ask.Level])
}

// scale is what the margin of a limit is counted in: the way from the start to the level
// where there is one, as it is at the first value tried.
func (z *sizing) scale(v Limit, ask casefile.AskLimit) float64 {
	key := [2]string{ask.Name, z.m.Scenario()}
	if s, ok := z.scales[key]; ok {
		return s
	}
	s := z.whole(v, ask)
	if v.Percent != nil && *v.Percent != 0 && *v.Margin != 0 {
		s = math.Abs(100 * *v.Margin / *v.Percent)
	}
	if !(s > 0) || math.IsInf(s, 0) {
		s = 1
	}
	z.scales[key] = s
	return s
}

// meets reports whether every limit is met there.
func (p sized) meets() bool { return p.least >= 0 }

// just reports whether the limit that decides is met with no more than the margin asked for.
func (p sized) just() bool { return math.Abs(p.least) < 1e-6 }

// margins prints a margin in the unit of its limit.
func (z *sizing) margins(v float64, unit string) string {
	if unit == "1" {
		return z.m.Show.Percent(v)
	}
	return z.m.Show.Value(v, unit, kindDifference)
}

// value prints a value of what is sized, finely enough to order it by.
func (z *sizing) value(v float64) string {
	p := z.m.Show
	p.digits = max(p.digits, 6)
	return p.Value(v, z.unit, z.kind)
}

// stands says how the limit that decides stands.
func (z *sizing) stands(p sized) string {
	where := ""
	if p.scenario != "" {
		where = " under " + p.scenario
	}
	switch {
	case p.limit.Name == "":
		if p.why != "" {
			return "it cannot be computed" + where + ": " + p.why
		}
		return "no limit holds"
	case p.why != "":
		return p.limit.Name + where + " cannot be judged: " + p.why
	}
	if p.just() {
		spare := "nothing"
		if p.need > 0 {
			spare = "just the " + z.margins(p.need, p.limit.Unit) + " asked for"
		}
		return fmt.Sprintf("%s%s decides: %s leaves %s to spare", p.limit.Name, where, p.limit.Of, spare)
	}
	return fmt.Sprintf("%s%s decides: %s", p.limit.Name, where, p.limit.Text)
}
