package hydraulic

import "math"

// A pumpCurve is the head of a centrifugal pump at its rated speed against flow, by
// points: straight between them, the first and the last slope go on. At another speed, s
// times the rated one, affinity scales flow by s and head by s²:
//
//	H(q, s) = s²·H(q/s)
//
// so that each straight piece is h = s²·(h_k − m_k·x_k) + s·m_k·q, which needs no
// division by s.
type pumpCurve struct {
	flow, head, slope []float64 // m³/s ascending; m falling; slope[k] from point k to k + 1
	efficiency        []float64 // none, one, or one for each point
}

// still is the speed below which a pump keeps the resistance it has there: a thousandth of
// the rated one. A pump at rest would by affinity let liquid through without any loss.
const still = 1e-3

// set takes the points; the heads must fall.
func (c *pumpCurve) set(k int, flow, head float64) {
	c.flow[k], c.head[k] = flow, head
	if k > 0 {
		c.slope[k-1] = (head - c.head[k-1]) / (flow - c.flow[k-1])
	}
}

// at returns the head in m at a flow and a speed as a share of the rated one, ≥ 0, and
// its derivatives by both.
func (c *pumpCurve) at(q, s float64) (h, dq, ds float64) {
	k := 0
	for k < len(c.slope)-1 && q >= s*c.flow[k+1] {
		k++
	}
	m := c.slope[k]
	lift := c.head[k] - m*c.flow[k]
	if s < still {
		return s*s*lift + still*m*q, still * m, 2 * s * lift
	}
	return s*s*lift + s*m*q, s * m, 2*s*lift + m*q
}

// power is what the shaft must bring for each ρ·g at the rated speed, H·x/η, in m⁴/s, with
// its derivative by x. Between no flow and the first point the efficiency grows with the
// flow from 0, beyond the last it stays; flowing back, a pump takes what it takes at no
// flow, and where the flow drives it, nothing.
func (c *pumpCurve) power(x float64) (p, dp float64) {
	x, back := math.Max(x, 0), x < 0
	h, dh, _ := c.at(x, 1)
	if h <= 0 {
		return 0, 0
	}
	r, dr := c.perEfficiency(x)
	if back {
		return h * r, 0
	}
	return h * r, dh*r + h*dr
}

// perEfficiency is x/η at the flow x ≥ 0, with its derivative.
func (c *pumpCurve) perEfficiency(x float64) (r, dr float64) {
	n := len(c.efficiency)
	if n == 1 {
		return x / c.efficiency[0], 1 / c.efficiency[0]
	}
	first := 0
	if c.flow[0] == 0 && c.efficiency[0] == 0 {
		first = 1
	}
	if x <= c.flow[first] {
		if first == 0 && c.flow[0] == 0 {
			return 0, 1 / c.efficiency[0]
		}
		return c.flow[first] / c.efficiency[first], 0
	}
	if x >= c.flow[n-1] {
		return x / c.efficiency[n-1], 1 / c.efficiency[n-1]
	}
	k := first
	for x > c.flow[k+1] {
		k++
	}
	rise := (c.efficiency[k+1] - c.efficiency[k]) / (c.flow[k+1] - c.flow[k])
	eta := c.efficiency[k] + rise*(x-c.flow[k])
	return x / eta, (eta - x*rise) / (eta * eta)
}
