package network

import (
	"math"
	"testing"
)

// Numbers that are none never stand in a message.
func TestNumbersInMessages(t *testing.T) {
	for _, v := range []float64{math.Inf(1), math.Inf(-1), math.NaN()} {
		if got := number(v); got != "more than can be computed" {
			t.Errorf("%v is written %q", v, got)
		}
	}
	if got := number(0.0025); got != "0.0025" {
		t.Errorf("0.0025 is written %q", got)
	}
}
