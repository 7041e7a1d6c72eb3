package matrix

import (
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"testing"
)

func TestComponents(t *testing.T) {
	// 0 ⇄ 1 feel nothing else; 2 feels 1; 3 ⇄ 4 feel 2; 5 is alone.
	edges := map[[2]int]bool{{0, 1}: true, {1, 0}: true, {2, 1}: true, {3, 4}: true, {4, 3}: true, {3, 2}: true}
	parts := components(6, func(i, j int) bool { return edges[[2]int{i, j}] })
	want := [][]int{{5}, {3, 4}, {2}, {0, 1}}
	if !slices.EqualFunc(parts, want, slices.Equal[[]int]) {
		t.Errorf("parts %v, want %v", parts, want)
	}
}

// A X − X B gives R back for quasi triangular A and B of every size.
func TestSylvester(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 9))
	quasi := func(n int, centre float64) []float64 {
		a := make([]float64, n*n)
		for i := range n {
			for j := i; j < n; j++ {
				a[i*n+j] = rng.NormFloat64()
			}
			a[i*n+i] += centre
		}
		for i := 0; i+1 < n; i += 1 + rng.IntN(2) {
			if i == 0 || a[i*n+i-1] == 0 {
				a[(i+1)*n+i], a[(i+1)*n+i+1] = -a[i*n+i+1], a[i*n+i]
			}
		}
		return a
	}
	for range 50 {
		p, q := 1+rng.IntN(6), 1+rng.IntN(6)
		a, b := quasi(p, -10), quasi(q, 10)
		r := make([]float64, p*q)
		for k := range r {
			r[k] = rng.NormFloat64()
		}
		x := slices.Clone(r)
		sylvester(p, a, q, b, x)
		for i := range p {
			for j := range q {
				s := -r[i*q+j]
				for k := range p {
					s += a[i*p+k] * x[k*q+j]
				}
				for k := range q {
					s -= x[i*q+k] * b[k*q+j]
				}
				if math.Abs(s) > 1e-13 {
					t.Fatalf("%d×%d: residual %g", p, q, s)
				}
			}
		}
	}
}

// A matrix of rank one and trace 0 has all its poles at 0 exactly, and e^{tA} = I + tA.
func TestNilpotentPart(t *testing.T) {
	a := []float64{1, 1, -2, 1, 1, -2, 1, 1, -2}
	f, err := DenseBlockForm(3, a, []float64{1, 2, 4})
	if err != nil {
		t.Fatal(err)
	}
	for _, p := range f.Poles {
		if p.Re != 0 || p.Im != 0 || p.Radius != 0 {
			t.Errorf("pole %+v, want exactly 0", p)
		}
	}
	for i := range 3 {
		for j := range 3 {
			y, _ := f.step(unit(3, j), unit(3, i), 0, 2) // ∫ (I + tA) = 2 I + 2 A
			want := 2 * a[i*3+j]
			if i == j {
				want += 2
			}
			if math.Abs(y-want) > 1e-14 {
				t.Errorf("step %d to %d: %g, want %g", j, i, y, want)
			}
		}
	}
}

// A pole that is fourfold and defective in exact arithmetic comes out as one,
// though the eigenvalues of its block scatter over 1e-4.
func TestDefectivePole(t *testing.T) {
	// (s+1)^4 as a companion matrix
	a := []float64{0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, -1, -4, -6, -4}
	f, err := DenseBlockForm(4, a, nil)
	if err != nil {
		t.Fatal(err)
	}
	for _, p := range f.Poles {
		if p.Im != 0 || math.Abs(p.Re+1) > p.Radius || p.Radius > 1e-13 {
			t.Errorf("pole %+v, want −1", p)
		}
	}
	a[12] *= 1 + eps // not fourfold any more: each pole within its radius
	if f, err = DenseBlockForm(4, a, nil); err != nil {
		t.Fatal(err)
	}
	for _, p := range f.Poles {
		if d := math.Hypot(p.Re+1, p.Im); p.Radius < 1e-5 || d > p.Radius {
			t.Errorf("pole %+v, off by %g", p, d)
		}
	}
}

// Zeros of a plain matrix: (s+2)/(s²+3s+5), and with d = 1 those of the sum.
func TestDenseZeros(t *testing.T) {
	a, b, c := []float64{0, 1, -5, -3}, []float64{0, 1}, []float64{2, 1}
	z, err := DenseZeros(2, a, b, c, 0)
	if err != nil {
		t.Fatal(err)
	}
	if len(z) != 1 || z[0].Re != -2 || z[0].Im != 0 {
		t.Errorf("zeros %+v, want −2", z)
	}
	// s²+4s+7 = 0: −2 ± i√3
	if z, err = DenseZeros(2, a, b, c, 1); err != nil {
		t.Fatal(err)
	}
	if len(z) != 2 || math.Abs(z[0].Re+2) > 1e-15 || math.Abs(z[0].Im+math.Sqrt(3)) > 4e-16 {
		t.Errorf("zeros %+v, want −2 ± i√3", z)
	}
	if _, err = DenseZeros(2, a, b, []float64{0, 0}, 0); !errors.Is(err, ErrZeroTransfer) {
		t.Errorf("no output: %v, want ErrZeroTransfer", err)
	}
	if _, err = DenseZeros(2, a, b[:1], c, 0); !errors.Is(err, ErrShape) {
		t.Errorf("short b: %v, want ErrShape", err)
	}
	if _, err = DenseZeros(2, a, b, []float64{math.NaN(), 0}, 0); !errors.Is(err, ErrValue) {
		t.Errorf("NaN in c: %v, want ErrValue", err)
	}
	s := &Stores{Balance: Balance{N: 2, C: []float64{1, 0}, F: make([]float64, 4), Leak: []float64{0, 0}}, K: a}
	if _, err = s.Zeros(b, c, 0, 0); !errors.Is(err, ErrValue) {
		t.Errorf("capacity 0: %v, want ErrValue", err)
	}
}

// Two routes that cancel exactly leave fewer zeros than the graph promises.
func TestZerosOfCancellingRoutes(t *testing.T) {
	// u → 0, u → 1; 0 → 2 by 3, 1 → 2 by −3, 0 and 1 alike but for 1's own pole.
	b := &Balance{N: 3, C: []float64{1, 1, 1}, F: make([]float64, 9), Leak: []float64{1, 2, 1}}
	b.F[6], b.F[7] = 3, -3
	z, err := b.Zeros([]float64{1, 1, 0}, []float64{0, 0, 1}, 0)
	if err != nil {
		t.Fatal(err)
	}
	if len(z) != 0 { // 3/(s+1) − 3/(s+2) = 3/((s+1)(s+2))
		t.Errorf("zeros %+v, want none", z)
	}
	if e := b.Exact([]float64{1, 1, 0}, []float64{0, 0, 1}, 0); e.Degree != 0 || e.Order != 3 || e.Common != 0 {
		t.Errorf("%+v, want a numerator of degree 0", e)
	}
}

func TestBlockFormRange(t *testing.T) {
	b := &Balance{N: 2, C: []float64{1e-300, 1e300}, F: []float64{0, 1e300, 1e-300, 0}, Leak: []float64{0, 0}}
	if _, err := b.BlockForm(); !errors.Is(err, ErrRange) {
		t.Errorf("%v, want ErrRange", err)
	}
	b = &Balance{N: 1, C: []float64{1e-300}, F: []float64{0}, Leak: []float64{1e300}}
	if _, err := b.BlockForm(); !errors.Is(err, ErrRange) {
		t.Errorf("%v, want ErrRange", err)
	}
	if _, err := DenseBlockForm(2, []float64{1}, nil); !errors.Is(err, ErrShape) {
		t.Errorf("%v, want ErrShape", err)
	}
	f, err := DenseBlockForm(0, nil, nil)
	if err != nil || len(f.Poles) != 0 || len(f.In(nil)) != 0 {
		t.Errorf("no states: %v %v", f, err)
	}
}
