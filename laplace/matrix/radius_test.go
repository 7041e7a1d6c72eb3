package matrix

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

// stiffBalance spreads capacities and exchanges by e^±sigma, without gains.
func stiffBalance(rng *rand.Rand, n int, sigma float64) *Balance {
	b := randomBalance(rng, n)
	for i := range n {
		b.C[i] = math.Exp(sigma * rng.NormFloat64())
		b.Leak[i] = math.Max(b.Leak[i], 0)
		for j := range i {
			f := math.Exp(sigma * rng.NormFloat64())
			b.F[i*n+j] = f * math.Abs(b.F[i*n+j])
			b.F[j*n+i] = f * math.Abs(b.F[j*n+i])
		}
	}
	return b
}

// Poles and zeros lie within their radius of those of the exact polynomials, at
// spreads of the rates up to 1e24, and the radius is small.
func TestRadius(t *testing.T) {
	draw := map[string]func(rng *rand.Rand, n int) *Balance{
		"gains":       randomBalance,
		"spread 1e7":  func(rng *rand.Rand, n int) *Balance { return stiffBalance(rng, n, 3) },
		"spread 1e13": func(rng *rand.Rand, n int) *Balance { return stiffBalance(rng, n, 5) },
		"spread 1e24": func(rng *rand.Rand, n int) *Balance { return stiffBalance(rng, n, 10) },
	}
	for name, balance := range draw {
		rng := rand.New(rand.NewPCG(5, 6))
		var off, wide [2]float64
		loose, total := 0, 0
		for range 150 {
			n := 1 + rng.IntN(7)
			b := balance(rng, n)
			in, out := unit(n, rng.IntN(n)), unit(n, rng.IntN(n))
			keep := b.Path(in, out)
			part := b.Restrict(keep)
			num, _, numTime := exactPolynomials(&part, pick(in, keep), pick(out, keep))
			_, den, denTime := exactPolynomials(b, in, out)
			f, err := b.BlockForm()
			if err != nil {
				t.Fatal(err)
			}
			zeros, err := b.Zeros(in, out, 0)
			if err != nil && !errors.Is(err, ErrZeroTransfer) {
				t.Fatal(err)
			}
			for kind, list := range [2][]Root{f.Poles, zeros} {
				q, time := den, denTime
				if kind == 1 {
					q, time = num, numTime
				}
				for _, p := range list {
					size := math.Hypot(p.Re, p.Im)
					d := exactDistance(q, time, p)
					if d > p.Radius+1e-300 {
						t.Errorf("%s, n = %d: root %g%+gi is off by %.2g, radius %.2g", name, n, p.Re, p.Im, d, p.Radius)
					}
					total++
					if p.Radius > 1e-11*size {
						loose++
						continue
					}
					if size > 0 {
						off[kind], wide[kind] = math.Max(off[kind], d/size), math.Max(wide[kind], p.Radius/size)
					}
				}
			}
		}
		t.Logf("%-12s worst error of poles %.2g, zeros %.2g, widest radius %.2g, %.2g relative; %d of %d beyond 1e-11", name, off[0], off[1], wide[0], wide[1], loose, total)
		if loose > total/10 {
			t.Errorf("%s: radius beyond 1e-11 for %d of %d", name, loose, total)
		}
	}
}

// Above 16 states only the poles are refined where the form is good: a loop of
// streams through 20 stores.
func TestRadiusLarge(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 22))
	const n = 20
	for range 3 {
		b := randomBalance(rng, n)
		for i := range n {
			b.F[i*n+(i+1)%n] += 1
		}
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		if len(f.parts) != 1 {
			t.Fatalf("%d parts, want one", len(f.parts))
		}
		_, den, time := exactPolynomials(b, unit(n, 0), unit(n, 0))
		off, wide := 0.0, 0.0
		for _, p := range f.Poles {
			size := math.Hypot(p.Re, p.Im)
			d := exactDistance(den, time, p)
			if d > p.Radius {
				t.Errorf("pole %g%+gi is off by %.2g, radius %.2g", p.Re, p.Im, d, p.Radius)
			}
			off, wide = math.Max(off, d/size), math.Max(wide, p.Radius/size)
		}
		t.Logf("worst error %.2g, widest radius %.2g, relative", off, wide)
		if wide > 1e-12 {
			t.Errorf("radius %.2g, relative", wide)
		}
	}
}
