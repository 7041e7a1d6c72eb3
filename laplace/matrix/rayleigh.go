package matrix

import "math"

// rayleigh corrects D alone, by W_aᵀ (M X_a − X_a D_a) with the residual in doubled
// precision. Where the form is good already, what is left is of second order:
// (norm of the error of M)²/(distance to the next pole).
func (g *eigenblocks) rayleigh(rows *sparseRows) {
	m := g.m
	res := make([]float64, m*m)
	rows.residual(m, res, g.x, g.d, g.start, false)
	for a := range g.radius {
		k0, k1 := g.start[a], g.start[a+1]
		p := k1 - k0
		sum := make([]float64, p*p)
		for i := 0; i < m; i++ {
			w, r := g.wt[i*m+k0:i*m+k1], res[i*m+k0:i*m+k1]
			for k, x := range w {
				for l, y := range r {
					sum[k*p+l] += x * y
				}
			}
		}
		var size float64
		for k := 0; k < p; k++ {
			for l := 0; l < p; l++ {
				g.d[(k0+k)*m+k0+l] += sum[k*p+l]
				size = math.Max(size, math.Abs(g.d[(k0+k)*m+k0+l]))
			}
		}
		g.radius[a] = float64(m)*g.radius[a]*g.radius[a]/g.distance(a) + eps*size
	}
	g.triangular()
}

// distance from the centre of atom a to that of the nearest other one, a pole and
// its conjugate counting as one.
func (g *eigenblocks) distance(a int) float64 {
	least := math.Inf(1)
	re, im := g.centre(a)
	for b := range g.radius {
		if b != a {
			x, y := g.centre(b)
			least = math.Min(least, math.Abs(x-re)+math.Abs(y-im))
		}
	}
	return least
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
		im = math.Sqrt(math.Max(0, -half*half-g.d[k+1]*g.d[k+g.m]))
	}
	return re, im
}
