package hydraulic

import "lagbook/network"

// A tankLaw is an open tank: what it stores at the pressure of its floor, what runs over
// an edge, and the air that enters where it has run empty. Where an edge or the floor
// holds the level, that is a mode of its own, which lasts as long as what comes in and
// goes out otherwise presses the level against it. What passes there is an unknown, so
// that a march sees its errors: of the level they are far below those of a pressure.
type tankLaw struct {
	vessel vessel
	zero   float64 // the network's level at which the tank is empty, Pa
	weight float64 // ρ·g, Pa/m
	crest  crest
	top    float64 // of the walls above the floor, m
	has    tankEdges
	areas  struct{ floor, crest, top float64 } // of the surface there, m²; of a narrow end a tenth of that half way up
}

// prepare works out what does not depend on the pressure.
func (l *tankLaw) prepare() {
	_, least := l.vessel.fill(l.top / 2)
	at := func(h float64) float64 {
		_, a := l.vessel.fill(h)
		return max(a, least/10)
	}
	l.areas.floor, l.areas.crest, l.areas.top = at(0), at(l.crest.height), at(l.top)
}

// tankEdges say which edges the case states.
type tankEdges struct{ crest, top bool }

// Modes of a tank. An operating point is looked for with every tank that can run over
// held at its edge; those from which nothing then runs over are let go.
const (
	tankOver = iota // over its crest, or over its top where it has no crest
	tankBetween
	tankBrim // over its top, above a crest
	tankEmpty
)

// Readings of a tank.
const (
	tankStored = iota
	tankSpill
)

// dregs is how far below the floor the level of an empty tank is held, and edge how far
// that over a weir falls before nothing runs over: what rounding may do to a level that
// comes to rest there sets neither off. In m.
const (
	dregs = 1e-5
	edge  = 1e-6
)

// past is how far, in m, the level passes an edge before the edge holds it: where the instant of
// that is found but for rounding, the level must not seem to leave again.
const past = 1e-8

// spillScale is of what size what passes an edge is, m³/s: its errors are judged by it.
const spillScale = 1e-2

// level returns the level above the floor, m.
func (l *tankLaw) level(x float64) float64 { return (x - l.zero) / l.weight }

// lip is the edge that a tank in the mode over runs over first, false where it has none.
func (l *tankLaw) lip() (h float64, ok bool) {
	if l.has.crest {
		return l.crest.height, true
	}
	return l.top, l.has.top
}

// Eval implements network.Law: the level of the floor, and what passes an edge that holds
// the level, out of the tank; air that enters an empty one counts below 0.
func (l *tankLaw) Eval(s *network.Stamp) {
	h := l.level(s.X[0])
	v, a := l.vessel.fill(h)
	s.Stored, s.DStored = v, a/l.weight
	out, dout := l.weir(h, s.Mode)
	s.F[0] = -out - s.X[1]
	s.DF[0], s.DF[1] = -dout/l.weight, -1
	edge, area := l.holding(s.Mode)
	k := area / edgeTime
	s.F[1] = -s.X[1]
	s.DF[3] = -1
	if area > 0 {
		s.F[1] += k * (h - edge)
		s.DF[2] = k / l.weight
	}
}

// holding is the height of the edge that holds the level in a mode, and the area of the
// surface there; none has no area.
func (l *tankLaw) holding(mode int) (h, area float64) {
	switch {
	case mode == tankEmpty:
		return -dregs, l.areas.floor
	case mode == tankBrim, mode == tankOver && !l.has.crest && l.has.top:
		return l.top, l.areas.top
	case mode == tankOver && l.has.crest && l.crest.width == 0:
		return l.crest.height, l.areas.crest
	}
	return 0, 0
}

// weir is what runs over a weir at a level in a mode.
func (l *tankLaw) weir(h float64, mode int) (q, dq float64) {
	if (mode == tankOver || mode == tankBrim) && l.has.crest && l.crest.width > 0 {
		return l.crest.weir(h - l.crest.height)
	}
	return 0, 0
}

// Read implements network.Readable.
func (l *tankLaw) Read(s *network.Stamp, k int, grad []float64) float64 {
	h := l.level(s.X[0])
	y, dy := l.vessel.fill(h)
	if h < 0 { // the dregs of an empty tank
		y, dy = 0, 0
	}
	dw := 0.0
	if k == tankSpill {
		y, dy = l.weir(h, s.Mode)
		if s.Mode != tankEmpty {
			y, dw = y+s.X[1], 1
		}
	}
	if grad != nil {
		grad[0] += dy / l.weight
		grad[1] += dw
	}
	return y
}

// Begin implements network.Beginning.
func (l *tankLaw) Begin(s *network.Stamp, steady bool) {
	if steady {
		return
	}
	h := l.level(s.X[0])
	first, has := l.lip()
	switch {
	case l.has.crest && l.has.top && h >= l.top:
		s.Mode = tankBrim
	case has && h >= first:
		s.Mode = tankOver
	case h < -dregs/2:
		s.Mode = tankEmpty
	default:
		s.Mode = tankBetween
	}
}

// stillness is how fast a level may fall, in m/s, and still count as held by an edge: two
// tanks that come to rest at one height are not let go and held again by rounding.
const stillness = 1e-8

// Guards implements network.Switching.
func (l *tankLaw) Guards(s *network.Stamp, g []float64) int {
	h := l.level(s.X[0])
	first, has := l.lip()
	_, area := l.holding(s.Mode)
	held := s.X[1] + stillness*area
	switch {
	case s.Mode == tankEmpty:
		g[0] = stillness*area - s.X[1]
		return 1
	case s.Mode == tankBrim:
		g[0] = held
		return 1
	case s.Mode == tankOver && has:
		if g[0] = held; area == 0 {
			g[0] = h - first + edge // over a weir
		}
		if !l.has.crest || !l.has.top {
			return 1
		}
		g[1] = l.top + past - h
		return 2
	}
	if g[0], g[1] = h+dregs+past, first+past-h; has {
		return 2
	}
	return 1
}

// Next implements network.Switching.
func (l *tankLaw) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	_, has := l.lip()
	switch {
	case s.Mode == tankEmpty:
		return tankBetween, "holds liquid again", false
	case s.Mode == tankBrim:
		return tankOver, "runs over its top no more", false
	case s.Mode == tankOver && k == 1:
		return tankBrim, "runs over its top", false
	case s.Mode == tankOver && l.has.crest:
		return tankBetween, "runs over no more", false
	case s.Mode == tankOver && has:
		return tankBetween, "runs over its top no more", false
	case k == 0:
		return tankEmpty, "runs empty", false
	case l.has.crest:
		return tankOver, "runs over", false
	}
	return tankOver, "runs over its top", false
}

// Shut implements network.Switching: a tank is always there.
func (l *tankLaw) Shut(int) bool { return false }

// Caution says where liquid is lost or air is drawn in.
func (l *tankLaw) Caution(s *network.Stamp) (code, text string) {
	switch {
	case s.Mode == tankBrim || s.Mode == tankOver && !l.has.crest && l.has.top:
		return "over-top", "it runs over its top: what is above the top is lost"
	case s.Mode == tankEmpty:
		return "tank-empty", "it has run empty: what leaves it beyond what enters is air, and flows from it are not those of liquid any more"
	}
	return "", ""
}
