package matrix

import "math"

// rayleigh corrects D alone, by W_aᵀ (M X_a − X_a D_a) with the residual in doubled
// precision. Where the form is good already, what is left is of second order:
// (norm of the error of M)²/(distance to the next pole).
func (g *eigenblocks) rayleigh(rows *sparseRows, w *BlockWork, e, res []float64) {
	m := g.m
	rows.residual(m, res, g.x, g.d, w.low, g.start, false)
	g.project(e, res)
	centres := g.centres(w.poles[:0])
	w.poles = centres
	for a := range g.radius {
		var size float64
		for k := g.start[a]; k < g.start[a+1]; k++ {
			for l := g.start[a]; l < g.start[a+1]; l++ {
				g.d[k*m+l] += e[k*m+l]
				size = max(size, math.Abs(g.d[k*m+l]))
			}
		}
		g.radius[a] = float64(m)*g.radius[a]*g.radius[a]/distance(centres, a) + eps*size
	}
	g.triangular()
}

// project sets the diagonal blocks of e to those of WᵀR.
func (g *eigenblocks) project(e, r []float64) {
	m := g.m
	for a := range g.radius {
		for k := g.start[a]; k < g.start[a+1]; k++ {
			clear(e[k*m+g.start[a] : k*m+g.start[a+1]])
		}
	}
	for i := 0; i < m; i++ {
		w, r := g.wt[i*m:i*m+m], r[i*m:i*m+m]
		for a := range g.radius {
			k0, k1 := g.start[a], g.start[a+1]
			for k := k0; k < k1; k++ {
				for l := k0; l < k1; l++ {
					e[k*m+l] += w[k] * r[l]
				}
			}
		}
	}
}

// distance from centre a to the nearest other one, a pole and its conjugate
// counting as one.
func distance(centres []complex128, a int) float64 {
	least := math.Inf(1)
	x := centres[a]
	for b, y := range centres {
		if b != a {
			least = min(least, math.Abs(real(y)-real(x))+math.Abs(imag(y)-imag(x)))
		}
	}
	return least
}

// centres appends the mean of the poles of every atom, of those above the real axis
// where they are a pair.
func (g *eigenblocks) centres(list []complex128) []complex128 {
	for a := range g.radius {
		re, im := g.centre(a)
		list = append(list, complex(re, im))
	}
	return list
}

// centre is the mean of the poles of an atom, of those above the real axis where
// they are a pair.
func (g *eigenblocks) centre(a int) (re, im float64) {
	k0, p := g.start[a], g.start[a+1]-g.start[a]
	for k := k0; k < k0+p; k++ {
		re += g.d[k*g.m+k] / float64(p)
	}
	if p == 2 {
		k := k0*g.m + k0
		half := (g.d[k] - g.d[k+g.m+1]) / 2
		im = math.Sqrt(max(0, -half*half-g.d[k+1]*g.d[k+g.m]))
	}
	return re, im
}
