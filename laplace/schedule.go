package laplace

import (
	"errors"
	"fmt"
	"math"
)

// A Schedule is a system with numbers that switch: piecewise constant waves, and the
// linear system in force while they have given values. The stores are the same in
// all systems and keep what they hold over a switch; so are inputs and outputs. Where
// a system has fewer stores than another, a Carry says what becomes of the rest.
//
// It remembers the systems it has met, so that two goroutines must not share it.
//
// Pick is asked once for each set of values that occurs; every System it hands out
// must come from NewCarrying or, all of them with the same quantities, from
// NewCarryingOver, and each Kind is that of deviations from one and the same
// state of the stores and of the inputs.
type Schedule struct {
	Waves []Waveform
	Pick  func(values []float64) (Kind, error)

	known map[string]int
	kinds []Kind
}

// A SwitchError says that there is no system to take over at an instant.
type SwitchError struct {
	At  float64 // s
	Err error
}

func (e *SwitchError) Error() string { return fmt.Sprintf("from %g s on: %v", e.At, e.Err) }
func (e *SwitchError) Unwrap() error { return e.Err }

// NotStairs reports the first of the waves that is not piecewise constant, −1 none.
func NotStairs(waves []Waveform) int {
	for i := range waves {
		for k := range waves[i].Segments {
			if !waves[i].Segments[k].constant() {
				return i
			}
		}
	}
	return -1
}

// Respond returns the response from the state and inputs that all kinds are
// deviations from, for t in [0, until], as System.Respond does: in closed form between
// the switches, with the stores carried over each. Errors are those, and *SwitchError.
//
// Before t = 0 the outputs are those of the system that was in force then.
func (s *Schedule) Respond(u []Waveform, until float64) (*Response, error) {
	r, err := s.respondFrom(nil, u, until)
	if err != nil {
		return nil, err
	}
	k, err := s.kind(s.Waves, func(w *Waveform) float64 { return w.Before })
	if err != nil {
		return nil, &SwitchError{0, err}
	}
	r.before = s.kinds[k].Base
	return r, nil
}

// RespondFrom is Respond from the state of a cycle of the same systems at t = 0.
func (s *Schedule) RespondFrom(c *Cycle, u []Waveform, until float64) (*Response, error) {
	levels := c.levels
	if c.schedule == nil {
		levels = c.r.s.held(&c.z)
	}
	r, err := s.respondFrom(levels, u, until)
	if err != nil {
		return nil, err
	}
	r.before = c.atEnd()
	return r, nil
}

// respondFrom is Respond with other levels of the stores at t = 0.
func (s *Schedule) respondFrom(levels []float64, u []Waveform, until float64) (*Response, error) {
	p, err := s.phases(s.Waves, until)
	if err != nil {
		return nil, err
	}
	return p.respondFrom(levels, u, until)
}

func (p phases) respondFrom(levels []float64, u []Waveform, until float64) (*Response, error) {
	var first *vector
	if levels != nil {
		z := p.kinds[p.kind[0]].System.hold(levels)
		first = &z
	}
	return respondIn(p, first, u, until)
}

// phases finds the systems in force over [0, until].
func (s *Schedule) phases(waves []Waveform, until float64) (phases, error) {
	if NotStairs(waves) >= 0 {
		panic("laplace: a schedule takes waves that are piecewise constant")
	}
	at := []float64{0}
	for i := range waves {
		waves[i].check()
		list, err := waves[i].starts(until, MaxBreaks-len(at))
		if err != nil {
			return phases{}, err
		}
		at = append(at, list...)
	}
	p := phases{last: -1}
	for _, t := range distinct(at, 0) {
		k, err := s.kind(waves, func(w *Waveform) float64 { return w.At(t) })
		if err != nil {
			return phases{}, &SwitchError{t, err}
		}
		if n := len(p.kind); n == 0 || p.kind[n-1] != k {
			p.at, p.kind = append(p.at, t), append(p.kind, k)
		}
	}
	if s.settle(waves) {
		k, err := s.kind(waves, func(w *Waveform) float64 { v, _ := w.Final(); return v })
		if err != nil {
			return phases{}, &SwitchError{until, err}
		}
		p.last = k
	}
	p.kinds = s.kinds
	return p, nil
}

// settle reports whether the switching ends.
func (s *Schedule) settle(waves []Waveform) bool {
	for i := range waves {
		if _, ok := waves[i].Final(); !ok {
			return false
		}
	}
	return true
}

// kind returns the index of the system for the values that the waves have.
func (s *Schedule) kind(waves []Waveform, value func(*Waveform) float64) (int, error) {
	values, key := make([]float64, len(waves)), make([]byte, 0, 8*len(waves))
	for i := range waves {
		values[i] = value(&waves[i])
		for b := math.Float64bits(values[i] + 0); len(key) < 8*(i+1); b >>= 8 {
			key = append(key, byte(b))
		}
	}
	if k, ok := s.known[string(key)]; ok {
		return k, nil
	}
	k, err := s.Pick(values)
	if err != nil {
		return 0, err
	}
	if len(k.System.improper()) > 0 {
		return 0, errors.New("an output that follows the derivative of an input does not go with numbers that switch")
	}
	if k.System.carry == nil {
		panic("laplace: a schedule takes systems of NewCarrying")
	}
	if s.known == nil {
		s.known = map[string]int{}
	}
	s.kinds = append(s.kinds, k)
	s.known[string(key)] = len(s.kinds) - 1
	return len(s.kinds) - 1, nil
}
