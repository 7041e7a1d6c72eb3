package casefile_test

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// whole uses most words there are.
const whole = `title      = "A lamp"
author     = "invented"
date       = 2025-02-03
revision   = "A"
references = ["data sheet, invented"]
leaves_out = ["radiation"]

[given]
room       = { value = "28 °C", source = "measured" }
idle       = "30 W"
burst      = "= 2.5 * idle"
film.depth = "2 mm"

[material.pad]
conductivity = "3 W/(m·K)"
source       = "estimated"

[run]
start = "steady"
to    = "60 min"
clock = "06:00"

[print]
temperature = "°F"
power       = "mW"
digits      = 5

[thermal.node.room]
held = "= room"
[thermal.node.junction]
[thermal.node.case]
[thermal.node.sink]
capacitance = "1.9 kJ/K"

[thermal.impedance.array]
between = ["junction", "case"]
foster  = [["0.05 K/W", "0.8 ms"], ["0.22 K/W", "11 ms"], ["0.35 K/W", "90 ms"]]
source  = "data sheet, page 4"

[thermal.resistance."hot pad"]
between = ["case", "sink"]
layer   = { material = "pad", thickness = "= film.depth / 4", area = "40 cm²", source = "drawing" }
[thermal.resistance.fins]
between = ["sink", "room"]
value   = { value = "0.4 K/W", source = "measured" }

[thermal.source.light]
into  = "junction"
drive = { stairs = [["0 s", "= burst"], ["8 s", "= 2 * idle"]], before = "= idle" }
[thermal.source.driver]
into  = "sink"
drive = "12 W"

[[transfer]]
from = "light"
to   = "junction - room"

[[table]]
title = "Burst"
show  = ["junction", "array.1", "junction - sink", "flow of hot pad"]
times = ["0 s", "1 s", "8 s"]
also  = ["peaks", "jumps"]
[[table]]
show  = ["junction"]
above = "room"
every = "20 min"

[limit.junction]
of         = ["junction", "case"]
stay_below = "= room + 100 K"
margin     = "5 K"
[limit.warm]
of     = "sink"
reach  = "40 °C"
within = "45 min"
after  = "1 min"
[limit.steady]
of     = "sink"
settle = "5 %"
within = "45 min"
[limit.over]
of              = "junction"
overshoot_below = "20 %"
[limit.rise]
of         = "sink"
above      = "room"
stay_below = "30 K"
[limit.flow]
of         = "flow of fins"
stay_below = "0.1 kW"
until      = "1 min"
`

func mustRead(t testing.TB, text string) *casefile.Case {
	t.Helper()
	c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if c == nil || diags != nil {
		t.Fatalf("the case is not good:\n%s", casefile.Listing(diags))
	}
	return c
}

func TestWholeCase(t *testing.T) {
	c := mustRead(t, whole)
	use(t, c)
	if c.Title != "A lamp" || c.Date != "2025-02-03" || len(c.References) != 1 || c.LeavesOut[0] != "radiation" {
		t.Errorf("what the case is about: %q %q %q %q", c.Title, c.Date, c.References, c.LeavesOut)
	}
	v, _ := c.Eval(nil)

	pad, ok := c.Element("thermal.resistance", "hot pad")
	if !ok {
		t.Fatal("no hot pad")
	}
	if got := v.Num[pad.Num("layer.thickness")]; got != 0.5e-3 {
		t.Errorf("thickness %g m", got)
	}
	for path, want := range map[string]string{"layer.thickness": "= film.depth / 4", "layer.material": "pad", "layer.area": "40 cm²", "value": "", "layer.nothing": "",
		"between": `["case", "sink"]`} {
		if got := pad.Text(path); got != want {
			t.Errorf("text of %s is %q", path, got)
		}
	}
	if pad.Has("value") || !pad.Has("layer") || pad.Has("layer.conductivity") || pad.Domain() != "thermal" || pad.Thing() != `resistance "hot pad"` {
		t.Errorf("the hot pad is not what it should be")
	}
	array, _ := c.Element("impedance", "array")
	if array.Len("foster") != 3 || v.Num[array.Num("foster[1].second")] != 11e-3 || v.Num[array.Num("foster[2].first")] != 0.35 || array.Has("foster[3].first") {
		t.Errorf("the ladder is not what was written")
	}
	fins, _ := c.Element("resistance", "fins")
	for _, s := range []struct{ got, want string }{{fins.SourceOf("value"), "measured"}, {fins.Source(), ""}, {pad.SourceOf("layer.area"), "drawing"}, {array.SourceOf("foster"), "data sheet, page 4"}} {
		if s.got != s.want {
			t.Errorf("source %q, want %q", s.got, s.want)
		}
	}
	if _, ok := c.Element("node", "hot pad"); ok {
		t.Error("the hot pad is found as a node")
	}
	if m, ok := c.Element("material", "pad"); !ok || m.Source() != "estimated" {
		t.Error("the material is not found")
	}
	if names := pad.Names("between"); !cmp.Equal(names, []string{"case", "sink"}) {
		t.Errorf("ends %q", names)
	}
}

func TestQuestions(t *testing.T) {
	c := mustRead(t, whole)
	v, _ := c.Eval(nil)
	q := c.Questions
	if q.Start != casefile.StartSteady || !q.HasTo || v.Num[q.To] != 3600 || q.Clock != 6*3600 || !q.HasClock {
		t.Errorf("run: %+v", q)
	}
	if q.Digits != 5 || q.Print["temperature"].Unit != "°F" || q.Print["power"].Digits != 5 {
		t.Errorf("print: %+v", q.Print)
	}
	if len(q.Transfers) != 1 || q.Transfers[0].From != "light" || q.Transfers[0].To.Minus != "room" {
		t.Errorf("transfers: %+v", q.Transfers)
	}
	shown := q.Tables[0].Show
	if len(q.Tables) != 2 || len(q.Tables[0].Times) != 3 || v.Num[q.Tables[0].Times[1]] != 1 || !q.Tables[0].Peaks || !q.Tables[0].Jumps ||
		shown[1].Node != "array.1" || shown[2].Kind != quantity.Difference || shown[3].Part != "hot pad" || shown[3].Word != "flow" || shown[3].Dim != dimPower {
		t.Errorf("tables: %+v", q.Tables)
	}
	if b := q.Tables[1]; b.Above != "room" || !b.HasEvery || v.Num[b.Every] != 1200 || b.HasTo {
		t.Errorf("second table: %+v", b)
	}
	type row struct {
		kind          string
		level, margin float64
		percent       bool
	}
	want := []row{{"stay_below", 401.15, 5, false}, {"reach", 313.15, 0, false}, {"settle", 0.05, 0, true}, {"overshoot_below", 0.2, 0, true}, {"stay_below", 30, 0, false}, {"stay_below", 100, 0, false}}
	for i, l := range q.Limits {
		got := row{kind: l.Kind.String(), level: v.Num[l.Level], percent: l.Percent}
		if l.HasMargin {
			got.margin = v.Num[l.Margin]
		}
		if math.Abs(got.level-want[i].level) > 1e-12*want[i].level {
			t.Errorf("%s: level %v, want %v", l.Name, got.level, want[i].level)
		}
		got.level = want[i].level
		if got != want[i] {
			t.Errorf("%s: %+v, want %+v", l.Name, got, want[i])
		}
	}
}

// TestEvalVaried changes a given value: what depends on it follows, the rest stays.
func TestEvalVaried(t *testing.T) {
	c := mustRead(t, whole)
	given := c.GivenValues()
	idle, ok := c.GivenIndex("idle")
	if !ok {
		t.Fatal("no idle")
	}
	given[idle], _ = quantity.Parse("40 W")
	v, diags := c.Eval(given)
	if diags != nil {
		t.Fatal(diags)
	}
	light, _ := c.Element("source", "light")
	w := v.Wave[light.Wave("drive")]
	if w.Before != 40 || w.At(1) != 100 || w.At(9) != 80 {
		t.Errorf("the waveform is %v W, %v W, %v W", w.Before, w.At(1), w.At(9))
	}
	depth, _ := c.GivenIndex("film.depth")
	given[depth], _ = quantity.Parse("-1 mm")
	if _, diags = c.Eval(given); len(diags) != 1 || diags[0].Code != "range" || diags[0].Line != 42 {
		t.Errorf("a negative thickness: %v", diags)
	}
	for i, g := range c.Given {
		if g.Derived != (g.Name == "burst") || !g.Used {
			t.Errorf("given %d is %+v", i, g)
		}
	}
	if c.Given[0].Source != "measured" {
		t.Error("the source of room is lost")
	}
}

func TestWaveforms(t *testing.T) {
	dir := t.TempDir()
	for name, text := range map[string]string{
		"day.csv":   "# a logger\ntime / h;P / kW;T [°C]\n0;1,5;10\n1;2,5;12\n1;3,5;14\n",
		"plain.csv": "t / s,P (W)\n0,1\n10,3\n",
	} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	tests := []struct {
		drive  string
		before float64
		at     map[float64]float64 // s: W
		form   string
	}{
		{`"5 W"`, 5, map[float64]float64{0: 5, 1e6: 5}, "constant"},
		{`{ value = "5 W", source = "estimated" }`, 5, map[float64]float64{0: 5}, "constant"},
		{`"= 2 * p"`, 6, map[float64]float64{0: 6}, "constant"},
		{`{ step = { from = "1 W", to = "2 W", at = "10 s" } }`, 1, map[float64]float64{0: 1, 9.9: 1, 10: 2}, "step"},
		{`{ points = [["0 s", "1 W"], ["10 s", "3 W"], ["10 s", "5 W"]] }`, 1, map[float64]float64{5: 2, 10: 5, 99: 5}, "points"},
		{`{ points = [["0 s", "1 W"], ["10 s", "3 W"]], repeat = "20 s", before = "9 W" }`, 9, map[float64]float64{5: 2, 15: 3, 25: 2}, "points"},
		{`{ stairs = [["0 s", "1 W"], ["10 s", "= p"]] }`, 1, map[float64]float64{5: 1, 10: 3}, "stairs"},
		{`{ pulse = { low = "1 W", high = "2 W", width = "25 %", period = "8 s", at = "4 s" } }`, 1, map[float64]float64{0: 1, 4: 2, 5.9: 2, 6: 1, 12.5: 2}, "pulse"},
		{`{ pulse = { low = "1 W", high = "2 W", width = "2 s" } }`, 1, map[float64]float64{0: 2, 1.9: 2, 2: 1, 1000: 1}, "pulse"},
		{`{ pulse = { low = "1 W", high = "2 W", width = "2 s", period = "4 s", count = 2 } }`, 1, map[float64]float64{5: 2, 7: 1, 9: 1}, "pulse"},
		{`{ sine = { mean = "1 W", amplitude = "2 W", period = "4 s" } }`, 1, map[float64]float64{1: 3, 3: -1}, "sine"},
		{`{ sine = { mean = "1 W", amplitude = "2 W", frequency = "0.25 Hz", phase = "90 °" } }`, 3, map[float64]float64{0: 3, 2: -1}, "sine"},
		{`{ sine = { mean = "1 W", amplitude = "2 W", period = "24 h", highest_at = "15 h" } }`, 1 + 2*math.Cos(2*math.Pi*9/24), map[float64]float64{9 * 3600: 3}, "sine"},
		{`{ sine = { mean = "1 W", amplitude = "2 W", period = "24 h", highest_at = "15:00" } }`, 1 + 2*math.Cos(2*math.Pi*9/24), map[float64]float64{9 * 3600: 3}, "sine"},
		{`{ decay = [{ amplitude = "2 W", time_constant = "10 s" }, { amplitude = "1 W", time_constant = "5 s" }] }`, 3, map[float64]float64{10: 2*math.Exp(-1) + math.Exp(-2)}, "decay"},
		{`{ file = "day.csv", time = "time", column = "P" }`, 1500, map[float64]float64{1800: 2000, 3600: 3500}, "file"},
		{`{ file = "plain.csv" }`, 1, map[float64]float64{5: 2}, "file"},
		{`{ file = "plain.csv", repeat = "10 s" }`, 1, map[float64]float64{15: 2}, "file"},
	}
	for _, test := range tests {
		text := "[given]\np = \"3 W\"\n[run]\nclock = \"06:00\"\n" + good + "[thermal.source.s]\ninto = \"case\"\ndrive = " + test.drive +
			"\n[thermal.source.use]\ninto = \"case\"\ndrive = \"= p\"\n"
		c, diags := casefile.Read("case.toml", []byte(text), root, testVocabulary()...)
		if c == nil {
			t.Errorf("%s:\n%s", test.drive, casefile.Listing(diags))
			continue
		}
		v, _ := c.Eval(nil)
		e, _ := c.Element("source", "s")
		w := v.Wave[e.Wave("drive")]
		if math.Abs(w.Before-test.before) > 1e-12 {
			t.Errorf("%s: before %g, want %g", test.drive, w.Before, test.before)
		}
		for at, want := range test.at {
			if got := w.At(at); math.Abs(got-want) > 1e-11*math.Max(1, math.Abs(want)) {
				t.Errorf("%s: at %g s %g, want %g", test.drive, at, got, want)
			}
		}
		info := c.WaveInfo(e.Wave("drive"))
		if info.Form != test.form || info.HasBefore != strings.Contains(test.drive, "before") || info.Constant != (test.form == "constant") || info.Dim != dimPower {
			t.Errorf("%s: %+v", test.drive, info)
		}
	}
}

// TestDataFiles reads data files that are not as they should be.
func TestDataFiles(t *testing.T) {
	dir := t.TempDir()
	files := map[string]string{
		"good.csv": "t / s,P / W\n0,1\n10,3\n", "empty.csv": "", "head.csv": "t / s,P / W\n", "words.csv": "t / s,P / W\n0,one\n",
		"back.csv": "t / s,P / W\n5,1\n0,2\n", "units.csv": "t / s,P / K\n0,1\n", "none.csv": "t,P\n0,1\n", "wide.csv": "t / s,alpha / W,beta / W\n0,1,2\n",
		"ragged.csv": "t / s,P / W\n0,1\n1\n", "twice.csv": "t / s,P / W,P / kW\n0,1,2\n", "thrice.csv": "t / s,P / W\n0,1\n0,2\n0,3\n",
		"quote.csv": "t / s,\"P / W\n0,1\n", "inf.csv": "t / s,P / W\n0,inf\n", "unit.csv": "t / s,P / Wat\n0,1\n",
	}
	for name, text := range files {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if err := os.Mkdir(filepath.Join(dir, "folder.csv"), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink("/dev/zero", filepath.Join(dir, "zero.csv")); err != nil {
		t.Fatal(err)
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	for _, test := range []struct{ drive, want, hint string }{
		{`file = "good.cvs"`, `"good.cvs" does not exist`, "data files lie beside the case file"},
		{`file = "folder.csv"`, `"folder.csv" is not a regular file`, ""},
		{`file = "zero.csv"`, `"zero.csv" cannot be read: path escapes from parent`, "data files lie beside the case file"},
		{`file = "../x.csv"`, `"../x.csv" cannot be read: path escapes from parent`, "data files lie beside the case file"},
		{`file = "empty.csv"`, `"empty.csv" is empty`, ""},
		{`file = "head.csv"`, `"head.csv" has no rows below its header`, ""},
		{`file = "words.csv"`, `"words.csv", row 1: "one" is not a number`, ""},
		{`file = "inf.csv"`, `"inf.csv", row 1: "inf" is not a number`, ""},
		{`file = "back.csv"`, `"back.csv", row 2: the time goes back`, ""},
		{`file = "thrice.csv"`, `"thrice.csv", row 3: the time stands three times; a jump takes two`, ""},
		{`file = "units.csv"`, `column "P / K" of "units.csv": "0 K" is a temperature (K); expected a power (W)`, `write the unit into the header, like "P / W"`},
		{`file = "unit.csv"`, `column "P / Wat" of "unit.csv": `, `write the unit into the header, like "P / W"`},
		{`file = "none.csv"`, `column "t" of "none.csv": no unit in the header; expected a time with its unit, like "1 s"`, `write the unit into the header, like "t / s"`},
		{`file = "wide.csv"`, `"wide.csv" has 3 columns; column is missing`, `add column = "beta"`},
		{`file = "wide.csv", column = "alpa"`, `"wide.csv" has no column "alpa"`, `did you mean "alpha"?`},
		{`file = "ragged.csv"`, "ragged.csv:3: a row of 1 cells under a header of 2", ""},
		{`file = "twice.csv", column = "P"`, `"twice.csv" has two columns "P"`, "name the column with its unit, as in the header"},
		{`file = "good.csv", repeat = "5 s"`, "repeat is 5 s, but the last time of the file is 10 s", ""},
	} {
		text := good + "[thermal.source.s]\ninto = \"case\"\ndrive = { " + test.drive + " }\n"
		c, diags := casefile.Read("case.toml", []byte(text), root, testVocabulary()...)
		if c != nil || len(diags) != 1 || !strings.HasPrefix(diags[0].Text, test.want) || diags[0].Hint != test.hint {
			t.Errorf("%s: want %q, %q\n%s", test.drive, test.want, test.hint, casefile.Listing(diags))
		}
	}
}

// TestDiagnosticJSON holds the shape of a record.
func TestDiagnosticJSON(t *testing.T) {
	_, diags := casefile.Read("case.toml", []byte(strings.Replace(good, `"room"]`, `"rom"]`, 1)), nil, testVocabulary()...)
	b, err := json.Marshal(diags)
	if err != nil {
		t.Fatal(err)
	}
	want := `[{"file":"case.toml","line":6,"column":20,"length":5,"severity":"error","code":"unknown-name","thing":"resistance \"joint\"",` +
		`"text":"node \"rom\" is not defined","found":"rom","want":"a node","fix":"\"room\"","source":"between = [\"case\", \"rom\"]"}]`
	if string(b) != want {
		t.Error(cmp.Diff(want, string(b)))
	}
}

// TestStart reads the three ways to state a start.
func TestStart(t *testing.T) {
	for _, test := range []struct {
		start string
		word  casefile.StartWord
		level float64
	}{{"", casefile.StartUnsaid, 0}, {`start = "steady"`, casefile.StartSteady, 0}, {`start = "18 °C"`, casefile.StartLevel, 291.15},
		{`start = "= cold + 5 K"`, casefile.StartLevel, 288.15}, {`start = { value = "18 °C", source = "measured" }`, casefile.StartLevel, 291.15}} {
		text := "[given]\ncold = \"10 °C\"\n" + strings.Replace(good, `"20 °C"`, `"= cold"`, 1) + "[run]\n" + test.start + "\n"
		c := mustRead(t, text)
		v, _ := c.Eval(nil)
		q := c.Questions
		if q.Start != test.word || q.Start == casefile.StartLevel && math.Abs(v.Num[q.StartAt]-test.level) > 1e-10 {
			t.Errorf("%s: %v, %v K", test.start, q.Start, v.Num[q.StartAt])
		}
	}
}

// TestSourceAnywhere states a source beside values of every kind.
func TestSourceAnywhere(t *testing.T) {
	c := mustRead(t, good+`[thermal.impedance.array]
between = ["case", "room"]
foster = [[{ value = "0.1 K/W", source = "data sheet" }, "1 ms"]]
[thermal.source.s]
into = "case"
drive = { pulse = { low = "0 W", high = { value = "5 W", source = "measured" }, width = { value = "10 %", source = "estimated" }, period = "1 s" }, source = "a log" }
[limit.settled]
of = "case"
settle = { value = "5 %", source = "client" }
within = "1 h"
`)
	s, _ := c.Element("source", "s")
	if got := s.SourceOf("drive"); got != "a log" {
		t.Errorf("source of the drive: %q", got)
	}
	array, _ := c.Element("impedance", "array")
	if got := array.SourceOf("foster[0].first"); got != "data sheet" || array.Text("foster[0].first") != "0.1 K/W" {
		t.Errorf("source of a resistance in a list: %q", got)
	}
	v, _ := c.Eval(nil)
	if w := v.Wave[s.Wave("drive")]; w.At(0.05) != 5 || w.At(0.15) != 0 {
		t.Errorf("the pulse is %v and %v W", w.At(0.05), w.At(0.15))
	}
}

// TestProgrammersErrors panics with constant text.
func TestProgrammersErrors(t *testing.T) {
	c := mustRead(t, good)
	e, _ := c.Element("resistance", "joint")
	for want, call := range map[string]func(){
		"casefile: a field was asked for that the case does not state": func() { e.Num("conductance") },
		"casefile: Eval needs one value for each Given":                func() { c.Eval(make([]quantity.Value, 3)) },
	} {
		func() {
			defer func() {
				if got := recover(); got != want {
					t.Errorf("panics with %v", got)
				}
			}()
			call()
		}()
	}
}

// TestListing spells out twenty faults and counts the rest.
func TestListing(t *testing.T) {
	var b strings.Builder
	for i := range 30 {
		fmt.Fprintf(&b, "[thermal.node.n%d]\nheld = \"20 W\"\n", i)
	}
	_, diags := casefile.Read("case.toml", []byte(b.String()), nil, testVocabulary()...)
	text := casefile.Listing(diags)
	if n := strings.Count(text, "case.toml:"); n != 20 || !strings.HasSuffix(text, "and 10 more\n") {
		t.Errorf("%d faults spelt out:\n%s", n, text)
	}
	if casefile.Listing(nil) != "" {
		t.Error("a listing of nothing")
	}
}

// TestLongLine shows the place in a line of thousands of characters.
func TestLongLine(t *testing.T) {
	text := good + `# ` + "\n" + `[thermal.source.s]` + "\n" + `drive = { points = [` + strings.Repeat(`["0 s", "1 W"], `, 1) + `["1 s", "2 W"], ` +
		strings.Repeat(" ", 5000) + `["2 s", "3 K"]` + strings.Repeat(" ", 5000) + "]}\ninto = \"case\"\n"
	_, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if len(diags) != 1 || len(diags[0].Source) > 300 {
		t.Fatalf("%v", diags)
	}
	lines := strings.Split(diags[0].String(), "\n")
	under := strings.Index(lines[2], "^^^^^")
	if at := []rune(lines[1]); under < 0 || string(at[under:under+5]) != `"3 K"` {
		t.Errorf("the underline misses:\n%s", diags[0])
	}
}

// TestExplain places what only reckoning finds.
func TestExplain(t *testing.T) {
	c := mustRead(t, good)
	e, _ := c.Element("resistance", "joint")
	list := c.Explain(&network.Faults{List: []network.Fault{{Code: network.Unconnected, Refs: []network.Ref{e.Ref}, Text: "x"}}})
	if len(list) != 1 || list[0].Line != 5 || list[0].Code != "unconnected" {
		t.Errorf("%+v", list)
	}
	d := e.Fault("value", "value is odd", "an even value", `"2 K/W"`)
	if got := c.Explain(fmt.Errorf("while setting: %w", d)); len(got) != 1 || got[0] != d || d.Line != 7 || d.Text != "value is odd; expected an even value" {
		t.Errorf("%+v", got)
	}
	if got := c.Explain(os.ErrClosed); len(got) != 1 || got[0].Line != 0 || got[0].File != "case.toml" {
		t.Errorf("%+v", got)
	}
	if c.Explain(nil) != nil {
		t.Error("nil is explained")
	}
	if d := c.Diagnose(e.Ref, "odd", "it is odd", ""); d.Thing != `resistance "joint"` || d.Line != 5 {
		t.Errorf("%+v", d)
	}
}

// TestTabsAndCRLF counts columns in characters and drops line ends.
func TestTabsAndCRLF(t *testing.T) {
	text := strings.ReplaceAll("\ufeff"+strings.Replace(good, `value = "0.5 K/W"`, "\tvalue\t= \"0.5 µs\"", 1), "\n", "\r\n")
	_, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if len(diags) != 1 || diags[0].Line != 7 || diags[0].Col != 10 || strings.Contains(diags[0].Source, "\r") {
		t.Fatalf("%+v", diags)
	}
	if want := "  \tvalue\t= \"0.5 µs\"\n  \t     \t  ^^^^^^^^"; !strings.Contains(diags[0].String(), want) {
		t.Errorf("%q", diags[0].String())
	}
	_, diags = casefile.Read("case.toml", []byte("\ufefftitel = \"x\"\n"), nil, testVocabulary()...)
	if len(diags) == 0 || diags[0].Col != 1 || diags[0].Source != `titel = "x"` {
		t.Errorf("%+v", diags)
	}
}
