package matrix

import "math"

// adrift returns the stores whose level nothing determines, by the look of the
// network alone: a group from which no way leads to the reference, and all
// that is tied to such a group. Of a store in whose balance something is
// negative only the numbers can tell.
func (b *Balance) adrift() []int {
	tied := make([]bool, b.N)
	for i := range tied {
		tied[i] = b.Leak[i] != 0 || !b.clean(i)
	}
	b.spread(tied)
	lost := make([]bool, b.N)
	some := false
	for i := range lost {
		lost[i] = !tied[i]
		some = some || lost[i]
	}
	if !some {
		return nil
	}
	b.spread(lost)
	return members(lost)
}

// spread marks every store that depends, through others or not, on a marked one.
func (b *Balance) spread(mark []bool) {
	var queue []int
	for i, m := range mark {
		if m {
			queue = append(queue, i)
		}
	}
	for len(queue) > 0 {
		j := queue[0]
		queue = queue[1:]
		for i := range mark {
			if !mark[i] && b.F[i*b.N+j] != 0 {
				mark[i] = true
				queue = append(queue, i)
			}
		}
	}
}

func members(mark []bool) []int {
	var list []int
	for i, m := range mark {
		if m {
			list = append(list, i)
		}
	}
	return list
}

// undetermined returns the stores that move in a solution without flows.
func (e *Elimination) undetermined() []int {
	moves := make([]bool, e.n)
	for _, z := range e.rest.null() {
		y := make([]float64, e.n)
		copy(y[e.done:], z)
		e.back(y)
		most := largest(y)
		for p, x := range y {
			if math.Abs(x) > 1e-8*most {
				moves[e.order[p]] = true
			}
		}
	}
	return members(moves)
}
