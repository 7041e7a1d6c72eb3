package laplace

import (
	"fmt"
	"testing"
)

// One frequency of a ladder, whose equations are sparse.
func BenchmarkFrequency(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		b.Run(fmt.Sprintf("stores=%d", n), func(b *testing.B) {
			r := frequencyOf(b, rcLadder(b, n), 0, 0)
			for b.Loop() {
				r.At(0.3)
			}
		})
	}
}
