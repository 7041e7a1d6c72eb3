package hydraulic

import "lagbook/network"

// Modes of a pump are sets of these; none: it runs and its non-return is open.
const (
	pumpShut    = 1 << iota // the non-return is shut
	pumpOff                 // switched off
	pumpTripped             // its drive is gone
)

// A pumpExit is a way out of a mode.
type pumpExit uint8

const (
	exitShut pumpExit = iota
	exitOpen
	exitOff
	exitOn
	exitTrip
)

// pumpModes are what changes the state of a pump beside its speed: a non-return, a
// switch by the level of a node, a trip.
type pumpModes struct {
	nonReturn, switched, trips bool
	watch                      int     // place of the node watched among the ports
	on, off                    float64 // levels of the network there
	begin                      int     // mode of a switched pump at t = 0: 0, pumpOff, or asLevel
}

// asLevel lets a switched pump begin off where the level stands at off or above.
const asLevel = -1

// exits lists the ways out of a mode, in the order of its guards.
func (m *pumpModes) exits(mode int) (list [3]pumpExit, n int) {
	add := func(e pumpExit) { list[n], n = e, n+1 }
	if m.nonReturn {
		if mode&pumpShut != 0 {
			add(exitOpen)
		} else {
			add(exitShut)
		}
	}
	if m.switched {
		if mode&pumpOff != 0 {
			add(exitOn)
		} else {
			add(exitOff)
		}
	}
	if m.trips && mode&pumpTripped == 0 {
		add(exitTrip)
	}
	return list, n
}

// guards writes the guards of a mode. forward is the flow where the non-return is
// open and what would push it open where it is shut; powered is 1 until the trip.
func (m *pumpModes) guards(s *network.Stamp, forward, powered float64, g []float64) int {
	list, n := m.exits(s.Mode)
	for k, e := range list[:n] {
		switch e {
		case exitShut:
			g[k] = forward
		case exitOpen:
			g[k] = -forward
		case exitOff:
			g[k] = m.off - s.X[m.watch]
		case exitOn:
			g[k] = s.X[m.watch] - m.on
		case exitTrip:
			g[k] = powered - 0.5
		}
	}
	return n
}

// next is the mode after a guard, and what happened. pushes tells for a mode whether the
// pump would push the non-return open in it.
func (m *pumpModes) next(mode, k int, pushes func(mode int) bool) (int, string) {
	list, _ := m.exits(mode)
	what := ""
	switch list[k] {
	case exitShut:
		return mode | pumpShut, "its non-return shuts"
	case exitOpen:
		return mode &^ pumpShut, "its non-return opens"
	case exitOff:
		mode, what = mode|pumpOff, "switched off"
	case exitOn:
		mode, what = mode&^pumpOff, "switched on"
	case exitTrip:
		return mode | pumpTripped, "trips"
	}
	if m.nonReturn && pushes(mode) {
		return mode &^ pumpShut, what
	}
	if m.nonReturn {
		return mode | pumpShut, what
	}
	return mode, what
}

// start is the mode at t = 0, by the level at the node watched. The non-return of a pump
// that begins off is shut unless something pushes it open.
func (m *pumpModes) start(s *network.Stamp, pushes func(mode int) bool) int {
	off := m.begin
	if off == asLevel {
		off = 0
		if s.X[m.watch] >= m.off {
			off = pumpOff
		}
	}
	mode := s.Mode&^pumpOff | off
	if !m.switched || off == 0 {
		return s.Mode &^ pumpOff
	}
	if m.nonReturn && !pushes(mode) {
		mode |= pumpShut
	}
	return mode
}
