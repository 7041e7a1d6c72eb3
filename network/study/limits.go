package study

import (
	"fmt"
	"math"
	"slices"
	"strconv"

	"lagbook/laplace"
	"lagbook/network/casefile"
)

// A trial is one limit on one output: what is needed to judge it.
type trial struct {
	ask          casefile.AskLimit
	show         shown
	resp         answers
	t0, t1       float64 // the window
	run          float64 // end of the run, or of what is known of it
	stopped      string  // why a march had to stop before the end of the run, "" where it did not
	cycle        float64 // the period of the periodic state that is judged, 0 for the run
	midnight     float64 // s, the first at or after t = 0
	begin        float64 // the value at the start of the run
	level        float64
	after, until *float64 // as asked
	allowed      float64  // within, s
	lessThan     float64  // of time_above, s
	margin       float64  // asked for, in the limit's unit
	slack        float64  // rounding error of the response
	print        Printer
}

// Limits judges each [limit]. Roots and extremes are those of the closed form,
// never samples.
func (m *Model) Limits() (*Limits, error) {
	asks := m.limitAsks()
	if err := m.wantLimits(); err != nil {
		return nil, err
	}
	a := &Limits{Title: m.Case.Title, Limits: []Limit{}, Met: true}
	var warn []Warning
	if len(asks) == 0 {
		warn = append(warn, Warning{noLimits, "the case states no [limit]: there is nothing to judge"})
		a.Evidence = m.evidence(warn)
		return a, nil
	}
	if err := m.wantNamed(); err != nil {
		return nil, err
	}
	resp, err := m.response()
	if err != nil {
		return nil, err
	}
	cycle := &periodic{m: m}
	for _, l := range asks {
		v, w, err := m.limit(resp, cycle, l)
		if err != nil {
			return nil, err
		}
		a.Limits = append(a.Limits, v)
		a.Met = a.Met && v.Met
		warn = append(warn, w...)
	}
	govern(a.Limits)
	more, err := m.named(&a.Results, &a.Finds)
	if err != nil {
		return nil, err
	}
	warn = append(append(warn, more...), m.grows()...)
	a.Evidence = m.evidence(warn)
	return a, nil
}

// limit judges one limit; of several outputs the worst decides.
func (m *Model) limit(resp answers, cycle *periodic, ask casefile.AskLimit) (Limit, []Warning, error) {
	var worst Limit
	var warn []Warning
	if ask.InCycle {
		var err error
		if resp, warn, err = cycle.answers(); err != nil {
			return m.unjudgedInCycle(ask, err)
		}
	}
	for i, s := range ask.Of {
		w, err := m.want(s, ask.Above)
		if err != nil {
			return worst, nil, err
		}
		t := m.trial(resp, ask, w)
		if ask.InCycle {
			t.inCycle(cycle)
		}
		v, more := t.judge()
		warn = append(warn, more...)
		if i == 0 || worse(v, worst) {
			worst = v
		}
	}
	if n := len(ask.Of); n > 1 {
		worst.Among = n
		worst.Text = worst.Of + ", the worst of " + strconv.Itoa(n) + ": " + worst.Text
	}
	return worst, warn, nil
}

// trial gathers what a limit on one output needs.
func (m *Model) trial(resp answers, ask casefile.AskLimit, w shown) *trial {
	num := m.val.Num
	t := &trial{ask: ask, show: w, resp: resp, run: m.reach(), t1: m.until, begin: m.beginning(w), level: num[ask.Level], slack: resp.Rounding(w.out), print: m.Show}
	if ask.HasAfter {
		t.t0 = num[ask.After]
		after := t.t0
		t.after, t.begin = &after, resp.Left(w.out, after)
	}
	if ask.HasUntil {
		t.t1 = num[ask.Until]
		until := t.t1
		t.until = &until
	}
	if ask.HasWithin {
		t.allowed = num[ask.Within]
	}
	if ask.Kind == casefile.TimeAbove {
		t.lessThan = num[ask.LessThan]
	}
	if ask.HasMargin {
		t.margin = num[ask.Margin] * t.marginOf()
	}
	if q := &m.Case.Questions; q.HasClock {
		t.midnight = math.Mod(day-math.Mod(q.Clock, day), day)
	}
	if a := m.marchedEvidence(); a != nil {
		t.stopped = a.Stopped
	}
	return t
}

// judge gives the verdict, and warns where the window does not lie in the run or
// nothing happens in it.
func (t *trial) judge() (Limit, []Warning) {
	v := Limit{Name: t.ask.Name, Of: t.show.name, Unit: t.show.unit, Kind: t.show.kind, After: t.after, Until: t.until, Percentage: t.ask.Percent, Demand: t.ask.Kind.String()}
	if t.ask.Above != "" {
		v.Of += " above " + t.ask.Above
	}
	level := t.level
	v.Level, v.LevelUnit = &level, t.show.unit
	var warn []Warning
	asked := t.t1
	switch {
	case t.stopped != "":
		t.t1 = min(t.t1, t.run)
	case t.t1 > t.run*(1+1e-12):
		warn = append(warn, t.warning("beyond-the-run", fmt.Sprintf("its window ends at %s, the run at %s: judged as far as the run goes", t.print.Time(t.t1), t.print.Time(t.run))))
		t.t1 = t.run
	}
	if t.t0 >= t.t1 {
		v.Text = "cannot be judged: its window lies beyond the run"
		if t.stopped != "" {
			v.Text, v.NotJudged = "cannot be judged: "+t.stopped, true
		}
		return v, append(warn, t.warning("beyond-the-run", v.Text))
	}
	if p := t.impulses(); len(p) > 0 {
		v.Text = "cannot be judged: " + t.print.impulseWords(t.show, p) + " lies in its window, a peak without a height that lasts no time"
		return v, append(warn, t.warning("impulse", v.Text+"; after = … leaves it out"))
	}
	switch t.ask.Kind {
	case casefile.StayBelow, casefile.StayAbove:
		warn = append(warn, t.stay(&v)...)
	case casefile.Reach:
		warn = append(warn, t.reach(&v)...)
	case casefile.Settle:
		warn = append(warn, t.settle(&v)...)
	case casefile.OvershootBelow:
		warn = append(warn, t.overshoot(&v)...)
	case casefile.SwingBelow:
		warn = append(warn, t.swing(&v)...)
	case casefile.RateBelow, casefile.RiseRateBelow, casefile.FallRateBelow:
		warn = append(warn, t.rate(&v)...)
	case casefile.TimeAbove:
		warn = append(warn, t.timeAbove(&v)...)
	}
	if t.cycle > 0 {
		v.In = "cycle"
		v.Text = "in the cycle of " + t.print.Time(t.cycle) + ": " + v.Text
	}
	if t.stopped != "" && asked > t.run {
		t.unjudged(&v)
		return v, warn
	}
	if !slices.ContainsFunc(warn, func(w Warning) bool { return w.Code == nothingChanges || w.Code == "true-at-start" }) && t.still() {
		warn = append(warn, t.warning(nothingChanges, t.show.name+" does not change in the window: does its load reach its value before the run begins?"))
	}
	return v, warn
}

// unjudged takes back what a march that had to stop does not show: a limit that was
// failed before stays failed, a level that was reached stays reached, all else is open.
func (t *trial) unjudged(v *Limit) {
	switch {
	case v.FirstOutside != nil:
		return
	case t.ask.Kind == casefile.Reach && v.At != nil:
		return
	case t.ask.Kind >= casefile.SwingBelow && v.Margin != nil && *v.Margin < 0:
		return // what goes on makes a swing, a rate or a time no smaller
	}
	so := ""
	if v.Text != "" {
		so = "; so far: " + v.Text
	}
	v.Text = "cannot be judged: " + t.stopped + so
	v.Met, v.Margin, v.Percent, v.NotJudged = false, nil, nil, true
}

// impulses are those in the window that leave nothing to judge: of what is to stay on
// one side of a level, those towards it.
func (t *trial) impulses() (list []laplace.Impulse) {
	for _, p := range impulsesIn(t.resp, t.show.out, t.t0, t.t1) {
		if t.ask.Kind == casefile.StayBelow && p.Weight < 0 || t.ask.Kind == casefile.StayAbove && p.Weight > 0 {
			continue
		}
		list = append(list, p)
	}
	return list
}

// Codes of warnings that others look for.
const (
	noLimits       = "no-limits"       // there is nothing to judge
	nothingChanges = "nothing-changes" // in a table, or in the window of a limit
)

func (t *trial) warning(code, text string) Warning {
	return Warning{code, fmt.Sprintf("limit %q: %s", t.ask.Name, text)}
}

// still reports whether the output is constant over the window. A few values
// tell at once that it is not; only then are its extremes looked for.
func (t *trial) still() bool {
	y0 := t.resp.At(t.show.out, t.t0)
	for k := 1.0; k <= 4; k++ {
		if y := t.resp.At(t.show.out, t.t0+(t.t1-t.t0)*k/4); math.Abs(y-y0) > math.Max(1e-9*math.Abs(y0), math.Max(1e-6*speck(t.show.unit), 4*t.slack)) {
			return false
		}
	}
	hi, lo := t.resp.Max(t.show.out, t.t0, t.t1), t.resp.Min(t.show.out, t.t0, t.t1)
	return hi.Y-lo.Y <= math.Max(1e-9*math.Abs(hi.Y), math.Max(1e-6*speck(t.show.unit), 4*t.slack))
}

// value prints a value of the limit's output; gap one that is a difference of two.
func (t *trial) value(v float64) string { return t.print.Value(v, t.show.unit, t.show.kind) }

// apart prints a value with as many digits as tell it from the level.
func (t *trial) apart(v float64) string {
	p := t.print
	for p.digits < 12 && v != t.level && p.Value(v, t.show.unit, t.show.kind) == p.Value(t.level, t.show.unit, t.show.kind) {
		p.digits++
	}
	return p.Value(v, t.show.unit, t.show.kind)
}

func (t *trial) gap(v float64) string {
	if t.show.kind == kindLevel {
		return t.print.Value(v, t.show.unit, kindDifference)
	}
	return t.value(v)
}

// beginning is the value of an output just before t = 0, where the start is a
// steady state; else the value the run begins with.
func (m *Model) beginning(w shown) float64 {
	if o := &m.outs[w.out]; len(o.Terms) > 0 {
		if s, err := m.startLevels(); err == nil {
			sum := o.Constant
			for _, term := range o.Terms {
				sum += term.Coef * (s[term.Node] - m.par.Datum[term.Node])
			}
			return sum
		}
	}
	return m.resp.At(w.out, 0)
}

// startLevels are the levels at the start by NodeID, those of the network.
func (m *Model) startLevels() ([]float64, error) {
	if m.Nonlinear() {
		s, err := m.begin()
		if err != nil {
			return nil, err
		}
		return s.Levels, nil
	}
	s, err := m.startState()
	if err != nil {
		return nil, err
	}
	return s.Levels, nil
}
