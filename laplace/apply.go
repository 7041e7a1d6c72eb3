package laplace

import (
	"errors"
	"fmt"
	"math"
)

// Apply returns the wave f(x), x[i] the value of w[i], sampled: between the breaks of the
// waves f is fitted by polynomials of degree 1, 2, 4 or 8, in as many pieces as it takes.
//
// tol is the error allowed, as a share of the largest modulus of f; bound is the error
// reached, in the unit of f. It is measured and not proven: three times the largest
// difference from f at 33 instants of each piece, and pieces are no longer than three
// radians of the fastest sine among the waves. f may bend anywhere; it may jump only where
// one of the waves has a break.
//
// Where the waves settle, f is sampled until what dies away of them has, and goes on with
// the value that it settles at. Where they repeat with a common period it repeats too. In
// all other cases, and where that takes too many pieces, it is sampled up to until (s) and
// goes on straight from there, never level, so that nothing takes it for settled.
//
// Errors: *NoValue where f is not a finite number, *HiddenJump where it jumps between breaks,
// *TooMany.
func Apply(f func(x []float64) float64, until, tol float64, w ...Waveform) (Waveform, float64, error) {
	if !(until > 0) || math.IsInf(until, 0) || !(tol > 0) {
		return Waveform{}, 0, fmt.Errorf("laplace: a sampled wave needs a time and a tolerance above 0, not %g s and %g", until, tol)
	}
	list := make([]*Waveform, len(w))
	for i := range w {
		list[i] = &w[i]
		w[i].check()
	}
	s := newSampler(f, list, max(tol, closestFit))
	err := s.forEver()
	var many *TooMany
	if err == errNotForEver || errors.As(err, &many) {
		s = newSampler(f, list, max(tol, closestFit))
		err = s.upTo(until)
	}
	if err != nil {
		return Waveform{}, 0, err
	}
	return s.out, s.bound, nil
}

// A HiddenJump error says that a function of waves jumps where none of them does.
type HiddenJump struct{ At, From, To float64 } // s, values

func (e *HiddenJump) Error() string {
	return fmt.Sprintf("the wave jumps at about %g s, from %g to %g, where none of its parts does: give the jump a part of its own", e.At, e.From, e.To)
}

const (
	closestFit = 1e-13   // the smallest tolerance
	safety     = 3       // of the error measured
	mostPieces = 200_000 // of one sampled wave
	radians    = 3       // of the fastest sine in a piece
)

// A sampler fits one function.
type sampler struct {
	f     func(x []float64) float64
	w     []*Waveform
	times joint
	end   float64 // s
	tail  bool    // the value that it settles at is known
	tol   float64
	scale float64 // the largest modulus met
	bound float64
	out   Waveform

	laws []Segment // of each wave in the interval
	at   float64   // s; where that begins
	x    []float64
	size []float64 // of each wave, the largest modulus met
}

func newSampler(f func(x []float64) float64, w []*Waveform, tol float64) *sampler {
	return &sampler{f: f, w: w, tol: tol, x: make([]float64, len(w)), size: make([]float64, len(w))}
}

// errNotForEver says that the waves neither settle nor repeat together.
var errNotForEver = errors.New("laplace: the waves neither settle nor repeat together")

// forEver samples what waves that settle or repeat do for ever.
func (s *sampler) forEver() error {
	settle, gone := true, 0.0
	for _, w := range s.w {
		_, ok := w.Final()
		settle = settle && ok
		gone = max(gone, w.gone())
	}
	var err error
	if settle {
		s.end, s.tail = gone, true
		s.times, err = joinUpTo(s.w, gone)
	} else {
		period, from, e := commonTurn(s.w)
		if e != nil || period == 0 {
			return errNotForEver
		}
		from = max(from, gone)
		s.end = from + period
		s.times, err = joinOver(s.w, from, period)
	}
	if err != nil {
		return err
	}
	return s.run()
}

// upTo samples up to until.
func (s *sampler) upTo(until float64) error {
	var err error
	s.end = until
	if s.times, err = joinUpTo(s.w, until); err != nil {
		return err
	}
	return s.run()
}

// gone returns the instant from which on the wave's last segment has died away.
func (w *Waveform) gone() float64 {
	if len(w.Segments) == 0 {
		return 0
	}
	last := &w.Segments[len(w.Segments)-1]
	t := last.At
	if w.Period > 0 {
		return w.Segments[w.Repeat].At
	}
	for _, e := range last.Exp {
		if rate := real(e.Rate); rate < 0 && e.Amplitude != 0 {
			t = max(t, last.At-dead/rate)
		}
	}
	return t
}

// joinUpTo joins the breaks in [0, end).
func joinUpTo(w []*Waveform, end float64) (joint, error) {
	list, near := []float64{0}, 0.0
	for i := range w {
		starts, err := w[i].starts(end, mostPieces)
		if err != nil {
			return joint{}, err
		}
		if w[i].Period > 0 {
			near = sameInstant
		}
		list = append(list, starts...)
	}
	list = apartFrom(list, near)
	for len(list) > 1 && list[len(list)-1] >= end-near*end {
		list = list[:len(list)-1]
	}
	return joint{times: list, near: near}, nil
}

func (s *sampler) run() error {
	for i, w := range s.w {
		s.x[i] = w.Before
	}
	var err error
	if s.out.Before, err = s.value(-1); err != nil {
		return err
	}
	for pass := range 2 { // the first only finds the scale
		for k, t := range s.times.times {
			end := s.end
			if k+1 < len(s.times.times) {
				end = s.times.times[k+1]
			}
			if !(end > t) {
				continue
			}
			if pass == 1 && s.times.period > 0 && k == s.times.repeat {
				s.out.Repeat = len(s.out.Segments)
			}
			if err := s.interval(t, end, pass == 0); err != nil {
				return err
			}
		}
	}
	s.out.Period = s.times.period
	if s.times.period > 0 {
		return nil
	}
	return s.finish()
}

// interval fits f between two breaks, or only looks how large it is.
func (s *sampler) interval(t, end float64, look bool) error {
	s.at, s.laws = t, s.laws[:0]
	omega, still := 0.0, true
	for _, w := range s.w {
		g := w.law(t, s.times.near)
		s.laws = append(s.laws, g)
		still = still && g.constant()
		for _, e := range g.Exp {
			if e.Amplitude != 0 {
				omega = max(omega, math.Abs(imag(e.Rate)))
			}
		}
	}
	parts := max(math.Ceil(omega*(end-t)/radians), 1)
	if still {
		parts = 1
	}
	if parts+float64(len(s.out.Segments)) > mostPieces {
		return &TooMany{Found: int(min(parts, 1e15)), Limit: mostPieces}
	}
	from := t
	for k := range int(parts) {
		to := t + (end-t)*float64(k+1)/parts
		if k+1 == int(parts) {
			to = end
		}
		if !(to > from) {
			continue
		}
		y, err := s.sample(from, to)
		switch {
		case err != nil:
			return err
		case look:
		case still:
			s.out.Segments = append(s.out.Segments, Segment{At: t, A: y.v[0]})
		default:
			err = s.fit(y, 0)
		}
		if err != nil {
			return err
		}
		from = to
	}
	return nil
}

// finish adds what comes after the end.
func (s *sampler) finish() error {
	if s.tail {
		for i, w := range s.w {
			s.x[i], _ = w.Final()
		}
		v, err := s.value(s.end)
		s.out.Segments = append(s.out.Segments, Segment{At: s.end, A: v})
		return err
	}
	last := &s.out.Segments[len(s.out.Segments)-1]
	length := s.end - last.At
	c := last.powers()
	shift(c, length)
	if c[1] == 0 {
		c[1] = epsilon * max(s.scale, math.SmallestNonzeroFloat64/epsilon) / s.end
	}
	s.out.Segments = append(s.out.Segments, Segment{At: s.end, A: c[0], B: c[1]})
	return nil
}

// value returns f at what x holds, at the time t for a message.
func (s *sampler) value(t float64) (float64, error) {
	v := s.f(s.x)
	if !isNumber(v) {
		return 0, &NoValue{At: t, Value: v}
	}
	s.scale = max(s.scale, math.Abs(v))
	return v, nil
}
