package matrix

import (
	"math/rand/v2"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
)

// sameForm fails where two forms differ in a bit of what a caller can see.
func sameForm(t *testing.T, name string, f, g *BlockForm) {
	t.Helper()
	if d := cmp.Diff(f, g, cmpopts.IgnoreUnexported(BlockForm{}, Root{})); d != "" {
		t.Fatalf("%s: forms differ\n%s", name, d)
	}
	for i := range f.N {
		one := unit(f.N, i)
		if d := cmp.Diff([][]float64{f.In(one), f.Out(one)}, [][]float64{g.In(one), g.Out(one)}); d != "" {
			t.Fatalf("%s: rows of state %d differ\n%s", name, i, d)
		}
	}
}

// A workspace used for larger and smaller systems of every kind in turn gives what
// a new one gives, and leaves the forms it gave before alone.
func TestBlockWork(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 32))
	var w BlockWork
	var old, kept *BlockForm
	for k, n := range []int{12, 3, 40, 7, 20, 1, 33, 10, 2, 25} {
		a := []float64{1, -2, 3, -4}[:min(n*n, 4)]
		if n > 2 {
			a = pipeNet(n, uint64(100+n))
		}
		again, err := w.Dense(n, a, nil)
		if err != nil {
			t.Fatal(err)
		}
		fresh, err := DenseBlockForm(n, a, nil)
		if err != nil {
			t.Fatal(err)
		}
		sameForm(t, "dense", again, fresh)
		if k > 0 {
			sameForm(t, "the one before", old, kept)
		}
		old, kept = again, fresh
		b := randomBalance(rng, n)
		if again, err = w.BlockForm(b); err != nil {
			t.Fatal(err)
		}
		if fresh, err = b.BlockForm(); err != nil {
			t.Fatal(err)
		}
		sameForm(t, "balance", again, fresh)
	}
}
