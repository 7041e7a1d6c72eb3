package matrix

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"
)

// The path counted in the graph is the relative degree of every pair of the
// suite, and the exact one always is.
func TestStructuralDegree(t *testing.T) {
	for _, r := range readReference(t).Networks {
		b := &Balance{N: r.N, C: r.Capacity, F: r.dense(), Leak: r.Leak}
		for _, p := range r.Pairs {
			degree, reachable := StructuralDegree(b, p.In, p.Out, p.D)
			if !p.Zero && (!reachable || degree != p.Degree) {
				t.Errorf("%s %s: %d, want %d", r.ID, p.Name, degree, p.Degree)
			}
			if r.Form != "balance" {
				continue
			}
			e := b.Exact(p.In, p.Out, p.D)
			if p.Zero {
				if e.Degree != -1 {
					t.Errorf("%s %s: numerator of degree %d, want none", r.ID, p.Name, e.Degree)
				}
				continue
			}
			if got := e.Order - e.Degree; got != p.Degree {
				t.Errorf("%s %s: exact degree %d, want %d", r.ID, p.Name, got, p.Degree)
			}
			if got, want := e.OriginZeros, countOrigin(p.Zeros)+countOrigin(p.Cancelled); got != want {
				t.Errorf("%s %s: %d zeros at 0, want %d", r.ID, p.Name, got, want)
			}
			if got, want := e.OriginPoles, countOrigin(r.Poles); got != want {
				t.Errorf("%s %s: %d poles at 0, want %d", r.ID, p.Name, got, want)
			}
			// What cancels exactly in decimals need not in the doubles nearest to them.
			if got, most := e.Common, countRoots(p.Cancelled); got > most {
				t.Errorf("%s %s: %d poles cancel, want %d", r.ID, p.Name, got, most)
			}
		}
	}
}

func countOrigin(list [][3]float64) (n int) {
	for _, r := range list {
		if r[0] == 0 && r[1] == 0 {
			n += int(r[2])
		}
	}
	return n
}

func TestPath(t *testing.T) {
	// 0 → 1 → 2, 3 → 1 and 1 → 4: from 0 to 2 only the first three matter.
	b := Balance{N: 5, C: []float64{1, 1, 1, 1, 1}, F: make([]float64, 25), Leak: []float64{1, 0, 0, 2, 0}}
	b.F[1*5+0], b.F[2*5+1], b.F[1*5+3], b.F[4*5+1] = 3, 4, 5, 6
	keep := b.Path(unit(5, 0), unit(5, 2))
	if want := []int{0, 1, 2}; !slices.Equal(keep, want) {
		t.Fatalf("Path = %v, want %v", keep, want)
	}
	part := b.Restrict(keep)
	if want := []float64{1, 5, 0}; !slices.Equal(part.Leak, want) {
		t.Errorf("Leak = %v, want %v", part.Leak, want)
	}
	if keep := b.Path(unit(5, 2), unit(5, 0)); len(keep) != 0 {
		t.Errorf("Path against the streams = %v, want none", keep)
	}
}

// The stores left out of a transfer change nothing in its response.
func TestRestrictKeepsResponse(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 12))
	for range 100 {
		n := 2 + rng.IntN(8)
		b := randomBalance(rng, n)
		in, out := unit(n, rng.IntN(n)), unit(n, rng.IntN(n))
		f, err := b.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		keep := b.Path(in, out)
		part := b.Restrict(keep)
		g, err := part.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		fast := f.Poles[n-1]
		at := 1 / (math.Hypot(fast.Re, fast.Im) + 1e-3)
		y, size := f.step(in, out, 0, at)
		z, _ := g.step(pick(in, keep), pick(out, keep), 0, at)
		if math.Abs(y-z) > 1e-11*size {
			t.Errorf("n = %d: %g with all stores, %g with %d of them", n, y, z, len(keep))
		}
	}
}

func TestModularFloat(t *testing.T) {
	for _, v := range []float64{0, 1, -1, 0.1, 0.3, -7e300, 5e-324, 1 << 53} {
		if got := modAdd(modFloat(v), modFloat(-v)); got != 0 {
			t.Errorf("%g − %g = %d", v, v, got)
		}
		if got := modSub(modMul(modFloat(v), modFloat(3)), modAdd(modFloat(v), modAdd(modFloat(v), modFloat(v)))); got != 0 {
			t.Errorf("3·%g ≠ %g + %g + %g", v, v, v, v)
		}
	}
	if modAdd(modFloat(0.1), modFloat(0.2)) == modFloat(0.3) {
		t.Error("0.1 + 0.2 = 0.3 as doubles")
	}
	if got := modMul(modFloat(0.1), modInv(modFloat(0.1))); got != 1 {
		t.Errorf("0.1/0.1 = %d", got)
	}
}
