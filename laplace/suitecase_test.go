package laplace

import (
	"encoding/json"
	"os"
	"testing"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace/matrix"
)

// suiteFile is testdata/systems.json: linear systems with answers of 30 digits,
// rounded to doubles. Source: computed with mpmath at 280 digits from exact
// decimals; element values invented. At rounding the element values the reference
// and a double differ by about 1e-16 relative, which bounds what can be asked.
type suiteFile struct {
	Source, Conventions string
	Cases               []*suiteCase
}

type triplet [3]float64

type suiteCase struct {
	ID, Title       string
	Order           int
	Capacity, Leak  []float64
	Exchange        []triplet
	A, B, C, D      []triplet
	Inputs, Outputs []string
	Poles           [][3]float64
	Pairs           []*suitePair
}

type samples struct{ T, Y []float64 }

type suitePair struct {
	Input, Output           int
	Zero                    bool
	Zeros, Cancelled, Poles [][3]float64
	Degree                  int
	Lead                    float64
	Gain                    *float64
	Num, Den                []float64
	Residues                [][][2]float64
	ResiduePoles            [][2]float64
	Step, Ramp              samples
	Pulse                   struct {
		samples
		Width float64
	}
	Points struct {
		samples
		Points [][2]float64
	}
	Sine struct {
		samples
		Omega float64
	}
	Frequency [][3]float64
	Threshold []float64
	Measures  map[string]any
}

func loadSuite(t testing.TB) []*suiteCase {
	t.Helper()
	b, err := os.ReadFile("testdata/systems.json")
	if err != nil {
		t.Fatal(err)
	}
	var f suiteFile
	if err := json.Unmarshal(b, &f); err != nil {
		t.Fatal(err)
	}
	return f.Cases
}

func fill(rows, cols int, list []triplet) [][]float64 {
	m := make([][]float64, rows)
	for i := range m {
		m[i] = make([]float64, cols)
	}
	for _, v := range list {
		m[int(v[0])][int(v[1])] = v[2]
	}
	return m
}

func joined(rows [][]float64) []float64 {
	var v []float64
	for _, r := range rows {
		v = append(v, r...)
	}
	return v
}

// system builds the case through the door it was written for.
func (c *suiteCase) system(t testing.TB) *System {
	t.Helper()
	n := c.Order
	b, out := fill(len(c.Inputs), n, c.B), fill(len(c.Outputs), n, c.C)
	d := fill(len(c.Outputs), len(c.Inputs), c.D)
	var s *System
	var err error
	if c.A == nil {
		bal := matrix.Balance{N: n, C: c.Capacity, F: joined(fill(n, n, c.Exchange)), Leak: c.Leak}
		s, err = New(Realisation{Balance: bal, B: b, Output: out, D: d})
	} else {
		bm := mat.NewDense(len(b), n, joined(b))
		s, err = FromMatrices(mat.NewDense(n, n, joined(fill(n, n, c.A))), bm.T(),
			mat.NewDense(len(out), n, joined(out)), mat.NewDense(len(d), len(b), joined(d)))
	}
	if err != nil {
		t.Fatalf("%s: %v", c.ID, err)
	}
	return s
}
