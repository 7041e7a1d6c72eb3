package laplace

import (
	"fmt"
	"math"
	"testing"

	"lagbook/laplace/matrix"
)

// splitmix is a small generator, so that other programs can build the same networks.
type splitmix uint64

func (s *splitmix) next() float64 {
	*s += 0x9E3779B97F4A7C15
	z := uint64(*s)
	z = (z ^ z>>30) * 0xBF58476D1CE4E5B9
	z = (z ^ z>>27) * 0x94D049BB133111EB
	z ^= z >> 31
	return (float64(z>>11) + 0.5) / (1 << 53)
}

func (s *splitmix) lognormal() float64 {
	a, b := s.next(), s.next()
	return math.Exp(math.Sqrt(-2*math.Log(a)) * math.Cos(2*math.Pi*b))
}

// randomRC is a random tree of n stores with n further branches and some leaks; the
// numbers are those of a C program that tabulates the same with LAPACK.
func randomRC(n int, seed uint64) matrix.Balance {
	r := splitmix(seed)
	b := matrix.Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	for i := range n {
		b.C[i] = r.lognormal()
	}
	join := func(i, j int, g float64) {
		b.F[i*n+j] += g
		b.F[j*n+i] += g
	}
	for i := 1; i < n; i++ {
		j := int(r.next() * float64(i))
		join(i, j, 1/r.lognormal())
	}
	for range n {
		i, j := int(r.next()*float64(n)), int(r.next()*float64(n))
		if g := 1 / r.lognormal(); i != j { // drawn in any case
			join(i, j, g)
		}
	}
	for i := range n {
		if u, g := r.next(), 1/r.lognormal(); i == 0 || u < 0.2 {
			b.Leak[i] += g
		}
	}
	return b
}

// tableSystem is a network driven at one store and seen at three.
func tableSystem(tb testing.TB, n int) *System {
	unit := func(i int) []float64 {
		v := make([]float64, n)
		v[i] = 1
		return v
	}
	s, err := New(Realisation{Balance: randomRC(n, uint64(1000+n)),
		B: [][]float64{unit(0)}, Output: [][]float64{unit(0), unit(n / 2), unit(n - 1)}})
	if err != nil {
		tb.Fatal(err)
	}
	return s
}

func BenchmarkTable(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		for _, kind := range []string{"uniform", "spaced in decades"} {
			b.Run(fmt.Sprintf("n=%d/times=10000/%s", n, kind), func(b *testing.B) {
				s := tableSystem(b, n)
				end := 5 / -real(s.Poles()[0].P)
				r, err := s.Respond([]Waveform{Step(0, 1, 0)}, nil, end)
				if err != nil {
					b.Fatal(err)
				}
				t := make([]float64, 10000)
				y := [][]float64{make([]float64, len(t)), make([]float64, len(t)), make([]float64, len(t))}
				for i := range t {
					t[i] = end * float64(i+1) / float64(len(t))
					if kind != "uniform" {
						t[i] = end * math.Pow(10, -5*float64(len(t)-1-i)/float64(len(t)-1))
					}
				}
				for b.Loop() {
					r.Table(t, y)
				}
				b.ReportMetric(y[2][len(t)-1], "check")
			})
		}
	}
}

// BenchmarkNew takes apart one system after another, as phases of a Schedule and
// random variations of a network are.
func BenchmarkNew(b *testing.B) {
	for _, n := range []int{4, 10, 50} {
		rc := Realisation{Balance: randomRC(n, uint64(1000+n)), B: [][]float64{make([]float64, n)}, Output: [][]float64{make([]float64, n)}}
		rc.B[0][0], rc.Output[0][n-1] = 1, 1
		general := rc
		general.Balance.F = append([]float64(nil), rc.Balance.F...)
		general.Balance.F[1*n] *= 1.5 // one way more than the other: no network of resistances
		for _, r := range []struct {
			name string
			Realisation
		}{{"rc", rc}, {"general", general}} {
			b.Run(fmt.Sprintf("%s/n=%d", r.name, n), func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					if _, err := New(r.Realisation); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
