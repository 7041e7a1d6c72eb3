package laplace

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// A Cycle is the periodic steady state of a system under inputs that repeat or
// settle: what every response tends to, whatever its start. It holds one period,
// from t = 0 of the inputs on, in closed form. It is never changed and may be used
// from several goroutines; one of a Schedule uses that, and goroutines must not share
// the two.
type Cycle struct {
	Period float64 // s; 0 where no input repeats and the cycle is a state of rest

	r     *Response // over [0, Period]
	waves []steadyWave
	z     vector  // the state at t = 0
	rates *System // where outputs are improper: the system that was asked

	schedule *Schedule  // nil where nothing switches
	turns    []Waveform // its waves over one period
	levels   []float64  // of what is carried over a switch, just before t = 0
	change   *mat.Dense // of that in a period, for each unit at its start
}

// Cycle returns the periodic steady state y = base[m] + response to u, the inputs
// as Respond takes them. An input that repeats for ever (Period > 0, or an undamped
// sine) counts as if it had always done so; one that settles counts with its final
// value. Periods in whole-number ratios make a common period, their least common
// multiple; the ratio is decided on the doubles, to a few units in the last place.
//
// Errors: *Unsettled names an input that does neither, *NotCommensurate two
// periods without a whole-number ratio, *TooMany more than MaxBreaks breaks in the
// common period; *Resonant and *NotDecaying name a pole that does not lie left of
// the axis, *Drifting an output that a pole at 0 carries on and on. Only poles
// between an input that is not zero and an output count.
//
// Where a pole at 0 takes in nothing on balance, the level it keeps is that of the
// response from rest.
//
// Method: over one period from rest each mode comes to w; the cycle starts at
// z = w/(1 − e^{pP}), with 1 − e^{pP} = −pP·φ₁(pP) so that a slow pole keeps its
// digits, and blocks of close poles likewise through φ₁ of the block. The cost is
// twice that of a response over one period.
func (s *System) Cycle(u []Waveform, base []float64) (*Cycle, error) {
	if len(u) != len(s.b) {
		panic("laplace: a cycle takes one wave for each input")
	}
	if len(s.improper()) > 0 {
		x, waves := s.withRates(u)
		c, err := x.Cycle(waves, base)
		if err == nil {
			c.rates = s
		}
		return c, err
	}
	c := &Cycle{waves: make([]steadyWave, len(u))}
	var beats []beat
	for i := range u {
		u[i].check()
		var err error
		if c.waves[i], err = u[i].inTheLongRun(i); err != nil {
			return nil, err
		}
		beats = append(beats, c.waves[i].beats(i)...)
	}
	var err error
	if c.Period, err = common(beats); err != nil {
		return nil, err
	}
	span := c.Period
	if span == 0 {
		span = s.anySpan()
	}
	v, err := together(c.waves, span)
	if err != nil {
		return nil, err
	}
	first, err := s.respondFrom(nil, v, base, span)
	if err != nil {
		return nil, err
	}
	if err := first.checkDecay(c.Period); err != nil {
		return nil, err
	}
	if c.z, err = first.fixedPoint(u, c); err != nil {
		return nil, err
	}
	c.r, err = s.respondFrom(&c.z, v, base, span)
	return c, err
}

// anySpan returns a time (s) over which to look at a state of rest: that of the
// slowest pole.
func (s *System) anySpan() float64 {
	for _, p := range s.poles {
		if rate := -real(p.P); rate > p.Radius {
			return 1 / rate
		}
	}
	return 1
}

// Response returns the steady cycle over [0, Period] as a response. Where nothing
// repeats it is constant, over a span of the slowest time constant.
func (c *Cycle) Response() *Response { return c.r }

// At returns output out at t (s), which may be any time: the cycle has gone on for
// ever and does so.
func (c *Cycle) At(out int, t float64) float64 { return c.r.At(out, c.within(t)) }

// Left returns output out just before t (s).
func (c *Cycle) Left(out int, t float64) float64 {
	if t = c.within(t); t == 0 {
		t = c.r.until
	}
	return c.r.Left(out, t)
}

// within moves t into [0, Period).
func (c *Cycle) within(t float64) float64 {
	if c.Period == 0 {
		return 0
	}
	if t = math.Mod(t, c.Period); t < 0 {
		t += c.Period
	}
	if t >= c.Period {
		return 0
	}
	return t
}

// Max returns the largest value of output out and when in the period, 0 ≤ T <
// Period, it is first taken; T = Period says that it is approached from before a
// jump there. It is a guaranteed extreme, as that of Response.Max.
func (c *Cycle) Max(out int) Extreme { return c.extreme(out, c.r.Max) }

// Min returns the smallest value of output out, as Max does.
func (c *Cycle) Min(out int) Extreme { return c.extreme(out, c.r.Min) }

func (c *Cycle) extreme(out int, of func(out int, t0, t1 float64) Extreme) Extreme {
	if c.Period == 0 {
		return Extreme{Y: c.r.At(out, 0)}
	}
	e := of(out, 0, c.Period)
	if e.T < c.Period {
		return e
	}
	if math.Abs(c.r.At(out, 0)-e.Y) <= 2*c.r.Rounding(out) {
		e.T = 0 // the same instant
		return e
	}
	e.AtLeft = true
	return e
}

// Swing returns the largest less the smallest value of output out, exactly 0 where
// they differ by rounding only.
func (c *Cycle) Swing(out int) float64 {
	swing := c.Max(out).Y - c.Min(out).Y
	if swing <= 4*c.r.Rounding(out) {
		return 0
	}
	return swing
}

// Mean returns the mean of output out over a period, by integration in closed form.
func (c *Cycle) Mean(out int) float64 {
	if c.Period == 0 {
		return c.r.At(out, 0)
	}
	base, sum := c.r.base[out], 0.0
	for j := range c.r.times {
		v := c.r.curve(c.r.piece(j), out)
		v.base -= base // so that a small swing on a large base keeps its digits
		sum += v.integral()
	}
	return base + sum/c.Period
}

// Respond returns the response to u that starts at t = 0 in the cycle's state. Of
// an input, only what it does from t = 0 on counts; with the inputs of the cycle the
// response is the cycle.
func (c *Cycle) Respond(u []Waveform, until float64) (*Response, error) {
	if c.rates != nil {
		_, u = c.rates.withRates(u)
	}
	r, err := c.respond(u, until)
	if err != nil {
		return nil, err
	}
	r.before = c.atEnd()
	return r, nil
}

func (c *Cycle) respond(u []Waveform, until float64) (*Response, error) {
	if c.schedule != nil {
		return c.schedule.respondFrom(c.levels, u, until)
	}
	return c.r.s.respondFrom(&c.z, u, c.r.base, until)
}

// atEnd returns the outputs just before t = 0.
func (c *Cycle) atEnd() []float64 {
	y := make([]float64, len(c.r.base))
	for out := range y {
		y[out] = c.Left(out, 0)
	}
	return y
}
