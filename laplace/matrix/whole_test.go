package matrix

import (
	"math"
	"math/rand/v2"
	"testing"
)

// Cascades that are nearly uniform, loops and random balances, against φ₁ of the
// whole matrix, which knows nothing of parts, poles or groups.
func TestBlockFormAgainstWholeMatrix(t *testing.T) {
	rng := rand.New(rand.NewPCG(13, 14))
	cascade := func(n int, spread float64) *Balance {
		b := &Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
		for i := range n {
			b.C[i] = 1 + spread*rng.NormFloat64()
			if b.Leak[i] = 1; i > 0 {
				b.F[i*n+i-1], b.Leak[i] = 1, 0
			}
		}
		return b
	}
	cases := map[string]*Balance{
		"40 equal tanks":          cascade(40, 0),
		"40 tanks within 1e-6":    cascade(40, 1e-6),
		"40 tanks within 1e-3":    cascade(40, 1e-3),
		"40 tanks within 5 %":     cascade(40, 0.05),
		"12 tanks within 20 %":    cascade(12, 0.2),
		"30 tanks, part of a lap": cascade(30, 0.01),
		"20 at random":            randomBalance(rng, 20),
		"stiff":                   stiffBalance(rng, 12, 1),
	}
	cases["30 tanks, part of a lap"].F[29] = 0.3 // the last feeds the first
	for name, b := range cases {
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		n := b.N
		in, out := unit(n, 0), unit(n, n-1)
		var off, size float64
		for _, at := range []float64{0.1, 1, 5, 20, 40, 60} {
			_, p, _ := Phi(n, b.Dense(), at)
			want := at * p[(n-1)*n] / b.C[0]
			y, s := f.step(in, out, 0, at)
			off, size = math.Max(off, math.Abs(y-want)), math.Max(size, s)
			if y > 1e6 {
				break
			}
		}
		t.Logf("%-24s %2d blocks, coupling %.2g, off by %.2g of %.2g", name, len(f.Blocks), f.Coupling, off, size)
		if off > 1e-12*size {
			t.Errorf("%s: off by %.2g of %.2g", name, off, size)
		}
	}
}
