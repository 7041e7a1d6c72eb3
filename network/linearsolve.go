package network

import (
	"math"
	"slices"
)

// solve takes the algebraic unknowns of each element out of its derivatives: with
// 0 = Σ a_j x_j of such a row, z = −Σ a_j x_j / a_z is put into the others, so that a
// pump whose flow follows from its head becomes what a resistance is. solved holds the
// coefficients of z by the local variables that are left. An unknown that has no row to
// find it from stays; those of an element that is gone stay where they are.
func (l *Linear) solve() {
	l.solved = make([][][]float64, len(l.stamps))
	for i, s := range l.stamps {
		e := &l.of.g.elements[i]
		l.solved[i] = make([][]float64, len(e.Unknowns))
		var rows []int
		for k := range e.Unknowns {
			if l.equations.algebraic(i, k) {
				rows = append(rows, len(e.Ports)+k)
			}
		}
		if l.gone[i] {
			for _, r := range rows {
				l.solved[i][r-len(e.Ports)] = make([]float64, len(s.X))
			}
			continue
		}
		for _, r := range slices.Clone(rows) {
			row := s.pivot(rows, r)
			if row < 0 {
				continue
			}
			s.takeOut(row, r)
			rows = slices.DeleteFunc(rows, func(x int) bool { return x == row })
			l.solved[i][r-len(e.Ports)] = s.follows(row, r)
		}
		l.settle(i)
	}
}

// pivot returns the row, of those left, that depends most on a local variable, −1 where
// none does.
func (s *Stamp) pivot(rows []int, local int) int {
	best, most := -1, 0.0
	for _, r := range rows {
		if v := math.Abs(s.DF[r*len(s.X)+local]); v > most {
			best, most = r, v
		}
	}
	return best
}

// takeOut puts a local variable, as a row gives it, into all other rows.
func (s *Stamp) takeOut(row, local int) {
	n := len(s.X)
	own := s.DF[row*n : (row+1)*n]
	for r := range s.F {
		if f := s.DF[r*n+local] / own[local]; r != row && f != 0 {
			for c := range n {
				s.DF[r*n+c] -= f * own[c]
			}
			s.DF[r*n+local] = 0
		}
	}
}

// follows is a local variable by the others, as a row gives it.
func (s *Stamp) follows(row, local int) []float64 {
	n := len(s.X)
	by := make([]float64, n)
	for c := range n {
		if c != local {
			by[c] = -s.DF[row*n+c] / s.DF[row*n+local]
		}
	}
	return by
}

// settle puts solved unknowns into one another: the first were solved while others
// still stood in their rows.
func (l *Linear) settle(i int) {
	ports := len(l.of.g.elements[i].Ports)
	for k := len(l.solved[i]) - 1; k >= 0; k-- {
		for other, by := range l.solved[i] {
			if with := l.solved[i][k]; other != k && by != nil && with != nil && by[ports+k] != 0 {
				f := by[ports+k]
				by[ports+k] = 0
				for c, v := range with {
					by[c] += f * v
				}
			}
		}
	}
}

// withoutSolved is a gradient by the local variables with the solved unknowns put in.
func (l *Linear) withoutSolved(i int, grad []float64) []float64 {
	ports := len(l.of.g.elements[i].Ports)
	grad = slices.Clone(grad)
	for k, by := range l.solved[i] {
		if f := grad[ports+k]; by != nil && f != 0 {
			grad[ports+k] = 0
			for c, v := range by {
				grad[c] += f * v
			}
		}
	}
	return grad
}
