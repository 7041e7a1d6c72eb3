package laplace

// Integral returns ∫ y dt of output out from t0 to t1 (s), in closed form: nothing is
// summed from samples. What lies outside [0, until] counts as it does for At, and
// impulses are left out as everywhere. The cost is that of one value for each piece
// between two breaks.
func (r *Response) Integral(out int, t0, t1 float64) float64 {
	if t1 < t0 {
		return -r.Integral(out, t1, t0)
	}
	sum := 0.0
	if t0 < 0 {
		sum += r.before[out] * (min(t1, 0) - t0)
	}
	if t1 > r.until {
		sum += r.At(out, r.until) * (t1 - max(t0, r.until))
	}
	t0, t1 = max(t0, 0), min(t1, r.until)
	if !(t0 < t1) {
		return sum
	}
	for j := r.pieceAt(t0, false); j < len(r.times) && r.times[j] < t1; j++ {
		p := r.piece(j)
		c := r.curve(p, out)
		base := c.base
		c.base = 0 // so that a small swing on a large base keeps its digits
		a, b := max(t0-p.t0, 0), min(t1-p.t0, p.length)
		sum += base*(b-a) + c.integralTo(b) - c.integralTo(a)
	}
	return sum
}

// integralTo returns ∫ y dτ over the first part of the piece, up to τ.
func (c *curve) integralTo(tau float64) float64 {
	if tau == 0 {
		return 0
	}
	part := *c
	part.length = tau
	return part.integral()
}
