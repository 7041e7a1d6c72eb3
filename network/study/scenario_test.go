package study_test

import (
	"encoding/json"
	"fmt"
	"math"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/study"

	"pgregory.net/rapid"
)

// duties is a body behind a film, under four scenarios: one that changes nothing, one with
// another load, one in another room, and one with another film, which is another network.
const duties = `
title = "Duties"
[given]
load = "10 W"
film = "2 K/W"
room = "20 °C"
[profile.duty]
points = [["0 s", "0 W"], ["100 s", "10 W"]]
[profile.hard]
points = [["0 s", "0 W"], ["50 s", "25 W"], ["200 s", "15 W"]]
[scenario.normal]
title = "As written"
[scenario.overload]
set = { load = "15 W" }
profiles = { duty = "hard" }
limits = ["body"]
[scenario.summer]
set = { room = "35 °C" }
tables = ["Body"]
[scenario.dusty]
set = { film = "3 K/W" }
[run]
to = "1000 s"
[thermal.node.body]
capacitance = "100 J/K"
[thermal.node.room]
held = "= room"
[thermal.resistance.film]
between = ["body", "room"]
value = "= film"
[thermal.source.steady]
into = "body"
drive = { step = { from = "0 W", to = "= load", at = "0 s" } }
[thermal.source.duty]
into = "body"
drive = "= duty"
[[table]]
title = "Body"
show = ["body"]
every = "100 s"
[[table]]
title = "Rise"
show = ["body"]
above = "room"
every = "200 s"
[limit.body]
of = "body"
stay_below = "80 °C"
[limit.rise]
of = "body"
above = "room"
stay_below = "50 K"
`

// written is the text of duties with a scenario written out in its place.
func written(scenario string) string {
	s := duties
	swap := func(old, new string) { s = strings.Replace(s, old, new, 1) }
	switch scenario {
	case "overload":
		swap(`load = "10 W"`, `load = "15 W"`)
		swap(`drive = "= duty"`, `drive = "= hard"`)
	case "summer":
		swap(`room = "20 °C"`, `room = "35 °C"`)
	case "dusty":
		swap(`film = "2 K/W"`, `film = "3 K/W"`)
	}
	return s
}

// In whatever order scenarios are used, each gives what the case gives with it written out.
func TestScenarioIsTheCaseWrittenOut(t *testing.T) {
	m := model(t, duties)
	all, err := m.Scenarios(nil)
	if err != nil || len(all) != 4 {
		t.Fatalf("%d scenarios, %v", len(all), err)
	}
	want := map[string][]study.Table{}
	for _, s := range all {
		a, err := model(t, written(s.Name)).Tables()
		if err != nil {
			t.Fatal(err)
		}
		want[s.Name] = a.Tables
	}
	rapid.Check(t, func(r *rapid.T) {
		s := rapid.SampledFrom(all).Draw(r, "scenario")
		if ds := m.Use(s); casefile.Failed(ds) {
			r.Fatal(casefile.Listing(ds))
		}
		a, err := m.Tables()
		if err != nil {
			r.Fatal(err)
		}
		for _, tab := range a.Tables {
			full := want[s.Name][0]
			if tab.Title == "Rise" {
				full = want[s.Name][1]
			}
			for i, row := range tab.Rows {
				if d := math.Abs(row[1] - full.Rows[i][1]); d > 1e-12*math.Abs(row[1]) {
					r.Errorf("%s, %s at %v s: %v, written out %v", s.Name, tab.Title, row[0], row[1], full.Rows[i][1])
				}
			}
		}
	})
}

// A case under its scenarios: the tables and limits that each asks for, the worst of each
// limit, one that governs, and poles once where no scenario changes them.
func TestAnswersUnderScenarios(t *testing.T) {
	m := model(t, duties)
	all, _ := m.Scenarios(nil)
	tables, err := m.TablesUnder(all)
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, x := range tables.Tables {
		got = append(got, x.Scenario+" "+x.Title)
	}
	if s := strings.Join(got, ", "); s != "normal Body, normal Rise, overload Body, overload Rise, summer Body, dusty Body, dusty Rise" {
		t.Errorf("tables: %s", s)
	}
	limits, err := m.LimitsUnder(all)
	if err != nil {
		t.Fatal(err)
	}
	got = nil
	for _, l := range limits.Limits {
		word := l.Name + " " + l.Scenario
		if l.Worst {
			word += " worst"
		}
		if l.Governs {
			word += " governs"
		}
		got = append(got, word)
	}
	// dusty comes to 60 K over the room where 50 K are allowed, overload to 80 °C where 80 °C are
	if s := strings.Join(got, ", "); s != "body normal, body overload worst, body summer, body dusty, rise normal, rise summer, rise dusty worst governs" {
		t.Errorf("limits: %s", s)
	}
	if limits.Met {
		t.Error("all limits are said to be met")
	}
	poles, err := m.PolesUnder(all)
	if err != nil {
		t.Fatal(err)
	}
	if len(poles.Each) != 4 || len(poles.Modes) != 4 || poles.Modes[3].Scenario != "dusty" {
		t.Fatalf("poles under %d scenarios, %d modes", len(poles.Each), len(poles.Modes))
	}
	near(t, "time constant under dusty", poles.Modes[3].TimeConstant, 300, 1e-10)
	poles, err = m.PolesUnder(all[:3])
	if err != nil {
		t.Fatal(err)
	}
	if poles.Each != nil || len(poles.Modes) != 1 || poles.Modes[0].Scenario != "" {
		t.Errorf("the same poles %d times, under %q", len(poles.Modes), poles.Modes[0].Scenario)
	}
}

// A case without scenarios answers as ever, to the letter.
func TestWithoutScenarios(t *testing.T) {
	m := model(t, body)
	list, err := m.Scenarios(nil)
	if err != nil {
		t.Fatal(err)
	}
	plain, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	under, err := m.TablesUnder(list)
	if err != nil {
		t.Fatal(err)
	}
	a, _ := json.Marshal(plain)
	b, _ := json.Marshal(under)
	if string(a) != string(b) || strings.Contains(string(a), "scenario") {
		t.Errorf("%s\nunder no scenario\n%s", a, b)
	}
}

// A scenario that is not there is named with the nearest.
func TestUnknownScenario(t *testing.T) {
	for name, want := range map[string]string{"overlod": `did you mean "overload"?`, "night": "normal, overload, summer and dusty"} {
		if _, err := model(t, duties).Scenarios([]string{name}); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%s: %v", name, err)
		}
	}
	if _, err := model(t, body).Scenarios([]string{"night"}); err == nil || !strings.Contains(err.Error(), "the case has none") {
		t.Error(err)
	}
}

// check says what each scenario changes.
func TestCheckScenarios(t *testing.T) {
	a, err := model(t, duties).Check()
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, s := range a.Scenarios {
		for _, c := range s.Set {
			got = append(got, fmt.Sprintf("%s: %s %.6g → %.6g %s", s.Name, c.Given, c.From, c.To, c.Unit))
		}
		for _, p := range s.Profiles {
			got = append(got, s.Name+": "+p[1]+" for "+p[0])
		}
		if s.Network {
			got = append(got, s.Name+": its own poles")
		}
	}
	want := "overload: load 10 → 15 W, overload: hard for duty, summer: room 293.15 → 308.15 K, dusty: film 2 → 3 K/W, dusty: its own poles"
	if s := strings.Join(got, ", "); s != want {
		t.Errorf("scenarios change %s", s)
	}
	if len(a.Profiles) != 2 || a.Profiles[1].Form != "closed" || !strings.Contains(a.Profiles[1].Wave, "25 W at 50 s") {
		t.Errorf("profiles: %+v", a.Profiles)
	}
}
