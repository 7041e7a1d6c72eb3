package quantity

import "math"

// at computes an operation for numbers of one instant.
func (o *op) at(x []float64) float64 {
	switch o.code {
	case opAdd:
		return x[0] + x[1]
	case opSub:
		return x[0] - x[1]
	case opMul:
		return x[0] * x[1]
	case opDiv:
		return x[0] / x[1]
	case opPow:
		return math.Pow(x[0], x[1])
	case opNeg:
		return -x[0]
	case opSqrt:
		return math.Sqrt(x[0])
	case opExp:
		return math.Exp(x[0])
	case opLn:
		return math.Log(x[0])
	case opAbs:
		return math.Abs(x[0])
	}
	best := x[0]
	for _, v := range x[1:] {
		if (v < best) == (o.code == opMin) {
			best = v
		}
	}
	return best
}
