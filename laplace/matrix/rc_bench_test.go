package matrix

import (
	"fmt"
	"math"
	"testing"
)

// splitmix is the small generator of the speed baselines, so that a library
// written in C can be given the same network.
type splitmix uint64

func (s *splitmix) next() uint64 {
	*s += 0x9E3779B97F4A7C15
	z := uint64(*s)
	z = (z ^ z>>30) * 0xBF58476D1CE4E5B9
	z = (z ^ z>>27) * 0x94D049BB133111EB
	return z ^ z>>31
}

// uniform returns a number in (0, 1).
func (s *splitmix) uniform() float64 { return (float64(s.next()>>11) + 0.5) / (1 << 53) }

// lognormal returns exp(sigma·normal).
func (s *splitmix) lognormal(sigma float64) float64 {
	a, b := s.uniform(), s.uniform()
	return math.Exp(sigma * math.Sqrt(-2*math.Log(a)) * math.Cos(6.283185307179586*b))
}

// randomNetwork is a random tree of n stores, n more resistances, and a leak
// at the first store and at one in five of the others.
func randomNetwork(n int, seed uint64) *Balance {
	r := splitmix(seed)
	b := newBalance(n)
	for i := range n {
		b.C[i] = r.lognormal(1)
	}
	for i := 1; i < n; i++ {
		j := int(r.uniform() * float64(i))
		b.join(i, j, 1/r.lognormal(1))
	}
	for range n {
		i, j := int(r.uniform()*float64(n)), int(r.uniform()*float64(n))
		b.join(i, j, 1/r.lognormal(1))
	}
	for i := range n {
		u, g := r.uniform(), 1/r.lognormal(1)
		if i == 0 || u < 0.2 {
			b.Leak[i] += g
		}
	}
	return b
}

func unit(n, i int) []float64 {
	v := make([]float64, n)
	v[i] = 1
	return v
}

// BenchmarkRCModes times poles alone, and with the residues of one input and
// one output. The steady transfer resistance it checks is that of the same
// network in the C baseline.
func BenchmarkRCModes(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		net := randomNetwork(n, uint64(1000+n))
		check := map[int]float64{10: 0.885610836766, 50: 0.1189166057741, 200: 0.01259915615748}[n]
		for _, ports := range [][][]float64{nil, {unit(n, 0), unit(n, n-1)}} {
			name := fmt.Sprintf("n=%d/ports=%d", n, len(ports))
			b.Run(name, func(b *testing.B) {
				var w RCWork
				m, err := w.Modes(net, ports)
				if err != nil {
					b.Fatal(err)
				}
				if len(ports) > 0 {
					sum := 0.0
					for k, l := range m.Lambda {
						sum += m.Port[0][k] * m.Port[1][k] / l
					}
					if math.Abs(sum/check-1) > 1e-11 {
						b.Fatalf("steady transfer %.13g, want %.13g", sum, check)
					}
				}
				b.ReportAllocs()
				for b.Loop() {
					if _, err := w.Modes(net, ports); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
