package main

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"sort"
	"strconv"
	"strings"
	"testing"
)

// A figure of a whole job, computed by an independent model: closed forms, exact
// exponentials at 40 digits, or two integrators at tight tolerances. Each tolerance is
// stated with its figure.
type figure struct {
	Verb   string   `json:"verb"`
	Path   string   `json:"path"`
	Value  any      `json:"value"`
	TolAbs *float64 `json:"tol_abs"`
	TolRel *float64 `json:"tol_rel"`
	Why    string   `json:"why"`
}

// Whole jobs through the command, as JSON, against independently computed answers.
func TestJobs(t *testing.T) {
	files, err := filepath.Glob("../../testdata/jobs/*.toml")
	if err != nil || len(files) == 0 {
		t.Fatalf("no jobs: %v", err)
	}
	for _, file := range files {
		t.Run(strings.TrimSuffix(filepath.Base(file), ".toml"), func(t *testing.T) { checkJob(t, file) })
	}
}

func checkJob(t *testing.T, file string) {
	src, err := os.ReadFile(strings.TrimSuffix(file, ".toml") + ".expected.json")
	if err != nil {
		t.Fatal(err)
	}
	var figures []figure
	if err := json.Unmarshal(src, &figures); err != nil {
		t.Fatal(err)
	}
	answers := map[string]map[string]any{}
	for _, f := range figures {
		a, ok := answers[f.Verb]
		if !ok {
			code, out, stderr := call(t, "", f.Verb, file, "--format", "json")
			if code != exitDone && code != exitLimit {
				t.Fatalf("%s: exit %d: %s", f.Verb, code, stderr)
			}
			if err := json.Unmarshal([]byte(out), &a); err != nil {
				t.Fatal(err)
			}
			answers[f.Verb] = a
		}
		got, err := find(a, f.Path)
		if err != nil {
			t.Errorf("%s %s: %v", f.Verb, f.Path, err)
			continue
		}
		f.compare(t, got)
	}
}

func (f figure) compare(t *testing.T, got any) {
	want, number := f.Value.(float64)
	if !number {
		if got != f.Value {
			t.Errorf("%s %s is %v, want %v (%s)", f.Verb, f.Path, got, f.Value, f.Why)
		}
		return
	}
	tol := 1e-9 * math.Abs(want)
	switch {
	case f.TolAbs != nil:
		tol = *f.TolAbs
	case f.TolRel != nil:
		tol = *f.TolRel * math.Abs(want)
	}
	x, ok := got.(float64)
	if !ok || math.Abs(x-want) > tol+4e-16*math.Abs(want) {
		t.Errorf("%s %s is %v, want %v ± %.2g (%s)", f.Verb, f.Path, got, want, tol, f.Why)
	}
}

var (
	rowPath   = regexp.MustCompile(`^tables\[(\d*)(?:,? ?scenario=(\w+))?\]\.rows\[(t=|peak of )([^\]]+)\]\.(.+)$`)
	namedPath = regexp.MustCompile(`^(\w+)\[(name|output)=([^\],]+)(?:, ?scenario=(\w+))?\]\.(\w+)$`)
	modePath  = regexp.MustCompile(`^poles of the network \[(\d+), slowest first\]\.(\w+)$`)
	eventPath = regexp.MustCompile(`^events\[part=([^\]]+)\]\[(\d+)\]\.(\w+)$`)
	countPath = regexp.MustCompile(`^transfers\[(\d+|input=[^\]]+)[^\]]*\]\.(poles|zeros)\.count$`)
	polePath  = regexp.MustCompile(`^transfers\[(\d+|input=[^\]]+)[^\]]*\]\.(poles|zeros)\[([^\]]+)\]\.(\w+)$`)
	transPath = regexp.MustCompile(`^transfers\[(\d+|input=[^\]]+)[^\]]*\]\.([\w.]+)$`)
	doubling  = regexp.MustCompile(`doubles every ([0-9.]+) (s|min|h|d)\b`)
)

// find reads a path such as "tables[0].rows[t=10 ms].junction" or
// "transfers[0: a to b].poles[unstable].re".
func find(a map[string]any, path string) (any, error) {
	if m := rowPath.FindStringSubmatch(path); m != nil {
		return findRow(a, m[1], m[2], m[3] == "t=", m[4], m[5])
	}
	if m := namedPath.FindStringSubmatch(path); m != nil {
		for _, x := range items(a[m[1]]) {
			if o := x.(map[string]any); o[m[2]] == m[3] && (m[4] == "" || o["scenario"] == m[4]) {
				return field(o, m[5])
			}
		}
		return nil, fmt.Errorf("no %s named %s", m[1], m[3])
	}
	if m := modePath.FindStringSubmatch(path); m != nil {
		return findMode(items(a["modes"]), m[1], m[2])
	}
	if m := eventPath.FindStringSubmatch(path); m != nil {
		return findEvent(items(a["events"]), m[1], m[2], m[3])
	}
	if m := countPath.FindStringSubmatch(path); m != nil {
		return float64(len(items(transferAt(a, m[1])[m[2]]))), nil
	}
	if path == "balance.error" {
		b, _ := a["balance"].(map[string]any)
		return field(b, "error")
	}
	if m := polePath.FindStringSubmatch(path); m != nil {
		roots := items(transferAt(a, m[1])[m[2]])
		return findRoot(roots, m[3], m[4])
	}
	if m := transPath.FindStringSubmatch(path); m != nil {
		o := transferAt(a, m[1])
		keys := strings.Split(m[2], ".")
		for _, k := range keys[:len(keys)-1] {
			o, _ = o[k].(map[string]any)
		}
		return field(o, keys[len(keys)-1])
	}
	if strings.HasPrefix(path, "doubling time, said in words") {
		return findDoubling(a)
	}
	return nil, fmt.Errorf("no way to read this path")
}

// findEvent reads the k-th event of a part.
func findEvent(events []any, part, k, key string) (any, error) {
	left, _ := strconv.Atoi(k)
	for _, x := range events {
		o := x.(map[string]any)
		if o["part"] != part {
			continue
		}
		if left == 0 {
			return field(o, key)
		}
		left--
	}
	return nil, fmt.Errorf("no event %s of %s", k, part)
}

func field(o map[string]any, key string) (any, error) {
	if v, ok := o[key]; ok {
		return v, nil
	}
	return nil, fmt.Errorf("no %s", key)
}

func items(x any) []any { l, _ := x.([]any); return l }

// transferAt finds a transfer function by its number, or "input=a,output=b".
func transferAt(a map[string]any, index string) map[string]any {
	if names, ok := strings.CutPrefix(index, "input="); ok {
		in, out, _ := strings.Cut(names, ",output=")
		for _, x := range items(a["transfers"]) {
			if o := x.(map[string]any); o["input"] == in && o["output"] == out {
				return o
			}
		}
		return nil
	}
	i, _ := strconv.Atoi(index)
	if l := items(a["transfers"]); i < len(l) {
		return l[i].(map[string]any)
	}
	return nil
}

// findMode finds the k-th mode, one that is several at once counted as often.
func findMode(modes []any, k, key string) (any, error) {
	left, _ := strconv.Atoi(k)
	for _, x := range modes {
		o := x.(map[string]any)
		n, _ := o["multiplicity"].(float64)
		if left < int(n) {
			return field(o, key)
		}
		left -= int(n)
	}
	return nil, fmt.Errorf("no mode %s", k)
}

// findRow finds a row by its time, or by its mark, and the cell of a column.
func findRow(a map[string]any, index, scenario string, byTime bool, key, column string) (any, error) {
	i, _ := strconv.Atoi(index) // "": the first
	var own []any
	for _, x := range items(a["tables"]) {
		if scenario == "" || x.(map[string]any)["scenario"] == scenario {
			own = append(own, x)
		}
	}
	if i >= len(own) {
		return nil, fmt.Errorf("no table %d", i)
	}
	tab := own[i].(map[string]any)
	col := -1
	for k, c := range items(tab["columns"]) {
		if c.(map[string]any)["name"] == column {
			col = k
		}
	}
	if col < 0 {
		return nil, fmt.Errorf("no column %s", column)
	}
	row := -1
	if byTime {
		want := seconds(key)
		for k, r := range items(tab["rows"]) {
			if math.Abs(items(r)[0].(float64)-want) <= 1e-9*math.Max(1, want) {
				row = k
			}
		}
	} else {
		for _, m := range items(tab["marks"]) {
			if mark := m.(map[string]any); strings.Contains(mark["text"].(string), "peak of "+key) {
				row = int(mark["row"].(float64))
			}
		}
	}
	if row < 0 {
		return nil, fmt.Errorf("no row %s", key)
	}
	return items(items(tab["rows"])[row])[col], nil
}

// findRoot picks a pole or zero: by its place among the slowest, "slow", "fast",
// "im>0", "slowest pair" and "second pair", or "unstable" and "stable". Of a pair the
// one with the positive imaginary part comes first.
func findRoot(roots []any, sel, key string) (any, error) {
	at := func(x any, k string) float64 { v, _ := x.(map[string]any)[k].(float64); return v }
	sort.SliceStable(roots, func(i, j int) bool {
		a, b := math.Hypot(at(roots[i], "re"), at(roots[i], "im")), math.Hypot(at(roots[j], "re"), at(roots[j], "im"))
		return a < b*(1-1e-12) || a <= b*(1+1e-12) && at(roots[i], "im") > at(roots[j], "im")
	})
	if which, ok := strings.CutSuffix(sel, " pair,im>0"); ok {
		k := map[string]int{"slowest": 0, "second": 1}[which]
		for _, r := range roots {
			if at(r, "im") <= 0 {
				continue
			}
			if k == 0 {
				return field(r.(map[string]any), key)
			}
			k--
		}
	}
	n, err := strconv.Atoi(strings.SplitN(sel, ",", 2)[0])
	switch sel {
	case "slow":
		n, err = 0, nil
	case "fast":
		n, err = len(roots)-1, nil
	}
	for i, r := range roots {
		re, im := at(r, "re"), at(r, "im")
		if err == nil && i == n || sel == "im>0" && im > 0 || err != nil && sel != "im>0" && (re > 0) == (sel == "unstable") {
			return field(r.(map[string]any), key)
		}
	}
	return nil, fmt.Errorf("no root %s", sel)
}

// findDoubling reads the doubling time out of the warnings.
func findDoubling(a map[string]any) (any, error) {
	for _, w := range items(a["warnings"]) {
		if m := doubling.FindStringSubmatch(w.(map[string]any)["text"].(string)); m != nil {
			return seconds(m[1] + " " + m[2]), nil
		}
	}
	return nil, fmt.Errorf("no warning names a doubling time")
}

// seconds reads "10 ms".
func seconds(s string) float64 {
	number, unit, _ := strings.Cut(s, " ")
	v, err := strconv.ParseFloat(number, 64)
	if err != nil {
		return math.NaN()
	}
	return v * map[string]float64{"": 1, "s": 1, "ms": 1e-3, "min": 60, "h": 3600, "d": 86400}[unit]
}
