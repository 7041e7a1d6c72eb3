package network_test

import (
	"slices"
	"sync"
	"testing"

	"lagbook/network"
)

// A Network serves several goroutines, each with its own Params; the same numbers
// give the same bits.
func TestConcurrentReduce(t *testing.T) {
	net, p := ladder(t, 12)
	outs := []network.Output{net.Level(1), net.FlowOf(3)}
	want, err := net.Reduce(p, outs)
	if err != nil {
		t.Fatal(err)
	}
	var wait sync.WaitGroup
	for range 4 {
		wait.Go(func() {
			_, own := ladder(t, 12)
			for range 5 {
				r, err := net.Reduce(own, outs)
				if err != nil {
					t.Error(err)
					return
				}
				if !slices.Equal(poles(r), poles(want)) || !slices.Equal(r.Realisation.Output[1], want.Realisation.Output[1]) {
					t.Error("the same numbers gave another answer")
				}
			}
		})
	}
	wait.Wait()
}
