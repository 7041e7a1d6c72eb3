package stiff

import (
	"errors"
	"math"
	"slices"
)

// dense is a System with a full matrix, for tests.
type dense struct {
	mass    []float64
	rates   func(t float64, x, f []float64)
	jac     func(t float64, x []float64, j [][]float64)
	drift   func(t float64, x, ft []float64)
	j, lu   [][]float64
	swapped []int
	factors int
}

func newDense(mass ...float64) *dense {
	n := len(mass)
	d := &dense{mass: mass, swapped: make([]int, n)}
	for range n {
		d.j, d.lu = append(d.j, make([]float64, n)), append(d.lu, make([]float64, n))
	}
	return d
}

func (d *dense) Rates(t float64, x, f []float64) { d.rates(t, x, f) }

func (d *dense) Linearise(t float64, x, f, ft []float64) {
	d.rates(t, x, f)
	clear(ft)
	if d.drift != nil {
		d.drift(t, x, ft)
	}
	d.jac(t, x, d.j)
}

func (d *dense) Factor(shift float64) error {
	d.factors++
	n := len(d.mass)
	for i := range n {
		for k := range n {
			d.lu[i][k] = -d.j[i][k]
		}
		d.lu[i][i] += shift * d.mass[i]
	}
	for k := range n {
		p := k
		for i := k + 1; i < n; i++ {
			if math.Abs(d.lu[i][k]) > math.Abs(d.lu[p][k]) {
				p = i
			}
		}
		d.swapped[k] = p
		d.lu[k], d.lu[p] = d.lu[p], d.lu[k]
		if d.lu[k][k] == 0 {
			return errors.New("singular")
		}
		for i := k + 1; i < n; i++ {
			d.lu[i][k] /= d.lu[k][k]
			for j := k + 1; j < n; j++ {
				d.lu[i][j] -= d.lu[i][k] * d.lu[k][j]
			}
		}
	}
	return nil
}

func (d *dense) Solve(b []float64) {
	n := len(b)
	for k, p := range d.swapped { // rows were swapped whole, so all swaps come first
		b[k], b[p] = b[p], b[k]
	}
	for i := range n {
		for k := range i {
			b[i] -= d.lu[i][k] * b[k]
		}
	}
	for i := n - 1; i >= 0; i-- {
		for k := i + 1; k < n; k++ {
			b[i] -= d.lu[i][k] * b[k]
		}
		b[i] /= d.lu[i][i]
	}
}

// Settle solves the algebraic rows by Newton's method with the other unknowns pinned.
func (d *dense) Settle(t float64, x []float64) bool {
	if !slices.Contains(d.mass, 0) {
		return false
	}
	n := len(x)
	f, was := make([]float64, n), append([]float64(nil), x...)
	for range 30 {
		d.rates(t, x, f)
		d.jac(t, x, d.j)
		most := 0.0
		for i, m := range d.mass {
			if m != 0 {
				f[i] = 0
				clear(d.j[i])
				d.j[i][i] = -1
			}
		}
		if d.Factor(0) != nil {
			break
		}
		d.Solve(f)
		for i, v := range f {
			x[i] += v
			most = max(most, math.Abs(v))
		}
		if most < 1e-14 {
			return true
		}
	}
	copy(x, was)
	return false
}

// ones returns n scales of 1.
func ones(n int) []float64 {
	s := make([]float64, n)
	for i := range s {
		s[i] = 1
	}
	return s
}
