package study_test

import (
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/study"
	"lagbook/thermal"
)

// bodySize is a body behind a resistance in a room of 20 °C, with a constant load. Invented.
const bodySize = `
[given]
sink = "2 K/W"
mass = "50 J/K"
load = "10 W"
x = 1.0
[run]
start = "steady"
to = "200 s"
[thermal.node.body]
capacitance = "= mass"
[thermal.node.room]
held = "20 °C"
[thermal.source.loss]
into = "body"
drive = "= load"
`

const (
	plainSink  = "[thermal.resistance.sink]\nbetween = [\"body\", \"room\"]\nvalue = \"= sink\"\n"
	curvedSink = "[thermal.resistance.sink]\nbetween = [\"body\", \"room\"]\nvalue = \"= (1 + (x - 3)^2) * 1 K/W\"\n" // least at x = 3
	below      = "[limit.hot]\nof = \"body\"\nstay_below = "
)

// sizesOf answers the sizes of a case whose data files lie in dir.
func sizesOf(t *testing.T, src, dir string) *study.Sizes {
	t.Helper()
	var root *os.Root
	if dir != "" {
		var err error
		if root, err = os.OpenRoot(dir); err != nil {
			t.Fatal(err)
		}
		defer root.Close()
	}
	c, ds := casefile.Read("case.toml", []byte(src), root, thermal.Vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, ds := study.New(c)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	a, err := m.Sizes(nil)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// closely fails unless a size has a value to ten digits, sized in closed form beside it.
func closely(t *testing.T, s study.Size, want float64) {
	t.Helper()
	if s.Value == nil || math.Abs(*s.Value-want) > 2e-10*math.Abs(want) {
		t.Errorf("%s is %v, want %v: %s", s.Name, s.Value, want, s.Text)
	}
}

func TestSizeOneStore(t *testing.T) {
	sink := plainSink + below + "\"90 °C\"\n"
	heat := strings.Replace(bodySize, `start = "steady"`, `start = "20 °C"`, 1) + plainSink
	for _, c := range []struct {
		name, src string
		want      float64
		met       bool
		taken     string
		crossings int
		limit     string
	}{
		// 20 °C + 10 W · R = 90 °C
		{"a sink for a steady temperature", bodySize + sink + "[size.s]\nvary = \"sink\"\nrange = [\"0.5 K/W\", \"20 K/W\"]\nwant = \"largest\"\nseries = \"E12\"\n", 7, true, "6.8 K/W", 1, "hot"},
		{"the same in E24 and another unit", bodySize + sink + "[size.s]\nvary = \"sink\"\nrange = [\"500 mK/W\", \"20 K/W\"]\nseries = \"R20\"\n", 7, true, "6300 mK/W", 1, "hot"},
		{"with a margin", bodySize + sink + "[size.s]\nvary = \"sink\"\nrange = [\"0.5 K/W\", \"20 K/W\"]\nmargin = \"5 K\"\n", 6.5, true, "", 1, "hot"},
		{"a range that begins at zero", bodySize + sink + "[size.s]\nvary = \"load\"\nrange = [\"0 W\", \"90 W\"]\nwant = \"largest\"\nseries = \"R10\"\n", 35, true, "31.5 W", 1, "hot"},
		{"a level", bodySize + strings.ReplaceAll(sink, "sink\"\nrange", "") + "[size.s]\nvary = \"load\"\nrange = [\"1 W\", \"40 W\"]\nwant = \"smallest\"\n", 1, true, "", 1, "hot"},
		// 20 + 20·(1 − e^(−t/RC)) reaches 30 °C at RC·ln 2; within 100 s, of which 10 % are kept
		{"a time", heat + "[limit.warm]\nof = \"body\"\nreach = \"30 °C\"\nwithin = \"100 s\"\n[size.c]\nvary = \"mass\"\nrange = [\"1 J/K\", \"1000 J/K\"]\n", 50 / math.Ln2, true, "", 1, "warm"},
		{"a time with a share to spare", heat + "[limit.warm]\nof = \"body\"\nreach = \"30 °C\"\nwithin = \"100 s\"\n[size.c]\nvary = \"mass\"\nrange = [\"1 J/K\", \"1000 J/K\"]\nmargin = \"10 %\"\n", 45 / math.Ln2, true, "", 1, "warm"},
		// 20 °C + 10 W · (1 + (x−3)²) K/W
		{"not monotonic", bodySize + curvedSink + below + "\"40 °C\"\n[size.x]\nvary = \"x\"\nrange = [1, 8]\n", 2, true, "", 2, "hot"},
		{"not monotonic, the largest", bodySize + curvedSink + below + "\"40 °C\"\n[size.x]\nvary = \"x\"\nrange = [1, 8]\nwant = \"largest\"\n", 4, true, "", 2, "hot"},
		{"a dip between two values of the grid", bodySize + curvedSink + below + "\"30.001 °C\"\n[size.x]\nvary = \"x\"\nrange = [1, 8]\n", 2.99, true, "", 2, "hot"},
	} {
		t.Run(c.name, func(t *testing.T) {
			a := sizesOf(t, c.src, "")
			s := a.Sizes[0]
			closely(t, s, c.want)
			if s.Met != c.met || a.Met != c.met || len(s.Crossings) != c.crossings || s.GoverningLimit != c.limit {
				t.Errorf("met %v, %d crossings, %s governs: %s", s.Met, len(s.Crossings), s.GoverningLimit, s.Text)
			}
			if (s.Choice == nil) != (c.taken == "") || s.Choice != nil && (s.Choice.Name != c.taken || !s.Choice.Met) {
				t.Errorf("taken: %+v", s.Choice)
			}
		})
	}
}

// Nothing in the range meets the limit: 20 °C + 10 W · 1 K/W at x = 3 is nearest to 29 °C.
func TestSizeNotMet(t *testing.T) {
	a := sizesOf(t, bodySize+curvedSink+below+"\"29 °C\"\n[size.x]\nvary = \"x\"\nrange = [1, 8]\n", "")
	s := a.Sizes[0]
	if s.Met || a.Met || s.Value == nil || math.Abs(*s.Value-3) > 1e-3 || math.Abs(*s.Margin+1) > 1e-5 || s.GoverningLimit != "hot" || len(s.Crossings) != 0 {
		t.Errorf("%+v", s)
	}
	if !strings.Contains(s.Text, "hot stands in the way") {
		t.Error(s.Text)
	}
	// a series without a value on the safe side of the range
	s = sizesOf(t, bodySize+plainSink+below+"\"90 °C\"\n[size.s]\nvary = \"sink\"\nrange = [\"6.9 K/W\", \"8 K/W\"]\nseries = \"E12\"\nwant = \"largest\"\n", "").Sizes[0]
	if s.Met || s.Choice != nil || !strings.Contains(s.Text, "no value of E12") {
		t.Errorf("%+v", s)
	}
	// two limits that exclude each other
	s = sizesOf(t, bodySize+plainSink+below+"\"50 °C\"\n[limit.warm]\nof = \"body\"\nstay_above = \"60 °C\"\n[size.s]\nvary = \"sink\"\nrange = [\"1 K/W\", \"20 K/W\"]\n", "").Sizes[0]
	if s.Met || s.Value == nil || *s.Value <= 3 || *s.Value >= 4 {
		t.Errorf("%+v", s)
	}
}

func TestSizeChoices(t *testing.T) {
	s := sizesOf(t, bodySize+plainSink+below+"\"90 °C\"\n[size.s]\nvary = \"sink\"\nchoose_from = [\"9 K/W\", \"5 K/W\", \"7.1 K/W\", \"6 K/W\", \"3 K/W\"]\nwant = \"largest\"\n", "").Sizes[0]
	if !s.Met || *s.Value != 6 || s.Choice.Value != 6 || len(s.RunnersUp) != 2 || s.RunnersUp[0].Value != 5 || math.Abs(*s.Margin-10) > 1e-9 {
		t.Errorf("%+v", s)
	}
	s = sizesOf(t, bodySize+plainSink+below+"\"90 °C\"\n[size.s]\nvary = \"sink\"\nchoose_from = [\"9 K/W\", \"8 K/W\"]\n", "").Sizes[0]
	if s.Met || s.Choice.Value != 8 || s.Choice.Met {
		t.Errorf("%+v", s)
	}
}

// Each part sets a resistance and a heat capacity: the cheapest that stays below 90 °C.
func TestSizeCatalogue(t *testing.T) {
	dir := t.TempDir()
	parts := "part,sink / K/W,mass [J/K],cost / EUR\nA,8,40,1\nB,6.5,60,4\nC,3,90,2.5\nD,2,120,3\nE,1,200,9\n"
	if err := os.WriteFile(filepath.Join(dir, "sinks.csv"), []byte(parts), 0o644); err != nil {
		t.Fatal(err)
	}
	src := bodySize + plainSink + below + "\"90 °C\"\n[size.s]\nvary = \"sink\"\ncatalogue = \"sinks.csv\"\n"
	s := sizesOf(t, src+"least = \"cost\"\n", dir).Sizes[0]
	if !s.Met || s.Choice.Name != "C" || *s.Choice.Least != 2.5 || s.Choice.Sets[1].Value != 90 || *s.Value != 3 || math.Abs(*s.Margin-40) > 1e-9 {
		t.Errorf("%+v", s)
	}
	var next []string
	for _, r := range s.RunnersUp {
		next = append(next, r.Name)
	}
	if strings.Join(next, " ") != "D B E" {
		t.Errorf("runners-up %v", next)
	}
	if s = sizesOf(t, src+"want = \"largest\"\n", dir).Sizes[0]; s.Choice.Name != "B" {
		t.Errorf("%+v", s)
	}
}

// The area that radiates 100 W at 100 °C into a room of 20 °C: P = ε·σ·A·(T⁴ − T₀⁴), a case
// that is marched.
func TestSizeMarched(t *testing.T) {
	src := strings.Replace(bodySize, `x = 1.0`, `area = "0.5 m²"`, 1) + `
[thermal.resistance.face]
between = ["body", "room"]
radiation = { emissivity = 0.9, area = "= area" }
` + below + "\"100 °C\"\n[size.a]\nvary = \"area\"\nrange = [\"0.02 m²\", \"2 m²\"]\n"
	s := sizesOf(t, strings.Replace(src, `load = "10 W"`, `load = "100 W"`, 1), "").Sizes[0]
	want := 100 / (0.9 * 5.670374419e-8 * (math.Pow(373.15, 4) - math.Pow(293.15, 4)))
	if !s.Met || math.Abs(*s.Value-want) > 1e-6*want || len(s.Crossings) != 1 {
		t.Errorf("%v, want %v: %s", s.Value, want, s.Text)
	}
}

// The case is as it was after its sizes were asked for.
func TestSizeLeavesTheCase(t *testing.T) {
	c, ds := casefile.Read("case.toml", []byte(bodySize+plainSink+below+"\"90 °C\"\n[size.s]\nvary = \"sink\"\nrange = [\"1 K/W\", \"9 K/W\"]\n"), nil, thermal.Vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, _ := study.New(c)
	for range 2 {
		if _, err := m.Sizes(nil); err != nil {
			t.Fatal(err)
		}
		l, err := m.Limits()
		if err != nil || math.Abs(*l.Limits[0].Value-313.15) > 1e-9 {
			t.Fatalf("%v %+v", err, l)
		}
	}
	if _, err := m.Sizes([]string{"t"}); err == nil || !strings.Contains(err.Error(), `"t" is no size of the case`) {
		t.Error(err)
	}
}

func TestSizeWithoutEffect(t *testing.T) {
	more := below + "\"90 °C\"\n[limit.room]\nof = \"room\"\nstay_below = \"30 °C\"\n[size.s]\nvary = \"sink\"\nrange = [\"0 K/W\", \"9 K/W\"]\nto_meet = [\"room\"]\n"
	a := sizesOf(t, bodySize+plainSink+more, "")
	found := false
	for _, w := range a.Warnings {
		found = found || strings.Contains(w.Text, "no margin changes with sink")
	}
	if !found {
		t.Errorf("%+v", a.Warnings)
	}
	if r := a.Sizes[0].Range; r[0] <= 0 || r[0] > 1e-5 { // 0 K/W is no resistance
		t.Error(r)
	}
	c, ds := casefile.Read("case.toml", []byte(bodySize+plainSink+more+"[scenario.a]\nlimits = [\"hot\"]\n"), nil, thermal.Vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, _ := study.New(c)
	if _, err := m.Sizes(nil); err == nil || !strings.Contains(err.Error(), "no scenario asks for a limit") {
		t.Error(err)
	}
}
