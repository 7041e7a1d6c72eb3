package laplace

import (
	"math"
	"math/cmplx"
)

// Measures describe the response to a unit step from rest. What does not exist is
// nil: where the response does not settle all but Y0 (and, for a single undamped
// pair, Peak and PeakTime); where it settles at 0 all that is a share of the final
// value.
type Measures struct {
	Y0    float64  // y(0⁺), what passes at once
	Final *float64 // H(0)

	T10, T90 *float64 // s; the first time y reaches 10 and 90 % of Final, 0 where y(0⁺) is there
	RiseTime *float64 // s; T90 − T10

	// Settling2 and Settling5 are the last time (s) |y − Final| is 2 and 5 % of |Final|.
	Settling2, Settling5 *float64

	// Peak is the largest value for t ≥ 0⁺ in the direction of Final, signed; where
	// Final is only approached, Peak is Final and PeakTime nil. Where Final is 0 it is
	// the value of largest modulus.
	Peak, PeakTime *float64

	Overshoot  *float64 // per cent of Final, 0 or above, without bound
	Undershoot *float64 // per cent of Final to the far side of 0

	Touch  bool // an extremum meets the band of a settling time within rounding
	Capped bool // a search stopped at MaxEvaluations: times are as far as it came
}

// Step returns the measures of output out for a unit step of input in. All times
// are guaranteed roots of the closed form (see First, LastOutside, Max), not picked
// from samples; they hold until no mode is left above rounding. The error is that
// of Transfer.
func (s *System) Step(in, out int) (*Measures, error) {
	h, err := s.Transfer(in, out)
	if err != nil {
		return nil, err
	}
	return h.Step()
}

// Step returns the measures of the response to a unit step from rest.
func (h *Transfer) Step() (*Measures, error) {
	m := &Measures{Y0: h.direct}
	if h.rate != 0 {
		return h.stepImproper(m), nil
	}
	if len(h.Poles) == 0 {
		return h.stepStatic(m), nil
	}
	if !h.stable() {
		return h.swing(m)
	}
	y, err := h.unitStep(h.horizon())
	if err != nil {
		return nil, err
	}
	m.Final = number(h.Gain)
	if h.Gain == 0 {
		m.peakAboutZero(y)
		return m, nil
	}
	m.rise(y)
	m.Settling2, m.Settling5 = m.settling(y, 0.02), m.settling(y, 0.05)
	tol := 4*y.Rounding(0) + 2*math.Abs(h.settled()-h.Gain)
	m.peak(y, tol)
	m.undershoot(y, tol)
	return m, nil
}

func number(x float64) *float64 { return &x }

// stepImproper leaves all measures but the ends out: the response begins with an
// impulse, so that it has no peak and no first time.
func (h *Transfer) stepImproper(m *Measures) *Measures {
	if h.HasGain && h.stable() {
		m.Final = number(h.Gain)
	}
	return m
}

func (h *Transfer) stepStatic(m *Measures) *Measures {
	m.Final, m.Peak = number(h.Gain), number(h.Gain)
	if h.Gain != 0 {
		m.T10, m.T90, m.RiseTime = number(0), number(0), number(0)
		m.Settling2, m.Settling5 = number(0), number(0)
		m.Overshoot, m.Undershoot = number(0), number(0)
	}
	return m
}

// stable reports that every pole left lies to the left of the axis, by more than
// its error bound.
func (h *Transfer) stable() bool {
	for _, p := range h.Poles {
		if real(p.P) >= -p.Radius {
			return false
		}
	}
	return true
}

// unitStep returns the response to a unit step.
func (h *Transfer) unitStep(until float64) (*Response, error) {
	return h.system.Respond([]Waveform{Step(0, 1, 0)}, nil, until)
}

// swing fills the first extreme of a single undamped pair, which comes after half
// a period.
func (h *Transfer) swing(m *Measures) (*Measures, error) {
	if len(h.Poles) != 2 || h.Behaviour != "undamped" {
		return m, nil
	}
	y, err := h.unitStep(2 * math.Pi / cmplx.Abs(h.Poles[0].P))
	if err != nil {
		return nil, err
	}
	m.Final = nil
	m.peakAboutZero(y)
	return m, nil
}

// horizon returns a time (s) after which the step response is within rounding of
// its final value for good.
func (h *Transfer) horizon() float64 {
	fastest := 0.0
	for _, p := range h.Poles {
		fastest = max(fastest, -real(p.P))
	}
	t := 1 / fastest
	whole := h.rest(0) + math.Abs(h.Gain)
	for range 2000 {
		if h.rest(t) <= epsilon/4*whole {
			return t
		}
		t *= 2
	}
	return t
}

// rest bounds |y − Final| at t and, apart from what a block still gathers, after.
func (h *Transfer) rest(t float64) float64 {
	var sum float64
	for i, p := range h.Poles {
		// |t^k/k! r_k ...| of a multiple pole: each coefficient of the step's partial
		// fractions with its power of t
		decay := math.Exp(real(p.P) * t)
		if decay == 0 {
			continue
		}
		m := cmplx.Abs(p.P)
		for k, r := range h.Residues[i] {
			x, f := 0.0, 1.0
			for j := 0; j <= k; j++ { // e^{pt} Σ_j t^j/j! /p^{k+1−j}
				x += f * math.Pow(m, float64(j-k-1))
				f *= t / float64(j+1)
			}
			sum += cmplx.Abs(r) * x * decay
		}
	}
	return sum
}

func (m *Measures) rise(y *Response) {
	t10, ok10 := m.reach(y, 0.1)
	t90, ok90 := m.reach(y, 0.9)
	if ok10 && ok90 {
		m.T10, m.T90, m.RiseTime = &t10, &t90, number(t90-t10)
	}
}

// reach returns the first time y is at the share of Final.
func (m *Measures) reach(y *Response, share float64) (float64, bool) {
	level := share * *m.Final
	if m.Y0*math.Copysign(1, level) >= math.Abs(level) {
		return 0, true
	}
	x, ok := y.First(0, level, 0, y.until)
	m.Capped = m.Capped || x.Capped
	return x.T, ok
}

func (m *Measures) settling(y *Response, share float64) *float64 {
	x, ok := y.LastOutside(0, *m.Final, share*math.Abs(*m.Final), 0, y.until)
	if !ok {
		return number(0)
	}
	m.Touch, m.Capped = m.Touch || x.Touch, m.Capped || x.Capped
	return number(x.T)
}

// peak fills the largest value in the direction of Final. A value that does not
// pass Final by more than rounding (tol, with the difference between the static
// gain and the sum of the modes) is Final, approached.
func (m *Measures) peak(y *Response, tol float64) {
	final := *m.Final
	top, sign := y.Max(0, 0, y.until), 1.0
	if final < 0 {
		top, sign = y.Min(0, 0, y.until), -1
	}
	m.Capped = m.Capped || top.Capped
	if sign*(top.Y-final) <= tol {
		m.Peak, m.Overshoot = number(final), number(0)
		return
	}
	m.Peak, m.PeakTime = number(top.Y), number(top.T)
	m.Overshoot = number(100 * ((top.Y - final) / final))
}

func (m *Measures) undershoot(y *Response, tol float64) {
	low, sign := y.Min(0, 0, y.until), 1.0
	if *m.Final < 0 {
		low, sign = y.Max(0, 0, y.until), -1
	}
	m.Capped = m.Capped || low.Capped
	m.Undershoot = number(0)
	if sign*low.Y < -tol {
		m.Undershoot = number(-100 * low.Y / *m.Final)
	}
}

func (m *Measures) peakAboutZero(y *Response) {
	top, low := y.Max(0, 0, y.until), y.Min(0, 0, y.until)
	m.Capped = m.Capped || top.Capped || low.Capped
	if -low.Y > top.Y {
		top = low
	}
	m.Peak, m.PeakTime = number(top.Y), number(top.T)
}
