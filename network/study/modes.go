package study

import (
	"fmt"
	"math"
	"math/cmplx"
	"sort"

	"lagbook/laplace"
)

const (
	modeNodes = 60  // nodes up to which mode shapes are found
	leastMove = 0.1 // moves below this share of the largest are left out
)

// wantModes makes every free node an output of a network small enough to say
// what moves together.
func (m *Model) wantModes() error {
	if m.Net.NodeCount() > modeNodes {
		return nil
	}
	for _, n := range m.freeNames() {
		if _, err := m.wantNode(n); err != nil {
			return err
		}
	}
	return nil
}

// modes lists the poles of the whole network with what moves together in each.
func (m *Model) modes(sys *laplace.System) []Mode {
	list := []Mode{}
	small := m.Net.NodeCount() <= modeNodes
	for k, p := range sys.Poles() {
		d := Mode{Pole: pole(p), Moves: []Move{}, Shares: []Share{}}
		if small && p.Mult == 1 {
			d.Moves = m.moves(sys, k)
		}
		list = append(list, d)
	}
	return list
}

// moves returns the named nodes that move in pole k, largest first. Where the
// pole is one of a pair the sizes are those of the swing, without their phase.
func (m *Model) moves(sys *laplace.System, k int) []Move {
	list := []Move{}
	var lead complex128
	shape := make([]complex128, 0, modeNodes)
	names := m.freeNames()
	for _, n := range names {
		w, err := m.wantNode(n)
		if err != nil {
			return list
		}
		z, ok := sys.Shape(w.out, k)
		if !ok {
			return list
		}
		shape = append(shape, z)
		if cmplx.Abs(z) > cmplx.Abs(lead)*(1+1e-9) {
			lead = z
		}
	}
	if lead == 0 {
		return list
	}
	for i, z := range shape {
		size := real(z / lead)
		if imag(sys.Poles()[k].P) != 0 {
			size = cmplx.Abs(z / lead)
		}
		if math.Abs(size) >= leastMove {
			list = append(list, Move{names[i], size, m.inside(names[i])})
		}
	}
	sort.SliceStable(list, func(i, j int) bool { return math.Abs(list[i].Size) > math.Abs(list[j].Size)*(1+1e-9) })
	return list
}

// inside names the part that brought a node the case does not name: a rung of a
// ladder, a lump of a wall.
func (m *Model) inside(node string) string {
	id, ok := m.Case.Node(node)
	if !ok {
		return ""
	}
	if part := m.partOf(m.Net.Node(id).Ref); part != node {
		return part
	}
	return ""
}

// growing says in words which poles grow, and how fast.
func (m *Model) growing(sys *laplace.System) []Warning {
	var warn []Warning
	for _, p := range sys.Poles() {
		re, im := real(p.P), imag(p.P)
		switch {
		case re <= p.Radius || im < 0:
		case im == 0:
			warn = append(warn, Warning{"unstable", "unstable: an excess doubles every " + m.Show.Time(math.Ln2/re)})
		default:
			warn = append(warn, Warning{"unstable", fmt.Sprintf("unstable: a swing of period %s doubles every %s", m.Show.Time(2*math.Pi/im), m.Show.Time(math.Ln2/re))})
		}
	}
	return warn
}

// shares notes by each mode what it carries of each rise.
func shares(a *Poles, of string) {
	for _, t := range a.Transfers {
		if t.About != of {
			continue // the modes belong to another state
		}
		for _, p := range t.Poles {
			if p.Share == nil {
				continue
			}
			if k := closest(a.Modes, p); k >= 0 {
				a.Modes[k].Shares = append(a.Modes[k].Shares, Share{t.Input, t.Output, *p.Share})
			}
		}
	}
}

// closest finds the mode that a pole of a transfer function is.
func closest(modes []Mode, p Pole) int {
	best, gap := -1, math.Inf(1)
	for k, d := range modes {
		if g := math.Hypot(d.Re-p.Re, d.Im-p.Im); g < gap {
			best, gap = k, g
		}
	}
	return best
}
