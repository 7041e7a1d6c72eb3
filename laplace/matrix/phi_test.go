package matrix

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"
)

const phiBits = 300

// bigPhi sums the series of the three functions at 2^−s of the argument and
// doubles, all with 300 bits.
func bigPhi(n int, T []float64, t float64) [3][]*big.Float {
	num := func(v float64) *big.Float { return new(big.Float).SetPrec(phiBits).SetFloat64(v) }
	mul := func(a, b []*big.Float) []*big.Float {
		c := make([]*big.Float, n*n)
		for i := range c {
			c[i] = num(0)
			for k := 0; k < n; k++ {
				c[i].Add(c[i], new(big.Float).Mul(a[i/n*n+k], b[k*n+i%n]))
			}
		}
		return c
	}
	z := make([]*big.Float, n*n)
	var norm float64
	for i := range z {
		z[i] = new(big.Float).Mul(num(T[i]), num(t))
		norm += math.Abs(T[i] * t)
	}
	s := 0
	if norm > 0.25 {
		_, s = math.Frexp(norm)
		s += 3
	}
	for i := range z {
		z[i].SetMantExp(z[i], -s)
	}
	series := make([]*big.Float, n*n)
	for i := range series {
		series[i] = num(0)
	}
	factor := func(k int) *big.Float {
		return new(big.Float).Quo(num(1), new(big.Float).SetInt(new(big.Int).MulRange(1, int64(k))))
	}
	for k := 40; k >= 0; k-- {
		series = mul(series, z)
		for i := 0; i < n; i++ {
			series[i*n+i].Add(series[i*n+i], factor(k+2))
		}
	}
	p2 := series
	p1 := mul(p2, z)
	for i := 0; i < n; i++ {
		p1[i*n+i].Add(p1[i*n+i], num(1))
	}
	e := mul(p1, z)
	for i := 0; i < n; i++ {
		e[i*n+i].Add(e[i*n+i], num(1))
	}
	for ; s > 0; s-- {
		sq, pr := mul(p1, p1), mul(e, p1)
		for i := range p2 {
			p2[i].SetMantExp(p2[i].Add(sq[i], p2[i].SetMantExp(p2[i], 1)), -2)
			p1[i].SetMantExp(p1[i].Add(p1[i], pr[i]), -1)
		}
		e = mul(e, e)
	}
	return [3][]*big.Float{e, p1, p2}
}

// phiError is the largest error of each function over its norm.
func phiError(n int, T []float64, t float64) (worst [3]float64) {
	var got [3][]float64
	got[0], got[1], got[2] = Phi(n, T, t)
	want := bigPhi(n, T, t)
	for k := range got {
		var norm, dif float64
		for i := range got[k] {
			w, _ := want[k][i].Float64()
			norm = math.Max(norm, math.Abs(w))
			d, _ := new(big.Float).Sub(want[k][i], big.NewFloat(got[k][i])).Float64()
			dif = math.Max(dif, math.Abs(d))
		}
		worst[k] = dif / norm
		if norm == 0 {
			worst[k] = dif
		}
	}
	return worst
}

// phiTol is a few units of rounding, times the growth of rounding in the doubling
// of three states and more.
func phiTol(n int, T []float64, t float64) float64 {
	if n <= 2 {
		return 4e-15
	}
	return 4e-15 + 6*eps*norm2(T)*t
}

func TestPhi(t *testing.T) {
	blocks := map[string]struct {
		n int
		T []float64
	}{
		"pole":                 {1, []float64{-0.7}},
		"pole at 0":            {1, []float64{0}},
		"growing":              {1, []float64{0.3}},
		"pair":                 {2, []float64{-0.1, 1.3, -1.1, -0.1}},
		"undamped":             {2, []float64{0, 4, -0.25, 0}},
		"critical":             {2, []float64{0, 1, -1, -2}},
		"double":               {2, []float64{-1, 3, 0, -1}},
		"nearly double":        {2, []float64{-1, 3, 0, -1 - 0x1p-40}},
		"two apart":            {2, []float64{-1, 3, 0, -40}},
		"0 and another":        {2, []float64{0, 3, 0, -1}},
		"double integrator":    {2, []float64{0, 1, 0, 0}},
		"two zeros":            {2, []float64{0, 0, 0, 0}},
		"steep":                {2, []float64{-1, 1e5, 0, -1.0001}},
		"steep pair":           {2, []float64{-1, 1e3, -1e-7, -1}},
		"triple":               {3, []float64{-1, 2, 3, 0, -1, 4, 0, 0, -1}},
		"triple, 0":            {3, []float64{0, 1, 0, 0, 0, 1, 0, 0, 0}},
		"pair and another":     {3, []float64{-1, 1, 2, -1, -1, 0.5, 0, 0, -1.2}},
		"four nearly together": {4, []float64{-1, 1, 0, 0, 0, -1.001, 1, 0, 0, 0, -0.999, 1, 0, 0, 0, -1.0005}},
	}
	for name, b := range blocks {
		for _, at := range []float64{0, 1e-300, 1e-12, 1e-3, 0.1, 0.49, 0.51, 1, 2.9, 3.1, 7, 20, 100} {
			tol := phiTol(b.n, b.T, at)
			for k, v := range phiError(b.n, b.T, at) {
				if !(v <= tol) && at*math.Abs(b.T[0]) < 300 {
					t.Errorf("%s: function %d at t = %g is off by %.2g of its norm", name, k, at, v)
				}
			}
		}
	}
}

func TestPhiRandom(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	var worst [4]float64
	for range 400 {
		n := 1 + rng.IntN(3)
		T := make([]float64, n*n)
		mean := -math.Exp(4 * rng.NormFloat64())
		for i := range n {
			T[i*n+i] = mean * (1 + 1e-3*rng.NormFloat64())
			for j := i + 1; j < n; j++ {
				T[i*n+j] = mean * rng.NormFloat64()
			}
		}
		if n >= 2 && rng.IntN(2) == 0 {
			T[n] = -T[1] * rng.Float64()
		}
		at := math.Exp(2*rng.NormFloat64()) / -mean
		for k, v := range phiError(n, T, at) {
			worst[n] = math.Max(worst[n], v)
			if v > phiTol(n, T, at) {
				t.Errorf("T = %v, t = %g: function %d is off by %.2g", T, at, k, v)
			}
		}
	}
	t.Logf("worst error over norm by size: %.2g", worst[1:])
}

// Far decayed and far grown arguments give numbers, zero and infinity, never NaN.
func TestPhiFar(t *testing.T) {
	for n, T := range map[int][]float64{
		1: {-1},
		2: {-1, 5, 0, -1},
		3: {-1, 5, 2, 0, -1, 7, 0, 0, -1},
	} {
		for _, sign := range []float64{1, -1} {
			for _, at := range []float64{1e3, 1e6, 1e100, 1e200, 1e308} {
				e, p1, p2 := Phi(n, T, sign*at)
				for i := range e {
					if math.IsNaN(e[i]) || math.IsNaN(p1[i]) || math.IsNaN(p2[i]) {
						t.Errorf("n = %d, t = %g: %v %v %v", n, sign*at, e, p1, p2)
						break
					}
				}
				if sign > 0 && e[0] != 0 {
					t.Errorf("n = %d, t = %g: e = %v, want 0", n, at, e)
				}
				if sign > 0 && math.Abs(p1[0]*at-1) > 1e-12 && at < 1e100 {
					t.Errorf("n = %d, t = %g: t·φ₁ = %g, want 1", n, at, p1[0]*at)
				}
			}
		}
	}
}

func TestPhiIntoDoesNotAllocate(t *testing.T) {
	for n := 1; n <= 4; n++ {
		T, e, p1, p2 := make([]float64, n*n), make([]float64, n*n), make([]float64, n*n), make([]float64, n*n)
		for i := range T {
			T[i] = -1 / float64(1+i)
		}
		work := make([]float64, PhiWork(n))
		if a := testing.AllocsPerRun(10, func() { PhiInto(n, T, 3.5, e, p1, p2, work) }); a != 0 {
			t.Errorf("n = %d: %g allocations", n, a)
		}
	}
}

func BenchmarkPhi(b *testing.B) {
	for n, T := range [][]float64{1: {-1}, 2: {-1, 2, -2, -1}, 3: {-1, 5, 2, 0, -1, 7, 0, 0, -1}} {
		if n == 0 {
			continue
		}
		e, p1, p2 := make([]float64, n*n), make([]float64, n*n), make([]float64, n*n)
		work := make([]float64, PhiWork(n))
		b.Run("n="+string(rune('0'+n)), func(b *testing.B) {
			for i := range b.N {
				PhiInto(n, T, 0.1*float64(i%64), e, p1, p2, work)
			}
		})
	}
}
