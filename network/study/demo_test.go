package study_test

import (
	"testing"

	"lagbook/testdata/demo"
)

// What the hand check in the case that repeats promises.
func TestHoldingOven(t *testing.T) {
	text, err := demo.Cases.ReadFile(demo.Round)
	if err != nil {
		t.Fatal(err)
	}
	m := model(t, string(text))
	a, err := m.Cycle()
	if err != nil {
		t.Fatal(err)
	}
	of := map[string]int{}
	for k, c := range a.Cycles {
		of[c.Output] = k
	}
	air, load, door := a.Cycles[of["air"]], a.Cycles[of["load"]], a.Cycles[of["flow of door"]]
	if air.Period != 360 {
		t.Errorf("a period of %v s", air.Period)
	}
	lost := 6*(air.Mean-293.15) + door.Mean
	near(t, "lost on the mean", &lost, 1000, 1e-9)
	near(t, "the load is as warm as the air on the mean", &load.Mean, air.Mean, 1e-9)
	if mean := air.Mean - 273.15; mean < 99 || mean > 110 {
		t.Errorf("%v °C on the mean", mean)
	}
	if swing := load.Max - load.Min; swing < 5 || swing > 7 {
		t.Errorf("the load swings by %v K", swing)
	}
	if n := *load.Cycles; n < 32 || n > 56 {
		t.Errorf("%v rounds", n)
	}
	lim, err := m.Limits()
	if err != nil {
		t.Fatal(err)
	}
	if !lim.Met {
		t.Errorf("%+v", lim.Limits)
	}
}
