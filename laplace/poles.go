package laplace

import (
	"math"
	"math/cmplx"
	"sort"
)

// A Pole is a pole or a zero in rad/s with its multiplicity. Radius bounds the
// error of each single member; of a multiple one, P is the mean of the members,
// which is far closer than any of them.
type Pole struct {
	P      complex128
	Mult   int
	Radius float64
}

// seated is one computed pole with its bound and its place in the modal form.
type seated struct {
	p      complex128
	radius float64
	seat   seat
}

// gather counts poles whose bounds overlap as one multiple pole, slowest first:
// ascending modulus, then real, then imaginary part. Both members of a conjugate
// pair are listed, each the exact conjugate of the other.
func gather(list []seated) (poles []Pole, seats [][]seat) {
	group := overlapping(list)
	for _, g := range group {
		var sum complex128
		for _, k := range g {
			sum += list[k].p
		}
		p := Pole{P: sum / complex(float64(len(g)), 0), Mult: len(g)}
		var at []seat
		for _, k := range g {
			p.Radius = max(p.Radius, cmplx.Abs(list[k].p-p.P)+list[k].radius)
			at = append(at, list[k].seat)
		}
		if len(g) == 1 {
			p.P = list[g[0]].p // not through a division
		}
		poles, seats = append(poles, p), append(seats, at)
	}
	order := make([]int, len(poles))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool { return slower(poles[order[a]].P, poles[order[b]].P) })
	sortedPoles, sortedSeats := make([]Pole, len(poles)), make([][]seat, len(poles))
	for i, k := range order {
		sortedPoles[i], sortedSeats[i] = poles[k], seats[k]
	}
	return sortedPoles, sortedSeats
}

// overlapping groups the indices of list whose bounds touch, directly or through
// others. Sorted by modulus, only neighbours within the largest bound can meet.
func overlapping(list []seated) [][]int {
	order := make([]int, len(list))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool { return slower(list[order[a]].p, list[order[b]].p) })
	parent := make([]int, len(list))
	for i := range parent {
		parent[i] = i
	}
	root := func(i int) int {
		for parent[i] != i {
			i = parent[i]
		}
		return i
	}
	reach := make([]float64, len(list)) // largest upper end of a modulus up to here
	for a, i := range order {
		reach[a] = cmplx.Abs(list[i].p) + list[i].radius
		if a > 0 {
			reach[a] = max(reach[a], reach[a-1])
		}
		low := cmplx.Abs(list[i].p) - list[i].radius
		for b := a - 1; b >= 0 && reach[b] >= low; b-- {
			j := order[b]
			if cmplx.Abs(list[i].p-list[j].p) <= list[i].radius+list[j].radius {
				parent[root(i)] = root(j)
			}
		}
	}
	var groups [][]int
	at := make(map[int]int)
	for _, i := range order {
		r := root(i)
		if _, ok := at[r]; !ok {
			at[r] = len(groups)
			groups = append(groups, nil)
		}
		groups[at[r]] = append(groups[at[r]], i)
	}
	return groups
}

// slower orders poles: ascending modulus, real part, imaginary part.
func slower(p, q complex128) bool {
	if a, b := cmplx.Abs(p), cmplx.Abs(q); a != b {
		return a < b
	}
	if real(p) != real(q) {
		return real(p) < real(q)
	}
	return imag(p) < imag(q)
}

// Poles returns all poles, slowest first, equal ones gathered: poles whose error
// bounds overlap count as one with a multiplicity.
func (s *System) Poles() []Pole { return append([]Pole(nil), s.poles...) }

// Shape tells how strongly output out moves in a pole (an index of Poles): the
// entries of its right vector, as seen by the outputs, with a common scale for all
// outputs. It answers for simple poles only; of a conjugate pair it gives the
// amplitude and phase with which the outputs swing.
func (s *System) Shape(out, pole int) (complex128, bool) {
	if len(s.seats[pole]) != 1 {
		return 0, false
	}
	v := &s.modal.out[out]
	switch at := s.seats[pole][0]; at.kind {
	case realSeat:
		return complex(v.real[at.index], 0), true
	case pairSeat:
		if imag(s.poles[pole].P) < 0 {
			return cmplx.Conj(v.pair[at.index]), true
		}
		return v.pair[at.index], true
	default:
		return s.blockShape(out, &s.modal.block[at.index], s.poles[pole].P)
	}
}

// blockShape finds the right vector of a pole within a block by inverse
// iteration.
func (s *System) blockShape(out int, q *block, p complex128) (complex128, bool) {
	x := make([]complex128, q.n)
	for i := range x {
		x[i] = 1
	}
	var scale float64
	for _, v := range q.t {
		scale = max(scale, math.Abs(v))
	}
	shift := p + complex(1e-14*scale, 0) // beside the pole: the solve must not divide by zero
	for range 3 {
		q.resolve(shift, x)
		var norm float64
		for _, v := range x {
			norm = math.Hypot(norm, cmplx.Abs(v))
		}
		if !(norm > 0) || math.IsInf(norm, 0) {
			return 0, false
		}
		for i := range x {
			x[i] /= complex(norm, 0)
		}
	}
	var y complex128
	for i, v := range x {
		y += complex(s.modal.out[out].block[q.first+i], 0) * v
	}
	return y, true
}
