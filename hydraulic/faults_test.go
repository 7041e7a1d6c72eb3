package hydraulic

import (
	"strings"
	"testing"

	"lagbook/network/casefile"
)

const good = `
[hydraulic.node.main]
held = "2 bar"
[hydraulic.node.tank]
compliance = "1e-6 m³/Pa"
[hydraulic.line.pipe]
between    = ["main", "tank"]
resistance = "1 MPa·s/m³"
`

// Every mistake that this package finds, or that its tables make casefile find.
func TestFaults(t *testing.T) {
	for _, c := range []struct{ name, text, want string }{
		{"neither R nor L", good + "[hydraulic.line.x]\nbetween = [\"main\", \"tank\"]", "missing-key: case.toml:9:17: line \"x\": neither resistance, inertance nor pipe is stated"},
		{"one node", good + "[hydraulic.line.x]\nbetween = [\"tank\", \"tank\"]\nresistance = \"1 Pa·s/m³\"", "names \"tank\" twice"},
		{"no node", good + "[hydraulic.line.x]\nbetween = [\"tank\", \"tnk\"]\nresistance = \"1 Pa·s/m³\"", "node \"tnk\" is not defined"},
		{"start without inertance", good + "start = \"1 L/s\"", "start needs inertance beside it"},
		{"start of a held node", "[hydraulic.node.x]\nheld = \"1 bar\"\nstart = \"1 bar\"\n" + good, "starts where it is held"},
		{"resistance of heat", good + "[hydraulic.line.x]\nbetween = [\"main\", \"tank\"]\nresistance = \"1 K/W\"", "dimension: "},
		{"negative inertance", good + "inertance = \"-1 Pa·s²/m³\"", "must be positive"},
		{"compliance of nothing", "[hydraulic.node.x]\ncompliance = \"0 m³/Pa\"\n" + good, "must be positive"},
		{"both ends of a source", good + "[hydraulic.source.s]\ninto = \"tank\"\nout_of = \"tank\"\ndrive = \"1 L/s\"", "stated-twice: "},
		{"a source of heat", good + "[hydraulic.source.s]\ninto = \"tank\"\ndrive = \"1 W\"", "dimension: "},
		{"below vacuum", strings.Replace(good, "2 bar", "-1.2 bar", 1), "held is -1.2 bar, must be at or above vacuum"},
		{"below vacuum, absolute", "[hydraulic]\npressures = \"absolute\"\n" + strings.Replace(good, "2 bar", "-0.2 bar", 1), "must be at or above vacuum, 0 bar(a)"},
		{"below vacuum, said absolute", strings.Replace(good, "2 bar", "-0.2 bar(a)", 1), "below vacuum"},
		{"a sine below vacuum", strings.Replace(good, `"2 bar"`, `{ sine = { mean = "0 bar", amplitude = "1.1 bar", period = "1 s" } }`, 1), "sine: it goes below vacuum"},
		{"a difference that says gauge", good + "[limit.x]\nof = \"tank\"\novershoot_below = \"0.1 bar(g)\"", `"0.1 bar"`},
		{"a level that is a difference", strings.Replace(good, `"2 bar"`, `"= 3 bar(g) - 1 bar(g)"`, 1), "comes to a pressure difference"},
		{"gauge less absolute", strings.Replace(good, `"2 bar"`, `"= 3 bar(g) - 1 bar(a)"`, 1), "a gauge and an absolute pressure"},
		{"no unit", strings.Replace(good, `"2 bar"`, `2`, 1), `"2 bar"`},
		{"a temperature", strings.Replace(good, `"2 bar"`, `"20 °C"`, 1), "dimension: "},
		{"pressures misspelt", "[hydraulic]\npressures = \"guage\"\n" + good, "did you mean \"gauge\"?"},
		{"gauge atmosphere", "[hydraulic]\natmosphere = \"0 bar(g)\"\n" + good, "an absolute pressure"},
		{"atmosphere that varies", "[given]\np = \"1 bar(a)\"\n[hydraulic]\natmosphere = \"= p\"\n" + good, "fixed: "},
		{"a cylinder", good + "[hydraulic.cylinder.c]\ncap = \"tank\"", "not-built: "},
		{"an exact pipe", good + "[hydraulic.line.x]\nbetween = [\"main\", \"tank\"]\npipe = { length = \"1 m\", bore = \"1 cm\", exact = true }", "not-built: "},
		{"a key nobody knows", "[hydraulic]\npresures = \"gauge\"\n" + good, "did you mean \"pressures\"?"},
		{"a capacitance", strings.Replace(good, "compliance", "capacitance", 1), "\"capacitance\" is not a key of node"},
		{"alone", good + "[hydraulic.node.alone]\n", "unconnected: "},
		{"undetermined", good + "[hydraulic.node.x]\n[hydraulic.node.y]\n[hydraulic.line.xy]\nbetween = [\"x\", \"y\"]\nresistance = \"1 Pa·s/m³\"", "give one of them a compliance"},
		{"a start word misspelt", "[run]\nstart = \"at rset\"\n" + good, "did you mean \"at rest\"?"},
		{"a start of the wrong kind", "[run]\nstart = \"20 °C\"\n" + good, "dimension: "},
		{"a scale that slides", good + "scale = { points = [[\"0 s\", 1], [\"1 s\", 0]] }", "scale is stated as points"},
		{"a scale below nothing", good + "scale = -1", "range: "},
		{"throttled without a resistance", strings.Replace(good, "resistance = \"1 MPa·s/m³\"", "inertance = \"1 Pa·s²/m³\"\nscale = 0.5", 1), "a scale of 0.5 on a line with inertance and no resistance"},
		{"half started", strings.Replace(good, "compliance", "start = \"1 bar\"\ncompliance", 1) + "inertance = \"1 Pa·s²/m³\"", "half-started: "},
		{"a line started, its vessel not", good + "inertance = \"1 Pa·s²/m³\"\nstart = \"1 L/s\"", "half-started: "},
	} {
		if got := faults(c.text + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
	if got := faults(good); got != "" {
		t.Errorf("the good case: %s", got)
	}
}

// Every key has a word of help, and no word is both built and refused.
func TestVocabularyIsSound(t *testing.T) {
	for _, v := range Vocabulary() {
		refused := map[string]bool{}
		for _, w := range v.NotBuilt {
			refused[w] = true
		}
		for _, table := range v.Tables {
			if table.Help == "" || refused[table.Name] {
				t.Errorf("table %s: help %q, refused %v", table.Name, table.Help, refused[table.Name])
			}
			soundFields(t, refused, table.Name, table.Fields)
		}
		soundFields(t, refused, v.Domain, v.Head)
	}
}

func soundFields(t *testing.T, refused map[string]bool, where string, fields []casefile.Field) {
	t.Helper()
	for _, f := range fields {
		if f.Help == "" || refused[f.Name] && where == "hydraulic" || refused[where+"."+f.Name] {
			t.Errorf("%s.%s: help %q, or refused", where, f.Name, f.Help)
		}
	}
}
