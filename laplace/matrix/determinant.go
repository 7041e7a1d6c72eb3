package matrix

import "math"

// drift returns how far the product of the poles found is, relatively, from
// the one known from the elimination, which is the product of the pivots over
// that of the capacities (times the total capacity where nothing leaks). It is
// the sum of the relative errors of all poles: a pole that has lost digits in
// the reduction to a bidiagonal matrix shows in it.
func (t *network) drift(sigma []float64) float64 {
	found, known := product{m: 1}, product{m: 1}
	for k, s := range sigma {
		found.times(s)
		found.times(s)
		known.times(t.pivot[k])
		known.over(t.c[k])
	}
	if !t.grounded {
		total := 0.0
		for _, c := range t.c[:t.n] {
			total += c
		}
		known.times(total)
		known.over(t.c[t.rows])
	}
	return math.Abs(math.Ldexp(found.m/known.m, found.e-known.e) - 1)
}

// maxDrift is the drift beyond which one-sided Jacobi is called for. The drift
// of a good reduction grows like n, because it is a sum of n errors.
func maxDrift(n int) float64 { return eps * (50 + 2.5*float64(n)) }

// product is m·2^e, a product that cannot leave the range of doubles.
type product struct {
	m float64
	e int
}

func (p *product) times(x float64) { p.normal(p.m * x) }
func (p *product) over(x float64)  { p.normal(p.m / x) }

func (p *product) normal(m float64) {
	if m < 0x1p-400 || m > 0x1p400 {
		f, e := math.Frexp(m)
		m = f
		p.e += e
	}
	p.m = m
}
