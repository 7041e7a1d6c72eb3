package laplace

import (
	"math"
	"math/cmplx"
)

// fourierSeries is the Fourier series of a response over a period 2T, taken on the line
// Re s = line and summed as a continued fraction whose coefficients come from the
// quotient-difference scheme, with an estimate of the remainder: de Hoog, Knight
// and Stokes, "An improved method for numerical inversion of Laplace transforms",
// SIAM J. Sci. Stat. Comput. 3 (1982) 357-366. It sees F only right of its
// singularities and so bears delays, jumps elsewhere and wrong branches to the left.
type fourierSeries struct {
	line, half float64 // half is T
	until      float64 // times above were not meant
	d          []complex128
	scale      float64
}

// seriesShape is the period in units of the last time, the wanted aliasing
// e^{−2·line·T}, and the order of the fraction.
type seriesShape struct {
	period, alias float64
	order         int
}

// checkShape is for windows in which the contour holds. Where it does not, longShapes
// follow jumps and fast oscillations: the scheme keeps its digits at these orders,
// and the two see different parts of the future wrapped into their periods.
var (
	checkShape = seriesShape{4, 1e-13, 20}
	longShapes = [...]seriesShape{{2.4, 1e-11, 60}, {1.7, 1e-10, 100}}
)

func newFourierSeries(g transform, abscissa, until float64, shape seriesShape) *fourierSeries {
	f := &fourierSeries{half: shape.period * until / 2, until: until}
	f.line = abscissa - math.Log(shape.alias)/(2*f.half)
	a := make([]complex128, 2*shape.order+1)
	for k := range a {
		a[k] = g(complex(f.line, math.Pi*float64(k)/f.half))
		f.scale = worse(f.scale, cmplx.Abs(a[k]))
	}
	if f.scale == 0 || math.IsInf(f.scale, 1) {
		return f
	}
	for k := range a {
		a[k] /= complex(f.scale, 0)
	}
	a[0] /= 2
	f.d = quotientDifference(a)
	return f
}

// quotientDifference returns the coefficients of d₀/(1+d₁z/(1+d₂z/…)) that agrees
// with Σa_k·zᵏ, as many as stay finite: a series that ends or is rational itself
// makes the scheme divide by zero, and then the fraction is complete.
func quotientDifference(a []complex128) []complex128 {
	n := len(a)
	d := make([]complex128, n)
	d[0] = a[0]
	q, e := make([]complex128, n), make([]complex128, n)
	for k := 0; k < n-1; k++ {
		q[k] = a[k+1] / a[k]
	}
	d[1] = -q[0]
	for r := 1; 2*r < n; r++ {
		for k := 0; k < n-2*r; k++ {
			e[k] = q[k+1] - q[k] + e[k+1]
		}
		d[2*r] = -e[0]
		if 2*r+1 == n {
			break
		}
		for k := 0; k < n-2*r-1; k++ {
			q[k] = q[k+1] * e[k+1] / e[k]
		}
		d[2*r+1] = -q[0]
	}
	for k, v := range d {
		if cmplx.IsNaN(v) || cmplx.IsInf(v) {
			return d[:k]
		}
	}
	return d
}

// at returns the inverse at the time t; NaN where the fraction failed.
func (f *fourierSeries) at(t float64) float64 {
	if f.scale == 0 {
		return 0
	}
	n := len(f.d)
	if n == 0 {
		return math.NaN()
	}
	sin, cos := math.Sincos(math.Pi * t / f.half)
	z := complex(cos, sin)
	var v complex128
	if n > 2 {
		h := 0.5 * (1 + z*(f.d[n-2]-f.d[n-1]))
		v = -h * (1 - cmplx.Sqrt(1+z*f.d[n-1]/(h*h)))
	} else if n == 2 {
		v = f.d[1] * z
	}
	for k := n - 2; k > 0; k-- {
		v = f.d[k] * z / (1 + v)
	}
	return f.scale * math.Exp(f.line*t) / f.half * real(f.d[0]/(1+v))
}
