package matrix

import (
	"slices"
	"testing"

	"golang.org/x/sys/cpu"
)

// TestKernels: the vector kernels and the plain ones agree bit for bit, for
// every remainder of rows and columns, and touch nothing beside their block.
func TestKernels(t *testing.T) {
	if !useAVX {
		t.Log("no AVX on this machine: only the plain kernels ran")
	}
	r := splitmix(3)
	fill := func(n int) []float64 {
		v := make([]float64, n)
		for i := range v {
			v[i] = r.lognormal(5) - r.lognormal(5)
		}
		return v
	}
	for rows := 1; rows <= 9; rows++ {
		for cols := 4; cols <= 24; cols += 4 {
			stride := cols + 3
			a := fill(rows*stride + 4)
			u, w := fill(cols), fill(cols)
			v, tt, x := fill(rows), fill(rows), fill(rows)
			both := func(run func() []float64) {
				t.Helper()
				defer func(was bool) { useAVX = was }(useAVX)
				fast := run()
				useAVX = false
				if plain := run(); !slices.Equal(fast, plain) {
					t.Errorf("%d rows, %d columns: kernels differ\n%v\n%v", rows, cols, fast, plain)
				}
			}
			both(func() []float64 {
				out := make([]float64, rows+1)
				dotRows(a, stride, rows, cols, u, out)
				return out
			})
			both(func() []float64 {
				b, sum := slices.Clone(a), make([]float64, cols+1)
				updateRows(b, stride, rows, cols, v, w, tt, u, x, sum)
				return append(b, sum...)
			})
			both(func() []float64 {
				x, y := slices.Clone(u), slices.Clone(w)
				turnRows(0.6, 0.2, x, y)
				return append(x, y...)
			})
			both(func() []float64 {
				y := slices.Clone(w)
				addRow(v[0], u, y)
				return y
			})
		}
	}
}

// TestModesPlain: without the vector kernels the modes are the same, bit for bit.
func TestModesPlain(t *testing.T) {
	defer func(was bool) { useAVX = was }(useAVX)
	networks(t, []int{3, 18, 33}, 1, func(name string, b *Balance, r *splitmix) {
		v := unit(b.N, r.index(b.N))
		useAVX = cpu.X86.HasAVX
		fast := modesBy(t, b, "own", v)
		useAVX = false
		plain := modesBy(t, b, "own", v)
		if !slices.Equal(fast.Lambda, plain.Lambda) || !slices.Equal(fast.Port[0], plain.Port[0]) {
			t.Errorf("%s: modes differ", name)
		}
	})
}
