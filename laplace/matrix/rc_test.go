package matrix

import (
	"encoding/json"
	"math"
	"math/big"
	"os"
	"strconv"
	"testing"
)

// rcCase is a network of testdata/rc.json.
type rcCase struct {
	Name, About string
	C           []string
	Edges       [][2]int
	R           []string
	Leaks       []int
	LeakR       []string
	Poles       []string
	Steps       []struct {
		In, Out [][2]float64
		T, Y    []string
	}
}

// rcCases reads the reference networks and what they are from.
func rcCases(t testing.TB) []rcCase {
	text, err := os.ReadFile("testdata/rc.json")
	if err != nil {
		t.Fatal(err)
	}
	var file struct {
		Source string
		Cases  []rcCase
	}
	if err := json.Unmarshal(text, &file); err != nil {
		t.Fatal(err)
	}
	return file.Cases
}

func number(t testing.TB, s string) float64 {
	x, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

func (c *rcCase) balance(t testing.TB) *Balance {
	b := newBalance(len(c.C))
	for i, s := range c.C {
		b.C[i] = number(t, s)
	}
	for k, e := range c.Edges {
		b.join(e[0], e[1], 1/number(t, c.R[k]))
	}
	for k, i := range c.Leaks {
		b.Leak[i] += 1 / number(t, c.LeakR[k])
	}
	return b
}

func newBalance(n int) *Balance {
	return &Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
}

// join adds an exchange g between two stores.
func (b *Balance) join(i, j int, g float64) {
	if i != j {
		b.F[i*b.N+j] += g
		b.F[j*b.N+i] += g
	}
}

// relative returns the relative error of got against a decimal with more digits than a double.
func relative(t testing.TB, got float64, want string) float64 {
	w, _, err := big.ParseFloat(want, 10, 200, big.ToNearestEven)
	if err != nil {
		t.Fatal(err)
	}
	if w.Sign() == 0 {
		return math.Abs(got)
	}
	d := new(big.Float).Sub(big.NewFloat(got), w)
	r, _ := d.Quo(d, w).Float64()
	return math.Abs(r)
}

// TestModesReference: every pole against 25 to 30 digits, by the way it goes of
// itself, with paths bidiagonalised like any other network, and by Jacobi.
func TestModesReference(t *testing.T) {
	for _, c := range rcCases(t) {
		b := c.balance(t)
		for _, route := range []string{"own", "mesh", "jacobi"} {
			m := modesBy(t, b, route)
			worst := 0.0
			for k, want := range c.Poles {
				e := relative(t, m.Lambda[k], want)
				if want == "0" && m.Lambda[k] != 0 {
					t.Errorf("%s %s: pole %d is %g, want exactly 0", c.Name, route, k, m.Lambda[k])
				}
				worst = max(worst, e)
			}
			if worst > 1e-13 || worst > m.RelBound {
				t.Errorf("%s %s %s: relative error %.2g, bound %.2g, growth %.3g", c.Name, c.About, route, worst, m.RelBound, m.Growth)
			}
		}
	}
}

// modesBy runs one of the routes.
func modesBy(t testing.TB, b *Balance, route string, ports ...[]float64) *RCModes {
	t.Helper()
	w := &RCWork{}
	switch route {
	case "mesh":
		w.only = meshRoute
	case "jacobi":
		w.only = jacobiRoute
	}
	m, err := w.Modes(b, ports)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

func sparse(n int, terms [][2]float64) []float64 {
	v := make([]float64, n)
	for _, p := range terms {
		v[int(p[0])] += p[1]
	}
	return v
}

// step returns y(t) after a unit step, and the size of its largest term.
func (m *RCModes) step(in, out int, t float64) (y, size float64) {
	for k, l := range m.Lambda {
		rise := t
		if l != 0 {
			rise = -math.Expm1(-l*t) / l
		}
		term := m.Port[in][k] * m.Port[out][k] * rise
		y += term
		size = max(size, math.Abs(term))
	}
	return y, size
}

// TestModesStep: unit step responses from the ports against 20 digits, relative
// to the largest value or term of the case. Where the output is a difference,
// relative to the sum it is the difference of: what cancels in Port, or
// between nearly equal poles, cannot come back.
func TestModesStep(t *testing.T) {
	for _, c := range rcCases(t) {
		b := c.balance(t)
		for _, route := range []string{"own", "jacobi"} {
			for _, s := range c.Steps {
				in, out := sparse(b.N, s.In), sparse(b.N, s.Out)
				sizes := make([]float64, b.N)
				for i, x := range out {
					sizes[i] = math.Abs(x)
				}
				m := modesBy(t, b, route, in, out, sizes)
				span, worst := 0.0, 0.0
				for k, at := range s.T {
					y, size := m.step(0, 1, number(t, at))
					whole, _ := m.step(0, 2, number(t, at))
					span = max(span, size, whole)
					worst = max(worst, math.Abs(y-number(t, s.Y[k])))
				}
				if worst > 1e-14*span {
					t.Errorf("%s %s %v→%v: error %.2g of the range", c.Name, route, s.In, s.Out, worst/span)
				}
			}
		}
	}
}

// TestModesLadder: R = C = 1, fed at one end, open at the other, has the poles
// −4 sin²((2k−1)π/(4N+2)), k = 1…N: the standard closed form of the uniform ladder.
func TestModesLadder(t *testing.T) {
	for _, n := range []int{1, 2, 3, 7, 30, 200} {
		b := newBalance(n)
		for i := range n {
			b.C[i] = 1
			if i > 0 {
				b.join(i-1, i, 1)
			}
		}
		b.Leak[0] = 1
		for _, route := range []string{"own", "mesh", "jacobi"} {
			m := modesBy(t, b, route)
			worst := 0.0
			for k := range n {
				s := math.Sin(float64(2*k+1) * math.Pi / float64(4*n+2))
				worst = max(worst, math.Abs(m.Lambda[k]/(4*s*s)-1))
			}
			if worst > 1e-14 {
				t.Errorf("n = %d by %s: relative error %.2g", n, route, worst)
			}
		}
	}
}
