package casefile_test

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network/casefile"
)

// sizeBase is a good case but for what stands in [size.s]. Invented.
const sizeBase = `
[given]
film = "2 K/W"
back = "1 K/W"
both = "= film + back"
idle = "3 W"
room = "20 °C"
[run]
to = "100 s"
[thermal.node.body]
capacitance = "100 J/K"
[thermal.node.room]
held = "= room"
[thermal.resistance.film]
between = ["body", "room"]
value = "= both"
[limit.hot]
of = "body"
stay_below = "60 °C"
[limit.soon]
of = "body"
reach = "30 °C"
within = "50 s"
[size.s]
`

// readSize reads the case with the lines of its size, in a directory of data files.
func readSize(t *testing.T, lines string, files map[string]string) (*casefile.Case, string) {
	t.Helper()
	dir := t.TempDir()
	for name, text := range files {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	c, ds := casefile.Read("case.toml", []byte(sizeBase+lines), root, profileVocabulary()...)
	return c, casefile.Listing(ds)
}

func TestSizeRead(t *testing.T) {
	c, said := readSize(t, "vary = \"film\"\nrange = [\"500 mK/W\", \"5 K/W\"]\nseries = \"E24\"\nto_meet = [\"hot\"]\nmargin = \"2 K\"\nwant = \"largest\"\n", nil)
	if c == nil {
		t.Fatal(said)
	}
	s, v := c.Questions.Sizes[0], values(t, c)
	if s.Vary != "film" || v.Num[s.Range[0]] != 0.5 || v.Num[s.Range[1]] != 5 || s.PerUnit != 1e-3 || s.Unit != "mK/W" || v.Num[s.Margin] != 2 || s.MarginShare || s.Want != "largest" {
		t.Errorf("%+v", s)
	}
	c, said = readSize(t, "vary = \"film\"\ncatalogue = \"films.csv\"\nleast = \"mass\"\n", map[string]string{"films.csv": "name;film / mK/W;back / K/W;mass / g\nthin;250,5;1;3\nthick;900;2;7\n"})
	if c == nil {
		t.Fatal(said)
	}
	k := c.Questions.Sizes[0].Catalogue
	if len(k.Columns) != 2 || k.Columns[0].Values[0] != 0.2505 || k.Columns[1].Values[1] != 2 || k.Cost[1] != 7 || k.Unit != "g" || k.Parts[1] != "thick" {
		t.Errorf("%+v", k)
	}
}

// Each fault names its place, what was found and what to do.
func TestSizeFaults(t *testing.T) {
	const span = "range = [\"1 K/W\", \"5 K/W\"]\n"
	rows := strings.Repeat("a,1,2\n", 100_000)
	for _, c := range []struct {
		lines string
		want  []string
		file  string
	}{
		{"vary = \"flim\"\n" + span, []string{`"flim" is not defined in [given]`, `"film"`}, ""},
		{"vary = \"both\"\n" + span, []string{`"both" is an expression`, "film"}, ""},
		{"vary = \"idle\"\nrange = [\"1 W\", \"2 W\"]\n", []string{`nothing in the case depends on "idle"`}, ""},
		{"vary = \"film\"\n", []string{"range", "choose_from", "catalogue"}, ""},
		{span, []string{"vary"}, ""},
		{"vary = \"film\"\nrange = [\"1 W\", \"2 W\"]\n", []string{"1 W", "thermal resistance"}, ""},
		{"vary = \"film\"\nrange = [\"5 K/W\", \"1 K/W\"]\n", []string{"the lower value comes first"}, ""},
		{"vary = \"film\"\nrange = [\"-5 K/W\", \"1 K/W\"]\n", []string{"crosses zero", "begin, or end, at zero"}, ""},
		{"vary = \"film\"\nrange = [\"1 K/W\"]\n", []string{"list of two values"}, ""},
		{"vary = \"film\"\nchoose_from = []\n", []string{"choose_from", "list of values"}, ""},
		{"vary = \"film\"\nchoose_from = [\"1 K/W\", \"2 s\"]\n", []string{"2 s"}, ""},
		{"vary = \"film\"\n" + span + "choose_from = [\"1 K/W\"]\n", []string{"choose_from"}, ""},
		{"vary = \"film\"\n" + span + "to_meet = [\"hit\"]\n", []string{`"hit" is not the name of a limit`, `"hot"`}, ""},
		{"vary = \"film\"\n" + span + "to_meet = []\n", []string{"names no limit"}, ""},
		{"vary = \"film\"\n" + span + "margin = \"1 K\"\n", []string{`no margin of limit "soon"`, "to_meet"}, ""},
		{"vary = \"film\"\n" + span + "margin = \"5 %\"\n", []string{"is a share", "hot"}, ""},
		{"vary = \"film\"\n" + span + "margin = \"-1 K\"\nto_meet = [\"hot\"]\n", []string{"-1 K"}, ""},
		{"vary = \"film\"\n" + span + "series = \"E13\"\n", []string{"E12"}, ""},
		{"vary = \"room\"\nrange = [\"-5 °C\", \"30 °C\"]\nseries = \"R10\"\n", []string{"preferred numbers"}, ""},
		{"vary = \"film\"\n" + span + "want = \"small\"\n", []string{"smallest"}, ""},
		{"vary = \"film\"\n" + span + "least = \"mass\"\n", []string{"catalogue"}, ""},
		{"vary = \"film\"\ncatalogue = \"none.csv\"\n", []string{"does not exist"}, ""},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\n", []string{`no column "film"`, `did you mean "flim"`}, "part,flim / K/W\na,1\n"},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\n", []string{"no unit in the header", "film / "}, "part,film\na,1\n"},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\n", []string{"film / s"}, "part,film / s\na,1\n"},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\nleast = \"cost\"\n", []string{`no column "cost"`}, "part,film / K/W\na,1\n"},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\n", []string{"row 2", "is not a number"}, "part,film / K/W\na,1\nb,two\n"},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\n", []string{"both", "is an expression"}, "part,film / K/W,both / K/W\na,1,2\n"},
		{"vary = \"film\"\ncatalogue = \"f.csv\"\n", []string{"100000 parts", "10000"}, "part,film / K/W,back / K/W\n" + rows},
	} {
		k, said := readSize(t, c.lines, map[string]string{"f.csv": c.file})
		if k != nil {
			t.Errorf("read without a fault:\n%s", c.lines)
			continue
		}
		for _, w := range append(c.want, "size") {
			if !strings.Contains(said, w) {
				t.Errorf("%s%s\ndoes not say %q", c.lines, said, w)
			}
		}
	}
	if k, said := readSize(t, "vary = \"film\"\n"+fmt.Sprintf("choose_from = [%s]\n", strings.Repeat("\"1 K/W\", ", 1001)), nil); k != nil || !strings.Contains(said, "1001 values") {
		t.Error(said)
	}
	// A column that nothing has the name of may be a misspelling.
	if k, said := readSize(t, "vary = \"film\"\ncatalogue = \"f.csv\"\n", map[string]string{"f.csv": "part,film / K/W,bakc / K/W\na,1,2\n"}); k == nil || !strings.Contains(said, `did you mean "back"`) {
		t.Error(said)
	}
}
