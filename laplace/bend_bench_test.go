package laplace

import (
	"fmt"
	"math"
	"testing"
)

// A quadratic load, as the loss of a ramped current is, beside a linear one of the same breaks.
func BenchmarkTableOfBentLoad(b *testing.B) {
	for _, n := range []int{10, 200} {
		s := tableSystem(b, n)
		end := 5 / -real(s.Poles()[0].P)
		ramp := Waveform{Segments: []Segment{{A: 1, B: 2 / end}, {At: end / 3, A: 2, B: -1 / end}}}
		square, err := Power(ramp, 2)
		if err != nil {
			b.Fatal(err)
		}
		for _, spaced := range []string{"uniform", "in decades"} {
			times := make([]float64, 10000)
			for i := range times {
				times[i] = end * float64(i+1) / float64(len(times))
				if spaced == "in decades" {
					times[i] = end * math.Pow(10, -6*(1-float64(i+1)/float64(len(times))))
				}
			}
			for _, w := range []struct {
				name string
				Waveform
			}{{"linear", ramp}, {"quadratic", square}} {
				b.Run(fmt.Sprintf("n=%d/%s/%s", n, spaced, w.name), func(b *testing.B) {
					r, err := s.Respond([]Waveform{w.Waveform}, nil, end)
					if err != nil {
						b.Fatal(err)
					}
					y := [][]float64{make([]float64, len(times)), make([]float64, len(times)), make([]float64, len(times))}
					b.ReportAllocs()
					for b.Loop() {
						r.Table(times, y)
					}
				})
			}
		}
	}
}
