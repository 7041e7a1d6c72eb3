package matrix

import "math"

// settleOrigin sets the poles of a part that are exactly 0 to 0, as many as the
// exact characteristic polynomial has, where one is small enough to ask.
func (s *system) settleOrigin(p *part) {
	var large float64
	small := math.Inf(1)
	asked := false
	for _, roots := range p.roots {
		for _, r := range roots {
			m := math.Hypot(r.Re, r.Im)
			large, small = max(large, m), min(small, m)
			asked = asked || m <= 4*r.Radius
		}
	}
	if !asked && small > 1e-12*large {
		return
	}
	count := modOrder(modCharacteristic(len(p.states), s.modular(p.states)))
	for ; count > 0; count-- {
		a, ok := p.smallest()
		if !ok || len(p.roots[a]) > count {
			return
		}
		p.toOrigin(a)
		count -= len(p.roots[a]) - 1
	}
}

// smallest finds the atom with the smallest poles that are not yet 0.
func (p *part) smallest() (atom int, ok bool) {
	least := math.Inf(1)
	for a, roots := range p.roots {
		var m float64
		for _, r := range roots {
			m = max(m, math.Hypot(r.Re, r.Im))
		}
		if m < least && (m != 0 || roots[0].Radius != 0) {
			least, atom, ok = m, a, true
		}
	}
	return atom, ok
}

// toOrigin makes the poles of an atom exactly 0. The block of a single one is 0
// then; that of several is left as it was computed, a matrix within rounding of the
// given one, since emptying its diagonal would not be.
func (p *part) toOrigin(a int) {
	if len(p.roots[a]) == 1 {
		k := p.start[a]
		p.d[k*len(p.states)+k] = 0
	}
	for k := range p.roots[a] {
		p.roots[a][k] = Root{}
	}
}
