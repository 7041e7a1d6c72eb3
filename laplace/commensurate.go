package laplace

import (
	"fmt"
	"math"
)

// A NotCommensurate error says that two inputs repeat with periods that have no
// whole-number ratio, so that together they never repeat.
type NotCommensurate struct {
	Inputs  [2]int
	Periods [2]float64 // s
}

func (e *NotCommensurate) Error() string {
	return fmt.Sprintf("laplace: inputs %d and %d repeat every %g s and %g s, which have no common period of at most %d of either",
		e.Inputs[0], e.Inputs[1], e.Periods[0], e.Periods[1], mostTurns)
}

const (
	// mostTurns bounds how often an input may repeat within the common period. Two
	// arbitrary doubles look like a ratio of whole numbers up to mostTurns with a
	// chance of about mostTurns²·ratioTol = 2e-5.
	mostTurns = 100_000

	// ratioTol is how far, relative, a ratio of periods may lie from one of whole
	// numbers: a period that was a frequency has gone through two divisions.
	ratioTol = 4 * epsilon
)

// wholeRatio returns the whole numbers n and d, without a common factor, with
// x = n/d within rounding, and false where there are none up to mostTurns.
//
// Method: the convergents of the continued fraction of x, which contain every
// fraction closer to x than 1/(2d²) (Hardy, Wright 1979, theorem 184).
func wholeRatio(x float64) (n, d int, ok bool) {
	h0, k0, h1, k1 := 0.0, 1.0, 1.0, 0.0
	for y := x; ; {
		a := math.Floor(y)
		h0, h1 = h1, a*h1+h0
		k0, k1 = k1, a*k1+k0
		if h1 > mostTurns || k1 > mostTurns {
			return 0, 0, false
		}
		// |x·k − h| is exact in one rounding
		if h1 > 0 && math.Abs(math.FMA(x, k1, -h1)) <= ratioTol*h1 {
			return int(h1), int(k1), true
		}
		if y == a {
			return 0, 0, false
		}
		y = 1 / (y - a)
	}
}

// A beat is a period of one input.
type beat struct {
	input  int
	period float64 // s
	stated bool    // as a period, not as an angular frequency
}

// common returns the least common multiple of the periods; 0 where there is none.
func common(beats []beat) (float64, error) {
	if len(beats) == 0 {
		return 0, nil
	}
	ref := beats[0]
	for _, b := range beats[1:] { // the longest of those stated as periods: its digits are the user's
		if b.stated && !ref.stated || b.stated == ref.stated && b.period > ref.period {
			ref = b
		}
	}
	turns := 1 // of ref
	for _, b := range beats {
		n, _, ok := wholeRatio(b.period / ref.period) // n/d of ref: n turns of ref are d of b
		if ok {
			turns = turns / gcd(turns, n) * n
		}
		if !ok || turns > mostTurns {
			return 0, &NotCommensurate{Inputs: [2]int{ref.input, b.input}, Periods: [2]float64{ref.period, b.period}}
		}
	}
	return float64(turns) * ref.period, nil
}

func gcd(a, b int) int {
	for b != 0 {
		a, b = b, a%b
	}
	return a
}
