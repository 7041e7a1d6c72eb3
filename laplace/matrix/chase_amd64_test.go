package matrix

import (
	"math/rand/v2"
	"slices"
	"testing"

	"golang.org/x/sys/cpu"
)

// The chains of reflectors: vector kernels and plain ones agree bit for bit.
func TestChaseKernels(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	draw := func(n int) []float64 {
		v := make([]float64, n)
		for i := range v {
			v[i] = rng.NormFloat64()
		}
		return v
	}
	defer func(was bool) { useAVX = was }(useAVX)
	for _, k := range []int{1, 2, 4, 7, 8, 12} {
		for _, size := range []int{4, 8, 12, 16, 20} {
			const stride = 27
			a, c := draw(24*stride), draw(k*reflectorSize)
			var rows, columns, sums [2][]float64
			for way, avx := range []bool{cpu.X86.HasAVX, false} {
				useAVX = avx
				rows[way], columns[way] = slices.Clone(a), slices.Clone(a)
				chaseRows(rows[way][3:], stride, k, size, c)
				sums[way] = slices.Clone(a[:24])
				sumRows(a[7:], stride, k, size, c, sums[way])
				if k%4 == 0 {
					chaseColumns(columns[way][stride+5:], stride, k, size, c)
				}
			}
			if !slices.Equal(rows[0], rows[1]) || !slices.Equal(sums[0], sums[1]) || !slices.Equal(columns[0], columns[1]) {
				t.Errorf("%d reflectors, %d entries: kernels differ", k, size)
			}
		}
	}
}

// Without the vector kernels the forms are the same, bit for bit.
func TestBlockFormPlain(t *testing.T) {
	defer func(was bool) { useAVX = was }(useAVX)
	for _, n := range []int{5, 10, 17, 18, 50, 51} {
		a := pipeNet(n, uint64(n))
		var forms [2]*BlockForm
		for k, avx := range []bool{cpu.X86.HasAVX, false} {
			useAVX = avx
			f, err := DenseBlockForm(n, a, nil)
			if err != nil {
				t.Fatal(err)
			}
			forms[k] = f
		}
		sameForm(t, "plain kernels", forms[0], forms[1])
	}
}

// The doubled sums: vector kernel and plain one agree bit for bit.
func TestSumTwiceKernel(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	draw := func(n int, size float64) []float64 {
		v := make([]float64, n)
		for i := range v {
			v[i] = size * rng.NormFloat64()
		}
		return v
	}
	defer func(was bool) { useAVX = was }(useAVX)
	for _, m := range []int{3, 8, 13, 16, 31} {
		x, hi, lo := draw(m*m, 1), draw(3, 1), draw(3, 1e-17)
		var sums [2][]float64
		for way, avx := range []bool{cpu.X86.HasAVX, false} {
			useAVX = avx
			high, low := slices.Clone(x[:m]), make([]float64, m)
			sumTwice(m, x, []int{0, m - 1, 1}, hi, lo, high, low)
			sums[way] = append(high, low...)
		}
		if !slices.Equal(sums[0], sums[1]) {
			t.Errorf("m = %d: kernels differ", m)
		}
	}
}
