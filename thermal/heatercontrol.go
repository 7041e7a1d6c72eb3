package thermal

import (
	"math"

	"lagbook/network"
)

// A controller is a heater under proportional and integral control: it gives
// gain·(target − T) + I within its limits, and the integral I grows by gain·(target − T) in each
// integral time. It has two unknowns, the integral in W and the energy in J, and one
// drive, the target.
//
// At a limit the integral never pushes further. Where it alone would bring the output back to
// the limit at once, each time the temperature takes it off, it keeps the output just there:
// I = limit − gain·(target − T). That lasts until the temperature moves faster than the integral
// can follow, or turns, or the target jumps.
type controller struct {
	heating
	gain     float64 // W/K, > 0
	integral float64 // s, the integral time, > 0
}

// Modes of a controller.
const (
	inRange = iota
	atHigh  // the sum is above, the integral may only fall
	atLow
	onHigh // the sum is kept at the limit by the integral
	onLow
)

// limit is the limit in force.
func (c *controller) limit(mode int) float64 {
	if mode == atLow || mode == onLow {
		return c.low
	}
	return c.high
}

// missing is how far the level watched is below the target, in K, and rising how fast that
// level comes nearer to it, in K/s.
func (c *controller) missing(s *network.Stamp, at seat) float64 {
	return s.X[at.energy+1] - s.X[at.watch]
}

func (c *controller) rising(s *network.Stamp, at seat) float64 {
	return s.Rate[at.watch] - s.Rate[at.energy+1]
}

// sum is what proportional part and integral come to, in W.
func (c *controller) sum(s *network.Stamp, at seat) float64 {
	return c.gain*c.missing(s, at) + s.X[at.integral]
}

// rate is how fast the integral would move in range, in W/s.
func (c *controller) rate(s *network.Stamp, at seat) float64 { return c.follow() * c.missing(s, at) }

// follow is the gain of the integral, in W/(K·s).
func (c *controller) follow() float64 { return c.gain / c.integral }

// heat is what the heater gives.
func (c *controller) heat(s *network.Stamp, at seat) heat {
	if s.Mode != inRange {
		return heat{u: c.limit(s.Mode)}
	}
	return heat{c.sum(s, at), -c.gain, 1, c.gain}
}

// Eval implements network.Law.
func (c *controller) Eval(s *network.Stamp) {
	at := seatOf(s, 2)
	q := c.heat(s, at)
	q.into(s, at)
	row, n := at.integral, len(s.X) // the row of the integral bears the place of its column
	d := s.DF[row*n : (row+1)*n]
	rate := c.rate(s, at)
	switch {
	case c.keeps(s.Mode):
		pace := 1 / (trail * c.integral)
		s.F[row] = pace * (q.u - c.sum(s, at))
		heat{0, -c.gain, 1, c.gain}.slopes(d, at, -pace)
	case s.Mode == atHigh && rate >= 0 || s.Mode == atLow && rate <= 0:
		s.F[row] = 0
	default:
		s.F[row] = rate
		heat{0, -c.follow(), 0, c.follow()}.slopes(d, at, 1)
	}
}

// keeps reports whether the integral keeps the output at a limit.
func (c *controller) keeps(mode int) bool { return mode == onHigh || mode == onLow }

const (
	// margin is how far the output may pass a limit before it counts as being there, as a share of
	// its range: where it leaves the limit along a tangent, rounding must not bring it back.
	margin = 1e-9
	// jumped is how far from a limit the sum must be, as a share of the range, to have come there by a
	// jump of the target: nothing is kept then.
	jumped = 1e-6
	// trail is the time by which the integral follows what keeps the output at a limit, as a share of
	// the integral time. It shows a jump of the target, which the integral must not follow; where
	// the output leaves the limit the integral is put where it would be without it.
	trail = 1e-4
)

// Guards of a limit at which the integral keeps the output. A jump is seen first: it may violate
// the others, too.
const (
	byJump = iota
	tooFast
	turned
)

// Guards implements network.Switching.
func (c *controller) Guards(s *network.Stamp, g []float64) int {
	at := seatOf(s, 2)
	sum := c.sum(s, at)
	switch s.Mode {
	case atHigh:
		g[0] = sum - c.high
		return 1
	case atLow:
		g[0] = c.low - sum
		return 1
	case inRange:
		beyond := margin * (c.high - c.low)
		g[0], g[1] = c.high+beyond-sum, sum-(c.low-beyond)
		return 2
	}
	// the integral must move at gain·T' to stay on the limit: no faster than it would by itself,
	// and not against its own way
	sign := 1.0
	if s.Mode == onLow {
		sign = -1
	}
	needed := c.gain * c.rising(s, at)
	g[byJump] = jumped*(c.high-c.low) + 2*trail*c.gain*math.Abs(c.missing(s, at)) - math.Abs(sum-c.limit(s.Mode))
	g[tooFast], g[turned] = sign*(c.rate(s, at)-needed), sign*needed
	return 3
}

// Next implements network.Switching.
func (c *controller) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	upper := s.Mode == atHigh || s.Mode == onHigh || s.Mode == inRange && k == 0
	at, on, word := atLow, onLow, "lower limit"
	if upper {
		at, on, word = atHigh, onHigh, "upper limit"
	}
	switch {
	case s.Mode == inRange:
		return c.arrive(s, on, at), "reaches its " + word, false
	case !c.keeps(s.Mode):
		mode, what = c.arrive(s, on, inRange), "leaves its "
		if mode == on {
			what = "is kept by its integral at its "
		}
		return mode, what + word, false
	}
	c.release(s, k)
	beyond := c.sum(s, seatOf(s, 2)) - c.limit(s.Mode)
	if k == turned || k == byJump && (beyond > 0) == upper {
		return at, "holds its integral at its " + word, false
	}
	return inRange, "leaves its " + word, false
}

// release puts the integral where it is when the output is no longer kept at a limit: there, but
// for what a jump has made of the sum.
func (c *controller) release(s *network.Stamp, k int) {
	at := seatOf(s, 2)
	if k == byJump {
		s.X[at.integral] += c.gain * c.rising(s, at) * trail * c.integral
		return
	}
	s.X[at.integral] = c.limit(s.Mode) - c.gain*c.missing(s, at)
}

// arrive decides at a limit between keeping the output on it, and otherwise.
func (c *controller) arrive(s *network.Stamp, keeps, otherwise int) int {
	at := seatOf(s, 2)
	if math.Abs(c.sum(s, at)-c.limit(keeps)) > jumped*(c.high-c.low) {
		return otherwise
	}
	needed, rate := c.gain*c.rising(s, at), c.rate(s, at)
	if keeps == onLow {
		needed, rate = -needed, -rate
	}
	if needed > 0 && needed < rate {
		return keeps
	}
	return otherwise
}

// Shut implements network.Switching.
func (c *controller) Shut(int) bool { return false }

// Begin implements network.Beginning: the integral starts at 0 unless the start is steady.
func (c *controller) Begin(s *network.Stamp, steady bool) {
	at := seatOf(s, 2)
	if !steady {
		s.X[at.integral] = 0
	}
	s.X[at.energy] = 0
	sum := c.sum(s, at)
	if steady { // at a limit for long, the integral has come no further than there
		s.X[at.integral] += min(max(sum, c.low), c.high) - sum
	}
	switch {
	case sum > c.high:
		s.Mode = atHigh
	case sum < c.low:
		s.Mode = atLow
	default:
		s.Mode = inRange
	}
}

// Read implements network.Readable.
func (c *controller) Read(s *network.Stamp, k int, grad []float64) float64 {
	at := seatOf(s, 2)
	q := c.heat(s, at)
	q.u = math.Min(math.Max(q.u, c.low), c.high) // rounding at a limit
	return c.read(s, at, k, q, grad)
}
