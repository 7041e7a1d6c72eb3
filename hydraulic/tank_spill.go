package hydraulic

import "math"

// A crest is where a tank runs over.
type crest struct {
	height float64 // above the floor, m
	width  float64 // of a rectangular weir, m; 0: a plain crest
}

// A plain edge holds the surface: it passes (level − edge)·area/edgeTime, so that the
// level stands at the edge but for what passes times a millisecond over the area of the
// tank, 2.5 µm where 30 L/s leave 12 m². An edge that held it at once would leave what runs over to no equation.
const edgeTime = 1e-3 // s

// deepest is the ratio of head and height of the crest up to which Rehbock's coefficient
// grows.
const deepest = 5

// weir returns what runs over a rectangular weir at the head u, and its derivative:
// q = 2/3·C·width·√(2g)·u^1.5 (Poleni) with C = 0.611 + 0.075·u/height (Rehbock 1929, as in
// Henderson, Open Channel Flow, 1966, section 6.4, from memory), up to a head of five
// times the height. Below the crest it goes on as an odd function, for an iteration.
func (c *crest) weir(u float64) (q, dq float64) {
	if u < 0 {
		q, dq = c.weir(-u)
		return -q, dq
	}
	u = min(u, 1e6) // m; an iteration may pass through any height
	k := 2.0 / 3 * c.width * math.Sqrt(2*gravity) * math.Sqrt(u)
	if u >= deepest*c.height {
		f := 0.611 + 0.075*deepest
		return k * u * f, 1.5 * k * f
	}
	f := 0.611 + 0.075*u/c.height
	return k * u * f, 1.5*k*f + k*u*0.075/c.height
}
