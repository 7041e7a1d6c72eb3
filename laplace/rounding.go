package laplace

import "math"

// Rounding returns an estimate of the absolute rounding error of output out: some
// units in the last place of the sum of what its modes contribute. Of an output
// that is a difference of levels it counts each level on its own, since what
// cancels between them is not known better than they are.
func (r *Response) Rounding(out int) float64 {
	worst := 0.0
	for k := range r.phases.kinds {
		worst = max(worst, r.roundingIn(k, out))
	}
	return worst
}

// roundingIn is Rounding while kind k is in force.
func (r *Response) roundingIn(k, out int) float64 {
	s, peak := r.phases.kinds[k].System, &r.peak[k]
	o := &s.modal.out[out]
	sum := math.Abs(r.phases.kinds[k].Base[out])
	for k, v := range o.real {
		sum += math.Abs(v * peak.real[k])
	}
	for k, v := range o.pair {
		sum += math.Abs(real(v)*real(peak.pair[k])) + math.Abs(imag(v)*imag(peak.pair[k]))
	}
	for _, q := range s.modal.block { // φ-functions of n×n: n roundings
		for k := q.first; k < q.first+q.n; k++ {
			sum += float64(q.n) * math.Abs(o.block[k]*peak.block[k])
		}
	}
	for i, in := range r.input {
		if d := s.d[out][in]; d != 0 {
			sum += math.Abs(d) * r.wave[i].size(r.until)
		}
	}
	if sum > 0 && mixed(s.c[out]) {
		for i, v := range r.levels(s) {
			sum += math.Abs(s.c[out][i]) * v
		}
	}
	return 4 * epsilon * sum
}

// mixed reports weights of both signs.
func mixed(c []float64) bool {
	var plus, minus bool
	for _, v := range c {
		plus, minus = plus || v > 0, minus || v < 0
	}
	return plus && minus
}

// levels estimates the size of each store's level: at rest under the largest
// inputs, or, where nothing rests, as if all that flowed in were shared out.
func (r *Response) levels(s *System) []float64 {
	n := s.plant.n
	flow := make([]float64, n)
	var total, capacity float64
	for i, in := range r.input {
		size := r.wave[i].size(r.until)
		for k, b := range s.b[in] {
			flow[k] += math.Abs(b) * size
			total += math.Abs(b) * size
		}
	}
	if solve := s.atRest(); solve != nil {
		x := solve(flow)
		for i := range x {
			x[i] = math.Abs(x[i])
		}
		return x
	}
	for i := range n {
		c := 1.0
		if b := s.plant.stores; b != nil {
			c = b.C[i]
		}
		capacity += c
	}
	for i := range flow {
		flow[i] = total * r.until / capacity
	}
	return flow
}
