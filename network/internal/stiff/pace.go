package stiff

import "math"

// A pace chooses the length of the next step: Gustafsson's predictive control, which
// sees from two errors in a row whether the solution is becoming easier, and which after
// a step taken back does not lengthen at once (K. Gustafsson, Control-theoretic techniques
// for stepsize selection in implicit Runge–Kutta methods, ACM Trans. Math. Softw. 20,
// 1994; Hairer & Wanner, IV.8).
type pace struct {
	step, miss float64 // of the step taken before; 0: none
	back       bool    // the last attempt was taken back
	backs      int     // attempts taken back in a row
}

const (
	safety   = 0.9
	longer   = 6.0  // most by which a step grows
	shorter  = 0.15 // most by which it shrinks
	leastErr = 1e-4 // a smaller error says nothing about the next step
)

// after returns the next step after one of length h whose error was miss ≤ 1.
func (p *pace) after(h, miss float64) float64 {
	miss = max(miss, leastErr)
	grow := safety * math.Pow(miss, -1./falls)
	if p.step > 0 {
		foreseen := safety * h / p.step * math.Pow(p.miss/(miss*miss), 1./falls)
		grow = min(grow, foreseen)
	}
	grow = min(max(grow, shorter), longer)
	if p.back {
		grow = min(grow, 1)
	}
	p.step, p.miss, p.back, p.backs = h, max(miss, 1e-2), false, 0
	return h * grow
}

// again returns the step to try after one of length h failed with error miss > 1,
// infinite where it could not be worked out.
func (p *pace) again(h, miss float64) float64 {
	p.back = true
	if p.backs++; p.backs > 2 || math.IsInf(miss, 1) || math.IsNaN(miss) {
		return h * 0.1 // the estimate does not behave as its order says
	}
	return h * min(max(safety*math.Pow(miss, -1./falls), shorter), 0.9)
}
