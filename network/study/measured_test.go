package study_test

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/study"
)

// logged builds body with a log of it.
func logged(t *testing.T, log string) *study.Model {
	t.Helper()
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, "log.csv"), []byte(log), 0o600); err != nil {
		t.Fatal(err)
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	text := body + "[run]\nto = \"600 s\"\n[[table]]\nshow = [\"body\"]\ntimes = [\"0 s\"]\n[measured.probe]\nof = \"body\"\nfile = \"log.csv\"\ncolumn = \"body\"\n"
	c, ds := casefile.Read("case.toml", []byte(text), root, vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, ds := study.New(c)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	return m
}

// A log that is off by a constant, and by ±1 K in turn: offset, root-mean-square and worst
// in closed form. Rows after the run are left out, and said to be.
func TestMeasured(t *testing.T) {
	off := []float64{0.5, -1.5, 0.5, -1.5, 0.5, 2.5} // measured less predicted
	log := "t / s, body / °C\n"
	for i, d := range off {
		at := float64(100 * i)
		log += fmt.Sprintf("%.17g, %.17g\n", at, 20+rise(at)+d)
	}
	m := logged(t, log+"700, 25\n")
	a, err := m.Tables()
	if err != nil {
		t.Fatal(err)
	}
	if len(a.Measured) != 1 || len(a.Measured[0].Rows) != len(off) {
		t.Fatalf("measured: %+v", a.Measured)
	}
	x := a.Measured[0]
	sum, squares := 0.0, 0.0
	for _, d := range off {
		sum, squares = sum-d, squares+d*d
	}
	near(t, "offset", &x.Offset, sum/6, 1e-12)
	near(t, "root-mean-square", &x.RMS, math.Sqrt(squares/6), 1e-12)
	near(t, "worst", &x.Worst, -2.5, 1e-12)
	near(t, "at", &x.At, 500, 0)
	said := false
	for _, w := range a.Warnings {
		said = said || strings.Contains(w.Text, "1 of 7 rows of log.csv lie outside the run")
	}
	if !said {
		t.Errorf("warnings: %v", a.Warnings)
	}
}
