package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

// demoCases are the embedded cases beside which lie the figures of an independent model.
func demoCases(t *testing.T) []string {
	files, err := filepath.Glob("../../testdata/demo/*.expected.json")
	if err != nil || len(files) == 0 {
		t.Fatalf("no cases with figures: %v", err)
	}
	for i, f := range files {
		files[i] = strings.TrimSuffix(f, ".expected.json") + ".toml"
	}
	return files
}

func caseName(file string) string { return strings.TrimSuffix(filepath.Base(file), ".toml") }

// The embedded cases against models of their own, which lie beside them in models.
func TestDemoFigures(t *testing.T) {
	for _, file := range demoCases(t) {
		t.Run(caseName(file), func(t *testing.T) { checkJob(t, file) })
	}
}

// unsteady say why a case has no cycle: the pump of the press starts by pressure, not with
// the strokes, so that no number of strokes brings the same again.
var unsteady = map[string]string{"press-circuit": "there is no steady cycle"}

// Every verb that takes a case answers for each of them.
func TestDemoVerbs(t *testing.T) {
	for _, file := range demoCases(t) {
		t.Run(caseName(file), func(t *testing.T) {
			for _, args := range [][]string{{"check", file}, {"poles", file}, {"table", file}, {"limits", file}, {"cycle", file},
				{"frequency", file}, {"plot", file}, {"compare", file, file}} {
				code, out, stderr := call(t, "", append(args, "--quiet")...)
				if why, ok := unsteady[caseName(file)]; ok && args[0] == "cycle" {
					if code != exitCase || !strings.Contains(stderr, why) {
						t.Errorf("cycle: exit %d: %s", code, stderr)
					}
					continue
				}
				if code != exitDone && code != exitLimit || out == "" {
					t.Errorf("%s: exit %d: %s", args[0], code, stderr)
				}
			}
		})
	}
}

// The page of each of them is what was last read through and found good.
func TestDemoPages(t *testing.T) {
	for _, file := range demoCases(t) {
		t.Run(caseName(file), func(t *testing.T) {
			code, got, stderr := call(t, "", "demo", file, "--quiet")
			if code != exitDone {
				t.Fatalf("exit %d: %s", code, stderr)
			}
			name := filepath.Join("testdata", "golden", caseName(file)+".text")
			if *update {
				if err := os.WriteFile(name, []byte(got), 0o644); err != nil {
					t.Fatal(err)
				}
			}
			want, err := os.ReadFile(name)
			if err != nil {
				t.Fatal(err)
			}
			if diff := cmp.Diff(steady(string(want)), steady(got)); diff != "" {
				t.Errorf("-want +got:\n%s", diff)
			}
		})
	}
}
