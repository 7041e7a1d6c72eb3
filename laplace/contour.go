package laplace

import (
	"math"
	"math/cmplx"
)

// contourPoints are the numbers of values of F one contour may take, in the order
// tried. The weights of a contour of m points reach e^{0.34m}; beyond 36 rounding
// alone exceeds 1e-11 of the values.
var contourPoints = [...]int{12, 16, 22, 28, 36}

// contour is the upper half of a cotangent (Talbot) contour for t = 1, midpoint rule
// with N = 2m nodes, z(θ) = N·(−0.6122 + 0.5017·θ·cot(0.6407·θ) + 0.2645·iθ), the
// constants optimised for singularities on the negative real axis: Trefethen,
// Weideman and Schmelzer, "Talbot quadratures and rational approximations", BIT 46
// (2006) 653-670. There the error falls by 3.89 a node of the N.
type contour struct {
	z, w []complex128 // nodes, and (2/N)·z′/i
}

func newContour(m int) *contour {
	const a, b, c, d = 0.5017, 0.6407, 0.6122, 0.2645
	n := float64(2 * m)
	k := &contour{make([]complex128, m), make([]complex128, m)}
	for i := range k.z {
		θ := math.Pi * float64(2*i+1) / n
		sin, cos := math.Sincos(b * θ)
		cot := cos / sin
		k.z[i] = complex(n*(a*θ*cot-c), n*d*θ)
		dz := complex(n*(a*cot-a*b*θ/(sin*sin)), n*d)
		k.w[i] = dz * complex(0, -2/n)
	}
	return k
}

// shared is one contour laid for the time mid and used for times near it: the
// values of F are taken once (a window of times; Weideman and Trefethen, Math.
// Comp. 76 (2007) 1341-1356, do so with parabolas and hyperbolas).
type shared struct {
	c         *contour
	mid, grow float64 // the abscissa is grow
	f         []complex128
}

// lay takes the values of g on c. ok is false where one is not finite.
func (c *contour) lay(g transform, abscissa, mid float64, f []complex128) (s shared, ok bool) {
	s = shared{c, mid, abscissa, f[:len(c.z)]}
	for i, z := range c.z {
		v := g(complex(abscissa, 0)+z/complex(mid, 0)) * c.w[i] / complex(mid, 0)
		if cmplx.IsNaN(v) || cmplx.IsInf(v) {
			return s, false
		}
		s.f[i] = v
	}
	return s, true
}

// at returns the inverse at the time t and the largest term of the sum, which
// rounding is a part of.
func (s *shared) at(t float64) (y, term float64) {
	q := t / s.mid
	for i, z := range s.c.z {
		e := math.Exp(real(z) * q)
		sin, cos := math.Sincos(imag(z) * q)
		f := s.f[i]
		y += e * (cos*real(f) - sin*imag(f))
		term = max(term, e*(math.Abs(real(f))+math.Abs(imag(f))))
	}
	if s.grow != 0 {
		e := math.Exp(s.grow * t)
		return y * e, term * e
	}
	return y, term
}

// traced is what contours say about a window: values at the sample times, and the
// best guess of their error from two numbers of points.
type traced struct {
	s   shared
	y   []float64
	own float64 // +Inf: no contour could be used
}

// trace lays contours with more and more points until two agree within goal, and
// keeps those that agreed best. Rounding is that of the exponents, of size 2m and less.
func (v *inversion) trace(lo, hi float64, times []float64) traced {
	mid := math.Sqrt(lo * hi)
	best := traced{own: math.Inf(1), y: make([]float64, len(times))}
	last, y := make([]float64, len(times)), make([]float64, len(times))
	have := false
	for i, m := range contourPoints {
		s, ok := v.contour(i).lay(v.g, v.o.Abscissa, mid, make([]complex128, m))
		if !ok {
			have = false
			continue
		}
		own, size := 0.0, 0.0
		for j, t := range times {
			var term float64
			y[j], term = s.at(t)
			own = worse(own, math.Abs(y[j]-last[j])+float64(8+m)*epsilon*term)
			size = max(size, math.Abs(y[j]))
		}
		if have && own < best.own {
			best.s, best.own = s, own
			copy(best.y, y)
		}
		if have && own <= v.goal(size) {
			break
		}
		last, y, have = y, last, true
	}
	return best
}

func (v *inversion) contour(i int) *contour {
	if v.contours[i] == nil {
		v.contours[i] = newContour(contourPoints[i])
	}
	return v.contours[i]
}

// worse is max, in which a NaN is the worst.
func worse(a, b float64) float64 {
	if math.IsNaN(b) {
		return math.Inf(1)
	}
	return max(a, b)
}
