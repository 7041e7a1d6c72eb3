package main

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"lagbook/cmd/lagbook/internal/present"

	"github.com/google/go-cmp/cmp"
	"github.com/rogpeppe/go-internal/testscript"
)

var update = flag.Bool("update", false, "rewrite the golden outputs")

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"lagbook": main})
}

// Each script says in its first line what a user does and why.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:           "testdata/script",
		UpdateScripts: *update,
		Setup: func(e *testscript.Env) error {
			jobs, err := filepath.Abs("../../testdata/jobs")
			e.Setenv("JOBS", jobs)
			return err
		},
	})
}

// call runs the command in this process.
func call(t *testing.T, stdin string, args ...string) (code int, stdout, stderr string) {
	t.Helper()
	var out, errw bytes.Buffer
	code = run(args, strings.NewReader(stdin), &out, &errw)
	return code, out.String(), errw.String()
}

// The demo in each format is what was last read through and found good.
func TestDemoGolden(t *testing.T) {
	for _, format := range formats() {
		t.Run(format, func(t *testing.T) {
			code, got, stderr := call(t, "", "demo", "--quiet", "--format", format)
			if code != exitDone || stderr != "" {
				t.Fatalf("exit %d, standard error %q", code, stderr)
			}
			name := filepath.Join("testdata", "golden", "demo."+format)
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

var (
	longNumber = regexp.MustCompile(`-?\d+\.\d{9,}(e[-+]?\d+)?`)
	bound      = regexp.MustCompile(`"error_bound": [^,\n]+`)
)

// steady rounds what full precision may change between processors: numbers to
// ten digits; bounds of errors are left out.
func steady(s string) string {
	s = bound.ReplaceAllString(s, `"error_bound": …`)
	return longNumber.ReplaceAllStringFunc(s, func(n string) string {
		v, err := strconv.ParseFloat(n, 64)
		if err != nil {
			return n
		}
		return strconv.FormatFloat(v, 'g', 10, 64)
	})
}

// Same case, same bytes.
func TestSameBytes(t *testing.T) {
	for _, verb := range []string{"demo", "check", "poles", "table", "limits", "cycle"} {
		_, first, _ := call(t, "", verb, "--format", "json")
		for range 5 {
			if _, again, _ := call(t, "", verb, "--format", "json"); again != first {
				t.Errorf("%s: two runs differ:\n%s", verb, cmp.Diff(first, again))
			}
		}
	}
	for _, args := range [][]string{{"table", "--both"}, {"limits"}, {"check", "--flows"}, {"poles"}} { // of a march
		args = append(args, "../../testdata/jobs/press-accumulator.toml", "--format", "json")
		_, first, _ := call(t, "", args...)
		if _, again, _ := call(t, "", args...); again != first || first == "" {
			t.Errorf("%v: two runs differ:\n%s", args, cmp.Diff(first, again))
		}
	}
}

// Every verb that help shows has an example, and the example runs.
func TestExamplesRun(t *testing.T) {
	root := (&app{}).root()
	for _, c := range append(root.Commands(), root) {
		if c.Hidden && c.Name() != "man" {
			continue
		}
		if c.Example == "" {
			t.Errorf("%s has no example", c.Name())
		}
		for _, line := range strings.Split(strings.TrimSpace(c.Example), "\n") {
			line, _, _ = strings.Cut(line, ">") // what a shell would do with the output
			args := strings.Fields(line)
			if args[0] != "lagbook" {
				t.Errorf("%s: example %q does not start with lagbook", c.Name(), line)
				continue
			}
			if code, out, stderr := call(t, "", args[1:]...); code != exitDone || out == "" {
				t.Errorf("%s: exit %d, standard error %q", line, code, stderr)
			}
		}
	}
}

// A format that help names is a format that works; one that it does not name is refused.
func TestFormatsAreThoseOfPresent(t *testing.T) {
	for _, f := range present.Formats() {
		if code, _, stderr := call(t, "", "table", "--format", f); code != exitDone {
			t.Errorf("--format %s: exit %d: %s", f, code, stderr)
		}
	}
	if code, _, _ := call(t, "", "table", "--format", "pdf"); code != exitUsage {
		t.Errorf("--format pdf: exit %d, want %d", code, exitUsage)
	}
}
