package casefile

import (
	"fmt"

	"lagbook/network/quantity"
)

// A moment is a time that a question names, with the slot of it, or two to be added up.
type moment struct {
	what  string
	slots [2]Slot
}

// moments lists the times that must lie in the run.
func (q *Questions) moments() (list []moment) {
	add := func(has bool, what string, s Slot) {
		if has {
			list = append(list, moment{what, [2]Slot{s, noSlot}})
		}
	}
	for i := range q.Transfers {
		x := &q.Transfers[i]
		add(x.HasAbout, "about", x.About)
	}
	for i := range q.Tables {
		x := &q.Tables[i]
		for _, s := range x.Times {
			add(true, "times", s)
		}
		add(x.HasTo, "to", x.To)
		add(x.HasFrom, "from", x.From)
	}
	for i := range q.Limits {
		x := &q.Limits[i]
		add(x.HasAfter, "after", x.After)
		add(x.HasUntil, "until", x.Until)
		if x.HasWithin && x.HasAfter {
			list = append(list, moment{"within", [2]Slot{x.Within, x.After}})
		} else {
			add(x.HasWithin, "within", x.Within)
		}
	}
	for i := range q.Results {
		x := &q.Results[i]
		add(x.HasAfter, "after", x.After)
	}
	return list
}

// beyond reports the times that lie beyond the run under a scenario, where it or they are
// others than in the case as written.
func (r *reader) beyond(s *Scenario, v Values) {
	q := &r.c.Questions
	if !q.HasTo {
		return
	}
	at := func(s Slot, num func(Slot) float64) float64 {
		if s == noSlot {
			return 0
		}
		return num(s)
	}
	end := v.Num[q.To]
	same := end == r.c.slots[q.To].si
	var late []Diagnostic
	for _, m := range q.moments() {
		t := at(m.slots[0], func(s Slot) float64 { return v.Num[s] }) + at(m.slots[1], func(s Slot) float64 { return v.Num[s] })
		written := at(m.slots[0], func(s Slot) float64 { return r.c.slots[s].si }) + at(m.slots[1], func(s Slot) float64 { return r.c.slots[s].si })
		if t <= end*(1+1e-12) || same && t == written {
			continue
		}
		x := &r.c.slots[m.slots[0]]
		if x.n == nil {
			continue
		}
		late = append(late, r.src.place(Diagnostic{Code: "beyond-the-run", Thing: x.owner.thing(), Text: fmt.Sprintf("%s: %s is beyond the run, which ends at %s",
			m.what, quantity.Duration(t), quantity.Duration(end)), Hint: "let the run go on for longer with [run] to"}, x.n.span))
	}
	r.reportAll(s.says(late))
}
