package matrix

import (
	"math"
	"math/rand/v2"
	"testing"
)

// randomBalance draws stores that exchange both ways, one way, through the
// reference and, now and then, with a gain of their own.
func randomBalance(rng *rand.Rand, n int) *Balance {
	b := &Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	for i := range b.C {
		b.C[i] = math.Exp(2 * rng.NormFloat64())
		if rng.IntN(2) == 0 {
			b.Leak[i] = math.Exp(rng.NormFloat64())
		}
	}
	for range 2 * n {
		i, j := rng.IntN(n), rng.IntN(n)
		w := math.Exp(rng.NormFloat64())
		switch {
		case i == j:
			b.Leak[i] -= 0.3 * w
		case rng.IntN(3) == 0:
			b.F[i*n+j] += w
		case rng.IntN(8) == 0:
			b.F[i*n+j] -= w
			b.Leak[i] += w
		default:
			b.F[i*n+j] += w
			b.F[j*n+i] += w
		}
	}
	return b
}

// columns returns X and X⁻¹C⁻¹ of a form by its own In and Out.
func (f *BlockForm) columns() (x, y []float64) {
	n := f.N
	x, y = make([]float64, n*n), make([]float64, n*n)
	for i := range n {
		for k, v := range f.Out(unit(n, i)) {
			x[i*n+k] = v
		}
		for k, v := range f.In(unit(n, i)) {
			y[k*n+i] = v
		}
	}
	return x, y
}

// diagonal returns diag(T).
func (f *BlockForm) diagonal() []float64 {
	t := make([]float64, f.N*f.N)
	for _, b := range f.Blocks {
		for i := range b.N {
			copy(t[(b.First+i)*f.N+b.First:], b.T[i*b.N:i*b.N+b.N])
		}
	}
	return t
}

func multiplied(n int, a ...[]float64) []float64 {
	p := a[0]
	for _, b := range a[1:] {
		q := make([]float64, n*n)
		multiply(n, q, p, b)
		p = q
	}
	return p
}

// X·diag(T)·X⁻¹ gives A back, and X·X⁻¹ the identity, to rounding of the largest
// product, every store measured by the root of its capacity.
func TestBlockFormResidual(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	worst := 0.0
	for range 300 {
		n := 1 + rng.IntN(12)
		b := randomBalance(rng, n)
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		x, y := f.columns()
		d := f.diagonal()
		a, one := multiplied(n, x, d, y), multiplied(n, x, y)
		sizeA, sizeOne := multiplied(n, moduli(x), moduli(d), moduli(y)), multiplied(n, moduli(x), moduli(y))
		dense := b.Dense()
		var off, size [2]float64
		for k := range a {
			i, j := k/n, k%n
			unit := math.Sqrt(b.C[i] * b.C[j])
			id := 0.0
			if i == j {
				id = 1 / b.C[i]
			}
			off[0] = math.Max(off[0], unit*math.Abs(a[k]-dense[k]/b.C[j]))
			off[1] = math.Max(off[1], unit*math.Abs(one[k]-id))
			size[0], size[1] = math.Max(size[0], unit*sizeA[k]), math.Max(size[1], unit*sizeOne[k])
		}
		for k := range off {
			worst = math.Max(worst, off[k]/(size[k]+1e-300))
			if off[k] > 1e-13*size[k] {
				t.Errorf("n = %d: off by %.2g of %.2g", n, off[k], size[k])
			}
		}
	}
	t.Logf("worst residual %.2g", worst)
}

func moduli(a []float64) []float64 {
	b := make([]float64, len(a))
	for i, v := range a {
		b[i] = math.Abs(v)
	}
	return b
}

// Time in units of 2^k: capacities times 2^k leave every digit of the poles as
// they are.
func TestBlockFormTimeScale(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 8))
	for range 50 {
		b := randomBalance(rng, 1+rng.IntN(9))
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		for _, k := range []int{-100, -8, 8, 100} {
			c := *b
			c.C = make([]float64, b.N)
			for i := range c.C {
				c.C[i] = math.Ldexp(b.C[i], k)
			}
			g, err := c.BlockForm()
			if err != nil {
				t.Fatal(err)
			}
			for i, p := range f.Poles {
				q := g.Poles[i]
				re, im := math.Ldexp(q.Re, k), math.Ldexp(q.Im, k)
				if math.Hypot(re-p.Re, im-p.Im) > 4*eps*math.Hypot(p.Re, p.Im)+2*p.Radius {
					t.Errorf("k = %d: pole %g%+gi becomes %g%+gi", k, p.Re, p.Im, re, im)
				}
			}
		}
	}
}

// Other names for the stores leave poles and responses as they are.
func TestBlockFormRelabelled(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 10))
	for range 100 {
		n := 2 + rng.IntN(8)
		b := randomBalance(rng, n)
		perm := rng.Perm(n)
		c := Balance{N: n, C: pick(b.C, perm), F: make([]float64, n*n), Leak: pick(b.Leak, perm)}
		for i := range n {
			for j := range n {
				c.F[i*n+j] = b.F[perm[i]*n+perm[j]]
			}
		}
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		g, err := c.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		in, out := unit(n, 0), unit(n, n-1)
		slow := math.Hypot(f.Poles[0].Re, f.Poles[0].Im)
		for _, at := range []float64{0.01, 0.3, 2} {
			if slow > 0 {
				at /= slow
			}
			if math.Abs(f.Poles[n-1].Re*at) > 50 && f.Poles[n-1].Re > 0 {
				continue
			}
			y, size := f.step(in, out, 0, at)
			z, _ := g.step(pick(in, perm), pick(out, perm), 0, at)
			if !(math.Abs(y-z) <= 1e-11*size) {
				t.Errorf("n = %d, t = %g: %g against %g, of terms of %g", n, at, y, z, size)
			}
		}
	}
}

// A cascade of equal tanks is one block with a diagonal that is equal bit for bit.
func TestBlockFormCascade(t *testing.T) {
	const n = 6
	b := &Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	for i := range n {
		b.C[i] = 0.3
		if b.Leak[i] = 0.7; i > 0 {
			b.F[i*n+i-1], b.Leak[i] = 0.7, 0
		}
	}
	f, err := b.BlockForm()
	if err != nil {
		t.Fatal(err)
	}
	if len(f.Blocks) != 1 {
		t.Fatalf("%d blocks, want one", len(f.Blocks))
	}
	for i := range n {
		if got, want := f.Blocks[0].T[i*n+i], -0.7/0.3; got != want {
			t.Errorf("T[%d,%d] = %.17g, want %.17g", i, i, got, want)
		}
	}
	// Six tanks fed at rate w/C: y(t) = 1 − e^{−at} Σ_{k<6} (at)^k/k!
	for _, at := range []float64{0.01, 1, 3, 20} {
		z, sum, term := at*0.7/0.3, 0.0, 1.0
		for k := range n {
			sum += term
			term *= z / float64(k+1)
		}
		y, _ := f.step([]float64{0.7, 0, 0, 0, 0, 0}, unit(n, n-1), 0, at)
		if want := 1 - math.Exp(-z)*sum; math.Abs(y-want) > 1e-15*3 {
			t.Errorf("y(%g) = %.17g, want %.17g", at, y, want)
		}
	}
}

// An adiabatic loop of one-way streams has a pole at exactly 0; so has a store
// whose own gain balances its loss.
func TestBlockFormOrigin(t *testing.T) {
	for _, n := range []int{2, 3, 7} {
		b := &Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
		for i := range n {
			b.C[i] = 0.1 * float64(i+3)
			b.F[i*n+(i+1)%n] = 0.37
		}
		b.F[1] += 0.2
		b.F[n] += 0.2
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		if p := f.Poles[0]; p.Re != 0 || p.Im != 0 || p.Radius != 0 {
			t.Errorf("n = %d: slowest pole %+v, want exactly 0", n, p)
		}
	}
}

func TestBlockFormRefuses(t *testing.T) {
	for _, v := range []float64{math.NaN(), math.Inf(1)} {
		if _, err := DenseBlockForm(2, []float64{1, v, 0, 1}, nil); err == nil {
			t.Errorf("%v accepted", v)
		}
	}
	for _, c := range []float64{0, -1, math.NaN()} {
		b := Balance{N: 1, C: []float64{c}, F: []float64{0}, Leak: []float64{1}}
		if _, err := b.BlockForm(); err == nil {
			t.Errorf("capacity %v accepted", c)
		}
	}
}
