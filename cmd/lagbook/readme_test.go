package main

import (
	"bytes"
	"io"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// What README.md shows is what the command prints: its case is written out and
// each console block run beside it. A block may stop before the end of the page.
func TestReadme(t *testing.T) {
	text, err := os.ReadFile(filepath.Join("..", "..", "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	t.Chdir(t.TempDir())
	for _, m := range regexp.MustCompile("(?s)```toml (\\S+)\n(.*?)```").FindAllSubmatch(text, -1) {
		if err := os.WriteFile(string(m[1]), m[2], 0o644); err != nil {
			t.Fatal(err)
		}
	}
	blocks := regexp.MustCompile("(?s)```console\n\\$ lagbook ([^\n]*)\n(.*?)```").FindAllSubmatch(text, -1)
	if len(blocks) == 0 {
		t.Fatal("README.md shows no command")
	}
	for _, m := range blocks {
		var out bytes.Buffer
		if code := run(strings.Fields(string(m[1])), strings.NewReader(""), &out, io.Discard); code != exitDone {
			t.Errorf("lagbook %s: exit %d", m[1], code)
		}
		if shown := strings.TrimRight(string(m[2]), "\n"); !strings.HasPrefix(out.String(), shown) {
			t.Errorf("lagbook %s prints\n%s\nREADME.md shows\n%s", m[1], out.String(), shown)
		}
	}
}
