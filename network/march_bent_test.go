package network_test

import (
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// Source: closed form, derived here. A body behind a conductance, T = C/G, that follows a
// level u = t² comes to t² − 2Tt + 2T²(1 − e^(−t/T)), one that follows t⁵ by
// y_k = t^k − T·k·y_(k−1), y_0 = 1 − e^(−t/T): put it into T y′ + y = u. What is shown of the
// held level itself, which no unknown follows, is right between the steps too.
func TestMarchFollowsPowersOfTime(t *testing.T) {
	const C, G, until = 3.0, 1.5, 9.0
	const T = C / G
	for _, degree := range []int{2, 3, 5, 8, 12} {
		poly := make([]float64, degree-1)
		poly[degree-2] = math.Pow(until, -float64(degree))
		w := newOne(t, C, 0, 0, proportional(G))
		w.p.Wave[0] = laplace.Waveform{Segments: []laplace.Segment{{Poly: poly}}}
		outs := []network.Output{w.net.Level(w.node), w.net.Level(w.held)}
		r := marched(t, w.net, w.p, outs, network.Run{Until: until})
		exact := func(at float64) float64 {
			y := -math.Expm1(-at / T)
			for k := 1; k <= degree; k++ {
				y = math.Pow(at, float64(k)) - T*float64(k)*y
			}
			return y * poly[degree-2]
		}
		if e := worst(r, 0, until, 1, exact); !(e <= 1e-6) {
			t.Errorf("degree %d: %.1e of the end off", degree, e)
		}
		if e := worst(r, 1, until, 1, func(at float64) float64 { return math.Pow(at/until, float64(degree)) }); !(e <= 1e-6) {
			t.Errorf("degree %d, the held level: %.1e of the end off", degree, e)
		}
	}
}
