package study

import (
	"os"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/thermal"
)

// A scenario of loads keeps the reduction of the network; one of parts does not.
func TestUseKeepsTheReduction(t *testing.T) {
	src, err := os.ReadFile("../../testdata/demo/cell-row.toml")
	if err != nil {
		t.Fatal(err)
	}
	text := string(src) + "\n[scenario.pad]\nset = { pad = \"0.3 K/W\" }\n[scenario.level]\nset = { film = \"60 W/K\" }\n"
	c, ds := casefile.Read("cell-row.toml", []byte(text), nil, thermal.Vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, _ := New(c)
	all, _ := m.Scenarios(nil)
	if _, err := m.TablesUnder(all[:1]); err != nil {
		t.Fatal(err)
	}
	for _, s := range all {
		before := m.red
		if ds := m.Use(s); casefile.Failed(ds) {
			t.Fatal(casefile.Listing(ds))
		}
		if kept := m.red == before && before != nil; kept == strings.Contains("pad", s.Name) {
			t.Errorf("%s: kept %v", s.Name, kept)
		}
		if _, err := m.response(); err != nil {
			t.Fatal(err)
		}
		if s.Name == "pad" { // and back
			if ds := m.Use(all[0]); casefile.Failed(ds) || m.red != nil {
				t.Errorf("the reduction of another network is kept")
			}
			if _, err := m.response(); err != nil {
				t.Fatal(err)
			}
		}
	}
}

// A copy may be set to other values as often as one likes: the model it is of keeps its own.
func TestCopyLeavesTheOriginal(t *testing.T) {
	src, err := os.ReadFile("../../testdata/demo/cell-row.toml")
	if err != nil {
		t.Fatal(err)
	}
	c, ds := casefile.Read("cell-row.toml", src, nil, thermal.Vocabulary()...)
	if casefile.Failed(ds) {
		t.Fatal(casefile.Listing(ds))
	}
	m, _ := New(c)
	own := m.par.Clone()
	x := m.copied()
	given := c.GivenValues()
	for i := range given {
		given[i].SI *= 1.01
		given[i].Exact = nil
	}
	for range 3 {
		if ds := x.At(given); casefile.Failed(ds) {
			t.Fatal(casefile.Listing(ds))
		}
	}
	if !sameNumbers(own, m.par) || sameNumbers(x.par, m.par) {
		t.Error("the numbers of a model changed with those of its copy")
	}
}
