package laplace

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// switchedApproach is an Approach of a system that switches. From a whole number of
// periods on, begun, in which every wave does what it does for ever, the difference has no
// input and goes from period to period by the same map.
type switchedApproach struct {
	begun float64   // periods
	off   []float64 // the difference of the levels then
}

// approachSwitched prepares the approach of r, a response of the same schedule.
func (c *Cycle) approachSwitched(r *Response) (*Approach, error) {
	u := make([]Waveform, len(r.s.b))
	for k, i := range r.input {
		u[i] = *r.wave[k]
	}
	var levels []float64
	if r.first != nil {
		levels = r.s.held(r.first)
	}
	begun := math.Ceil(c.settledFrom(u)/c.Period - 1e-12)
	actual, err := c.schedule.respondFrom(levels, u, begun*c.Period)
	if err != nil {
		return nil, err
	}
	s := &switchedApproach{begun: begun, off: actual.endLevels()}
	for i, x := range c.levels {
		s.off[i] -= x
	}
	return &Approach{cycle: c, switched: s}, nil
}

// settledFrom returns the instant from which on every wave does what it does for
// ever, what dies away having died to nothing.
func (c *Cycle) settledFrom(u []Waveform) float64 {
	t := c.from()
	for i := range u {
		if n := len(u[i].Segments); n > 0 && u[i].Period == 0 {
			for _, e := range u[i].Segments[n-1].Exp {
				if rate := real(e.Rate); rate < 0 {
					t = max(t, u[i].Segments[n-1].At-dead/rate)
				}
			}
		}
	}
	return t
}

// cycles is Approach.Cycles; it never counts less than begun where the difference is
// not 0 then.
func (s *switchedApproach) cycles(c *Cycle, out int, band float64) (n float64, ok bool, err error) {
	size := 0.0
	for _, v := range s.off {
		size = max(size, math.Abs(v))
	}
	if size == 0 {
		return s.begun, true, nil
	}
	periods := c.horizon(size*c.sight(out), band)
	turns := make([]Waveform, len(c.turns))
	for i, w := range c.turns {
		turns[i] = Waveform{Segments: w.Segments, Period: c.Period}
	}
	if math.IsInf(periods, 1) || periods*float64(len(c.r.phases.at)) > MaxBreaks {
		return 0, false, nil
	}
	p, err := c.schedule.phases(turns, periods*c.Period)
	if err != nil {
		return 0, false, err
	}
	plain := append([]Kind(nil), p.kinds...)
	for i := range plain {
		plain[i] = Kind{plain[i].System.ofDifferences(), make([]float64, len(plain[i].Base))}
	}
	p.kinds = plain
	d, err := p.respondFrom(s.off, make([]Waveform, len(c.r.s.b)), periods*c.Period)
	if err != nil {
		return 0, false, err
	}
	x, outside := d.LastOutside(out, 0, band, 0, d.until)
	if !outside {
		return s.begun, true, nil
	}
	return s.begun + math.Ceil(x.T/c.Period-1e-9), !x.Capped, nil
}

// horizon returns after how many periods a difference that starts as size is within
// the band for good: by the norms of powers of the map, each the square of the last.
func (c *Cycle) horizon(size, band float64) float64 {
	n, _ := c.change.Dims()
	m := mat.NewDense(n, n, nil)
	for i := range n {
		for j := range n {
			v := c.change.At(i, j)
			if i == j {
				v++
			}
			m.Set(i, j, v)
		}
	}
	grown, steps := 1.0, 1.0
	for range 60 {
		norm := mat.Norm(m, math.Inf(1))
		if norm <= 0.5 {
			return steps * math.Ceil(1+max(0, math.Log2(2*grown*size/band)))
		}
		grown *= max(1, norm)
		steps *= 2
		var next mat.Dense
		next.Mul(m, m)
		m.Copy(&next)
	}
	return math.Inf(1)
}

// sight bounds |output out| over a period in which the levels start within 1.
func (c *Cycle) sight(out int) float64 {
	p := &c.r.phases
	most, size := 0.0, 1.0
	for k := range p.at {
		s, h := p.kinds[p.kind[k]].System, p.end(k, c.Period)-p.at[k]
		most = max(most, size*s.sight(&s.modal.out[out], h))
		grown := 0.0
		for i := range s.carry.out {
			grown = max(grown, s.sight(&s.carry.out[i], h))
		}
		size *= max(grown, 1)
	}
	return most
}

// sight bounds what o sees over h of levels that start within 1.
func (s *System) sight(o *vector, h float64) float64 {
	sum := 0.0
	for i := range s.carry.in {
		in := &s.carry.in[i]
		for k, p := range s.modal.real {
			sum += math.Abs(o.real[k]*in.real[k]) * math.Exp(max(0, p*h))
		}
		for k, p := range s.modal.pair {
			sum += abs1(o.pair[k]) * abs1(in.pair[k]) * math.Exp(max(0, real(p)*h))
		}
		for b := range s.modal.block {
			q := &s.modal.block[b]
			d, mu := (&pieceBlock{n: q.n, t: q.t}).norm(0, 0)
			x, y := 0.0, 0.0
			for j := range q.n {
				x = math.Hypot(x, d[j]*in.block[q.first+j])
				y = math.Hypot(y, o.block[q.first+j]/d[j])
			}
			sum += x * y * math.Exp(mu*h)
		}
	}
	return sum
}
