package laplace

import (
	"math"
	"slices"
)

// fitNodes are the Chebyshev points of the second kind of degree 8 on [0, 1], of which
// every second, fourth and eighth are those of degree 4, 2 and 1: both ends are among
// them, so that neighbouring pieces meet.
var fitNodes = func() (x [9]float64) {
	for k := range x {
		x[k] = math.Pow(math.Sin(math.Pi*float64(k)/16), 2)
	}
	return x
}()

// fitChecks are the points at which a fit is compared: between the nodes.
var fitChecks = func() (x [24]float64) {
	for k := range x {
		x[k] = math.Pow(math.Sin(math.Pi*(float64(k)+0.5)/48), 2)
	}
	return x
}()

// Samples are values of f over a piece.
type samples24 struct {
	from, to float64 // s
	v        [len(fitNodes)]float64
	check    [len(fitChecks)]float64
}

// sample evaluates f over [from, to], which lies in the present interval; at its end the
// value before a break counts.
func (s *sampler) sample(from, to float64) (*samples24, error) {
	y := &samples24{from: from, to: to}
	at := func(share float64) (float64, error) {
		t := from + (to-from)*share
		if share == 1 {
			t = to // so that neighbours agree where they meet
		}
		for i := range s.laws {
			s.x[i] = s.laws[i].value(t - s.at)
			s.size[i] = max(s.size[i], math.Abs(s.x[i]))
		}
		return s.value(t)
	}
	var err error
	for k, share := range fitNodes {
		if y.v[k], err = at(share); err != nil {
			return nil, err
		}
	}
	for k, share := range fitChecks {
		if y.check[k], err = at(share); err != nil {
			return nil, err
		}
	}
	return y, nil
}

// fit appends the pieces that reproduce the samples, the lowest degree that does or, where
// none does, two halves.
func (s *sampler) fit(y *samples24, depth int) error {
	best, off := Segment{}, math.Inf(1)
	for degree := 1; degree <= 8; degree *= 2 {
		g := y.polynomial(degree)
		if o := safety * y.off(&g); o < off {
			best, off = g, o
		}
		if off <= s.tol*s.scale {
			return s.keep(best, off)
		}
	}
	mid := y.from + (y.to-y.from)/2
	if depth >= whenToDoubt && s.isNoise(mid, off) {
		return s.keep(best, off)
	}
	if depth >= deepest || !(mid > y.from && mid < y.to) {
		first, last := y.v[0], y.v[len(y.v)-1]
		if math.Abs(last-first) > max(100*s.tol, 1e-6)*s.scale {
			return &HiddenJump{At: mid, From: first, To: last}
		}
		return s.keep(best, off)
	}
	for _, half := range [2][2]float64{{y.from, mid}, {mid, y.to}} {
		part, err := s.sample(half[0], half[1])
		if err == nil {
			err = s.fit(part, depth+1)
		}
		if err != nil {
			return err
		}
	}
	return nil
}

const (
	deepest     = 60 // halvings of a piece
	whenToDoubt = 12 // halvings after which what does not fit may be rounding
)

// isNoise tells whether a misfit at t is rounding of the waves: it is no more than their
// rounding makes, and all that f comes to is nothing beside what f does where they move a
// little. What is left where waves cancel is not fitted any closer.
func (s *sampler) isNoise(t, off float64) bool {
	return off <= safety*s.noise(t, 8*epsilon) && s.noise(t, 1e-3) > 1e6*s.scale
}

// noise is by how much f moves at t when each wave moves by a share of its size.
func (s *sampler) noise(t, share float64) (sum float64) {
	for i := range s.laws {
		s.x[i] = s.laws[i].value(t - s.at)
	}
	x := slices.Clone(s.x)
	here := s.f(x)
	for i, size := range s.size {
		most := 0.0
		for _, d := range [2]float64{-share * size, share * size} {
			x[i] = s.x[i] + d
			if v := math.Abs(s.f(x) - here); v < math.Inf(1) { // f may end here
				most = max(most, v)
			}
		}
		x[i] = s.x[i]
		sum += most
	}
	return sum
}

func (s *sampler) keep(g Segment, off float64) error {
	if s.bound = max(s.bound, off); len(s.out.Segments) >= mostPieces {
		return &TooMany{Found: len(s.out.Segments) + 1, Limit: mostPieces}
	}
	s.out.Segments = append(s.out.Segments, g)
	return nil
}

// polynomial returns the segment through the nodes of a degree, by divided differences; its
// ends are those samples to rounding.
func (y *samples24) polynomial(degree int) Segment {
	step := 8 / degree
	x, d := make([]float64, degree+1), make([]float64, degree+1)
	for k := range x {
		x[k], d[k] = fitNodes[k*step], y.v[k*step]
	}
	for k := 1; k <= degree; k++ {
		for i := degree; i >= k; i-- {
			d[i] = (d[i] - d[i-1]) / (x[i] - x[i-k])
		}
	}
	c := make([]float64, degree+1) // of powers of the share of the piece
	for k := degree; k >= 0; k-- {
		for i := degree; i > 0; i-- {
			c[i] = c[i-1] - x[k]*c[i]
		}
		c[0] = d[k] - x[k]*c[0]
	}
	power, length := 1.0, y.to-y.from
	for k := range c {
		c[k] /= power
		power *= length
	}
	g := law(c, nil)
	g.At, g.A = y.from, y.v[0]
	for range 2 {
		g.B += (y.v[8] - g.value(length)) / length
	}
	return g
}

// off returns the largest difference between the segment and the samples.
func (y *samples24) off(g *Segment) float64 {
	most := 0.0
	for k, v := range y.v {
		most = max(most, math.Abs(v-g.value((y.to-y.from)*fitNodes[k])))
	}
	for k, v := range y.check {
		most = max(most, math.Abs(v-g.value((y.to-y.from)*fitChecks[k])))
	}
	if !isNumber(most) { // powers of a time too short to hold them
		return math.Inf(1)
	}
	return most
}
