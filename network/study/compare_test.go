package study_test

import (
	"fmt"
	"strings"
	"testing"

	"lagbook/network/study"
)

// Two cases: what is written otherwise, but not what is the same in other units; parts that
// only one has; and what comes out of each.
func TestCompare(t *testing.T) {
	a := body + "[run]\nto = \"1 h\"\n[[table]]\ntitle = \"T\"\nshow = [\"body\"]\nevery = \"10 min\"\n[limit.hot]\nof = \"body\"\nstay_below = \"45 °C\"\n"
	b := strings.NewReplacer(`"2 K/W"`, `"3 K/W"`, `"1 h"`, `"60 min"`, `"100 J/K"`, `"0.1 kJ/K"`).Replace(a) +
		"[thermal.resistance.leak]\nbetween = [\"body\", \"room\"]\nvalue = \"300 K/W\"\n"
	c, err := study.Compare(model(t, a), model(t, b))
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, x := range c.Inputs {
		got = append(got, fmt.Sprintf("%s %s.%s: %s | %s", x.Change, x.Table, x.Key, x.A, x.B))
	}
	want := "changed thermal.resistance.film.value: 2 K/W | 3 K/W\nadded thermal.resistance.leak.:  | between = [\"body\", \"room\"], value = 300 K/W"
	if s := strings.Join(got, "\n"); s != want {
		t.Errorf("inputs:\n%s\nwant\n%s", s, want)
	}
	at := map[string]study.Compared{}
	for _, r := range c.Results {
		at[r.What+" "+r.Name] = r
	}
	tau := at["time constant number 1"]
	near(t, "A", tau.A, 200, 1e-9)
	near(t, "B", tau.B, 100*300./101, 1e-9)
	near(t, "difference", tau.Difference, 100*300./101-200, 1e-9)
	if l := at["limit hot"]; l.Text != "met, then not met" {
		t.Errorf("limit: %+v", l)
	}
	same, err := study.Compare(model(t, a), model(t, a))
	if err != nil || len(same.Inputs) != 0 {
		t.Fatalf("a case against itself: %v, %v", same.Inputs, err)
	}
	for _, r := range same.Results {
		if r.Difference == nil || *r.Difference != 0 {
			t.Errorf("a case against itself: %+v", r)
		}
	}
}
