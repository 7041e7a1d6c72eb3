package matrix

import (
	"fmt"
	"testing"
)

// pipeNet draws a network of n states, two fifths pressures and the rest flows
// in pipes, from splitmix64 and the normal distribution: x' = a x.
func pipeNet(n int, seed uint64) []float64 {
	r, q := splitmix(seed), splitmix(seed+1)
	a := make([]float64, n*n)
	nj := 2 * n / 5
	ci := make([]float64, nj)
	for i := range ci {
		c := r.lognormal(0.5)
		g := 0.05 * r.lognormal(0.5)
		ci[i] = 1 / c
		a[i*n+i] = -g / c
	}
	for k := 0; k < n-nj; k++ {
		from, to := -1, k
		switch {
		case k == 0:
			q.uniform()
		case k < nj:
			from = int(q.uniform() * float64(k))
		default:
			from, to = int(q.uniform()*float64(nj)), int(q.uniform()*float64(nj))
			if from == to {
				to = (to + 1) % nj
			}
		}
		l := q.lognormal(0.5)
		rs := 0.3 * q.lognormal(0.5)
		s := nj + k
		a[s*n+s] = -rs / l
		if from >= 0 {
			a[s*n+from] += 1 / l
			a[from*n+s] -= ci[from]
		}
		a[s*n+to] -= 1 / l
		a[to*n+s] += ci[to]
	}
	return a
}

func BenchmarkDenseBlockForm(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		a := pipeNet(n, uint64(2000+n))
		b.Run(fmt.Sprintf("n=%d", n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := DenseBlockForm(n, a, nil); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkResidues is what the baselines do: all poles, and the residues from the
// first pressure to the last.
func BenchmarkResidues(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		a := pipeNet(n, uint64(2000+n))
		in, out := unit(n, 0), unit(n, 2*n/5-1)
		b.Run(fmt.Sprintf("n=%d", n), func(b *testing.B) {
			b.ReportAllocs()
			var w BlockWork
			for b.Loop() {
				f, err := w.Dense(n, a, nil)
				if err != nil {
					b.Fatal(err)
				}
				f.In(in)
				f.Out(out)
			}
		})
	}
}

func BenchmarkDenseZeros(b *testing.B) {
	for _, n := range []int{10, 50} {
		a := pipeNet(n, 7)
		in, out := make([]float64, n), make([]float64, n)
		in[0], out[n/5] = 1, 1
		b.Run(fmt.Sprintf("n=%d", n), func(b *testing.B) {
			for b.Loop() {
				if _, err := DenseZeros(n, a, in, out, 0); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
