package thermal

import (
	"math"

	"lagbook/network"
)

// A losing is the law of what a source gives beside its drive where its heat depends on a
// temperature otherwise than along a straight line: drive·(factor(T) − beside). Ports: the node it
// heats, and the node it goes by where that is another; one drive: the heat flow as stated, or a
// share of the factor.
type losing struct {
	sign   float64 // −1 takes the heat out
	beside float64 // 1 where the drive itself is a source of its own, else 0
	of     factor
}

// A factor is a function of a temperature with its slope, continuous within a mode, and finite.
type factor interface {
	factor(T float64, mode int) (f, slope float64)
}

// Eval implements network.Law.
func (l *losing) Eval(s *network.Stamp) {
	by := len(s.X) - 2 // the last port, before the one drive
	drive := s.X[by+1]
	f, slope := l.of.factor(s.X[by], s.Mode)
	s.F[0] = l.sign * drive * (f - l.beside)
	s.DF[by] = l.sign * drive * slope
	s.DF[by+1] = l.sign * (f - l.beside)
}

// Read implements network.Readable: the whole heat flow, whichever way it leads.
func (l *losing) Read(s *network.Stamp, _ int, grad []float64) float64 {
	by := len(s.X) - 2
	f, slope := l.of.factor(s.X[by], s.Mode)
	if grad != nil {
		grad[by] += s.X[by+1] * slope
		grad[by+1] += f
	}
	return s.X[by+1] * f
}

// Caution passes on what the factor says about itself.
func (l *losing) Caution(s *network.Stamp) (code, text string) {
	if c, ok := l.of.(interface {
		caution(T float64) (code, text string)
	}); ok {
		return c.caution(s.X[len(s.X)-2])
	}
	return "", ""
}

// doubling is the factor 2^((T − at)/every), of leakage and of losses at high field.
type doubling struct {
	name      string
	at, every float64 // K
}

// most is how many doublings are followed: no device is left at a million times its loss.
const most = 20

// Modes of a leaking.
const (
	follows = iota
	isHeld  // at the most
)

// count is how often the drive has doubled.
func (d *doubling) count(T float64) float64 { return (T - d.at) / d.every }

// factor implements factor. Beyond the most it goes on along its tangent, which no loss of heat
// catches up with, so that a balance that is lost is not found again up there.
func (d *doubling) factor(T float64, mode int) (f, slope float64) {
	n := d.count(T)
	top := math.Exp2(most)
	switch {
	case mode == isHeld:
		return top, 0
	case n > most:
		slope = top * math.Ln2 / d.every
		return top + slope*(n-most)*d.every, slope
	}
	f = math.Exp2(n)
	return f, f * math.Ln2 / d.every
}

func (d *doubling) caution(T float64) (code, text string) {
	if d.count(T) < most {
		return "", ""
	}
	return "runaway of " + d.name, "source \"" + d.name + "\" runs away: it has doubled twenty times over its drive and is held there"
}

// A leaking is the law of a source that doubles. In a march it is held where it has doubled so
// often, and so stays a number.
type leaking struct{ losing }

// Guards implements network.Switching.
func (l *leaking) Guards(s *network.Stamp, g []float64) int {
	n := l.of.(*doubling).count(s.X[len(s.X)-2])
	if g[0] = most - n; s.Mode == isHeld {
		g[0] = n - most*(1-overlap)
	}
	return 1
}

// Next implements network.Switching.
func (l *leaking) Next(s *network.Stamp, _ int) (mode int, what string, last bool) {
	if s.Mode == follows {
		return isHeld, "runs away", false
	}
	return follows, "has cooled down", false
}

// Shut implements network.Switching.
func (l *leaking) Shut(int) bool { return false }

// proportional is the factor 1 + α·(T − at).
type proportional struct{ alpha, at float64 }

// factor implements factor.
func (p *proportional) factor(T float64, _ int) (f, slope float64) {
	return 1 + p.alpha*(T-p.at), p.alpha
}

// tabled is a loss by points against temperature, straight between them, constant outside.
type tabled struct {
	name string
	loss curve // K, W
}

// factor implements factor.
func (t *tabled) factor(T float64, _ int) (f, slope float64) { return t.loss.value(T) }

func (t *tabled) caution(T float64) (code, text string) {
	const kept = 1e-6 // K, of levels at the points themselves
	if T > t.loss.x[0]-kept && T < t.loss.last()+kept {
		return "", ""
	}
	return "beyond-points of " + t.name, "source \"" + t.name + "\" is asked beyond the temperatures of its points: the nearest of them is used"
}
