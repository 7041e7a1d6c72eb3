package matrix

import (
	"math"
	"slices"
)

// massGroup is a group of stores tied by a mass matrix M, with its inverse in doubled
// precision.
type massGroup struct {
	states []int
	mass   []float64 // m×m
	inv    []dd      // m×m
}

func ascending(list []int) []int {
	slices.Sort(list)
	return list
}

// newMassGroup inverts the mass matrix of a group by elimination without exchanges,
// which a positive definite matrix does not need. It returns ErrValue where a pivot
// says that the matrix is none.
func newMassGroup(s *Stores, states []int) (*massGroup, error) {
	m := len(states)
	h := &massGroup{states: states, mass: make([]float64, m*m), inv: make([]dd, m*m)}
	a := make([]dd, m*m)
	for p, i := range states {
		h.inv[p*m+p] = toDD(1)
		for q, j := range states {
			h.mass[p*m+q] = s.Mass[i*s.N+j]
			a[p*m+q] = toDD(h.mass[p*m+q])
		}
	}
	for k := range m {
		pivot := a[k*m+k]
		if !(pivot.hi > 0) {
			return nil, ErrValue
		}
		for i := range m {
			if i == k || a[i*m+k].zero() {
				continue
			}
			f := a[i*m+k].div(pivot)
			for j := range m {
				a[i*m+j] = a[i*m+j].sub(f.mul(a[k*m+j]))
				h.inv[i*m+j] = h.inv[i*m+j].sub(f.mul(h.inv[k*m+j]))
			}
		}
	}
	for i := range m {
		for j := range m {
			h.inv[i*m+j] = h.inv[i*m+j].div(a[i*m+i])
		}
	}
	return h, nil
}

// cancelled is the share of what an entry of M⁻¹G was added up from below which it is
// what doubled precision leaves of an exact cancellation. Left in, such a residue ties
// stores that do not act on each other, and scaling makes it large.
const cancelled = 0x1p-96

// solve puts M⁻¹ times the rows of the group in the place of those rows, with the
// capacities 1.
func (h *massGroup) solve(y *system) {
	m, n := len(h.states), y.n
	rows, sizes := make([]dd, m*n), make([]float64, m*n)
	for p := range h.states {
		for q, from := range h.states {
			f := h.inv[p*m+q]
			for j := range n {
				rows[p*n+j] = rows[p*n+j].add(f.mul(y.element(from, j)))
				sizes[p*n+j] += math.Abs(f.hi) * y.noise[from*n+j]
			}
		}
	}
	h.addMassNoise(n, rows, sizes)
	for p, i := range h.states {
		y.c[i] = 1
		for j := range n {
			v := rows[p*n+j]
			if math.Abs(v.hi) <= cancelled*sizes[p*n+j] {
				v = dd{}
			}
			y.noise[i*n+j] = sizes[p*n+j]
			if i == j {
				y.diag[i] = v
			} else {
				y.g[i*n+j], y.low[i*n+j] = v.hi, v.lo
			}
		}
	}
}

// addMassNoise adds to sizes what rounding of the masses does: M⁻¹ |M| |M⁻¹G|.
func (h *massGroup) addMassNoise(n int, rows []dd, sizes []float64) {
	m := len(h.states)
	for j := range n {
		moved := make([]float64, m)
		for p := range m {
			for q := range m {
				moved[p] += math.Abs(h.mass[p*m+q]) * math.Abs(rows[q*n+j].hi)
			}
		}
		for p := range m {
			for q := range m {
				sizes[p*n+j] += math.Abs(h.inv[p*m+q].hi) * moved[q]
			}
		}
	}
}

// rates returns what flows f bring to each x' at once: f/c, or M⁻¹ f.
func (s *system) rates(f []float64) []dd {
	y := make([]dd, s.n)
	for i, v := range f {
		if v != 0 {
			y[i] = quotient(toDD(v), s.c[i])
		}
	}
	for _, h := range s.massGroups {
		m := len(h.states)
		for p, i := range h.states {
			y[i] = dd{}
			for q, j := range h.states {
				if f[j] != 0 {
					y[i] = y[i].add(h.inv[p*m+q].mul(toDD(f[j])))
				}
			}
		}
	}
	return y
}

// forces returns f with M⁻¹ applied to the groups that have a mass matrix, whose
// capacities are 1.
func (s *system) forces(f []float64) []float64 {
	if len(s.massGroups) == 0 {
		return f
	}
	y, r := append([]float64(nil), f...), s.rates(f)
	for _, h := range s.massGroups {
		for _, i := range h.states {
			y[i] = r[i].float()
		}
	}
	return y
}
