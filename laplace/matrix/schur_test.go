package matrix

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
)

// schurResidual returns ‖A − Q T Qᵀ‖/‖A‖ and ‖Q Qᵀ − I‖, and reports a T that is
// not in canonical form.
func schurResidual(t *testing.T, n int, a []float64) (back, orthogonal float64) {
	t.Helper()
	s, q, err := schur(n, a)
	if err != nil {
		t.Fatal(err)
	}
	qt := make([]float64, n*n)
	for i := range n {
		for j := range n {
			qt[j*n+i] = q[i*n+j]
			if i > j+1 && s[i*n+j] != 0 {
				t.Fatalf("T[%d,%d] = %g", i, j, s[i*n+j])
			}
		}
	}
	for i := 0; i+1 < n; i++ {
		at := i*n + i
		if s[at+n] == 0 {
			continue
		}
		if i+2 < n && s[at+2*n+1] != 0 {
			t.Fatalf("block of three at %d", i)
		}
		if s[at] != s[at+n+1] || s[at+1]*s[at+n] >= 0 {
			t.Fatalf("block [%g %g; %g %g] at %d", s[at], s[at+1], s[at+n], s[at+n+1], i)
		}
	}
	d := multiplied(n, q, s, qt)
	one := multiplied(n, q, qt)
	for k := range d {
		d[k] -= a[k]
		if k%(n+1) == 0 {
			one[k]--
		}
	}
	return norm2(d) / norm2(a), norm2(one)
}

func TestSchur(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 8))
	kinds := map[string]func(n, i, j int) float64{
		"dense":       func(n, i, j int) float64 { return rng.NormFloat64() },
		"graded":      func(n, i, j int) float64 { return rng.NormFloat64() * math.Exp2(float64(-3*(i+j))) },
		"graded up":   func(n, i, j int) float64 { return rng.NormFloat64() * math.Exp2(float64(-3*(2*n-i-j))) },
		"shift":       func(n, i, j int) float64 { return boolFloat(i == (j+1)%n) },
		"companion":   func(n, i, j int) float64 { return boolFloat(i == j+1) + boolFloat(i == 0)*rng.NormFloat64() },
		"nilpotent":   func(n, i, j int) float64 { return boolFloat(i > j) },
		"zero":        func(n, i, j int) float64 { return 0 },
		"skew":        func(n, i, j int) float64 { return float64(i-j) / float64(n) },
		"sparse":      func(n, i, j int) float64 { return boolFloat(rng.IntN(n) < 2) * rng.NormFloat64() },
		"tiny rest":   func(n, i, j int) float64 { return boolFloat(i == j) + 1e-170*rng.NormFloat64() },
		"cyclic four": func(n, i, j int) float64 { return boolFloat((i+1)%4 == j%4 && i/4 == j/4) },
	}
	for name, entry := range kinds {
		for _, n := range []int{1, 2, 3, 4, 5, 7, 8, 10, 13, 17, 24, 31, 50, 67} {
			a := make([]float64, n*n)
			for k := range a {
				a[k] = entry(n, k/n, k%n)
			}
			if norm2(a) == 0 {
				a[0] = 1
			}
			back, orthogonal := schurResidual(t, n, a)
			if tol := 1e-15 * float64(10+n); !(back <= tol) || !(orthogonal <= tol*math.Sqrt(float64(n))) {
				t.Errorf("%s, n = %d: residual %.2g, orthogonality %.2g", name, n, back, orthogonal)
			}
		}
	}
}

func boolFloat(b bool) float64 {
	if b {
		return 1
	}
	return 0
}

func BenchmarkSchur(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		a := pipeNet(n, uint64(2000+n))
		b.Run(fmt.Sprintf("n=%d", n), func(b *testing.B) {
			var s schurWork
			for b.Loop() {
				if err := s.schur(n, a); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
