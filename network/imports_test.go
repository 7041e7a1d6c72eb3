package network_test

import (
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

const module = "lagbook"

// arrows says which packages of this module each package may import. A name
// ending in "/..." stands for all packages below; the longest name that fits a
// package is its rule.
var arrows = map[string][]string{
	"laplace/matrix":            {},
	"laplace":                   {"laplace/matrix"},
	"network":                   {"laplace", "laplace/matrix", "network/internal/..."},
	"network/internal/...":      {"laplace/matrix", "network/internal/..."},
	"network/quantity":          {},
	"network/casefile":          {"network/quantity", "laplace", "network"},
	"network/casefile/casetest": {"network/casefile", "network", "laplace", "network/quantity", "testdata/demo"}, // for tests of domains
	"network/study":             {"network/casefile", "network", "laplace", "network/quantity"},
	"thermal":                   {"network/casefile", "network", "network/quantity", "laplace", "thermal/material", "hydraulic/fluid"},
	"thermal/material":          {"network/quantity"},
	"hydraulic":                 {"network/casefile", "network", "network/quantity", "laplace", "hydraulic/fluid", "thermal/material"},
	"hydraulic/fluid":           {"network/quantity"},
	"testdata/...":              {},
	"cmd/...":                   {"..."},
}

// topLevel are the only folders at the top of the module.
var topLevel = []string{"cmd", "hydraulic", "laplace", "network", "testdata", "thermal"}

// Imports run one way, from cmd down to laplace/matrix.
func TestImportsPointOneWay(t *testing.T) {
	out, err := exec.Command("go", "list", "-e", "-deps", "-f", `{{.ImportPath}}{{range .Imports}} {{.}}{{end}}`, module+"/...").Output()
	if err != nil {
		t.Fatalf("go list: %v", err)
	}
	seen := 0
	for line := range strings.Lines(string(out)) {
		words := strings.Fields(line)
		if !own(words[0]) {
			continue
		}
		seen++
		from := strings.TrimPrefix(words[0], module+"/")
		rule := ruleOf(from)
		if rule == "" {
			t.Errorf("package %s has no rule: say in arrows what it may import", from)
			continue
		}
		for _, path := range words[1:] {
			to, ours := strings.CutPrefix(path, module+"/")
			if ours && !allowed(arrows[rule], to) {
				t.Errorf("%s imports %s; it may import %v", from, to, arrows[rule])
			}
		}
	}
	if seen < 3 { // this package and the two it stands on
		t.Errorf("go list showed %d packages of %s", seen, module)
	}
}

func own(path string) bool { return strings.HasPrefix(path, module+"/") }

// ruleOf returns the longest name in arrows that fits a package.
func ruleOf(pkg string) string {
	best := ""
	for name := range arrows {
		if fits(name, pkg) && len(name) > len(best) {
			best = name
		}
	}
	return best
}

func fits(name, pkg string) bool {
	below, ok := strings.CutSuffix(name, "...")
	return name == pkg || ok && strings.HasPrefix(pkg+"/", below)
}

func allowed(rule []string, pkg string) bool {
	return slices.ContainsFunc(rule, func(name string) bool { return fits(name, pkg) })
}

func TestTopLevelFolders(t *testing.T) {
	out, err := exec.Command("go", "list", "-m", "-f", "{{.Dir}}", module).Output()
	if err != nil {
		t.Fatalf("go list: %v", err)
	}
	root := strings.TrimSpace(string(out))
	entries, err := os.ReadDir(root)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		if e.IsDir() && !strings.HasPrefix(e.Name(), ".") && !slices.Contains(topLevel, e.Name()) {
			t.Errorf("folder %s at the top; new packages go inside %v", filepath.Base(e.Name()), topLevel)
		}
	}
}
