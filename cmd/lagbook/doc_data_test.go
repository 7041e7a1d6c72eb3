package main

import (
	"bytes"
	"strings"
	"testing"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
	"lagbook/testdata/demo"

	"github.com/google/go-cmp/cmp"
)

// Each demo says before its first number, in every format made for people, that
// its data are invented.
func TestDemosSayThatTheyAreInvented(t *testing.T) {
	cases, err := demo.Cases.ReadDir(".")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range cases {
		if !strings.HasSuffix(c.Name(), ".toml") {
			continue // data beside a case
		}
		for _, format := range present.Formats() {
			code, page, stderr := call(t, "", "demo", "../../testdata/demo/"+c.Name(), "--quiet", "--format", format)
			if code != exitDone && code != exitLimit {
				t.Fatalf("%s: exit %d: %s", c.Name(), code, stderr)
			}
			for _, start := range []string{"<h1>", "\\section*{"} {
				if i := strings.Index(page, start); i >= 0 {
					page = page[i:]
				}
			}
			if i := strings.Index(page, "invented data"); i < 0 || strings.Count(page[:i], "\n") > 2 {
				t.Errorf("%s as %s does not open with the label:\n%.300s", c.Name(), format, page)
			}
		}
	}
}

func caseOf(t *testing.T, src string) *casefile.Case {
	t.Helper()
	c, ds := casefile.Read("case.toml", []byte(src), nil, vocabulary()...)
	if c == nil {
		t.Fatal(casefile.Listing(ds))
	}
	return c
}

const smallCase = `
[given]
room = { value = "20 °C", source = "measured" }
area = "2 m²"
[thermal.node.room]
held = "= room"
[thermal.node.body]
capacitance = { value = "400 J/K", source = "estimated" }
[thermal.resistance.film]
between = ["body", "room"]
film = { coefficient = "5 W/(m²·K)", area = "= area" }
source = "data sheet 12, page 3"
[thermal.source.load]
into = "body"
drive = "10 W"
source = "invented"
`

func TestDataWords(t *testing.T) {
	for _, x := range []struct{ src, label, words string }{
		{smallCase, "some data invented", "data: invented: load; estimated: body; measured: room"},
		{"author = \"invented\"\n" + smallCase, "invented data", "data: all invented; as if estimated: body; as if measured: room"},
		{"author = \"A. N. Other\"\ndate = 2025-03-10\nrevision = \"B\"\n" + strings.NewReplacer("invented", "drawing", "measured", "log", "estimated", "list").Replace(smallCase), "", ""},
	} {
		c := caseOf(t, x.src)
		if got := dataWords(c); got != x.words {
			t.Errorf("%q, want %q", got, x.words)
		}
		d := newDoc(c)
		if d.Label != x.label {
			t.Errorf("label %q, want %q", d.Label, x.label)
		}
		if c.Revision == "B" {
			want := []present.Fact{{Name: "author", Value: "A. N. Other"}, {Name: "date", Value: "2025-03-10"}, {Name: "revision", Value: "B"}}
			if diff := cmp.Diff(want, d.About); diff != "" {
				t.Error(diff)
			}
		}
	}
}

// A long source stands once, under its number, however many values it has.
func TestSourceNotes(t *testing.T) {
	var n sourceNotes
	got := []string{n.behind("R", ""), n.behind("R", "measured"), n.behind("R", "a table in a handbook"), n.cell("another such table"), n.behind("", "a table in a handbook"), n.known("looked up", "it"), n.known("from memory, check before use", "it")}
	want := []string{"R", "R (measured)", "R [1]", "[2]", "[1]", "looked up: it", "[3] check"}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Error(diff)
	}
	var b bytes.Buffer
	if err := present.Text(&b, present.Doc{Parts: n.parts()}); err != nil || !strings.Contains(b.String(), "[1]  a table in a handbook\n") {
		t.Errorf("%v\n%s", err, b.String())
	}
}
