package main

import (
	"bytes"
	"encoding/xml"
	"errors"
	"image/png"
	"io"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"testing"

	"lagbook/testdata/demo"
)

// The pictures of the demos are what was last looked at and found good. Numbers may
// differ by what another processor rounds, far below what is seen.
func TestPlotGolden(t *testing.T) {
	drive := filepath.Join("..", "..", "testdata", "demo", demo.Main) // over decades, with jumps
	for what, args := range map[string][]string{
		"response": nil, "frequency": {"--what", "frequency"}, "plane": {"--what", "plane"}, "start": {drive},
	} {
		t.Run(what, func(t *testing.T) {
			code, got, stderr := call(t, "", append([]string{"plot", "--quiet"}, args...)...)
			if code != exitDone {
				t.Fatalf("exit %d: %s", code, stderr)
			}
			name := filepath.Join("testdata", "golden", "plot-"+what+".svg")
			if *update {
				if err := os.WriteFile(name, []byte(got), 0o644); err != nil {
					t.Fatal(err)
				}
			}
			want, err := os.ReadFile(name)
			if err != nil {
				t.Fatal(err)
			}
			if !alike(string(want), got) {
				t.Errorf("%s differs; look at the new picture and run with -update", name)
			}
		})
	}
}

var number = regexp.MustCompile(`-?\d+(\.\d+)?(e[-+]?\d+)?`)

// alike compares two pictures: the same text and, to 0.02 points, the same places.
func alike(a, b string) bool {
	if number.ReplaceAllString(a, "#") != number.ReplaceAllString(b, "#") {
		return false
	}
	x, y := number.FindAllString(a, -1), number.FindAllString(b, -1)
	for i := range x {
		v, err := strconv.ParseFloat(x[i], 64)
		w, err2 := strconv.ParseFloat(y[i], 64)
		if err != nil || err2 != nil || math.Abs(v-w) > 0.02 {
			return false
		}
	}
	return true
}

// Every picture of every demo and job: well-formed, the same bytes twice, no date.
func TestPlots(t *testing.T) {
	cases, err := filepath.Glob("../../testdata/demo/*.toml")
	if err != nil || len(cases) == 0 {
		t.Fatalf("no cases: %v", err)
	}
	jobs, _ := filepath.Glob("../../testdata/jobs/*.toml")
	for _, file := range append(cases, jobs...) {
		for _, what := range pictures {
			if what == "surface" && file != cases[0] {
				continue // the same drawing, and slow
			}
			code, first, stderr := call(t, "", "plot", file, "--what", what)
			if code != exitDone {
				t.Errorf("%s %s: exit %d: %s", file, what, code, stderr)
				continue
			}
			if _, again, _ := call(t, "", "plot", file, "--what", what); again != first {
				t.Errorf("%s %s: two runs differ", file, what)
			}
			if err := wellFormed(first); err != nil {
				t.Errorf("%s %s: %v", file, what, err)
			}
		}
	}
}

func wellFormed(svg string) error {
	d := xml.NewDecoder(bytes.NewReader([]byte(svg)))
	for {
		if _, err := d.Token(); errors.Is(err, io.EOF) {
			return nil
		} else if err != nil {
			return err
		}
	}
}

// A PNG is an image of the size that 160 mm has at 200 dots per inch.
func TestPlotPNG(t *testing.T) {
	file := filepath.Join(t.TempDir(), "a.png")
	var first []byte
	for range 2 {
		if code, _, stderr := call(t, "", "plot", "--quiet", "--what", "surface", "-o", file); code != exitDone {
			t.Fatalf("exit %d: %s", code, stderr)
		}
		b, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		if first != nil && !bytes.Equal(first, b) {
			t.Error("two runs differ")
		}
		first = b
	}
	img, err := png.Decode(bytes.NewReader(first))
	if err != nil {
		t.Fatal(err)
	}
	if w := img.Bounds().Dx(); w != 1260 {
		t.Errorf("%d dots across", w)
	}
}
