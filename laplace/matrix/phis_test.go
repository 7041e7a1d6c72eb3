package matrix

import (
	"math"
	"math/big"
	"testing"
)

// jordanPhi returns the first row of φ_k of a Jordan block of n states, λt on the diagonal
// and t beside it, by the series of φ_k and its derivatives with 700 bits:
// φ_k^(j)(x)/j! = Σ C(i, j) x^(i−j)/(i+k)!.
func jordanPhi(n, k int, x, t float64) []float64 {
	const bits = 700
	num := func(v float64) *big.Float { return new(big.Float).SetPrec(bits).SetFloat64(v) }
	row := make([]float64, n)
	for j := range n {
		// the term of i = j, then each from the last
		term := num(1)
		for i := 1; i <= j+k; i++ {
			term.Quo(term, num(float64(i)))
		}
		sum := num(0)
		for i := j; i < 600; i++ {
			sum.Add(sum, term)
			term.Mul(term, num(x))
			term.Mul(term, num(float64(i+1)))
			term.Quo(term, num(float64(i+1-j)))
			term.Quo(term, num(float64(i+1+k)))
		}
		for range j {
			sum.Mul(sum, num(t))
		}
		row[j], _ = sum.Float64()
	}
	return row
}

// Jordan blocks, as chains of equal stores have them [measured: 9e-16 of the norm].
func TestPhisOfJordanBlocks(t *testing.T) {
	const tau = 0.5
	for _, n := range []int{1, 2, 4} {
		for _, x := range []float64{-120, -20, -3, -0.4, 0, 1e-9, 0.7, 6} {
			T := make([]float64, n*n)
			for i := range n {
				T[i*n+i] = x / tau
				if i+1 < n {
					T[i*n+i+1] = 1
				}
			}
			phi := Phis(n, T, tau, 14)
			for k := 1; k < len(phi); k++ {
				want := jordanPhi(n, k, x, tau)
				norm := 0.0
				for _, v := range want {
					norm += math.Abs(v)
				}
				for j := range n {
					for i := range n - j {
						if off := math.Abs(phi[k][i*n+i+j] - want[j]); !(off <= 4e-15*norm) {
							t.Errorf("φ%d of %d states at %g, diagonal %d: %v, want %v: off by %.1e of the norm", k, n, x, j, phi[k][i*n+i+j], want[j], off/norm)
						}
					}
				}
			}
		}
	}
}

// What is as good as infinite is held, and nothing is NaN.
func TestPhisAreFinite(t *testing.T) {
	for _, T := range [][]float64{{1e3, 1, 0, 1e3}, {-1e300, 1e300, 1e300, -1e300}, {1e308, 1e308, 1e308, 1e308}, {0, 0, 0, 0}} {
		for _, f := range Phis(2, T, 1e4, 14) {
			for _, v := range f {
				if math.IsNaN(v) || math.IsInf(v, 0) {
					t.Errorf("%v: %v", T, f)
				}
			}
		}
	}
	if phi := Phis(0, nil, 1, 3); len(phi) != 4 {
		t.Errorf("%d functions of no states", len(phi))
	}
}
