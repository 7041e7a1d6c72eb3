package main

import (
	"fmt"
	"math"
	"slices"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/quantity"
	"lagbook/network/study"
)

// cycleDoc is the page of the verb cycle.
func cycleDoc(m *study.Model, a *study.Cycles) present.Doc {
	d := newDoc(m.Case)
	facts := func(x *study.Cycles) []present.Part {
		if len(x.Cycles) == 0 {
			return nil
		}
		list := scenarioFact(m.Case, scenariosOf(x.Cycles, func(c study.Cycle) string { return c.Scenario }))
		return []present.Part{present.Facts{List: append(append(list, cycleFacts(m.Show, x.Cycles)...), marchedFact(x)...)}}
	}
	if len(a.Each) == 0 {
		d.Parts = facts(a)
	}
	d.Parts = append(d.Parts, doubts(a.Evidence)...)
	for _, x := range a.Each {
		if d.Parts = append(d.Parts, facts(x)...); len(x.Cycles) > 0 {
			d.Parts = append(d.Parts, cyclePart(m, x.Cycles))
		}
	}
	if len(a.Cycles) > 0 && len(a.Each) == 0 {
		d.Parts = append(d.Parts, cyclePart(m, a.Cycles))
	}
	d.Parts = append(d.Parts, eventsParts(m.Show, a.Evidence)...)
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// cycleFacts are the answer in two lines: the period, and what comes to it last.
func cycleFacts(p study.Printer, list []study.Cycle) []present.Fact {
	facts := []present.Fact{{Name: "Period", Value: p.Time(list[0].Period)}}
	last := -1
	for i, c := range list {
		if c.Cycles != nil && (last < 0 || *c.Cycles > *list[last].Cycles) {
			last = i
		}
	}
	if last < 0 && moves(list) {
		return facts // a rhythm of its own, which no start is counted from
	}
	if last < 0 {
		return append(facts, present.Fact{Name: "Answer", Value: "nothing that is shown moves with the loads"})
	}
	c := list[last]
	value := "everything shown is within 2 % of its swing of the steady cycle from the start"
	if *c.Cycles > 0 {
		value = fmt.Sprintf("everything shown is within 2 %% of its swing of the steady cycle after %s, %s last", periods(p, *c.Cycles), c.Output)
	}
	return append(facts, present.Fact{Name: "Answer", Value: value})
}

// moves reports whether anything shown moves.
func moves(list []study.Cycle) bool {
	return slices.ContainsFunc(list, func(c study.Cycle) bool { return c.Max > c.Min })
}

// marchedFact says how many periods were marched to find the cycle.
func marchedFact(a *study.Cycles) []present.Fact {
	if a.Periods == 0 {
		return nil
	}
	return []present.Fact{{Name: "Marched", Value: fmt.Sprintf("%d periods from the start", a.Periods)}}
}

func periods(p study.Printer, n float64) string {
	if n == 1 {
		return "1 period"
	}
	return quantity.Number(n, 12) + " periods"
}

// cyclePart is the table of cycles.
func cyclePart(m *study.Model, list []study.Cycle) present.Table {
	p := m.Show
	right := func(head string) present.Column { return present.Column{Head: head, Align: present.Right} }
	t := present.Table{
		Caption:  "The steady cycle (times count from t = 0 of the run)",
		Columns:  []present.Column{{Head: "of"}, right("highest"), right("at"), right("lowest"), right("at"), right("swing"), right("mean"), right("periods to 2 %")},
		FullHead: []string{"of", "scenario", "unit", "kind", "period / s", "highest", "at / s", "lowest", "at / s", "mean", "periods to 2 %"},
	}
	for _, c := range list {
		swing := c.Kind
		if swing == "level" {
			swing = "difference"
		}
		after := "–"
		if c.Cycles != nil {
			after = quantity.Number(*c.Cycles, 12)
		}
		t.Rows = append(t.Rows, []string{c.Output, p.Value(c.Max, c.Unit, c.Kind), cycleTime(m, c.MaxAt), p.Value(c.Min, c.Unit, c.Kind), cycleTime(m, c.MinAt),
			p.Value(c.Max-c.Min, c.Unit, swing), p.Value(c.Mean, c.Unit, c.Kind), after})
		t.Full = append(t.Full, []string{c.Output, c.Scenario, c.Unit, c.Kind, full(c.Period), full(c.Max), full(c.MaxAt), full(c.Min), full(c.MinAt), full(c.Mean), fullOf(c.Cycles)})
	}
	if len(list) == 0 || list[0].Scenario == "" {
		dropFull(&t, "scenario")
	}
	return t
}

// cycleTime prints a time in the run and, where the case has a clock, what that says.
func cycleTime(m *study.Model, t float64) string {
	s := m.Show.Time(t)
	q := &m.Case.Questions
	if !q.HasClock {
		return s
	}
	minutes := int(math.Mod(math.Round((q.Clock+t)/60), 24*60))
	return fmt.Sprintf("%s (%02d:%02d)", s, minutes/60, minutes%60)
}
