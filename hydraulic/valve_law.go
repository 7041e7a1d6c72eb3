package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network"
)

// A valveLaw is the flow through a valve at its stroke, which is its drive:
// share(stroke)·Kv·√Δ, and no more than at the drop at which the liquid chokes.
type valveLaw struct {
	open  powerFlow // fully open
	trim  characteristic
	choke choke
}

// A choke is the drop beyond which the flow through a valve grows no more (IEC 60534-2-1,
// liquids): FL²·(p₁ − FF·pv), p₁ the absolute pressure before it.
type choke struct {
	checked       bool
	recovery      float64 // FL²
	least         float64 // FF·pv, Pa absolute; 0 where no vapour pressure is known
	first, second float64 // what makes an absolute pressure of the level at either end
}

// criticalRatio is FF = 0.96 − 0.28·√(pv/pc) (IEC 60534-2-1); 0.96 where the critical
// pressure is not known, which chokes a little early.
func criticalRatio(vapour, critical float64) float64 {
	if critical == 0 {
		return 0.96
	}
	return 0.96 - 0.28*math.Sqrt(vapour/critical)
}

// limit returns the greatest drop from a level, and its derivative.
func (c *choke) limit(before float64) (most, slope float64) {
	if most = c.recovery * (before - c.least); most < leastCore {
		return leastCore, 0
	}
	return most, c.recovery
}

// Modes of a valve beside open and shut: valveChoked.
const valveChoked = wayShut + 1

// through is the flow of the valve fully open, in a mode.
func (l *valveLaw) through(a, b float64, mode int) (q, da, db float64) {
	if mode != valveChoked {
		return l.open.Flow(a, b)
	}
	if a >= b {
		return l.choked(a, b, l.choke.first)
	}
	q, db, da = l.choked(b, a, l.choke.second)
	return -q, -da, -db
}

// seep is what the drop beyond the greatest still adds to the flow of a valve that chokes,
// as a share of what it would at a drop of 1 bar: next to nothing, but enough for the
// pressure behind it to be determined, which falls to vapour where more is drawn.
const seep = 1e-5

// choked is the flow from the higher level a to b; da ≥ 0 ≥ db.
func (l *valveLaw) choked(a, b, absolute float64) (q, da, db float64) {
	most, slope := l.choke.limit(a + absolute)
	q, dq := l.open.across(most)
	more := seep * l.open.k / (2 * math.Sqrt(oneBar))
	return q + more*(drop(a, b)-most), dq*slope + more*(1-slope), -more
}

// free is how much the drop may yet grow until the valve chokes, Pa, and the greatest drop.
func (l *valveLaw) free(s *network.Stamp) (left, most float64) {
	before, d := s.X[0]+l.choke.first, drop(s.X[0], s.X[1])
	if d < 0 {
		before, d = s.X[1]+l.choke.second, -d
	}
	most, _ = l.choke.limit(before)
	return most - d, most
}

// leastShare is the share of Kv with which a valve opens and from which it shuts: that
// last ten-thousandth, what a tight valve leaks when shut (class IV of IEC 60534-4), is passed
// at once. A column that a valve stops presses against an opening that goes to nothing as
// the flow does, and their ratio, which is the pressure, must not hang on rounding.
const leastShare = 1e-4

// Eval implements network.Law: ports first and second, drive the stroke. At 0 it answers
// for a valve that is about to open: nothing flows, and the slope is that of opening it.
func (l *valveLaw) Eval(s *network.Stamp) {
	q, da, db := l.through(s.X[0], s.X[1], s.Mode)
	share, slope := l.trim.at(s.X[2])
	if s.X[2] > 0 && share < leastShare {
		share, slope = leastShare, 0
	}
	copy(s.F, []float64{-share * q, share * q})
	copy(s.DF, []float64{-share * da, -share * db, -slope * q, share * da, share * db, slope * q})
}

// Begin implements network.Beginning.
func (l *valveLaw) Begin(s *network.Stamp, _ bool) {
	left, _ := l.free(s)
	switch s.Mode = wayOpen; {
	case l.ajar(s.X[2]) < 0:
		s.Mode = wayShut
	case l.choke.checked && left < 0:
		s.Mode = valveChoked
	}
}

// ajar is how far a stroke is above that at which the valve opens and shuts, as a share
// of Kv.
func (l *valveLaw) ajar(stroke float64) float64 {
	share, _ := l.trim.at(stroke)
	return share - leastShare
}

// Guards implements network.Switching: whether it opens or shuts, and whether it chokes.
func (l *valveLaw) Guards(s *network.Stamp, g []float64) int {
	left, most := l.free(s)
	g[0], g[1] = l.ajar(s.X[2]), left
	switch {
	case s.Mode == wayShut:
		g[0] = -g[0]
		return 1
	case s.Mode == valveChoked:
		g[1] = settled(s.X[0], most) - left
	case !l.choke.checked:
		return 1
	}
	return 2
}

// Next implements network.Switching.
func (l *valveLaw) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	switch {
	case k == 0 && s.Mode == wayShut:
		return wayOpen, "opens", false
	case k == 0:
		return wayShut, "shuts", false
	case s.Mode == valveChoked:
		return wayOpen, "chokes no more", false
	}
	return valveChoked, "chokes", false
}

// Shut implements network.Switching: that it is gone says its stroke.
func (l *valveLaw) Shut(int) bool { return false }

// lowRecovery is the FL² of a valve that recovers much, a ball or a butterfly: common
// practice, no source. A valve whose FL nobody states may choke from there on.
const lowRecovery = 0.25

// Caution says where the valve chokes, or where it might and nobody checks.
func (l *valveLaw) Caution(s *network.Stamp) (code, text string) {
	left, most := l.free(s)
	switch {
	case s.Mode == valveChoked:
		return "choked", fmt.Sprintf("it chokes: the drop passes FL²·(p₁ − FF·pv) = %.4g bar, and the flow grows no more; it may damage the valve", most/1e5)
	case !l.choke.checked && left < 0 && s.X[2] != 0:
		return "choking-unchecked", "choking is not checked, since no recovery (FL) is stated, and the drop is more than a quarter of the pressure before it"
	}
	return "", ""
}
