package casefile_test

import (
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"lagbook/network/casefile"
)

var update = flag.Bool("update", false, "write expected output anew")

// An archive holds mistakes, one to a section, made with the words of a vocabulary.
type archive struct {
	file  string
	words func() []casefile.Vocabulary
	least int // mistakes it holds
}

var archives = []archive{
	{"testdata/malformed.txt", testVocabulary, 60},
	{"testdata/plant.txt", plantVocabulary, 60},
	{"testdata/profile.txt", profileVocabulary, 40},
	{"testdata/parts.txt", testVocabulary, 55},
	{"testdata/asked.txt", profileVocabulary, 90},
}

// A section is one part of an archive: a name and a text.
type section struct{ name, text string }

// sections splits an archive at its "-- name --" lines; head is what stands before.
func sections(text string) (head string, list []section) {
	for _, line := range strings.SplitAfter(text, "\n") {
		trimmed := strings.TrimSuffix(line, "\n")
		switch {
		case strings.HasPrefix(trimmed, "-- ") && strings.HasSuffix(trimmed, " --"):
			list = append(list, section{name: trimmed[3 : len(trimmed)-3]})
		case list == nil:
			head += line
		default:
			list[len(list)-1].text += line
		}
	}
	return head, list
}

// mistakes reads the archive: name, text, expected listing.
func (a archive) mistakes(t *testing.T) (head string, names []string, texts, want map[string]string) {
	t.Helper()
	b, err := os.ReadFile(a.file)
	if err != nil {
		t.Fatal(err)
	}
	head, list := sections(string(b))
	texts, want = map[string]string{}, map[string]string{}
	for _, s := range list {
		if name, ok := strings.CutSuffix(s.name, ": says"); ok {
			want[name] = s.text
			continue
		}
		names = append(names, s.name)
		texts[s.name] = s.text
	}
	return head, names, texts, want
}

// TestMalformed holds every message a user may see, with its place.
func TestMalformed(t *testing.T) {
	for _, a := range archives {
		t.Run(filepath.Base(a.file), a.holds)
	}
}

func (a archive) holds(t *testing.T) {
	head, names, texts, want := a.mistakes(t)
	if len(names) < a.least {
		t.Fatalf("%d mistakes, expected more", len(names))
	}
	var b strings.Builder
	b.WriteString(head)
	for _, name := range names {
		text := texts[name]
		if name != "base" && strings.HasSuffix(name, "+base") {
			text += texts["base"]
		}
		c, diags := casefile.Read("case.toml", []byte(text), nil, a.words()...)
		got := casefile.Listing(diags)
		if (c == nil) != casefile.Failed(diags) {
			t.Errorf("%s: a case and errors, or neither", name)
		}
		b.WriteString("-- " + name + " --\n" + texts[name])
		if name == "base" {
			if got != "" {
				t.Errorf("the good case is refused:\n%s", got)
			}
			continue
		}
		b.WriteString("-- " + name + ": says --\n" + got)
		if got == "" {
			t.Errorf("%s: nothing is said", name)
		}
		if !*update && got != want[name] {
			t.Errorf("%s:\n%s", name, cmp.Diff(want[name], got))
		}
	}
	if *update {
		if err := os.WriteFile(a.file, []byte(b.String()), 0o644); err != nil {
			t.Fatal(err)
		}
	}
}
