package present

import (
	"bytes"
	"errors"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

var update = flag.Bool("update", false, "rewrite the expected pages")

// rich is a page with every part, and with names and texts that try to be more
// than text in each format.
func rich() Doc {
	return Doc{
		Title: "Inverter of the test bench: 40 s overload <script> & 100 %",
		Parts: []Part{
			Paragraph{"The junction reaches 143.2 °C at 40 s, 6.8 K below its limit of 150 °C. The limit that governs is \"junction\", met with a margin of 5 % of the way from the start value."},
			Heading{1, "Network"},
			Facts{[]Fact{
				{"Start", "steady state of the values just before t = 0"},
				{"Slowest", "τ = 13.2 min, the sink against the air; it carries 84 % of the rise and moves nearly alone"},
				{"A name far too long for the narrow column it would have to share", "stands above its value"},
			}},
			List{[]string{"node_one: 12 J/K", "1. looks like a numbered item", "resistance a|b of 0.35 K/W, between *case* and `sink`, is estimated and is said at such a length that the line has to be broken somewhere"}},
			Heading{2, "Time constants"},
			Table{
				Caption: "Poles",
				Columns: []Column{{"τ", Left}, {"share", Right}, {"what moves | together", Left}},
				Rows:    [][]string{{"13.2 min", "84 %", "sink_1, air"}, {"2.1 s", "16 %", "junction & case"}, {"µs", "", "熱"}},
			},
			Table{
				Caption:  "Through the load profile",
				Columns:  []Column{{"t / s", Point}, {"junction / °C", Point}, {"ΔT / mK", Point}, {"state", Left}},
				Rows:     [][]string{{"0", "40.0", "-0.5", "=1+1"}, {"9.5", "98.62", "1.5e-5", "@home"}, {"40", "143.2", "never", "-x"}, {"100.25", "7"}},
				Marks:    []string{"", "load 18 W → 45 W", "load 45 W → 18 W", ""},
				Full:     [][]string{{"0", "313.15", "-0.0005", "=1+1"}, {"9.5", "371.7712345678901", "1.5e-08", "@home"}, {"40", "416.35", "", "-x"}, {"100.25", "280.15"}},
				FullHead: []string{"t / s", "junction / K", "ΔT / K", "state"},
			},
			Formula{"τ ≈ R·C = 0.35 K/W · 12 kJ/K = 4200 s"},
			Warning{"The case starts at the steady state of its own overload: give `before`, or a jump at 0 s."},
			Caution{"A calculation, not a measurement. Linear about the start; radiation is left out."},
		},
	}
}

func TestGolden(t *testing.T) {
	for _, format := range Formats() {
		t.Run(format, func(t *testing.T) {
			var b bytes.Buffer
			if err := Encode(&b, format, rich()); err != nil {
				t.Fatal(err)
			}
			golden(t, "rich."+format, b.Bytes())
		})
	}
}

func golden(t *testing.T, name string, got []byte) {
	t.Helper()
	path := filepath.Join("testdata", name)
	if *update {
		if err := os.WriteFile(path, got, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if d := cmp.Diff(strings.Split(string(want), "\n"), strings.Split(string(got), "\n")); d != "" {
		t.Errorf("%s (-want +got):\n%s", name, d)
	}
}

// Pages for people end their lines without spaces and carry no escape codes.
func TestLinesAreClean(t *testing.T) {
	d := rich()
	d.Parts = append(d.Parts, Paragraph{"\x1b[31mred\x1b[0m\r\n  two  \x00"}, Heading{9, "deep"}, Table{Columns: []Column{{"x\x1b", Left}}, Rows: [][]string{{"a  "}, {"\tb"}}})
	for _, format := range Formats() {
		var b bytes.Buffer
		if err := Encode(&b, format, d); err != nil {
			t.Fatal(err)
		}
		if bytes.ContainsAny(b.Bytes(), "\x1b\r\x00\x7f\t") {
			t.Errorf("%s: a control character", format)
		}
		for i, line := range strings.Split(b.String(), "\n") {
			if format == "text" && line != strings.TrimRight(line, " ") {
				t.Errorf("%s: line %d ends in a space: %q", format, i+1, line)
			}
		}
	}
}

// The locale must not change a page.
func TestPagesDoNotDependOnTheLocale(t *testing.T) {
	t.Setenv("RUNEWIDTH_EASTASIAN", "1")
	t.Setenv("LC_ALL", "ja_JP.UTF-8")
	var b bytes.Buffer
	if err := Text(&b, rich()); err != nil {
		t.Fatal(err)
	}
	want, err := os.ReadFile(filepath.Join("testdata", "rich.text"))
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(want, b.Bytes()) {
		t.Error("the page differs")
	}
}

func TestEmptyDocuments(t *testing.T) {
	for _, d := range []Doc{
		{},
		{Parts: []Part{Table{}, Table{Caption: "none"}, List{}, Facts{}, Paragraph{}, Heading{}}},
		{Title: "t", Parts: []Part{Table{Columns: []Column{{"a", Point}, {"b", Left}}}}},
		{Parts: []Part{Table{Columns: []Column{{"a", Point}}, Rows: [][]string{{}, {"1", "surplus"}, nil}, Marks: []string{"", "", "", "surplus"}}}},
		{Parts: []Part{Facts{[]Fact{{"a", "=b"}}}}},
	} {
		for _, format := range Formats() {
			if err := Encode(&bytes.Buffer{}, format, d); err != nil {
				t.Errorf("%s of %+v: %v", format, d, err)
			}
		}
	}
}

func TestUnknownFormat(t *testing.T) {
	err := Encode(&bytes.Buffer{}, "docx", Doc{})
	if err == nil || !strings.Contains(err.Error(), "text, markdown, csv, html, latex") {
		t.Error(err)
	}
}

// A full disk is an error in every format.
func TestWriteErrors(t *testing.T) {
	for _, format := range Formats() {
		if err := Encode(failing{}, format, rich()); !errors.Is(err, errFull) {
			t.Errorf("%s: %v", format, err)
		}
	}
}

var errFull = errors.New("full")

type failing struct{}

func (failing) Write([]byte) (int, error) { return 0, errFull }

func TestFold(t *testing.T) {
	for _, c := range []struct {
		s    string
		room int
		want []string
	}{
		{"", 10, []string{""}},
		{"one two three", 7, []string{"one two", "three"}},
		{"unbreakable word", 4, []string{"unbreakable", "word"}},
		{"ab cd", 5, []string{"ab cd"}},
		{"日本 語", 4, []string{"日本", "語"}},
	} {
		if d := cmp.Diff(c.want, fold(c.s, c.room, width)); d != "" {
			t.Errorf("%q in %d: %s", c.s, c.room, d)
		}
	}
}

func TestIsNumber(t *testing.T) {
	for s, want := range map[string]bool{
		"0": true, "-1.5": true, "+2": true, ".5": true, "5.": true, "1.5e-7": true, "1e+09": true,
		"": false, "-": false, ".": false, "1e": false, "e5": false, "0x1": false, "Inf": false, "NaN": false, "1 W": false, "1-1": false, "--1": false, "1e5e5": false, "-.": false, "1_0": false,
	} {
		if isNumber(s) != want {
			t.Errorf("isNumber(%q) = %v", s, !want)
		}
	}
}
